//! One bolt in a disc against quadratic ring elements: nuts, threads, rigid heads, stuck faces.

use ringsum::pressure::elastic::{
    Annulus, Body, Bolt, Compliance, End, FaceFriction, Field, Fineness, HeadModel, Interface,
    Layer, Problem, solve,
};
use serde::Deserialize;

#[derive(Deserialize)]
struct Case {
    name: String,
    hole_mm: f64,
    bearing_mm: f64,
    rim_mm: f64,
    thickness_mm: [f64; 2],
    #[serde(rename = "modulus_GPa")]
    modulus: [f64; 2],
    poisson: f64,
    thread_mm: Option<f64>,
    head: String,
    faces: String,
    ring_mm: Vec<f64>,
    carried_inside: Vec<f64>,
    held_95_mm: f64,
    far_mm: Vec<f64>,
    #[serde(rename = "gap_um_per_kN")]
    gap: Vec<f64>,
}

fn cases(of: impl Fn(&Case) -> bool) -> Vec<Case> {
    let all: Vec<Case> =
        serde_json::from_str(include_str!("../data/single_bolt.json")).expect("the data are JSON");
    let chosen: Vec<Case> = all.into_iter().filter(of).collect();
    assert!(!chosen.is_empty());
    chosen
}

/// A field of 1 kN; beside the bolt, `others` that carry next to nothing.
fn field(case: &Case, fineness: Fineness, others: &[[f64; 2]]) -> Field {
    let rim = 1e-3 * case.rim_mm;
    let cover = |[x, y]: [f64; 2]| x.hypot(y) <= rim;
    let seat = |inner: f64, outer: f64| Annulus { inner, outer };
    let bolt = |at: [f64; 2], seat: Annulus, force: f64| Bolt {
        at,
        head: seat,
        force,
        hole_radii: vec![seat.inner; 2],
        end: case.thread_mm.map_or(End::Nut(seat), |length| End::Thread {
            radius: seat.inner,
            length: 1e-3 * length,
        }),
    };
    let body = |plate: usize| Body {
        layers: vec![Layer {
            cover: &cover,
            thickness: 1e-3 * case.thickness_mm[plate],
            youngs_modulus: 1e9 * case.modulus[plate],
            poisson: case.poisson,
            through: None,
            inlay: None,
        }],
        main: 0,
        bounds: [[-rim, rim]; 2],
    };
    let mut bolts = vec![bolt(
        [0.0; 2],
        seat(1e-3 * case.hole_mm, 1e-3 * case.bearing_mm),
        1e3,
    )];
    bolts.extend(
        others
            .iter()
            .map(|at| bolt(*at, seat(0.0, 0.15e-3 * case.bearing_mm), 1e-3)),
    );
    solve(&Problem {
        bodies: vec![body(0), body(1)],
        interfaces: vec![Interface {
            gap: &|_| 0.0,
            faces: match case.faces.as_str() {
                "stuck" => FaceFriction::Stuck,
                _ => FaceFriction::Frictionless,
            },
            compliance: Compliance::Hard,
        }],
        bolts,
        stops: [Vec::new(), Vec::new()],
        head: match case.head.as_str() {
            "rigid" => HeadModel::Rigid,
            _ => HeadModel::Uniform,
        },
        fineness,
        most_bytes: 2_000_000_000,
        progress: None,
    })
    .expect("the joint has a field")
}

struct Allowed {
    ring: f64,
    held: f64,
    /// Near and far.
    gap: [f64; 2],
}

