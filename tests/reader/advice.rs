//! What the reader advises for slips that newcomers make.

use super::{FASTENER, PLATES, SERVICE, codes, joint, plain, read};

/// Everything said about a faulty file, as one text.
fn told(text: &str) -> String {
    told_with(text, &[])
}

fn told_with(text: &str, sets: &[&str]) -> String {
    let sets: Vec<String> = sets.iter().map(|set| (*set).to_owned()).collect();
    let faults = joint::read_with(text, &sets).expect_err("the file is faulty");
    faults.shown("joint.toml", super::Colour::Plain)
}

/// The help for a material that nobody knows.
fn help_for_material(name: &str) -> String {
    let text = plain().replacen("\"Al 6061-T6\"", &format!("\"{name}\""), 1);
    let faults = joint::read(&text).expect_err("no such material");
    assert_eq!(faults.len(), 1, "{name}: {faults:?}");
    faults[0].help.clone().unwrap_or_default()
}

#[test]
fn a_family_word_lists_its_family() {
    for (word, names) in [
        ("aluminium", "`Al 6061-T6`"),
        ("aluminum", "`Al 6061-T6`"),
        ("Al", "`Al 6061-T6`"),
        ("alu", "`Al 6061-T6`"),
        ("copper", "`Cu OFHC` or `Cu ETP`"),
        ("Cu", "`Cu OFHC` or `Cu ETP`"),
        ("C101", "`Cu OFHC`"),
        ("C110", "`Cu ETP`"),
        ("C360", "`Brass C36000`"),
        ("steel", "`Steel 1018`"),
        ("stainless", "`304`, `316`"),
        ("stainless steel", "`304`, `316`"),
        ("titanium", "`Ti-6Al-4V`"),
        ("brass", "`Brass C36000` or `Brass C26000`"),
        // A slip of a family word means the family.
        ("aluminim", "`Al 6061-T6`"),
        ("coper", "`Cu OFHC` or `Cu ETP`"),
    ] {
        let help = help_for_material(word);
        assert!(help.contains(names), "{word}: {help}");
        for stranger in ["Alumina", "AlN", "`1100`", "`In`", "`1018`"] {
            assert!(!help.contains(stranger), "{word}: {help}");
        }
        // The advice that follows has two names of tables of its own.
        let listed = help.split('?').next().unwrap_or_default();
        assert!(listed.matches('`').count() <= 10, "{word}: {help}");
    }
}

#[test]
fn another_number_is_another_alloy() {
    for stranger in [
        "7050",
        "C18000",
        "AISI 303",
        "Al 6016-T6",
        "Au",
        "Fe",
        "2219",
    ] {
        let help = help_for_material(stranger);
        assert!(!help.contains("did you mean"), "{stranger}: {help}");
    }
    assert!(help_for_material("Al 6061-T7").contains("did you mean `Al 6061-T6`?"));
    assert!(help_for_material("Zircalloy-4").contains("did you mean `Zircaloy-4`?"));
}

#[test]
fn a_material_is_listed_once() {
    let help = help_for_material("Grade 5");
    assert_eq!(help.matches("Ti-6Al-4V").count(), 1, "{help}");
    let grade = told(&plain().replace("8.8", "Grade 5"));
    assert_eq!(grade.matches("SAE J429 grade 5").count(), 1, "{grade}");
}

#[test]
fn a_far_thread_is_not_suggested() {
    let told = told(&plain().replace("\"M4\"", "\"M4.2\""));
    assert!(!told.contains("did you mean"), "{told}");
}

#[test]
fn a_bare_friction_is_offered_thread_and_head() {
    for friction in ["0.15", "\"0.15\""] {
        let text = plain() + &format!("friction = {friction}\n");
        assert_eq!(codes(&text).len(), 1);
        let told = told(&text);
        let offer = "`friction = { thread = 0.15, head = 0.15 }`";
        assert!(told.contains(offer), "{told}");
    }
    let range = told(&(plain() + "friction = [0.1, 0.2]\n"));
    let offer = "`friction = { thread = [0.1, 0.2], head = [0.1, 0.2] }`";
    assert!(range.contains(offer), "{range}");
}

#[test]
fn a_bare_number_for_a_material_is_offered_its_name_in_quotes() {
    let told = told_with(&plain(), &["plate.box.material=7075"]);
    assert!(told.contains("`material = \"Al 7075-T6\"`"), "{told}");
    let told = told_with(&plain(), &["plate.box.material=304"]);
    assert!(told.contains("`material = \"304\"`"), "{told}");
    let told = told_with(&plain(), &["plate.box.material.like=7075"]);
    assert!(told.contains("`Al 7075-T6` or `Al 7075-T73`"), "{told}");
}

