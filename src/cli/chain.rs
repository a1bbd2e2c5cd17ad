//! The one place where commands meet the chain: reading a joint, estimating it, drawing it.

mod page;

pub use crate::estimate::{Choice, Fineness, Watch};
pub use page::{Asked, Effort, Handed, handed};

use crate::{
    cli::console::Trouble,
    diagnostic,
    estimate::{
        self, BEYOND_CONE, Chain, Estimate, Failure, FieldMap, HeatMap, Options, RingRow,
        StackSection, TorqueSweep,
    },
    figures::{self, Drawing, FigureError, Format},
    joint::{Joint, Medium},
    pressure::elastic::Failure as Contact,
    report::csv::{self, Condition},
    uncertainty::{
        self, Comparison, Contender, InMedium, Others, Ranking, RankingOptions, SweepOptions,
        Verification,
    },
    units::{self, Quantity, System},
};

/// A joint, the field it is to stand on, and who is told while it is solved.
#[derive(Clone, Debug)]
pub struct Task<'a> {
    /// The joint.
    pub joint: &'a Joint,
    /// The field.
    pub choice: Choice,
    /// Whom to tell.
    pub watch: Watch,
}

impl<'a> Task<'a> {
    fn chain(&self) -> Result<Chain<'a>, Trouble> {
        let chain = Chain::of(self.joint, self.choice, &self.watch);
        self.watch.tell("");
        Ok(chain?)
    }

    /// Does the work and ends the telling.
    fn watched<T>(&self, work: impl FnOnce() -> Result<T, Failure>) -> Result<T, Trouble> {
        let done = work();
        self.watch.tell("");
        Ok(done?)
    }
}

/// The torque of one group swept, with like joints to try where its window is shut.
pub fn torque_sweep(
    task: &Task,
    options: &SweepOptions,
    others: &Others,
) -> Result<TorqueSweep, Trouble> {
    let chain = task.chain()?;
    task.watched(|| uncertainty::sweep_beside(&chain, options, others))
}

/// The inputs of the worst case ranked by their share in the spread of one answer.
pub fn ranking(task: &Task, options: &RankingOptions) -> Result<Ranking, Trouble> {
    let chain = task.chain()?;
    task.watched(|| uncertainty::ranking(&chain, options))
}

/// An interface from the command line: its index, from 1 as it is counted there.
pub fn interface(joint: &Joint, asked: usize) -> Result<usize, Trouble> {
    let known = joint.interfaces();
    if (1..=known).contains(&asked) {
        return Ok(asked - 1);
    }
    let names: Vec<String> = (0..known)
        .map(|index| format!("{} {}", index + 1, joint.interface_name(index)))
        .collect();
    Err(Trouble::usage(
        format!("there is no interface {asked}; the joint has {known}"),
        format!("count from the warm side: {}", names.join(", ")),
    ))
}

/// Whether the rings of every bolt are asked for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Rings {
    /// They are, in an interface counted from 0.
    Told(usize),
    /// They are not.
    Left,
}

/// An estimate and what was asked for beside it.
#[derive(Clone, Debug)]
pub struct Estimated {
    /// Low, nominal and high.
    pub estimate: Estimate,
    /// Rings of every bolt; empty unless asked for.
    pub rings: Vec<Vec<RingRow>>,
    /// The same joint in other media; empty unless asked for.
    pub media: Vec<InMedium>,
    /// Draws of the first case solved beside the surfaces they are read from; none unless asked for,
    /// and on the cone.
    pub verified: Option<Verification>,
}

/// What is asked for beside the estimate.
#[derive(Clone, Copy, Debug)]
pub struct Beside<'a> {
    /// Rings of every bolt.
    pub rings: Rings,
    /// Other media.
    pub media: &'a [Medium],
    /// Draws to be solved.
    pub verify: u32,
}

/// Low, nominal and high of a joint, with what is asked for beside them.
pub fn estimate(task: &Task, options: &Options, beside: &Beside) -> Result<Estimated, Trouble> {
    let chain = task.chain()?;
    task.watched(|| {
        Ok(Estimated {
            estimate: uncertainty::along(&chain, options)?,
            rings: match beside.rings {
                Rings::Told(interface) => estimate::ring_tables(&chain, interface)?,
                Rings::Left => Vec::new(),
            },
            media: uncertainty::in_media(&chain, beside.media, options)?,
            verified: match beside.verify {
                0 => None,
                draws => uncertainty::verification(&chain, 0, &Options { draws, ..*options })?,
            },
        })
    })
}

