//! The prepared interface: fillers, coatings, measured points, cautions.

use crate::{
    conductance::{Face, GapGas, Hardness, Interface, Layer},
    joint::{FillerKind, Law},
};

const AIR: GapGas = GapGas {
    conductivity: 0.026,
    parameter: 0.3e-6,
};

fn vacuum() -> Interface {
    let face = Face {
        conductivity: 160.0,
        roughness: 1e-6,
        slope: 0.12,
        youngs_modulus: 70e9,
        poisson: 0.33,
        hardness: Hardness::Meyer(1e9),
        emissivity: 0.0,
        coating: None,
    };
    Interface {
        faces: [face.clone(), face],
        law: Law::ElasticPlastic,
        gas: None,
        temperature: 300.0,
        filler: None,
        measured: None,
        solid_factor: 1.0,
        filler_factor: 1.0,
        filler_modulus: None,
    }
}

fn filled(filler: FillerKind) -> Interface {
    Interface {
        filler: Some(filler),
        gas: Some(AIR),
        ..vacuum()
    }
}

fn table(points: &[(f64, f64)]) -> FillerKind {
    FillerKind::Table {
        points: points.to_vec(),
    }
}

fn codes(interface: &Interface, peak: f64) -> Vec<&'static str> {
    let cautions = interface.prepare().cautions(peak);
    assert!(cautions.iter().all(|caution| !caution.text.is_empty()));
    cautions.iter().map(|caution| caution.code).collect()
}

/// 1e-12 relative: a handful of roundings.
fn same(found: f64, wanted: f64) {
    assert!(
        (found - wanted).abs() <= 1e-12 * wanted.abs(),
        "{found} for {wanted}"
    );
}

#[test]
fn nothing_crosses_vacuum_without_contact() {
    let local = vacuum().prepare();
    same(local.total(0.0), 0.0);
    same(local.total(-5.0), 0.0);
    same(local.parted(1e-6), 0.0);
    assert!(local.total(1.0) > 0.0);
    assert!(local.at(1e6).series.is_infinite() && local.at(1e6).series > 0.0);
    assert!(local.total(f64::NAN).is_nan());
}

// k/(Y + M) with Y the 4.7534 σ of the tallest peaks, σ = √2 µm; the correction there is 1.063.
#[test]
fn touching_faces_stand_on_their_tallest_peaks() {
    let mut pair = vacuum();
    pair.gas = Some(AIR);
    let local = pair.prepare();
    let separation = 4.753424308822899 * 2f64.sqrt() * 1e-6;
    assert!((local.separation(0.0) / separation - 1.0).abs() < 1e-9);
    // Beyond 4 σ the excess of 0.063 fades.
    let gap = |opening: f64| {
        let across = separation + opening + 0.3e-6;
        let nearer = (4.0 * 2f64.sqrt() * 1e-6 + 0.3e-6) / across;
        let near = nearer.powi(3);
        (1.0 + 0.063 * (2.0 * near - near * near)) * 0.026 / across
    };
    assert!((local.total(0.0) / gap(0.0) - 1.0).abs() < 1e-9);
    assert!((local.parted(20e-6) / gap(20e-6) - 1.0).abs() < 1e-9);
    same(local.parted(0.0), local.unloaded());
}

#[test]
fn layer_keeps_its_resistance_and_spots_do_not_count() {
    let mut pair = filled(FillerKind::Layer {
        conductivity: 2.0,
        thickness: 1e-3,
        boundary: 1e-4,
    });
    pair.filler_factor = 1.5;
    let local = pair.prepare();
    for pressure in [0.0, 1e6, 1e9] {
        same(local.total(pressure).recip(), 1.5 * 6e-4);
        same(local.at(pressure).solid, 0.0);
    }
    same(local.separation(1e5), 1e-3);
    // The pad stays on one face; air of the opening, with its jump, is crossed in series.
    same(local.parted(50e-6).recip(), 9e-4 + 50.3e-6 / 0.026);
}

