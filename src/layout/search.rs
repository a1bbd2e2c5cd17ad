//! The search from unit to unit: rules, free places, refinement, the elastic field.

use std::{
    collections::{BTreeMap, BTreeSet},
    sync::{
        Arc, RwLock,
        atomic::{AtomicBool, Ordering},
    },
};

use rayon::prelude::*;

use crate::{
    estimate::{Choice, Options},
    joint::{Arrange, Family, Joint},
    layout::{
        Constraints, Failure, Goal, Pattern, Sheets, Size, Solution, Target,
        answer::marked,
        constraints::step,
        free::{self, Unit},
        patterns::{Orbit, orbits, rule_patterns},
        refine::refined,
        sheets::{Influence, Links},
        solved::{banded, solved},
    },
};

/// Layouts by rule in a unit.
const IN_UNIT: usize = 32;
/// Units between two looks at whether to stop.
const UNITS: usize = 8;
/// The same where each unit takes a second: enough that no core waits long for the longest of them.
const LONG_UNITS: usize = 4;
/// Layouts that each unit keeps of each family and number of bolts.
pub(super) const KEPT: usize = 3;
/// Places whose influence is kept; some tens of kilobytes each.
const MOST_PLACES: usize = 3000;

/// Draws of the band of a marked layout: its ends move by a percent or two with more.
const DRAWS: u32 = 256;

/// What is asked.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Task {
    /// What is made small.
    pub goal: Goal,
    /// How many layouts are solved on the elastic field.
    pub solve: usize,
    /// Seed of the random starts.
    pub seed: u64,
    /// The field.
    pub choice: Choice,
}

/// A layout with what the screening says of it.
#[derive(Clone, Debug, PartialEq, serde::Deserialize, serde::Serialize)]
pub struct Layout {
    /// Place among the sizes tried.
    pub size: usize,
    /// Its family.
    pub family: Family,
    /// Whether its places were moved off the lattice.
    pub refined: bool,
    /// Places, m.
    pub places: Vec<[f64; 2]>,
    /// The judged quantity by the screening, K/W.
    pub value: f64,
}

/// A search ready to run.
#[derive(Debug)]
pub struct Search<'a> {
    /// What is asked.
    pub task: Task,
    /// What a layout is judged by.
    pub target: Target,
    /// What may be tried.
    pub arrange: &'a Arrange,
    /// Fasteners that bear their torque.
    pub sizes: &'a [Size],
    sheets: Sheets,
    links: Vec<Links>,
    rules: Vec<(usize, Pattern)>,
    /// Orbits of free places by size.
    lattices: Vec<Vec<Orbit>>,
}

/// What has been done; the parts know nothing of each other, so any of them may be missing.
#[derive(Clone, Debug, Default, PartialEq, serde::Deserialize, serde::Serialize)]
#[serde(deny_unknown_fields)]
pub struct State {
    /// Of joint and task.
    pub digest: String,
    rules: BTreeMap<usize, Vec<Layout>>,
    free: BTreeMap<usize, Vec<Layout>>,
    refined: BTreeMap<usize, Layout>,
    solved: BTreeMap<usize, Result<Solution, String>>,
    /// Bands of the marked layouts, by their places among the solved ones.
    banded: BTreeMap<usize, Banded>,
}

/// Low and high of every case, K/W, or why there is none.
pub(super) type Banded = Result<Vec<[f64; 2]>, String>;

/// A layout with what was found of it on the elastic field.
#[derive(Clone, Debug)]
pub(super) struct Found {
    pub(super) layout: Layout,
    pub(super) solution: Option<Result<Solution, String>>,
    pub(super) band: Option<Banded>,
}

impl State {
    /// Nothing done yet of a joint and a task.
    pub fn new(digest: &str) -> Self {
        Self {
            digest: digest.to_owned(),
            ..Self::default()
        }
    }
}

/// How far a search has come.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Progress {
    /// What is being done.
    pub stage: &'static str,
    /// Units done and units in all.
    pub done: [usize; 2],
}

/// The search was told to stop.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Stopped;

