//! Joints that mirror: one half or one quarter is solved and stands for the whole.

use crate::{
    numerics::columns::Mirror,
    pressure::elastic::{
        Bolt, End, FaceField, Failure, Field, Mesh, Problem,
        field::State,
        newton::{self, Start},
        system::System,
    },
};

/// Lengths and forces that differ by this share are the same.
const SAME: f64 = 1e-9;
/// Samples of a cell of 256 that may lie elsewhere in its image: outlines pass through some.
const SAMPLES: f64 = 2.0 / 256.0;
/// Gaps that differ by this are the same, m.
const GAP: f64 = 1e-12;

/// Where a mirror may stand across x and across y: the middle of everything, where the outlines of
/// bodies and the places of bolts mirror about it; none where they do not.
///
/// Forces do not count here: grids are laid by it, and all fields of a joint share one.
pub(super) fn middles(problem: &Problem) -> [Option<f64>; 2] {
    [0, 1].map(|axis| {
        let ends = problem.bodies.iter().map(|body| body.bounds[axis]);
        let [low, high] = ends.fold([f64::INFINITY, f64::NEG_INFINITY], |[low, high], [a, b]| {
            [low.min(a), high.max(b)]
        });
        let middle = 0.5 * (low + high);
        let near = SAME * (high - low);
        let bodies = problem.bodies.iter().all(|body| {
            let [low, high] = body.bounds[axis];
            (0.5 * (low + high) - middle).abs() <= near
        });
        let holds = bodies
            && problem
                .bolts
                .iter()
                .all(|bolt| has_image(problem, bolt, (axis, middle), near));
        holds.then_some(middle)
    })
}

/// Whether the mirror has a like bolt at the image of one, and no seat crosses it off its axis.
fn has_image(problem: &Problem, bolt: &Bolt, (axis, middle): (usize, f64), near: f64) -> bool {
    let mut image = bolt.at;
    image[axis] = 2.0 * middle - image[axis];
    let off = (bolt.at[axis] - middle).abs();
    let clear = off <= near || off > reach(bolt);
    clear
        && problem.bolts.iter().any(|other| {
            (other.at[0] - image[0]).abs() <= near
                && (other.at[1] - image[1]).abs() <= near
                && other.head == bolt.head
                && other.end == bolt.end
                && other.hole_radii == bolt.hole_radii
        })
}

/// Whether every bolt has the force of the one at its image.
fn forces_mirror(problem: &Problem, (axis, middle): (usize, f64)) -> bool {
    problem.bolts.iter().all(|bolt| {
        let mut image = bolt.at;
        image[axis] = 2.0 * middle - image[axis];
        let off = |other: &Bolt| (other.at[0] - image[0]).hypot(other.at[1] - image[1]);
        let nearest = problem
            .bolts
            .iter()
            .min_by(|a, b| off(a).total_cmp(&off(b)));
        nearest.is_some_and(|other| (other.force - bolt.force).abs() <= SAME * bolt.force)
    })
}

/// Largest radius that belongs to a bolt, m.
fn reach(bolt: &Bolt) -> f64 {
    let end = match bolt.end {
        End::Nut(seat) => seat.outer,
        End::Thread { radius, .. } => radius,
    };
    let holes = bolt.hole_radii.iter().copied().fold(0.0, f64::max);
    bolt.head.outer.max(end).max(holes)
}

/// The mirror of a problem on its mesh; none where nothing mirrors.
///
/// Bodies, holes, feet and inlays are compared cell by cell, initial gaps column by column.
pub(super) fn mirror(problem: &Problem, mesh: &Mesh) -> Option<Mirror> {
    let middles = middles(problem);
    let alone = [[true, false], [false, true]];
    let holds = |wanted: [bool; 2]| {
        Mirror::of(&mesh.plan, wanted).filter(|mirror| mirrors(problem, mesh, mirror))
    };
    let along = [0, 1].map(|axis| {
        middles[axis].is_some_and(|middle| forces_mirror(problem, (axis, middle)))
            && holds(alone[axis]).is_some()
    });
    Mirror::of(&mesh.plan, along)
}

