//! The answer of a search: a table of bolts, mass and resistance with its front.

use crate::{
    estimate,
    joint::{Family, Joint, Tightening, Zone},
    layout::{
        Goal, Search, Size, Solution, State, Target,
        constraints::distance,
        search::{Banded, Found},
    },
};

/// Whether a layout meets the requirement.
#[derive(Clone, Debug, PartialEq)]
pub enum Verdict {
    /// At the unfavourable end of the band, in every case.
    Met,
    /// At the least, the nominal and the largest force, in every case; no band was drawn.
    ByForce,
    /// At nominal alone.
    AtNominal,
    /// Not at nominal.
    NotMet,
    /// It was not solved.
    Screened,
    /// The elastic field refused it.
    Failed(String),
}

/// One layout of the answer.
#[derive(Clone, Debug, PartialEq)]
pub struct Row {
    /// What the fastener is called.
    pub label: String,
    /// Its place in `arrange.sizes`; none for the fastener as stated.
    pub size: Option<usize>,
    /// Torque, N m; none where a preload is stated.
    pub torque: Option<f64>,
    /// Family of its pattern.
    pub family: Family,
    /// Whether its places were moved off the lattice.
    pub refined: bool,
    /// Places, m.
    pub places: Vec<[f64; 2]>,
    /// Mass of the fasteners, kg.
    pub mass: f64,
    /// How many heads reach over a heated zone, where a part may stand.
    pub over_heat: usize,
    /// The judged quantity by the screening, K/W.
    pub screened: f64,
    /// What the elastic field says.
    pub solution: Option<Solution>,
    /// The case that governs, counted from 0.
    pub case: usize,
    /// Low and high of the judged quantity in every case, K/W; none where they were not drawn.
    pub band: Option<Vec<[f64; 2]>>,
    /// Whether it meets the requirement.
    pub verdict: Verdict,
    /// Whether no other row costs less and conducts better.
    pub front: bool,
}

impl Row {
    /// The best known value of the judged quantity, K/W.
    pub fn value(&self) -> f64 {
        self.solution
            .as_ref()
            .map_or(self.screened, |solution| solution.cases[self.case].nominal)
    }
}

/// What a search found.
#[derive(Clone, Debug, PartialEq)]
pub struct Answer {
    /// Title of the joint.
    pub title: String,
    /// The cases, all of which were solved.
    pub cases: Vec<&'static str>,
    /// The one that was screened.
    pub screened_case: &'static str,
    /// Groups that are not arranged and stay, as people call them.
    pub fixed: Vec<String>,
    /// What was made small.
    pub goal: Goal,
    /// The judged quantity and its limit.
    pub target: Target,
    /// Heat, W.
    pub heat: Option<f64>,
    /// Rows, cheapest first.
    pub rows: Vec<Row>,
    /// The row that answers the question; none where no row does.
    pub best: Option<usize>,
    /// Layouts by rule that were screened; free places come on top.
    pub rules: usize,
    /// Whether the search ended by itself.
    pub complete: bool,
    /// Fields that the screening passes over; the elastic field does not.
    pub passed_over: Vec<String>,
}

impl Answer {
    /// Reads the state of a search.
    pub fn of(search: &Search, state: &State, complete: bool) -> Self {
        let joint = &search.sizes[0].joint;
        let rows = ranked(search, search.all(state));
        let rows: Vec<Row> = rows.into_iter().map(|(_, row)| row).collect();
        let rank = |row: &Row| search.target.rank(row.value());
        let met = |row: &Row| row.verdict == Verdict::Met;
        let best = match search.task.goal {
            Goal::Bolts | Goal::Mass => rows.iter().position(met),
            Goal::Resistance => (0..rows.len())
                .filter(|index| met(&rows[*index]))
                .min_by(|one, other| rank(&rows[*one]).total_cmp(&rank(&rows[*other]))),
        };
        Self {
            title: joint.title.clone(),
            cases: joint.service.cases.iter().map(|case| case.name).collect(),
            screened_case: joint.service.cases[search.sizes[0].case].name,
            fixed: joint.fasteners[1..]
                .iter()
                .map(estimate::group_label)
                .collect(),
            goal: search.task.goal,
            target: search.target,
            heat: joint.service.heat,
            rows,
            best,
            rules: search.rules(),
            complete,
            passed_over: passed_over(joint),
        }
    }
}

