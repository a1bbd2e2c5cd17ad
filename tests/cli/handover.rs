//! What other programs take over: maps as tables, nodes with their conductances.

use crate::{json, names, ringsum, stderr, within};
use nalgebra::{DMatrix, DVector};
use std::{collections::BTreeMap, fs, path::Path};
use tempfile::tempdir;

/// The rows of a table by the names of its columns.
fn rows(path: &Path) -> Vec<BTreeMap<String, String>> {
    let mut reader = csv::Reader::from_path(path).expect("the table is there");
    let names = reader.headers().expect("a heading").clone();
    reader
        .records()
        .map(|row| {
            let row = row.expect("a row");
            let cells = names.iter().zip(row.iter());
            cells
                .map(|(name, cell)| (name.to_owned(), cell.to_owned()))
                .collect()
        })
        .collect()
}

fn number(row: &BTreeMap<String, String>, name: &str) -> f64 {
    row[name]
        .parse()
        .unwrap_or_else(|_| panic!("{name} in {row:?}"))
}

/// Temperatures of all nodes, K, one watt put in at the source and the sink held at zero.
fn network(links: &[&BTreeMap<String, String>]) -> BTreeMap<String, f64> {
    let mut nodes: Vec<String> = Vec::new();
    for node in links
        .iter()
        .flat_map(|row| [&row["node_a"], &row["node_b"]])
    {
        if node != "sink" && !nodes.contains(node) {
            nodes.push(node.clone());
        }
    }
    let place = |node: &str| nodes.iter().position(|known| known == node);
    let mut matrix = DMatrix::<f64>::zeros(nodes.len(), nodes.len());
    for row in links {
        let conductance = number(row, "conductance_W_per_K");
        let ends = [place(&row["node_a"]), place(&row["node_b"])];
        for end in ends.into_iter().flatten() {
            matrix[(end, end)] += conductance;
        }
        if let [Some(one), Some(other)] = ends {
            matrix[(one, other)] -= conductance;
            matrix[(other, one)] -= conductance;
        }
    }
    let mut heat = DVector::zeros(nodes.len());
    heat[place("source").expect("a source")] = 1.0;
    let solved = matrix.lu().solve(&heat).expect("a connected network");
    nodes.into_iter().zip(solved.iter().copied()).collect()
}

/// Every case; one alone stands at the top level.
fn cases(object: &serde_json::Value) -> Vec<&serde_json::Value> {
    match object["cases"].as_array().map(Vec::as_slice) {
        Some([]) | None => vec![object],
        Some(several) => several.iter().collect(),
    }
}

#[test]
fn a_network_of_the_written_conductances_gives_the_results_again() {
    for joint in ["converter_box", "avionics_shim"] {
        let folder = tempdir().unwrap();
        let table = folder.path().join("nodes.csv");
        let file = format!("joints/{joint}.toml");
        let object = json(
            &ringsum()
                .args([
                    "estimate",
                    &file,
                    "--resolution",
                    "fast",
                    "--draws",
                    "0",
                    "--json",
                    "--nodes",
                ])
                .arg(&table)
                .assert()
                .code(0),
        );
        let rows = rows(&table);
        for case in cases(&object) {
            let links: Vec<_> = rows
                .iter()
                .filter(|row| case["case"] == row["case"].as_str())
                .collect();
            let found = network(&links);
            let result = |name: &str| {
                case["results"][name]["resistance"]["nominal"]
                    .as_f64()
                    .unwrap()
            };
            // Rounding of a small system of equations.
            let same = |one: f64, other: f64| (one / other - 1.0).abs() < 1e-9;
            assert!(
                same(found["source"], result("source_to_sink")),
                "{joint}: {found:?}"
            );
            assert!(
                same(
                    found[&links[0]["node_b"]] - found[&links[links.len() - 1]["node_a"]],
                    result("node_to_node")
                ),
                "{joint}: {found:?}"
            );
        }
    }
}

