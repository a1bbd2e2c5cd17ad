//! `arrange`: the layout of fasteners that meets a requirement.

use crate::{
    cli::{
        chain::{self, Choice, Fineness},
        check,
        console::{Console, Layout as Lines, Outcome, Trouble},
        drawings, field, input,
        output::{self, Existing, Target},
        shown::Shown,
    },
    figures::{ArrangePlot, Drawing, Format},
    joint::{self, Joint},
    layout::{
        self, Answer, Defaults, Failure, Fasten, Goal, Progress, Row, Search, Size, State, Task,
        digest, rewritten,
    },
    report::arrange,
};
use clap::{Args, ValueEnum};
use std::{
    fs,
    path::{Path, PathBuf},
    sync::{
        Arc,
        atomic::{AtomicBool, Ordering},
    },
    time::{Duration, Instant},
};

const EXAMPLES: &str = "\
What may be tried stands in the [arrange] table of the joint file.
Examples:
  ringsum arrange joint.toml
  ringsum arrange joint.toml --for resistance --draw layouts.svg --write layouts
  ringsum arrange joint.toml --checkpoint search.json    (later: --resume search.json)";

/// Memory that one elastic field may take, bytes.
const MEMORY: u64 = 1_000_000_000;
/// Time between two checkpoints while units are short.
const BETWEEN: Duration = Duration::from_secs(1);
/// What a shell reports of a program that ended by Ctrl-C.
const INTERRUPTED: i32 = 130;

/// Search the layout of the first fastener group: fewest bolts, least mass or lowest resistance
#[derive(Debug, Args)]
#[command(after_help = EXAMPLES)]
pub struct Arrange {
    /// Joint file; - reads standard input
    file: PathBuf,
    /// What to make small: bolts, mass or resistance
    #[arg(
        long = "for",
        value_enum,
        value_name = "GOAL",
        default_value = "bolts",
        hide_possible_values = true
    )]
    goal: Wanted,
    /// How many of the best layouts are solved on the elastic field
    #[arg(long, value_name = "N", default_value_t = 8,
          value_parser = clap::value_parser!(u32).range(1..=200))]
    solve: u32,
    /// Seed of the random starts for free places
    #[arg(long, value_name = "N", default_value_t = 1)]
    seed: u64,
    /// Threads [default: all cores]; they change no digit
    #[arg(long, value_name = "N", value_parser = clap::value_parser!(u32).range(1..=1024))]
    jobs: Option<u32>,
    #[command(flatten)]
    shown: Shown,
    /// Print JSON, in SI
    #[arg(long)]
    json: bool,
    /// Draw the layouts to a file that ends in .svg or .png
    #[arg(long, value_name = "FIGURE")]
    draw: Option<PathBuf>,
    /// Write a joint file for each layout of the front (marked *) into this folder
    #[arg(long, value_name = "FOLDER")]
    write: Option<PathBuf>,
    /// Keep the state of the search in this file
    #[arg(long, value_name = "FILE")]
    checkpoint: Option<PathBuf>,
    /// Go on from this state
    #[arg(long, value_name = "FILE")]
    resume: Option<PathBuf>,
    /// Replace files that exist
    #[arg(long)]
    force: bool,
}

#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
enum Wanted {
    /// Fewest bolts
    Bolts,
    /// Least mass of the fasteners
    Mass,
    /// Lowest resistance
    Resistance,
}

impl From<Wanted> for Goal {
    fn from(wanted: Wanted) -> Self {
        match wanted {
            Wanted::Bolts => Self::Bolts,
            Wanted::Mass => Self::Mass,
            Wanted::Resistance => Self::Resistance,
        }
    }
}

/// The joint that is searched, with all that is read for it.
struct Read {
    text: String,
    folder: PathBuf,
    joint: Joint,
}

impl Read {
    /// Another layout of the same file, as the reader takes it.
    fn again(&self, text: &str) -> Result<Joint, String> {
        let files = |name: &str| input::table(&self.folder, name);
        joint::read_with_files(text, &[], &files).map_err(|told| told.first())
    }
}

