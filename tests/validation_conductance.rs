//! Published and independently computed values of contact conductance.

use ringsum::{
    catalog::{Datum, Gas, Status},
    conductance::{
        Face, GapGas, Hardness, Interface, Layer, filler,
        film::{self, Coated},
        flatness::{Crowned, constriction},
        gas::{self, Gap, Molecule, Wall},
        radiation, slope_from_roughness,
        spots::{Asperities, Mode, Surfaces, elastic_fit, harmonic_mean, plastic_fit},
    },
    joint::{FillerKind, Law},
};
use serde::Deserialize;

#[derive(Deserialize)]
struct GasTable {
    gas: Vec<GasRow>,
}

#[derive(Deserialize)]
struct GasRow {
    name: String,
    conductivity: f64,
    mean_free_path: f64,
    prandtl: f64,
    heat_ratio: f64,
    molar_mass: f64,
    monatomic: bool,
    by_relation: f64,
    measured: Option<f64>,
}

fn gases() -> Vec<GasRow> {
    toml::from_str::<GasTable>(include_str!("data/contact_gases.toml"))
        .expect("the table of gases reads")
        .gas
}

/// A gas of the table at 300 K, one column wide, with the accommodation of both walls.
fn gas_at_300_kelvin(name: &str, accommodation: f64) -> Gas {
    let row = gases()
        .into_iter()
        .find(|row| row.name == name)
        .expect("the gas is in the table");
    Gas {
        name: row.name,
        temperatures: vec![300.0],
        conductivity: vec![row.conductivity],
        mean_free_path: vec![row.mean_free_path],
        prandtl: vec![row.prandtl],
        heat_ratio: vec![row.heat_ratio],
        accommodation: Datum {
            value: accommodation,
            range: None,
            status: Status::Seen,
            source: "tests/data/contact_gases.toml".into(),
        },
        source: "tests/data/contact_gases.toml".into(),
    }
}

fn gap_gas(name: &str, accommodation: f64, pressure: f64) -> GapGas {
    gas::at(
        &gas_at_300_kelvin(name, accommodation),
        pressure,
        300.0,
        1.0,
    )
}

/// Rows of numbers of a table, after the words at their head.
fn rows(table: &str) -> Vec<Vec<f64>> {
    table
        .lines()
        .filter(|line| !line.starts_with('#'))
        .map(|line| {
            line.split(',')
                .filter_map(|cell| cell.parse().ok())
                .collect()
        })
        .collect()
}

/// Aluminium 6061-T6, 0.8 µm, of the worked pair.
fn aluminium() -> Face {
    Face {
        conductivity: 167.0,
        roughness: 0.8e-6,
        slope: 0.12,
        youngs_modulus: 68.9e9,
        poisson: 0.33,
        hardness: Hardness::Meyer(1.15e9),
        emissivity: 0.1,
        coating: None,
    }
}

fn interface(face: &Face) -> Interface {
    Interface {
        faces: [face.clone(), face.clone()],
        law: Law::ElasticPlastic,
        gas: None,
        temperature: 300.0,
        filler: None,
        measured: None,
        solid_factor: 1.0,
        filler_factor: 1.0,
    }
}

fn near(found: f64, wanted: f64, relative: f64) {
    assert!(
        (found / wanted - 1.0).abs() <= relative,
        "found {found}, wanted {wanted} within {relative}"
    );
}

/// Loads spread evenly over their logarithm.
fn loads(from: f64, to: f64) -> impl Iterator<Item = f64> {
    (0..=60).map(move |step| from * (to / from).powf(f64::from(step) / 60.0))
}

