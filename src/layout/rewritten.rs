//! The joint file with its first fastener group elsewhere; all else, comments included, stays.

use std::fmt::Write;

use toml_edit::{Array, DocumentMut, Item, RawString, TableLike, Value};

use crate::layout::Failure;

/// Another first fastener group: which of `arrange.sizes` it takes, and where it stands.
#[derive(Clone, Copy, Debug)]
pub struct Fasten<'a> {
    /// Place in `arrange.sizes`; none for the fastener as stated.
    pub size: Option<usize>,
    /// Places, m.
    pub places: &'a [[f64; 2]],
}

/// A coordinate as the file states it, in whole micrometres: `12.345 mm`.
fn shown(metres: f64) -> String {
    let text = format!("{:.3}", metres * 1e3);
    let text = text.trim_end_matches('0').trim_end_matches('.');
    format!("{} mm", if text == "-0" { "0" } else { text })
}

/// The text of a joint file with another first fastener group.
pub fn rewritten(text: &str, fasten: Fasten) -> Result<String, Failure> {
    let mut document = document(text)?;
    let stated = match fasten.size {
        Some(index) => stated(document.get("arrange"), index)
            .ok_or_else(|| unreadable("arrange.sizes is not a list of tables"))?,
        None => Vec::new(),
    };
    let group = group_mut(&mut document, 0)?;
    for (key, value) in stated {
        replace(group, &key, value);
    }
    stand(group, fasten.places);
    Ok(document.to_string())
}

/// The text of a joint file with a group at other places.
pub(super) fn placed(text: &str, group: usize, at: &[[f64; 2]]) -> Result<String, Failure> {
    let mut document = document(text)?;
    stand(group_mut(&mut document, group)?, at);
    Ok(document.to_string())
}

/// The text of a joint file with a group of another thread, whose hole and seat are those of the size.
pub(super) fn threaded(text: &str, group: usize, thread: &str) -> Result<String, Failure> {
    let mut document = document(text)?;
    let group = group_mut(&mut document, group)?;
    replace(group, "thread", thread.into());
    group.remove("hole");
    if group.contains_key("head") {
        group.remove("bearing");
    }
    Ok(document.to_string())
}

fn unreadable(what: &str) -> Failure {
    Failure::Rewriting(what.to_owned())
}

fn document(text: &str) -> Result<DocumentMut, Failure> {
    text.parse()
        .map_err(|fault: toml_edit::TomlError| unreadable(fault.message()))
}

/// A fastener group, counted from 0.
fn group_mut(document: &mut DocumentMut, index: usize) -> Result<&mut dyn TableLike, Failure> {
    document
        .get_mut("fastener")
        .and_then(|item| nth_mut(item, index))
        .ok_or_else(|| unreadable("there is no table of it"))
}

/// Puts a group where it shall stand.
fn stand(group: &mut dyn TableLike, at: &[[f64; 2]]) {
    group.remove("pattern");
    group.remove("count");
    replace(group, "at", Value::Array(places(at)));
}

/// What the size of some number states.
fn stated(arrange: Option<&Item>, index: usize) -> Option<Vec<(String, Value)>> {
    let sizes = arrange?.as_table_like()?.get("sizes")?;
    let table: &dyn TableLike = match sizes {
        Item::ArrayOfTables(tables) => tables.get(index)?,
        Item::Value(Value::Array(tables)) => tables.get(index)?.as_inline_table()?,
        one => one.as_table_like().filter(|_| index == 0)?,
    };
    let entries = table.iter().map(|(key, item)| {
        let mut value = item.clone().into_value().ok()?;
        value.decor_mut().clear();
        Some((key.to_owned(), value))
    });
    entries.collect()
}

fn nth_mut(item: &mut Item, index: usize) -> Option<&mut dyn TableLike> {
    match item {
        Item::ArrayOfTables(tables) => tables
            .get_mut(index)
            .map(|table| table as &mut dyn TableLike),
        Item::Value(Value::Array(tables)) => tables
            .get_mut(index)?
            .as_inline_table_mut()
            .map(|table| table as &mut dyn TableLike),
        one => one.as_table_like_mut().filter(|_| index == 0),
    }
}

/// Sets a value and keeps what stands around the one before it, such as a comment behind it.
fn replace(table: &mut dyn TableLike, key: &str, mut value: Value) {
    if let Some(before) = table.get(key).and_then(Item::as_value) {
        *value.decor_mut() = before.decor().clone();
    }
    table.insert(key, Item::Value(value));
}

fn places(places: &[[f64; 2]]) -> Array {
    let mut list: Array = places
        .iter()
        .map(|place| Value::Array(place.iter().map(|at| shown(*at)).collect()))
        .collect();
    // Four places to a line read well.
    for (index, place) in list.iter_mut().enumerate() {
        let mut before = String::new();
        let _ = write!(before, "{}", if index % 4 == 0 { "\n  " } else { " " });
        place.decor_mut().set_prefix(RawString::from(before));
    }
    list.set_trailing_comma(true);
    list.set_trailing("\n");
    list
}

#[cfg(test)]
mod tests {
    use super::*;

    const TEXT: &str = "\
# Asked of the box.
title = \"box\" # short

[[fastener]] # the four of the corners
thread = \"M5\" # as in stock
torque = { value = \"2 N·m\" }
pattern = { kind = \"grid\", count = [2, 2], margin = \"7 mm\" }
count = 4

[[fastener]]
at = [[\"1 mm\", \"1 mm\"]]

[arrange]
sizes = [{ thread = \"M4\", torque = \"1 N·m\" }, { thread = \"M6\" }]
";

    #[test]
    fn all_but_the_group_stays_and_comments_with_it() {
        let text = rewritten(
            TEXT,
            Fasten {
                size: Some(0),
                places: &[[0.01, 0.0123456], [-1e-9, 0.02]],
            },
        )
        .unwrap();
        let expected = TEXT
            .replace("thread = \"M5\"", "thread = \"M4\"")
            .replace("{ value = \"2 N·m\" }", "\"1 N·m\"")
            .replace(
                "pattern = { kind = \"grid\", count = [2, 2], margin = \"7 mm\" }\ncount = 4\n",
                "at = [\n  [\"10 mm\", \"12.346 mm\"], [\"0 mm\", \"20 mm\"],\n]\n",
            );
        assert_eq!(text, expected);
    }

    #[test]
    fn a_plain_fastener_is_rewritten_where_it_stands() {
        let text = "[fastener]\nat = [[\"1 mm\", \"2 mm\"]] # here\nthread = \"M5\"\n";
        let fasten = Fasten {
            size: None,
            places: &[[0.003, 0.004]],
        };
        assert_eq!(
            rewritten(text, fasten).unwrap(),
            "[fastener]\nat = [\n  [\"3 mm\", \"4 mm\"],\n] # here\nthread = \"M5\"\n"
        );
        let fasten = Fasten {
            size: Some(0),
            places: &[[0.003, 0.004]],
        };
        assert!(rewritten(text, fasten).is_err());
        assert!(
            rewritten(
                "[x]\n",
                Fasten {
                    size: None,
                    places: &[]
                }
            )
            .is_err()
        );
    }
}
