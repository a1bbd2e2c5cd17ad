//! Pressure cone, ring sum and ring network against axisymmetric finite-element solutions.

#[path = "shared/bessel.rs"]
mod bessel;

use std::{collections::BTreeMap, f64::consts::PI};

use bessel::bessel;
use ringsum::{
    joint::{ConeRule, ConeShape, Outline, Sink, Source, Zone},
    pressure::{Cone, Pair, cone},
    resistance::{
        Load, Plan, Site,
        annulus::{Annulus, Ends},
        cells,
        cells::DEFAULT_RINGS,
        network::edges,
    },
};
use serde::Deserialize;

#[derive(Deserialize)]
#[allow(non_snake_case)]
struct Inputs {
    a: f64,
    b: f64,
    Ro: f64,
    t1: f64,
    t2: f64,
    E1: f64,
    E2: f64,
    nu1: f64,
    nu2: f64,
    k1: f64,
    k2: f64,
}

#[derive(Deserialize)]
struct Heat {
    #[serde(rename = "R_total")]
    total: BTreeMap<String, f64>,
    #[serde(rename = "R_default_power")]
    closed_form: BTreeMap<String, f64>,
    #[serde(rename = "R_ref_field")]
    listed_field: BTreeMap<String, f64>,
    #[serde(rename = "R_with_gap")]
    with_gap: BTreeMap<String, f64>,
}

#[derive(Deserialize)]
#[allow(non_snake_case)]
struct Case {
    id: String,
    inputs: Inputs,
    c_over_b: f64,
    Gsum95: f64,
    r_station: Vec<f64>,
    p_station: Vec<f64>,
    R_1D: f64,
    bc: BTreeMap<String, Heat>,
}

fn cases() -> Vec<Case> {
    serde_json::from_str(include_str!("data/axisym_public.json"))
        .expect("the data file is part of the test")
}

impl Case {
    fn pair(&self) -> Pair {
        let i = &self.inputs;
        Pair {
            hole_radius: i.a,
            bearing_radius: i.b,
            rim_radius: i.Ro,
            thickness: [i.t1, i.t2],
            plane_modulus: [i.E1 / (1.0 - i.nu1 * i.nu1), i.E2 / (1.0 - i.nu2 * i.nu2)],
        }
    }

    /// Force that makes the mean pressure under the head 1.
    fn force(&self) -> f64 {
        PI * (self.inputs.b.powi(2) - self.inputs.a.powi(2))
    }

    fn annulus(&self, contact_radius: f64, rings: usize) -> Annulus {
        let i = &self.inputs;
        Annulus {
            edges: edges(i.a, contact_radius, i.Ro, rings),
            thickness: [i.t1, i.t2],
            conductivity: [i.k1, i.k2],
        }
    }

    fn closed_form(&self) -> Cone {
        cone(&self.pair(), ConeRule::Fitted, ConeShape::Fitted)
    }
}

fn ends(name: &str) -> Ends {
    match name {
        "isothermal" => Ends::Isothermal,
        "flux" => Ends::Flux,
        _ => Ends::Lap,
    }
}

/// Radii, pressures of the reference solution with a monotone cubic between its stations.
///
/// p² is smooth where contact ends, so it is interpolated instead of p.
struct Listed {
    radius: Vec<f64>,
    squared: Vec<f64>,
    slope: Vec<f64>,
}

impl Listed {
    fn new(case: &Case) -> Self {
        let radius = case.r_station.clone();
        let squared: Vec<f64> = case.p_station.iter().map(|p| p * p).collect();
        let last = radius.len() - 1;
        let steps: Vec<f64> = (0..last)
            .map(|i| (squared[i + 1] - squared[i]) / (radius[i + 1] - radius[i]))
            .collect();
        let slope = (0..=last)
            .map(|i| match i {
                0 => steps[0],
                i if i == last => steps[last - 1],
                i if steps[i - 1] * steps[i] <= 0.0 => 0.0,
                i => 2.0 * steps[i - 1] * steps[i] / (steps[i - 1] + steps[i]),
            })
            .collect();
        Self {
            radius,
            squared,
            slope,
        }
    }

