//! Pressure cone, ring sum and ring network against axisymmetric finite-element solutions.

use std::{collections::BTreeMap, f64::consts::PI};

use ringsum::{
    joint::{ConeRule, ConeShape},
    pressure::{Cone, Pair, cone},
    resistance::{
        annulus::{Annulus, Ends},
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
#[allow(non_snake_case)]
struct Heat {
    R_total: BTreeMap<String, f64>,
    R_default_power: BTreeMap<String, f64>,
    R_ref_field: BTreeMap<String, f64>,
    R_with_gap: BTreeMap<String, f64>,
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
    serde_json::from_str(include_str!("data/axisym_public.json")).unwrap()
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

#[test]
fn network_gives_the_listed_resistances_with_the_closed_form_field() {
    for case in cases() {
        let cone = case.closed_form();
        let annulus = case.annulus(cone.contact_radius, 600);
        for (name, heat) in &case.bc {
            for (biot, listed) in &heat.R_default_power {
                let h = |r: f64| {
                    biot.parse::<f64>().unwrap() * cone.pressure(r, case.force()).powf(0.95)
                };
                let found = annulus.resistance(h, ends(name));
                if (found / listed - 1.0).abs() > 1e-3 {
                    println!(
                        "{} {name} {biot}: {found} {listed} {}",
                        case.id,
                        found / listed - 1.0
                    );
                }
                let g = heat.R_with_gap[biot];
                let f =
                    annulus.resistance(|r| h(r) + 0.02 * biot.parse::<f64>().unwrap(), ends(name));
                if (f / g - 1.0).abs() > 1e-3 {
                    println!("   gap {} {name} {biot}: {f} {g} {}", case.id, f / g - 1.0);
                }
            }
        }
    }
}
