//! A load from outside along the bolt: its share in the bolt, the clamp it leaves, the stress in service.

use crate::{
    catalog::Thread,
    joint::Bounds,
    preload::{
        losses::Elasticity,
        strength::{Load, TorsionRule, von_mises},
    },
};

/// Share of the torsion of tightening that still acts in service, 1.
///
/// Source: VDI 2230-1, reduction factor `k_τ` = 0.5, from memory.
pub const TORSION_LEFT: f64 = 0.5;

/// A load along one bolt and how it enters.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ServiceLoad {
    /// Load `F_A` that pulls the plates apart, N.
    pub load: Bounds,
    /// Load introduction factor n, 0 to 1.
    pub introduction: Bounds,
}

/// What a load does to the bolt and to the clamp.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Shared {
    /// Load, N.
    pub load: Bounds,
    /// Share Φ of the load in the bolt, 1.
    pub load_factor: Bounds,
    /// Highest force of the bolt, N.
    pub bolt_force: f64,
    /// Clamp force left under the load, N; negative where the faces would part.
    pub residual: Bounds,
    /// Factor by which the load may grow before the faces part at the least clamp, 1; infinite
    /// without a load that relieves the faces.
    pub separation: f64,
}

impl ServiceLoad {
    /// What the load does to a bolt of this clamp force in service, N.
    ///
    /// ```text
    /// Φ = n δ_P/(δ_S + δ_P)
    /// F_S = F_most + Φ_most F_A,most          F_K = F_least − (1 − Φ_least) F_A,most
    /// F_S = F_A,most                          once the faces have parted
    /// ```
    ///
    /// | symbol | quantity | SI unit | field |
    /// |---|---|---|---|
    /// | `δ_S` | compliance of bolt and disc springs at the clamp force | m/N | `elasticity` |
    /// | `δ_P` | compliance of the clamped parts | m/N | `elasticity` |
    /// | `n` | load introduction factor | 1 | `introduction` |
    /// | `F_A` | load along the bolt | N | `load` |
    ///
    /// The bolt's force takes the largest n, the clamp left the smallest: each its own worst end.
    /// Springs count with their stiffness where they end, flat ones with none.
    ///
    /// Valid: load along the axis of the bolt, pulling; no prying, bending or eccentric clamping, which
    /// raise the bolt's share.
    /// Source: VDI 2230-1. Checked: `load_worked_by_hand`.
    pub fn on(&self, elasticity: &Elasticity, clamp: Bounds) -> Shared {
        let factor = |force: f64, introduction: f64| introduction * elasticity.load_factor(force);
        let Self { load, introduction } = *self;
        let load_factor = Bounds::uniform([
            factor(clamp.low, introduction.low),
            factor(clamp.nominal, introduction.nominal),
            factor(clamp.high + load.high, introduction.high),
        ]);
        let relief = (1.0 - load_factor.low) * load.high;
        Shared {
            load,
            load_factor,
            // Faces that have parted share nothing: the bolt carries the whole load.
            bolt_force: (clamp.high + load_factor.high * load.high).max(load.high),
            residual: Bounds::uniform([
                clamp.low - relief,
                clamp.nominal - (1.0 - load_factor.nominal) * load.nominal,
                clamp.high - (1.0 - load_factor.high) * load.low,
            ]),
            separation: if clamp.low <= 0.0 {
                0.0
            } else if relief <= 0.0 {
                f64::INFINITY
            } else {
                clamp.low / relief
            },
        }
    }
}