/// Influences of places, each solved once.
pub(super) struct Bank<'a> {
    sheets: &'a Sheets,
    known: RwLock<BTreeMap<[i64; 2], Arc<Influence>>>,
}

impl<'a> Bank<'a> {
    fn new(sheets: &'a Sheets) -> Self {
        Self {
            sheets,
            known: RwLock::new(BTreeMap::new()),
        }
    }

    /// The influence of a place in whole micrometres.
    fn of(&self, place: [f64; 2]) -> Arc<Influence> {
        let key = place.map(|at| (at * 1e6).round() as i64);
        if let Ok(known) = self.known.read()
            && let Some(found) = known.get(&key)
        {
            return found.clone();
        }
        let found = Arc::new(self.sheets.influence(place));
        if let Ok(mut known) = self.known.write()
            && known.len() < MOST_PLACES
        {
            known.insert(key, found.clone());
        }
        found
    }
}

impl<'a> Search<'a> {
    /// Prepares a search over some sizes that bear their torque.
    pub fn new(task: Task, arrange: &'a Arrange, sizes: &'a [Size]) -> Result<Self, Failure> {
        let Some(first) = sizes.first() else {
            return Err(Failure::NoLayout("no size is left".to_owned()));
        };
        let sheets = Sheets::new(sizes)?;
        let links = sizes.iter().map(|size| sheets.links(size)).collect();
        let mut rules = Vec::new();
        let mut lattices = Vec::new();
        for (index, size) in sizes.iter().enumerate() {
            let constraints = Constraints::new(size, arrange);
            let patterns = rule_patterns(&size.joint, arrange, &constraints);
            rules.extend(patterns.into_iter().map(|pattern| (index, pattern)));
            lattices.push(if arrange.families.contains(&Family::Free) {
                orbits(&size.joint, arrange, &constraints)
            } else {
                Vec::new()
            });
        }
        let search = Self {
            target: Target::of(&first.joint, task.goal)?,
            task,
            arrange,
            sizes,
            sheets,
            links,
            rules,
            lattices,
        };
        if search.rules.is_empty() && search.units().is_empty() {
            let constraints = Constraints::new(first, arrange);
            return Err(Failure::NoLayout(format!(
                "{} wants {:.2} mm from axis to edge and {:.2} mm from axis to axis",
                first.label(),
                1e3 * constraints.edge_distance,
                1e3 * constraints.pitch
            )));
        }
        Ok(search)
    }