// 2 %, 4 %: the stated agreement of the published fits with the integrals they fit; the integrals
// are from memory, the plastic fit is in Mechanical Engineers' Handbook, 3rd ed., vol. 4.
#[test]
fn exact_laws_agree_with_their_fits() {
    for load in loads(1e-6, 0.02) {
        let exact = Mode::plastic(1.0).reduced_conductance(load);
        near(plastic_fit(load), exact, 0.02);
    }
    for load in loads(1e-5, 1e-2) {
        let exact = Mode::elastic(1.0).reduced_conductance(load);
        near(elastic_fit(load), exact, 0.02);
    }
    for hardness in loads(1.67 * 2.76 / 1000.0, 1.67 * 2.76 / 0.5) {
        let mode = Mode::elastic_plastic(&Asperities {
            slope: 1.0,
            elastic_modulus: 1.0,
            hardness,
        });
        for load in loads(1e-6, 1e-2) {
            let pressure = load * mode.hardness;
            let exact = mode.reduced_conductance(pressure);
            near(mode.elastic_plastic_fit(pressure), exact, 0.04);
        }
    }
}

// The shape of the fits' misfit, to half a unit of the last digit printed: computed for this
// project with an independent program.
#[test]
fn fits_miss_the_exact_laws_by_the_known_amounts() {
    for (load, ratio) in [
        (1e-6, 1.007),
        (1e-5, 0.988),
        (1e-4, 0.986),
        (1e-3, 0.999),
        (1e-2, 1.008),
    ] {
        let found = plastic_fit(load) / Mode::plastic(1.0).reduced_conductance(load);
        assert!((found - ratio).abs() < 6e-4, "{load}: {found}");
    }
    for (load, ratio) in [
        (1e-6, 1.042),
        (1e-5, 1.006),
        (1e-4, 0.990),
        (1e-3, 0.997),
        (1e-2, 1.019),
    ] {
        let found = elastic_fit(load) / Mode::elastic(1.0).reduced_conductance(load);
        assert!((found - ratio).abs() < 6e-4, "{load}: {found}");
    }
    // Whole per cents are printed: half a per cent.
    for (load, low) in [(0.05, 0.04), (0.08, 0.07), (0.11, 0.11)] {
        let found = plastic_fit(load) / Mode::plastic(1.0).reduced_conductance(load);
        assert!((1.0 - found - low).abs() < 5e-3, "{load}: {found}");
    }
}

// 1 %: stated agreement 0.75 %. Source of the fit: Mechanical Engineers' Handbook, 3rd ed., vol. 4.
#[test]
fn separation_fit_agrees_with_the_exact_form() {
    for load in loads(1e-6, 0.02) {
        near(gas::separation_fit(load), gas::separation_ratio(load), 0.01);
    }
}

// 1e-4 as stated; the hardness form is from memory, the numbers computed for this project.
#[test]
fn stainless_pair_by_microhardness() {
    let stainless = Face {
        conductivity: 16.2,
        youngs_modulus: 193e9,
        poisson: 0.29,
        hardness: Hardness::Micro {
            c1: 6.271e9,
            c2: -0.229,
        },
        ..aluminium()
    };
    let mut pair = interface(&stainless);
    let surfaces = Surfaces::of(&pair.faces);
    near(surfaces.roughness, 1.13137e-6, 1e-5);
    near(surfaces.slope, 0.169706, 1e-5);
    pair.law = Law::PlasticPower;
    near(pair.prepare().at(1e6).solid, 1106.5, 1e-4);
    pair.law = Law::Plastic;
    near(pair.prepare().at(1e6).solid, 1118.1, 1e-4);
    // P/H_c by the fit: (h/(1.25 k m/σ))^(1/0.95).
    pair.law = Law::PlasticPower;
    let reduced = pair.prepare().at(1e6).solid * surfaces.roughness
        / (surfaces.conductivity * surfaces.slope);
    let load = (reduced / 1.25).powf(1.0 / 0.95);
    near(load, 2.40142e-4, 1e-5);
    near(1e6 / load, 4.1642e9, 2e-5);
}

