//! A local law as a table over the logarithm of pressure, for many points under one law.

use crate::conductance::Local;

/// Cubic pieces of a law over ln p, verified against it when made.
#[derive(Clone, Debug)]
pub struct Curve {
    law: Local,
    /// ln p of the first piece.
    start: f64,
    /// Pieces over one unit of ln p.
    pieces_per_unit: f64,
    /// Coefficients of the pieces in the place inside a piece, 0 to 1; W/(m² K).
    pieces: Vec<[f64; 4]>,
}

/// Pieces over one unit of ln p: the error of a piece falls with the fourth power.
const PIECES_PER_UNIT: f64 = 32.0;
/// Decades below the highest pressure that the table covers; under them the law itself answers.
const DECADES: f64 = 5.0;
/// Largest relative difference from the law, in the middle of a piece, at which a table is kept: the gas
/// across a gap of 4 σ bends with a power of 1.68.
const TOLERANCE: f64 = 4e-6;

impl Curve {
    /// Tabulates a law up to a pressure, Pa; none where the law has a corner that cubics miss.
    ///
    /// ```text
    /// h(ln p) = a + b s + c s² + d s³   through four points of the law around each piece
    /// ```
    ///
    /// Valid: five decades below that pressure, within 4e-6 of the law; below them the law itself answers.
    /// Source: interpolation by cubics, textbook.
    /// Checked: `curve_follows_its_law`, `a_law_with_a_corner_is_not_tabulated`.
    pub fn up_to(law: &Local, highest_pressure: f64) -> Option<Self> {
        let end = highest_pressure.ln();
        let start = end - DECADES * std::f64::consts::LN_10;
        if !end.is_finite() {
            return None;
        }
        let count = (PIECES_PER_UNIT * (end - start)).ceil();
        let pieces_per_unit = count / (end - start);
        let at = |place: f64| law.total((start + place / pieces_per_unit).exp());
        let mut pieces = Vec::with_capacity(count as usize);
        let mut around = [-1.0, 0.0, 1.0, 2.0].map(at);
        for index in 0..count as usize {
            let [before, low, high, after] = around;
            // The cubic through four evenly spaced points, in the place between the inner two.
            let cubic = [
                low,
                -before / 3.0 - low / 2.0 + high - after / 6.0,
                0.5 * (before + high) - low,
                (after - before) / 6.0 + (low - high) / 2.0,
            ];
            let middle = at(index as f64 + 0.5);
            if (value(cubic, 0.5) - middle).abs() > TOLERANCE * middle {
                return None;
            }
            pieces.push(cubic);
            around = [low, high, after, at(index as f64 + 3.0)];
        }
        Some(Self {
            law: law.clone(),
            start,
            pieces_per_unit,
            pieces,
        })
    }

    /// Local conductance at a pressure, W/(m² K).
    #[inline]
    pub fn total(&self, pressure: f64) -> f64 {
        self.total_of_ln(pressure.ln())
    }

    /// The same from the natural logarithm of the pressure in Pa.
    #[inline]
    pub fn total_of_ln(&self, ln_pressure: f64) -> f64 {
        let place = (ln_pressure - self.start) * self.pieces_per_unit;
        // Not a number and below the table both become 0 or less; the law answers for them.
        if place > 0.0
            && let Some(cubic) = self.pieces.get(place as usize)
        {
            return value(*cubic, place.fract());
        }
        self.law.total(ln_pressure.exp())
    }
}

#[inline]
fn value([a, b, c, d]: [f64; 4], s: f64) -> f64 {
    a + s * (b + s * (c + s * d))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::{
        conductance::{Face, GapGas, Hardness, Interface},
        joint::{FillerKind, Law},
    };

    fn interface(law: Law) -> Interface {
        let face = Face {
            conductivity: 167.0,
            roughness: 1e-6,
            slope: 0.12,
            youngs_modulus: 68.9e9,
            poisson: 0.33,
            hardness: Hardness::Meyer(1.15e9),
            emissivity: 0.1,
            coating: None,
        };
        Interface {
            faces: [face.clone(), face],
            law,
            gas: Some(GapGas {
                conductivity: 0.026,
                parameter: 0.3e-6,
            }),
            temperature: 293.0,
            filler: None,
            measured: None,
            solid_factor: 1.0,
            filler_factor: 1.0,
            filler_modulus: None,
        }
    }

    #[test]
    fn curve_follows_its_law() {
        for law in [
            Law::ElasticPlastic,
            Law::Plastic,
            Law::Elastic,
            Law::PlasticPower,
        ] {
            let local = interface(law).prepare();
            let curve = Curve::up_to(&local, 2e8).unwrap();
            for step in 0..=3000 {
                // From far below the table to past its end.
                let pressure = 1e2 * 10f64.powf(step as f64 / 450.0);
                let (found, wanted) = (curve.total(pressure), local.total(pressure));
                // The middle of a piece is where its error is largest; 2 for the ends of the table.
                assert!(
                    (found / wanted - 1.0).abs() < 2.0 * TOLERANCE,
                    "{law:?} {pressure}"
                );
            }
            assert!((curve.total(0.0) - local.total(0.0)).abs() < 1e-12);
        }
    }

    #[test]
    fn a_law_with_a_corner_is_not_tabulated() {
        let mut interface = interface(Law::ElasticPlastic);
        interface.filler = Some(FillerKind::Table {
            points: vec![(1e5, 1e-4), (1e6, 5e-5), (1e7, 4.9e-5)],
        });
        assert!(Curve::up_to(&interface.prepare(), 2e8).is_none());
        assert!(Curve::up_to(&interface.prepare(), 0.0).is_none());
    }
}
