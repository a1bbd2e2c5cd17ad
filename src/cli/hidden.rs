//! Commands for packagers and editors: completions, manual pages, schemas of the joint file and of the JSON.

use crate::{
    cli::{
        Cli,
        console::{Console, Layout, Outcome, Trouble},
    },
    joint,
    report::json,
};
use clap::{Args, CommandFactory, builder::PossibleValuesParser};

/// Print completions for a shell
#[derive(Debug, Args)]
pub struct Completions {
    /// The shell
    shell: clap_complete::Shell,
}

impl Completions {
    /// Prints the completions.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        let mut bytes = Vec::new();
        clap_complete::generate(self.shell, &mut Cli::command(), "ringsum", &mut bytes);
        console.result(&String::from_utf8_lossy(&bytes))?;
        Ok(Outcome::Done)
    }
}

/// Print the manual page of the program or of one command
#[derive(Debug, Args)]
pub struct Man {
    /// The command
    command: Option<String>,
}

impl Man {
    /// Prints the page.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        let mut program = Cli::command();
        // Building fills the names of the commands, `ringsum-estimate`.
        program.build();
        let page = match &self.command {
            None => program,
            Some(name) => program.find_subcommand(name).cloned().ok_or_else(|| {
                Trouble::usage(
                    format!("there is no command `{name}`"),
                    "`ringsum --help` lists them",
                )
            })?,
        };
        let mut bytes = Vec::new();
        clap_mangen::Man::new(page).render(&mut bytes)?;
        console.result(&String::from_utf8_lossy(&bytes))?;
        Ok(Outcome::Done)
    }
}

/// Print the JSON Schema of the joint file, or with --results of what --json prints
#[derive(Debug, Args)]
pub struct Schema {
    /// The schema of what a command prints with --json; without a command that of all
    #[arg(long, value_name = "COMMAND", num_args = 0..=1, default_missing_value = ALL)]
    #[arg(value_parser = PossibleValuesParser::new(json::COMMANDS.into_iter().chain([ALL])))]
    results: Option<String>,
}

/// The word for every command.
const ALL: &str = "all";

impl Schema {
    /// Prints the schema.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        let schema = match self.results.as_deref() {
            None => joint::schema(),
            Some(command) => json::schema(Some(command).filter(|command| *command != ALL)),
        };
        console.json(&schema, Layout::Indented)?;
        Ok(Outcome::Done)
    }
}
