//! How accurate each linear solution of the search is, and how hard the faces are in it.
//!
//! Faces that touch and part by turns over wide areas, as under the tail of a thin sheet, find their set
//! where they are soft; it is kept while they harden.

/// Residuals of the linear solutions over the load: the first, while many columns change, when few
/// do, and the last.
const FIRST: f64 = 1e-2;
const MANY_CHANGE: f64 = 3e-3;
const FEW_CHANGE: f64 = 3e-4;
const LAST: f64 = 1e-7;
/// The last on the coarsest level, whose grid errs by percents and of which ratios are taken.
const LAST_OF_COARSEST: f64 = 1e-5;
/// Changes that count as many.
const MANY: usize = 30;
/// Steps after which faces are softened where many columns still change.
const PATIENCE: usize = 10;
/// Steps with faces as stated after which solutions are accurate though columns still change.
const SETTLING: usize = 30;
/// Stiffness of softened faces over the stated one, and how much harder they get at a time.
const SOFTENED: f64 = 1e-3;
const HARDER: f64 = 32.0;
/// Steps at one hardness of the faces after which the contact counts as not found.
pub(super) const MOST_STEPS: usize = 200;

use crate::pressure::elastic::Fineness;

/// How accurate the next linear solution is, and how hard the faces are.
pub(super) struct Course {
    pub(super) tolerance: f64,
    pub(super) hardness: f64,
    /// Residual of the last solution.
    last: f64,
    /// Step after which the faces got this hardness.
    began: usize,
    softened: bool,
}

impl Course {
    /// At the first step: faces as stated, or softened where heads rock on their edges while the
    /// plates find their places.
    pub(super) fn new(fineness: Fineness, heads_rock: bool) -> Self {
        Self {
            last: match fineness {
                Fineness::Coarse => LAST_OF_COARSEST,
                _ => LAST,
            },
            tolerance: FIRST,
            hardness: if heads_rock { SOFTENED * HARDER } else { 1.0 },
            began: 0,
            softened: false,
        }
    }

    /// Whether a solution of this accuracy is the last where nothing changes any more.
    pub(super) fn is_last(&self) -> bool {
        self.tolerance <= self.last && self.hardness >= 1.0
    }

    /// Whether only an accurate solution is left to make.
    pub(super) fn is_accurate(&self) -> bool {
        self.tolerance <= self.last
    }

    /// Whether the energy has to tell too when a solution is good enough: only the closest residual
    /// leaves no soft motion open.
    pub(super) fn trusts_energy(&self) -> bool {
        self.tolerance > LAST
    }

    /// Whether the set has had its steps at this hardness.
    pub(super) fn is_over(&self, step: usize) -> bool {
        step - self.began >= MOST_STEPS
    }

    /// What follows a step, from how many columns changed in the one before and in this one.
    pub(super) fn after(&mut self, step: usize, [last, changed]: [usize; 2]) {
        if changed == 0 && self.hardness < 1.0 {
            self.hardness = (HARDER * self.hardness).min(1.0);
            self.tolerance = MANY_CHANGE;
            self.began = step;
            return;
        }
        if changed > MANY && step >= PATIENCE && !self.softened {
            self.hardness = SOFTENED;
            self.softened = true;
            self.began = step;
        }
        self.tolerance = match changed {
            0 => self.last,
            _ if self.is_accurate() => self.last,
            // Rough solutions waver about a set that they do not tell.
            _ if self.hardness >= 1.0 && step - self.began >= SETTLING => self.last,
            _ if changed > MANY => MANY_CHANGE,
            // As many as before: only an accurate solution tells which.
            _ if step > PATIENCE && changed >= last => self.last,
            _ => FEW_CHANGE,
        };
    }
}
