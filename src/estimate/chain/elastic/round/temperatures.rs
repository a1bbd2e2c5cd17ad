//! Temperatures and flux in round plates, read from the solved heat.

use crate::{
    estimate::{FacePoint, Temperatures, chain::elastic::round::shape::Shape},
    numerics::interpolation::linear,
    resistance::{
        columns::{Across, Section},
        round::{Heat, Meridian, Profile},
    },
};

pub(super) fn at_a_glance(heat: &Heat, shape: &Shape) -> Temperatures {
    Temperatures {
        hottest: heat.path.hottest,
        // All round the axis; the place towards x stands for the circle.
        hottest_at: [
            shape.at[0] + heat.hottest_at.radius,
            shape.at[1],
            heat.hottest_at.height,
        ],
        // The chain knows them.
        names: Vec::new(),
        plate_means: heat.plate_mean.to_vec(),
        interface_drops: vec![heat.path.interface_drop],
    }
}

/// Radius and flux across the faces, per watt, 1/m².
///
/// ```text
/// q(r) = h(r) (T1(r) − T2(r))
/// ```
pub(super) fn flux(heat: &Heat, conductance: impl Fn(f64) -> f64) -> Vec<(f64, f64)> {
    let [warm, cold] = &heat.profiles.inner;
    let drops = warm.temperatures.iter().zip(&cold.temperatures);
    let drops = drops.map(|(warm, cold)| warm - cold);
    let pairs = warm.radii.iter().zip(drops);
    pairs
        .map(|(radius, drop)| (*radius, conductance(*radius) * drop))
        .collect()
}

/// The faces at points; flux over its mean, straight between grid lines.
pub(super) fn face_points(
    (heat, flux): (&Heat, &[(f64, f64)]),
    shape: &Shape,
    points: &[[f64; 2]],
) -> Vec<Option<FacePoint>> {
    let table = |profile: &Profile| -> Vec<(f64, f64)> {
        let radii = profile.radii.iter().copied();
        radii.zip(profile.temperatures.iter().copied()).collect()
    };
    let faces = [0, 1].map(|plate| table(&heat.profiles.inner[plate]));
    let (mut crossing, mut area) = (0.0, 0.0);
    for pair in flux.windows(2) {
        let [(inner, low), (outer, high)] = [pair[0], pair[1]];
        crossing += 0.5 * (low * inner + high * outer) * (outer - inner);
        area += 0.5 * (outer * outer - inner * inner);
    }
    let mean = crossing / area;
    points
        .iter()
        .map(|[x, y]| {
            let radius = (x - shape.at[0]).hypot(y - shape.at[1]);
            let on_the_faces = (shape.hole_radius..=shape.rim_radius).contains(&radius);
            on_the_faces.then(|| {
                let flux = linear(flux, radius);
                FacePoint {
                    rises: [0, 1].map(|plate| linear(&faces[plate], radius)),
                    flux,
                    concentration: flux / mean,
                }
            })
        })
        .collect()
}

/// A section through the axis: the meridian and its mirror image.
pub(super) fn section(heat: &Heat, shape: &Shape, across: Across) -> Option<Vec<Section>> {
    let [along, off, line] = match across {
        Across::X(y) => [shape.at[0], shape.at[1], y],
        Across::Y(x) => [shape.at[1], shape.at[0], x],
    };
    let on_the_axis = (off - line).abs() <= 1e-9 * shape.rim_radius;
    if !on_the_axis || heat.meridians[0].radii.is_empty() {
        return None;
    }
    let [warm, cold] = &heat.meridians;
    let floor = cold.heights.last().copied()?;
    let mirrored = |plate: &Meridian, height: &dyn Fn(f64) -> f64| {
        let places = |side: f64| plate.radii.iter().map(move |radius| along + side * radius);
        let rise = plate.temperatures.iter().map(|line| {
            let values = line.iter().copied().map(Some);
            values.collect::<Vec<Option<f64>>>()
        });
        Section {
            along: places(-1.0).rev().chain(places(1.0)).collect(),
            heights: plate.heights.iter().map(|each| height(*each)).collect(),
            rise: rise.clone().rev().chain(rise).collect(),
        }
    };
    let upper = mirrored(warm, &|height| floor + height);
    let mut lower = mirrored(cold, &|height| floor - height);
    lower.heights.reverse();
    lower.rise.iter_mut().for_each(|line| line.reverse());
    Some(vec![upper, lower])
}