impl Arrange {
    /// Searches, prints the best, and tells by the exit code whether it was interrupted.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        let figure = match &self.draw {
            Some(path) => Some((output::format(path)?, Target::new(path, self.existing())?)),
            None => None,
        };
        self.check_folder()?;
        let (source, joint) =
            check::read(&self.file, &[], console).map_err(|refused| refused.trouble())?;
        let read = Read {
            text: source.text,
            folder: input::folder(&self.file),
            joint,
        };
        let task = Task {
            goal: self.goal.into(),
            solve: self.solve as usize,
            seed: self.seed,
            choice: Choice::elastic(Fineness::Fast, MEMORY),
        };
        let mut state = self.state(&self.digest(&read))?;
        let checkpoint = self.checkpoint()?;
        let mut pool = rayon::ThreadPoolBuilder::new();
        if let Some(jobs) = self.jobs {
            pool = pool.num_threads(jobs as usize);
        }
        let pool = pool
            .build()
            .map_err(|fault| Trouble::Failure(fault.to_string()))?;
        let stop = stopped_by_keyboard()?;
        let arrange = read.joint.arrange.clone().unwrap_or_default();
        let defaults = Defaults::of(&read.joint, &arrange);
        let sizes = sizes((&read, &arrange), task.goal, console)?;
        let search = Search::new(task, &arrange, &sizes)?;
        let mut keeper = Keeper::new(checkpoint);
        let ended = pool.install(|| {
            search.run(&mut state, &stop, &mut |state, progress| {
                keeper.note(state, progress);
            })
        });
        field::watch().tell("");
        keeper.last(&state)?;
        let answer = Answer::of(&search, &state, ended.is_ok());
        if let Some((format, target)) = figure {
            write_figure(&search, &answer, (format, &target))?;
            console.message(&format!("wrote {}\n", target.path.display()));
        }
        if self.json {
            console.json(&arrange::json(&answer, &defaults), Lines::Indented)?;
        } else {
            console.result(&arrange::answer_in(&answer, &defaults, self.shown.system()))?;
        }
        self.write_files(&read, &answer, console)?;
        Ok(match ended {
            Ok(()) => Outcome::Done,
            Err(_) => Outcome::Interrupted,
        })
    }

    fn existing(&self) -> Existing {
        Existing::from_force(self.force)
    }

    /// What a checkpoint must have been made of.
    fn digest(&self, read: &Read) -> String {
        digest(&[
            env!("CARGO_PKG_VERSION"),
            &read.text,
            // Tables that the file names are part of the joint as read.
            &format!("{:?}", read.joint),
            Goal::from(self.goal).name(),
            &self.solve.to_string(),
            &self.seed.to_string(),
        ])
    }

    /// A new state, or the one to go on from.
    fn state(&self, digest: &str) -> Result<State, Trouble> {
        let Some(path) = &self.resume else {
            return Ok(State::new(digest));
        };
        let name = path.display();
        let text = fs::read_to_string(path).map_err(|fault| {
            Trouble::usage(
                format!("`{name}` cannot be read: {fault}"),
                "name the file that --checkpoint wrote",
            )
        })?;
        let state: State = serde_json::from_str(&text).map_err(|fault| {
            Trouble::usage(
                format!("`{name}` is no checkpoint: {fault}"),
                "name the file that --checkpoint wrote",
            )
        })?;
        if state.digest == digest {
            Ok(state)
        } else {
            Err(Trouble::usage(
                format!("`{name}` belongs to another joint, goal, --solve, --seed or version"),
                "resume it with the joint and the options it was made with, or start anew",
            ))
        }
    }

    /// Where the state goes; the file that is resumed may be replaced.
    fn checkpoint(&self) -> Result<Option<PathBuf>, Trouble> {
        let Some(path) = self.checkpoint.as_ref().or(self.resume.as_ref()) else {
            return Ok(None);
        };
        let existing = if self.resume.as_ref() == Some(path) {
            Existing::Replace
        } else {
            self.existing()
        };
        Target::new(path, existing)?;
        Ok(Some(path.clone()))
    }

    fn check_folder(&self) -> Result<(), Trouble> {
        match &self.write {
            Some(folder) if !folder.is_dir() => Err(Trouble::usage(
                format!("there is no folder `{}`", folder.display()),
                "make the folder first",
            )),
            _ => Ok(()),
        }
    }

    /// A joint file for each layout of the front.
    fn write_files(
        &self,
        read: &Read,
        answer: &Answer,
        console: &mut Console,
    ) -> Result<(), Trouble> {
        let Some(folder) = &self.write else {
            return Ok(());
        };
        let tables = read
            .joint
            .plates
            .iter()
            .any(|plate| plate.flatness_map.is_some());
        if tables && !same_folder(folder, &read.folder) {
            return Err(Trouble::usage(
                "the joint names tables beside it, which its layouts would not find in another folder",
                "write into the folder of the joint file",
            ));
        }
        let front = answer.rows.iter().filter(|row| row.front);
        let mut files = Vec::new();
        for row in front {
            let fasten = Fasten {
                size: row.size,
                places: &row.places,
            };
            let text = rewritten(&read.text, fasten)?;
            read.again(&text).map_err(|fault| {
                Trouble::Failure(format!("a layout makes a joint that cannot be: {fault}"))
            })?;
            files.push((Target::new(&folder.join(name(row)), self.existing())?, text));
        }
        for (target, text) in files {
            target.write(text.as_bytes())?;
            console.message(&format!("wrote {}\n", target.path.display()));
        }
        Ok(())
    }
}

