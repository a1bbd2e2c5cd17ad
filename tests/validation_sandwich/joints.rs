//! Whole joints on sandwich panels: turned upside down, and with cores of many kinds.

use std::f64::consts::PI;

use ringsum::{
    estimate::{self, CaseResult, Chain, Choice, Fineness, Options, Watch},
    joint,
};

/// The panel's table.
fn panel(sandwich: &str, rest: &str) -> String {
    format!(
        "[[plate]]\nname = \"panel\"\nmaterial = \"Al 2024-T3\"\nthickness = \"12 mm\"\nsandwich = {{ {sandwich} }}\n\
         size = [\"50 mm\", \"40 mm\"]\nfinish = {{ roughness = \"Rq 1 µm\", slope = 0.1, flatness = \"0 mm\" }}\n{rest}\n"
    )
}

/// The base's table.
fn base(rest: &str) -> String {
    format!(
        "[[plate]]\nname = \"base\"\nmaterial = \"Al 6061-T6\"\nthickness = \"4 mm\"\nsize = [\"50 mm\", \"40 mm\"]\n\
         finish = {{ roughness = \"Rq 1 µm\", slope = 0.1, flatness = \"0 mm\" }}\n{rest}\n"
    )
}

/// A file of two plates with two bolts; heads on the base, inserts of 8 mm.
fn file(plates: &[String; 2], proud: &str) -> String {
    format!(
        "[service]\nmedium = \"air\"\n{}{}[fastener]\nthread = \"M4\"\ngrade = \"8.8\"\nfrom = \"base\"\n\
         bearing = \"8 mm\"\nhole = \"4.5 mm\"\npreload = \"2 kN\"\nshank_path = false\n\
         engagement = {{ kind = \"insert\", length = \"8 mm\", flange = \"14 mm\", proud = \"{proud}\" }}\n\
         at = [[\"10 mm\", \"20 mm\"], [\"40 mm\", \"20 mm\"]]\n",
        plates[0], plates[1]
    )
}

fn case(text: &str) -> CaseResult {
    let joint = joint::read(text).unwrap_or_else(|faults| panic!("{faults:#?}"));
    let choice = Choice::elastic(Fineness::Fast, 1_000_000_000);
    let chain = Chain::of(&joint, choice, &Watch::none()).expect("it has a field");
    let options = Options { draws: 0, seed: 1 };
    let found = estimate::nominal(&chain, &options).expect("it has a number");
    found.cases[0].clone()
}

const CORE: &str =
    "face_sheet = \"0.5 mm\", core_conductivity = \"1.2 W/(m·K)\", core_modulus = \"600 MPa\"";
const ISOTHERMAL: &str = "heated = { face = \"isothermal\" }";

// Held on both outer faces, heat meets the same resistance either way, whatever lies between (reciprocity).
// An insert that ends in the core makes the panel's layers differ: turned about wrongly they would conduct
// by another sum. 1e-6: residuals of both solutions, and the held faces.
#[test]
fn a_panel_conducts_the_same_upside_down() {
    let last = file(&[base(ISOTHERMAL), panel(CORE, "")], "20 µm");
    let first = file(&[panel(CORE, ISOTHERMAL), base("")], "20 µm");
    let [last, first] =
        [last, first].map(|text| case(&text).results.source_to_sink.resistance.nominal);
    assert!((first / last - 1.0).abs() < 1e-6, "{first} {last}");
}

// Bounds of a conduction path (textbook, from memory): planes held at one temperature can only help heat,
// walls that it may not cross can only hinder it. Inserts of 11 mm leave half a millimetre of the core.
// Base and sheets stand in series with both; 2 % on the areas, which are sampled.
#[test]
fn heat_through_long_inserts_stays_between_its_bounds() {
    let text = file(&[base(ISOTHERMAL), panel(CORE, "")], "0 µm");
    let found = case(&text.replace("length = \"8 mm\"", "length = \"11 mm\""));
    let joint = joint::read(&text).expect("it is read");
    let k = |plate: usize| joint.plates[plate].material.conductivity.value;
    let sandwich = joint.plates[1].sandwich.as_ref().expect("a sandwich");
    let (insert, core) = (sandwich.insert.conductivity.value, 1.2);
    let hole = PI * 2.25e-3 * 2.25e-3;
    let far_hole = joint.fasteners[0].hole_radius[1].powi(2) * PI;
    let filled = 2.0 * (PI * 7e-3 * 7e-3 - far_hole);
    let whole = 50e-3 * 40e-3 - 2.0 * far_hole;
    let ends = 4e-3 / (k(0) * (50e-3 * 40e-3 - 2.0 * hole));
    let above = 10.5e-3 / (insert * filled + core * (whole - filled));
    let lower = ends + above + 0.5e-3 / (core * whole);
    let sheets = 1e-3 / k(1);
    let by_insert = filled / (10.5e-3 / insert + 0.5e-3 / core + sheets);
    let by_core = (whole - filled) / (11e-3 / core + sheets);
    let upper = ends + 1.0 / (by_insert + by_core);
    let found = found.results.perfect_contact.resistance.nominal;
    assert!(
        0.98 * lower < found && found < 1.02 * upper,
        "{lower} {found} {upper}"
    );
    // Inserts that stop at 8 mm leave seven times the core below them.
    let short = case(&text).results.perfect_contact.resistance.nominal;
    assert!(short > 1.5 * found, "{short} {found}");
}

// Proud inserts part the faces beside them: in air the joint loses most of what crosses there.
#[test]
fn inserts_that_stand_out_more_never_conduct_better() {
    let found: Vec<f64> = ["0 µm", "20 µm", "100 µm"]
        .into_iter()
        .map(|proud| {
            let text = file(&[base(""), panel(CORE, "")], proud);
            case(&text).results.source_to_sink.resistance.nominal
        })
        .collect();
    assert!(found[0] < found[1] && found[1] < found[2], "{found:?}");
}
