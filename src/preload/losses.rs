//! What a clamp force loses after tightening: settling, relaxation, and what temperature adds or takes.

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

/// Mean peak-to-valley height Rz of a face of root-mean-square roughness Rq, m: about 5 Rq.
///
/// Judgement: Rz is 4 to 7 Ra for machined faces and Ra = Rq/1.25 for a Gaussian one; the guide values of
/// [`guide_values`] come in classes of a factor four.
pub fn peak_to_valley(rms_roughness: f64) -> f64 {
    5.0 * rms_roughness
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

impl Compliance {
    /// Force lost by settling `F_Z`, N.
    ///
    /// ```text
    /// F_Z = f_Z / (δ_S + δ_P)
    /// ```
    ///
    /// Source: VDI 2230-1. Checked: `example_a_of_the_resilience_chain`.
    pub fn settling_loss(&self, settling: f64) -> f64 {
        settling / (self.bolt + self.plates)
    }

    /// Force that temperature adds, N; negative where it takes.
    ///
    /// ```text
    /// ΔF = ( Σ ε_P l_P − ε_S l_K ) / (δ_S + δ_P)
    /// ```
    ///
    /// | symbol | quantity | SI unit | field |
    /// |---|---|---|---|
    /// | `ε_P`, `l_P` | ΔL/L and thickness of a clamped part | 1, m | `strain`, `length` of `plates` |
    /// | `ε_S`, `l_K` | ΔL/L of the bolt and grip | 1, m | `strain`, `length` of `bolt` |
    ///
    /// The strains are integrated from assembly to service temperature; in the cold no single coefficient serves.
    /// Valid: elastic, moduli as at room temperature.
    /// Source: VDI 2230-1. Checked: `warming_aluminium_under_stainless_adds_741_newtons`.
    pub fn temperature_gain(&self, plates: &[Part], bolt: Part) -> f64 {
        let growth = plates.iter().map(Part::growth).sum::<f64>() - bolt.growth();
        growth / (self.bolt + self.plates)
    }

    /// Load factor Φ of a load that enters under head and nut, 1: `δ_P/(δ_S + δ_P)`.
    ///
    /// Source: VDI 2230-1. Checked: `example_a_of_the_resilience_chain`.
    pub fn load_factor(&self) -> f64 {
        self.plates / (self.bolt + self.plates)
    }
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

/// What parts the service force from the assembly force.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Losses {
    /// Force lost by settling `F_Z`, N.
    pub settling: f64,
    /// Short-term relaxation as a fraction of the assembly force.
    pub relaxation: f64,
    /// Force that temperature adds, N.
    pub temperature: f64,
}

impl Losses {
    /// Balance of the service force, N; negative when the joint would open.
    ///
    /// ```text
    /// F = F_assembly (1 − r) − F_Z + ΔF_temperature
    /// ```
    ///
    /// Source: the sum of VDI 2230-1 and of NASA preload practice; 5 % short-term relaxation from memory.
    pub fn balance(&self, assembly_force: f64) -> f64 {
        assembly_force * (1.0 - self.relaxation) - self.settling + self.temperature
    }
}

/// Clamp force in service, N; 0 where the balance of losses is negative: the joint is then open, and the
/// caller says so with [`crate::preload::opened`].
pub fn force_in_service(assembly_force: f64, losses: &Losses) -> f64 {
    losses.balance(assembly_force).max(0.0)
}

#[cfg(test)]
mod tests {
    use super::*;

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

    #[test]
    fn open_joint_carries_nothing() {
        let losses = Losses {
            settling: 900.0,
            relaxation: 0.05,
            temperature: -200.0,
        };
        assert!((losses.balance(1000.0) + 150.0).abs() < 1e-9);
        assert!(force_in_service(1000.0, &losses).abs() < f64::EPSILON);
        assert!((force_in_service(2000.0, &losses) - 800.0).abs() < 1e-9);
    }
}