    /// What a size must keep.
    pub(super) fn constraints(&self, size: usize) -> Constraints<'_> {
        Constraints::new(&self.sizes[size], self.arrange)
    }

    /// Lattice step, m.
    pub(super) fn step(&self) -> f64 {
        step(&self.sizes[0].joint, self.arrange)
    }

    /// The judged quantity of a layout of a size by the screening, K/W.
    pub(super) fn value(&self, bank: &Bank, (size, places): (usize, &[[f64; 2]])) -> f64 {
        let bolts: Vec<Arc<Influence>> = places.iter().map(|place| bank.of(*place)).collect();
        let bolts: Vec<&Influence> = bolts.iter().map(Arc::as_ref).collect();
        self.sheets
            .value(&bolts, &self.links[size], self.target.measure)
    }

    /// The judged quantity of many layouts by the screening, in their order, K/W.
    pub fn screened(&self, layouts: &[(usize, Vec<[f64; 2]>)]) -> Vec<f64> {
        let bank = Bank::new(&self.sheets);
        layouts
            .par_iter()
            .map(|(size, places)| self.value(&bank, (*size, places)))
            .collect()
    }

    /// Best first; ties in a fixed order.
    pub(super) fn sort(&self, layouts: &mut [Layout]) {
        layouts.sort_by(|one, other| {
            let rank = |layout: &Layout| self.target.rank(layout.value);
            rank(one)
                .total_cmp(&rank(other))
                .then(one.size.cmp(&other.size))
                .then(one.family.cmp(&other.family))
                .then(
                    one.places
                        .partial_cmp(&other.places)
                        .unwrap_or(std::cmp::Ordering::Equal),
                )
        });
    }

    /// Every size and number of bolts for which free places are looked for.
    fn units(&self) -> Vec<Unit<'_>> {
        let [fewest, most] = self.arrange.bolts;
        let lattices = self.lattices.iter().enumerate();
        let units = lattices.flat_map(|(size, orbits)| {
            let room: usize = orbits.iter().map(Vec::len).sum();
            (fewest..=most.min(room)).map(move |bolts| Unit {
                size,
                bolts,
                orbits,
            })
        });
        units.collect()
    }

    /// Goes on from a state until all is done, or until told to stop.
    pub fn run(
        &self,
        state: &mut State,
        stop: &AtomicBool,
        note: &mut dyn FnMut(&State, Progress),
    ) -> Result<(), Stopped> {
        let bank = Bank::new(&self.sheets);
        let mut stage = Stage { state, stop, note };
        let chunks: Vec<&[(usize, Pattern)]> = self.rules.chunks(IN_UNIT).collect();
        stage.done(
            ("screening layouts by rule", [chunks.len(), UNITS]),
            |state| &mut state.rules,
            |unit| self.best_by_rule(&bank, chunks[unit]),
        )?;
        let units = self.units();
        stage.done(
            ("looking for free places", [units.len(), UNITS]),
            |state| &mut state.free,
            |unit| free::best(self, &bank, units[unit]),
        )?;
        let chosen = self.chosen(stage.state);
        stage.done(
            ("moving free places", [chosen.len(), UNITS]),
            |state| &mut state.refined,
            |unit| refined(self, &bank, &chosen[unit]),
        )?;
        let shortlist = shortlist(stage.state);
        stage.done(
            ("solving the best layouts", [shortlist.len(), LONG_UNITS]),
            |state| &mut state.solved,
            |unit| {
                solved(
                    &self.joint(&shortlist[unit]),
                    self.task.choice,
                    self.target.measure,
                )
                .map_err(|failure| failure.to_string())
            },
        )?;
        let marked = marked(self, stage.state);
        stage.done(
            ("drawing the bands of the front", [marked.len(), LONG_UNITS]),
            |state| &mut state.banded,
            |unit| {
                let options = Options {
                    draws: DRAWS,
                    seed: self.task.seed,
                };
                let joint = self.joint(&shortlist[marked[unit]]);
                banded(&joint, (self.task.choice, self.target.measure), &options)
                    .map_err(|failure| failure.to_string())
            },
        )
    }

    /// The joint of a layout.
    pub fn joint(&self, layout: &Layout) -> Joint {
        let mut joint = self.sizes[layout.size].joint.clone();
        joint.fasteners[0].places.clone_from(&layout.places);
        joint
    }

    fn best_by_rule(&self, bank: &Bank, rules: &[(usize, Pattern)]) -> Vec<Layout> {
        let mut layouts: Vec<Layout> = rules
            .iter()
            .map(|(size, pattern)| Layout {
                size: *size,
                family: pattern.family,
                refined: false,
                value: self.value(bank, (*size, &pattern.places)),
                places: pattern.places.clone(),
            })
            .collect();
        self.sort(&mut layouts);
        let mut kept: BTreeMap<(usize, Family, usize), usize> = BTreeMap::new();
        layouts.retain(|layout| {
            let key = (layout.size, layout.family, layout.places.len());
            let count = kept.entry(key).or_default();
            *count += 1;
            *count <= KEPT
        });
        layouts
    }

    /// Number of layouts by rule.
    pub fn rules(&self) -> usize {
        self.rules.len()
    }

    /// The layouts to be solved, most telling first: the best of each cost, the cost whose best lies
    /// nearest to the limit first, then the second best of each, and so on.
    fn chosen(&self, state: &State) -> Vec<Layout> {
        let found = state.rules.values().chain(state.free.values()).flatten();
        let mut layouts: Vec<Layout> = found
            .filter(|each| each.value.is_finite())
            .cloned()
            .collect();
        self.sort(&mut layouts);
        let mut levels: BTreeMap<(usize, usize), Vec<Layout>> = BTreeMap::new();
        let mut seen: BTreeSet<Vec<[i64; 2]>> = BTreeSet::new();
        for layout in layouts {
            let mut key: Vec<[i64; 2]> = layout
                .places
                .iter()
                .map(|place| place.map(|at| (at * 1e6).round() as i64))
                .collect();
            key.sort_unstable();
            key.push([layout.size as i64, 0]);
            // Mass depends on size and number alone, and so does whatever else is paid for.
            let level = match self.task.goal {
                Goal::Mass => (layout.places.len(), layout.size),
                Goal::Bolts | Goal::Resistance => (layout.places.len(), 0),
            };
            if seen.insert(key) {
                levels.entry(level).or_default().push(layout);
            }
        }
        let mut levels: Vec<Vec<Layout>> = levels.into_values().collect();
        let urgency = |layout: &Layout| match (self.task.goal, self.target.limit) {
            (Goal::Bolts | Goal::Mass, Some((limit, _))) => (layout.value / limit).ln().abs(),
            _ => self.target.rank(layout.value),
        };
        levels.sort_by(|one, other| urgency(&one[0]).total_cmp(&urgency(&other[0])));
        let rounds = levels.iter().map(Vec::len).max().unwrap_or(0);
        (0..rounds)
            .flat_map(|round| levels.iter().filter_map(move |level| level.get(round)))
            .take(self.task.solve)
            .cloned()
            .collect()
    }

    /// What was found so far: solved layouts, and where none is solved yet the best screened ones.
    pub fn found(&self, state: &State) -> Vec<(Layout, Option<Result<Solution, String>>)> {
        let found = self.all(state).into_iter();
        found.map(|each| (each.layout, each.solution)).collect()
    }

    /// The same with the bands that are drawn.
    pub(super) fn all(&self, state: &State) -> Vec<Found> {
        let bands: BTreeMap<usize, &Banded> = if state.banded.is_empty() {
            BTreeMap::new()
        } else {
            let marked = marked(self, state);
            let known = state.banded.iter();
            known
                .filter_map(|(unit, band)| Some((*marked.get(*unit)?, band)))
                .collect()
        };
        let mut all = self.without_bands(state);
        for (index, band) in bands {
            if let Some(found) = all.get_mut(index) {
                found.band = Some(band.clone());
            }
        }
        all
    }

    /// Layouts in the order in which they are solved, with their solutions.
    pub(super) fn without_bands(&self, state: &State) -> Vec<Found> {
        let chosen = if state.refined.is_empty() {
            self.chosen(state)
        } else {
            shortlist(state)
        };
        let layouts = chosen.into_iter().enumerate();
        layouts
            .map(|(index, layout)| Found {
                layout,
                solution: state.solved.get(&index).cloned(),
                band: None,
            })
            .collect()
    }
}