/// A joint without some of its bolts, by their numbers from 1.
pub fn without(joint: &Joint, numbers: &[usize]) -> Result<Joint, Trouble> {
    joint.without(numbers).map_err(|found| {
        Trouble::usage(
            found.to_string(),
            "bolts are numbered as estimate prints them, group by group in file order",
        )
    })
}

/// One of several joints to compare.
pub struct Entry {
    /// What it is called.
    pub name: String,
    /// The joint.
    pub joint: Joint,
}

/// Whether losses of single bolts are weighed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Losses {
    /// They are.
    Weighed,
    /// They are not.
    Left,
}

/// Joints side by side, with the pressure of each for a figure of `columns` points, where asked for.
pub fn compared(
    entries: &[Entry],
    (choice, watch): (Choice, &Watch),
    (options, losses, columns): (&Options, Losses, Option<usize>),
) -> Result<(Comparison, Vec<FieldMap>), Trouble> {
    let failed = |entry: &Entry| {
        let name = entry.name.clone();
        move |failure: Failure| Trouble::from(failure).of_file(&name)
    };
    let chains = entries
        .iter()
        .map(|entry| Chain::of(&entry.joint, choice, watch).map_err(failed(entry)))
        .collect::<Result<Vec<Chain>, Trouble>>()?;
    let mut contenders = Vec::with_capacity(entries.len());
    let mut maps = Vec::new();
    for (entry, chain) in entries.iter().zip(&chains) {
        let estimate = uncertainty::along(chain, options).map_err(failed(entry))?;
        let loss = match losses {
            Losses::Weighed => {
                let case = uncertainty::worst_case(chain).map_err(failed(entry))?;
                estimate::worst_loss(chain, choice, (case, watch)).map_err(failed(entry))?
            }
            Losses::Left => None,
        };
        if let Some(columns) = columns {
            maps.push(estimate::field_map(chain, 0, columns).map_err(failed(entry))?);
        }
        // The common draws need what is worked out already.
        chain.forget_fields();
        contenders.push(Contender {
            name: entry.name.clone(),
            chain,
            estimate,
            loss,
        });
    }
    let found = uncertainty::comparison(contenders, options)?;
    watch.tell("");
    Ok((found, maps))
}

/// The word of a medium from the command line, if a joint file would take it.
pub fn medium(word: &str) -> Result<String, String> {
    Medium::named(word, None).map(|medium| medium.word())
}

/// The first medium that stands twice in a list of words as [`medium`] gives them.
pub fn twice(words: &[String]) -> Option<&String> {
    let before = |index: usize| words[..index].contains(&words[index]);
    (0..words.len())
        .find(|index| before(*index))
        .map(|index| &words[index])
}

/// Media by their words, gases at the pressure of the joint's own gas where it has one.
pub fn media(joint: &Joint, words: &[String]) -> Vec<Medium> {
    let pressure = joint.service.medium.pressure();
    let named = words.iter().map(|word| Medium::named(word, pressure));
    named.filter_map(Result::ok).collect()
}

/// What the figures show.
#[derive(Clone, Debug)]
pub struct Fields {
    /// Nominal results.
    pub nominal: Estimate,
    /// Which interface is shown, counted from 0 at the warm side.
    pub interface: usize,
    /// Pressure, gap and conductance over the plan.
    pub map: FieldMap,
    /// Rings of every bolt.
    pub rings: Vec<Vec<RingRow>>,
    /// Temperatures of the faces and the flux between them; none for the cone.
    pub heat: Option<HeatMap>,
    /// A cut through the stack; none for the cone.
    pub section: Option<StackSection>,
}

/// What the figures show of an interface, maps `columns` points wide.
pub fn fields(task: &Task, interface: usize, columns: usize) -> Result<Fields, Trouble> {
    let chain = task.chain()?;
    task.watched(|| {
        Ok(Fields {
            nominal: uncertainty::along(&chain, &Options { draws: 0, seed: 1 })?,
            map: estimate::field_map(&chain, interface, columns)?,
            interface,
            rings: estimate::ring_tables(&chain, interface)?,
            heat: estimate::heat_map(&chain, interface, columns)?,
            section: estimate::stack_section(&chain)?,
        })
    })
}

