//! Contact of equal plates through the chain: this project's finite elements, and what others measured of
//! its extent.

use std::f64::consts::PI;

use ringsum::estimate::{CaseResult, Realisation};
use toml::{Table, Value};

use crate::{
    joints::{fast, read, read_with},
    solved,
};

/// Bearing radius of all of these joints, m.
const BEARING: f64 = 5e-3;
const FORCE: f64 = 3000.0;

/// Two wide steel plates under one bolt; lengths over the bearing radius.
fn text(hole: f64, thickness: f64, width: f64) -> String {
    let plate = |name: &str| {
        format!(
            "[[plate]]\nname = \"{name}\"\nmaterial = \"plate\"\nthickness = \"{} mm\"\ndiameter = \"{} mm\"\nfinish = {{ roughness = \"Ra 0.8 µm\", flatness = \"0 mm\" }}\n",
            5.0 * thickness,
            10.0 * width,
        )
    };
    format!(
        "[service]\nmedium = \"vacuum\"\n[[material]]\nname = \"plate\"\nconductivity = \"50 W/(m·K)\"\nyoungs_modulus = \"200 GPa\"\npoisson = 0.3\nhardness = \"2 GPa\"\nexpansion = \"12 µm/(m·K)\"\nyield = \"400 MPa\"\n{}{}[fastener]\nthread = \"M4\"\ngrade = \"8.8\"\nhole = \"{} mm\"\nbearing = \"10 mm\"\nengagement = \"nut\"\npreload = \"{FORCE} N\"\nshank_path = false\nat = [[\"0 mm\", \"0 mm\"]]\n",
        plate("upper"),
        plate("lower"),
        10.0 * hole,
    )
}

fn result(hole: f64, thickness: f64) -> CaseResult {
    solved(&read(&text(hole, thickness, 6.0 + 2.0 * thickness)), 0)
}

#[test]
fn contact_of_equal_plates_is_that_of_finite_elements() {
    let data: Table = include_str!("../data/bolted_cases.toml")
        .parse()
        .expect("the data are TOML");
    let cases = data["case"].as_array().expect("cases");
    let case = cases
        .iter()
        .find(|case| case["id"].as_str() == Some("fe_contact"))
        .expect("the case");
    let accepted = case["measured"]["accept_rel"].as_float().expect("a number");
    let mut run = 0;
    for row in case["measured"]["rows"].as_array().expect("rows") {
        let row: Vec<f64> = row
            .as_array()
            .expect("a row")
            .iter()
            .map(|value: &Value| value.as_float().expect("a number"))
            .collect();
        let [hole, thickness, radius, edge, _] = row[..] else {
            panic!("five columns")
        };
        // A bolt needs a hole.
        if hole <= 0.0 {
            continue;
        }
        run += 1;
        let joint = read(&text(hole, thickness, 6.0 + 2.0 * thickness));
        let chain = fast(&joint);
        let state = chain.state(0, &Realisation::default()).expect("a state");
        let found = chain.bolts(0, &state)[0].contact_radius / BEARING;
        let off = found / radius - 1.0;
        assert!(off.abs() < accepted, "{row:?}: radius {found}");
        let pressure = chain
            .met_at([BEARING * hole * (1.0 + 1e-9), 0.0], &state)
            .expect("on the faces")
            .pressure;
        let found = pressure * PI * BEARING * BEARING / FORCE;
        assert!(
            (found / edge - 1.0).abs() < accepted,
            "{row:?}: edge {found}"
        );
    }
    assert_eq!(run, 9);
}

/// Cullimore and Upton 1964, Stephen 2015, Caccese et al. 2009, as the case file states them.
#[test]
fn contact_spreads_as_it_was_measured() {
    let radius = |found: &CaseResult| found.bolts[0].contact_radius;
    let [thin, thick] = [0.4, 1.0].map(|thickness| result(0.6, thickness));
    assert!(radius(&thick) > 1.1 * radius(&thin), "thickness");
    // The same plates under a wider head.
    let plates = text(0.6, 0.8, 8.0);
    let wide = solved(&read_with(&plates, &["fastener.bearing=\"13 mm\""]), 0);
    let narrow = solved(&read(&plates), 0);
    assert!(radius(&wide) > 1.1 * radius(&narrow), "bearing");
    // Twice the load: the same contact, twice the pressure.
    let twice = solved(&read_with(&plates, &["fastener.preload=\"6000 N\""]), 0);
    assert!(
        (radius(&twice) / radius(&narrow) - 1.0).abs() < 1e-9,
        "load"
    );
    let peak = twice.pressure.peak / narrow.pressure.peak;
    assert!((peak - 2.0).abs() < 1e-9, "pressure goes with load: {peak}");
    // Plates as thick as the bolt: contact ends within three of its diameters.
    let as_thick = solved(&read(&text(0.45, 0.8, 8.0)), 0);
    assert!(radius(&as_thick) < 3.0 * 4e-3, "{}", radius(&as_thick));
    // The pressure is highest at the hole and falls to nothing.
    let joint = read(&plates);
    let chain = fast(&joint);
    let state = chain.state(0, &Realisation::default()).expect("a state");
    let end = radius(&narrow);
    let along: Vec<f64> = (0..=20)
        .map(|step| {
            let radius = 3e-3 * (1.0 + 1e-9) + f64::from(step) / 20.0 * (end - 3e-3);
            chain
                .met_at([radius, 0.0], &state)
                .expect("on the faces")
                .pressure
        })
        .collect();
    assert!(along.windows(2).all(|two| two[1] < two[0]), "{along:?}");
    assert!(along[20] < 0.05 * along[0], "{along:?}");
}