// 1e-3 as stated; the exact value to 1e-4 of its last digits. Computed for this project.
#[test]
fn aluminium_pair_under_each_law() {
    let mut pair = interface(&aluminium());
    let surfaces = Surfaces::of(&pair.faces);
    let scale = surfaces.conductivity * surfaces.slope / surfaces.roughness;
    let asperities = Asperities {
        slope: surfaces.slope,
        elastic_modulus: surfaces.elastic_modulus,
        hardness: 1.15e9,
    };
    near(scale * plastic_fit(1e6 / 1.15e9), 38_731.0, 1e-3);
    near(
        scale * elastic_fit(1e6 / asperities.elastic_hardness()),
        13_889.0,
        1e-3,
    );
    let mode = Mode::elastic_plastic(&asperities);
    near(mode.strain, 26.30, 1e-3);
    near(mode.hardness, 1.1164e9, 1e-4);
    near(scale * mode.elastic_plastic_fit(1e6), 44_264.0, 1e-3);
    near(
        pair.prepare().total(1e6),
        44_618.0 + radiation::conductance(300.0, [0.1; 2]),
        1e-4,
    );
    pair.law = Law::PlasticPower;
    near(pair.prepare().at(1e6).solid, 38_731.0, 1e-4);
}

// 1e-4: half a unit of the last digit. Mechanical Engineers' Handbook, 3rd ed., vol. 4, p. 374.
#[test]
fn faces_combine() {
    near(harmonic_mean([167.0, 16.2]), 29.535, 1e-4);
    let mut faces = interface(&aluminium()).faces;
    faces[1].roughness = 0.6e-6;
    faces[1].slope = 0.09;
    let surfaces = Surfaces::of(&faces);
    near(surfaces.roughness, 1.0e-6, 1e-12);
    near(surfaces.slope, 0.15, 1e-12);
}

// 0.1 %: computed for this project with CoolProp 8.0.0. The handbook's shorthand 2.4 · 1.7 · 0.06 µm
// (Mechanical Engineers' Handbook, 3rd ed., vol. 4) agrees in order only: 25 %.
#[test]
fn gas_parameter_of_air() {
    let found = gap_gas("Air", 0.84, 101_325.0).parameter;
    near(found, 0.3068e-6, 1e-3);
    near(found, 2.4 * 1.7 * 0.06e-6, 0.26);
    near(gap_gas("Air", 0.84, 1e3).parameter, found * 101.325, 1e-12);
    let full = gas::at(&gas_at_300_kelvin("Air", 0.84), 101_325.0, 300.0, 2.0).parameter;
    near(full, found / (2.0 * 1.16 / 0.84) * 2.0, 1e-12);
}

/// The gap of the aluminium pair at 1e6 Pa.
fn aluminium_gap() -> Gap {
    let roughness = Surfaces::of(&interface(&aluminium()).faces).roughness;
    Gap {
        separation: roughness * gas::separation_ratio(1e6 / 1.15e9),
        roughness,
    }
}

// 0.1 % as stated. Computed for this project; the integral is from memory, k/(Y + M) in Mechanical
// Engineers' Handbook, 3rd ed., vol. 4. The corrected law is what the program uses: 2 %.
#[test]
fn gas_between_the_aluminium_pair() {
    let gap = aluminium_gap();
    near(gap.separation, 3.5429e-6, 1e-4);
    for (name, accommodation, integral, simple) in [
        ("Air", 0.84, 7685.6, 6852.5),
        ("Helium", 0.364, 23_449.0, 22_810.0),
    ] {
        let gas = gap_gas(name, accommodation, 101_325.0);
        near(gap.integral(&gas).value, integral, 1e-3);
        near(gap.simple(&gas), simple, 1e-3);
        let mut pair = interface(&aluminium());
        pair.gas = Some(gas);
        near(pair.prepare().at(1e6).gas, integral, 0.02);
    }
}

// 2.2 %: the published correction is 0.978 to 1.018 of the integral here, by an independent program
// too; both forms from memory.
#[test]
fn corrected_gas_law_agrees_with_the_integral() {
    for load in [1e-4, 1e-3, 1e-2] {
        let gap = Gap {
            separation: gas::separation_ratio(load) * 1e-6,
            roughness: 1e-6,
        };
        for jump in loads(0.01, 3.0) {
            let gas = GapGas {
                conductivity: 0.026,
                parameter: jump * 1e-6,
            };
            let integral = gap.integral(&gas);
            assert!(integral.error < 1e-6 * integral.value);
            near(gap.corrected(&gas), integral.value, 0.022);
            assert!(gap.simple(&gas) <= integral.value);
        }
    }
}

