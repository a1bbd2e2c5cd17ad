//! One answer for every joint file of a command: told, printed as JSON, or written to a folder.

use crate::{
    cli::{
        batch::Batch,
        check::Refused,
        console::{Console, Layout, Outcome, Trouble},
        input::{self, Source},
        output::Permit,
        results::Results,
    },
    joint::Joint,
    report::{
        csv::{Ended, Table},
        listing,
    },
};
use std::path::{Path, PathBuf};

/// What a command says of one joint; each form is made where it is asked for alone.
pub trait Answer {
    /// For people.
    fn text(&self) -> String;
    /// For programs.
    fn object(&self) -> serde_json::Value;
    /// The cells of its lines of the table.
    fn rows(&self) -> Vec<Vec<String>>;
    /// How it ended.
    fn outcome(&self) -> Outcome {
        Outcome::Done
    }
}

/// In which form the answers of a command are given.
pub struct Form<'a> {
    /// Whether JSON is printed.
    pub json: bool,
    /// The table that is written beside the JSON of a folder.
    pub table: &'static Table,
    /// The folder for results, and what may be written.
    pub out: Option<(&'a Path, Permit<'a>)>,
}

/// The answers of a command, file by file.
pub struct Answers<'a> {
    batch: &'a Batch,
    files: Vec<PathBuf>,
    given: usize,
    json: bool,
    table: &'static Table,
    out: Option<Results>,
}

/// What was found of one joint.
pub struct Found<'a> {
    /// The answer.
    pub answer: Box<dyn Answer + 'a>,
    /// Why files asked for beside it were not written; it is told even so.
    pub unwritten: Vec<Trouble>,
}

/// How a command reads one joint.
type Read<'a> = dyn Fn(&Path, &mut Console) -> Result<(Source, Joint), Refused> + Sync + 'a;
/// What a command finds of one joint.
type Find<'a> = dyn Fn((&Source, &Joint), &mut Console) -> Result<Found<'a>, Trouble> + Sync + 'a;

impl<'a> Answers<'a> {
    /// Checks every target before anything is computed.
    pub fn new(batch: &'a Batch, given: &[PathBuf], form: &Form) -> Result<Self, Trouble> {
        let files = batch.files(given);
        input::stdin_at_most_once(&files)?;
        let out = match form.out {
            Some((folder, permit)) => Some(Results::new(
                (folder, form.table),
                (given, &files),
                (permit, batch.part()),
            )?),
            None => None,
        };
        Ok(Self {
            batch,
            files,
            given: given.len(),
            json: form.json,
            table: form.table,
            out,
        })
    }

    /// Works through the files, also after one at fault.
    pub fn run(self, console: &mut Console, read: &Read, find: &Find) -> Result<Outcome, Trouble> {
        let outcome = self
            .batch
            .run(&self.files, console, &|index, path, console| {
                if !self.json && self.out.is_none() && self.given > 1 {
                    let gap = if index > 0 { "\n" } else { "" };
                    console.result(&format!("{gap}{}:\n", input::name(path)))?;
                }
                self.one((index, path), console, (read, find))
            })?;
        if let Some(out) = self.out {
            console.message(&out.finish()?);
        }
        Ok(outcome)
    }

    fn one(
        &self,
        (index, path): (usize, &Path),
        console: &mut Console,
        (read, find): (&Read, &Find),
    ) -> Result<Outcome, Trouble> {
        let (source, joint) = match read(path, console) {
            Ok(read) => read,
            Err(refused) => {
                let name = input::name(path);
                let row = self.table.without(&name, Ended::Faulty, &refused.first());
                let put = self.put(index, (&refused.json(), row), console);
                console.tell_if_lost(put);
                return Err(refused.trouble());
            }
        };
        let name = &source.name;
        match find((&source, &joint), console) {
            Ok(Found { answer, unwritten }) => {
                let outcome = if unwritten.is_empty() {
                    answer.outcome()
                } else {
                    Outcome::Failed
                };
                for trouble in unwritten {
                    console.trouble(&trouble.of_file(name));
                }
                if self.json || self.out.is_some() {
                    let mut object = answer.object();
                    object["file"] = name.as_str().into();
                    let ended = match answer.outcome() {
                        Outcome::Interrupted => Ended::Interrupted,
                        _ => Ended::Done,
                    };
                    let rows = match &self.out {
                        Some(_) => self.table.of_file(name, ended, &answer.rows()),
                        None => String::new(),
                    };
                    self.put(index, (&object, rows), console)?;
                } else {
                    console.result(&answer.text())?;
                }
                Ok(outcome)
            }
            Err(trouble) => {
                let (message, ended) = match &trouble {
                    Trouble::Failure(message) => (message.clone(), Ended::Failed),
                    Trouble::Usage { message, .. } => (message.clone(), Ended::Faulty),
                    Trouble::Output(_) | Trouble::Faults(_) => return Err(trouble),
                };
                let object = listing::unanswered(name, &message);
                let row = self.table.without(name, ended, &message);
                let put = self.put(index, (&object, row), console);
                console.tell_if_lost(put);
                Err(trouble.of_file(name))
            }
        }
    }

    /// Writes an object where results go to files, prints it where JSON is asked for.
    fn put(
        &self,
        index: usize,
        (object, rows): (&serde_json::Value, String),
        console: &mut Console,
    ) -> Result<(), Trouble> {
        if let Some(out) = &self.out {
            out.put(index, object, rows)?;
        } else if self.json {
            console.json(object, Layout::of_batch(self.given))?;
        }
        Ok(())
    }
}
