//! Where results and messages go, and how a run can end.

use anstream::AutoStream;
use clap::ValueEnum;
use std::{
    ffi::OsString,
    io::{self, Write},
    path::Path,
};

/// When to use colour.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub enum Color {
    /// At a terminal, unless `NO_COLOR` is set
    Auto,
    /// Also when piped
    Always,
    /// Not at all
    Never,
}

impl Color {
    fn choice(self) -> anstream::ColorChoice {
        match self {
            Self::Auto => anstream::ColorChoice::Auto,
            Self::Always => anstream::ColorChoice::Always,
            Self::Never => anstream::ColorChoice::Never,
        }
    }

    /// The same choice for the usage errors of the argument parser.
    pub fn for_usage(self) -> clap::ColorChoice {
        match self {
            Self::Auto => clap::ColorChoice::Auto,
            Self::Always => clap::ColorChoice::Always,
            Self::Never => clap::ColorChoice::Never,
        }
    }
}

/// The colour asked for, read from the raw arguments; anything odd counts as `auto`.
pub fn asked(arguments: &[OsString]) -> Color {
    let words: Vec<&str> = arguments.iter().filter_map(|word| word.to_str()).collect();
    let value = words
        .iter()
        .find_map(|word| word.strip_prefix("--color="))
        .or_else(|| {
            let at = words.iter().position(|word| *word == "--color")?;
            words.get(at + 1).copied()
        });
    value
        .and_then(|value| Color::from_str(value, false).ok())
        .unwrap_or(Color::Auto)
}

/// How a run ended.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Outcome {
    /// All done.
    Done,
    /// Done, with cautions, and `--strict` was given.
    Cautioned,
    /// The input or the usage is at fault.
    Faulty,
    /// The computation or the writing failed.
    Failed,
    /// The user stopped it; what was found is told.
    Interrupted,
}

impl Outcome {
    /// The exit code.
    pub fn code(self) -> u8 {
        match self {
            Self::Done => 0,
            Self::Failed => 1,
            Self::Faulty => 2,
            Self::Cautioned => 3,
            Self::Interrupted => 130,
        }
    }

    /// The outcome of a batch. One file keeps its own; of several, one that was stopped tells so, and
    /// any failure or fault is a failure.
    pub fn of_batch(outcomes: &[Self]) -> Self {
        match outcomes {
            [single] => *single,
            several if several.contains(&Self::Interrupted) => Self::Interrupted,
            several
                if several
                    .iter()
                    .any(|each| matches!(each, Self::Failed | Self::Faulty)) =>
            {
                Self::Failed
            }
            several if several.contains(&Self::Cautioned) => Self::Cautioned,
            _ => Self::Done,
        }
    }
}

/// Why a command stopped early.
#[derive(Debug)]
pub enum Trouble {
    /// Standard output takes no more.
    Output(io::Error),
    /// The arguments ask for something that cannot be done, with the way out.
    Usage {
        /// What is wrong.
        message: String,
        /// What to do instead.
        help: Option<String>,
    },
    /// The computation or the writing of a file failed.
    Failure(String),
    /// A joint file is at fault; its faults, already drawn.
    Faults(String),
}

impl From<io::Error> for Trouble {
    fn from(fault: io::Error) -> Self {
        Self::Output(fault)
    }
}

impl Trouble {
    /// A usage fault with its way out.
    pub fn usage(message: impl Into<String>, help: impl Into<String>) -> Self {
        Self::Usage {
            message: message.into(),
            help: Some(help.into()),
        }
    }

    /// The same, with the file it speaks of.
    pub fn of_file(self, name: &str) -> Self {
        match self {
            Self::Failure(message) => Self::Failure(format!("{name}: {message}")),
            Self::Usage { message, help } => Self::Usage {
                message: format!("{name}: {message}"),
                help,
            },
            other => other,
        }
    }

    /// Whether nobody reads the results any more.
    pub fn is_closed_pipe(&self) -> bool {
        matches!(self, Self::Output(fault) if fault.kind() == io::ErrorKind::BrokenPipe)
    }

    /// What happened in a sentence, where it was not told in full before.
    pub fn sentence(&self) -> Option<&str> {
        match self {
            Self::Failure(message) | Self::Usage { message, .. } => Some(message),
            Self::Output(_) | Self::Faults(_) => None,
        }
    }

    /// How the run ends because of it.
    pub fn outcome(&self) -> Outcome {
        match self {
            Self::Output(_) | Self::Failure(_) => Outcome::Failed,
            Self::Usage { .. } | Self::Faults(_) => Outcome::Faulty,
        }
    }
}

/// Standard output for results, standard error for messages; colour is stripped where it does
/// not belong.
pub struct Console {
    to: To,
    /// Whether work goes on where nobody reads the results any more.
    outlasts: bool,
}

/// Where it goes.
enum To {
    /// To those who wait for it.
    Streams(Box<Streams>),
    /// Kept until its turn comes.
    Kept(Vec<(Stream, String)>),
}

struct Streams {
    results: AutoStream<io::Stdout>,
    messages: AutoStream<io::Stderr>,
}

/// What a text is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Stream {
    Result,
    Message,
}

impl Console {
    /// The console with the colour asked for.
    pub fn new(color: Color) -> Self {
        color.choice().write_global();
        Self::to(To::Streams(Box::new(Streams {
            results: AutoStream::auto(io::stdout()),
            messages: AutoStream::auto(io::stderr()),
        })))
    }

