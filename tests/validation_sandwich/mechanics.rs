//! Sandwich panels under bolts: a soft core in bending, a stiff one as a solid plate, proud flanges.

use ringsum::{
    numerics::{
        columns::{Layer as Bonded, Operator, Plan, Solid, Tie, lumped, span_loads},
        multigrid::{Coarsening, Effort, Multigrid, conjugate_gradients},
    },
    pressure::elastic::{
        Annulus, Body, Bolt, Compliance, Cover, End, FaceFriction, Field, Fineness, HeadModel,
        Height, Inlay, Interface, Layer, Problem, Through, solve,
    },
};

use crate::even;

fn constants(modulus: f64) -> Solid {
    // Poisson's ratio 0: the beam of the textbook.
    Solid {
        first: 0.0,
        shear: 0.5 * modulus,
        ground: [0.0; 2],
    }
}

/// End deflection of a cantilever of three layers per newton, m: length, width, moduli, thicknesses.
fn cantilever([length, width]: [f64; 2], layers: [[f64; 2]; 3], parts: usize) -> f64 {
    let plan = Plan::new(even(length, parts), even(width, 1));
    let shares = vec![1.0; plan.cells()];
    let nodes = 7;
    let mut operator = Operator::<Solid>::new(&plan, &[3 * nodes]);
    for (index, [modulus, height]) in layers.into_iter().enumerate() {
        operator.add_layer(&Bonded {
            shares: &shares,
            group: 0,
            first_node: 2 * index,
            heights: &[height],
            degree: 2,
            constants: constants(modulus),
        });
    }
    let held: Vec<f64> = (0..plan.columns())
        .map(|column| {
            if plan.place(column)[0] == 0.0 {
                1e13
            } else {
                0.0
            }
        })
        .collect();
    for component in 0..3 {
        for node in 0..nodes {
            operator.add_tie(Tie {
                plus: operator.unknown(0, component, node),
                minus: None,
                stencil: lumped(&held),
            });
        }
    }
    // The core carries the shear, evenly over its height.
    let core = [layers[1][1]];
    let mut load = operator.zeros();
    for column in (0..plan.columns()).filter(|column| plan.place(*column)[0] >= length) {
        for (step, part) in span_loads(&core, 2, [0.0, core[0]]).into_iter().enumerate() {
            let at = operator.place(column, operator.unknown(0, 2, 2 + step));
            load[at] = 0.5 * part / core[0];
        }
    }
    let mut multigrid = Multigrid::new(&operator, Coarsening::FULL).expect("it is held");
    let mut moved = operator.zeros();
    let effort = Effort {
        tolerance: 1e-9,
        energy: None,
        reference: None,
        most: 4000,
    };
    conjugate_gradients(&operator, &mut multigrid, (&load, &mut moved), &effort)
        .unwrap_or_else(|stalled| panic!("{} {:e}", stalled.iterations, stalled.residual));
    operator.dot(&load, &moved)
}

// Sandwich theory (Allen 1969, Analysis and Design of Structural Sandwich Panels, from memory):
// w = P L³/(3 D) + P L/S,  D = b (E_f t d²/2 + E_f t³/6 + E_c c³/12),  S = b G_c d²/c.
// Moduli 100 and 1400 to 1; of the softer one half of the deflection is shear. 1 %: the plan's error of
// 64 cells, and the end that cannot warp, which theory leaves free.
#[test]
fn a_soft_core_bends_as_a_sandwich_beam() {
    let [length, width] = [0.25, 0.02];
    let (sheet, core, modulus) = (0.5e-3, 19e-3, 70e9);
    for soft in [700e6, 50e6] {
        let layers = [[modulus, sheet], [soft, core], [modulus, sheet]];
        let found = cantilever([length, width], layers, 64);
        let d = core + sheet;
        let bending = width
            * (0.5 * modulus * sheet * d * d
                + modulus * sheet.powi(3) / 6.0
                + soft * core.powi(3) / 12.0);
        let shear = width * 0.5 * soft * d * d / core;
        let exact = length.powi(3) / (3.0 * bending) + length / shear;
        let off = found / exact - 1.0;
        assert!(off.abs() < 1e-2, "{soft:e} {off}");
    }
}

const SIDE: f64 = 0.06;
const AT: [f64; 2] = [0.03, 0.03];
const FLANGE: f64 = 0.008;
const SEAT: Annulus = Annulus {
    inner: 0.0022,
    outer: 0.0045,
};

fn square([x, y]: [f64; 2]) -> bool {
    (0.0..=SIDE).contains(&x) && (0.0..=SIDE).contains(&y)
}

fn on_flange([x, y]: [f64; 2]) -> bool {
    (x - AT[0]).hypot(y - AT[1]) <= FLANGE
}

fn layer<'a>(cover: &'a Cover<'a>, thickness: f64, modulus: f64) -> Layer<'a> {
    Layer {
        cover,
        thickness,
        youngs_modulus: modulus,
        poisson: 0.33,
        through: Some(Through {
            elements: 1,
            degree: 2,
        }),
        inlay: None,
    }
}

