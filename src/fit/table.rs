//! A table that never falls through measured points, with its scatter.

use crate::fit::{
    line::Point,
    power::{points, stated},
    readings::Reading,
};

/// Most rows of a table; more points are gathered.
const MOST_ROWS: usize = 12;

/// A rising table through measured points.
#[derive(Clone, Debug, PartialEq)]
pub struct MonotoneTable {
    /// (abscissa; conductance), SI, both rising.
    pub rows: Vec<(f64, f64)>,
    /// Standard deviation of one reading about the table, in ln y.
    pub scatter: f64,
    /// Readings.
    pub count: usize,
    /// Rows that fell and were put level.
    pub levelled: usize,
}

impl MonotoneTable {
    /// The table; none where fewer than two places were measured, or nothing tells the scatter.
    ///
    /// Readings at one place are averaged by weight in ln y, more places than rows are gathered
    /// neighbour by neighbour, and rows that fall are put level (least squares among tables that do
    /// not fall). The scatter is that of the readings about the table where places were measured
    /// more than once; else that of each place about the straight line between its neighbours in
    /// logarithms; and never less than is stated.
    ///
    /// Source: pool of adjacent violators (Ayer et al. 1955), difference of neighbours (Gasser,
    /// Sroka & Jennen-Steinmetz 1986), both from memory.
    /// Checked: `a_falling_row_is_put_level`, `scatter_of_single_readings_is_found`.
    pub fn of(readings: &[Reading]) -> Option<Self> {
        let mut points = points(readings);
        points.sort_by(|one, other| one.x.total_cmp(&other.x));
        let places = places(&points);
        let rows = gathered(places.clone());
        if rows.len() < 2 {
            return None;
        }
        let level = levelled(&rows);
        let own = repeated(&points).or_else(|| neighbours(&places));
        let said = stated(readings).then(|| {
            let variances = points.iter().map(|point| point.weight.recip());
            variances.sum::<f64>() / points.len() as f64
        });
        let variance = match (own, said) {
            (Some(own), Some(said)) => own.max(said),
            (own, said) => own.or(said)?,
        };
        Some(Self {
            levelled: rows
                .iter()
                .zip(&level)
                .filter(|(row, y)| (row.y - **y).abs() > 0.0)
                .count(),
            rows: rows
                .iter()
                .zip(&level)
                .map(|(row, y)| (row.x.exp(), y.exp()))
                .collect(),
            scatter: variance.sqrt(),
            count: points.len(),
        })
    }

    /// How far another joint of the kind may be off, one standard deviation as a factor.
    pub fn factor(&self) -> f64 {
        self.scatter.exp()
    }
}

/// Distance in ln x below which two readings stand at one place: no gauge tells them apart.
const ONE_PLACE: f64 = 1e-3;

/// Points of one place made one.
fn places(points: &[Point]) -> Vec<Point> {
    let mut rows: Vec<Point> = Vec::new();
    for point in points {
        match rows.last_mut() {
            Some(row) if (row.x - point.x).abs() < ONE_PLACE => *row = merged(row, point),
            _ => rows.push(*point),
        }
    }
    rows
}

/// Neighbours gathered until they are few enough.
fn gathered(mut rows: Vec<Point>) -> Vec<Point> {
    while rows.len() > MOST_ROWS {
        let gap = |at: &usize| rows[at + 1].x - rows[*at].x;
        let nearest = (0..rows.len() - 1).min_by(|one, other| gap(one).total_cmp(&gap(other)));
        let at = nearest.unwrap_or(0);
        rows[at] = merged(&rows[at], &rows[at + 1]);
        rows.remove(at + 1);
    }
    rows
}

fn merged(one: &Point, other: &Point) -> Point {
    let weight = one.weight + other.weight;
    let mean = |a: f64, b: f64| (one.weight * a + other.weight * b) / weight;
    Point {
        x: mean(one.x, other.x),
        y: mean(one.y, other.y),
        weight,
    }
}

