//! Broken copies of every embedded file: each must be refused.

use crate::catalog::{
    fillers, finishes, friction, gases, grades, materials, methods, platings, raw::CatalogFault,
    seats, threads,
};

type Read = fn(&str) -> Result<(), CatalogFault>;

const FILES: [(&str, &str, Read); 11] = [
    ("materials", include_str!("materials.toml"), |text| {
        materials::read(text).map(drop)
    }),
    ("finishes", include_str!("finishes.toml"), |text| {
        finishes::read(text).map(drop)
    }),
    ("threads", include_str!("threads.toml"), |text| {
        threads::read(text).map(drop)
    }),
    ("seats", include_str!("seats.toml"), |text| {
        seats::read(text).map(drop)
    }),
    ("holes", include_str!("holes.toml"), |text| {
        seats::read_holes(text).map(drop)
    }),
    ("grades", include_str!("grades.toml"), |text| {
        grades::read(text).map(drop)
    }),
    ("friction", include_str!("friction.toml"), |text| {
        friction::read(text).map(drop)
    }),
    ("methods", include_str!("methods.toml"), |text| {
        methods::read(text).map(drop)
    }),
    ("gases", include_str!("gases.toml"), |text| {
        gases::read(text).map(drop)
    }),
    ("fillers", include_str!("fillers.toml"), |text| {
        fillers::read(text).map(drop)
    }),
    ("platings", include_str!("platings.toml"), |text| {
        platings::read(text).map(drop)
    }),
];

/// The text behind `[sources]`, where the records stand, with its first `old` replaced.
fn broken(text: &str, old: &str, new: &str) -> Option<String> {
    let records = text.find("\n[[")?;
    let place = records + text[records..].find(old)?;
    Some(format!(
        "{}{new}{}",
        &text[..place],
        &text[place + old.len()..]
    ))
}

/// The same with the rest of the line behind the first `key` replaced.
fn relined(text: &str, key: &str, value: &str) -> Option<String> {
    let records = text.find("\n[[")?;
    let place = records + text[records..].find(key)? + key.len();
    let end = place + text[place..].find('\n')?;
    Some(format!("{}{value}{}", &text[..place], &text[end..]))
}

/// Every file that can be broken so is refused, and not for its syntax; says how many there were.
fn refused(breakage: impl Fn(&str) -> Option<String>) -> usize {
    let copies = FILES
        .iter()
        .filter_map(|(name, text, read)| breakage(text).map(|copy| (name, copy, read)));
    copies
        .map(|(name, copy, read)| {
            assert!(
                toml::from_str::<toml::Table>(&copy).is_ok(),
                "{name} is no TOML"
            );
            assert!(read(&copy).is_err(), "{name} is read though broken");
        })
        .count()
}

/// Files refused once their first `old` reads `new`.
fn swapped(old: &str, new: &str) -> usize {
    refused(|text| broken(text, old, new))
}

/// Files refused once the line of their first `key` holds `value`.
fn set(key: &str, value: &str) -> usize {
    refused(|text| relined(text, &format!("\n{key} = "), value))
}

#[test]
fn the_files_as_they_are_are_read() {
    for (name, text, read) in FILES {
        assert_eq!(read(text), Ok(()), "{name}");
    }
}

#[test]
fn a_record_without_status_or_source_is_refused() {
    assert_eq!(swapped("status = ", "state = "), 11);
    assert_eq!(swapped("source = ", "origin = "), 11);
    assert_eq!(swapped("status = \"", "status = \"quite "), 11);
    assert_eq!(swapped("source = \"", "source = \"un"), 11);
}

#[test]
fn a_value_without_its_unit_is_refused() {
    for unit in [
        "_W_mK",
        "_GPa",
        "_MPa",
        "_um_mK",
        "_um",
        "_mm",
        "_in",
        "_nm",
        "_HV",
        "_K",
        "_Pa",
        "_percent",
        "_kg_m3",
        "_per_100mm",
    ] {
        assert!(swapped(&format!("{unit} = "), " = ") > 0, "{unit}");
    }
}

