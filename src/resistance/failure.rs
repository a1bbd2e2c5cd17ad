//! Why the networks gave no answer.

use crate::resistance::path::Path;

/// A network without a number, or with one that cannot be right.
///
/// A path that leads nowhere, faces apart in vacuum, is no failure: its resistance is infinite.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum Failure {
    /// A solver gave up.
    #[error("{solver} stopped after {rounds} rounds at a relative residual of {residual:.1e}")]
    NotSolved {
        /// What was solved and how.
        solver: &'static str,
        /// Rounds done.
        rounds: usize,
        /// Residual left over the right-hand side.
        residual: f64,
    },
    /// A bolt presses on no part of the faying faces, so its force would be lost.
    #[error(
        "bolt {} presses on no part of the faying faces in {network}; give it smaller holes, a wider seat or thicker plates",
        bolt + 1
    )]
    NoContact {
        /// Index of the bolt.
        bolt: usize,
        /// The network that found none.
        network: &'static str,
    },
    /// The closed forms know rectangles and discs.
    #[error("plate {} has an outline by points, which closed forms do not know", plate + 1)]
    Polygon {
        /// Index of the plate.
        plate: usize,
    },
    /// What was handed over does not belong together.
    #[error("the columns do not fit: {what}")]
    Misfit {
        /// What must hold.
        what: &'static str,
    },
    /// A reading is not a number, or infinite where a path leads through.
    #[error("{network} gave {reading} = {value}")]
    NotFinite {
        /// The network that gave it.
        network: &'static str,
        /// What was read.
        reading: &'static str,
        /// What it was.
        value: f64,
    },
}

impl Path {
    /// Whether some bolt's faces conduct nothing, so that an infinite resistance may be meant.
    pub fn may_be_blocked(&self) -> bool {
        self.contact_per_bolt.iter().any(|contact| *contact <= 0.0)
    }

    /// Every reading with its name; bounds last.
    fn readings(&self) -> [(&'static str, f64); 10] {
        [
            ("contact", self.contact),
            ("perfect contact", self.perfect_contact),
            ("source to sink", self.source_to_sink),
            ("added by joint", self.added_by_joint),
            ("node to node", self.node_to_node),
            ("interface drop", self.interface_drop),
            ("hottest", self.hottest),
            ("coolant drop", self.coolant_drop.unwrap_or(0.0)),
            ("lower bound", self.resistance_lower),
            ("upper bound", self.resistance_upper.unwrap_or(0.0)),
        ]
    }

    /// Refuses a path with a reading that cannot be: no number, infinite although every bolt
    /// conducts, or negative where nothing can be.
    pub fn checked(&self, network: &'static str) -> Result<(), Failure> {
        let blocked = self.may_be_blocked();
        for (reading, value) in self.readings() {
            let infinite_meant = blocked && value.is_infinite() && reading != "perfect contact";
            // Means of whole plates may stand the other way round, and perfect contact may be met
            // up to the residual.
            let signed = matches!(
                reading,
                "added by joint" | "node to node" | "interface drop" | "hottest"
            );
            let possible = value.is_finite() && (signed || value >= 0.0);
            if !(possible || infinite_meant && value > 0.0) {
                return Err(Failure::NotFinite {
                    network,
                    reading,
                    value,
                });
            }
        }
        Ok(())
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::resistance::{
        cells,
        fixtures::{case_i, load, power_law},
    };

    type Spoil = fn(&mut Path, f64);

    #[test]
    fn every_reading_of_a_path_is_held_against_nonsense() {
        let sound = cells(&case_i())
            .unwrap()
            .solve(&load(power_law, &[5000.0; 4], &[0.0; 4]));
        assert_eq!(sound.checked("cells"), Ok(()));
        let spoils: [Spoil; 10] = [
            |path, value| path.contact = value,
            |path, value| path.perfect_contact = value,
            |path, value| path.source_to_sink = value,
            |path, value| path.added_by_joint = value,
            |path, value| path.node_to_node = value,
            |path, value| path.interface_drop = value,
            |path, value| path.hottest = value,
            |path, value| path.coolant_drop = Some(value),
            |path, value| path.resistance_lower = value,
            |path, value| path.resistance_upper = Some(value),
        ];
        for (place, spoil) in spoils.into_iter().enumerate() {
            for value in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY] {
                let mut path = sound.clone();
                spoil(&mut path, value);
                assert!(path.checked("cells").is_err(), "reading {place}, {value}");
            }
        }
    }

    #[test]
    fn faces_apart_in_vacuum_are_infinite_and_sound() {
        let path = cells(&case_i())
            .unwrap()
            .solve(&load(power_law, &[0.0; 4], &[0.0; 4]));
        assert!(path.source_to_sink.is_infinite());
        assert_eq!(path.checked("cells"), Ok(()));
    }
}
