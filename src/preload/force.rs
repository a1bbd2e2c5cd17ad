//! Clamp force of a fastener at any place of its scatter, and its low, nominal and high.

use crate::{
    joint::{Bounds, Fastener, Friction, Tightening, TorqueTightening},
    preload::torque::{Balance, Coefficients, Levers, Turning},
};

/// Thread friction taken for the torsion of a bolt whose preload is given: class B of VDI 2230.
///
/// The class spans 0.08 to 0.16; the middle is taken as nominal. The caller records the assumption.
pub const CLASS_B: Bounds = Bounds {
    low: 0.08,
    nominal: 0.12,
    high: 0.16,
};

/// A place within the scatter of tightening; each number runs from −1 through 0 (nominal) to +1.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Place {
    /// From lowest to highest friction, thread and head together.
    pub friction: f64,
    /// From lower to upper tolerance of the tool.
    pub torque: f64,
    /// From lowest to highest given preload, or through the scatter of the tightening method.
    pub preload: f64,
}

impl Place {
    /// The middle of everything.
    pub const NOMINAL: Self = Self {
        friction: 0.0,
        torque: 0.0,
        preload: 0.0,
    };

    /// Where the force is lowest: highest friction, lower tolerance.
    pub const LOWEST_FORCE: Self = Self {
        friction: 1.0,
        torque: -1.0,
        preload: -1.0,
    };

    /// Where the force is highest: lowest friction, upper tolerance.
    pub const HIGHEST_FORCE: Self = Self {
        friction: -1.0,
        torque: 1.0,
        preload: 1.0,
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
/// Checked: `worked_example_of_nasa_practice`, `more_friction_clamps_less`.
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
    Bounds {
        low: clamp_force(fastener, Place::LOWEST_FORCE),
        nominal: clamp_force(fastener, Place::NOMINAL),
        high: clamp_force(fastener, Place::HIGHEST_FORCE),
    }
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
    match tightening.scatter {
        Some(_) => 1.0,
        None => 1.0 + tightening.tolerance * place.torque,
    }
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
        running: tightening.running,
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
    /// Source: NASA preload practice, F(1 ± Γ) seen quoted; the tolerance factors and the relaxation of the
    /// minimum from memory of NASA-STD-5020.
    /// Checked: `worked_example_of_nasa_practice`.
    pub fn about(&self, nominal: f64) -> Bounds {
        Bounds {
            low: nominal * (1.0 - self.scatter) * (1.0 - self.tolerance) * (1.0 - self.relaxation),
            nominal,
            high: nominal * (1.0 + self.scatter) * (1.0 + self.tolerance),
        }
    }

    /// Tightening factor of a scatter alone, 1: `α_A = F_max/F_min = (1 + Γ)/(1 − Γ)`.
    ///
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
