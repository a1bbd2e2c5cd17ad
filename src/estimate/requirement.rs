//! A requirement and how the joint stands to it, whichever way its faces are bent.

use crate::{
    estimate::{Bend, CaseResult, Estimate},
    joint::{Limit, RequirementKind},
};

/// Whether a requirement is met.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Met {
    /// Also at the unfavourable quantile.
    Yes,
    /// Not even at nominal.
    No,
    /// At nominal, but not at the unfavourable quantile, or no band was computed.
    Uncertain,
}

/// A requirement and how the joint stands to it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct RequirementResult {
    /// The limited quantity.
    pub kind: RequirementKind,
    /// The limit, K, K/W or W/K.
    pub limit: f64,
    /// Side of the limit.
    pub bound: Limit,
    /// The value that is compared, unfavourable quantile where there is one.
    pub value: f64,
    /// The ends of the limited quantity by the way the faces are bent; none where they are not bent by
    /// themselves, and without draws. The value is the worst of them.
    pub bent: Option<Bent>,
    /// The verdict.
    pub met: Met,
}

impl RequirementResult {
    /// Whether it asks for at least so much resistance, so that more is better.
    pub fn resists(&self) -> bool {
        let limits_conductance = matches!(self.kind, RequirementKind::Conductance(_));
        limits_conductance == (self.bound == Limit::Most)
    }
}

/// Low and high of one number by the way the faces are bent, in the order of [`Bend::ALL`].
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bent(pub [[f64; 2]; 3]);

impl Bent {
    /// Share of the value by which unfavourable ends differ when it is worth a word: what a reader sees in
    /// the third digit (judgement).
    const NOTICEABLE: f64 = 0.02;

    /// Every end through a function that rises.
    #[must_use]
    pub fn map(self, of: impl Fn([f64; 2]) -> [f64; 2]) -> Self {
        Self(self.0.map(of))
    }

    /// The unfavourable end of every way to a limit.
    pub fn unfavourable(&self, bound: Limit) -> [(Bend, f64); 3] {
        let end = match bound {
            Limit::Most => 1,
            Limit::Least => 0,
        };
        std::array::from_fn(|way| (Bend::ALL[way], self.0[way][end]))
    }

    /// The way that stands worst to a limit, where the ways differ noticeably.
    pub fn worst(&self, bound: Limit) -> Option<Bend> {
        let ends = self.unfavourable(bound);
        let by = |one: &&(Bend, f64), other: &&(Bend, f64)| one.1.total_cmp(&other.1);
        let (least, most) = (ends.iter().min_by(by)?, ends.iter().max_by(by)?);
        let noticeable = most.1 - least.1 > Self::NOTICEABLE * most.1.abs();
        let worst = match bound {
            Limit::Most => most,
            Limit::Least => least,
        };
        noticeable.then_some(worst.0)
    }
}

/// Cautions that let a joint down whatever the heat says, the gravest first.
const LETS_DOWN: [(&str, &str); 5] = [
    (
        "preload/never-for-conductance",
        "a limit of strength does not hold",
    ),
    (
        "preload/negative-service-force",
        "the least clamp force leaves the joint open",
    ),
    ("preload/separation", "the load may part the faces"),
    (
        "preload/over-in-service",
        "load and temperature may break a limit of strength",
    ),
    (
        "preload/hardly-clamped",
        "the least clamp force leaves next to nothing",
    ),
];

impl Estimate {
    /// The case in which the requirement is judged; the first where nothing is required.
    pub fn decisive(&self) -> Option<&CaseResult> {
        let asked = self.requirement().map(|(name, _)| name);
        let judged = self.cases.iter().find(|case| Some(case.name) == asked);
        judged.or(self.cases.first())
    }

    /// What lets the joint down whatever the heat says: a limit of strength, a load that parts it, or
    /// scatter that may leave next to no clamp force.
    ///
    /// Checked: `what_lets_a_joint_down_is_told_whatever_the_heat_says`.
    pub fn met_of_heat_alone(&self) -> Option<&'static str> {
        let says = |code| self.cautions.iter().any(|caution| caution.code == code);
        let told = LETS_DOWN.iter().find(|(code, _)| says(*code));
        told.map(|(_, why)| *why)
    }
}
