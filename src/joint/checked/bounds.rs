//! A value with the distribution it may lie in.

use crate::numerics::distribution::Shape;

/// A value between its bounds: `low ≤ nominal ≤ high`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bounds {
    /// Lowest value.
    pub low: f64,
    /// The value of the nominal chain; half of the weight lies on each side of it.
    pub nominal: f64,
    /// Highest value.
    pub high: f64,
    /// How the weight lies between them.
    pub shape: Shape,
}

impl Bounds {
    /// A value without spread.
    pub const fn exact(nominal: f64) -> Self {
        Self::uniform([nominal; 3])
    }

    /// Low, nominal and high with the same weight everywhere on one side.
    pub const fn uniform([low, nominal, high]: [f64; 3]) -> Self {
        Self {
            low,
            nominal,
            high,
            shape: Shape::Uniform,
        }
    }

    /// The value at a place of the weight: −1 is low, 0 nominal, +1 high.
    pub fn at(&self, place: f64) -> f64 {
        self.shape.at([self.low, self.nominal, self.high], place)
    }

    /// Whether low and high differ.
    pub fn is_spread(&self) -> bool {
        self.low < self.high
    }
}
