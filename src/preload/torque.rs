//! The torque balance of a screw: pitch, thread friction, head friction, running torque.

use std::f64::consts::{FRAC_1_SQRT_2, PI, TAU};

use crate::joint::{Fastener, Seat};

/// 1/(2 cos 30°): the wedge of a 60° thread, applied to d₂. The tables print 0.577 or 1.155/2.
pub const FLANK: f64 = 0.577_350_269_189_625_8;

/// sin 45°: the wedge of a 90° countersunk head, by which its friction radius is divided.
///
/// Source: wedge argument, from memory; no table seen.
pub const CONE_SEAT: f64 = FRAC_1_SQRT_2;

/// Friction of one screw.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Coefficients {
    /// `μ_t` between the threads, 1.
    pub thread: f64,
    /// `μ_h` under the turned head or nut, 1.
    pub head: f64,
}

/// The geometry that turns with the wrench.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Turning {
    /// Pitch P, m.
    pub pitch: f64,
    /// Pitch diameter d₂, m.
    pub pitch_diameter: f64,
    /// Radius at which head friction acts, `D_m/2`, the wedge of a cone seat included, m.
    pub friction_radius: f64,
}

impl Turning {
    /// The turning geometry of a fastener; a cone seat acts at r/sin 45°.
    pub fn of(fastener: &Fastener) -> Self {
        let wedge = if fastener.conical_seat {
            CONE_SEAT
        } else {
            1.0
        };
        Self {
            pitch: fastener.thread.pitch,
            pitch_diameter: fastener.thread.pitch_diameter,
            friction_radius: fastener.friction_radius / wedge,
        }
    }

    /// Torque per clamp force, in total and in the thread alone, m.
    ///
    /// ```text
    /// thread = P/(2π) + μ_t d₂/(2 cos 30°)
    /// total  = thread + μ_h D_m/2
    /// ```
    ///
    /// | symbol | quantity | SI unit | field |
    /// |---|---|---|---|
    /// | `P` | pitch | m | `pitch` |
    /// | `d₂` | pitch diameter | m | `pitch_diameter` |
    /// | `D_m/2` | friction radius | m | `friction_radius` |
    /// | `μ_t`, `μ_h` | friction coefficients | 1 | `thread`, `head` |
    ///
    /// Valid: 60° threads; the linear form, 0.3 % (μ 0.08) to 0.9 % (μ 0.30) below the exact helix at M10.
    /// Source: VDI 2230-1:2001, the torque equation behind its tables.
    /// Checked: `fine_thread_table_of_vdi_2230_2001`.
    pub fn levers(&self, friction: Coefficients) -> Levers {
        let thread = self.pitch / TAU + FLANK * friction.thread * self.pitch_diameter;
        Levers {
            total: thread + friction.head * self.friction_radius,
            thread,
        }
    }

    /// The one coefficient, for thread and head alike, that gives a total lever, 1.
    ///
    /// ```text
    /// μ = (lever − P/(2π)) / (d₂/(2 cos 30°) + D_m/2)
    /// ```
    ///
    /// Zero when the lever is shorter than the pitch alone: such a nut factor belongs to no friction.
    /// Valid: the choice `μ_t = μ_h` is this house's; a nut factor does not say where the friction is.
    /// Source: the torque balance of [`Self::levers`], solved for one friction.
    pub fn equal_friction(&self, lever: f64) -> f64 {
        let arm = FLANK * self.pitch_diameter + self.friction_radius;
        ((lever - self.pitch / TAU) / arm).max(0.0)
    }
}

/// Torque per clamp force.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Levers {
    /// At the wrench, running torque apart, m.
    pub total: f64,
    /// The part that twists the bolt, m.
    pub thread: f64,
}

impl Levers {
    /// Nut factor K = lever / d, 1, of T = K d F.
    ///
    /// Checked: `nut_factor_at_friction_0_15_is_about_0_20`.
    pub fn nut_factor(&self, diameter: f64) -> f64 {
        self.total / diameter
    }
}

/// Nut factor form of the torque balance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ShortForm {
    /// Nut factor K, 1.
    pub nut_factor: f64,
    /// Nominal thread diameter d, m.
    pub diameter: f64,
}

impl ShortForm {
    /// Tightening torque, N m.
    ///
    /// ```text
    /// T = K d F
    /// ```
    ///
    /// Valid: the lubricant, plating and size that `K` was measured with.
    /// Source: the short form of every textbook.
    /// Checked: `short_form_returns_the_printed_torques`.
    pub fn torque(&self, force: f64) -> f64 {
        self.nut_factor * self.diameter * force
    }

    /// Clamp force F = T/(K d), N.
    pub fn force(&self, torque: f64) -> f64 {
        torque / (self.nut_factor * self.diameter)
    }
}

/// Wrench against screw: levers and the running torque of a locking feature.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Balance {
    /// Torque per force.
    pub levers: Levers,
    /// Running torque `T_run`, N m.
    pub running: f64,
}

impl Balance {
    /// Torque at the wrench for a clamp force, N m.
    ///
    /// ```text
    /// T = T_run + F lever
    /// ```
    ///
    /// `T_run` is the running torque of a locking feature, N m. Valid and source: as [`Turning::levers`].
    pub fn torque(&self, force: f64) -> f64 {
        self.running + force * self.levers.total
    }

