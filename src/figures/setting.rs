//! For whom a drawing is made: in which units, and on how wide a sheet.

use crate::units::System;

/// How wide a drawing is.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub(super) enum Width {
    /// As print and screens show it.
    #[default]
    Full,
    /// As the screen of a telephone shows it, with letters of the same size.
    Narrow,
}

/// Width of a narrow sheet, points: the smallest letters keep 9 pixels on a column of 330.
pub(super) const NARROW_SHEET: f64 = 344.0;

impl Width {
    /// Room beside what is drawn, points.
    pub(super) fn margin(self) -> f64 {
        match self {
            Self::Full => 20.0,
            Self::Narrow => 12.0,
        }
    }

    /// Width of a sheet that is so wide in full, points.
    pub(super) fn sheet(self, full: f64) -> f64 {
        match self {
            Self::Full => full,
            Self::Narrow => NARROW_SHEET,
        }
    }
}

/// Units and width of a drawing.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub(super) struct Setting {
    /// The units of its numbers.
    pub(super) units: System,
    /// Its width.
    pub(super) width: Width,
}