/// `06-m5-edge.toml`.
fn name(row: &Row) -> String {
    let size = row
        .size
        .map_or_else(String::new, |size| format!("-size{}", size + 1));
    let thread: String = row
        .label
        .split(' ')
        .next()
        .unwrap_or("")
        .chars()
        .map(|letter| {
            if letter.is_ascii_alphanumeric() {
                letter.to_ascii_lowercase()
            } else {
                '_'
            }
        })
        .collect();
    format!(
        "{:02}-{thread}{size}-{}.toml",
        row.places.len(),
        row.family.name()
    )
}

fn same_folder(one: &Path, other: &Path) -> bool {
    let real = |path: &Path| {
        let path = if path == Path::new("") {
            Path::new(".")
        } else {
            path
        };
        fs::canonicalize(path).ok()
    };
    real(one).is_some() && real(one) == real(other)
}

/// The sizes that bear their torque, in the case in which the joint as stated stands worst; the others
/// are named.
fn sizes(
    (read, arrange): (&Read, &joint::Arrange),
    goal: Goal,
    console: &mut Console,
) -> Result<Vec<Size>, Trouble> {
    let target = layout::Target::of(&read.joint, goal)?;
    let places = &read.joint.fasteners[0].places;
    let case = layout::worst_case((&read.joint, places), &target)?;
    let tried: Vec<Option<usize>> = match arrange.sizes {
        0 => vec![None],
        count => (0..count).map(Some).collect(),
    };
    let mut sizes = Vec::new();
    let mut over = Vec::new();
    for index in tried {
        let size = Size::in_case(index, alone(read, index)?, case)?;
        match &size.overstressed {
            Some(why) => over.push(why.clone()),
            None => sizes.push(size),
        }
    }
    if sizes.is_empty() {
        return Err(Failure::Overstressed(over.join("; ")).into());
    }
    for why in over {
        console.message(&format!("left out, overstressed: {why}\n"));
    }
    Ok(sizes)
}

/// The joint with one fastener of a size, at the first of its places that takes it.
fn alone(read: &Read, size: Option<usize>) -> Result<Joint, Failure> {
    let mut told = String::new();
    for place in &read.joint.fasteners[0].places {
        let places = [*place];
        let fasten = Fasten {
            size,
            places: &places,
        };
        match read.again(&rewritten(&read.text, fasten)?) {
            Ok(joint) => return Ok(joint),
            Err(fault) => told = fault,
        }
    }
    Err(Failure::Size {
        size: size.map_or_else(
            || "the fastener".to_owned(),
            |size| format!("arrange.sizes[{}]", size + 1),
        ),
        fault: told,
    })
}