// 0.5 % as stated.
#[test]
fn thin_air_conducts_in_proportion_to_its_pressure() {
    let gap = Gap {
        separation: gas::separation_ratio(1e-3) * 1e-6,
        roughness: 1e-6,
    };
    for row in rows(include_str!("data/contact_air_pressure.csv")) {
        let gas = gap_gas("Air", 0.84, row[0]);
        near(gap.integral(&gas).value, row[1], 5e-3);
        near(gap.corrected(&gas), row[1], 0.021);
    }
}

// 0.2 %, disc 0.5 %, as stated: textbook problems with printed answers (Cengel and Incropera kind).
#[test]
fn textbook_problems_with_a_given_contact() {
    let contact = |conductance| {
        let mut pair = interface(&aluminium());
        pair.measured = Some(vec![(1e6, conductance)]);
        pair.prepare().total(1e6)
    };
    let stainless = contact(1.0 / 15.5e-4);
    let flux = 100.0 / (2.0 * 0.010 / 16.6 + stainless.recip());
    near(flux, 36_300.0, 2e-3);
    near(flux / stainless, 56.27, 2e-3);
    near(401.0 / contact(18_000.0), 22.28e-3, 2e-3);
    let disc = std::f64::consts::PI * 0.010 * 0.010;
    near(1.0 / (contact(1.0 / 5e-5) * disc), 0.159, 5e-3);
}

// 0.5 %, 0.8 %, 0.1 % as stated; 5.5 % and 17 % to half a unit. Formula from memory; the constant
// against Hertz's (3π/4 (1 − ν²))^(1/3) at ν = 0.3.
#[test]
fn crowned_faces() {
    let crowned = Crowned {
        pressure: 1e6,
        youngs_moduli: [68.9e9; 2],
        radius: 0.020,
        flatness: 5e-6,
    };
    let ratio = crowned.contact_ratio();
    let hertz = (0.75 * std::f64::consts::PI * (1.0 - 0.09)).cbrt();
    near(ratio / (1e6f64 / 68.9e9 * 0.020 / 5e-6).cbrt(), hertz, 5e-3);
    near(ratio, 0.4976, 1e-3);
    near(crowned.conductance(167.0), 7848.0, 1e-3);
    for step in 1..=30 {
        let x = f64::from(step) / 100.0;
        near(constriction(x), (1.0 - x).powf(1.5), 8e-3);
    }
    near(constriction(0.5) / 0.5f64.powf(1.5), 0.945, 5e-3);
}

// Inside the printed band. Fried's table in Incropera; typical hardness from memory.
#[test]
fn vacuum_contacts_lie_in_their_band() {
    for row in rows(include_str!("data/contact_vacuum_bands.csv")) {
        let [conductivity, hardness, from, to, low, high] = row[..] else {
            panic!("six numbers");
        };
        for micrometres in [from, to] {
            let mut face = aluminium();
            face.conductivity = conductivity;
            face.hardness = Hardness::Meyer(hardness);
            face.roughness = micrometres * 1e-6;
            face.slope = slope_from_roughness(face.roughness);
            let mut pair = interface(&face);
            pair.law = Law::Plastic;
            let resistance = pair.prepare().total(1e5).recip();
            assert!(
                (low..high).contains(&resistance),
                "{conductivity}: {resistance}"
            );
        }
    }
}

