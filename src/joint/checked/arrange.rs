//! What a search of layouts may try.

use crate::joint::Zone;

/// What a search of layouts may try for the first fastener group. Lengths in m.
#[derive(Clone, Debug, PartialEq)]
pub struct Arrange {
    /// Families of patterns, each once.
    pub families: Vec<Family>,
    /// Fewest and most bolts.
    pub bolts: [usize; 2],
    /// How free places are mirrored.
    pub symmetry: Symmetry,
    /// Least distance from a bolt axis to the edges; none for that of the thread.
    pub edge_distance: Option<f64>,
    /// Least distance of two bolt axes; none for that of the thread.
    pub pitch: Option<f64>,
    /// Lattice of free places; none for that of the plate.
    pub step: Option<f64>,
    /// Zones that no head may reach into, in joint coordinates.
    pub keep_out: Vec<Zone>,
    /// How many sizes the file lists; 0 for the fastener as stated.
    pub sizes: usize,
}

/// A family of patterns.
#[derive(
    Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, serde::Deserialize, serde::Serialize,
)]
#[serde(rename_all = "lowercase")]
pub enum Family {
    /// Along the edges of the first plate.
    Edge,
    /// Columns and rows.
    Grid,
    /// On a circle.
    Circle,
    /// Any places.
    Free,
}

/// How free places are mirrored about the middle of the first plate.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Symmetry {
    /// Not at all.
    None,
    /// Left to right.
    X,
    /// Top to bottom.
    Y,
    /// Both ways.
    Both,
}

impl Family {
    /// Every family.
    pub const ALL: [Self; 4] = [Self::Edge, Self::Grid, Self::Circle, Self::Free];

    /// As users write it.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Edge => "edge",
            Self::Grid => "grid",
            Self::Circle => "circle",
            Self::Free => "free",
        }
    }

    /// By the word users write.
    pub fn named(word: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|family| family.name() == word)
    }
}

impl Symmetry {
    /// As users write it.
    pub const fn name(self) -> &'static str {
        match self {
            Self::None => "none",
            Self::X => "x",
            Self::Y => "y",
            Self::Both => "both",
        }
    }

    /// By the word users write.
    pub fn named(word: &str) -> Option<Self> {
        [Self::None, Self::X, Self::Y, Self::Both]
            .into_iter()
            .find(|symmetry| symmetry.name() == word)
    }
}

impl Default for Arrange {
    /// What is tried where the file states nothing: every family, 2 to 12 bolts.
    fn default() -> Self {
        Self {
            families: Family::ALL.to_vec(),
            bolts: [2, 12],
            symmetry: Symmetry::None,
            edge_distance: None,
            pitch: None,
            step: None,
            keep_out: Vec::new(),
            sizes: 0,
        }
    }
}
