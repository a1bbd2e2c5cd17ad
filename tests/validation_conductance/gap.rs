//! Gas and liquid in the gap.

use ringsum::{
    catalog::{Datum, Gas, Status},
    conductance::{
        GapGas, Hardness,
        gas::{self, Gap, Molecule, Wall},
        spots::Surfaces,
    },
    joint::FillerKind,
    numerics::distribution::Shape,
};
use serde::Deserialize;

use super::{aluminium, interface, loads, near, rows};

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
    toml::from_str::<GasTable>(include_str!("../data/contact_gases.toml"))
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
            shape: Shape::Uniform,
            status: Status::Seen,
            source: "tests/data/contact_gases.toml".into(),
        },
        status: Status::Computed,
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

// 1 %: stated agreement 0.75 %. Source of the fit: Mechanical Engineers' Handbook, 3rd ed., vol. 4.
#[test]
fn separation_fit_agrees_with_the_exact_form() {
    for load in loads(1e-6, 0.02) {
        near(gas::separation_fit(load), gas::separation_ratio(load), 0.01);
    }
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
pub(super) fn gas_between_the_aluminium_pair() {
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
        near(pair.prepare().separation(1e6), 3.5429e-6, 1e-4);
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

// 2.2 %: the correction itself is off by 1.8 % at 4 σ; the integral is that of the Gaussian heights.
#[test]
fn a_wide_gap_conducts_as_the_integral_says() {
    for ratio in [4.0, 4.2, 4.5, 5.0, 6.0, 8.0, 12.0, 20.0, 50.0] {
        let gap = Gap {
            separation: ratio * 1e-6,
            roughness: 1e-6,
        };
        for jump in loads(0.01, 10.0) {
            let gas = GapGas {
                conductivity: 0.026,
                parameter: jump * 1e-6,
            };
            let integral = gap.integral(&gas);
            near(gap.corrected(&gas), integral.value, 0.022);
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
    for row in rows(include_str!("../data/contact_air_pressure.csv")) {
        let gas = gap_gas("Air", 0.84, row[0]);
        near(gap.integral(&gas).value, row[1], 5e-3);
        near(gap.corrected(&gas), row[1], 0.021);
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