/// The rows of layouts, cheapest first, with their places among those that were solved; the front is
/// marked.
fn ranked(search: &Search, found: Vec<Found>) -> Vec<(usize, Row)> {
    let mut rows: Vec<(usize, Row)> = found
        .into_iter()
        .map(|each| row(search, each))
        .enumerate()
        .collect();
    let cost = |row: &Row| match search.task.goal {
        Goal::Mass => row.mass,
        Goal::Bolts | Goal::Resistance => row.places.len() as f64,
    };
    let rank = |row: &Row| search.target.rank(row.value());
    rows.sort_by(|(_, one), (_, other)| {
        cost(one)
            .total_cmp(&cost(other))
            .then(rank(one).total_cmp(&rank(other)))
    });
    let mut least = f64::INFINITY;
    for (_, row) in &mut rows {
        let counts = !matches!(row.verdict, Verdict::Failed(_));
        row.front = counts && rank(row) < least;
        if row.front {
            least = rank(row);
        }
    }
    rows
}

/// The layouts whose bands are drawn, by their places among the solved ones: the front.
pub(super) fn marked(search: &Search, state: &State) -> Vec<usize> {
    let rows = ranked(search, search.without_bands(state)).into_iter();
    let solved = rows.filter(|(_, row)| row.front && row.solution.is_some());
    solved.map(|(index, _)| index).collect()
}

fn row(search: &Search, found: Found) -> Row {
    let Found {
        layout,
        solution,
        band,
    } = found;
    let size = &search.sizes[layout.size];
    let target = &search.target;
    let verdict = match (&solution, &band) {
        (None, _) => Verdict::Screened,
        (Some(Err(failure)), _) => Verdict::Failed(failure.clone()),
        (Some(Ok(solution)), band) => judged(target, solution, band.as_ref()),
    };
    let solution = solution.and_then(Result::ok);
    Row {
        label: size.label(),
        size: size.index,
        torque: match &size.fastener().tightening {
            Tightening::Torque(tightening) => Some(tightening.torque),
            Tightening::Preload(_) => None,
        },
        family: layout.family,
        refined: layout.refined,
        mass: size.mass * layout.places.len() as f64,
        over_heat: over_heat(size, &layout.places),
        places: layout.places,
        screened: layout.value,
        case: solution
            .as_ref()
            .map_or(size.case, |solution| solution.governing(target)),
        solution,
        band: band.and_then(Result::ok),
        verdict,
        front: false,
    }
}

/// How many heads reach over a heated zone of the plate they sit on; a whole heated face hides no part.
fn over_heat(size: &Size, places: &[[f64; 2]]) -> usize {
    let fastener = size.fastener();
    if fastener.head_plate != 0 {
        return 0;
    }
    let zones = size.joint.source.zones();
    let head = fastener.head_seat.outer_radius;
    let over = |place: &&[f64; 2]| {
        let mut zones = zones.iter().filter(|(zone, _)| *zone != Zone::Face);
        zones.any(|(zone, _)| distance(*zone, **place) < head)
    };
    places.iter().filter(over).count()
}

/// The verdict of every case together: at the unfavourable end of the band where one was drawn, by
/// force where it could not be.
fn judged(target: &Target, solution: &Solution, band: Option<&Banded>) -> Verdict {
    let [nominal, by_force] = solution.meets(target);
    let drawn = band.and_then(|band| band.as_ref().ok());
    let ends = drawn.map(|cases| cases.iter().flatten().all(|end| target.meets(*end)));
    match (nominal, ends) {
        (false, _) => Verdict::NotMet,
        (true, Some(true)) => Verdict::Met,
        (true, None) if by_force => Verdict::ByForce,
        (true, _) => Verdict::AtNominal,
    }
}

/// Fields that bend the faces or change the plates, which the screening takes as flat and solid.
fn passed_over(joint: &Joint) -> Vec<String> {
    let mut fields = Vec::new();
    for plate in &joint.plates {
        let stated = [
            ("sandwich", plate.sandwich.is_some()),
            ("flatness_map", plate.flatness_map.is_some()),
            ("sag", plate.sag.is_some()),
            ("bow", plate.bow.is_some()),
        ];
        let stated = stated.iter().filter(|(_, is_stated)| *is_stated);
        fields.extend(stated.map(|(key, _)| format!("plate.{}.{key}", plate.name)));
    }
    fields
}
