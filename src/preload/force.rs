//! Clamp force of a fastener at any place of its scatter, and its low, nominal and high.

use crate::{
    joint::{Bounds, Fastener, Friction, Tightening, TorqueTightening},
    preload::torque::{Balance, Coefficients, Levers, Turning},
};

/// Thread friction taken for the torsion of a bolt whose preload is given: class B of VDI 2230.
///
/// The class spans 0.08 to 0.16; the middle is taken as nominal. The caller records the assumption.
pub const CLASS_B: Bounds = Bounds::uniform([0.08, 0.12, 0.16]);

/// A place within the scatter of tightening; each number runs from −1 through 0 (nominal) to +1.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Place {
    /// From lowest to highest friction, thread and head together.
    pub friction: f64,
    /// From lower to upper tolerance of the tool.
    pub torque: f64,
    /// From lowest to highest given preload, or through the scatter of the tightening method.
    pub preload: f64,
    /// From lowest to highest running torque.
    pub running: f64,
}

impl Place {
    /// The middle of everything.
    pub const NOMINAL: Self = Self {
        friction: 0.0,
        torque: 0.0,
        preload: 0.0,
        running: 0.0,
    };

    /// Where the force is lowest: highest friction and running torque, lower tolerance.
    pub const LOWEST_FORCE: Self = Self {
        friction: 1.0,
        torque: -1.0,
        preload: -1.0,
        running: 1.0,
    };

    /// Where the force is highest: lowest friction and running torque, upper tolerance.
    pub const HIGHEST_FORCE: Self = Self {
        friction: -1.0,
        torque: 1.0,
        preload: 1.0,
        running: -1.0,
    };
}

/// Clamp force at assembly, N.
///
/// ```text
/// F = (T (1 + t p_T) − T_run) / lever(μ)        friction and tool
/// F = (T − T_run) / lever(μ_nominal) · (1 + s p_F)   scatter s of the method
/// F = given preload between its bounds
/// ```
///
/// | symbol | quantity | SI unit | field |
/// |---|---|---|---|
/// | `T` | torque at the wrench | N m | `torque` |
/// | `T_run` | running torque | N m | `running` |
/// | `t` | tolerance of the tool | 1 | `tolerance` |
/// | `s` | scatter of the method | 1 | `scatter` |
/// | `p` | place in the scatter, −1 … +1 | 1 | [`Place`] |
///
/// Valid: bolt elastic. A torque at or below the running torque gives 0 N.
/// Source: VDI 2230-1:2001 torque equation; scatter as in NASA practice, F(1 ± Γ).
/// Checked: `more_friction_clamps_less`, `every_place_lies_within_the_band`.
pub fn clamp_force(fastener: &Fastener, place: Place) -> f64 {
    match &fastener.tightening {
        Tightening::Preload(bounds) => bounds.at(place.preload),
        Tightening::Torque(tightening) => {
            balance(fastener, tightening, place).force(wrench_torque(tightening, place))
        }
    }
}

/// Clamp force at assembly at its unfavourable, nominal and favourable corner, N.
///
/// Low is highest friction with the lower tool tolerance, high lowest friction with the upper; with a
/// method scatter s, F(1 ± s); with a given preload its own bounds.
pub fn force_band(fastener: &Fastener) -> Bounds {
    Bounds::uniform([
        clamp_force(fastener, Place::LOWEST_FORCE),
        clamp_force(fastener, Place::NOMINAL),
        clamp_force(fastener, Place::HIGHEST_FORCE),
    ])
}

/// Torque that twists the bolt during assembly, N m.
///
/// With a given preload thread friction is that of [`CLASS_B`] at the place and no running torque is known.
pub fn torsion(fastener: &Fastener, place: Place) -> f64 {
    let force = clamp_force(fastener, place);
    match &fastener.tightening {
        Tightening::Preload(_) => force * given_preload_levers(fastener, place).thread,
        Tightening::Torque(tightening) => balance(fastener, tightening, place).torsion(force),
    }
}

/// Torque the tool really gives at a place of its tolerance, N m.
///
/// A method scatter stands for friction and tool together, so the tool then adds none.
pub fn wrench_torque(tightening: &TorqueTightening, place: Place) -> f64 {
    tightening.torque * tool_factor(tightening, place)
}