// 15 % as stated: sink of Al 6063 on alumina, 0.007 and 0.35 MPa, a public worked example; its
// roughness and hardness are from memory. Spots neglected, as there.
#[test]
fn heat_sink_on_alumina_in_air_and_grease() {
    let roughness = 0.4e-6f64.hypot(1.3e-6);
    for (pressure, air, grease) in [(7e3, 2.67e-4, 0.335e-4), (0.35e6, 1.90e-4, 0.213e-4)] {
        let separation = roughness * gas::separation_ratio(pressure / 1.094e9);
        let gap = Gap {
            separation,
            roughness,
        };
        let gas = gap_gas("Air", 0.84, 101_325.0);
        near(gap.simple(&gas).recip(), air, 0.15);
        let mut face = aluminium();
        face.roughness = roughness / 2f64.sqrt();
        face.hardness = Hardness::Meyer(1.094e9);
        let mut pair = interface(&face);
        pair.filler = Some(FillerKind::Fluid { conductivity: 0.2 });
        near(pair.prepare().at(pressure).filler.recip(), grease, 0.15);
    }
}

// Half a unit of the last digit. Prasher's scaling, constants from memory, computed for this project.
#[test]
fn paste_bond_lines() {
    for (pressure, wanted) in [(1e4, 61.0e-6), (1e5, 41.6e-6), (1e6, 28.4e-6)] {
        near(filler::bond_line(100.0 / pressure), wanted, 2e-3);
    }
    let mut face = aluminium();
    face.roughness = 1e-6;
    let mut pair = interface(&face);
    pair.filler = Some(FillerKind::Paste {
        conductivity: 1.0,
        yield_stress: 100.0,
        thinnest: 10e-6,
        applied: 100e-6,
    });
    let local = pair.prepare();
    near(local.total(1e5).recip(), 4.262e-5, 1e-3);
    near(local.total(0.0).recip(), 1.01e-4, 1e-9);
    near(local.total(1e9).recip(), 1.1e-5, 1e-9);
}

// 20 %: Trott et al. 2010 measured, Song & Yovanovich 1987 from memory. The relation itself to 0.002:
// the table was worked out 3 K warmer.
#[test]
fn accommodation_relation_is_near_the_measured_one() {
    let wall = Wall {
        temperature: 300.0,
        molar_mass: 26.98,
    };
    for gas in gases() {
        let molecule = if gas.monatomic {
            Molecule::Monatomic
        } else {
            Molecule::Polyatomic
        };
        let found = gas::accommodation(gas.molar_mass, molecule, wall);
        assert!(
            (found - gas.by_relation).abs() < 2e-3,
            "{}: {found}",
            gas.name
        );
        if let Some(measured) = gas.measured {
            near(found, measured, 0.20);
        }
    }
}

// 1 %: the published rule itself steps by 0.9 % at 4.90. From memory.
#[test]
fn layer_hardness_is_continuous() {
    let at = |ratio: f64| {
        let mut coated = Coated {
            layer: Layer {
                thickness: 0.0,
                conductivity: 420.0,
                hardness: Some(0.4e9),
                metal: true,
            },
            substrate_hardness: 2.5e9,
            substrate_conductivity: 80.0,
            spot_radius: 5e-6,
        };
        coated.layer.thickness = ratio * coated.indentation_depth();
        film::soft_layer_hardness(&coated).expect("a hardness is given") / 0.4e9
    };
    near(at(1.0 - 1e-9), 1.81, 1e-6);
    near(at(1.0 + 1e-9), 1.81, 1e-6);
    near(at(4.90 - 1e-9), 0.991, 1e-6);
    near(at(4.90 - 1e-9), at(4.90 + 1e-9), 0.01);
}

// Half a unit of the last digit: black faces at 300 K, standard result.
#[test]
fn radiation_at_300_kelvin() {
    near(radiation::conductance(300.0, [1.0; 2]), 6.124, 1e-4);
}

// Up to where spots carry more than a hundred times the gas.
#[test]
fn helium_conducts_better_than_air() {
    let mut air = interface(&aluminium());
    air.gas = Some(gap_gas("Air", 0.84, 101_325.0));
    let mut helium = air.clone();
    helium.gas = Some(gap_gas("Helium", 0.364, 101_325.0));
    let (air, helium) = (air.prepare(), helium.prepare());
    for pressure in [0.0, 1e3, 1e5, 1e7, 1e8] {
        assert!(helium.total(pressure) > air.total(pressure));
    }
}