// Wetting: half of both 1 µm of roughness.
#[test]
fn paste_fills_the_gap_up_to_its_applied_thickness() {
    let mut pair = filled(FillerKind::Paste {
        conductivity: 1.0,
        yield_stress: 100.0,
        thinnest: 20e-6,
        applied: 100e-6,
    });
    let local = pair.prepare();
    same(local.parted(40e-6).recip(), 101e-6);
    // Air of what is left, with its jump, is crossed in series.
    same(
        local.parted(150e-6).recip(),
        101e-6 + (50e-6 + 0.3e-6) / 0.026,
    );
    same(local.separation(1e12), 20e-6);
    same(local.separation(1e-3), 100e-6);
    pair.gas = None;
    same(pair.prepare().parted(150e-6), 0.0);
}

// 20 µm of a 200 µm layer of 5 MPa are not left at 11.5 MPa, but e^−2.3 of it.
#[test]
fn a_layer_of_known_modulus_thins_under_its_pressure() {
    let mut pair = filled(FillerKind::Layer {
        conductivity: 2.0,
        thickness: 2e-4,
        boundary: 1e-5,
    });
    pair.filler_modulus = Some(5e6);
    let local = pair.prepare();
    same(local.total(0.0).recip(), 1.1e-4);
    same(local.total(5e6).recip(), 1e-4 * (-1.0_f64).exp() + 1e-5);
    assert!(local.total(1e12) <= 1e5);
}

#[test]
fn table_is_interpolated_and_its_ends_are_held() {
    let local = filled(table(&[(1e5, 4e-4), (4e5, 1e-4)])).prepare();
    same(local.total(2e5).recip(), 2e-4);
    same(local.total(0.0).recip(), 4e-4);
    same(local.total(1e9).recip(), 1e-4);
}

#[test]
fn fluid_takes_the_place_of_gas_and_radiation() {
    let mut pair = filled(FillerKind::Fluid { conductivity: 0.2 });
    for face in &mut pair.faces {
        face.emissivity = 0.8;
    }
    pair.filler_factor = 1.25;
    let parts = pair.prepare().at(1e6);
    same(parts.filler, 0.16 / pair.prepare().separation(1e6));
    same(parts.gas + parts.radiation, 0.0);
    same(parts.solid, vacuum().prepare().total(1e6));
}

#[test]
fn film_lies_in_series_and_constricts_the_spots() {
    let mut pair = vacuum();
    pair.faces[0].coating = Some(Layer {
        thickness: 25e-6,
        conductivity: 1.0,
        hardness: Some(4e9),
        metal: false,
    });
    let parts = pair.prepare().at(5e6);
    same(parts.series.recip(), 25e-6);
    same(parts.total.recip(), parts.solid.recip() + 25e-6);
    // The other face is the softer one now, and nearly all of the constriction lies in the film:
    // 2·1·160/161 against 160, and a little more for what lies below.
    let bare = vacuum().prepare().at(5e6).solid;
    let ratio = parts.solid / bare;
    assert!(ratio > 2.0 / 161.0 && ratio < 1.15 * 2.0 / 161.0, "{ratio}");
}

#[test]
fn soft_plating_helps_and_hard_plating_on_both_faces_hinders() {
    let plated = |hardness: f64, faces: usize| {
        let mut pair = vacuum();
        for face in pair.faces.iter_mut().take(faces) {
            face.coating = Some(Layer {
                thickness: 5e-6,
                conductivity: 160.0,
                hardness: Some(hardness),
                metal: true,
            });
        }
        pair.prepare().at(1e6).solid / vacuum().prepare().at(1e6).solid
    };
    assert!(plated(5e7, 1) > 2.0);
    assert!(plated(5e9, 2) < 0.9);
    // One hard face leaves the other the softer: nothing changes.
    same(plated(5e9, 1), 1.0);
}

#[test]
fn measured_points_override_the_laws() {
    let mut pair = vacuum();
    pair.gas = Some(AIR);
    let without_load = pair.prepare().unloaded();
    pair.measured = Some(vec![(1e5, 6e3), (4e5, 54e3)]);
    pair.solid_factor = 2.0;
    let local = pair.prepare();
    same(local.total(1e5), 12e3);
    same(local.total(2e5), 36e3);
    same(local.total(1e8), 108e3);
    same(local.total(0.0), without_load);
    same(local.total(5e4), 0.5 * (without_load + 12e3));
    same(local.at(2e5).solid, 36e3);
    // Measured lower than the laws expect without any load: the measurement stands.
    pair.measured = Some(vec![(1e5, 100.0)]);
    same(pair.prepare().unloaded(), 200.0);
    pair.measured = Some(vec![(0.0, 300.0), (1e5, 400.0)]);
    same(pair.prepare().total(0.0), 600.0);
}

