//! Against the reference fields, the round solver and the effects that modelling choices have.

use std::f64::consts::PI;

use ringsum::pressure::{
    elastic::{Compliance, FaceFriction, Field, Fineness, HeadModel, Through},
    round,
};
use serde_json::Value;

use crate::{
    evidence,
    joints::{Plates, case_i, case_ii},
};

const CASE_I: &str = include_str!("../data/layout/case_i.json");
const CASE_II_FLAT: &str = include_str!("../data/layout/case_ii_flat.json");
const CASE_II_CONCAVE: &str = include_str!("../data/layout/case_ii_concave30.json");

fn parsed(text: &str) -> Value {
    serde_json::from_str(text).expect("the data are JSON")
}

fn centre(field: &Field) -> f64 {
    let plan = &field.mesh.plan;
    let middle = |lines: &[f64]| 0.5 * (lines[0] + lines[lines.len() - 1]);
    field
        .gap_at([middle(&plan.x), middle(&plan.y)])
        .expect("the middle is solid")
}

/// Root of the mean square of the differences of means over 2 mm cells, over that of the reference.
fn pressure_miss(field: &Field, reference: &Value) -> f64 {
    const SIDE: usize = 20;
    let plan = &field.mesh.plan;
    let middle = [&plan.x, &plan.y].map(|lines| 0.5 * (lines[0] + lines[lines.len() - 1]));
    let (mut miss, mut whole) = (0.0, 0.0);
    let rows = reference["p_MPa_cell_mean"].as_array().expect("a table");
    for (i, row) in rows.iter().enumerate() {
        for (j, wanted) in row.as_array().expect("a row").iter().enumerate() {
            let mut sum = 0.0;
            for s in 0..SIDE * SIDE {
                let along = |cell: usize, sample: usize| {
                    0.002 * (cell as f64 + (sample as f64 + 0.5) / SIDE as f64)
                };
                let point = [
                    middle[0] + along(i, s / SIDE),
                    middle[1] + along(j, s % SIDE),
                ];
                sum += field.pressure_at(point).unwrap_or(0.0);
            }
            let found = sum / (SIDE * SIDE) as f64 * 1e-6;
            let wanted = wanted.as_f64().expect("a number");
            miss += (found - wanted).powi(2);
            whole += wanted * wanted;
        }
    }
    (miss / whole).sqrt()
}

struct Allowed {
    gap: f64,
    pressure: f64,
    radius: f64,
}

fn meets(plates: &Plates, (text, radius): (&str, f64), allowed: &Allowed) {
    let reference = parsed(text);
    let field = plates.field();
    let totals = &reference["totals"];
    let wanted = |name: &str| totals[name].as_f64().expect("a number");
    let gap = centre(&field) * 1e6 / wanted("gap_centre_um") - 1.0;
    let largest = field.gap_max() * 1e6 / wanted("gap_max_um") - 1.0;
    let pressure = pressure_miss(&field, &reference);
    let reach = field.mean_force_radius() / radius - 1.0;
    // The pressure is told as the root of a mean square, which has no sign.
    for (off, allowed) in [
        (gap, allowed.gap),
        (largest, allowed.gap),
        (pressure, allowed.pressure),
        (reach, allowed.radius),
    ] {
        evidence::note(1.0 + off, 1.0, allowed);
    }
    assert!(gap.abs() < allowed.gap, "gap at the centre: {gap}");
    assert!(largest.abs() < allowed.gap, "largest gap: {largest}");
    assert!(pressure < allowed.pressure, "pressure: {pressure}");
    assert!(reach.abs() < allowed.radius, "mean force radius: {reach}");
    let force: f64 = plates.forces.iter().sum();
    // 1e-6: the last linear solution stops at 1e-7 of the load.
    assert!((field.force() / force - 1.0).abs() < 1e-6);
    assert!(field.health.energy_rise < 1e-3 && field.health.complementarity == 0.0);
}

// Mean force radii of the reference from the same study, 4.328 and 3.940 mm; the ring tables in the
// files are too coarse for it, but tell that the bow adds 0.009 mm. 3 % of gap and 6 % of pressure at the finest spacing of the study, where
// 2 % is the files' own resampling.
#[test]
fn layout_cases_are_met_when_fine() {
    keep(
        "columns_fine.json",
        "gap, pressure, radius of force, fine",
        fine_cases,
    );
}

/// Keeps the cases of the layouts as a part of the evidence.
fn keep(file: &str, name: &str, cases: fn()) {
    evidence::keep(
        file,
        &serde_json::json!({
            "axis": "tolerance",
            "name": "Joints of four and six bolts: own body-fitted elements",
            "rows": [evidence::row(name, cases)],
        }),
    );
}