/// Equivalent stress in service, Pa: the bolt's highest force with half the torsion of tightening.
///
/// ```text
/// σ = √( (F_S/A₀)² + 3 (0.5 M/W)² )
/// ```
///
/// Valid: static load; fatigue and bending are not in it.
/// Source: VDI 2230-1, from memory. Checked: `load_worked_by_hand`.
pub fn stress_in_service(thread: &Thread, load: Load) -> f64 {
    von_mises(
        thread,
        Load {
            torsion: TORSION_LEFT * load.torsion,
            ..load
        },
        TorsionRule::Plastic,
    )
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::preload::{
        fixture::{m6, spring_stack},
        losses::Compliance,
    };

    const ELASTICITY: Elasticity = Elasticity {
        compliance: Compliance {
            bolt: 4e-9,
            plates: 1e-9,
        },
        springs: None,
    };

    const CLAMP: Bounds = Bounds::uniform([4000.0, 5000.0, 7000.0]);

    #[test]
    fn load_worked_by_hand() {
        // Φ_K = 1/(4 + 1) = 0.2; n 0.5 gives 0.1. Load 2 kN: bolt 7000 + 200, clamp 4000 − 0.9 · 2000 = 2200,
        // nominal 5000 − 1800 = 3200, most 7000 − 1800 = 5200; separation 4000/1800 = 2.222.
        let load = ServiceLoad {
            load: Bounds::exact(2000.0),
            introduction: Bounds::exact(0.5),
        };
        let found = load.on(&ELASTICITY, CLAMP);
        let close =
            |found: f64, hand: f64| assert!((found / hand - 1.0).abs() < 1e-9, "{found} {hand}");
        close(found.load_factor.nominal, 0.1);
        close(found.bolt_force, 7200.0);
        close(found.residual.low, 2200.0);
        close(found.residual.nominal, 3200.0);
        close(found.residual.high, 5200.0);
        close(found.separation, 20.0 / 9.0);
        // M6, d₀ 5.0618 mm: A₀ 20.123 mm², W = π d₀³/12 = 33.954 mm³; 7200 N and half of 4 N·m:
        // σ 357.8, τ 58.90 MPa, √(357.8² + 3 · 58.90²) = 372.1 MPa.
        let stress = stress_in_service(
            &m6().thread,
            Load {
                force: 7200.0,
                torsion: 4.0,
            },
        );
        assert!((stress / 372.1e6 - 1.0).abs() < 5e-4, "{stress}");
    }

    #[test]
    fn load_under_the_heads_gives_the_stiffness_constant_of_the_textbook() {
        // Shigley, chapter 8, problems 8-22 and 8-24: k_b and k_m as printed (MN/m; Mlbf/in), C to three digits.
        for (bolt, members, printed) in [(466.8, 1379.0, 0.253), (3.94, 10.79, 0.267)] {
            let elasticity = Elasticity {
                compliance: Compliance {
                    bolt: 1.0 / bolt,
                    plates: 1.0 / members,
                },
                springs: None,
            };
            let load = ServiceLoad {
                load: Bounds::exact(1.0),
                introduction: Bounds::exact(1.0),
            };
            let found = load.on(&elasticity, CLAMP).load_factor.nominal;
            assert!((found - printed).abs() < 6e-4, "{found} {printed}");
        }
    }

    #[test]
    fn each_end_takes_its_own_worst_introduction() {
        let unknown = ServiceLoad {
            load: Bounds::uniform([0.0, 1000.0, 2000.0]),
            introduction: Bounds::uniform([0.0, 0.5, 1.0]),
        };
        let found = unknown.on(&ELASTICITY, CLAMP);
        assert!((found.bolt_force - 7400.0).abs() < 1e-9);
        assert!((found.residual.low - 2000.0).abs() < 1e-9);
        assert!((found.residual.high - 7000.0).abs() < 1e-9);
        assert!((found.separation - 2.0).abs() < 1e-12);
    }

    #[test]
    fn a_bolt_whose_faces_have_parted_carries_the_whole_load() {
        let load = |load: f64| ServiceLoad {
            load: Bounds::exact(load),
            introduction: Bounds::exact(1.0),
        };
        // Φ 0.2: 7000 N part at 8750 N, from where both laws give the same.
        let found = load(8750.0).on(&ELASTICITY, Bounds::exact(7000.0));
        assert!((found.bolt_force - 8750.0).abs() < 1e-9);
        assert!((found.separation - 1.0).abs() < 1e-12);
        let parted = load(20e3).on(&ELASTICITY, CLAMP);
        assert!((parted.bolt_force - 20e3).abs() < 1e-9);
    }

    #[test]
    fn faces_that_nothing_clamps_part_without_load() {
        let none = ServiceLoad {
            load: Bounds::exact(0.0),
            introduction: Bounds::exact(0.5),
        };
        let open = Bounds::uniform([0.0, 3000.0, 5000.0]);
        assert_eq!(none.on(&ELASTICITY, open).separation.to_bits(), 0);
    }

    #[test]
    fn without_load_nothing_parts() {
        let none = ServiceLoad {
            load: Bounds::exact(0.0),
            introduction: Bounds::exact(0.5),
        };
        let found = none.on(&ELASTICITY, CLAMP);
        assert_eq!(found.residual, CLAMP);
        assert!(found.separation.is_infinite());
    }

    #[test]
    fn springs_that_stay_open_take_part_in_the_share_of_the_load() {
        // Flat at 1.32 kN: 900 N of clamp and 300 N of load leave them open, so that the bolt's side is as soft
        // where it ends as their curve is steep there.
        let springs = spring_stack();
        let sprung = Elasticity {
            springs: Some(springs),
            ..ELASTICITY
        };
        let load = ServiceLoad {
            load: Bounds::uniform([100.0, 200.0, 300.0]),
            introduction: Bounds::exact(1.0),
        };
        let clamp = Bounds::uniform([700.0, 800.0, 900.0]);
        let found = load.on(&sprung, clamp).load_factor;
        for (found, force) in [
            (found.low, 700.0),
            (found.nominal, 800.0),
            (found.high, 1200.0),
        ] {
            let slope = (springs.deflection(force + 1.0) - springs.deflection(force - 1.0)) / 2.0;
            let share = 1e-9 / (4e-9 + slope + 1e-9);
            // The middle of 2 N of the curve: 1e-4.
            assert!(
                (found / share - 1.0).abs() < 1e-4,
                "{force}: {found} {share}"
            );
        }
        // Springs that the load presses flat no longer yield: 1/(4 + 1).
        let flat = load.on(&sprung, Bounds::exact(1300.0)).load_factor;
        assert!(
            (flat.high - 0.2).abs() < 1e-12 && flat.low < 0.01,
            "{flat:?}"
        );
    }
}