/// Actual over set torque at a place of the tolerance, 1.
pub fn tool_factor(tightening: &TorqueTightening, place: Place) -> f64 {
    if tightening.scatter.is_some() {
        return 1.0;
    }
    let tolerance = tightening.tolerance;
    let ends = [1.0 - tolerance, 1.0, 1.0 + tolerance];
    tightening.tool.at(ends, place.torque)
}

/// The torque balance of a fastener at a place of its scatter.
///
/// A nut factor K gives the lever K d; its thread share follows from one coefficient for thread and head
/// ([`Turning::equal_friction`]). A method scatter s scales the force at nominal friction by 1 + s p;
/// thread and head friction are scaled together until the balance with the set torque holds again.
pub fn balance(fastener: &Fastener, tightening: &TorqueTightening, place: Place) -> Balance {
    let turning = Turning::of(fastener);
    let friction_place = match tightening.scatter {
        Some(_) => 0.0,
        None => place.friction,
    };
    let levers = match &tightening.friction {
        Friction::Coefficients { thread, head } => turning.levers(Coefficients {
            thread: thread.at(friction_place),
            head: head.at(friction_place),
        }),
        Friction::NutFactor(factor) => {
            let total = factor.at(friction_place) * fastener.thread.diameter;
            let friction = turning.equal_friction(total);
            let thread = turning.levers(Coefficients {
                thread: friction,
                head: friction,
            });
            Levers {
                total,
                thread: thread.thread.min(total),
            }
        }
    };
    Balance {
        levers: match tightening.scatter {
            Some(scatter) => scaled(&turning, levers, 1.0 + scatter * place.preload),
            None => levers,
        },
        running: tightening
            .running_spread
            .map_or(tightening.running, |spread| spread.at(place.running)),
    }
}

/// Levers of a bolt whose preload is given: friction of class B for thread and head.
fn given_preload_levers(fastener: &Fastener, place: Place) -> Levers {
    let friction = CLASS_B.at(place.friction);
    Turning::of(fastener).levers(Coefficients {
        thread: friction,
        head: friction,
    })
}

/// Levers at which the same torque gives `gain` times the force, friction scaled as a whole.
fn scaled(turning: &Turning, levers: Levers, gain: f64) -> Levers {
    let lift = turning.levers(Coefficients {
        thread: 0.0,
        head: 0.0,
    });
    let total = levers.total / gain;
    let share = ((total - lift.total) / (levers.total - lift.total)).max(0.0);
    Levers {
        total,
        thread: (lift.thread + share * (levers.thread - lift.thread)).min(total),
    }
}

/// What parts the smallest and the largest preload from the nominal one.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Spread {
    /// Scatter Γ of the method, as a fraction.
    pub scatter: f64,
    /// Tolerance of the tool, as a fraction.
    pub tolerance: f64,
    /// Short-term relaxation, as a fraction; acts on the minimum alone.
    pub relaxation: f64,
}

impl Spread {
    /// Minimum, nominal and maximum preload, N.
    ///
    /// ```text
    /// F_max = F (1 + Γ)(1 + t)
    /// F_min = F (1 − Γ)(1 − t)(1 − r)
    /// ```
    ///
    /// | symbol | quantity | SI unit | field |
    /// |---|---|---|---|
    /// | `Γ` | scatter | 1 | `scatter` |
    /// | `t` | tool tolerance | 1 | `tolerance` |
    /// | `r` | relaxation | 1 | `relaxation` |
    ///
    /// Valid: `Γ`, `t` and `r` below 1, taken as extremes that meet.
    /// Source: NASA preload practice, F(1 ± Γ) seen quoted; the tolerance factors and the relaxation of the
    /// minimum from memory of NASA-STD-5020.
    /// Checked: `worked_example_of_nasa_practice`.
    pub fn about(&self, nominal: f64) -> Bounds {
        Bounds::uniform([
            nominal * (1.0 - self.scatter) * (1.0 - self.tolerance) * (1.0 - self.relaxation),
            nominal,
            nominal * (1.0 + self.scatter) * (1.0 + self.tolerance),
        ])
    }