fn meets(case: &Case, field: &Field, allowed: &Allowed) {
    let name = &case.name;
    let mut inner = [1e-3 * case.hole_mm, 0.0];
    for (outer, carried) in case.ring_mm.iter().zip(&case.carried_inside) {
        let found = field.ring_force(0, [inner[0], 1e-3 * outer]) / 1e3;
        let wanted = carried - inner[1];
        assert!(
            (found - wanted).abs() < allowed.ring,
            "{name}, ring to {outer}: {found} {wanted}"
        );
        inner = [1e-3 * outer, *carried];
    }
    let held = field.radius_holding(0.95) / (1e-3 * case.held_95_mm) - 1.0;
    assert!(held.abs() < allowed.held, "{name}: {held}");
    for ((far, wanted), allowed) in case.far_mm.iter().zip(&case.gap).zip(allowed.gap) {
        let at = |angle: f64| {
            let point = [angle.cos(), angle.sin()].map(|part| 1e-3 * far * part);
            field.gap_at(point).expect("the disc is solid")
        };
        let mean = (0..16).map(|k| at(0.13 + 0.39 * f64::from(k))).sum::<f64>() / 16.0;
        let miss = mean * 1e6 / wanted - 1.0;
        assert!(miss.abs() < allowed, "{name}, gap at {far}: {miss}");
    }
}

// 3 % of the force in any ring of half a seat's width, where a short thread leaves 1.6 % at the finest grid. Gaps
// grow from the last hundredths of the force radius: 0.5 % left of the far one and 2.1 % of the near one there.
const FINE: Allowed = Allowed {
    ring: 0.03,
    held: 0.02,
    gap: [0.04, 0.02],
};

#[test]
fn threads_press_as_shear_on_a_round_wall() {
    for case in cases(|case| case.head == "uniform" && case.faces != "stuck") {
        meets(&case, &field(&case, Fineness::Fine, &[]), &FINE);
    }
}

// Ratios b/a 1.3 to 2, t/b 0.5 and 1, unlike heights, moduli, Poisson's ratios 0.1 to 0.45; the thickest are left
// out for time (they came out within 1 % of the far gap). A thin plate and a narrow seat miss 5.5 and 4 % of the
// near gap, the first 3.3 % with a uniform head as well.
#[test]
fn rigid_heads_press_as_rigid_rings() {
    let allowed = Allowed {
        held: 0.035,
        gap: [0.08, 0.03],
        ..FINE
    };
    let thick = |case: &Case| case.thickness_mm[0] > 6.0;
    for case in cases(|case| case.head == "rigid" && !thick(case)) {
        meets(&case, &field(&case, Fineness::Fine, &[]), &allowed);
    }
}

// A seat that is 1.5 cells wide: rings are narrower than a cell, and 7 % of the force are left in the worst; a tenth
// of the far gap.
#[test]
fn rigid_heads_press_nearly_so_when_fast() {
    let allowed = Allowed {
        ring: 0.08,
        held: 0.15,
        gap: [0.22, 0.12],
    };
    for case in cases(|case| case.head == "rigid" && case.thickness_mm[0] <= 6.0) {
        meets(&case, &field(&case, Fineness::Fast, &[]), &allowed);
    }
}

// A narrow seat elsewhere, with its fine lines, must not harden the seat of a wide one: 4 % of the gap is a fifth
// of the effect of a rigid head.
#[test]
fn a_rigid_head_does_not_feel_the_fine_lines_of_another() {
    for case in cases(|case| case.name == "rigid, b/a 1.6, t/b 1, t2/t1 1") {
        let rim = 1e-3 * case.rim_mm;
        let with = field(&case, Fineness::Normal, &[[0.6 * rim, 0.5 * rim]]);
        let alone = field(&case, Fineness::Normal, &[]);
        let at = [0.0, 0.8 * rim];
        let gap = |field: &Field| field.gap_at(at).expect("the disc is solid");
        let change = gap(&with) / gap(&alone) - 1.0;
        assert!(change.abs() < 0.04, "{}: {change}", case.name);
    }
}

#[test]
fn stuck_faces_press_as_stuck_rings() {
    for case in cases(|case| case.faces == "stuck" || case.name == "nut") {
        meets(&case, &field(&case, Fineness::Fine, &[]), &FINE);
    }
}
