//! One cell per bolt: the part of both plates nearer to it than to any other bolt.

use crate::{
    joint::{Outline, Sink, Source, Zone},
    pressure::Cone,
    resistance::{
        failure::Failure,
        neighbours::{Neighbours, neighbours},
        network::Rings,
        region::{Region, Side},
        rings::{self, Patches},
    },
};

/// Everything about the joint in plan that no draw changes. Lengths in m.
#[derive(Clone, Debug, PartialEq)]
pub struct Plan {
    /// Outline of each plate and where its own origin lies in joint coordinates.
    pub outlines: [(Outline, [f64; 2]); 2],
    /// Thickness of both plates.
    pub thickness: [f64; 2],
    /// The bolts; at least one, each axis inside both plates.
    pub sites: Vec<Site>,
    /// Holes whose bolts are missing; none reaches another.
    pub empty: Vec<Hole>,
    /// Where heat enters the first plate.
    pub source: Source,
    /// Where heat leaves the second plate.
    pub sink: Sink,
    /// Rings per cell; an even number, 100 by default.
    pub rings: usize,
}

/// One bolt in plan.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Site {
    /// Axis in joint coordinates, m.
    pub at: [f64; 2],
    /// Hole radius in both plates, m.
    pub hole_radius: [f64; 2],
    /// Its pressure field.
    pub cone: Cone,
}

/// A hole without a bolt.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Hole {
    /// Axis in joint coordinates, m.
    pub at: [f64; 2],
    /// Radius in both plates, m.
    pub radius: [f64; 2],
}

impl Hole {
    /// Its radius in one plate; that of the faying faces, the larger one, when none is named, m.
    pub(super) fn radius_in(&self, plate: Option<usize>) -> f64 {
        let [first, second] = self.radius;
        plate.map_or(first.max(second), |plate| self.radius[plate])
    }
}

/// Rings that make the ring sum good to 1e-4.
pub const DEFAULT_RINGS: usize = 100;

/// The cells of a joint, ready to be solved for any forces and conductances.
#[derive(Clone, Debug, PartialEq)]
pub struct Cells {
    pub(super) plan: Plan,
    /// One for each bolt.
    pub(super) fine: Vec<Cell>,
    /// Area of each plate without holes, m².
    pub plate_area: [f64; 2],
    /// Area of the faying faces without holes, m².
    pub interface_area: f64,
    /// Heated area without holes, m².
    pub source_area: f64,
    /// Share of each bolt's closed-form field that fell beyond the faying faces, 0 to 1. The rest
    /// is raised so that it carries the whole force.
    pub cut_share: Vec<f64>,
    /// Whether each bolt's contact reaches into another bolt's.
    pub overlaps: Vec<bool>,
    /// Factor that restores the whole force of each bolt.
    pub(super) restored: Vec<f64>,
}

/// Rings and patches around one bolt.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Cell {
    pub(super) edges: Vec<f64>,
    pub(super) rings: Rings,
    pub(super) patches: Patches,
    /// Share of the area under the head that lies in each ring.
    pub(super) head_share: Vec<f64>,
    /// First cell with the same rings: its solution serves when the forces are equal.
    pub(super) like: usize,
}

/// A region and what holes take from it.
#[derive(Clone, Debug)]
pub(super) struct Extent {
    pub(super) region: Region,
    /// Own hole, m.
    pub(super) hole_radius: f64,
    /// Parts of other bolts' holes that reach into this cell.
    pub(super) intruding: Vec<Region>,
}

/// The plan as one bolt sees it, from its axis.
#[derive(Clone, Debug)]
pub(super) struct View {
    pub(super) plates: [Extent; 2],
    /// Faying face inside the cell.
    pub(super) interface: Extent,
    pub(super) source: Extent,
    /// Every other bolt near enough to matter, the nearest first: its index and its place seen
    /// from here.
    pub(super) others: Vec<(usize, [f64; 2])>,
}

impl Extent {
    /// Area between the own hole and a circle, m².
    pub(super) fn area_within(&self, radius: f64) -> f64 {
        if radius <= self.hole_radius {
            return 0.0;
        }
        let inside =
            |region: &Region| region.area_within(radius) - region.area_within(self.hole_radius);
        inside(&self.region) - self.intruding.iter().map(inside).sum::<f64>()
    }
}

fn outline_sides(outline: &Outline, origin: [f64; 2], axis: [f64; 2]) -> Vec<Side> {
    let corner = [origin[0] - axis[0], origin[1] - axis[1]];
    match *outline {
        Outline::Rectangle { size } => rectangle(corner, size),
        Outline::Disc { radius } => vec![Side::Circle {
            centre: corner,
            radius,
        }],
        // `cells` refuses polygons before any side is asked for.
        Outline::Polygon { .. } => Vec::new(),
    }
}

fn zone_sides(zone: &Zone, axis: [f64; 2]) -> Vec<Side> {
    match *zone {
        Zone::Face => Vec::new(),
        Zone::Rectangle { centre, size } => {
            rectangle([0, 1].map(|k| centre[k] - 0.5 * size[k] - axis[k]), size)
        }
        Zone::Disc { centre, radius } => vec![Side::Circle {
            centre: [centre[0] - axis[0], centre[1] - axis[1]],
            radius,
        }],
    }
}

