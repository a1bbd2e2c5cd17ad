//! Crossings of grid lines in the plane, and what stands between them.

/// Lines across x and across y; column `i · (number of y lines) + j` stands on their crossing.
#[derive(Clone, Debug, PartialEq)]
pub struct Plan {
    /// Lines of constant x, rising.
    pub x: Vec<f64>,
    /// Lines of constant y, rising.
    pub y: Vec<f64>,
}

impl Plan {
    /// A plan on lines that rise.
    pub fn new(x: Vec<f64>, y: Vec<f64>) -> Self {
        Self { x, y }
    }

    /// Number of columns.
    pub fn columns(&self) -> usize {
        self.x.len() * self.y.len()
    }

    /// Number of cells between the lines; cell (i, j) has the index `i · (y lines − 1) + j`.
    pub fn cells(&self) -> usize {
        (self.x.len() - 1) * (self.y.len() - 1)
    }

    /// Index of the column on line `i` across x and line `j` across y.
    pub fn column(&self, i: usize, j: usize) -> usize {
        i * self.y.len() + j
    }

    /// Where a column stands.
    pub fn place(&self, column: usize) -> [f64; 2] {
        [self.x[column / self.y.len()], self.y[column % self.y.len()]]
    }

    /// Index of the column nearest to a point.
    pub fn nearest(&self, point: [f64; 2]) -> usize {
        let nearest = |lines: &[f64], at: f64| {
            (0..lines.len())
                .min_by(|&a, &b| (lines[a] - at).abs().total_cmp(&(lines[b] - at).abs()))
                .unwrap_or(0)
        };
        self.column(nearest(&self.x, point[0]), nearest(&self.y, point[1]))
    }

    /// The four columns around a point with their bilinear weights; none off the plan.
    pub fn around(&self, point: [f64; 2]) -> Option<[(usize, f64); 4]> {
        let (i, s) = between(&self.x, point[0])?;
        let (j, t) = between(&self.y, point[1])?;
        let at = |p: usize, q: usize| self.column(i + p, j + q);
        Some([
            (at(0, 0), (1.0 - s) * (1.0 - t)),
            (at(0, 1), (1.0 - s) * t),
            (at(1, 0), s * (1.0 - t)),
            (at(1, 1), s * t),
        ])
    }

    /// Index of the cell that holds a point; none off the plan.
    pub fn cell_at(&self, point: [f64; 2]) -> Option<usize> {
        let (i, _) = between(&self.x, point[0])?;
        let (j, _) = between(&self.y, point[1])?;
        Some(i * (self.y.len() - 1) + j)
    }

    /// Area of a cell.
    pub fn cell_area(&self, cell: usize) -> f64 {
        let [x, y] = self.cell_sides(cell);
        (x[1] - x[0]) * (y[1] - y[0])
    }

    /// First and last x, first and last y of a cell.
    pub fn cell_sides(&self, cell: usize) -> [[f64; 2]; 2] {
        let (i, j) = (cell / (self.y.len() - 1), cell % (self.y.len() - 1));
        [[self.x[i], self.x[i + 1]], [self.y[j], self.y[j + 1]]]
    }

    /// The four columns at the corners of a cell: (0, 0), (0, 1), (1, 0), (1, 1).
    pub fn corners(&self, cell: usize) -> [usize; 4] {
        let (i, j) = (cell / (self.y.len() - 1), cell % (self.y.len() - 1));
        let first = self.column(i, j);
        let next = self.column(i + 1, j);
        [first, first + 1, next, next + 1]
    }
}

/// Index of the interval that holds a value, and how far along; none outside.
fn between(lines: &[f64], at: f64) -> Option<(usize, f64)> {
    let last = lines.len() - 1;
    if !(lines[0] <= at && at <= lines[last]) {
        return None;
    }
    let left = lines[1..last].partition_point(|line| *line <= at);
    let (low, high) = (lines[left], lines[left + 1]);
    Some((left, (at - low) / (high - low)))
}