    /// Tightening factor of a scatter alone, 1.
    ///
    /// ```text
    /// α_A = F_max/F_min = (1 + Γ)/(1 − Γ)
    /// ```
    ///
    /// Valid: a scatter `Γ` even about the nominal force, below 1.
    /// Source: VDI 2230. Checked: `tightening_factor_and_scatter_agree`.
    pub fn tightening_factor(&self) -> f64 {
        (1.0 + self.scatter) / (1.0 - self.scatter)
    }

    /// The scatter that belongs to a tightening factor: `Γ = (α_A − 1)/(α_A + 1)`.
    pub fn of_tightening_factor(factor: f64) -> Self {
        Self {
            scatter: (factor - 1.0) / (factor + 1.0),
            ..Self::default()
        }
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;
    use crate::preload::fixture::{m6, m6_with};

    const POUND: f64 = 4.448_221_615;
    const INCH: f64 = 0.0254;

    fn nut_factor_bolt(scatter: Option<f64>) -> Fastener {
        let mut bolt = m6_with(|tightening| {
            tightening.torque = 60.0 * POUND * INCH;
            tightening.friction = Friction::NutFactor(Bounds::exact(0.20));
            tightening.scatter = scatter;
        });
        bolt.thread.diameter = 0.25 * INCH;
        bolt
    }

    #[test]
    fn worked_example_of_nasa_practice() {
        // 1/4-28 at 60 lbf in with K 0.20; the worked numbers are exact, 0.1 % covers their print.
        let close = |found: f64, pounds: f64| {
            assert!(
                (found / POUND / pounds - 1.0).abs() < 1e-3,
                "{found} {pounds}"
            );
        };
        let nominal = force_band(&nut_factor_bolt(None)).nominal;
        close(nominal, 1200.0);
        for (scatter, low, high) in [(0.25, 900.0, 1500.0), (0.35, 780.0, 1620.0)] {
            let band = force_band(&nut_factor_bolt(Some(scatter)));
            close(band.low, low);
            close(band.nominal, 1200.0);
            close(band.high, high);
        }
        let spread = Spread {
            scatter: 0.25,
            tolerance: 0.05,
            relaxation: 0.05,
        };
        close(spread.about(nominal).high, 1575.0);
        close(spread.about(nominal).low, 812.3);
    }

    #[test]
    fn tool_tolerance_and_friction_combine_as_products() {
        let band = force_band(&m6());
        let exact = force_band(&m6_with(|tightening| tightening.tolerance = 0.0));
        assert!((band.high / exact.high - 1.05).abs() < 1e-12);
        assert!((band.low / exact.low - 0.95).abs() < 1e-12);
        assert!((band.nominal - exact.nominal).abs() < 1e-9);
    }

    #[test]
    fn given_preload_keeps_its_bounds() {
        let bounds = Bounds::uniform([4e3, 5e3, 7e3]);
        let mut bolt = m6();
        bolt.tightening = Tightening::Preload(bounds);
        assert_eq!(force_band(&bolt), bounds);
        // Torsion by the thread friction of class B: F (P/2π + 0.577 · 0.12 · 5.35 mm).
        let lever = 0.159_155e-3 + 0.577_350 * 0.12 * 5.350_481e-3;
        let twist = torsion(&bolt, Place::NOMINAL);
        assert!((twist / (5e3 * lever) - 1.0).abs() < 1e-6, "{twist}");
    }

    #[test]
    fn torque_at_or_below_running_torque_clamps_nothing() {
        for running in [7.0, 9.0] {
            let bolt = m6_with(|tightening| {
                tightening.running = running;
                tightening.tolerance = 0.0;
            });
            assert!(force_band(&bolt).high.abs() < f64::EPSILON);
        }
    }

    #[test]
    fn running_torque_is_lost_to_the_force_but_twists_the_bolt() {
        let free = m6();
        let locked = m6_with(|tightening| tightening.running = 1.0);
        let ratio = force_band(&locked).nominal / force_band(&free).nominal;
        assert!((ratio - 6.0 / 7.0).abs() < 1e-12);
        let [clamps, twists] = [clamp_force, torsion].map(|of| of(&locked, Place::NOMINAL));
        let lever = torsion(&free, Place::NOMINAL) / clamp_force(&free, Place::NOMINAL);
        assert!((twists - (clamps * lever + 1.0)).abs() < 1e-9);
    }

    #[test]
    fn cone_seat_clamps_less() {
        let mut cone = m6();
        cone.conical_seat = true;
        let (flat, cone) = (force_band(&m6()).nominal, force_band(&cone).nominal);
        // Levers by hand: 0.9943 mm flat, 1.1867 mm with the head at r/sin 45°.
        assert!((cone / flat - 0.837_9).abs() < 1e-3, "{}", cone / flat);
    }

    #[test]
    fn method_scatter_keeps_the_balance_with_the_set_torque() {
        let bolt = m6_with(|tightening| tightening.scatter = Some(0.3));
        let Tightening::Torque(tightening) = &bolt.tightening else {
            unreachable!("the fixture is tightened by torque");
        };
        for place in [-1.0, 0.0, 1.0].map(|preload| Place {
            preload,
            ..Place::NOMINAL
        }) {
            let balance = balance(&bolt, tightening, place);
            let torque = balance.torque(clamp_force(&bolt, place));
            assert!((torque - 7.0).abs() < 1e-12);
            assert!(balance.levers.thread < balance.levers.total);
        }
        assert!((force_band(&bolt).nominal - force_band(&m6()).nominal).abs() < 1e-9);
    }

    proptest! {
        #![proptest_config(crate::fixed_cases(256))]

        #[test]
        fn more_friction_clamps_less(a in -1.0..1.0f64, b in -1.0..1.0f64, torque in 0.5..20.0f64) {
            let bolt = m6_with(|tightening| tightening.torque = torque);
            let at = |friction| clamp_force(&bolt, Place { friction, ..Place::NOMINAL });
            prop_assert!((at(a) - at(b)) * (a - b) <= 0.0);
        }

        #[test]
        fn every_place_lies_within_the_band(
            friction in -1.0..1.0f64, torque in -1.0..1.0f64, preload in -1.0..1.0f64,
            running in 0.0..9.0f64, scatter in proptest::option::of(0.0..0.6f64),
        ) {
            let bolt = m6_with(|tightening| {
                tightening.running = running;
                tightening.scatter = scatter;
            });
            let band = force_band(&bolt);
            let force = clamp_force(&bolt, Place { friction, torque, preload, running: 0.0 });
            prop_assert!(band.low <= band.nominal && band.nominal <= band.high);
            prop_assert!(band.low * (1.0 - 1e-12) <= force && force <= band.high * (1.0 + 1e-12));
        }
    }

    #[test]
    fn a_tightening_factor_is_a_scatter_and_back() {
        for factor in [1.0, 1.11, 1.6, 1.8, 2.51, 4.0] {
            let spread = Spread::of_tightening_factor(factor);
            // The same fraction twice: rounding alone.
            assert!((spread.tightening_factor() - factor).abs() < 1e-12);
            let band = spread.about(1e4);
            assert!((band.high / band.low - factor).abs() < 1e-12);
        }
        // Scatter seen in VDI 2230:1986, 17, 28 and 43 %, an impact wrench 60 %; printed or computed factors of
        // three digits, half of the last.
        for (scatter, factor) in [(0.17, 1.41), (0.28, 1.78), (0.43, 2.51), (0.60, 4.00)] {
            let spread = Spread {
                scatter,
                ..Spread::default()
            };
            let found = spread.tightening_factor();
            assert!((found - factor).abs() < 5.1e-3, "{scatter}: {found}");
            let back = Spread::of_tightening_factor(factor).scatter;
            // Half a digit of the factor is 0.2 % of scatter at most.
            assert!((back - scatter).abs() < 2e-3, "{factor}: {back}");
        }
        // M12 8.8, a fastener maker's example for VDI 2230-1:2015, seen: 41.9 kN / 1.8 = 23.3 kN, printed to 0.1 kN.
        let spread = Spread::of_tightening_factor(1.8);
        let band = spread.about(41.9 / (1.0 + spread.scatter));
        assert!((band.high - 41.9).abs() < 1e-9 && (band.low - 23.3).abs() < 0.05);
    }
}
