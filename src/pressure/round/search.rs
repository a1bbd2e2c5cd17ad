//! Search for the contact edge at which a grid finds the edge where its own line stands.

/// The edge to try next, between the largest found too small and the smallest found too large.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Search {
    /// The edge to try.
    pub edge: f64,
    low: f64,
    high: f64,
    last: Option<[f64; 2]>,
}

/// Longest step, in moves that the grid itself asks for.
const LONGEST_STEP: f64 = 6.0;

impl Search {
    /// A search that knows nothing but where to start.
    pub fn from(edge: f64) -> Self {
        Self {
            edge,
            low: f64::NEG_INFINITY,
            high: f64::INFINITY,
            last: None,
        }
    }

    /// Takes in what the grid at `edge` found, moves `edge` and returns how far.
    ///
    /// The step is the move that the grid asks for, corrected by the secant through the last two:
    /// where shear is stuck up to the line, the edge follows the line and asks for too little. A
    /// place already found wrong is not gone beyond: half way instead, because the answer jumps a
    /// little where a line enters the contact, and may jump across its own line.
    pub fn narrow(&mut self, found: f64) -> f64 {
        let (edge, asked) = (self.edge, found - self.edge);
        if asked > 0.0 {
            self.low = self.low.max(edge);
        } else {
            self.high = self.high.min(edge);
        }
        let gain = self.last.map_or(1.0, |[other, other_asked]| {
            let slope = (other_asked - asked) / (edge - other);
            if slope > 0.0 {
                slope.max(LONGEST_STEP.recip())
            } else {
                LONGEST_STEP.recip()
            }
        });
        self.last = Some([edge, asked]);
        let next = edge + asked / gain;
        self.edge = if asked == 0.0 || self.low < next && next < self.high {
            next
        } else {
            0.5 * (self.low + self.high)
        };
        (self.edge - edge).abs()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn settled(start: f64, answer: impl Fn(f64) -> f64) -> (f64, usize) {
        let mut search = Search::from(start);
        for step in 1..40 {
            if search.narrow(answer(search.edge)) < 1e-9 {
                return (search.edge, step);
            }
        }
        (f64::NAN, 40)
    }

    // The answer jumps from above to below the line at 1.3: no fixed point, yet the place is found.
    #[test]
    fn a_jump_across_the_line_is_enclosed() {
        let jump = |edge: f64| {
            if edge < 1.3 { edge + 0.01 } else { edge - 0.01 }
        };
        let (edge, _) = settled(1.32, jump);
        assert!((edge - 1.3).abs() < 1e-8, "{edge}");
    }

    // Linear answer: two grids make the secant, the third stands on the solution.
    #[test]
    fn a_sluggish_answer_is_hurried() {
        let sluggish = |edge: f64| edge + 0.2 * (1.5 - edge);
        let (edge, steps) = settled(1.1, sluggish);
        assert!((edge - 1.5).abs() < 1e-9, "{edge}");
        assert!(steps <= 4, "{steps}");
    }
}