/// The refined layouts in their order.
fn shortlist(state: &State) -> Vec<Layout> {
    state.refined.values().cloned().collect()
}

/// A stage of a search on its state.
struct Stage<'s> {
    state: &'s mut State,
    stop: &'s AtomicBool,
    note: &'s mut dyn FnMut(&State, Progress),
}

impl Stage<'_> {
    /// Does every unit of a stage that is not done yet, some at a time.
    fn done<T: Send>(
        &mut self,
        (stage, [units, at_once]): (&'static str, [usize; 2]),
        part: impl Fn(&mut State) -> &mut BTreeMap<usize, T>,
        work: impl Fn(usize) -> T + Sync,
    ) -> Result<(), Stopped> {
        let known = part(self.state);
        let pending: Vec<usize> = (0..units)
            .filter(|unit| !known.contains_key(unit))
            .collect();
        let mut left = pending.len();
        for units_at_once in pending.chunks(at_once) {
            if self.stop.load(Ordering::Relaxed) {
                return Err(Stopped);
            }
            let found: Vec<(usize, T)> = units_at_once
                .par_iter()
                .map(|unit| (*unit, work(*unit)))
                .collect();
            left -= found.len();
            part(self.state).extend(found);
            let done = [units - left, units];
            (self.note)(self.state, Progress { stage, done });
        }
        Ok(())
    }
}
