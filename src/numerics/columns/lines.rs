//! Grid lines that run through given places and are fine around some.

/// A place where a line is wanted.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stop {
    /// Where.
    pub at: f64,
    /// Stops of lower rank go first; one that stands too near to another yields.
    pub rank: u8,
}

/// A place around which lines stand close.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Fine {
    /// Middle.
    pub at: f64,
    /// Half width of the fine part.
    pub reach: f64,
    /// Spacing inside.
    pub spacing: f64,
}

/// Nearest that two stops may stand, in local spacings; nearer ones would leave slivers.
const NEAREST_STOPS: f64 = 0.5;
/// Steps of the integral of line density over one spacing.
const STEPS: f64 = 8.0;
/// Lines may be this much too wide, as a share of one step between two stops.
const SLACK: f64 = 0.25;

/// Lines from the first to the last stop; spacing as small as the nearest fine part asks, growing by
/// `growth` for every length away from it, up to `widest`.
///
/// ```text
/// h(x) = min(widest, min_k (spacing_k + growth · max(0, |x − at_k| − reach_k)))
/// ```
///
/// Between two stops the lines divide ∫ dx / h into equal parts, so that mirrored input has mirrored
/// lines. Empty where there are fewer than two different stops.
pub fn lines(stops: &[Stop], fine: &[Fine], growth: f64, widest: f64) -> Vec<f64> {
    let spacing = |x: f64| {
        fine.iter()
            .map(|fine| fine.spacing + growth * ((x - fine.at).abs() - fine.reach).max(0.0))
            .fold(widest, f64::min)
    };
    let kept = kept_stops(stops, &spacing);
    let Some(first) = kept.first() else {
        return Vec::new();
    };
    let mut lines = vec![*first];
    for pair in kept.windows(2) {
        divide([pair[0], pair[1]], &spacing, &mut lines);
    }
    lines
}

/// The stops that get a line, rising: both ends always, the others while they keep their distance.
fn kept_stops(stops: &[Stop], spacing: &impl Fn(f64) -> f64) -> Vec<f64> {
    let low = stops
        .iter()
        .map(|stop| stop.at)
        .fold(f64::INFINITY, f64::min);
    let high = stops
        .iter()
        .map(|stop| stop.at)
        .fold(f64::NEG_INFINITY, f64::max);
    if low >= high || !(high - low).is_finite() {
        return Vec::new();
    }
    let mut kept = vec![low, high];
    let mut ranked: Vec<&Stop> = stops.iter().collect();
    ranked.sort_by(|a, b| a.rank.cmp(&b.rank).then(a.at.total_cmp(&b.at)));
    for stop in ranked {
        let room = NEAREST_STOPS * spacing(stop.at);
        if kept.iter().all(|other| (other - stop.at).abs() >= room) {
            kept.push(stop.at);
        }
    }
    kept.sort_by(f64::total_cmp);
    kept
}

/// Appends the lines after the first of `ends`, the second included.
fn divide(ends: [f64; 2], spacing: &impl Fn(f64) -> f64, lines: &mut Vec<f64>) {
    let length = ends[1] - ends[0];
    let finest = (0..=64)
        .map(|k| spacing(ends[0] + length * f64::from(k) / 64.0))
        .fold(f64::INFINITY, f64::min);
    let steps = (STEPS * length / finest).ceil().clamp(STEPS, 1e6);
    let step = length / steps;
    let mut density = vec![0.0];
    let mut whole = 0.0;
    for k in 0..steps as usize {
        whole += step / spacing(ends[0] + (k as f64 + 0.5) * step);
        density.push(whole);
    }
    let parts = (whole - SLACK).ceil().max(1.0) as usize;
    let mut at = 0;
    for part in 1..parts {
        let wanted = whole * part as f64 / parts as f64;
        while density[at + 1] < wanted {
            at += 1;
        }
        let along = (wanted - density[at]) / (density[at + 1] - density[at]);
        lines.push(ends[0] + (at as f64 + along) * step);
    }
    lines.push(ends[1]);
}