/// The fields of every interface in every case as tables, maps `columns` points wide, each with what
/// its file is called.
pub fn tables(task: &Task, columns: usize) -> Result<Vec<(String, String)>, Trouble> {
    let mut tables = Vec::new();
    let cases = &task.joint.service.cases;
    for (place, case) in cases.iter().enumerate() {
        // Maps are those of the first case.
        let mut joint = task.joint.clone();
        joint.service.cases.rotate_left(place);
        let of_case = Task {
            joint: &joint,
            choice: task.choice,
            watch: task.watch.clone(),
        };
        let chain = of_case.chain()?;
        let condition = Condition {
            sink: case.temperature,
            heat: joint.service.heat,
        };
        for interface in 0..joint.interfaces() {
            let text = task.watched(|| {
                let field = estimate::field_map(&chain, interface, columns)?;
                let heat = estimate::heat_map(&chain, interface, columns)?;
                Ok(csv::map(&field, heat.as_ref(), condition))
            })?;
            tables.push((map_name(interface, case.name), text));
        }
    }
    Ok(tables)
}

/// Files of the maps of every interface in every case.
pub fn map_names(joint: &Joint) -> Vec<String> {
    let cases = joint.service.cases.iter();
    cases
        .flat_map(|case| (0..joint.interfaces()).map(|interface| map_name(interface, case.name)))
        .collect()
}

/// File of the map of an interface in a case.
pub fn map_name(interface: usize, case: &str) -> String {
    format!("map_{}_{case}.csv", interface + 1)
}

impl From<Failure> for Trouble {
    fn from(failure: Failure) -> Self {
        match failure {
            // The joint is sound; what was asked of it is not.
            Failure::NoSuchGroup { .. }
            | Failure::NotByTorque { .. }
            | Failure::SweepRange { .. } => Self::Usage {
                message: failure.to_string(),
                help: None,
            },
            Failure::BeyondCone(_) => Self::Usage {
                message: failure.to_string(),
                help: Some(format!(
                    "leave out `--field cone`: the solved field carries it; `ringsum explain {BEYOND_CONE}` tells more"
                )),
            },
            Failure::Contact(Contact::TooLarge { bytes, .. }) => Self::Usage {
                message: failure.to_string(),
                help: Some(format!(
                    "allow more with `--memory \"{} MB\"`, or take `--resolution fast` or `--field cone`",
                    bytes.div_ceil(1_000_000)
                )),
            },
            _ => Self::Failure(failure.to_string()),
        }
    }
}

/// A torque from the command line, N m.
pub fn torque(text: &str) -> Result<f64, String> {
    units::parse(text, Quantity::Torque).map_err(|fault| match fault.help {
        Some(help) => format!("{}; {help}", fault.message),
        None => fault.message,
    })
}

/// A share of the draws from the command line, 1.
pub fn confidence(text: &str) -> Result<f64, String> {
    let share = units::parse(text, Quantity::Ratio).map_err(|fault| {
        format!(
            "{}; write a share of the draws such as \"90 %\"",
            fault.message
        )
    })?;
    if (LEAST_SHARE..=MOST_SHARE).contains(&share) {
        Ok(share)
    } else {
        Err("it must lie between 10 % and 99 %, for example \"90 %\"".to_owned())
    }
}

/// Least and most share of the draws that a band may hold: the draws tell no more.
const LEAST_SHARE: f64 = 0.1;
const MOST_SHARE: f64 = 0.99;

/// The name that was probably meant.
pub fn nearest(name: &str, known: &[String]) -> Option<String> {
    diagnostic::nearest(name, known.iter().map(String::as_str))
}

/// A drawing as a file of the format in a system of units.
pub fn render(drawing: &Drawing, format: Format, units: System) -> Result<Vec<u8>, Trouble> {
    Ok(figures::render_in(drawing, format, units)?)
}

impl From<FigureError> for Trouble {
    fn from(fault: FigureError) -> Self {
        Self::Failure(fault.to_string())
    }
}

/// A drawing as SVG for wide and for narrow screens.
pub fn both_widths(drawing: &Drawing, units: System) -> Result<[String; 2], FigureError> {
    let wide = figures::svg_in(drawing, units)?;
    Ok([wide, figures::narrow_svg_in(drawing, units)?])
}
