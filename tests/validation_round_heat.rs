//! Heat through two round plates against finite-element, series and closed-form solutions.

use std::{collections::BTreeMap, f64::consts::PI};

use ringsum::{
    pressure::round::{self, Faces, Head, Solution},
    resistance::round::{Condensed, Disc, Heat, Inlet, Outlet, Patch, Problem, condense},
};
use serde::Deserialize;

#[derive(Deserialize)]
#[allow(non_snake_case)]
struct Contact {
    id: String,
    a: f64,
    Ro: f64,
    t: [f64; 2],
    E: [f64; 2],
    nu: [f64; 2],
    head: String,
    stick: bool,
}

#[derive(Deserialize)]
#[allow(non_snake_case)]
struct Resistances {
    R_zone: f64,
    R_total: BTreeMap<String, f64>,
    R_total_with_gap: BTreeMap<String, f64>,
}

#[derive(Deserialize)]
#[allow(non_snake_case)]
struct Case {
    id: String,
    k: [f64; 2],
    R_1D: f64,
    bc: BTreeMap<String, Resistances>,
}

#[derive(Deserialize)]
#[allow(non_snake_case)]
struct Shank {
    t_over_b: f64,
    b_over_a: f64,
    Ro_over_b: f64,
    bc: String,
    Bi: f64,
    G_bolt: f64,
    R_without: f64,
    R_with: f64,
}

#[derive(Deserialize)]
struct Data {
    cases: Vec<Case>,
    shanks: Vec<Shank>,
}

fn data() -> Data {
    serde_json::from_str(include_str!("data/axisym_heat.json")).expect("the data are JSON")
}

fn contacts() -> Vec<Contact> {
    serde_json::from_str(include_str!("data/axisym_round.json")).expect("the data are JSON")
}

impl Contact {
    fn solved(&self) -> Solution {
        round::solve(&round::Problem {
            hole_radius: self.a,
            bearing_radius: 1.0,
            rim_radius: self.Ro,
            thickness: self.t,
            youngs_modulus: self.E,
            poisson: self.nu,
            head: match self.head.as_str() {
                "rigid" => Head::Rigid,
                _ => Head::Uniform,
            },
            faces: if self.stick {
                Faces::Stuck
            } else {
                Faces::Frictionless
            },
            tolerance: 0.001,
        })
        .expect("the contact converges")
    }

    /// Force that makes the mean pressure under the head 1.
    fn force(&self) -> f64 {
        PI * (1.0 - self.a * self.a)
    }

    fn problem(&self, conductivity: [f64; 2], name: &str, contact_radius: f64) -> Problem {
        let (inlet, outlet) = match name {
            "isothermal" => (Inlet::Isothermal(Patch::Face), Outlet::IsothermalBack),
            "flux" => (Inlet::Flux(Patch::Face), Outlet::Flux(Patch::Face)),
            _ => (Inlet::Rim, Outlet::Rim),
        };
        let disc = |plate: usize| Disc {
            hole_radius: self.a,
            rim_radius: self.Ro,
            thickness: self.t[plate],
            conductivity: [conductivity[plate]; 2],
        };
        Problem {
            plates: [disc(0), disc(1)],
            bearing_radius: 1.0,
            contact_radius,
            inlet,
            outlet,
            shank: 0.0,
        }
    }
}

#[test]
fn public_cases_are_met() {
    let contacts = contacts();
    let (mut worst, mut worst_zone, mut worst_gap) = (0.0_f64, 0.0_f64, 0.0_f64);
    for case in data().cases {
        let contact = contacts.iter().find(|one| one.id == case.id).unwrap();
        let field = contact.solved();
        for (name, listed) in &case.bc {
            let problem = contact.problem(case.k, name, field.contact_radius);
            let start = std::time::Instant::now();
            let plates = condense(&problem).expect("the plates condense");
            let build = start.elapsed().as_secs_f64() * 1e3;
            let zone = plates.perfect_in_zone() / listed.R_zone - 1.0;
            for (biot, wanted) in &listed.R_total {
                let bi: f64 = biot.parse().unwrap();
                let h = |r: f64| bi * field.pressure(r, contact.force()).powf(0.95);
                let start = std::time::Instant::now();
                let heat = plates.solve(h).expect("heat flows");
                let solve = start.elapsed().as_secs_f64() * 1e3;
                let off = heat.path.source_to_sink / wanted - 1.0;
                let gap = plates.solve(|r| h(r) + 0.02 * bi).expect("heat flows");
                let off_gap = gap.path.source_to_sink / listed.R_total_with_gap[biot] - 1.0;
                println!("{:26} {name:10} {biot:4} {off:+.5} gap {off_gap:+.5} zone {zone:+.5} bal {:.1e} {:.1e} coarse {:+.5} {:+.5} n {} build {build:.1} solve {solve:.2}", case.id,
                   heat.health.heat_balance, gap.health.heat_balance, heat.health.coarser_grid, gap.health.coarser_grid, heat.health.unknowns);
                worst = worst.max(off.abs());
                worst_gap = worst_gap.max(off_gap.abs());
                worst_zone = worst_zone.max(zone.abs());
            }
        }
    }
    println!("worst {worst} gap {worst_gap} zone {worst_zone}");
    panic!();
}
