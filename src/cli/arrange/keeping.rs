//! The state of a search on disk: what it goes on from, and how far it has come.

use crate::{
    cli::{
        chain,
        console::Trouble,
        input,
        output::{Existing, Target},
    },
    layout::{Progress, State},
};
use std::{
    path::{Path, PathBuf},
    time::{Duration, Instant},
};

/// Time between two checkpoints while units are short.
const BETWEEN: Duration = Duration::from_secs(1);

/// A new state, or the one to go on from, which must have been made of the same `digest`.
pub fn state(resume: Option<&Path>, digest: &str) -> Result<State, Trouble> {
    let Some(path) = resume else {
        return Ok(State::new(digest));
    };
    let name = path.display();
    let text = input::checkpoint(path).map_err(|fault| {
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

/// Keeps the state on disk and tells the terminal how far the search is.
pub struct Keeper {
    path: Option<PathBuf>,
    written: Option<Instant>,
    trouble: Option<Trouble>,
    watch: chain::Watch,
    stage: &'static str,
}

impl Keeper {
    /// Keeps it in a file, where one is given.
    pub fn new(path: Option<PathBuf>, watch: chain::Watch) -> Self {
        Self {
            path,
            written: None,
            trouble: None,
            watch,
            stage: "",
        }
    }

    /// Tells and keeps, not too often.
    pub fn note(&mut self, state: &State, progress: Progress) {
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

    /// Keeps the last state.
    pub fn last(&mut self, state: &State) {
        self.watch.tell("");
        self.keep(state);
    }

    /// What went wrong on the way.
    pub fn kept(&mut self) -> Result<(), Trouble> {
        self.trouble.take().map_or(Ok(()), Err)
    }
}
