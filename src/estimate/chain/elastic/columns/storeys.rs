//! A plate as bonded layers: ribs, the plate itself, feet; or face sheets and core with inserts in them.

use crate::{
    joint::{Joint, Plate, PlyKind},
    pressure::elastic::{Body, Cover, Inlay, Layer},
};

/// Poisson's ratio of a core: cells give way sideways, so that its modulus is that through the thickness
/// and half of it the one in shear.
const CORE_POISSON: f64 = 0.0;

/// A layer before it is borrowed: where it is, how thick, how stiff.
pub(super) struct Storey<'a> {
    cover: Box<Cover<'a>>,
    thickness: f64,
    main: bool,
    /// Young's modulus, Pa, and Poisson's ratio.
    stiffness: [f64; 2],
    inlay: Option<Filling<'a>>,
}

/// What another material fills of a layer.
struct Filling<'a> {
    cover: Box<Cover<'a>>,
    stiffness: [f64; 2],
}

/// Layers of a plate, upper first; ribs stand on the outer face, feet on the faying face.
pub(super) fn storeys((joint, index): (&Joint, usize), upper: bool) -> Vec<Storey<'_>> {
    let plate = &joint.plates[index];
    let mut found = if plate.sandwich.is_some() {
        sandwich(joint, index)
    } else {
        solid(plate)
    };
    if !upper {
        found.reverse();
    }
    found
}

/// Layers of a solid plate, from the outer face to the faying face.
fn solid(plate: &Plate) -> Vec<Storey<'_>> {
    let mut found = ribs(plate);
    found.reverse();
    found.push(Storey {
        cover: Box::new(move |point| plate.covers(point)),
        thickness: plate.thickness,
        main: true,
        stiffness: stiffness(plate),
        inlay: None,
    });
    if let Some(feet) = &plate.feet {
        found.push(Storey {
            cover: Box::new(move |point| plate.stands_at(point)),
            thickness: feet.height,
            main: false,
            stiffness: stiffness(plate),
            inlay: None,
        });
    }
    found
}

/// Layers of a sandwich, from the outer face to the faying face; the sheet there counts as the plate.
fn sandwich(joint: &Joint, index: usize) -> Vec<Storey<'_>> {
    let plate = &joint.plates[index];
    let plies = joint.plies(index).into_iter().enumerate().rev();
    plies
        .filter_map(|(place, ply)| {
            let sandwich = plate.sandwich.as_ref()?;
            let insert = &sandwich.insert;
            Some(Storey {
                cover: Box::new(move |point| plate.covers(point)),
                thickness: ply.thickness,
                main: place == 0,
                stiffness: match ply.kind {
                    PlyKind::Sheet => stiffness(plate),
                    PlyKind::Core => [sandwich.core_modulus, CORE_POISSON],
                },
                inlay: Some(Filling {
                    cover: Box::new(move |point| joint.is_filled(point, &ply)),
                    stiffness: [insert.youngs_modulus.value, insert.poisson.value],
                }),
            })
        })
        .collect()
}

fn stiffness(plate: &Plate) -> [f64; 2] {
    let material = &plate.material;
    [material.youngs_modulus.value, material.poisson.value]
}

/// Ribs as layers, from the outer face outwards: each as thick as the step to the next height.
fn ribs(plate: &Plate) -> Vec<Storey<'_>> {
    let mut below = 0.0;
    plate
        .rib_heights()
        .into_iter()
        .map(|height| {
            let thickness = height - below;
            below = height;
            Storey {
                cover: Box::new(move |point| {
                    plate.covers(point)
                        && plate
                            .ribs
                            .iter()
                            .any(|rib| rib.height >= height && rib.patch.contains(plate.own(point)))
                }),
                thickness,
                main: false,
                stiffness: stiffness(plate),
                inlay: None,
            }
        })
        .collect()
}

/// A plate with its layers as the contact takes it.
pub(super) fn body<'a>(plate: &Plate, storeys: &'a [Storey<'a>]) -> Body<'a> {
    let [left, lower, right, upper] = plate.bounds();
    Body {
        layers: storeys
            .iter()
            .map(|storey| Layer {
                cover: storey.cover.as_ref(),
                thickness: storey.thickness,
                youngs_modulus: storey.stiffness[0],
                poisson: storey.stiffness[1],
                through: None,
                inlay: storey.inlay.as_ref().map(|filling| Inlay {
                    cover: filling.cover.as_ref(),
                    youngs_modulus: filling.stiffness[0],
                    poisson: filling.stiffness[1],
                }),
            })
            .collect(),
        main: storeys.iter().position(|storey| storey.main).unwrap_or(0),
        bounds: [[left, right], [lower, upper]],
    }
}