/// Heights that do not fall, nearest to the rows.
fn levelled(rows: &[Point]) -> Vec<f64> {
    let mut blocks: Vec<(Point, usize)> = Vec::new();
    for row in rows {
        blocks.push((*row, 1));
        while let [.., (before, _), (last, _)] = blocks.as_slice()
            && before.y > last.y
        {
            let (Some((last, many)), Some((before, few))) = (blocks.pop(), blocks.pop()) else {
                break;
            };
            blocks.push((merged(&before, &last), few + many));
        }
    }
    let heights = blocks.iter();
    heights
        .flat_map(|(block, count)| std::iter::repeat_n(block.y, *count))
        .collect()
}

/// Variance of readings about the mean of their own place; none where no place was repeated.
fn repeated(points: &[Point]) -> Option<f64> {
    let (mut sum, mut degrees) = (0.0, 0);
    for group in points.chunk_by(|one, other| (one.x - other.x).abs() < ONE_PLACE) {
        let mean = group.iter().map(|point| point.y).sum::<f64>() / group.len() as f64;
        sum += group
            .iter()
            .map(|point| (point.y - mean).powi(2))
            .sum::<f64>();
        degrees += group.len() - 1;
    }
    (degrees >= 2).then(|| sum / degrees as f64)
}

/// Variance of each row about the line between its neighbours; none for fewer than four rows.
fn neighbours(rows: &[Point]) -> Option<f64> {
    if rows.len() < 4 {
        return None;
    }
    let misses = rows.windows(3).map(|three| {
        let share = (three[2].x - three[1].x) / (three[2].x - three[0].x);
        let miss = share * three[0].y + (1.0 - share) * three[2].y - three[1].y;
        miss * miss / (share * share + (1.0 - share).powi(2) + 1.0)
    });
    Some(misses.sum::<f64>() / (rows.len() - 2) as f64)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::fit::tests::normals;

    fn readings(rows: &[(f64, f64)]) -> Vec<Reading> {
        let reading = |&(x, y): &(f64, f64)| Reading {
            line: 1,
            abscissa: Some(x),
            conductance: y,
            deviation: None,
            direction: None,
            specimen: None,
        };
        rows.iter().map(reading).collect()
    }

    #[test]
    fn a_falling_row_is_put_level() {
        let found = MonotoneTable::of(&readings(&[
            (1.0, 10.0),
            (2.0, 30.0),
            (3.0, 20.0),
            (4.0, 40.0),
        ]))
        .unwrap();
        // Equal weights in logarithms: √(30·20).
        let level = 600_f64.sqrt();
        for (row, (x, y)) in
            found
                .rows
                .iter()
                .zip([(1.0, 10.0), (2.0, level), (3.0, level), (4.0, 40.0)])
        {
            // Logarithm and back.
            assert!(
                (row.0 - x).abs() < 1e-12 && (row.1 - y).abs() < 1e-12,
                "{row:?}"
            );
        }
        assert_eq!(found.levelled, 2);
    }

    #[test]
    fn scatter_of_single_readings_is_found() {
        let noise = normals(3, 400);
        let made = |repeats: i32| {
            let rows: Vec<(f64, f64)> = (0..400)
                .map(|at| {
                    let x = 1.02_f64.powi(at as i32 / repeats * repeats);
                    (x, x.powf(0.9) * (0.08 * noise[at]).exp())
                })
                .collect();
            rows
        };
        // Ten readings at each of forty places: 360 degrees, σ known to 4 %.
        let repeated = MonotoneTable::of(&readings(&made(10))).unwrap();
        assert!(
            (repeated.scatter / 0.08 - 1.0).abs() < 0.12,
            "{}",
            repeated.scatter
        );
        // Twelve single readings about a smooth rise, ten differences: σ to a third.
        let single: Vec<(f64, f64)> = made(1).into_iter().step_by(34).take(12).collect();
        let single = MonotoneTable::of(&readings(&single)).unwrap();
        assert!((0.04..0.13).contains(&single.scatter), "{}", single.scatter);
    }

    #[test]
    fn many_places_are_gathered() {
        let rows: Vec<(f64, f64)> = (1..200).map(|at| (f64::from(at), f64::from(at))).collect();
        let found = MonotoneTable::of(&readings(&rows)).unwrap();
        assert_eq!(found.rows.len(), MOST_ROWS);
        assert!(
            found
                .rows
                .windows(2)
                .all(|pair| pair[0].0 < pair[1].0 && pair[0].1 <= pair[1].1)
        );
    }
}
