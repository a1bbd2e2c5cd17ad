//! Fillers of the catalogue with values of the user, and losses of force.

use super::{FillerKind, near, plain, read};
use ringsum::catalog;

fn filler(lines: &str) -> FillerKind {
    read(&format!("{}\n[filler]\n{lines}\n", plain()))
        .filler(0)
        .expect("a filler is stated")
        .clone()
        .kind
}

fn points(lines: &str) -> Vec<(f64, f64)> {
    match filler(lines) {
        FillerKind::Table { points } => points,
        other => panic!("{lines}: {other:?}"),
    }
}

#[test]
fn a_filler_with_a_table_keeps_it_when_its_own_values_are_stated() {
    let known = catalog::filler("indium foil").expect("it is in the catalogue");
    for same in [
        "name = \"indium foil\"",
        "name = \"indium foil\"\nthickness = \"0.1 mm\"",
        "name = \"indium foil\"\nconductivity = \"82 W/(m·K)\"",
        "name = \"indium foil\"\nmodel = \"layer\"\nthickness = \"100 µm\"\nconductivity = \"82 W/(m·K)\"",
        "name = \"indium foil\"\nbond_line = \"100 µm\"",
    ] {
        assert_eq!(points(same), known.points, "{same}");
    }
}

#[test]
fn only_the_bulk_part_of_a_table_follows_thickness_and_conductivity() {
    // Indium: t/k = 100 µm / 82 W/(m K) = 0.0122 cm² K/W of 0.25, 0.07 and 0.04; the rest is contact.
    let bulk = 100e-6 / 82.0;
    let known = &catalog::filler("indium foil").expect("known").points;
    let thick = points("name = \"indium foil\"\nthickness = \"0.2 mm\"");
    let soft = points("name = \"indium foil\"\nconductivity = \"41 W/(m·K)\"");
    for ((at, known), (found, soft)) in known.iter().zip(thick.iter().zip(&soft)) {
        assert!(
            near(found.0, *at) && near(found.1, known + bulk),
            "{found:?}"
        );
        assert!(near(soft.1, known + bulk), "{soft:?}");
    }
    // Epoxy: the table lies below t/k, all of it is bulk and scales as one.
    let known = &catalog::filler("epoxy bond").expect("known").points;
    let twice = points("name = \"epoxy bond\"\nthickness = \"40 µm\"");
    assert!(near(twice[0].1, 2.0 * known[0].1), "{twice:?}");
}

#[test]
fn a_scaled_table_is_an_assumption() {
    let text = plain() + "\n[filler]\nname = \"gap pad\"\nthickness = \"0.5 mm\"\n";
    let joint = read(&text);
    let of = |field: &str| {
        let mut all = joint.assumptions.iter();
        all.find(|assumption| assumption.field == field).cloned()
    };
    let table = of("filler.table").expect("the table is kept");
    assert!(table.value.contains("× 0.5"), "{table:?}");
    assert!(
        of("filler.conductivity").is_some(),
        "{:?}",
        joint.assumptions
    );
    assert!(of("filler.boundary").is_none() && of("filler.thickness").is_none());
}

#[test]
fn a_stated_boundary_or_table_replaces_that_of_the_catalogue() {
    let layer =
        filler("name = \"indium foil\"\nthickness = \"0.2 mm\"\nboundary = \"0.1 K·cm²/W\"");
    assert!(
        matches!(layer, FillerKind::Layer { boundary, thickness, .. } if near(boundary, 1e-5) && near(thickness, 2e-4)),
        "{layer:?}"
    );
    let own = points("name = \"indium foil\"\ntable = [[\"0 Pa\", \"1 K·cm²/W\"]]");
    assert_eq!(own.len(), 1);
}

#[test]
fn a_stated_bond_line_is_liquid_unless_the_file_says_solid() {
    for lines in [
        "name = \"filled grease\"\nbond_line = \"50 µm\"",
        "name = \"silicone grease\"\nbond_line = \"50 µm\"",
        "bond_line = \"50 µm\"\nconductivity = \"2 W/(m·K)\"",
        "model = \"paste\"\nbond_line = \"50 µm\"\nconductivity = \"2 W/(m·K)\"",
    ] {
        let found = filler(lines);
        assert!(
            matches!(found, FillerKind::Paste { thinnest, applied, .. } if near(thinnest, 5e-5) && near(applied, 5e-5)),
            "{lines}: {found:?}"
        );
    }
    for lines in [
        "name = \"filled grease\"\nmodel = \"layer\"\nbond_line = \"50 µm\"",
        "name = \"filled grease\"\nbond_line = \"50 µm\"\nboundary = \"0.1 K·cm²/W\"",
        "bond_line = \"50 µm\"\nconductivity = \"2 W/(m·K)\"\nmodulus = \"1 GPa\"",
    ] {
        let found = filler(lines);
        assert!(
            matches!(found, FillerKind::Layer { thickness, .. } if near(thickness, 5e-5)),
            "{lines}: {found:?}"
        );
    }
    // A bond of the catalogue has set.
    assert!(!points("name = \"epoxy bond\"\nbond_line = \"50 µm\"").is_empty());
}

