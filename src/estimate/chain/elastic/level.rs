//! Levels of fineness, the coarsest of which no user asks for.

use crate::{estimate::Fineness, pressure::elastic};

pub(super) use elastic::Fineness as Level;

/// Surface response and bounds stand on this level; only ratios are taken from it.
pub(super) const GROUND: Level = Level::Coarse;

/// Levels from coarse to fine.
pub(super) const LEVELS: [Level; 4] = [Level::Coarse, Level::Fast, Level::Normal, Level::Fine];

/// The level that a user asks for.
pub(super) fn asked(fineness: Fineness) -> Level {
    match fineness {
        Fineness::Fast => Level::Fast,
        Fineness::Normal => Level::Normal,
        Fineness::Fine => Level::Fine,
    }
}

/// Place of a level among all.
pub(super) fn place(level: Level) -> usize {
    LEVELS.iter().position(|each| *each == level).unwrap_or(0)
}

/// The level whose difference tells the error of a level.
pub(super) fn coarser(level: Level) -> Level {
    LEVELS[place(level).saturating_sub(1)]
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_error_of_a_level_is_told_by_the_one_below() {
        assert_eq!(coarser(Level::Fine), Level::Normal);
        assert_eq!(coarser(Level::Fast), Level::Coarse);
    }
}
