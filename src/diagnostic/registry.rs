//! What every code means and what to do about it; the laws with equation, range and source.

use std::sync::LazyLock;

use crate::diagnostic::Caution;

mod conductance;
mod file;
mod fit;
mod geometry;
mod laws;
mod material;
mod preload;
mod pressure;
mod service;
mod topics;

/// What a code stands for.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Kind {
    /// The input is wrong; nothing is computed.
    Fault,
    /// The result stands, with less trust or with a duty of care.
    Caution(Gravity),
    /// A law or a convention the results rest on.
    Law,
    /// A part of the handbook: how something is stated or asked for.
    Topic,
}

impl Kind {
    /// The kind as a word.
    pub fn name(self) -> &'static str {
        match self {
            Self::Fault => "fault",
            Self::Caution(_) => "caution",
            Self::Law => "law",
            Self::Topic => "topic",
        }
    }
}

/// How much a caution matters; graver ones sort first.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Gravity {
    /// People or hardware can be hurt, or the number is likely wrong.
    Grave,
    /// A law or a value left the range it was checked in.
    Range,
    /// Worth knowing when the number is used.
    Note,
    /// A duty of care that goes with every result; says nothing of this joint.
    Standing,
}

/// One code.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Entry {
    /// Stable code: `preload/over-yield`.
    pub code: &'static str,
    /// What it stands for.
    pub kind: Kind,
    /// The matter in a few words.
    pub title: &'static str,
    /// What it means physically.
    pub meaning: &'static str,
    /// What to do.
    pub remedy: &'static str,
    /// Equation, range and source, for a law.
    pub law: Option<Law>,
}

/// The formal side of a law.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Law {
    /// The equation, in plain Unicode.
    pub equation: &'static str,
    /// Where it holds.
    pub range: &'static str,
    /// Where it comes from, and whether it was read there or is given from memory.
    pub source: &'static str,
}

/// The entry of a code. Laws and topics may be called without their family: `planes` is
/// `law/planes`, `heat` is `topic/heat`.
pub fn entry(code: &str) -> Option<&'static Entry> {
    entries().iter().find(|entry| {
        let short = ["law/", "topic/"]
            .iter()
            .find_map(|family| entry.code.strip_prefix(family));
        entry.code == code || short == Some(code)
    })
}

/// Every entry: faults, then cautions, laws and topics, each family together.
pub fn entries() -> &'static [Entry] {
    static ENTRIES: LazyLock<Vec<Entry>> = LazyLock::new(|| {
        let mut entries = [
            file::ENTRIES,
            geometry::ENTRIES,
            preload::ENTRIES,
            pressure::ENTRIES,
            conductance::ENTRIES,
            material::ENTRIES,
            service::ENTRIES,
            fit::ENTRIES,
            laws::ENTRIES,
            topics::ENTRIES,
        ]
        .concat();
        entries.sort_by_key(|entry| match entry.kind {
            Kind::Fault => 0,
            Kind::Caution(_) => 1,
            Kind::Law => 2,
            Kind::Topic => 3,
        });
        entries
    });
    &ENTRIES
}

/// How much a caution matters. A code without an entry counts as grave, so that it is never buried.
pub fn gravity(code: &str) -> Gravity {
    match entry(code).map(|entry| entry.kind) {
        Some(Kind::Caution(gravity)) => gravity,
        _ => Gravity::Grave,
    }
}

/// Puts the graver cautions first; equally grave ones keep their order.
pub fn sort_by_gravity(cautions: &mut [Caution]) {
    cautions.sort_by_key(|caution| gravity(caution.code));
}

/// An entry of a fault: code, title, meaning, remedy.
const fn fault(
    code: &'static str,
    title: &'static str,
    meaning: &'static str,
    remedy: &'static str,
) -> Entry {
    Entry {
        code,
        kind: Kind::Fault,
        title,
        meaning,
        remedy,
        law: None,
    }
}

