//! Temperatures and flux that are drawn, against the resistances of the same solution.
//!
//! Balances and identities: no number here comes from outside.

#[path = "shared/joints.rs"]
mod joints;

use joints::fast;
use ringsum::{
    estimate::{Chain, HeatMap, Realisation, StackSection, heat_map, stack_section},
    joint::{self, Joint},
    resistance::columns::Across,
};

fn joint(file: &str) -> Joint {
    let text = std::fs::read_to_string(format!("tests/data/joints/{file}.toml"));
    joint::read(&text.expect("the file is there")).expect("a good joint")
}

fn drawn(chain: &Chain) -> (HeatMap, StackSection) {
    let map = heat_map(chain, 0, 200).expect("a state").expect("a map");
    let section = stack_section(chain).expect("a state").expect("a section");
    (map, section)
}

fn mean(values: impl Iterator<Item = f64>) -> f64 {
    let kept: Vec<f64> = values.filter(|value| !value.is_nan()).collect();
    kept.iter().sum::<f64>() / kept.len() as f64
}

#[test]
fn the_faces_carry_the_drop_and_the_heat_of_the_solution() {
    for file in ["case_i", "round_single"] {
        let joint = joint(file);
        let chain = fast(&joint);
        let path = chain
            .state(0, &Realisation::default())
            .expect("a state")
            .path;
        let (map, _) = drawn(&chain);
        let pairs = map.rises[0].iter().zip(&map.rises[1]);
        let drop = mean(pairs.map(|(warm, cold)| warm - cold));
        // Cells of 0.3 to 0.4 mm against the grid of the heat.
        assert!(
            (drop / path.interface_drop - 1.0).abs() < 0.02,
            "{file}: {drop} {path:?}"
        );
        // A mean of multiples of the mean; the edge of contact runs through cells of the map.
        let concentration = mean(map.concentration.iter().copied());
        assert!(
            (concentration - 1.0).abs() < 0.05,
            "{file}: {concentration}"
        );
    }
}

#[test]
fn a_section_agrees_with_the_faces_and_stays_below_the_hottest_point() {
    for (file, tolerance) in [
        // The same columns are read at the same place.
        ("case_i", 1e-9),
        // The section knows the grid lines alone, the faces the nodes between them too.
        ("round_single", 5e-3),
    ] {
        let joint = joint(file);
        let chain = fast(&joint);
        let hottest = chain
            .temperatures(0)
            .expect("a state")
            .expect("a heat")
            .hottest;
        let (_, section) = drawn(&chain);
        let through = section.through.last().expect("a place away from bolts");
        let point = match section.across {
            Across::X(y) => [through.along, y],
            Across::Y(x) => [x, through.along],
        };
        let faces = chain
            .face_points(&[point])
            .expect("a state")
            .expect("a heat");
        let known = faces[0].expect("on the faces").rises;
        let warm = through.plates[0].first().expect("a lower face")[1];
        let cold = through.plates[1].last().expect("an upper face")[1];
        for (found, known) in [warm, cold].into_iter().zip(known) {
            assert!(
                (found - known).abs() < tolerance * hottest,
                "{file}: {found} for {known}"
            );
        }
        let values = section
            .plates
            .iter()
            .flat_map(|plate| plate.section.rise.iter().flatten());
        let highest = values.flatten().copied().fold(0.0, f64::max);
        assert!(
            highest <= hottest * (1.0 + 1e-9) && highest > 0.5 * hottest,
            "{file}"
        );
        // The warm plate lies on top.
        assert!(section.plates[0].section.heights[0] > section.plates[1].section.heights[0]);
    }
}

#[test]
fn the_cone_solves_no_temperatures() {
    let joint = joint("case_i");
    let chain = Chain::new(&joint).expect("a chain");
    assert_eq!(heat_map(&chain, 0, 50), Ok(None));
    assert_eq!(stack_section(&chain), Ok(None));
    assert_eq!(chain.temperatures(0), Ok(None));
}