impl From<Failure> for Trouble {
    fn from(failure: Failure) -> Self {
        let help = match &failure {
            Failure::Chain(_) | Failure::NoPath | Failure::Rewriting(_) => {
                return Self::Failure(failure.to_string());
            }
            Failure::NoRequirement => {
                "state `require = { rise = \"10 K\" }` in [service], or ask `--for resistance`"
            }
            Failure::NoHeat => "state `heat` in [service]",
            Failure::Size { .. } => {
                "state what differs from the first fastener group: thread, hole, torque"
            }
            Failure::Overstressed(_) => {
                "lower the torque, put washers under head and nut, or allow stronger fasteners in arrange.sizes"
            }
            Failure::NoLayout(_) => {
                "allow other numbers of bolts, smaller sizes or distances in [arrange]"
            }
        };
        Self::usage(failure.to_string(), help)
    }
}

/// Set by Ctrl-C; a second one ends at once.
fn stopped_by_keyboard() -> Result<Arc<AtomicBool>, Trouble> {
    let stop = Arc::new(AtomicBool::new(false));
    let asked = stop.clone();
    ctrlc::set_handler(move || {
        if asked.swap(true, Ordering::Relaxed) {
            std::process::exit(INTERRUPTED);
        }
    })
    .map_err(|fault| Trouble::Failure(fault.to_string()))?;
    Ok(stop)
}

/// Keeps the state on disk and tells the terminal how far the search is.
struct Keeper {
    path: Option<PathBuf>,
    written: Option<Instant>,
    trouble: Option<Trouble>,
    watch: chain::Watch,
    stage: &'static str,
}

impl Keeper {
    fn new(path: Option<PathBuf>) -> Self {
        Self {
            path,
            written: None,
            trouble: None,
            watch: field::watch(),
            stage: "",
        }
    }

    fn note(&mut self, state: &State, progress: Progress) {
        let [done, all] = progress.done;
        self.watch
            .tell(&format!("{}: {done} of {all}", progress.stage));
        let due = self.written.is_none_or(|last| last.elapsed() >= BETWEEN);
        if due || progress.stage != self.stage {
            self.stage = progress.stage;
            self.keep(state);
        }
    }

    fn keep(&mut self, state: &State) {
        if let Err(trouble) = self.written(state) {
            self.trouble.get_or_insert(trouble);
        }
        self.written = Some(Instant::now());
    }

    fn written(&self, state: &State) -> Result<(), Trouble> {
        let Some(path) = &self.path else {
            return Ok(());
        };
        let text = serde_json::to_string(state)
            .map_err(|fault| Trouble::Failure(format!("the state cannot be kept: {fault}")))?;
        Target::new(path, Existing::Replace)?.write(text.as_bytes())
    }

    /// Keeps the last state and tells what went wrong on the way.
    fn last(&mut self, state: &State) -> Result<(), Trouble> {
        self.keep(state);
        self.trouble.take().map_or(Ok(()), Err)
    }
}

fn write_figure(
    search: &Search,
    answer: &Answer,
    (format, target): (Format, &Target),
) -> Result<(), Trouble> {
    let joint = &search.sizes[0].joint;
    let head = |row: &Row| {
        let size = search.sizes.iter().find(|size| size.index == row.size);
        size.map_or(0.0, |size| size.fastener().head_seat.outer_radius)
    };
    let plot = ArrangePlot {
        plates: joint
            .plates
            .iter()
            .map(|plate| drawings::outline(plate).shape)
            .collect(),
        keep_out: search
            .arrange
            .keep_out
            .iter()
            .filter_map(|zone| drawings::heated(*zone))
            .collect(),
        heads: answer.rows.iter().map(head).collect(),
        answer: answer.clone(),
    };
    target.write(&chain::render(&Drawing::Arrange(Box::new(plot)), format)?)
}