    /// Clamp force for a torque at the wrench, N.
    ///
    /// ```text
    /// F = (T − T_run) / lever,   0 for T ≤ T_run
    /// ```
    ///
    /// Valid and source: as [`Turning::levers`].
    /// Checked: `running_torque_alone_clamps_nothing`.
    pub fn force(&self, torque: f64) -> f64 {
        ((torque - self.running) / self.levers.total).max(0.0)
    }

    /// Torque that twists the bolt while it is tightened, N m: the thread's share and the running torque.
    pub fn torsion(&self, force: f64) -> f64 {
        self.running + force * self.levers.thread
    }
}

/// Mean friction diameter of a flat annulus by equal radii, m.
///
/// ```text
/// D_m = (D_o + D_i)/2
/// ```
///
/// Valid: narrow rings; within 0.4 % of uniform pressure for a hexagon head.
/// Source: VDI 2230-1:2001, the mean its tables use.
pub fn mean_friction_diameter(annulus: &Seat) -> f64 {
    annulus.outer_radius + annulus.inner_radius
}

/// Mean friction diameter of a flat annulus under uniform pressure, m.
///
/// ```text
/// D_m = (2/3) (D_o³ − D_i³)/(D_o² − D_i²)
/// ```
///
/// Source: integral of the friction moment over the annulus. Exact for uniform pressure; 0.4 % above the mean of the radii for a hexagon head.
pub fn uniform_friction_diameter(annulus: &Seat) -> f64 {
    let (outer, inner) = (annulus.outer_radius, annulus.inner_radius);
    // The difference of cubes over the difference of squares, divided out: also right for a line.
    4.0 / 3.0 * (outer * outer + outer * inner + inner * inner) / (outer + inner)
}

/// Lead angle φ of a thread, rad: tan φ = P/(π d₂).
pub fn lead_angle(turning: &Turning) -> f64 {
    (turning.pitch / (PI * turning.pitch_diameter)).atan()
}

#[cfg(test)]
mod tests {
    use super::*;

    const M10: Turning = Turning {
        pitch: 1.5e-3,
        pitch_diameter: 9.026e-3,
        friction_radius: 6.4075e-3,
    };

    #[test]
    fn torque_without_friction_lifts_the_pitch() {
        let levers = M10.levers(Coefficients {
            thread: 0.0,
            head: 0.0,
        });
        // Work of one turn: 2π T = F P, exact.
        assert!((levers.total * TAU - M10.pitch).abs() < 1e-15);
    }

    #[test]
    fn running_torque_alone_clamps_nothing() {
        let balance = Balance {
            levers: M10.levers(Coefficients {
                thread: 0.12,
                head: 0.12,
            }),
            running: 3.0,
        };
        assert!(balance.force(3.0).abs() < f64::EPSILON);
        assert!(balance.force(1.0).abs() < f64::EPSILON);
        assert!((balance.force(balance.torque(1e4)) - 1e4).abs() < 1e-9);
    }

    #[test]
    fn equal_friction_inverts_the_levers() {
        let levers = M10.levers(Coefficients {
            thread: 0.17,
            head: 0.17,
        });
        assert!((M10.equal_friction(levers.total) - 0.17).abs() < 1e-12);
        assert!(M10.equal_friction(1e-6).abs() < f64::EPSILON);
    }

    #[test]
    fn split_of_torque_at_m10_is_15_38_47_percent() {
        let levers = M10.levers(Coefficients {
            thread: 0.12,
            head: 0.12,
        });
        let pitch = M10.pitch / TAU / levers.total;
        let head = 1.0 - levers.thread / levers.total;
        // Computed shares for the medium hole, printed to 0.1 %: half a digit.
        assert!((pitch - 0.146).abs() < 1e-3, "{pitch}");
        assert!((head - 0.471).abs() < 1e-3, "{head}");
    }

    #[test]
    fn linear_form_lies_within_one_percent_of_the_exact_helix() {
        // Computed for M10: the exact form asks 0.3 % more torque at friction 0.08 and 0.9 % more at 0.30.
        for (friction, excess) in [(0.08, 0.003), (0.30, 0.009)] {
            let linear = M10.levers(Coefficients {
                thread: friction,
                head: friction,
            });
            let wedge = (2.0 * FLANK * friction).atan();
            let helix = M10.pitch_diameter / 2.0 * (lead_angle(&M10) + wedge).tan();
            let exact = helix + friction * M10.friction_radius;
            assert!((exact / linear.total - 1.0 - excess).abs() < 1e-3);
        }
    }

    #[test]
    fn line_seat_turns_at_its_own_radius() {
        let line = Seat {
            inner_radius: 5e-3,
            outer_radius: 5e-3,
        };
        assert!((uniform_friction_diameter(&line) - 10e-3).abs() < 1e-15);
        assert!((mean_friction_diameter(&line) - 10e-3).abs() < 1e-15);
        assert!((lead_angle(&M10).tan() - 0.052_898).abs() < 1e-5);
    }
}
