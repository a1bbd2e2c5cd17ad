//! What a clamp force loses after tightening: settling, relaxation, and what temperature adds or takes.

use crate::{numerics::roots, preload::springs::SpringStack};

/// Settling of one contact of each kind, m.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Settling {
    /// In the engaged thread.
    pub thread: f64,
    /// Under each head, nut or washer face.
    pub seat: f64,
    /// In each inner interface.
    pub interface: f64,
}

/// Direction of the load that works the contacts.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Working {
    /// Along the bolt; also a joint that only sits at temperature.
    Axial,
    /// Across the bolt.
    Transverse,
}

/// Guide values of settling by mean peak-to-valley height Rz of the faces.
///
/// | Rz | axial: thread / seat / interface | transverse |
/// |---|---|---|
/// | < 10 µm | 3 / 2.5 / 1.5 µm | 3 / 3 / 2 µm |
/// | 10–40 µm | 3 / 3 / 2 µm | 3 / 4.5 / 2.5 µm |
/// | ≥ 40 µm | 3 / 4 / 3 µm | 3 / 6.5 / 3.5 µm |
///
/// Valid: bolts from M4 up, seat pressures below their limit, Rz to 160 µm, uncoated metal.
/// Source: VDI 2230-1, guide values of settling, from memory.
pub fn guide_values(peak_to_valley: f64, working: Working) -> Settling {
    let [thread, seat, interface] = match (working, peak_to_valley) {
        (Working::Axial, rz) if rz < 10e-6 => [3e-6, 2.5e-6, 1.5e-6],
        (Working::Axial, rz) if rz < 40e-6 => [3e-6, 3e-6, 2e-6],
        (Working::Axial, _) => [3e-6, 4e-6, 3e-6],
        (Working::Transverse, rz) if rz < 10e-6 => [3e-6, 3e-6, 2e-6],
        (Working::Transverse, rz) if rz < 40e-6 => [3e-6, 4.5e-6, 2.5e-6],
        (Working::Transverse, _) => [3e-6, 6.5e-6, 3.5e-6],
    };
    Settling {
        thread,
        seat,
        interface,
    }
}

/// How many contacts of each kind lie in the path of the clamp force.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Contacts {
    /// Head and nut faces: 2 with a nut, 1 tapped.
    pub seats: u32,
    /// Inner interfaces: between plates and under each washer.
    pub interfaces: u32,
}

impl Settling {
    /// Settling of a whole stack `f_Z`, m: one thread, the seats and the inner interfaces.
    ///
    /// Checked: `two_plates_with_a_nut_settle_11_micrometres`.
    pub fn of_stack(&self, contacts: Contacts) -> f64 {
        self.thread
            + f64::from(contacts.seats) * self.seat
            + f64::from(contacts.interfaces) * self.interface
    }
}

/// Compliance of bolt and plates, m/N.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Compliance {
    /// Bolt `δ_S`.
    pub bolt: f64,
    /// Clamped parts `δ_P`.
    pub plates: f64,
}

/// Growth of the clamped parts over that of the bolt, m.
///
/// ```text
/// Δl = Σ ε_P l_P − ε_S l_K
/// ```
///
/// | symbol | quantity | SI unit | field |
/// |---|---|---|---|
/// | `ε_P`, `l_P` | ΔL/L and thickness of a clamped part | 1, m | `strain`, `length` of `plates` |
/// | `ε_S`, `l_K` | ΔL/L of the bolt and grip | 1, m | `strain`, `length` of `bolt` |
///
/// The strains are integrated from assembly to service temperature; in the cold no single coefficient serves.
/// Valid: lengths as at assembly, every part at one temperature.
/// Source: VDI 2230-1. Checked: `warming_aluminium_under_stainless_adds_741_newtons`.
pub fn growth(plates: &[Part], bolt: Part) -> f64 {
    plates.iter().map(Part::growth).sum::<f64>() - bolt.growth()
}

/// A part that grows with temperature.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Part {
    /// Length along the bolt, m.
    pub length: f64,
    /// Relative change of length ΔL/L from assembly to service, 1.
    pub strain: f64,
}

impl Part {
    fn growth(&self) -> f64 {
        self.length * self.strain
    }
}

/// What gives under the clamp force: bolt, clamped parts and disc springs.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Elasticity {
    /// Bolt and clamped parts.
    pub compliance: Compliance,
    /// Disc springs under head or nut.
    pub springs: Option<SpringStack>,
}

