//! Grid lines whose spacing grows away from chosen places.

/// A place with a grid line, and the spacing wanted there.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Mark {
    /// Where the line stands.
    pub at: f64,
    /// Spacing on both sides.
    pub spacing: f64,
}

/// Grid lines through two marks, spacing growing by the factor `growth` up to `widest`.
///
/// Steps are laid from both ends, always at the finer one, until they meet; all are then shortened
/// by one factor to fit. The first line is the first mark, the last line the second.
pub fn graded(marks: [Mark; 2], growth: f64, widest: f64) -> Vec<f64> {
    let length = marks[1].at - marks[0].at;
    let mut spacing = marks.map(|mark| mark.spacing.min(widest));
    let mut steps: [Vec<f64>; 2] = [Vec::new(), Vec::new()];
    let mut covered = 0.0;
    // A step that would overshoot by more than half is not laid.
    while covered + 0.5 * spacing[0].min(spacing[1]) < length {
        let end = usize::from(spacing[1] < spacing[0]);
        steps[end].push(spacing[end]);
        covered += spacing[end];
        spacing[end] = (spacing[end] * growth).min(widest);
    }
    let fit = length / covered;
    let [left, right] = steps;
    let mut lines = vec![marks[0].at];
    let mut reached = 0.0;
    for step in left.into_iter().chain(right.into_iter().rev()) {
        reached += step * fit;
        lines.push(marks[0].at + reached);
    }
    if let Some(last) = lines.last_mut() {
        *last = marks[1].at;
    }
    lines
}