#[test]
fn cautions_name_the_range_left() {
    let none: [&str; 0] = [];
    let mut pair = vacuum();
    assert_eq!(codes(&pair, 50e6), none);
    assert_eq!(codes(&pair, 0.0), none);
    assert_eq!(codes(&pair, 1e2), ["conductance/light-load"]);
    assert_eq!(codes(&pair, 2e9), ["conductance/beyond-hardness"]);
    pair.law = Law::PlasticPower;
    assert_eq!(codes(&pair, 19e6), none);
    assert_eq!(codes(&pair, 21e6), ["conductance/law-range"]);
    pair.law = Law::Elastic;
    assert_eq!(codes(&pair, 1e6), ["conductance/law-range"]);
    pair.law = Law::Plastic;
    assert_eq!(codes(&pair, 1e6), none);
    for face in &mut pair.faces {
        face.slope = 0.01;
    }
    assert_eq!(codes(&pair, 1e6), ["conductance/law-range"]);
}

#[test]
fn cautions_name_the_end_of_tables() {
    let none: [&str; 0] = [];
    let full = filled(table(&[(0.0, 4e-4), (1e6, 1e-4)]));
    assert_eq!(codes(&full, 1e6), none);
    assert_eq!(codes(&full, 2e6), ["filler/outside-table"]);
    let open = filled(table(&[(1e5, 4e-4), (1e6, 1e-4)]));
    assert_eq!(codes(&open, 5e5), ["filler/outside-table"]);
    let paste = filled(FillerKind::Paste {
        conductivity: 1.0,
        yield_stress: 100.0,
        thinnest: 20e-6,
        applied: 100e-6,
    });
    assert_eq!(codes(&paste, 0.9e6), none);
    assert_eq!(codes(&paste, 1.1e6), ["filler/paste-range"]);
    let mut measured = vacuum();
    measured.measured = Some(vec![(1e5, 6e3), (4e5, 24e3)]);
    assert_eq!(codes(&measured, 4e5), none);
    assert_eq!(codes(&measured, 5e5), ["measured/outside-range"]);
    assert_eq!(codes(&measured, 5e4), ["measured/outside-range"]);
}

#[test]
fn indium_foil_is_near_its_table() {
    // 100 µm, 82 W/(m K), 9 MPa between aluminium faces of 1 µm and slope 0.1, by hand: k_i = 110.0,
    // h_i = 1.25 · 110.0 · 0.1e6 · (0.1/9)^0.95 = 1.913e5, R = 1.22e-6 + 2/1.913e5 = 0.1168 cm² K/W.
    let mut pair = filled(FillerKind::Foil {
        conductivity: 82.0,
        thickness: 100e-6,
        hardness: 9e6,
    });
    for face in &mut pair.faces {
        (face.conductivity, face.roughness, face.slope) = (167.0, 1e-6, 0.1);
        face.emissivity = 0.05;
        face.coating = None;
    }
    pair.gas = None;
    pair.filler_factor = 1.0;
    let found = pair.prepare().total(1e5).recip();
    assert!((found / 0.1168e-4 - 1.0).abs() < 2e-3, "{found}");
    // Incropera, table 3.2, from memory: 0.07 cm² K/W on aluminium at 100 kPa. The law knows roughness and
    // slope, the table does not: a factor of two.
    assert!((0.5..2.0).contains(&(found / 0.07e-4)), "{found}");
}

#[test]
fn foil_falls_to_its_bulk() {
    let mut pair = filled(FillerKind::Foil {
        conductivity: 82.0,
        thickness: 100e-6,
        hardness: 9e6,
    });
    pair.gas = None;
    pair.filler_factor = 1.0;
    for face in &mut pair.faces {
        face.coating = None;
    }
    let local = pair.prepare();
    let bulk = 100e-6 / 82.0;
    let pressed = local.total(9e6).recip();
    assert!(pressed > bulk && pressed < 1.6 * bulk, "{pressed}");
    // Beyond its hardness nothing is promised.
    assert!((local.total(90e6) / local.total(9e6) - 1.0).abs() < 1e-12);
    // Loose in vacuum radiation alone is left: metals pass less than 10 W/(m² K).
    assert!(local.unloaded() < 10.0 && local.parted(1e-6) <= local.unloaded());
}
