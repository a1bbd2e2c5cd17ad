//! The answer of a search: a table of bolts, mass and resistance with its front.

use crate::{
    joint::Family,
    layout::{Goal, Layout, Search, Solution, State, Target},
};

/// Whether a layout meets the requirement.
#[derive(Clone, Debug, PartialEq)]
pub enum Verdict {
    /// At the least, the nominal and the largest force.
    Met,
    /// At the nominal force alone.
    AtNominal,
    /// Not at the nominal force.
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
    /// The judged quantity by the screening, K/W.
    pub screened: f64,
    /// What the elastic field says.
    pub solution: Option<Solution>,
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
            .map_or(self.screened, |solution| solution.nominal)
    }
}

/// What a search found.
#[derive(Clone, Debug, PartialEq)]
pub struct Answer {
    /// Title of the joint.
    pub title: String,
    /// The case that was solved.
    pub case: &'static str,
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
        let mut rows: Vec<Row> = search
            .found(state)
            .into_iter()
            .map(|(layout, solution)| row(search, layout, solution))
            .collect();
        let cost = |row: &Row| match search.task.goal {
            Goal::Mass => row.mass,
            Goal::Bolts | Goal::Resistance => row.places.len() as f64,
        };
        let rank = |row: &Row| search.target.rank(row.value());
        rows.sort_by(|one, other| {
            cost(one)
                .total_cmp(&cost(other))
                .then(rank(one).total_cmp(&rank(other)))
        });
        let mut least = f64::INFINITY;
        for row in &mut rows {
            let counts = !matches!(row.verdict, Verdict::Failed(_));
            row.front = counts && rank(row) < least;
            if row.front {
                least = rank(row);
            }
        }
        let met = |row: &Row| row.verdict == Verdict::Met;
        let best = match search.task.goal {
            Goal::Bolts | Goal::Mass => rows.iter().position(met),
            Goal::Resistance => (0..rows.len())
                .filter(|index| met(&rows[*index]))
                .min_by(|one, other| rank(&rows[*one]).total_cmp(&rank(&rows[*other]))),
        };
        Self {
            title: joint.title.clone(),
            case: joint.service.cases[0].name,
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

fn row(search: &Search, layout: Layout, solution: Option<Result<Solution, String>>) -> Row {
    let size = &search.sizes[layout.size];
    let verdict = match &solution {
        None => Verdict::Screened,
        Some(Err(failure)) => Verdict::Failed(failure.clone()),
        Some(Ok(solution)) => {
            let [nominal, ends @ ..] = solution.values().map(|value| search.target.meets(value));
            match (nominal, ends) {
                (true, [true, true]) => Verdict::Met,
                (true, _) => Verdict::AtNominal,
                (false, _) => Verdict::NotMet,
            }
        }
    };
    Row {
        label: size.label(),
        size: size.index,
        torque: match &size.fastener().tightening {
            crate::joint::Tightening::Torque(tightening) => Some(tightening.torque),
            crate::joint::Tightening::Preload(_) => None,
        },
        family: layout.family,
        refined: layout.refined,
        mass: size.mass * layout.places.len() as f64,
        places: layout.places,
        screened: layout.value,
        solution: solution.and_then(Result::ok),
        verdict,
        front: false,
    }
}

/// Fields that bend the faces or change the plates, which the screening takes as flat and solid.
fn passed_over(joint: &crate::joint::Joint) -> Vec<String> {
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