#[test]
fn a_rise_under_the_name_of_its_place_is_one_fault() {
    for of in ["hottest", "interface", "mean"] {
        let service = format!("{SERVICE}heat = \"20 W\"\nrequire = {{ {of} = \"5 K\" }}\n");
        let text = [service.as_str(), PLATES, FASTENER].concat();
        assert_eq!(codes(&text), ["file/unknown-key"], "{of}");
        let told = told(&text);
        let offer = format!("`{{ rise = \"5 K\", of = \"{of}\" }}`");
        assert!(told.contains(&offer), "{told}");
    }
    // What is stated as the rise is still read as one.
    let service = format!("{SERVICE}heat = \"20 W\"\nrequire = {{ hottest = \"5 N\" }}\n");
    let text = [service.as_str(), PLATES, FASTENER].concat();
    assert_eq!(codes(&text), ["file/unknown-key", "unit/not-a-quantity"]);
}

#[test]
fn heat_beyond_the_data_is_not_told_as_cold() {
    let hot = plain().replace("\"vacuum\"\n", "\"vacuum\"\ntemperature = \"1000 °C\"\n");
    let told = told(&hot);
    for word in ["cold", "A2-70", "77 K"] {
        assert!(!told.contains(word), "{told}");
    }
    assert!(told.contains("up to 450 K"), "{told}");
    // The tightening may be the hot one; it matters where cases let the force follow temperature.
    let assembly = "temperature = { hot = \"30 °C\", cold = \"20 °C\", assembly = \"600 °C\" }\n";
    let hot = plain().replace("\"vacuum\"\n", &format!("\"vacuum\"\n{assembly}"));
    assert!(codes(&hot).contains(&"material/above-range"));
}

#[test]
fn smart_quotes_are_shown_straight() {
    let told = told(&plain().replace("\"box\"", "“box”"));
    assert!(told.contains("expected `\"box\"`"), "{told}");
    let told = super::advice::told(&plain().replace("\"box\"", "‘box’"));
    assert!(told.contains("expected `\"box\"`"), "{told}");
}

/// An unknown washer is told whatever else is wrong.
#[test]
fn an_unknown_washer_is_told_beside_any_other_fault() {
    let good = plain() + "washer = \"yes\"\nnut_washer = \"no\"\n";
    assert_eq!(codes(&good), ["name/unknown"; 2]);
    for (right, wrong) in [
        ("\"M4\"", "\"M4.2\""),
        ("\"8.8\"", "\"8.9\""),
        ("\"socket\"", "\"sockt\""),
        ("\"2 N·m\"", "\"2 N\""),
        ("head = \"socket\"", "head = \"socket\"\nhole = \"4 mm\""),
        ("head = \"socket\"", "head = \"socket\"\nbearing = \"4 N\""),
        ("head = \"socket\"", "head = \"socket\"\nfrom = \"lid\""),
        (
            "head = \"socket\"",
            "head = \"socket\"\nengagement = \"glue\"",
        ),
        (
            "name = \"panel\"\nmaterial = \"Al 6061-T6\"\nthickness = \"5 mm\"",
            "name = \"panel\"\nmaterial = \"Al 6061-T6\"\nthickness = \"5 N\"",
        ),
    ] {
        let text = good.replacen(right, wrong, 1);
        assert_ne!(text, good, "{right}");
        let faults = codes(&text);
        assert!(faults.len() == 3, "{wrong}: {faults:?}");
        let told = told(&text);
        assert!(told.contains("no washer `yes`"), "{told}");
        assert!(told.contains("no washer `no`"), "{told}");
    }
    // Without plates as well.
    let alone = [SERVICE, FASTENER, "washer = \"yes\"\n"].concat();
    assert_eq!(codes(&alone), ["file/missing-key", "name/unknown"]);
}

#[test]
fn no_thread_is_longer_than_its_plate_is_thick() {
    for kind in ["insert", "tapped"] {
        let long = format!("engagement = {{ kind = \"{kind}\", length = \"9 mm\" }}\n");
        assert_eq!(codes(&(plain() + &long)), ["value/range"]);
        let told = told(&(plain() + &long));
        assert!(told.contains("at most 5 mm"), "{told}");
        // As long as the plate is thick is what a thread through it is.
        let fits = plain() + &long.replace("9 mm", "5 mm");
        assert_eq!(read(&fits).fasteners.len(), 1);
    }
}
