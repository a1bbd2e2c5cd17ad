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
    // At least one step; another one only where it overshoots by less than half.
    while covered == 0.0 || covered + 0.5 * spacing[0].min(spacing[1]) < length {
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

#[cfg(test)]
mod tests {
    use super::*;

    fn marks(spacings: [f64; 2]) -> [Mark; 2] {
        [(1.0, spacings[0]), (3.0, spacings[1])].map(|(at, spacing)| Mark { at, spacing })
    }

    #[test]
    fn lines_rise_from_mark_to_mark_and_grow_no_faster_than_asked() {
        for spacings in [[0.01, 0.3], [0.2, 0.02], [0.05, 0.05], [5.0, 7.0]] {
            let lines = graded(marks(spacings), 1.5, 0.4);
            assert!(lines[0].to_bits() == 1.0_f64.to_bits());
            assert!(lines[lines.len() - 1].to_bits() == 3.0_f64.to_bits());
            let steps: Vec<f64> = lines.windows(2).map(|pair| pair[1] - pair[0]).collect();
            for pair in steps.windows(2) {
                let ratio = (pair[1] / pair[0]).max(pair[0] / pair[1]);
                // Steps from both ends meet within one growth of each other.
                assert!(ratio < 1.5 * 1.5 + 1e-9, "{ratio}");
            }
            for (step, spacing) in [
                (steps[0], spacings[0]),
                (steps[steps.len() - 1], spacings[1]),
            ] {
                let wanted = spacing.min(0.4);
                // Fitting stretches or shrinks by less than half a step in the whole length.
                assert!((step / wanted - 1.0).abs() < 0.3, "{step} {wanted}");
            }
        }
    }

    #[test]
    fn a_short_gap_is_one_step() {
        let lines = graded([1.0, 1.001].map(|at| Mark { at, spacing: 0.1 }), 1.5, 0.4);
        assert_eq!(lines, [1.0, 1.001]);
    }
}
