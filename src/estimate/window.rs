//! What is told of the torque window: its limits, its ends, and what would open it.

use crate::estimate::TorqueSweep;

/// From which side a limit bounds the torque.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Side {
    /// The torque must be at least so large.
    Least,
    /// The torque must be at most so large.
    Most,
}

/// A limit of the torque.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TorqueLimit {
    /// Name for people.
    pub name: &'static str,
    /// Torque, N m.
    pub torque: f64,
    /// Its side.
    pub side: Side,
}

/// One end of a window.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct End {
    /// Torque, N m.
    pub torque: f64,
    /// What ends the window there.
    pub by: &'static str,
}

/// A range of torque.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Range {
    /// Lower end.
    pub low: End,
    /// Upper end.
    pub high: End,
}

impl Range {
    /// What two ranges share; none where they do not meet.
    pub fn shared(self, other: Self) -> Option<Self> {
        let low = if other.low.torque > self.low.torque {
            other.low
        } else {
            self.low
        };
        let high = if other.high.torque < self.high.torque {
            other.high
        } else {
            self.high
        };
        (low.torque < high.torque).then_some(Self { low, high })
    }
}

/// A change that was tried where the window is shut, one at a time.
#[derive(Clone, Debug, PartialEq)]
pub struct Trial {
    /// The change.
    pub change: String,
    /// The window with it; none where it stays shut.
    pub window: Option<Range>,
    /// On what it was judged.
    pub judged: Judged,
}

/// On what a trial was judged.
#[derive(Clone, Debug, PartialEq)]
pub enum Judged {
    /// The field of the sweep itself.
    AsSwept,
    /// The solved field of the changed joint at `fast`.
    Fast,
    /// It cannot be built or computed, and why.
    Refused(String),
}

/// The torques that heat and strength allow.
#[derive(Clone, Debug, PartialEq)]
pub struct TorqueWindow {
    /// Share of the draws that the band holds: 0.9 from 5 % to 95 %; none without draws.
    pub confidence: Option<f64>,
    /// Torque at which the joint's own conductance reaches 90 % of that at the best torque, N m;
    /// none where it does so below the first torque swept, or has no best.
    pub knee: Option<f64>,
    /// Every limit of strength and separation, torque rising.
    pub limits: Vec<TorqueLimit>,
    /// What strength and separation allow; none where no torque passes or none can be judged.
    pub strength: Option<Range>,
    /// Torques that meet the requirement at the unfavourable end of the band, rising; none where
    /// nothing is required.
    pub heat: Option<Vec<Range>>,
    /// What both allow, the widest part.
    pub both: Option<Range>,
    /// Whether grid and flatness leave the verdict of the heat sure.
    pub trusted: bool,
    /// Whether even perfect contact would fail the requirement at nominal.
    pub plates_fail: bool,
    /// Force that the heat asks for over that which strength allows, where heat is met above strength.
    pub force_ratio: Option<f64>,
    /// The next thread whose stress area carries that force in the same grade.
    pub larger_thread: Option<String>,
    /// Changes tried where the window is shut.
    pub trials: Vec<Trial>,
}

impl TorqueWindow {
    /// The largest torque that strength allows, N m.
    pub fn most(&self) -> Option<TorqueLimit> {
        self.limits
            .iter()
            .find(|limit| limit.side == Side::Most)
            .copied()
    }

    /// The least torque that keeps the faces together, N m.
    pub fn least(&self) -> Option<TorqueLimit> {
        self.limits
            .iter()
            .find(|limit| limit.side == Side::Least)
            .copied()
    }

    /// Limits that a torque breaks, those from below first; of the others the nearest one first.
    pub fn broken_at(&self, torque: f64) -> Vec<TorqueLimit> {
        let breaks = |limit: &&TorqueLimit| match limit.side {
            Side::Least => torque < limit.torque,
            Side::Most => torque > limit.torque,
        };
        let mut broken: Vec<TorqueLimit> = self.limits.iter().filter(breaks).copied().collect();
        broken.sort_by_key(|limit| limit.side == Side::Most);
        broken
    }

    /// Whether a torque meets the requirement; none where nothing is required.
    pub fn heat_met_at(&self, torque: f64) -> Option<bool> {
        let ranges = self.heat.as_ref()?;
        let holds = |range: &Range| range.low.torque <= torque && torque <= range.high.torque;
        Some(ranges.iter().any(holds))
    }
}

/// What makes the best torque of a sweep the best.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum BestBy {
    /// The curve turns there.
    Minimum,
    /// Strength forbids what would be better.
    Strength,
    /// What would be better lets the faces part.
    Separation,
}

impl TorqueSweep {
    /// Whether a torque lies between the first and the last that were swept.
    pub fn sweeps(&self, torque: f64) -> bool {
        let ends = self.points.first().zip(self.points.last());
        ends.is_some_and(|(first, last)| (first.torque..=last.torque).contains(&torque))
    }

    /// Whether a torque meets the requirement; none where nothing is required or it was not swept.
    pub fn heat_met_at(&self, torque: f64) -> Option<bool> {
        self.window
            .heat_met_at(torque)
            .filter(|_| self.sweeps(torque))
    }

    /// What makes the best torque the best.
    pub fn best_by(&self) -> BestBy {
        if !self.resists() && self.held_minimum().is_some() {
            return BestBy::Minimum;
        }
        let least = self.window.least();
        match self.at_limit.zip(least) {
            Some((limit, least)) if least.torque >= limit.torque => BestBy::Separation,
            _ => BestBy::Strength,
        }
    }
}
