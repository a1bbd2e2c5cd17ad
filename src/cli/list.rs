//! `list`: the catalogue by name.

use crate::{
    cli::{
        chain,
        console::{Console, Layout, Outcome, Trouble},
    },
    report::{
        card::card,
        catalogue,
        listing::{self, Item, Listing, folded},
        table::{Side, aligned},
    },
};
use clap::Args;

/// Show the catalogue: materials, finishes, threads, grades, fillers and more
#[derive(Debug, Args)]
pub struct List {
    /// Kind of record; without one the kinds are listed
    kind: Option<String>,
    /// Words that must all occur in a record
    filter: Vec<String>,
    /// Print JSON, in SI, with the source of every value
    #[arg(long)]
    json: bool,
}

impl List {
    /// Lists the kinds, one kind, or whatever answers to the words.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        let all = catalogue::listings();
        let Some(first) = self.kind.filter(|word| !word.trim().is_empty()) else {
            if self.json {
                console.json(&listing::json(&all), Layout::Indented)?;
            } else {
                console.result(&kinds(&all))?;
            }
            return Ok(Outcome::Done);
        };
        let named = |listing: &Listing| {
            let (kind, word) = (folded(listing.kind), folded(&first));
            kind == word || kind == format!("{word}s") || kind == format!("{word}es")
        };
        // A first word that is no kind is looked for in every kind.
        let (mut chosen, words): (Vec<Listing>, Vec<String>) = if all.iter().any(named) {
            (all.into_iter().filter(named).collect(), self.filter)
        } else {
            let mut words = vec![first.clone()];
            words.extend(self.filter);
            (all, words)
        };
        for each in &mut chosen {
            each.items.retain(|item| item.answers(&words));
        }
        chosen.retain(|each| !each.items.is_empty());
        if chosen.is_empty() {
            return Err(Trouble::usage(
                format!("nothing in the catalogue answers to `{}`", words.join(" ")),
                meant(&first, &words.join(" ")),
            ));
        }
        if self.json {
            console.json(&listing::json(&chosen), Layout::Indented)?;
        } else {
            let told = if let Some(record) = single(&chosen) {
                card(record)
            } else {
                let tables: Vec<String> = chosen.iter().map(listing::text).collect();
                tables.join("\n")
            };
            console.result(&told)?;
        }
        Ok(Outcome::Done)
    }
}

/// What was probably meant where nothing answers: a kind, or a record by its name.
fn meant(first: &str, words: &str) -> String {
    let all = catalogue::listings();
    let kinds: Vec<String> = all.iter().map(|each| each.kind.to_owned()).collect();
    let leads = first == words || words.starts_with(&format!("{first} "));
    if let Some(near) = chain::nearest(first, &kinds).filter(|_| leads) {
        return format!("did you mean the kind `{near}`?");
    }
    let items = all.iter().flat_map(|each| &each.items);
    let mut records: Vec<String> = items
        .filter_map(|item| item.cells.first().cloned())
        .collect();
    records.dedup();
    chain::nearest(words, &records).map_or_else(
        || format!("kinds: {}", kinds.join(", ")),
        |near| format!("did you mean `{near}`?"),
    )
}

/// The one record that is left.
fn single(chosen: &[Listing]) -> Option<&Item> {
    match chosen {
        [Listing { items, .. }] if items.len() == 1 => items.first(),
        _ => None,
    }
}

fn kinds(all: &[Listing]) -> String {
    let rows: Vec<Vec<String>> = all
        .iter()
        .map(|each| {
            let mut some: Vec<&str> = each
                .items
                .iter()
                .filter_map(|item| item.cells.first().map(String::as_str))
                .collect();
            some.dedup();
            some.truncate(4);
            vec![
                each.kind.to_owned(),
                each.items.len().to_string(),
                some.join("; "),
            ]
        })
        .collect();
    aligned(
        &[
            ("kind", Side::Left),
            ("records", Side::Right),
            ("such as", Side::Left),
        ],
        &rows,
    )
}
