//! Cutting lines and areas at the edges of a frame.

/// A rectangle on the sheet, points from the upper left corner.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Frame {
    /// Left edge.
    pub(super) left: f64,
    /// Upper edge.
    pub(super) top: f64,
    /// Right edge.
    pub(super) right: f64,
    /// Lower edge.
    pub(super) bottom: f64,
}

impl Frame {
    /// Width, points.
    pub(super) fn width(&self) -> f64 {
        self.right - self.left
    }

    /// Height, points.
    pub(super) fn height(&self) -> f64 {
        self.bottom - self.top
    }

    /// Whether a point lies within or on the edge.
    pub(super) fn holds(&self, [x, y]: [f64; 2]) -> bool {
        x >= self.left && x <= self.right && y >= self.top && y <= self.bottom
    }

    /// The part of a segment within the frame (Liang and Barsky).
    pub(super) fn segment(&self, from: [f64; 2], to: [f64; 2]) -> Option<[[f64; 2]; 2]> {
        let step = [to[0] - from[0], to[1] - from[1]];
        let (mut enter, mut leave) = (0.0_f64, 1.0_f64);
        for (change, room) in [
            (-step[0], from[0] - self.left),
            (step[0], self.right - from[0]),
            (-step[1], from[1] - self.top),
            (step[1], self.bottom - from[1]),
        ] {
            if change == 0.0 {
                if room < 0.0 {
                    return None;
                }
            } else if change < 0.0 {
                enter = enter.max(room / change);
            } else {
                leave = leave.min(room / change);
            }
        }
        let at = |t: f64| [from[0] + t * step[0], from[1] + t * step[1]];
        (enter <= leave).then(|| [at(enter), at(leave)])
    }

    /// The pieces of a line within the frame.
    pub(super) fn line(&self, points: &[[f64; 2]]) -> Vec<Vec<[f64; 2]>> {
        let mut pieces: Vec<Vec<[f64; 2]>> = Vec::new();
        for pair in points.windows(2) {
            let Some([from, to]) = self.segment(pair[0], pair[1]) else {
                continue;
            };
            match pieces.last_mut() {
                Some(piece) if piece.last() == Some(&from) => piece.push(to),
                _ => pieces.push(vec![from, to]),
            }
        }
        pieces
    }

    /// The part of an area within the frame (Sutherland and Hodgman).
    pub(super) fn area(&self, points: &[[f64; 2]]) -> Vec<[f64; 2]> {
        let mut kept = points.to_vec();
        for (axis, sign, edge) in [
            (0, 1.0, self.left),
            (0, -1.0, self.right),
            (1, 1.0, self.top),
            (1, -1.0, self.bottom),
        ] {
            let depth = |p: [f64; 2]| sign * (p[axis] - edge);
            let mut next = Vec::with_capacity(kept.len() + 4);
            for (index, &to) in kept.iter().enumerate() {
                let from = kept[(index + kept.len() - 1) % kept.len()];
                if (depth(from) < 0.0) != (depth(to) < 0.0) {
                    let t = depth(from) / (depth(from) - depth(to));
                    next.push([0, 1].map(|k| from[k] + t * (to[k] - from[k])));
                }
                if depth(to) >= 0.0 {
                    next.push(to);
                }
            }
            kept = next;
        }
        kept
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const UNIT: Frame = Frame {
        left: 0.0,
        top: 0.0,
        right: 1.0,
        bottom: 1.0,
    };

    #[test]
    fn a_line_across_the_frame_is_cut_at_both_edges() {
        assert_eq!(
            UNIT.line(&[[-1.0, 0.5], [2.0, 0.5]]),
            vec![vec![[0.0, 0.5], [1.0, 0.5]]]
        );
        assert!(UNIT.line(&[[-1.0, 2.0], [2.0, 2.0]]).is_empty());
    }

    #[test]
    fn an_area_around_the_frame_becomes_the_frame() {
        let cut = UNIT.area(&[[-5.0, -5.0], [5.0, -5.0], [5.0, 5.0], [-5.0, 5.0]]);
        assert!(cut.iter().all(|&p| UNIT.holds(p)));
        let doubled: f64 = (0..cut.len())
            .map(|k| {
                let (a, b) = (cut[k], cut[(k + 1) % cut.len()]);
                a[0] * b[1] - a[1] * b[0]
            })
            .sum();
        // Corners of the unit square are exact in binary.
        assert!((doubled.abs() - 2.0).abs() < 1e-12);
    }
}
