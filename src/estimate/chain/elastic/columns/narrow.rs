//! Heated and cooled zones too narrow for one polynomial through the plate.

use crate::{
    estimate::chain::conditions::Conditions,
    joint::{CooledPart, Cooling, Joint, Plate, Zone},
};

/// Width of a zone over the thickness of its plate from which the columns resolve it: at 1.6 the
/// source to sink of a reference joint is the same at `fast` and `fine` within 0.02 %, at 0.4 and
/// 0.04 it reads low at both by most of what the zone's own spreading costs.
const RESOLVED: f64 = 1.5;

/// At most this much of source to sink the narrow zones of a joint leave out, K/W.
///
/// ```text
/// R = Σ s² 0.4732/(k √A) (1 − w/(1.5 t))          over zones with w < 1.5 t
/// ```
///
/// | symbol | quantity | SI unit |
/// |---|---|---|
/// | `s` | share of the heat in the zone; of cooled zones the share of their area | 1 |
/// | `A`, `w` | area and narrowest width of the zone | m², m |
/// | `t` | thickness of its plate | m |
/// | `k` | conductivity, geometric mean of in plane and through | W/(m K) |
///
/// The first factor is the mean rise of a square of uniform flux on a half-space; the last, how much of
/// it falls below what the polynomials follow, is a judgement. The lines of the plan go to the edges of a
/// zone, but no finer plan helps where the plate has one element through its thickness.
///
/// Source: Carslaw and Jaeger 1959, square source on a half-space, from memory.
/// Checked: `a_zone_far_smaller_than_a_cell_is_told`.
pub(super) fn left_out(joint: &Joint, conditions: &Conditions) -> f64 {
    let last = joint.plates.len() - 1;
    let k = |plate: usize| {
        conditions.conductivity[plate] * joint.plates[plate].material.through_ratio().sqrt()
    };
    let heated = joint.source.zones();
    let heat: f64 = heated.iter().map(|(_, heat)| heat).sum();
    let heated = heated
        .iter()
        .map(|(zone, part)| lacking((*zone, part / heat), (joint.warm(), k(0))));
    let cooled: Vec<Zone> = match &joint.sink {
        Cooling::Whole(_) => Vec::new(),
        Cooling::Parts(parts) => parts
            .iter()
            .filter_map(|part| match part {
                CooledPart::Film { zone, .. } | CooledPart::Held(zone) => Some(*zone),
                CooledPart::Edge(_) | CooledPart::Rim | CooledPart::Radiation { .. } => None,
            })
            .collect(),
    };
    let areas: Vec<f64> = cooled
        .iter()
        .filter_map(|zone| extent(*zone))
        .map(|(area, _)| area)
        .collect();
    let whole: f64 = areas.iter().sum();
    // Beside a whole face or an edge the heat of a zone is not known beforehand; it is little.
    let alone = areas.len() == cooled.len();
    let cooled = cooled.iter().filter(|_| alone).map(|zone| {
        let share = extent(*zone).map_or(0.0, |(area, _)| area / whole);
        lacking((*zone, share), (joint.cold(), k(last)))
    });
    heated.chain(cooled).sum()
}

fn lacking((zone, share): (Zone, f64), (plate, conductivity): (&Plate, f64)) -> f64 {
    const SQUARE: f64 = 0.4732;
    let Some((area, width)) = extent(zone) else {
        return 0.0;
    };
    let missing = (1.0 - width / (RESOLVED * plate.thickness)).max(0.0);
    share * share * SQUARE / (conductivity * area.sqrt()) * missing
}

/// Area and narrowest width of a zone; none of a whole face.
fn extent(zone: Zone) -> Option<(f64, f64)> {
    match zone {
        Zone::Face => None,
        Zone::Rectangle { size, .. } => Some((size[0] * size[1], size[0].min(size[1]))),
        Zone::Disc { radius, .. } => Some((std::f64::consts::PI * radius * radius, 2.0 * radius)),
    }
}
