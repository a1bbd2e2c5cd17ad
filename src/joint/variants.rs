//! `[[variant]]`: other versions of a joint in its own file, as overrides with a name.

use crate::{
    diagnostic::Fault,
    joint::{
        collector::{Collector, Wording, fault},
        overrides::{self, Given, Step},
        tree::{Form, Key, Node, short},
        walk::more_than,
    },
};

/// The key of the file.
pub(super) const KEY: &str = "variant";

/// Most variants of a file.
const MOST: usize = 200;

/// The key that names a variant.
const NAME: &str = "name";

/// A version of the joint.
#[derive(Clone, Debug)]
pub(super) struct Variant {
    /// What it is called.
    pub(super) name: String,
    /// What it overrides.
    entries: Vec<(Key, Node)>,
}

/// Takes the variants out of a file, each named once; what is wrong with their form is told.
pub(super) fn taken(file: &mut Node, collector: &mut Collector) -> Vec<Variant> {
    let Form::Table(entries) = &mut file.form else {
        return Vec::new();
    };
    let Some(place) = entries.iter().position(|(key, _)| key.name == KEY) else {
        return Vec::new();
    };
    let (_, node) = entries.remove(place);
    let span = node.span.clone();
    let nodes = match node.form {
        Form::List(nodes) => nodes,
        _ => vec![node],
    };
    if nodes.len() > MOST {
        collector.report(more_than(MOST, KEY, &span, nodes.len()));
        return Vec::new();
    }
    let mut found: Vec<Variant> = Vec::new();
    for node in nodes {
        match one(node, &found) {
            Ok(variant) => found.push(variant),
            Err(told) => collector.report(*told),
        }
    }
    found
}

fn one(node: Node, known: &[Variant]) -> Result<Variant, Box<Fault>> {
    let shown = node.shown();
    let span = node.span.clone();
    let Form::Table(mut entries) = node.form else {
        return Err(Box::new(
            fault(
                "file/wrong-type",
                &span,
                format!("a variant is a table, not {shown}"),
            )
            .expecting("expected a table")
            .help("head it with `[[variant]]`"),
        ));
    };
    let place = entries.iter().position(|(key, _)| key.name == NAME);
    let Some((_, name)) = place.map(|place| entries.remove(place)) else {
        return Err(Box::new(
            fault("file/missing-key", &span, "a variant has no `name`")
                .expecting("`name` is missing")
                .help("for example `name = \"eight bolts\"`"),
        ));
    };
    let text = match &name.form {
        Form::Text(text) if !text.trim().is_empty() => text.clone(),
        _ => {
            return Err(Box::new(
                fault(
                    "file/wrong-type",
                    &name.span,
                    format!("the name of a variant is {}", name.shown()),
                )
                .expecting("expected text in quotes")
                .help("for example `name = \"eight bolts\"`"),
            ));
        }
    };
    if known.iter().any(|variant| variant.name == text) {
        return Err(Box::new(
            fault(
                "file/duplicate",
                &name.span,
                format!("two variants are called `{}`", short(&text)),
            )
            .expecting("called so before")
            .help("give each a name of its own"),
        ));
    }
    if entries.is_empty() {
        return Err(Box::new(
            fault(
                "file/empty",
                &span,
                format!("variant `{}` changes nothing", short(&text)),
            )
            .expecting("expected what differs from the joint")
            .help("for example `fastener.torque.value = \"2 N·m\"`"),
        ));
    }
    Ok(Variant {
        name: text,
        entries,
    })
}

impl Variant {
    /// Puts what it overrides into the tree of the file, whose text this is.
    pub(super) fn apply(&self, (file, text): (&mut Node, &str), collector: &mut Collector) {
        for (key, node) in &self.entries {
            set((file, text), (&[], key), node, collector);
        }
    }
}

/// Sets a value under a path; dotted keys and headed tables lead on, a table in braces is a value.
fn set(
    (file, text): (&mut Node, &str),
    (before, key): (&[Step], &Key),
    node: &Node,
    collector: &mut Collector,
) {
    let own = match overrides::steps(&key.name, key.span.start) {
        // A key without quotes stands for itself; the places inside quotes are one further on.
        Ok(steps) => steps,
        Err(span) => {
            collector.report(overrides::unreadable(&span));
            return;
        }
    };
    let path: Vec<Step> = before.iter().cloned().chain(own).collect();
    let in_braces = || {
        text.get(node.span.start..)
            .is_some_and(|rest| rest.starts_with('{'))
    };
    if let Form::Table(entries) = &node.form
        && !in_braces()
    {
        for (key, node) in entries {
            set((file, text), (&path, key), node, collector);
        }
        return;
    }
    if let Err(told) = overrides::set(file, &path, Given::Read(node)) {
        collector.report(*told);
    }
}