fn rectangle(corner: [f64; 2], size: [f64; 2]) -> Vec<Side> {
    let line = |normal, offset| Side::Line { normal, offset };
    vec![
        line([1.0, 0.0], corner[0] + size[0]),
        line([-1.0, 0.0], -corner[0]),
        line([0.0, 1.0], corner[1] + size[1]),
        line([0.0, -1.0], -corner[1]),
    ]
}

impl Plan {
    /// Hole radius of the faying faces at a bolt: the larger hole, m.
    pub(super) fn hole_radius(&self, bolt: usize) -> f64 {
        let [first, second] = self.sites[bolt].hole_radius;
        first.max(second)
    }

    pub(super) fn view(&self, bolt: usize) -> View {
        let axis = self.sites[bolt].at;
        let plate = [0, 1].map(|plate| {
            let (outline, origin) = &self.outlines[plate];
            outline_sides(outline, *origin, axis)
        });
        let Neighbours { others, nearer } = neighbours(self, bolt, &plate);
        let extent = |sides: &[&[Side]], (hole_radius, plate), hole: &dyn Fn(usize) -> f64| {
            let sides: Vec<Side> = sides.concat();
            let intruding = others
                .iter()
                .map(|(other, to)| (*to, hole(*other)))
                .filter(|(to, radius)| *radius > 0.5 * to[0].hypot(to[1]));
            let empty = self.empty.iter().map(|hole| {
                let to = [0, 1].map(|k| hole.at[k] - axis[k]);
                (to, hole.radius_in(plate))
            });
            let intruding = intruding
                .chain(empty)
                .map(|(centre, radius)| {
                    let mut within = sides.clone();
                    within.push(Side::Circle { centre, radius });
                    Region::new(&within)
                })
                .collect();
            Extent {
                region: Region::new(&sides),
                hole_radius,
                intruding,
            }
        };
        let hole = |plate: usize| move |other: usize| self.sites[other].hole_radius[plate];
        let holes = self.sites[bolt].hole_radius;
        let zone = zone_sides(&self.source.zone, axis);
        View {
            plates: [0, 1].map(|k| extent(&[&nearer, &plate[k]], (holes[k], Some(k)), &hole(k))),
            interface: extent(
                &[&nearer, &plate[0], &plate[1]],
                (self.hole_radius(bolt), None),
                &|other| self.hole_radius(other),
            ),
            source: extent(&[&nearer, &plate[0], &zone], (holes[0], Some(0)), &hole(0)),
            others,
        }
    }

    /// Whether the disc of a bolt's contact lies on the faying faces and clear of other holes.
    fn holds_contact(&self, bolt: usize) -> bool {
        let Site { at, cone, .. } = self.sites[bolt];
        // A contact that ends exactly on the rim is not cut.
        let reach = cone.contact_radius * (1.0 - 1e-9);
        let on_the_faces = self.outlines.iter().all(|(outline, origin)| {
            Region::new(&outline_sides(outline, *origin, at)).holds_disc(reach)
        });
        let clear =
            |to: [f64; 2], radius: f64| (to[0] - at[0]).hypot(to[1] - at[1]) >= reach + radius;
        on_the_faces
            && self
                .empty
                .iter()
                .all(|hole| clear(hole.at, hole.radius_in(None)))
            && self
                .sites
                .iter()
                .enumerate()
                .all(|(other, site)| other == bolt || clear(site.at, self.hole_radius(other)))
    }

    fn overlapping(&self, bolt: usize) -> bool {
        let Site { at, cone, .. } = self.sites[bolt];
        self.sites.iter().enumerate().any(|(other, site)| {
            let distance = (site.at[0] - at[0]).hypot(site.at[1] - at[1]);
            other != bolt && distance < cone.contact_radius + site.cone.contact_radius
        })
    }
}

/// Cuts a plan into cells and rings.
///
/// Checked: `cells_cover_the_plates`, `pressure_carries_the_force_whatever_the_edges`.
pub fn cells(plan: &Plan) -> Result<Cells, Failure> {
    let polygon = |(outline, _): &(Outline, _)| matches!(outline, Outline::Polygon { .. });
    if let Some(plate) = plan.outlines.iter().position(polygon) {
        return Err(Failure::Polygon { plate });
    }
    let mut found = Cells {
        plan: plan.clone(),
        fine: Vec::with_capacity(plan.sites.len()),
        plate_area: [0.0; 2],
        interface_area: 0.0,
        source_area: 0.0,
        cut_share: Vec::new(),
        overlaps: (0..plan.sites.len())
            .map(|bolt| plan.overlapping(bolt))
            .collect(),
        restored: Vec::new(),
    };
    for bolt in 0..plan.sites.len() {
        // Thousands of views at once would fill the memory.
        let view = plan.view(bolt);
        let area = |extent: &Extent| extent.area_within(f64::INFINITY);
        for plate in 0..2 {
            found.plate_area[plate] += area(&view.plates[plate]);
        }
        found.interface_area += area(&view.interface);
        found.source_area += area(&view.source);
        found.fine.push(rings::cell(plan, &view, bolt));
    }
    let carried = rings::restore(&mut found.fine)?;
    rings::pair_up(&mut found.fine);
    found.cut_share = carried
        .iter()
        .enumerate()
        .map(|(bolt, share)| {
            if plan.holds_contact(bolt) {
                0.0
            } else {
                (1.0 - share).clamp(0.0, 1.0)
            }
        })
        .collect();
    found.restored = carried.iter().map(|share| share.recip()).collect();
    Ok(found)
}

#[cfg(test)]
mod tests;
