//! What generic words and unified numbers mean in the catalogue, to suggest it.

use crate::catalog::{
    materials::{material, materials},
    names::plain,
};

/// Words that name no one material, with the records they may mean.
const FAMILIES: [(&[&str], &[&str]); 10] = [
    (
        &["aluminium", "al", "alu", "aluminium alloy"],
        &[
            "Al 6061-T6",
            "Al 6082-T6",
            "Al 5083-H116",
            "Al 7075-T6",
            "Al 1050-H14",
        ],
    ),
    (&["copper", "cu"], &["Cu OFHC", "Cu ETP"]),
    (&["brass"], &["Brass C36000", "Brass C26000"]),
    (&["bronze"], &["Bronze C51000"]),
    (
        &["steel", "structural steel", "alloy steel"],
        &["Steel 1018", "Steel 4140", "S235", "S355"],
    ),
    (
        &["stainless", "stainless steel", "inox", "ss"],
        &["304", "316", "416", "17-4PH H900", "A286"],
    ),
    (&["titanium", "ti", "titanium alloy"], &["Ti-6Al-4V"]),
    (&["magnesium", "mg"], &["Mg AZ31B-H24"]),
    (&["cast iron", "iron"], &["GJL-250"]),
    (&["alumina", "al2o3"], &["Alumina 96 %", "Alumina 99.5 %"]),
];

/// Names of the materials of a family word; none when it is no such word.
pub fn family(word: &str) -> Option<&'static [&'static str]> {
    let word = plain(word);
    FAMILIES
        .iter()
        .find(|(words, _)| words.iter().any(|known| plain(known) == word))
        .map(|(_, names)| *names)
}

/// Every family word.
pub fn family_words() -> impl Iterator<Item = &'static str> {
    FAMILIES.iter().flat_map(|(words, _)| words.iter().copied())
}

/// Names of the materials that a unified number means: `C101` and `C11000`, `A97075`, `S30400`.
pub fn unified(number: &str) -> Vec<&'static str> {
    let number = plain(number);
    let number = number.strip_prefix("uns").unwrap_or(&number);
    let found = match number.split_at_checked(1) {
        Some(("c", digits)) if is_number(digits, 3) => material(&format!("c{digits}00")),
        Some(("s", digits)) if is_number(digits, 5) => material(&digits[..3]),
        Some(("a", digits)) if is_number(digits, 5) => return holding(&digits[1..]),
        _ => None,
    };
    found.map(|found| found.name.as_str()).into_iter().collect()
}

fn is_number(digits: &str, length: usize) -> bool {
    digits.len() == length && digits.bytes().all(|digit| digit.is_ascii_digit())
}

/// Names of the materials that have a text in their name or in an alias, each once.
pub fn holding(text: &str) -> Vec<&'static str> {
    let text = plain(text);
    let holds = |name: &String| plain(name).contains(&text);
    materials()
        .iter()
        .filter(|material| holds(&material.name) || material.aliases.iter().any(holds))
        .map(|material| material.name.as_str())
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn families_are_of_the_catalogue() {
        for (words, names) in FAMILIES {
            assert!(names.len() <= 5, "{words:?}");
            for name in names {
                assert!(
                    material(name).is_some_and(|known| known.name == *name),
                    "{name}"
                );
            }
            for word in words {
                assert!(material(word).is_none(), "{word}");
            }
        }
    }

    #[test]
    fn unified_numbers_find_their_alloy() {
        for (number, names) in [
            ("C101", vec!["Cu OFHC"]),
            ("UNS C110", vec!["Cu ETP"]),
            ("S30400", vec!["304"]),
            ("A97075", vec!["Al 7075-T6", "Al 7075-T73"]),
            ("C999", vec![]),
            ("C1", vec![]),
            ("°", vec![]),
        ] {
            assert_eq!(unified(number), names, "{number}");
        }
    }
}