    fn pressure(&self, r: f64) -> f64 {
        let last = self.radius.len() - 1;
        if !(self.radius[0] <= r && r <= self.radius[last]) {
            return 0.0;
        }
        let i = self.radius[1..last].partition_point(|edge| *edge < r);
        let width = self.radius[i + 1] - self.radius[i];
        let x = (r - self.radius[i]) / width;
        let (y0, y1) = (self.squared[i], self.squared[i + 1]);
        let (d0, d1) = (self.slope[i] * width, self.slope[i + 1] * width);
        let cubic =
            y0 + x * (d0 + x * (3.0 * (y1 - y0) - 2.0 * d0 - d1 + x * (2.0 * (y0 - y1) + d0 + d1)));
        cubic.max(0.0).sqrt()
    }
}

/// ∫ f 2πr dr by halving intervals until Simpson's rule agrees with itself.
fn integral(f: &dyn Fn(f64) -> f64, [low, high]: [f64; 2], tolerance: f64) -> f64 {
    let ring = |r: f64| 2.0 * PI * r * f(r);
    let simpson = |a: f64, b: f64| (b - a) / 6.0 * (ring(a) + 4.0 * ring(0.5 * (a + b)) + ring(b));
    let mut sum = 0.0;
    let mut open = vec![(low, high, tolerance)];
    while let Some((a, b, allowed)) = open.pop() {
        let middle = 0.5 * (a + b);
        let (whole, halves) = (simpson(a, b), simpson(a, middle) + simpson(middle, b));
        if (whole - halves).abs() <= allowed || b - a < 1e-9 * (high - low) {
            sum += halves;
        } else {
            open.push((a, middle, 0.5 * allowed));
            open.push((middle, b, 0.5 * allowed));
        }
    }
    sum
}

// Source of all cases: this project's own finite-element solutions (quadratic elements, unilateral
// contact), contact radius good to 0.0004 b, resistances to 0.1 %.

#[test]
fn closed_form_stays_near_the_reference_solutions() {
    for case in cases() {
        let cone = case.closed_form();
        let radius = cone.contact_radius / case.inputs.b / case.c_over_b - 1.0;
        // Accuracy stated with the fitted law: 4 % in the contact radius, 0.6 % in the ring sum.
        assert!(
            radius.abs() < 0.04,
            "{}: contact radius {radius:+.4}",
            case.id
        );
        let h = |r: f64| cone.pressure(r, case.force()).powf(0.95);
        let sum = integral(&h, [cone.hole_radius, cone.contact_radius], 1e-9);
        let off = sum / case.Gsum95 - 1.0;
        assert!(off.abs() < 0.006, "{}: ring sum {off:+.5}", case.id);
    }
}

#[test]
fn ring_sum_agrees_with_adaptive_quadrature() {
    for case in cases() {
        let i = &case.inputs;
        let cone = case.closed_form();
        let disc = Outline::Disc { radius: i.Ro };
        let plan = Plan {
            outlines: [(disc.clone(), [0.0; 2]), (disc, [0.0; 2])],
            thickness: [i.t1, i.t2],
            empty: Vec::new(),
            sites: vec![Site {
                at: [0.0; 2],
                hole_radius: [i.a; 2],
                cone,
            }],
            source: Source {
                zone: Zone::Face,
                isothermal: true,
            },
            sink: Sink::IsothermalBack,
            rings: DEFAULT_RINGS,
        };
        let law = |pressure: f64| pressure.powf(0.95);
        let load = Load {
            conductance: law,
            conductivity: [i.k1, i.k2],
            forces: &[case.force()],
            shanks: &[0.0],
        };
        let h = |r: f64| law(cone.pressure(r, case.force()));
        let exact = integral(&h, [cone.hole_radius, cone.contact_radius], 1e-9);
        let off = cells(&plan).expect("cells").solve(&load).contact / exact - 1.0;
        // What the default rings promise.
        assert!(off.abs() < 1e-4, "{}: {off:+.2e}", case.id);
    }
}

#[test]
fn network_gives_the_listed_resistances_with_the_closed_form_field() {
    let mut compared = 0;
    for case in cases() {
        let cone = case.closed_form();
        let annulus = case.annulus(cone.contact_radius, 600);
        for (name, heat) in &case.bc {
            for (biot, listed) in &heat.closed_form {
                let bi: f64 = biot.parse().unwrap();
                let h = |r: f64| bi * cone.pressure(r, case.force()).powf(0.95);
                let off = annulus.resistance(h, ends(name)) / listed - 1.0;
                // The list prints six digits and was made with 600 rings too; its force balance
                // is a trapezoidal sum.
                assert!(off.abs() < 1e-3, "{} {name} {biot}: {off:+.6}", case.id);
                compared += 1;
            }
        }
    }
    // 27 cases, three Biot numbers, three pairs of ends; the one with contact to the rim has no lap.
    assert_eq!(compared, 240);
}

