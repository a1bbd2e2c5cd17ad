//! Shapes beyond two equal plates: patches, three bodies, offsets, feet, ribs.

use ringsum::pressure::elastic::{
    Annulus, Body, Bolt, Compliance, Cover, End, FaceFriction, Field, Fineness, HeadModel,
    Interface, Layer, Problem, Through, solve,
};

use crate::joints::{Plates, crossings};

const SIDE: f64 = 0.04;
const SEAT: Annulus = Annulus {
    inner: 0.00275,
    outer: 0.00425,
};

fn square([x, y]: [f64; 2]) -> bool {
    (0.0..=SIDE).contains(&x) && (0.0..=SIDE).contains(&y)
}

fn layer<'a>(cover: &'a Cover<'a>, thickness: f64) -> Layer<'a> {
    Layer {
        cover,
        thickness,
        youngs_modulus: 70e9,
        poisson: 0.33,
        through: Some(Through {
            elements: 1,
            degree: 2,
        }),
        inlay: None,
    }
}

fn body(layers: Vec<Layer>, main: usize) -> Body {
    Body {
        layers,
        main,
        bounds: [[0.0, SIDE]; 2],
    }
}

/// Two bodies on one square with bolts near its corners.
fn solved(bodies: Vec<Body>) -> Field {
    let bolts = crossings(&[0.008, 0.032], &[0.008, 0.032])
        .into_iter()
        .map(|at| Bolt {
            at,
            head: SEAT,
            force: 4000.0,
            hole_radii: vec![SEAT.inner; 2],
            end: End::Nut(SEAT),
        });
    solve(&Problem {
        bodies,
        interfaces: vec![FLAT],
        bolts: bolts.collect(),
        stops: [vec![0.015, 0.025], vec![0.015, 0.025]],
        head: HeadModel::Uniform,
        fineness: Fineness::Coarse,
        most_bytes: 1_000_000_000,
        progress: None,
    })
    .expect("the joint has a field")
}

const FLAT: Interface = Interface {
    gap: &|_| 0.0,
    faces: FaceFriction::Frictionless,
    compliance: Compliance::Hard,
};

// 1e-6: a uniform stress is one of the fields that the columns hold exactly; left are weak springs and
// the last residual. A cut-out on grid lines takes the place of a hole, whose partial cells smear.
#[test]
fn uniform_pressure_goes_straight_through_unlike_plates() {
    let frame = |[x, y]: [f64; 2]| {
        square([x, y]) && !((0.015..=0.025).contains(&x) && (0.015..=0.025).contains(&y))
    };
    let everywhere = Annulus {
        inner: 0.0,
        outer: 0.0285,
    };
    let mut lower = layer(&frame, 0.007);
    lower.youngs_modulus = 200e9;
    lower.through = Some(Through {
        elements: 2,
        degree: 3,
    });
    let field = solve(&Problem {
        bodies: vec![body(vec![layer(&frame, 0.004)], 0), body(vec![lower], 0)],
        interfaces: vec![FLAT],
        bolts: vec![Bolt {
            at: [0.02, 0.02],
            head: everywhere,
            force: 10e6 * 0.0015,
            hole_radii: vec![0.0; 2],
            end: End::Nut(everywhere),
        }],
        stops: [
            vec![0.006, 0.015, 0.025, 0.032],
            vec![0.005, 0.015, 0.025, 0.031],
        ],
        head: HeadModel::Uniform,
        fineness: Fineness::Fine,
        most_bytes: 1_000_000_000,
        progress: None,
    });
    // A seat as wide as the plate asks for wide cells: the stops alone make the grid uneven.
    let field = field.expect("the patch has a field");
    assert!(field.mesh.plan.x.len() >= 6, "{:?}", field.mesh.plan.x);
    let face = &field.faces[0];
    for (column, pressure) in face.pressure.iter().enumerate() {
        if face.weight[column] > 0.0 {
            assert!((pressure / 10e6 - 1.0).abs() < 1e-6, "{column} {pressure}");
        }
    }
}

#[test]
fn three_bodies_carry_the_force_through_both_interfaces() {
    let plates = Plates {
        bounds: vec![[[0.0, 0.05], [0.0, 0.04]]; 3],
        thickness: vec![0.004, 0.003, 0.006],
        youngs_modulus: vec![70e9, 110e9, 200e9],
        fineness: Fineness::Coarse,
        ..Plates::pair(
            [0.05, 0.04],
            [0.004; 2],
            vec![[0.01, 0.012], [0.038, 0.026]],
        )
    };
    let field = plates.field();
    assert!(field.faces.len() == 2);
    for face in &field.faces {
        // 1e-6: the last linear solution stops at 1e-7 of the load.
        assert!((face.force() / 10e3 - 1.0).abs() < 1e-6);
    }
    // Force spreads on its way down.
    assert!(field.face(1).mean_force_radius() > field.face(0).mean_force_radius());
    assert!(field.health.complementarity == 0.0);
}