fn mirrors(problem: &Problem, mesh: &Mesh, mirror: &Mirror) -> bool {
    let even_cells = |shares: &[f64]| {
        shares.iter().enumerate().all(|(cell, share)| {
            let other = shares[mirror.original_cell(mirror.image_cell(cell))];
            (share - other).abs() <= SAMPLES
        })
    };
    let layers = mesh.bodies.iter().flat_map(|body| &body.layers);
    let shapes = layers.into_iter().all(|layer| {
        let inlay = layer.inlay.as_ref();
        even_cells(&layer.shares) && inlay.is_none_or(|inlay| even_cells(&inlay.shares()))
    });
    shapes
        && mesh
            .faces
            .iter()
            .zip(&problem.interfaces)
            .all(|(face, meeting)| {
                even_cells(&face.contact.shares())
                    && (0..mesh.plan.columns()).all(|column| {
                        let (image, reflected) = mirror.image(column);
                        reflected == [false; 2]
                            || face.weight[column] <= 0.0 && face.open_weight[column] <= 0.0
                            || {
                                let original = mesh.plan.place(mirror.original(image));
                                let gap = (meeting.gap)(mesh.plan.place(column));
                                (gap - (meeting.gap)(original)).abs() <= GAP
                            }
                    })
            })
}

/// Solves the part of a problem that its mirror leaves, and spreads the field over the whole.
pub(super) fn solve(
    problem: &Problem,
    (mesh, mirror): (Mesh, &Mirror),
    start: &Start,
) -> Result<Field, Failure> {
    let part = Problem {
        bolts: bolts(problem, mirror),
        ..problem.clone()
    };
    let on_part = mesh.part(mirror);
    let system = System::new(&part, &on_part, Some(mirror))?;
    let groups = system.operator.ranges().to_vec();
    let stride = system.load.len() / on_part.plan.columns();
    let previous = match start {
        Start::Field(field) if field.mesh.plan == *mirror.whole() => {
            // One that did not mirror has moved across the line, where nothing moves now.
            kept(field, (mirror, &on_part), stride).map(|mut kept| {
                system.operator.clear_held(&mut kept.state.displacement);
                kept
            })
        }
        _ => None,
    };
    let start = match &previous {
        Some(previous) => &Start::Field(previous),
        None => start,
    };
    let field = newton::solve(&part, (on_part, system), start)?;
    let bodies = problem.bodies.len();
    Ok(Field {
        faces: mesh
            .faces
            .iter()
            .zip(&field.faces)
            .map(|(face, part)| FaceField {
                weight: face.weight.clone(),
                full_weight: face.full_weight.clone(),
                open_weight: face.open_weight.clone(),
                pressure: mirror.spread(&part.pressure),
                gap: mirror.spread(&part.gap),
                open_gap: mirror.spread(&part.open_gap),
            })
            .collect(),
        mesh,
        bolts: Field::places(problem),
        health: field.health,
        state: State {
            displacement: spread(
                &field.state.displacement,
                mirror,
                (stride, &groups[..bodies]),
            ),
            active: field
                .state
                .active
                .iter()
                .map(|set| mirror.spread(set))
                .collect(),
        },
    })
}

/// Bolts of the part; one on a line of the mirror has a half of its force there.
fn bolts(problem: &Problem, mirror: &Mirror) -> Vec<Bolt> {
    let middles = middles(problem);
    let mut bolts = Vec::new();
    for bolt in &problem.bolts {
        let mut share = 1.0;
        for (axis, middle) in middles.iter().enumerate() {
            let Some(middle) = middle.filter(|_| mirror.across()[axis]) else {
                continue;
            };
            let off = bolt.at[axis] - middle;
            if off.abs() <= reach(bolt) {
                share *= 0.5;
            } else if off > 0.0 {
                share = 0.0;
            }
        }
        if share > 0.0 {
            bolts.push(Bolt {
                force: share * bolt.force,
                ..bolt.clone()
            });
        }
    }
    bolts
}