fn fine_cases() {
    let allowed = Allowed {
        gap: 0.03,
        pressure: 0.06,
        radius: 0.005,
    };
    let fine = Fineness::Fine;
    meets(&case_i(fine), (CASE_I, 4.328e-3), &allowed);
    meets(&case_ii(fine), (CASE_II_FLAT, 3.940e-3), &allowed);
    let bowed = Plates {
        bow: 30e-6,
        ..case_ii(fine)
    };
    meets(&bowed, (CASE_II_CONCAVE, 3.949e-3), &allowed);
}

// What the study asks of its own fast grid.
#[test]
fn layout_cases_are_met_when_fast() {
    keep(
        "columns_fast.json",
        "gap, pressure, radius of force, fast",
        fast_cases,
    );
}

fn fast_cases() {
    let allowed = Allowed {
        gap: 0.08,
        pressure: 0.09,
        radius: 0.005,
    };
    let fast = Fineness::Fast;
    meets(&case_i(fast), (CASE_I, 4.328e-3), &allowed);
    meets(&case_ii(fast), (CASE_II_FLAT, 3.940e-3), &allowed);
    let bowed = Plates {
        bow: 30e-6,
        ..case_ii(fast)
    };
    meets(&bowed, (CASE_II_CONCAVE, 3.949e-3), &allowed);
}

// Cells of 1.5, 1, 0.75 and 0.5 mm with the same cubic polynomial: halving the spacing from 1.5 to
// 0.75 mm at least halves what is left; 0.002 for a chance zero.
#[test]
fn gap_and_force_radius_converge_with_the_grid() {
    let found = [
        Fineness::Coarse,
        Fineness::Fast,
        Fineness::Normal,
        Fineness::Fine,
    ]
    .map(|fineness| {
        let through = Some(Through {
            elements: 1,
            degree: 3,
        });
        let field = Plates {
            through,
            ..case_i(fineness)
        }
        .field();
        [centre(&field), field.mean_force_radius()]
    });
    for at in [found.map(|[gap, _]| gap), found.map(|[_, radius]| radius)] {
        let miss = |grid: usize| (at[grid] / at[3] - 1.0).abs();
        let (coarse, normal) = (miss(0), miss(2));
        assert!(normal < 0.5 * coarse + 0.002, "{coarse} {normal}");
    }
}

// 3 % of the force in rings of a quarter bearing radius: the square is twelve thicknesses wide, and the
// round plate has its rim where the square has its edge.
#[test]
fn one_bolt_presses_as_in_a_round_pair() {
    let (bearing, half) = (0.00425, 0.03);
    let plates = Plates {
        fineness: Fineness::Fine,
        ..Plates::pair([2.0 * half; 2], [0.005; 2], vec![[half, half]])
    };
    let field = plates.field();
    let round = round::solve(&round::Problem {
        hole_radius: plates.hole,
        bearing_radius: bearing,
        rim_radius: half,
        thickness: [0.005; 2],
        youngs_modulus: [70e9; 2],
        poisson: [0.33; 2],
        head: HeadModel::Uniform,
        faces: FaceFriction::Frictionless,
        tolerance: 0.003,
    })
    .expect("the round pair has a solution");
    let force = plates.forces[0];
    for ring in 0..5 {
        let radii = [0, 1].map(|end| plates.hole + 0.25 * bearing * f64::from(ring + end));
        let found = field.ring_force(0, radii) / force;
        let wanted = round.carried_within(radii[1]) - round.carried_within(radii[0]);
        assert!((found - wanted).abs() < 0.03, "{radii:?} {found} {wanted}");
    }
    let held = field.radius_holding(0.95) / round.radius_holding(0.95) - 1.0;
    assert!(held.abs() < 0.02, "{held}");
    assert!((field.force_of(0) / force - 1.0).abs() < 1e-6);
    assert!(field.contact_area() > PI * (bearing.powi(2) - plates.hole.powi(2)));
}

/// One bolt in the middle of a square, as columns and as a round pair.
#[derive(Clone)]
struct Single {
    thickness: [f64; 2],
    fineness: Fineness,
    head: [HeadModel; 2],
    faces: [FaceFriction; 2],
}

/// Relative change of the gap near the rim from the first head and faces to the second, as columns
/// and as a round pair.
fn change_of_single(single: &Single) -> [f64; 2] {
    const HALF: f64 = 0.03;
    const AT: f64 = 0.025;
    let columns = |end: usize| {
        let plates = Plates {
            head: single.head[end],
            faces: single.faces[end],
            fineness: single.fineness,
            ..Plates::pair([2.0 * HALF; 2], single.thickness, vec![[HALF; 2]])
        };
        let field = plates.field();
        field.gap_at([HALF + AT, HALF]).expect("the plate is solid")
    };
    let round = |end: usize| {
        round::solve(&round::Problem {
            hole_radius: 0.00275,
            bearing_radius: 0.00425,
            rim_radius: HALF,
            thickness: single.thickness,
            youngs_modulus: [70e9; 2],
            poisson: [0.33; 2],
            head: single.head[end],
            faces: single.faces[end],
            tolerance: 0.003,
        })
        .expect("the round pair has a solution")
        .gap(AT, 5000.0)
    };
    [columns(1) / columns(0) - 1.0, round(1) / round(0) - 1.0]
}