#[test]
fn guide_settling_is_left_to_the_preload() {
    let losses = |lines: &str| {
        let joint = read(&format!("{}\n[losses]\n{lines}\n", plain()));
        joint.losses.expect("losses are stated")
    };
    assert_eq!(losses("settling = \"guide\"").settling, None);
    assert_eq!(losses("relaxation = \"3 %\"").settling, None);
    let stated = losses("settling = \"12 µm\"").settling;
    assert!(stated.is_some_and(|settling| near(settling.nominal, 12e-6)));
}

#[test]
fn losses_not_asked_for_are_an_assumption() {
    let told = |text: &str| {
        let joint = read(text);
        let mut all = joint.assumptions.into_iter();
        all.find(|assumption| assumption.field == "losses")
    };
    let assumed = told(&plain()).expect("no table of losses");
    assert_eq!(
        assumed.value,
        "none at nominal; guide settling, 5 % relaxation and 5 % for bolts tightened one after another (10 % on a soft \
         layer) in the low force"
    );
    assert_eq!(
        assumed.why,
        "not stated; tighten crosswise in several passes and once more after settling"
    );
    assert_eq!(
        told(&(plain() + "\n[losses]\nsettling = \"guide\"\n")),
        None
    );
}

#[test]
fn a_layer_of_known_modulus_is_a_bed_of_springs() {
    let filler = |lines: &str| {
        read(&format!("{}\n[filler]\n{lines}\n", plain()))
            .filler(0)
            .expect("a filler is stated")
            .clone()
    };
    let stiffness = |lines: &str| filler(lines).stiffness();
    let close = |lines: &str, expected: f64| {
        let found = stiffness(lines);
        assert!(
            found.is_some_and(|found| near(found, expected)),
            "{lines}: {found:?}"
        );
    };
    // κ = M/t by hand.
    let own = "conductivity = \"3 W/(m·K)\"\nthickness = \"0.5 mm\"";
    close(&format!("{own}\nmodulus = \"2 MPa\""), 4e9);
    assert_eq!(stiffness(own), None, "no modulus, no spring");
    // Catalogue pads press by their own modulus over the thickness stated or supplied.
    close("name = \"gap pad\"", 0.5e6 / 1e-3);
    close("name = \"gap pad\"\nthickness = \"2 mm\"", 0.5e6 / 2e-3);
    close("name = \"gap pad\"\nmodulus = \"0.2 MPa\"", 0.2e6 / 1e-3);
    close("name = \"graphite foil\"", 50e6 / 130e-6);
    close(
        "name = \"filled grease\"\nbond_line = \"50 µm\"\nmodulus = \"1 GPa\"",
        1e9 / 50e-6,
    );
    // Indium flows plastically, pastes and fluids flow away, and a table knows no thickness.
    for soft in [
        "name = \"indium foil\"",
        "name = \"filled grease\"",
        "name = \"silicone oil\"",
        "name = \"gap pad\"\ntable = [[\"0 Pa\", \"1 K·cm²/W\"]]",
    ] {
        assert_eq!(stiffness(soft), None, "{soft}");
    }
}

#[test]
fn a_modulus_of_the_catalogue_is_an_assumption_and_a_stated_one_is_none() {
    let assumed = |lines: &str| {
        let joint = read(&format!("{}\n[filler]\n{lines}\n", plain()));
        let mut all = joint.assumptions.into_iter();
        all.find(|assumption| assumption.field == "filler.modulus")
    };
    let told = assumed("name = \"gap pad\"").expect("taken from the catalogue");
    assert_eq!(told.value, "500 kPa");
    assert!(told.why.starts_with("catalogue value"), "{told:?}");
    assert_eq!(assumed("name = \"gap pad\"\nmodulus = \"0.2 MPa\""), None);
    assert_eq!(assumed("name = \"indium foil\""), None);
}

#[test]
fn a_foil_takes_its_hardness_from_the_catalogue_or_the_file() {
    let known = filler("name = \"indium foil\"\nmodel = \"foil\"");
    assert!(
        matches!(known, FillerKind::Foil { hardness, thickness, .. } if near(hardness, 9e6) && near(thickness, 1e-4)),
        "{known:?}"
    );
    let own = filler(
        "model = \"foil\"\nconductivity = \"35 W/(m·K)\"\nthickness = \"50 µm\"\nhardness = \"40 MPa\"",
    );
    assert!(
        matches!(own, FillerKind::Foil { hardness, .. } if near(hardness, 4e7)),
        "{own:?}"
    );
}
