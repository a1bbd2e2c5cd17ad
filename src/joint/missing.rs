//! Bolts that are loose or missing: their holes stay, they neither clamp nor conduct.

use crate::joint::Joint;

/// Why bolts cannot be left out.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
pub enum NotLeftOut {
    /// A number that no bolt has.
    #[error("there is no bolt {asked}; bolts are numbered from 1 to {known}")]
    NoSuchBolt {
        /// Number asked for, from 1.
        asked: usize,
        /// Number of bolts.
        known: usize,
    },
    /// No bolt would be left.
    #[error("without {asked} no bolt is left to hold the plates", asked = if *.known == 1 { "bolt 1" } else { "these" })]
    NoneLeft {
        /// Number of bolts.
        known: usize,
    },
}

impl Joint {
    /// The same joint without some bolts, by their numbers as printed, from 1 in file order.
    ///
    /// Their holes stay open: no clamp force, no heat through the shank. An insert stays in its panel.
    /// Checked: `a_missing_bolt_keeps_its_number_and_its_hole`.
    pub fn without(&self, numbers: &[usize]) -> Result<Self, NotLeftOut> {
        let known = self.bolts().count();
        let mut joint = self.clone();
        for &asked in numbers {
            if asked == 0 || asked > known {
                return Err(NotLeftOut::NoSuchBolt { asked, known });
            }
            joint.missing.push(asked - 1);
        }
        joint.missing.sort_unstable();
        joint.missing.dedup();
        if joint.missing.len() == known {
            return Err(NotLeftOut::NoneLeft { known });
        }
        Ok(joint)
    }

    /// Whether a bolt, counted from 0 in file order, is missing.
    pub fn is_missing(&self, bolt: usize) -> bool {
        self.missing.binary_search(&bolt).is_ok()
    }

    /// Number of bolts that clamp.
    pub fn clamping(&self) -> usize {
        self.bolts().count() - self.missing.len()
    }

    /// Number of bolts of a group that clamp.
    pub fn clamping_of(&self, group: usize) -> usize {
        let before: usize = self.fasteners[..group]
            .iter()
            .map(|fastener| fastener.places.len())
            .sum();
        let own = before..before + self.fasteners[group].places.len();
        let gone = self.missing.iter().filter(|bolt| own.contains(bolt));
        own.len() - gone.count()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::joint::fixture;

    #[test]
    fn a_missing_bolt_keeps_its_number_and_its_hole() {
        let joint = fixture::joint();
        let without = joint.without(&[2, 2]).expect("one is left");
        assert_eq!(without.fasteners, joint.fasteners);
        assert_eq!(
            (without.is_missing(0), without.is_missing(1)),
            (false, true)
        );
        assert_eq!((without.clamping(), without.clamping_of(0)), (1, 1));
    }

    #[test]
    fn the_last_bolt_and_one_that_is_not_there_stay() {
        let joint = fixture::joint();
        for (numbers, told) in [
            (&[0][..], NotLeftOut::NoSuchBolt { asked: 0, known: 2 }),
            (&[1, 3], NotLeftOut::NoSuchBolt { asked: 3, known: 2 }),
            (&[1, 2], NotLeftOut::NoneLeft { known: 2 }),
        ] {
            assert_eq!(joint.without(numbers), Err(told));
        }
        let one = joint.without(&[1]).expect("one is left");
        assert_eq!(one.without(&[2]), Err(NotLeftOut::NoneLeft { known: 2 }));
    }
}
