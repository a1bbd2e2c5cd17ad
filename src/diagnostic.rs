//! What the program tells its user: faults that stop it and cautions that do not.

use std::ops::Range;

mod nearest;
pub mod registry;
mod shown;

pub use nearest::nearest;
pub use shown::{Colour, shown};

/// A fault in a joint file or on the command line: stops the run, exit code 2.
#[derive(Clone, Debug, PartialEq)]
pub struct Fault {
    /// Stable code, listed by `explain`: `plate/hole-too-small`.
    pub code: &'static str,
    /// What was found and what is expected.
    pub message: String,
    /// Bytes of the text to underline.
    pub span: Range<usize>,
    /// What the underlined place should be: the short label beside the carets.
    pub expected: String,
    /// How to mend it, with an example that works.
    pub help: Option<String>,
}

/// A result outside the range its law was checked in, something to know when it is used, or a duty
/// of care. The result stands.
#[derive(Clone, Debug, PartialEq)]
pub struct Caution {
    /// Stable code, listed by `explain`: `preload/over-yield`.
    pub code: &'static str,
    /// The caution with its numbers.
    pub text: String,
}

/// A value that the joint file did not state and the program filled in.
#[derive(Clone, Debug, PartialEq)]
pub struct Assumption {
    /// The field of the joint file that would state it: `plate.upper.flatness`.
    pub field: String,
    /// The value taken, with its unit.
    pub value: String,
    /// Why that value.
    pub why: String,
}
