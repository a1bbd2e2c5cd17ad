//! The temperatures at which the properties of a case are taken.

/// Mean temperature of every plate, K: what conductivity, gas and radiation are taken at.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::estimate) struct Warmth {
    plates: Vec<f64>,
}

impl Warmth {
    /// The same everywhere, K.
    pub(in crate::estimate) fn uniform(plates: usize, temperature: f64) -> Self {
        Self {
            plates: vec![temperature; plates],
        }
    }

    /// Plates that rise above the sink by so much each, K.
    pub(super) fn above(sink: f64, rises: impl Iterator<Item = f64>) -> Self {
        Self {
            plates: rises.map(|rise| sink + rise).collect(),
        }
    }

    /// Mean of a plate, K.
    pub(in crate::estimate) fn plate(&self, index: usize) -> f64 {
        self.plates[index]
    }

    /// Between two neighbours, K.
    pub(in crate::estimate) fn interface(&self, index: usize) -> f64 {
        0.5 * (self.plates[index] + self.plates[index + 1])
    }

    /// Along the bolts, K.
    pub(super) fn bolts(&self) -> f64 {
        0.5 * (self.plates[0] + self.plates[self.plates.len() - 1])
    }

    /// Largest difference of a plate, relative to its temperature.
    pub(super) fn apart(&self, other: &Self) -> f64 {
        let plates = self.plates.iter().zip(&other.plates);
        plates.map(|(a, b)| (a / b - 1.0).abs()).fold(0.0, f64::max)
    }
}
