//! What a fit of one unknown warns of: several ranges, a model that is refuted, a curve too coarse.

use ringsum::{diagnostic::Caution, estimate::Choice, fit::unknown::Answer};

use crate::answer_with;

const JOINT: &str = "tests/data/joints/case_i.toml";

fn told<'a>(answer: &'a Answer, code: &str) -> Option<&'a Caution> {
    answer.cautions.iter().find(|caution| caution.code == code)
}

fn thickness(ends: [&str; 2], draws: u32, points: &str) -> Answer {
    let asked = ("plate.lower.thickness", ends);
    answer_with(JOINT, &[], asked, (Choice::Cone, draws, points))
}

/// A thin plate spreads badly and a thick one is long: conductance rises and falls again with the
/// thickness, so that two thicknesses explain one reading.
#[test]
fn two_thicknesses_explain_one_conductance() {
    let ends = ["2 mm", "400 mm"];
    let reading = "conductance [W/K], sigma [%]\n2.6, 2\n";
    let found = thickness(ends, 64, reading);
    let caution = told(&found, "fit/several-ranges").expect("two ranges");
    assert!(caution.text.contains("2 parts"), "{}", caution.text);
    assert_eq!(found.profile.pieces, 2);
    // One of the two alone is a range without gap.
    let found = thickness(["2 mm", "20 mm"], 64, reading);
    assert!(
        told(&found, "fit/several-ranges").is_none(),
        "{:?}",
        found.cautions
    );
}

/// Readings of one state that differ by 20 % under a standard deviation of 1 % refute every value:
/// chi squared is (10 %/1 %)² times two, of which none is explained.
#[test]
fn readings_that_contradict_each_other_refute_the_model() {
    let ends = ["2 mm", "20 mm"];
    let found = thickness(ends, 64, "conductance [W/K], sigma [%]\n2.4, 1\n2.9, 1\n");
    let caution = told(&found, "fit/model-misfit").expect("a misfit");
    assert!(caution.text.contains("for 2 of them"), "{}", caution.text);
    let found = thickness(ends, 64, "conductance [W/K], sigma [%]\n2.59, 1\n2.61, 1\n");
    assert!(
        told(&found, "fit/model-misfit").is_none(),
        "{:?}",
        found.cautions
    );
}

/// Readings of 0.01 % without other inputs ask more of the curve between solved values than it has over
/// a range of 400.
#[test]
fn a_curve_too_coarse_for_its_readings_is_told() {
    let ends = ["1 mm", "400 mm"];
    let found = thickness(ends, 0, "conductance [W/K], sigma [%]\n3, 0.01\n");
    let caution = told(&found, "fit/coarse-profile").expect("a coarse curve");
    assert!(
        caution.text.contains("narrow --from and --to"),
        "{}",
        caution.text
    );
    let found = thickness(
        ["4 mm", "8 mm"],
        0,
        "conductance [W/K], sigma [%]\n2.6, 5\n",
    );
    assert!(
        told(&found, "fit/coarse-profile").is_none(),
        "{:?}",
        found.cautions
    );
}
