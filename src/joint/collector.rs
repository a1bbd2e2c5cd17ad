//! Gathers every fault and every assumption of one reading.

use crate::{
    diagnostic::{self, Assumption, Fault},
    joint::{fields::listed, tree::Span},
};

/// So many faults are told; a file with more is not being read by anyone.
pub(super) const MOST_FAULTS: usize = 200;

/// Most names that one fault suggests, unless they are a family of the catalogue.
const MOST_SUGGESTED: usize = 3;

/// What one reading found.
#[derive(Debug, Default)]
pub(super) struct Collector {
    faults: Vec<Fault>,
    assumptions: Vec<Assumption>,
}

impl Collector {
    /// Notes a fault.
    pub(super) fn report(&mut self, fault: Fault) {
        if self.faults.len() < MOST_FAULTS {
            self.faults.push(fault);
        }
    }

    /// Notes a fault unless the condition holds; a comparison with `NaN` does not hold.
    pub(super) fn require(&mut self, holds: bool, fault: impl FnOnce() -> Fault) {
        if !holds {
            self.report(fault());
        }
    }

    /// Notes a value that the file did not state.
    pub(super) fn assume(
        &mut self,
        field: impl Into<String>,
        value: impl Into<String>,
        why: impl Into<String>,
    ) {
        let field = field.into();
        // The values of a range are read one after the other; what is assumed for all is told once.
        if self
            .assumptions
            .last()
            .is_some_and(|last| last.field == field)
        {
            return;
        }
        self.assumptions.push(Assumption {
            field,
            value: value.into(),
            why: why.into(),
        });
    }

    /// Number of faults so far.
    pub(super) fn count(&self) -> usize {
        self.faults.len()
    }

    /// Whether so many faults were found that looking for more is no use.
    pub(super) fn is_full(&self) -> bool {
        self.faults.len() >= MOST_FAULTS
    }

    /// Faults in file order, and assumptions in the order of reading.
    pub(super) fn into_parts(mut self) -> (Vec<Fault>, Vec<Assumption>) {
        self.faults.sort_by_key(|fault| fault.span.start);
        (self.faults, self.assumptions)
    }
}

/// A fault at a place; `expecting` and `help` complete it.
pub(super) fn fault(code: &'static str, span: &Span, message: impl Into<String>) -> Fault {
    Fault {
        code,
        message: message.into(),
        span: span.clone(),
        expected: String::new(),
        help: None,
    }
}

/// Completes a fault.
pub(super) trait Wording {
    /// The short label beside the underlined place.
    fn expecting(self, label: impl Into<String>) -> Self;
    /// How to mend it.
    fn help(self, help: impl Into<String>) -> Self;
    /// The nearest known name, or those that hold it.
    fn nearest<'a>(self, name: &str, known: impl Iterator<Item = &'a str>) -> Self;
    /// The names that were probably meant, if any.
    fn meaning(self, names: &[&str]) -> Self;
}

impl Wording for Fault {
    fn expecting(mut self, label: impl Into<String>) -> Self {
        self.expected = label.into();
        self
    }

    fn help(mut self, help: impl Into<String>) -> Self {
        self.help = Some(help.into());
        self
    }

    fn nearest<'a>(self, name: &str, known: impl Iterator<Item = &'a str>) -> Self {
        let known: Vec<&str> = known.collect();
        match diagnostic::nearest(name, known.iter().copied()) {
            Some(near) => self.meaning(&[&near]),
            None => self.meaning(&holding(name, known.into_iter())),
        }
    }

    fn meaning(mut self, names: &[&str]) -> Self {
        if !names.is_empty() {
            let help = format!("did you mean {}?", listed(names));
            self.help = Some(match self.help {
                Some(more) => format!("{help} {more}"),
                None => help,
            });
        }
        self
    }
}

/// Known names that hold the whole of a short one, each once: `brass` means one of several.
fn holding<'a>(name: &str, known: impl Iterator<Item = &'a str>) -> Vec<&'a str> {
    let name = name.trim().to_lowercase();
    let mut found = Vec::new();
    if name.chars().count() < 3 {
        return found;
    }
    for known in known.filter(|known| known.to_lowercase().contains(&name)) {
        if found.len() < MOST_SUGGESTED && !found.contains(&known) {
            found.push(known);
        }
    }
    found
}