/// A field of the whole as a start for the part; none where its displacements are of another kind.
fn kept(field: &Field, (mirror, mesh): (&Mirror, &Mesh), stride: usize) -> Option<Field> {
    let displacement = &field.state.displacement;
    (displacement.len() == mirror.whole().columns() * stride).then(|| Field {
        mesh: mesh.clone(),
        faces: Vec::new(),
        bolts: Vec::new(),
        health: field.health.clone(),
        state: State {
            displacement: mirror.kept_vector(displacement, stride),
            active: field
                .state
                .active
                .iter()
                .map(|set| mirror.kept(set))
                .collect(),
        },
    })
}

/// Displacements of the part over the whole: those along a reflected axis turn round.
fn spread(part: &[f64], mirror: &Mirror, (stride, bodies): (usize, &[[usize; 2]])) -> Vec<f64> {
    let mut whole = mirror.spread_vector(part, stride);
    for (column, values) in whole.chunks_mut(stride).enumerate() {
        let (_, reflected) = mirror.image(column);
        for (axis, _) in reflected.iter().enumerate().filter(|(_, turned)| **turned) {
            for [first, count] in bodies {
                let nodes = count / 3;
                for value in &mut values[first + axis * nodes..][..nodes] {
                    *value = -*value;
                }
            }
        }
    }
    whole
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::pressure::elastic::{
        Annulus, Body, Compliance, FaceFriction, Fineness, HeadModel, Interface, Layer, resolution,
        solve, solve_from,
    };

    /// Three by two bolts on plates of 60 by 40 mm, nuts below or threads.
    fn bolts(end: End) -> Vec<Bolt> {
        let mut bolts = Vec::new();
        for x in [10e-3, 30e-3, 50e-3] {
            for y in [9e-3, 31e-3] {
                bolts.push(Bolt {
                    at: [x, y],
                    head: Annulus {
                        inner: 2.2e-3,
                        outer: 4.2e-3,
                    },
                    force: 2000.0,
                    hole_radii: vec![2.2e-3, 2.0e-3],
                    end,
                });
            }
        }
        bolts
    }

    /// Solves two plates with holes between the bolts; the field with and without mirrors.
    fn both(
        bolts: &[Bolt],
        (head, faces): (HeadModel, FaceFriction),
        gap: &(dyn Fn([f64; 2]) -> f64 + Sync),
        from: Option<&Field>,
    ) -> (Option<Mirror>, Field, Field) {
        let cover = |[x, y]: [f64; 2]| {
            (0.0..=60e-3).contains(&x)
                && (0.0..=40e-3).contains(&y)
                && (x - 20e-3).abs().min((x - 40e-3).abs()).hypot(y - 20e-3) > 3e-3
        };
        let body = |thickness: f64| Body {
            layers: vec![Layer {
                cover: &cover,
                thickness,
                youngs_modulus: 70e9,
                poisson: 0.33,
                through: None,
                inlay: None,
            }],
            main: 0,
            bounds: [[0.0, 60e-3], [0.0, 40e-3]],
        };
        let problem = Problem {
            bodies: vec![body(3e-3), body(4e-3)],
            interfaces: vec![Interface {
                gap,
                faces,
                compliance: Compliance::Hard,
            }],
            bolts: bolts.to_vec(),
            stops: [vec![20e-3], vec![]],
            head,
            fineness: Fineness::Fast,
            most_bytes: 1 << 30,
            progress: None,
        };
        let mesh = Mesh::new(&problem, resolution::plan(&problem).unwrap()).unwrap();
        let mirror = mirror(&problem, &mesh);
        let system = System::new(&problem, &mesh, None).unwrap();
        let whole = newton::solve(&problem, (mesh, system), &Start::Bolts).unwrap();
        let part = match from {
            Some(field) => solve_from(&problem, field).unwrap(),
            None => solve(&problem).unwrap(),
        };
        // A field spread over the whole is a start for the part again.
        let again = solve_from(&problem, &part).unwrap();
        assert!(again.health.newton_steps <= 2, "{:?}", again.health);
        (mirror, part, whole)
    }

    fn compare(part: &Field, whole: &Field) {
        let peak = |values: &[f64]| values.iter().copied().fold(0.0, f64::max);
        let [one, other] = [part, whole].map(|field| &field.faces[0]);
        let (pressure, gap) = (peak(&other.pressure), peak(&other.gap));
        for column in 0..other.pressure.len() {
            // Columns with a sliver of area have pressures of no meaning.
            if other.weight[column] > 0.2 * other.full_weight[column] {
                let off = (one.pressure[column] - other.pressure[column]).abs() / pressure;
                assert!(off < 1e-3, "pressure at {column}: {off:e}");
            }
            let off = (one.gap[column] - other.gap[column]).abs() / gap;
            assert!(off < 1e-4, "gap at {column}: {off:e}");
        }
        // Residual of 1e-7 of the load.
        assert!((one.force() / other.force() - 1.0).abs() < 1e-6);
        let most = peak(
            &whole
                .state
                .displacement
                .iter()
                .map(|u| u.abs())
                .collect::<Vec<_>>(),
        );
        for (one, other) in part
            .state
            .displacement
            .iter()
            .zip(&whole.state.displacement)
        {
            // The weak springs leave the rigid motions of the whole a little of their own.
            assert!(
                (one - other).abs() < 1e-2 * most,
                "{one:e} {other:e} {most:e}"
            );
        }
        assert_eq!(part.bolts, whole.bolts);
        assert_eq!(part.mesh, whole.mesh);
    }

    // Pressures differ by the residual, 1e-7 of the load, which single columns see blown up by the
    // stiffness of hard faces.
    #[test]
    fn a_quarter_stands_for_the_whole() {
        let nut = End::Nut(Annulus {
            inner: 2.2e-3,
            outer: 4.0e-3,
        });
        let thread = End::Thread {
            radius: 2.0e-3,
            length: 3e-3,
        };
        for (end, head, faces) in [
            (nut, HeadModel::Uniform, FaceFriction::Frictionless),
            (thread, HeadModel::Rigid, FaceFriction::Frictionless),
            (nut, HeadModel::Rigid, FaceFriction::Stuck),
        ] {
            let (mirror, part, whole) = both(&bolts(end), (head, faces), &|_| 0.0, None);
            assert_eq!(mirror.map(|mirror| mirror.across()), Some([true, true]));
            // A fourth of the columns and half of those on the lines.
            assert!(part.health.unknowns < whole.health.unknowns * 3 / 10);
            compare(&part, &whole);
        }
    }

    #[test]
    fn what_does_not_mirror_is_solved_whole() {
        let nut = End::Nut(Annulus {
            inner: 2.2e-3,
            outer: 4.0e-3,
        });
        let plain = (HeadModel::Uniform, FaceFriction::Frictionless);
        // A wedge along y, a few micrometres as faces have them.
        let (mirror, part, whole) = both(&bolts(nut), plain, &|[_, y]| 1e-4 * y, None);
        assert_eq!(mirror.map(|mirror| mirror.across()), Some([true, false]));
        compare(&part, &whole);
        // A start for a joint that mirrors, though it moved across the line itself.
        let (mirror, even, whole) = both(&bolts(nut), plain, &|_| 0.0, Some(&part));
        assert_eq!(mirror.map(|mirror| mirror.across()), Some([true, true]));
        compare(&even, &whole);
        let mut uneven = bolts(nut);
        uneven[0].force = 2100.0;
        let (mirror, field, _) = both(&uneven, plain, &|_| 0.0, None);
        assert_eq!(mirror, None);
        // Whatever the forces, all fields of a joint share one grid.
        assert_eq!(field.mesh, part.mesh);
        let mut shifted = bolts(nut);
        for bolt in &mut shifted {
            bolt.at[0] += 1e-3;
        }
        let (mirror, ..) = both(&shifted, plain, &|_| 0.0, None);
        assert_eq!(mirror.map(|mirror| mirror.across()), Some([false, true]));
    }
}
