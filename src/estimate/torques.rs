//! The torques at which strength and separation stand, found where no closed form gives them.

use crate::{
    estimate::{Realisation, forces::Group},
    joint::{Fastener, Joint, Tightening},
    numerics::roots,
    preload::{self, limits::LimitUse},
};

/// Where the clamp force of the joint would be lost.
pub const SEPARATION: &str = "separation";

/// Doublings of a torque that a limit may lie above the stated one.
const DOUBLINGS: u32 = 40;
/// Least torque tried, as a share of the stated one.
const LEAST: f64 = 1e-6;

impl Group {
    /// Largest torque at which every limit holds, N m, and the limit that ends it; none when the
    /// preload is given, the grade has no yield strength or no torque passes.
    pub fn largest_torque(
        &self,
        joint: &Joint,
        fastener: &Fastener,
    ) -> Option<(f64, &'static str)> {
        let (torque, name) = preload::largest_torque(fastener, &self.supports)?;
        let bolt = bare(fastener);
        // In service a limit seldom ends the window; where all hold there is nothing to seek.
        let there = at_torque(&bolt, torque);
        if self
            .in_service(joint, &there)
            .iter()
            .all(|limit| limit.passes)
        {
            return Some((torque, name));
        }
        let least = self
            .service_torques(joint, &bolt)
            .into_iter()
            .min_by(|one, other| one.1.total_cmp(&other.1));
        least
            .filter(|(_, torque)| *torque > 0.0)
            .map(|(name, torque)| (torque, name))
    }

    /// Largest torque of each limit, N m, the least first.
    pub fn most_torques(&self, joint: &Joint, fastener: &Fastener) -> Vec<(&'static str, f64)> {
        let bolt = bare(fastener);
        let mut found = preload::limit_torques(&bolt, &self.supports);
        if !found.is_empty() {
            let mut in_service = self.service_torques(joint, &bolt);
            // What is borne longer in service than at assembly ends no torque.
            in_service.retain(|(name, torque)| {
                let twin = preload::limits::at_assembly(name);
                let at_assembly = found.iter().find(|(other, _)| Some(*other) == twin);
                at_assembly.is_none_or(|(_, first)| torque < first)
            });
            found.extend(in_service);
        }
        found.sort_by(|one, other| one.1.total_cmp(&other.1));
        found
    }

    /// Largest torques of the limits in service, N m: 0 where none passes.
    fn service_torques(&self, joint: &Joint, bolt: &Fastener) -> Vec<(&'static str, f64)> {
        let uses = |torque: f64| {
            let bolt = at_torque(bolt, torque);
            let force = self.most_in_service(joint, &bolt);
            preload::limits_in_service(&bolt, &self.supports, force)
        };
        let Some(stated) = torque(bolt) else {
            return Vec::new();
        };
        let over = |name: &str, torque: f64| {
            let limits: Vec<LimitUse> = uses(torque);
            let limit = limits.iter().find(|limit| limit.name == name);
            limit.map_or(f64::NAN, |limit| limit.used - limit.allowed)
        };
        uses(stated)
            .iter()
            .filter_map(|limit| {
                let found = rising(|torque| over(limit.name, torque), stated)?;
                Some((limit.name, found))
            })
            .collect()
    }

    /// Least torque at which the least clamp force keeps the faces together in every case under the
    /// load with its factor, N m; none where any torque does.
    pub fn least_torque(&self, joint: &Joint, fastener: &Fastener) -> Option<f64> {
        let bolt = bare(fastener);
        let stated = torque(&bolt)?;
        let margin = |torque: f64| self.margin(joint, &at_torque(&bolt, torque));
        if margin(LEAST * stated) >= 0.0 {
            return None;
        }
        rising(margin, stated)
    }

    /// Least clamp force in the worst case less what the load with its factor takes from the faces, N.
    pub fn margin(&self, joint: &Joint, fastener: &Fastener) -> f64 {
        let assembly = preload::force_band(fastener).low;
        let safety = fastener.axial_load.map_or(1.0, |load| load.safety);
        (0..joint.service.cases.len())
            .map(|case| {
                let relief = self.shared(joint, fastener, case).map_or(0.0, |shared| {
                    (1.0 - shared.load_factor.low) * shared.load.high
                });
                self.balance(joint, (case, &Realisation::losing(1.0)), assembly) - safety * relief
            })
            .fold(f64::INFINITY, f64::min)
    }
}

/// Where a rising function of torque passes zero: 0 where it is above from the start, none where it
/// never does.
fn rising(of: impl Fn(f64) -> f64, stated: f64) -> Option<f64> {
    let low = LEAST * stated;
    if of(low) >= 0.0 {
        return Some(0.0);
    }
    let mut high = stated;
    for _ in 0..DOUBLINGS {
        if of(high) >= 0.0 {
            return roots::bracketed(of, low, high, 1e-10 * high);
        }
        high *= 2.0;
    }
    None
}

/// The fastener without its places, of which strength knows nothing.
fn bare(fastener: &Fastener) -> Fastener {
    Fastener {
        places: Vec::new(),
        ..fastener.clone()
    }
}

fn torque(fastener: &Fastener) -> Option<f64> {
    match &fastener.tightening {
        Tightening::Torque(tightening) => Some(tightening.torque),
        Tightening::Preload(_) => None,
    }
}

fn at_torque(fastener: &Fastener, torque: f64) -> Fastener {
    let mut changed = fastener.clone();
    if let Tightening::Torque(tightening) = &mut changed.tightening {
        tightening.torque = torque;
    }
    changed
}

#[cfg(test)]
mod tests;