impl Gravity {
    /// An entry of a caution: code, title, and meaning with remedy.
    const fn entry(
        self,
        code: &'static str,
        title: &'static str,
        [meaning, remedy]: [&'static str; 2],
    ) -> Entry {
        Entry {
            code,
            kind: Kind::Caution(self),
            title,
            meaning,
            remedy,
            law: None,
        }
    }
}

impl Law {
    /// An entry of a law: code, title, and meaning with remedy.
    const fn entry(
        self,
        code: &'static str,
        title: &'static str,
        [meaning, remedy]: [&'static str; 2],
    ) -> Entry {
        Entry {
            code,
            kind: Kind::Law,
            title,
            meaning,
            remedy,
            law: Some(self),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_law_and_a_topic_answer_without_their_family() {
        for (short, code) in [("planes", "law/planes"), ("heat", "topic/heat")] {
            assert_eq!(entry(short).map(|entry| entry.code), Some(code));
        }
        let mut shorts: Vec<&str> = entries()
            .iter()
            .filter(|entry| matches!(entry.kind, Kind::Law | Kind::Topic))
            .filter_map(|entry| Some(entry.code.split_once('/')?.1))
            .collect();
        let all = shorts.len();
        shorts.sort_unstable();
        shorts.dedup();
        assert_eq!(shorts.len(), all, "two share a short name");
        assert_eq!(entry("no/such-code"), None);
    }

    #[test]
    fn each_code_stands_once() {
        for (at, one) in entries().iter().enumerate() {
            let again = entries()[at + 1..]
                .iter()
                .any(|other| other.code == one.code);
            assert!(!again, "{}", one.code);
        }
    }

    #[test]
    fn entries_are_whole_sentences() {
        for entry in entries() {
            let code = entry.code;
            assert!(
                !entry.title.is_empty() && !entry.title.ends_with('.'),
                "{code}"
            );
            let paragraphs = match entry.kind {
                Kind::Topic => entry.meaning.split("\n\n").collect(),
                _ => vec![entry.meaning],
            };
            for text in paragraphs.into_iter().chain([entry.remedy]) {
                assert!(text.len() > 20 && text.ends_with('.'), "{code}: {text}");
                assert!(
                    !text.contains("  ") && !text.contains('\n'),
                    "{code}: {text}"
                );
            }
        }
    }

    #[test]
    fn laws_alone_carry_equation_range_and_source() {
        for entry in entries() {
            assert_eq!(
                entry.law.is_some(),
                entry.kind == Kind::Law,
                "{}",
                entry.code
            );
            for (family, kind) in [("law/", Kind::Law), ("topic/", Kind::Topic)] {
                assert_eq!(
                    entry.code.starts_with(family),
                    entry.kind == kind,
                    "{}",
                    entry.code
                );
            }
            if let Some(law) = entry.law {
                assert!(
                    [law.equation, law.range, law.source]
                        .iter()
                        .all(|text| !text.is_empty()),
                    "{}",
                    entry.code
                );
            }
        }
    }

    #[test]
    fn cautions_that_can_hurt_defer_to_code_and_engineer() {
        for code in [
            "preload/over-yield",
            "preload/over-proof",
            "preload/no-torque-card",
            "preload/slip-and-fatigue",
            "service/defer",
            "service/isolation-and-bonding",
            "service/hot-surface",
            "service/vacuum-materials",
        ] {
            let entry = entry(code).unwrap();
            let grave = [Gravity::Grave, Gravity::Standing].map(Kind::Caution);
            assert!(grave.contains(&entry.kind), "{code}");
            assert!(
                ["code", "engineer", "rules"]
                    .iter()
                    .any(|word| entry.remedy.contains(word)),
                "{code}: {}",
                entry.remedy
            );
        }
    }

    #[test]
    fn grave_cautions_come_first_and_the_rest_keep_their_order() {
        let caution = |code| Caution {
            code,
            text: String::new(),
        };
        let mut cautions = [
            caution("resistance/cell"),
            caution("filler/creep"),
            caution("pressure/overlap"),
            caution("preload/over-yield"),
        ];
        sort_by_gravity(&mut cautions);
        let codes = cautions.map(|caution| caution.code);
        assert_eq!(
            codes,
            [
                "preload/over-yield",
                "filler/creep",
                "pressure/overlap",
                "resistance/cell"
            ]
        );
    }

    #[test]
    fn an_unknown_code_is_never_buried() {
        assert_eq!(gravity("no/such-code"), Gravity::Grave);
    }
}
