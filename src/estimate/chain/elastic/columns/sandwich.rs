//! What the layers of a sandwich conduct: sheets as their plate, core and inserts by themselves.

use crate::{
    joint::{Joint, PlyKind},
    pressure::elastic::MeshBody,
    resistance::columns::{Conductivity, Part},
};

/// Conductivity of a core in the plane over that through it: walls of one thickness in all directions
/// of the plane carry half of what they carry along the cells.
const IN_PLANE: f64 = 0.5;

/// Parts of the layers of a plate (0 is the first) that do not conduct as its material; layers from the
/// cold side. None for a solid plate.
///
/// Conductivities of core and insert are those at room temperature; no temperature and no draw moves
/// them.
pub(super) fn parts((joint, index): (&Joint, usize), body: &MeshBody) -> Vec<(usize, Vec<Part>)> {
    let Some(sandwich) = &joint.plates[index].sandwich else {
        return Vec::new();
    };
    let plies = joint.plies(index);
    let last = plies.len() - 1;
    let insert = &sandwich.insert;
    let in_plane = insert.conductivity.value;
    let insert = Conductivity::layered(in_plane, insert.through_ratio() * in_plane);
    let core = Conductivity::layered(
        IN_PLANE * sandwich.core_conductivity,
        sandwich.core_conductivity,
    );
    plies
        .iter()
        .zip(&body.layers)
        .enumerate()
        .map(|(depth, (ply, layer))| {
            let filled = layer.inlay.as_ref();
            let mut parts = Vec::new();
            if ply.kind == PlyKind::Core {
                let rest =
                    filled.map_or(layer.region.clone(), |filled| layer.region.without(filled));
                parts.push(Part {
                    shares: rest.shares(),
                    conductivity: core,
                });
            }
            if let Some(filled) = filled.filter(|filled| !filled.is_empty()) {
                parts.push(Part {
                    shares: filled.shares(),
                    conductivity: insert,
                });
            }
            // Plies go outwards from the faying face, which the first plate has on its cold side.
            (if index == 0 { depth } else { last - depth }, parts)
        })
        .collect()
}
