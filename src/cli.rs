//! Arguments, files and exit codes: the only input and output.

mod answers;
mod arrange;
mod batch;
mod chain;
mod check;
mod compare;
mod console;
mod demos;
mod draw;
mod drawings;
mod draws;
mod drivers;
mod estimate;
mod explain;
mod field;
mod figure;
mod fit;
mod hidden;
mod input;
mod list;
mod new;
mod output;
mod report;
mod results;
mod shown;
mod torque;

use crate::cli::console::{Color, Console, Outcome, Trouble};
use clap::{CommandFactory, FromArgMatches, Parser, Subcommand};
use std::{ffi::OsString, io, process::ExitCode};

/// What a bare `ringsum` says: three lines that lead to a result.
const FIRST_STEPS: &str = "\
ringsum new --from-demo sensor_lid | ringsum estimate -   tells a resistance: low, nominal, high
ringsum new joint.toml                                    writes a starter joint to edit
ringsum --help                                            lists every command
";

const EXIT_CODES: &str = "\
Exit codes: 0 done, 1 failure, 2 faulty input or usage, 3 cautions with --strict, 130 interrupted.
Of several files, any failure or fault makes it 1 after all are done.
A joint file named - is read from standard input.";

/// Thermal resistance of bolted joints, from torque to K/W, with a low and a high.
#[derive(Debug, Parser)]
#[command(name = "ringsum", version, after_help = EXIT_CODES, disable_help_subcommand = true)]
struct Cli {
    /// When to use colour; auto is plain when piped and under `NO_COLOR`
    #[arg(
        long,
        global = true,
        value_enum,
        value_name = "auto|always|never",
        default_value = "auto",
        hide_possible_values = true,
        hide_default_value = true,
        display_order = 100
    )]
    color: Color,
    #[command(subcommand)]
    command: Option<Command>,
}

#[derive(Debug, Subcommand)]
enum Command {
    New(new::New),
    Check(check::Check),
    Estimate(estimate::Estimate),
    Compare(compare::Compare),
    Torque(torque::Torque),
    Drivers(drivers::Drivers),
    Draw(draw::Draw),
    Arrange(arrange::Arrange),
    Report(Box<report::Report>),
    Fit(Box<fit::Fit>),
    List(list::List),
    Explain(explain::Explain),
    #[command(hide = true)]
    Completions(hidden::Completions),
    #[command(hide = true)]
    Man(hidden::Man),
    #[command(hide = true)]
    Schema(hidden::Schema),
}

/// Runs the program and returns its exit code.
pub fn run(arguments: impl IntoIterator<Item = OsString>) -> ExitCode {
    let arguments: Vec<OsString> = arguments.into_iter().collect();
    // The colour is needed before the arguments are understood, because usage errors use it too.
    let asked = console::asked(&arguments);
    let parsed = Cli::command()
        .color(asked.for_usage())
        .try_get_matches_from(arguments)
        .and_then(|matches| Cli::from_arg_matches(&matches));
    let cli = match parsed {
        Ok(cli) => cli,
        Err(usage) => return told(&usage),
    };
    let mut console = Console::new(cli.color);
    let outcome = match cli.command {
        None => console
            .result(FIRST_STEPS)
            .map(|()| Outcome::Done)
            .map_err(Trouble::from),
        Some(command) => command.run(&mut console),
    };
    match outcome {
        Ok(outcome) => ExitCode::from(outcome.code()),
        // Whoever reads has read enough: `ringsum list | head` is no failure.
        Err(trouble) if trouble.is_closed_pipe() => ExitCode::SUCCESS,
        Err(trouble) => {
            console.trouble(&trouble);
            ExitCode::from(trouble.outcome().code())
        }
    }
}

impl Command {
    fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        match self {
            Self::New(command) => command.run(console),
            Self::Check(command) => command.run(console),
            Self::Estimate(command) => command.run(console),
            Self::Compare(command) => command.run(console),
            Self::Torque(command) => command.run(console),
            Self::Drivers(command) => command.run(console),
            Self::Draw(command) => command.run(console),
            Self::Arrange(command) => command.run(console),
            Self::Report(command) => command.run(console),
            Self::Fit(command) => command.run(console),
            Self::List(command) => command.run(console),
            Self::Explain(command) => command.run(console),
            Self::Completions(command) => command.run(console),
            Self::Man(command) => command.run(console),
            Self::Schema(command) => command.run(console),
        }
    }
}

/// Help, version and usage errors, in the words of the argument parser.
fn told(usage: &clap::Error) -> ExitCode {
    match usage.print() {
        Err(fault) if fault.kind() != io::ErrorKind::BrokenPipe => {
            ExitCode::from(Outcome::Failed.code())
        }
        _ if usage.use_stderr() => ExitCode::from(Outcome::Faulty.code()),
        _ => ExitCode::SUCCESS,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_argument_description_is_consistent() {
        Cli::command().debug_assert();
    }
}