#[test]
fn a_small_plate_on_a_large_one_touches_only_there() {
    let small = [[0.013, 0.053], [0.009, 0.045]];
    let at = vec![[0.021, 0.017], [0.045, 0.037]];
    let large = Plates {
        bounds: vec![small, [[0.0, 0.09], [0.0, 0.07]]],
        fineness: Fineness::Fast,
        ..Plates::pair([0.09, 0.07], [0.004, 0.008], at)
    };
    let field = large.field();
    let plan = &field.mesh.plan;
    for (column, weight) in field.faces[0].weight.iter().enumerate() {
        let [x, y] = plan.place(column);
        let inside = (0.013..=0.053).contains(&x) && (0.009..=0.045).contains(&y);
        assert!(inside || *weight == 0.0, "{x} {y}");
    }
    let area = 0.04 * 0.036 - 2.0 * std::f64::consts::PI * 0.00275_f64.powi(2);
    let found: f64 = field.faces[0].weight.iter().sum();
    // 2e-3: holes sampled on cells.
    assert!((found / area - 1.0).abs() < 2e-3, "{found} {area}");
    assert!(field.health.force_balance.abs() < 1e-6);
    assert!(field.pressure_at([0.08, 0.06]).is_none() && field.gap_at([0.08, 0.06]).is_none());
    // Empty columns must not slow the solution: no more iterations than twice those of a full pair.
    let full = Plates {
        bounds: vec![[[0.0, 0.09], [0.0, 0.07]]; 2],
        ..large.clone()
    }
    .field();
    assert!(field.health.cg_iterations < 2 * full.health.cg_iterations);
    // The lower plate is large beside the upper one: its overhang hardly stiffens what lies between.
    let cut = Plates {
        bounds: vec![small; 2],
        ..large
    }
    .field();
    let change = field.peak_pressure() / cut.peak_pressure() - 1.0;
    assert!(change.abs() < 0.1, "{change}");
}

#[test]
fn feet_carry_all_the_force_and_hold_the_rest_apart() {
    let pads = |[x, y]: [f64; 2]| {
        square([x, y]) && !(0.015..=0.025).contains(&x) && !(0.015..=0.025).contains(&y)
    };
    let height = 0.0005;
    let field = solved(vec![
        body(vec![layer(&square, 0.005), layer(&pads, height)], 0),
        body(vec![layer(&square, 0.005)], 0),
    ]);
    assert!(field.health.force_balance.abs() < 1e-6);
    let gap = field.gap_at([0.02, 0.02]).expect("the plates overlap");
    // The plates bow by micrometres about the height of the feet.
    assert!((gap - height).abs() < 0.05 * height, "{gap}");
    assert!(field.pressure_at([0.02, 0.02]).is_none());
    let face = &field.faces[0];
    let feet: f64 = face.weight.iter().sum();
    let beside: f64 = face.open_weight.iter().sum();
    let holes = 4.0 * std::f64::consts::PI * SEAT.inner.powi(2);
    // 1 %: holes sampled on cells.
    assert!(
        (feet / (4.0 * 0.015 * 0.015 - holes) - 1.0).abs() < 0.01,
        "{feet}"
    );
    assert!(
        (beside / (SIDE * SIDE - 4.0 * 0.015 * 0.015) - 1.0).abs() < 1e-9,
        "{beside}"
    );
    let mean = field.gap_mean();
    assert!(mean > 0.9 * height * beside / (feet + beside) && mean < height);
}

#[test]
fn a_rib_stiffens_and_a_rib_all_over_is_a_thicker_plate() {
    let rib = |[x, y]: [f64; 2]| square([x, y]) && (0.015..=0.025).contains(&x);
    let plain = solved(vec![
        body(vec![layer(&square, 0.003)], 0),
        body(vec![layer(&square, 0.003)], 0),
    ]);
    let ribbed = solved(vec![
        body(vec![layer(&rib, 0.006), layer(&square, 0.003)], 1),
        body(vec![layer(&square, 0.003)], 0),
    ]);
    let middle = |field: &Field| field.gap_at([0.02, 0.02]).expect("the plates overlap");
    let relief = middle(&ribbed) / middle(&plain);
    // Twice the thickness over a quarter of the plate takes a tenth and more of the gap away.
    assert!(relief < 0.9 && relief > 0.2, "{relief}");
    let stacked = solved(vec![
        body(vec![layer(&square, 0.003), layer(&square, 0.003)], 0),
        body(vec![layer(&square, 0.003)], 0),
    ]);
    let mut whole = layer(&square, 0.006);
    whole.through = Some(Through {
        elements: 2,
        degree: 2,
    });
    let thick = solved(vec![
        body(vec![whole], 0),
        body(vec![layer(&square, 0.003)], 0),
    ]);
    // The same equations, summed in another order and with weaker springs; 1e-5 as residuals go.
    let change = middle(&stacked) / middle(&thick) - 1.0;
    assert!(change.abs() < 1e-5, "{change}");
}