impl Elasticity {
    /// Force after the clamped stack has grown, N; negative when the joint would open.
    ///
    /// ```text
    /// (δ_S + δ_P) F + s(F) = (δ_S + δ_P) F₀ + s(F₀) + Δl
    /// ```
    ///
    /// | symbol | quantity | SI unit | field |
    /// |---|---|---|---|
    /// | `δ_S`, `δ_P` | compliance of bolt and plates | m/N | `compliance` |
    /// | `s(F)` | deflection of the springs, none once flat | m | `springs` |
    /// | `Δl` | growth of the clamped stack over that of the bolt, settling negative | m | `growth` |
    ///
    /// Without springs `F = F₀ + Δl/(δ_S + δ_P)`; settling `f_Z` then takes `F_Z = f_Z/(δ_S + δ_P)`.
    ///
    /// Valid: elastic, moduli as at room temperature; the springs follow without friction.
    /// Source: compatibility of the clamped stack, VDI 2230-1 with the curve of the springs added.
    /// Checked: `springs_follow_what_a_stiff_bolt_loses`, `a_flat_stack_is_no_longer_a_spring`,
    /// `example_a_of_the_resilience_chain`.
    pub fn after(&self, force: f64, growth: f64) -> f64 {
        let stiff = self.compliance.bolt + self.compliance.plates;
        let Some(springs) = &self.springs else {
            return force + growth / stiff;
        };
        let length = |force: f64| stiff * force + springs.deflection(force);
        let wanted = length(force) + growth;
        // The length rises at least as fast as that of the stiff parts and at most as fast as with
        // the springs' least stiffness, so that the stiff answer bounds the way from the start.
        let [low, high] = if growth < 0.0 {
            [force + growth / stiff, force]
        } else {
            [force, force + growth / stiff]
        };
        // Where the springs lie flat all the way, rounding may leave both ends on one side of the root.
        roots::bracketed(
            |force| length(force) - wanted,
            low,
            high,
            1e-12 * high.abs(),
        )
        .unwrap_or_else(|| roots::halved(|force| length(force) < wanted, low, high))
    }

    /// Compliance on the bolt's side at a force, m/N: bolt and springs in series.
    pub fn bolt_side(&self, force: f64) -> f64 {
        let springs = self
            .springs
            .map_or(0.0, |springs| springs.compliance(force));
        self.compliance.bolt + springs
    }

    /// Load factor of a load that enters under head and nut, at a force of the bolt, 1.
    ///
    /// ```text
    /// Φ_K = δ_P/(δ_S + δ_P)
    /// ```
    ///
    /// | symbol | quantity | SI unit | field |
    /// |---|---|---|---|
    /// | `δ_S` | compliance of bolt and disc springs at the force | m/N | `bolt_side` |
    /// | `δ_P` | compliance of the clamped parts | m/N | `compliance.plates` |
    ///
    /// Valid: a load along the bolt's axis, faces in contact; one that enters nearer the faces takes less.
    /// Source: VDI 2230-1. Checked: `example_a_of_the_resilience_chain`.
    pub fn load_factor(&self, force: f64) -> f64 {
        let plates = self.compliance.plates;
        plates / (self.bolt_side(force) + plates)
    }
}

/// What parts the service force from the assembly force.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Losses {
    /// Settling over all contacts of one bolt, m.
    pub settling: f64,
    /// Short-term relaxation as a fraction of the assembly force.
    pub relaxation: f64,
    /// What is lost while the other bolts are tightened, as a fraction of the assembly force.
    pub interaction: f64,
    /// Growth of the clamped stack over that of the bolt with temperature, m.
    pub growth: f64,
}

impl Losses {
    /// Balance of the service force, N; negative when the joint would open.
    ///
    /// ```text
    /// F = F_assembly (1 − r)(1 − i), then Δl = growth − f_Z by `Elasticity::after`
    /// ```
    ///
    /// `r` is the share lost to relaxation, `i` that to neighbours tightened later, `f_Z` the settling, m, and growth
    /// what the bolt grows less than the plates when the temperature changes, m.
    /// Valid: losses that act one after another and bodies that stay elastic.
    /// Source: the sum of VDI 2230-1 and of NASA preload practice; 5 % short-term relaxation from memory.
    /// Checked: `open_joint_carries_nothing`.
    pub fn balance(&self, assembly_force: f64, elasticity: &Elasticity) -> f64 {
        let kept = assembly_force * (1.0 - self.relaxation) * (1.0 - self.interaction);
        elasticity.after(kept, self.growth - self.settling)
    }
}

