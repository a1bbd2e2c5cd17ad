//! What a joint file states, value by value, and who stated it.

use toml::de::DeTable;

use crate::joint::{
    collector::Collector,
    overrides,
    tree::{Form, Node},
    variants,
};

/// Who stated a value.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum By {
    /// The joint file.
    File,
    /// An override, or the variant that was taken.
    Override,
}

/// One stated value.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Stated {
    /// Its path, as `--set` takes it: `plate.base.thickness`.
    pub path: String,
    /// The value as written, quotes left out.
    pub value: String,
    /// Who stated it.
    pub by: By,
}

/// Every value of a joint file in file order, with overrides and one of its variants, counted from 0.
///
/// Only a file that was read without a fault is told in full.
pub fn stated(text: &str, (sets, variant): (&[String], Option<usize>)) -> Vec<Stated> {
    let (table, _) = DeTable::parse_recoverable(text);
    let mut collector = Collector::default();
    let mut tree = Node::file(&table);
    let variants = variants::taken(&mut tree, &mut collector);
    let before = rows(&tree);
    if let Some(variant) = variant.and_then(|variant| variants.get(variant)) {
        variant.apply((&mut tree, text), &mut collector);
    }
    let mut start = text.len() + 1;
    for set in sets {
        overrides::apply(&mut tree, set, start, &mut collector);
        start += set.len() + 1;
    }
    let by = |row: &(String, String)| {
        if before.contains(row) {
            By::File
        } else {
            By::Override
        }
    };
    rows(&tree)
        .into_iter()
        .map(|row| Stated {
            by: by(&row),
            path: row.0,
            value: row.1,
        })
        .collect()
}

fn rows(tree: &Node) -> Vec<(String, String)> {
    let mut found = Vec::new();
    gather(tree, "", &mut found);
    found
}

/// Adds a value, or all values of a table or of a list of tables, under their paths.
fn gather(node: &Node, path: &str, found: &mut Vec<(String, String)>) {
    match &node.form {
        Form::Table(entries) => {
            for (key, node) in entries {
                let under = if path.is_empty() {
                    key.name.clone()
                } else {
                    format!("{path}.{}", key.name)
                };
                gather(node, &under, found);
            }
        }
        Form::List(items) if items.iter().any(|item| matches!(item.form, Form::Table(_))) => {
            for (index, item) in items.iter().enumerate() {
                let under = match item.text_of("name") {
                    Some(name) => format!("{path}.{name}"),
                    None if items.len() == 1 => path.to_owned(),
                    None => format!("{path}[{}]", index + 1),
                };
                gather(item, &under, found);
            }
        }
        _ => found.push((path.to_owned(), written(node))),
    }
}

/// A value as it is written, quotes left out.
fn written(node: &Node) -> String {
    match &node.form {
        Form::Text(text) | Form::Number(text, _) => text.clone(),
        Form::Flag(flag) => flag.to_string(),
        Form::Date => String::new(),
        Form::List(items) => {
            let nested = items
                .iter()
                .any(|item| matches!(item.form, Form::List(_) | Form::Table(_)));
            let items: Vec<String> = items.iter().map(written).collect();
            if nested {
                items.join("; ")
            } else {
                items.join(", ")
            }
        }
        Form::Table(entries) => {
            let entries = entries.iter();
            let shown = entries.map(|(key, node)| format!("{} {}", key.name, written(node)));
            shown.collect::<Vec<String>>().join(", ")
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const FILE: &str = "\
title = \"a\"
[[plate]]
name = \"base\"
thickness = \"5 mm\"
size = [\"1 mm\", \"2 mm\"]
[[plate]]
name = \"panel\"
thickness = \"4 mm\"
[fastener]
at = [[\"1 mm\", \"2 mm\"], [\"3 mm\", \"4 mm\"]]
[[variant]]
name = \"thick\"
plate.base.thickness = \"9 mm\"
";

    fn told(sets: &[String], variant: Option<usize>) -> Vec<(String, String, By)> {
        let all = stated(FILE, (sets, variant)).into_iter();
        all.map(|each| (each.path, each.value, each.by)).collect()
    }

    fn row(path: &str, value: &str, by: By) -> (String, String, By) {
        (path.to_owned(), value.to_owned(), by)
    }

    #[test]
    fn values_stand_under_their_paths_as_written() {
        let all = told(&[], None);
        assert!(all.contains(&row("plate.base.size", "1 mm, 2 mm", By::File)));
        assert!(all.contains(&row("plate.panel.thickness", "4 mm", By::File)));
        assert!(all.contains(&row("fastener.at", "1 mm, 2 mm; 3 mm, 4 mm", By::File)));
        assert!(!all.iter().any(|(path, _, _)| path.starts_with("variant")));
    }

    #[test]
    fn overrides_and_variants_are_told_as_such() {
        let set = ["plate.panel.thickness=\"6 mm\"".to_owned()];
        let all = told(&set, Some(0));
        assert!(all.contains(&row("plate.panel.thickness", "6 mm", By::Override)));
        assert!(all.contains(&row("plate.base.thickness", "9 mm", By::Override)));
        assert!(all.contains(&row("plate.base.size", "1 mm, 2 mm", By::File)));
    }
}
