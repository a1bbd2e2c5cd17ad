//! What every code means and what to do about it.

/// What a code stands for.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Kind {
    /// The input is wrong; nothing is computed.
    Fault,
    /// The result stands, with less trust or with a duty of care.
    Caution(Gravity),
    /// A law or a convention the results rest on.
    Law,
}

/// How much a caution matters; graver ones sort first.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Gravity {
    /// People or hardware can be hurt, or the number is likely wrong.
    Grave,
    /// A law left the range it was checked in.
    Range,
    /// Worth knowing.
    Note,
}

/// One code.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Entry {
    /// Stable code.
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
    /// The equation.
    pub equation: &'static str,
    /// Where it holds.
    pub range: &'static str,
    /// Where it comes from, and whether it was read there or is given from memory.
    pub source: &'static str,
}

/// The entry of a code.
pub fn entry(code: &str) -> Option<&'static Entry> {
    entries().iter().find(|entry| entry.code == code)
}

/// Every entry.
pub fn entries() -> &'static [Entry] {
    &[]
}