/// Clamp force in service, N; 0 where the balance of losses is negative: the joint is then open, and the
/// caller says so with [`crate::preload::opened`].
pub fn force_in_service(assembly_force: f64, (losses, elasticity): (&Losses, &Elasticity)) -> f64 {
    losses.balance(assembly_force, elasticity).max(0.0)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::preload::fixture::spring_stack;

    #[test]
    fn two_plates_with_a_nut_settle_11_micrometres() {
        let contacts = Contacts {
            seats: 2,
            interfaces: 1,
        };
        let settling = guide_values(25e-6, Working::Axial).of_stack(contacts);
        // 3 + 2·3 + 2, exact.
        assert!((settling - 11e-6).abs() < 1e-15);
    }

    #[test]
    fn rougher_faces_never_settle_less() {
        for working in [Working::Axial, Working::Transverse] {
            let [fine, middle, coarse] = [5e-6, 20e-6, 80e-6].map(|rz| guide_values(rz, working));
            assert!(fine.seat < middle.seat && middle.seat < coarse.seat);
            assert!(fine.interface < middle.interface && middle.interface < coarse.interface);
        }
    }

    /// A stiff M6: bolt 5 and plates 1 nm/N.
    const STIFF: Elasticity = Elasticity {
        compliance: Compliance {
            bolt: 5e-9,
            plates: 1e-9,
        },
        springs: None,
    };

    fn sprung() -> Elasticity {
        Elasticity {
            springs: Some(spring_stack()),
            ..STIFF
        }
    }

    #[test]
    fn open_joint_carries_nothing() {
        // 5.4 µm of settling over 6 nm/N is 900 N, 1.2 µm of shrinkage 200 N.
        let losses = Losses {
            settling: 5.4e-6,
            relaxation: 0.05,
            interaction: 0.0,
            growth: -1.2e-6,
        };
        assert!((losses.balance(1000.0, &STIFF) + 150.0).abs() < 1e-9);
        assert!(force_in_service(1000.0, (&losses, &STIFF)).abs() < f64::EPSILON);
        assert!((force_in_service(2000.0, (&losses, &STIFF)) - 800.0).abs() < 1e-9);
        let neighbours = Losses {
            interaction: 0.1,
            ..losses
        };
        // 2000 · 0.95 · 0.9 − 900 − 200.
        assert!((force_in_service(2000.0, (&neighbours, &STIFF)) - 610.0).abs() < 1e-9);
    }

    #[test]
    fn springs_follow_what_a_stiff_bolt_loses() {
        // 6 µm take 1000 N of a stiff bolt; the stack of springs gives about 1 µm per newton, so that a
        // few newtons are lost. What is left must close the balance of lengths.
        let sprung = sprung();
        let (before, lost) = (1000.0, -6e-6);
        assert!(STIFF.after(before, lost).abs() < 1e-9);
        let after = sprung.after(before, lost);
        let springs = sprung.springs.expect("the stack of this test");
        let lengths =
            6e-9 * (after - before) + springs.deflection(after) - springs.deflection(before);
        assert!((lengths - lost).abs() < 1e-14, "{lengths}");
        // By the tangent alone: 6 µm over 6 nm/N and the springs' own compliance.
        let tangent = before + lost / (6e-9 + springs.compliance(before));
        assert!((after - tangent).abs() < 0.1, "{after} {tangent}");
        assert!(after > 985.0);
        // And back.
        assert!((sprung.after(after, -lost) - before).abs() < 1e-6);
    }

    #[test]
    fn a_flat_stack_is_no_longer_a_spring() {
        let sprung = sprung();
        let flat = sprung.springs.expect("the stack of this test").flat_force();
        // Well above flat the loss is that of the stiff bolt; through flat the rest is the springs'.
        assert!((sprung.after(flat + 2000.0, -6e-6) - (flat + 1000.0)).abs() < 1e-6);
        let through = sprung.after(flat + 500.0, -6e-6);
        assert!(through < flat && through > flat - 10.0, "{through} {flat}");
        assert!((sprung.bolt_side(flat + 1.0) - 5e-9).abs() < 1e-20);
    }

    // Rounding of a length of a millimetre over 6 nm/N: below 1e-6 N.
    #[test]
    fn a_stack_that_stays_flat_gives_as_the_stiff_bolt_whatever_the_force() {
        let sprung = sprung();
        for step in 0..4000 {
            let force = 7000.0 + 1.3 * f64::from(step);
            let growth = (f64::from(step % 41) - 20.0) * 0.3e-6;
            let found = sprung.after(force, growth);
            let stiff = STIFF.after(force, growth);
            assert!(
                (found - stiff).abs() < 1e-6,
                "{force} N, {growth} m: {found} {stiff}"
            );
        }
    }

    #[test]
    fn growth_of_the_plates_over_the_bolt_is_a_force_over_both_compliances() {
        let part = |length: f64, expansion: f64, rise: f64| Part {
            length,
            strain: expansion * rise,
        };
        // Aluminium 12 and 8 mm under a steel bolt of 20 mm, 50 K: 20 · (23.6 − 11.5) · 50 = 12.1 µm over 6 nm/N.
        let gain = |elasticity: &Elasticity, rise: f64| {
            let plates = [12e-3, 8e-3].map(|length| part(length, 23.6e-6, rise));
            let longer = growth(&plates, part(20e-3, 11.5e-6, rise));
            elasticity.after(5000.0, longer) - 5000.0
        };
        let warm = gain(&STIFF, 50.0);
        assert!((warm / (12.1e-6 / 6e-9) - 1.0).abs() < 1e-12, "{warm}");
        // As much is lost in the cold.
        assert!((gain(&STIFF, -50.0) + warm).abs() < 1e-9);
        // A softer plate keeps more of what the bolt's side lets go: twice 6 nm/N is half the gain.
        let soft = Elasticity {
            compliance: Compliance {
                bolt: 5e-9,
                plates: 7e-9,
            },
            springs: None,
        };
        assert!((gain(&soft, 50.0) / warm - 0.5).abs() < 1e-12);
    }

    #[test]
    fn the_load_factor_is_the_share_of_the_plates_in_what_gives() {
        // 1 of 6 nm/N.
        assert!((STIFF.load_factor(5000.0) - 1.0 / 6.0).abs() < 1e-12);
    }
}