/// Three layers with an insert as stiff as the sheets in all.
fn sandwich<'a>([sheet, core]: [f64; 2], modulus: f64) -> Vec<Layer<'a>> {
    let filled = |thickness: f64, modulus: f64| Layer {
        inlay: Some(Inlay {
            cover: &on_flange,
            youngs_modulus: 70e9,
            poisson: 0.33,
        }),
        ..layer(&square, thickness, modulus)
    };
    vec![
        filled(sheet, 70e9),
        filled(core, modulus),
        filled(sheet, 70e9),
    ]
}

fn solved(panel: Vec<Layer>, (force, gap): (f64, &Height)) -> Field {
    let bounds = [[0.0, SIDE]; 2];
    let bodies = vec![
        Body {
            layers: vec![layer(&square, 4e-3, 70e9)],
            main: 0,
            bounds,
        },
        Body {
            layers: panel,
            main: 0,
            bounds,
        },
    ];
    let found = solve(&Problem {
        bodies,
        interfaces: vec![Interface {
            gap,
            faces: FaceFriction::Frictionless,
            compliance: Compliance::Hard,
        }],
        bolts: vec![Bolt {
            at: AT,
            head: SEAT,
            force,
            hole_radii: vec![0.0022; 2],
            end: End::Thread {
                radius: 0.0022,
                length: 9e-3,
            },
        }],
        stops: [Vec::new(), Vec::new()],
        head: HeadModel::Uniform,
        fineness: Fineness::Coarse,
        most_bytes: 1_000_000_000,
        progress: None,
    });
    found.expect("the joint has a field")
}

// The same grid and polynomials, so that only the weak springs, which know the layers' thickness, and
// the last residual differ: 1e-4 of the peak.
#[test]
fn a_core_as_stiff_as_its_sheets_is_a_solid_plate() {
    let solid = Layer {
        through: Some(Through {
            elements: 3,
            degree: 2,
        }),
        ..layer(&square, 12e-3, 70e9)
    };
    let solid = solved(vec![solid], (2000.0, &|_| 0.0));
    let layered = solved(sandwich([4e-3, 4e-3], 70e9), (2000.0, &|_| 0.0));
    let peak = |field: &Field| {
        let face = &field.faces[0];
        let held = face.pressure.iter().zip(&face.weight);
        held.filter(|(_, weight)| **weight > 1e-7)
            .map(|(pressure, _)| *pressure)
            .fold(0.0, f64::max)
    };
    let whole = peak(&solid);
    for (one, other) in solid.faces[0]
        .pressure
        .iter()
        .zip(&layered.faces[0].pressure)
    {
        assert!((one - other).abs() < 1e-4 * whole, "{one} {other}");
    }
    // A core a hundred times softer is another plate, unless an insert as wide as the contact fills it.
    let moved = |panel: Vec<Layer>| {
        let other = solved(panel, (2000.0, &|_| 0.0));
        let pairs = solid.faces[0].pressure.iter().zip(&other.faces[0].pressure);
        let moved = pairs.map(|(one, other)| (one - other).abs());
        moved.fold(0.0, f64::max) / whole
    };
    let filled = sandwich([0.5e-3, 11e-3], 0.7e9);
    let hollow = filled.iter().map(|layer| Layer {
        inlay: None,
        ..layer.clone()
    });
    let [hollow, filled] = [moved(hollow.collect()), moved(filled)];
    assert!(hollow > 0.05 && filled < 0.02, "{hollow} {filled}");
}

// The force stays on a proud flange: beside it faces stay apart, so that 1e-6 of the force is rounding. Contact on a flat flange does not depend on the force, so what bending adds to the height grows
// in proportion to it: 1e-3, the residual of two solutions.
#[test]
fn a_proud_flange_carries_all_force_and_leaves_its_height_open() {
    let proud = 50e-6;
    let gap = move |point: [f64; 2]| if on_flange(point) { 0.0 } else { proud };
    let fields =
        [500.0, 1000.0].map(|force| solved(sandwich([0.5e-3, 11e-3], 0.7e9), (force, &gap)));
    let plan = &fields[0].mesh.plan;
    for (field, force) in fields.iter().zip([500.0, 1000.0]) {
        let face = &field.faces[0];
        let mut sums = [0.0; 2];
        for (column, (pressure, weight)) in face.pressure.iter().zip(&face.weight).enumerate() {
            sums[usize::from(on_flange(plan.place(column)))] += pressure * weight;
        }
        assert!(sums[0].abs() < 1e-6 * force, "{sums:?}");
        assert!((sums[1] / force - 1.0).abs() < 1e-3, "{sums:?}");
    }
    let [one, two] = [0, 1].map(|index| &fields[index].faces[0]);
    let mut seen = 0;
    for column in 0..plan.columns() {
        let place = plan.place(column);
        if (place[0] - AT[0]).hypot(place[1] - AT[1]) < 1.5 * FLANGE || one.weight[column] <= 0.0 {
            continue;
        }
        let bent = [one, two].map(|face| face.gap[column] - proud);
        assert!(bent[0] > -proud && bent[0].abs() > 1e-9, "{bent:?}");
        assert!((bent[1] / bent[0] - 2.0).abs() < 1e-3, "{bent:?}");
        seen += 1;
    }
    assert!(seen > 20, "{seen}");
}