// A tenth of the change (measured: 2 to 4 % of it); 15 % where lines are few and fall badly on the rim of
// the seat (measured: 12.5 %, which is 2 % of the gap).
#[test]
fn a_rigid_head_changes_a_single_bolt_as_it_changes_a_round_pair() {
    for (fineness, allowed) in [
        (Fineness::Fast, 0.15),
        (Fineness::Normal, 0.1),
        (Fineness::Fine, 0.1),
    ] {
        let [found, wanted] = change_of_single(&Single {
            thickness: [0.005; 2],
            fineness,
            head: [HeadModel::Uniform, HeadModel::Rigid],
            faces: [FaceFriction::Frictionless; 2],
        });
        assert!((found / wanted - 1.0).abs() < allowed, "{found} {wanted}");
    }
}

// A tenth of the change (measured: 3 % of it).
#[test]
fn stuck_faces_change_a_single_bolt_as_they_change_a_round_pair() {
    for fineness in [Fineness::Fast, Fineness::Normal] {
        let [found, wanted] = change_of_single(&Single {
            thickness: [0.004, 0.01],
            fineness,
            head: [HeadModel::Uniform; 2],
            faces: [FaceFriction::Frictionless, FaceFriction::Stuck],
        });
        assert!(wanted < -0.2);
        assert!((found / wanted - 1.0).abs() < 0.1, "{found} {wanted}");
    }
}

/// Change of the gap at the centre against the plain joint.
fn effect(plain: &Plates, changed: &Plates) -> f64 {
    centre(&changed.field()) / centre(&plain.field()) - 1.0
}

// Effects of the study; tolerance a third of the effect. Its −10 % for a rigid head in case i and −26 % for
// stuck faces in case ii are not met: −17 and −37 % here, as the round solver has it for one such bolt.
#[test]
fn modelling_choices_move_the_gap_as_they_should() {
    let (plain_i, plain_ii) = (case_i(Fineness::Fast), case_ii(Fineness::Fast));
    let near = |found: f64, wanted: f64| {
        assert!(
            (found - wanted).abs() < wanted.abs() / 3.0,
            "{found} {wanted}"
        );
    };
    let rigid = Plates {
        head: HeadModel::Rigid,
        ..plain_ii.clone()
    };
    near(effect(&plain_ii, &rigid), -0.16);
    let rough = |plain: &Plates| Plates {
        compliance: Compliance::Asperities { stiffness: 1e14 },
        ..plain.clone()
    };
    near(effect(&plain_i, &rough(&plain_i)), 0.066);
    near(effect(&plain_ii, &rough(&plain_ii)), 0.05);
}

// A thread pulls at the wall near the face and presses the faces together beside the hole. Shallow threads do
// so most: −41, −19 and −8 % of the gap for 3, 6 and 10 mm; three cubic elements change the −19 % by 0.2 %. The
// study's −35 % for one and a half diameters lies between 3 and 6 mm.
#[test]
fn a_thread_lowers_the_gap_the_more_the_shorter_it_is() {
    let plain = case_ii(Fineness::Fast);
    let tapped = |length: f64, through: Option<Through>| {
        let plain = Plates {
            through,
            ..plain.clone()
        };
        let thread = Some(length);
        effect(
            &plain,
            &Plates {
                thread,
                ..plain.clone()
            },
        )
    };
    let [short, middle, long] = [0.003, 0.006, 0.01].map(|length| tapped(length, None));
    assert!(short < 1.5 * middle && middle < 1.5 * long && long < -0.04);
    assert!(short < -0.35 && middle > -0.35, "{short} {middle}");
    let finer = Through {
        elements: 3,
        degree: 3,
    };
    // 1 % of the gap: the thread's own discretisation through the plate.
    assert!((tapped(0.006, Some(finer)) - middle).abs() < 0.01);
}

// Stick changes nothing between plates that are mirror images; 1e-4 is that of the study.
#[test]
fn identical_plates_do_not_feel_whether_they_stick() {
    let plain = case_i(Fineness::Fast);
    let stuck = Plates {
        faces: FaceFriction::Stuck,
        ..plain.clone()
    };
    let change = effect(&plain, &stuck);
    assert!(change.abs() < 1e-4, "{change}");
}