#[test]
fn nodes_carry_the_band_of_two_plates_and_are_refused_where_there_are_none() {
    let folder = tempdir().unwrap();
    let table = folder.path().join("nodes.csv");
    let object = json(
        &ringsum()
            .args([
                "estimate",
                "joints/rig_coupon.toml",
                "--resolution",
                "fast",
                "--draws",
                "64",
            ])
            .args(["--json", "--nodes"])
            .arg(&table)
            .assert()
            .code(0),
    );
    let rows = rows(&table);
    let conductance = &object["results"]["node_to_node"]["conductance"];
    for (name, key) in [
        ("conductance_W_per_K_low", "low"),
        ("conductance_W_per_K_high", "high"),
    ] {
        let told = conductance[key].as_f64().unwrap();
        assert!(
            (number(&rows[1], name) / told - 1.0).abs() < 1e-12,
            "{name}"
        );
    }
    let cone = |rest: &[&str]| {
        within(&folder)
            .arg("estimate")
            .arg(fs::canonicalize("joints/rig_coupon.toml").unwrap())
            .args(["--field", "cone", "--draws", "0", "--nodes"])
            .args(rest)
            .assert()
    };
    assert!(stderr(&cone(&["nodes.csv"]).code(2)).contains("--force"));
    assert!(stderr(&cone(&["other.csv"]).code(2)).contains("--field cone"));
    assert_eq!(names(folder.path()), ["nodes.csv"], "no half file is left");
}

#[test]
fn maps_carry_the_clamp_force_and_the_drop_between_the_faces() {
    let folder = tempdir().unwrap();
    let out = folder.path().join("maps");
    ringsum()
        .args([
            "draw",
            "joints/converter_box.toml",
            "--resolution",
            "fast",
            "--maps",
            "--out",
        ])
        .arg(&out)
        .assert()
        .code(0);
    let object = json(
        &ringsum()
            .args([
                "estimate",
                "joints/converter_box.toml",
                "--resolution",
                "fast",
            ])
            .args(["--draws", "0", "--json"])
            .assert()
            .code(0),
    );
    for case in cases(&object) {
        let rows = rows(&out.join(format!("map_1_{}.csv", case["case"].as_str().unwrap())));
        let mut places: Vec<f64> = rows.iter().map(|row| number(row, "x_m")).collect();
        places.sort_by(f64::total_cmp);
        places.dedup();
        let step = places
            .windows(2)
            .map(|pair| pair[1] - pair[0])
            .fold(f64::INFINITY, f64::min);
        let area = step * step;
        let force: f64 = rows
            .iter()
            .map(|row| number(row, "pressure_Pa") * area)
            .sum();
        let bolts = case["bolts"].as_array().unwrap();
        let clamped: f64 = bolts
            .iter()
            .map(|bolt| bolt["force_in_service"]["nominal"].as_f64().unwrap())
            .sum();
        // The points of the map are read between the cells of the fast grid, whose peaks are sharp.
        assert!(
            (force / clamped - 1.0).abs() < 0.05,
            "{force} N of {clamped} N"
        );
        let drops = rows
            .iter()
            .map(|row| number(row, "warm_face_K_per_W") - number(row, "cold_face_K_per_W"));
        let mean = drops.sum::<f64>() / rows.len() as f64;
        let told = case["interfaces"][0]["drop_per_watt"].as_f64().unwrap();
        // Likewise.
        assert!((mean / told - 1.0).abs() < 0.05, "{mean} K/W of {told} K/W");
        let heat = object["heat"].as_f64().unwrap();
        let crossing: f64 = rows
            .iter()
            .map(|row| number(row, "flux_W_per_m2") * area)
            .sum();
        // Likewise, and shanks carry a share that is less than that.
        assert!(
            (crossing / heat - 1.0).abs() < 0.02,
            "{crossing} W of {heat} W"
        );
        let sink = case["sink_temperature"].as_f64().unwrap();
        for row in &rows {
            let above = number(row, "warm_face_K") - sink;
            // Rounding.
            assert!((above - heat * number(row, "warm_face_K_per_W")).abs() < 1e-9);
        }
    }
}

/// A round pair is solved in radius and height, and its map reads the same.
#[test]
fn the_map_of_a_round_pair_carries_its_heat() {
    let folder = tempdir().unwrap();
    let out = folder.path().join("maps");
    ringsum()
        .args(["draw", "tests/data/joints/round_single.toml"])
        .args(["--resolution", "fast", "--maps", "--out"])
        .arg(&out)
        .assert()
        .code(0);
    let mut maps = 0;
    for name in names(&out) {
        let file = out.join(name);
        if file.extension().is_none_or(|ending| ending != "csv") {
            continue;
        }
        maps += 1;
        let rows = rows(&file);
        let mut places: Vec<f64> = rows.iter().map(|row| number(row, "x_m")).collect();
        places.sort_by(f64::total_cmp);
        places.dedup();
        let step = places
            .windows(2)
            .map(|pair| pair[1] - pair[0])
            .fold(f64::INFINITY, f64::min);
        let shares = rows.iter().map(|row| number(row, "flux_per_m2"));
        let crossing = shares.sum::<f64>() * step * step;
        // The rim of the hole, where flux is highest, is told by squares.
        assert!((crossing - 1.0).abs() < 0.05, "{crossing}");
    }
    assert!(maps > 0);
}