#[test]
fn numbers_that_cannot_be_are_refused() {
    let datum = r#"{ value = 0, status = "memory", source = "handbook" }"#;
    assert_eq!(swapped("value = ", "value = -"), 6);
    assert_eq!(set("conductivity_W_mK", datum), 5);
    let datum = r#"{ value = 2, range = [3, 1], status = "memory", source = "handbook" }"#;
    assert_eq!(set("conductivity_W_mK", datum), 5);
    let datum = r#"{ value = 0.5, status = "memory", source = "handbook" }"#;
    assert_eq!(set("poisson", datum), 1);
    assert_eq!(swapped("outer_mm = ", "outer_mm = -"), 1);
    assert_eq!(swapped("inner_mm = ", "inner_mm = 9"), 1);
    assert_eq!(
        swapped("diameters_mm = [1.7, 1.8", "diameters_mm = [1.7, 1.6"),
        1
    );
    assert_eq!(set("diameters_mm", "[16, 1.5]"), 1);
    assert_eq!(swapped("pitch_mm = ", "pitch_mm = 9"), 1);
    assert_eq!(swapped("per_inch = ", "per_inch = -"), 1);
    assert_eq!(set("scatter", "[0.2, 0.1]"), 1);
    assert_eq!(set("scatter", "[0.2, 1]"), 1);
    assert_eq!(set("values", "[0.1, 0.3, 0.2]"), 1);
    assert_eq!(
        set(
            "proof_MPa",
            r#"{ value = 9000, status = "seen", source = "iso-898" }"#
        ),
        1
    );
    assert_eq!(
        set(
            "tensile_MPa",
            r#"{ value = 9, status = "seen", source = "iso-898" }"#
        ),
        1
    );
    assert_eq!(swapped("prandtl = [", "prandtl = [-"), 1);
    assert_eq!(swapped("heat_ratio = [", "heat_ratio = [1, "), 1);
    assert_eq!(swapped("temperatures_K = [", "temperatures_K = [9"), 2);
    assert_eq!(set("points_kPa_cm2K_W", "[[70, 4], [60, 3]]"), 1);
    assert_eq!(set("points_kPa_cm2K_W", "[[70, 4], [350, 5]]"), 1);
    // The first filler is a fluid, which has no modulus.
    let modulus = r#"modulus_MPa = { value = 2, status = "memory", source = "handbook" }"#;
    assert_eq!(
        swapped("creeps = false", &format!("{modulus}\ncreeps = false")),
        1
    );
    assert_eq!(
        swapped("contraction_percent = [0.4", "contraction_percent = [0.1"),
        1
    );
    assert_eq!(set("valid_K", "[300, 4]"), 1);
    assert_eq!(swapped("coefficients = [", "coefficients = [1, "), 1);
    assert_eq!(swapped("c2 = -", "c2 = "), 1);
}

#[test]
fn a_name_given_twice_is_refused() {
    for (name, text, read) in FILES {
        let from = text.find("\n[[").expect("every file has records");
        // The first record or group once more, behind all others.
        let first = &text[from..];
        let end = first[3..].find("\n[[").map_or(first.len(), |end| end + 3);
        let copy = format!("{text}{}", &first[..end]);
        assert!(
            toml::from_str::<toml::Table>(&copy).is_ok(),
            "{name} is no TOML"
        );
        assert!(read(&copy).is_err(), "{name} is read though doubled");
    }
    // Materials, finishes, grades, friction, methods, gases, fillers, platings, seats.
    assert_eq!(set("aliases", "[\"one more\", \"One-More\"]"), 9);
}

#[test]
fn a_key_nobody_reads_and_a_name_nobody_bears_are_refused() {
    assert_eq!(swapped("\nname = ", "\nlucky = 7\nname = "), 8);
    // Six files give status inside a value, the others on a line of its own.
    assert_eq!(swapped("value = ", "lucky = 7, value = "), 6);
    assert_eq!(swapped("\nstatus = ", "\nlucky = 7\nstatus = "), 8);
    assert_eq!(
        swapped("conductivity_fit = \"", "conductivity_fit = \"no "),
        1
    );
    assert_eq!(swapped("\ncontraction = \"", "\ncontraction = \"no "), 1);
    assert_eq!(swapped("like = \"", "like = \"no "), 1);
}