    /// A console that keeps all it is given, for work that goes on beside other work.
    pub fn kept() -> Self {
        Self::to(To::Kept(Vec::new()))
    }

    fn to(to: To) -> Self {
        let outlasts = false;
        Self { to, outlasts }
    }

    /// From now on results that nobody reads are dropped, because files are owed besides.
    pub fn outlast_reader(&mut self) {
        self.outlasts = true;
    }

    /// All that was kept, for tests.
    #[cfg(test)]
    pub fn texts(self) -> String {
        match self.to {
            To::Kept(texts) => texts.into_iter().map(|(_, text)| text).collect(),
            To::Streams(_) => String::new(),
        }
    }

    /// Gives out what another console has kept, in its order; messages also where results find no way.
    pub fn give_out(&mut self, kept: Self) -> io::Result<()> {
        let mut given = Ok(());
        if let To::Kept(texts) = kept.to {
            for (stream, text) in texts {
                match stream {
                    Stream::Result if given.is_ok() => given = self.result(&text),
                    Stream::Result => {}
                    Stream::Message => self.message(&text),
                }
            }
        }
        given
    }

    /// Writes a result.
    pub fn result(&mut self, text: &str) -> io::Result<()> {
        match &mut self.to {
            To::Streams(streams) => {
                let results = &mut streams.results;
                let written = results.write_all(text.as_bytes());
                match written.and_then(|()| results.flush()) {
                    Err(fault) if self.outlasts && fault.kind() == io::ErrorKind::BrokenPipe => {
                        Ok(())
                    }
                    written => written,
                }
            }
            To::Kept(texts) => {
                texts.push((Stream::Result, text.to_owned()));
                Ok(())
            }
        }
    }

    /// Writes a JSON value, indented for one file, on one line in a batch.
    pub fn json(&mut self, value: &serde_json::Value, layout: Layout) -> io::Result<()> {
        let text = match layout {
            Layout::Indented => format!("{value:#}\n"),
            Layout::Line => format!("{value}\n"),
        };
        self.result(&text)
    }

    /// Writes a JSON value that tells a failure, which is told as a message besides; where it finds no way,
    /// that is told too.
    pub fn json_of_failure(&mut self, value: &serde_json::Value, layout: Layout) {
        let written = self.json(value, layout).map_err(Trouble::from);
        self.tell_if_lost(written);
    }

    /// Tells why something beside another trouble was not written, unless nobody reads any more.
    pub fn tell_if_lost(&mut self, written: Result<(), Trouble>) {
        match written {
            Err(lost) if !lost.is_closed_pipe() => self.trouble(&lost),
            _ => {}
        }
    }

    /// Writes a message. When nobody can read it any more there is nobody left to tell.
    pub fn message(&mut self, text: &str) {
        match &mut self.to {
            To::Streams(streams) => {
                let _ = streams.messages.write_all(text.as_bytes());
                let _ = streams.messages.flush();
            }
            To::Kept(texts) => texts.push((Stream::Message, text.to_owned())),
        }
    }

    /// Tells that a file was written.
    pub fn wrote(&mut self, path: &Path) {
        self.message(&format!("wrote {}\n", path.display()));
    }

    /// Tells what went wrong, and the way out.
    pub fn trouble(&mut self, trouble: &Trouble) {
        let text = match trouble {
            Trouble::Output(fault) => error(&format!("cannot write the result: {fault}"), None),
            Trouble::Usage { message, help } => error(message, help.as_deref()),
            Trouble::Failure(message) => error(message, None),
            Trouble::Faults(drawn) => drawn.clone(),
        };
        self.message(&text);
    }
}

/// How JSON is laid out.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Layout {
    /// Over several lines.
    Indented,
    /// On one line.
    Line,
}

impl Layout {
    /// Objects of several files stand one to a line.
    pub fn of_batch(files: usize) -> Self {
        if files > 1 {
            Self::Line
        } else {
            Self::Indented
        }
    }
}

/// An error without a place in a file.
pub fn error(message: &str, help: Option<&str>) -> String {
    let red = anstyle::AnsiColor::Red.on_default().bold();
    let bold = anstyle::Style::new().bold();
    let text = format!("{red}error{red:#}: {message}\n");
    match help {
        Some(help) => format!("{text}{bold}help{bold:#}: {help}\n"),
        None => text,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_single_file_keeps_its_outcome_and_a_batch_fails_as_a_whole() {
        use Outcome::{Cautioned, Done, Failed, Faulty};
        assert_eq!(Outcome::of_batch(&[Faulty]), Faulty);
        assert_eq!(Outcome::of_batch(&[Done, Faulty]), Failed);
        assert_eq!(Outcome::of_batch(&[Cautioned, Failed]), Failed);
        assert_eq!(Outcome::of_batch(&[Cautioned, Done]), Cautioned);
        assert_eq!(Outcome::of_batch(&[]), Done);
    }

    #[test]
    fn the_colour_is_found_wherever_it_stands() {
        let asked = |words: &[&str]| asked(&words.iter().map(OsString::from).collect::<Vec<_>>());
        assert_eq!(
            asked(&["ringsum", "list", "--color", "never"]),
            Color::Never
        );
        assert_eq!(asked(&["ringsum", "--color=always"]), Color::Always);
        assert_eq!(asked(&["ringsum", "--color"]), Color::Auto);
        assert_eq!(asked(&["ringsum", "--color=pink"]), Color::Auto);
    }
}