#[test]
fn true_resistance_lies_between_the_bounds_for_the_reference_field() {
    for case in cases() {
        let field = Listed::new(&case);
        let contact = *case.r_station.last().unwrap();
        let annulus = case.annulus(contact, 600);
        let raw = integral(
            &|r| field.pressure(r).powf(0.95),
            [case.inputs.a, contact],
            1e-8,
        );
        // Twenty stations tell the field well enough for its ring sum; what is left is scaled away.
        assert!((raw / case.Gsum95 - 1.0).abs() < 2e-3, "{}: {raw}", case.id);
        for (name, heat) in &case.bc {
            for (biot, truth) in &heat.total {
                let bi: f64 = biot.parse().unwrap();
                let h = |r: f64| bi * field.pressure(r).powf(0.95) * case.Gsum95 / raw;
                let place = format!("{} {name} {biot}", case.id);
                let upper = annulus.resistance(h, ends(name));
                // The truth carries 0.1 % (its stated tolerance), the stations another 0.05 %.
                assert!(
                    upper > truth * (1.0 - 1e-3),
                    "{place}: {upper} below {truth}"
                );
                if name != "lap" {
                    let lower = case.R_1D + 1.0 / (bi * case.Gsum95);
                    assert!(
                        lower < truth * (1.0 + 1e-3),
                        "{place}: {lower} above {truth}"
                    );
                }
                let off = upper / heat.listed_field[biot] - 1.0;
                assert!(off.abs() < 2e-3, "{place}: network {off:+.5}");
                let gap = annulus.resistance(|r| h(r) + 0.02 * bi, ends(name));
                let off = gap / heat.with_gap[biot] - 1.0;
                assert!(off.abs() < 2e-3, "{place}: network with gap {off:+.5}");
            }
        }
    }
}

#[test]
fn uniform_conductance_between_isothermal_or_evenly_heated_faces_is_a_slab() {
    let annulus = Annulus {
        edges: edges(2.0, 3.0, 9.0, 40),
        thickness: [0.7, 1.9],
        conductivity: [3.0, 0.4],
    };
    let area = PI * (81.0 - 4.0);
    let exact = (0.7 / 3.0 + 1.9 / 0.4 + 1.0 / 2.5) / area;
    for ends in [Ends::Isothermal, Ends::Flux] {
        let found = annulus.resistance(|_| 2.5, ends);
        // Rounding of forty rings.
        assert!((found / exact - 1.0).abs() < 1e-12, "{ends:?}: {found}");
    }
}

#[test]
fn thin_lap_agrees_with_bessel_functions() {
    // θ = T1 − T2 of equal plates obeys θ'' + θ'/r = m² θ with m² = 2U/(kt), 1/U = 1/h + 2t/(3k);
    // T1 + T2 is constant by symmetry, and the last ring carries all the heat into the rim.
    let (a, rim, t, h) = (0.6, 3.0, 0.02, 0.05);
    let m = (2.0_f64 / (1.0 / h + 2.0 * t / 3.0) / t).sqrt();
    let [i0, k0] = bessel(0.0, m * rim);
    let [i1, k1] = bessel(1.0, m * rim);
    let [inner_i1, inner_k1] = bessel(1.0, m * a);
    let ratio = inner_i1 / inner_k1;
    let slope = m * (i1 - ratio * k1) / (i0 + ratio * k0);
    // k t 2πR T1' with T1' = θ'/2, for θ(R) = 1.
    let exact = 1.0 / (2.0 * PI * rim * t * 0.5 * slope);
    let annulus = Annulus {
        edges: edges(a, rim, rim, 2000),
        thickness: [t, t],
        conductivity: [1.0, 1.0],
    };
    let found = annulus.resistance(|_| h, Ends::Lap);
    // Second order in rings of 0.0012.
    assert!(
        (found / exact - 1.0).abs() < 1e-6,
        "{found} against {exact}"
    );
}
