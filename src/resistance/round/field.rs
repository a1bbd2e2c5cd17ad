//! The elastic contact of the plates read as a conductance of the radius.

use crate::{
    pressure::round::Solution,
    resistance::{
        failure::Failure,
        round::{Condensed, Heat},
    },
};

/// Local conductance of the faces: where they press, and where they have parted.
#[derive(Clone, Copy, Debug)]
pub struct Law<C, P> {
    /// Conductance under a pressure in Pa, W/(m² K).
    pub closed: C,
    /// Conductance across an opening in m, W/(m² K).
    pub parted: P,
}

impl<C: Fn(f64) -> f64, P: Fn(f64) -> f64> Law<C, P> {
    /// Conductance at a radius (m) of a contact under a clamp force (N), W/(m² K).
    ///
    /// Where the plates of the heat reach beyond those of the contact the nearest radius counts.
    pub fn at(&self, contact: &Solution, [force, radius]: [f64; 2]) -> f64 {
        let ends = contact.radii.first().zip(contact.radii.last());
        let radius = ends.map_or(radius, |(hole, rim)| radius.max(*hole).min(*rim));
        let pressure = contact.pressure(radius, force);
        if pressure > 0.0 {
            (self.closed)(pressure)
        } else {
            (self.parted)(contact.gap(radius, force))
        }
    }
}

/// Heat through condensed plates under each of several clamp forces (N).
///
/// The contact does not depend on the force, so that the plates are condensed once, with the
/// contact's own radius in their problem; only what crosses the interface changes.
/// Checked: `torque_changes_only_what_crosses`, `parted_faces_conduct_by_their_gap`.
pub fn heat_under<C, P>(
    plates: &Condensed,
    (contact, forces): (&Solution, &[f64]),
    law: &Law<C, P>,
) -> Result<Vec<Heat>, Failure>
where
    C: Fn(f64) -> f64,
    P: Fn(f64) -> f64,
{
    forces
        .iter()
        .map(|force| plates.solve(|radius| law.at(contact, [*force, radius])))
        .collect()
}
