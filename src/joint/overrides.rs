//! `--set plate.upper.thickness="6 mm"`: values that override the file, in the tree, before it is read.

use toml::de::DeValue;

use crate::{
    diagnostic::{self, Fault},
    joint::{
        collector::{Collector, Wording, fault},
        fields::{Kind, OTHERS, SPREAD_KEYS, Section, listed},
        sections::{FILE, PLATE, default_name, own_name},
        tree::{Form, Key, Node, Span, short},
    },
};

/// Applies one override, whose text starts `shift` bytes into the joined text.
pub(super) fn apply(tree: &mut Node, text: &str, shift: usize, collector: &mut Collector) {
    let whole = shift..shift + text.len();
    let Some(equals) = equals(text) else {
        collector.report(
            fault(CODE, &whole, "an override has a path, `=` and a value")
                .expecting("expected `path = value`")
                .help(EXAMPLE),
        );
        return;
    };
    let steps = match steps(&text[..equals], shift) {
        Ok(steps) => steps,
        Err(span) => {
            collector.report(unreadable(&span));
            return;
        }
    };
    let written = &text[equals + 1..];
    let start = shift + equals + 1 + (written.len() - written.trim_start().len());
    let value = Given::Written {
        text: written.trim(),
        start,
    };
    if let Err(told) = set(tree, &steps, value) {
        collector.report(*told);
    }
}

/// Sets a field of the file by its path.
pub(super) fn set(file: &mut Node, path: &[Step], value: Given<'_>) -> Told {
    let plates = plate_names(file);
    let setting = Setting {
        value,
        plates: &plates,
    };
    set_in(file, &FILE, path, setting)
}

/// Names of the plates, in order.
fn plate_names(file: &Node) -> Vec<String> {
    let Some(node) = file.child(PLATE.name) else {
        return Vec::new();
    };
    let nodes = match &node.form {
        Form::List(nodes) => nodes.as_slice(),
        _ => std::slice::from_ref(node),
    };
    let place = |(place, node)| {
        let name = own_name(node, &PLATE).or_else(|| default_name(&PLATE, (place, nodes.len())));
        name.unwrap_or_default().to_owned()
    };
    nodes.iter().enumerate().map(place).collect()
}

/// A path that cannot be read.
pub(super) fn unreadable(span: &Span) -> Fault {
    fault(CODE, span, "this path cannot be read")
        .expecting("expected keys joined by dots")
        .help(EXAMPLE)
}

const CODE: &str = "set/bad-override";
const EXAMPLE: &str = "for example `--set plate.upper.thickness=\"6 mm\"`";

/// Keys of one table of which only one group may stand.
const EXCLUSIVE: [&[&[&str]]; 12] = [
    &[&["torque"], &["preload"]],
    &[&["method"], &["scatter"]],
    &[&["at"], &["pattern"]],
    &[&["size"], &["diameter"], &["outline"]],
    &[&["flux"], &["curvature"], &["bimetal"]],
    &[&["bow"], &["flatness_map"]],
    &[&["film"], &["face"], &["edge"], &["radiation"]],
    &[&["class"], &["thread", "head"], &["nut_factor"]],
    &[&["rise"], &["resistance"], &["conductance"]],
    &[&["sink"], &["hot", "cold"]],
    &[&["points"], &["law"]],
    &[&["force", "force_exponent"], &["torque", "torque_exponent"]],
];

/// Whether stating one key excludes another of the same table.
fn excludes(key: &str, other: &str) -> bool {
    EXCLUSIVE.iter().any(|groups| {
        let group_of = |name: &str| groups.iter().position(|group| group.contains(&name));
        matches!((group_of(key), group_of(other)), (Some(one), Some(two)) if one != two)
    })
}

/// A step of a path.
#[derive(Clone, Debug)]
pub(super) struct Step {
    span: Span,
    name: String,
    /// `[2]` is 2: counted from one.
    index: Option<usize>,
}

/// The value.
#[derive(Clone, Copy, Debug)]
pub(super) enum Given<'t> {
    /// As written on the command line, from a place on.
    Written {
        /// What is written.
        text: &'t str,
        /// The byte it starts at.
        start: usize,
    },
    /// As read from the file.
    Read(&'t Node),
}

impl Given<'_> {
    /// The value as TOML, or as text when it is bare text such as `6 mm`; a field that takes
    /// text takes a bare number as text too, so that `grade=8.8` is a grade.
    fn node(self, kind: Kind) -> Node {
        let (text, start) = match self {
            Self::Written { text, start } => (text, start),
            Self::Read(node) => return node.clone(),
        };
        let as_text = || Node {
            span: start..start + text.len(),
            form: Form::Text(text.to_owned()),
        };
        match DeValue::parse(text) {
            Ok(value) => {
                let node = Node::value(&value, start);
                let wants_text = matches!(
                    kind,
                    Kind::Text | Kind::Name(_) | Kind::Choice(_) | Kind::Choices(_)
                );
                if wants_text && matches!(node.form, Form::Number(..) | Form::Flag(_)) {
                    as_text()
                } else {
                    node
                }
            }
            Err(_) => as_text(),
        }
    }
}

/// A value, and what it may need of the rest of the file.
#[derive(Clone, Copy, Debug)]
struct Setting<'t> {
    value: Given<'t>,
    /// Names of the plates, in order.
    plates: &'t [String],
}

pub(super) type Told = Result<(), Box<Fault>>;

fn bad(step: &Step, message: impl Into<String>) -> Fault {
    fault(CODE, &step.span, message)
}

/// Paths that would be taken to fields of such a name in the tables below: `fastener.torque` for `torque`,
/// `plate.base.thickness` for `thickness`.
fn deeper(name: &str, node: &Node, section: &Section) -> Vec<String> {
    let mut paths = Vec::new();
    for field in section.fields {
        let (Kind::Table(inner) | Kind::List(inner)) = field.kind else {
            continue;
        };
        let Some(key) = diagnostic::nearest(name, inner.keys()) else {
            continue;
        };
        let table = field.key;
        let elements = match (field.kind, node.child(table)) {
            (Kind::List(_), None) => &[],
            (
                Kind::List(_),
                Some(Node {
                    form: Form::List(elements),
                    ..
                }),
            ) => elements.as_slice(),
            (Kind::List(_), Some(only)) => std::slice::from_ref(only),
            _ => {
                paths.push(format!("{table}.{key}"));
                continue;
            }
        };
        for (place, element) in elements.iter().enumerate() {
            let default = default_name(inner, (place, elements.len()));
            match own_name(element, inner).or(default) {
                Some(name) => paths.push(format!("{table}.{name}.{key}")),
                None if elements.len() == 1 => paths.push(format!("{table}.{key}")),
                None => {}
            }
        }
    }
    paths
}

fn set_in(
    node: &mut Node,
    section: &'static Section,
    steps: &[Step],
    setting: Setting<'_>,
) -> Told {
    let Setting { value, plates } = setting;
    let Some((step, rest)) = steps.split_first() else {
        return Ok(());
    };
    let Some(field) = section.field(&step.name) else {
        let told = bad(
            step,
            format!("there is no field `{}` here", short(&step.name)),
        )
        .expecting("not a key of this table");
        let mut told = told.nearest(&step.name, section.keys());
        if told.help.is_none() {
            let deeper = deeper(&step.name, node, section);
            told = told.meaning(&deeper.iter().map(String::as_str).collect::<Vec<_>>());
        }
        return Err(Box::new(if told.help.is_some() {
            told
        } else {
            told.help(format!(
                "known are {}",
                listed(&section.keys().collect::<Vec<_>>())
            ))
        }));
    };
    if step.index.is_some() && !matches!(field.kind, Kind::List(_)) {
        return Err(Box::new(
            bad(step, format!("`{}` is not a list of tables", field.key))
                .expecting("expected without `[ ]`"),
        ));
    }
    match (field.kind, rest) {
        (Kind::Variants, _) => Err(Box::new(
            bad(step, "a variant cannot be overridden")
                .expecting("expected a field of the joint")
                .help(EXAMPLE),
        )),
        // A table that may be named in one word: a filler.
        (Kind::List(inner), []) if inner.shorthand.is_some() => {
            *slot(node, section, step)? = value.node(Kind::Table(inner));
            Ok(())
        }
        // Zones and openings are short: one or all of them may be set as a whole.
        (Kind::List(_), []) if !is_file(section) => {
            let list = slot(node, section, step)?;
            let place = match step.index {
                Some(_) => numbered(list, step)?,
                None => list,
            };
            *place = value.node(field.kind);
            Ok(())
        }
        (Kind::List(inner), rest) => {
            let list = slot(node, section, step)?;
            if !is_file(section) && is_empty(list) {
                list.form = Form::Table(Vec::new());
            }
            let (element, rest) = element(list, inner, step, rest)?;
            if rest.is_empty() {
                return Err(Box::new(
                    bad(step, format!("`{}` is a whole table", step.name))
                        .expecting("expected a path to one of its fields")
                        .help(EXAMPLE),
                ));
            }
            set_in(element, inner, rest, setting)
        }
        (kind, []) => {
            *slot(node, section, step)? = value.node(kind);
            Ok(())
        }
        (Kind::Table(inner), rest) => set_in(slot(node, section, step)?, inner, rest, setting),
        (Kind::Spread(_) | Kind::SpreadOr(_), [last])
            if SPREAD_KEYS.contains(&last.name.as_str()) =>
        {
            let spread = slot(node, section, step)?;
            open_spread(spread);
            put(spread, last, value.node(Kind::Number))
        }
        (Kind::PerPlate(_), [plate]) => {
            let values = slot(node, section, step)?;
            open_plates(values, plates).map_err(|expected| {
                Box::new(
                    bad(step, format!("`{}` is a list in the file", field.key)).expecting(expected),
                )
            })?;
            put(values, plate, value.node(Kind::Number))
        }
        (_, [next, ..]) => Err(Box::new(
            bad(next, format!("`{}` has no parts", field.key))
                .expecting(format!("expected to end at `{}`", field.key)),
        )),
    }
}

/// The value under a key, made when it is absent; a plain value in place of a table is opened
/// into that table first, so that `torque = "2 N·m"` can be given a tolerance.
fn slot<'n>(
    node: &'n mut Node,
    section: &Section,
    step: &Step,
) -> Result<&'n mut Node, Box<Fault>> {
    if !matches!(node.form, Form::Table(_)) {
        let old = node.clone();
        let entry = section.shorthand.filter(|_| !is_empty(&old)).map(|key| {
            let name = Key {
                span: old.span.clone(),
                name: key.to_owned(),
            };
            (name, old)
        });
        node.form = Form::Table(entry.into_iter().collect());
    }
    child(node, step)
}

fn is_empty(node: &Node) -> bool {
    matches!(&node.form, Form::List(nodes) if nodes.is_empty())
}

/// The child of a table under a key, made when it is absent.
fn child<'n>(node: &'n mut Node, step: &Step) -> Result<&'n mut Node, Box<Fault>> {
    let absent = Node {
        span: step.span.clone(),
        form: Form::List(Vec::new()),
    };
    if !matches!(node.form, Form::Table(_)) {
        node.form = Form::Table(Vec::new());
    }
    let Form::Table(entries) = &mut node.form else {
        let told = bad(step, "this is not a table in the file").expecting("expected a table");
        return Err(Box::new(told));
    };
    // A new key takes the place of what it excludes: a torque that of a preload.
    if !entries.iter().any(|(key, _)| key.name == step.name) {
        entries.retain(|(key, _)| !excludes(&step.name, &key.name));
    }
    let place = entries
        .iter()
        .position(|(key, _)| key.name == step.name)
        .unwrap_or_else(|| {
            let name = Key {
                span: step.span.clone(),
                name: step.name.clone(),
            };
            entries.push((name, absent));
            entries.len() - 1
        });
    Ok(&mut entries[place].1)
}

fn put(node: &mut Node, step: &Step, value: Node) -> Told {
    *child(node, step)? = value;
    Ok(())
}

/// Turns a single value or a list of a spread into its table form.
fn open_spread(node: &mut Node) {
    let old = std::mem::replace(&mut node.form, Form::Table(Vec::new()));
    let (keys, values): (&[&str], Vec<Node>) = match old {
        Form::Table(_) => {
            node.form = old;
            return;
        }
        Form::List(values) if values.len() == 2 => (&["low", "high"], values),
        Form::List(values) => (&SPREAD_KEYS, values),
        form => (
            &["nominal"],
            vec![Node {
                span: node.span.clone(),
                form,
            }],
        ),
    };
    let entries = keys.iter().zip(values).map(|(key, value)| {
        let name = Key {
            span: value.span.clone(),
            name: (*key).to_owned(),
        };
        (name, value)
    });
    node.form = Form::Table(entries.collect());
}

/// Turns what is stated for all plates, or as a list, into a table by their names, so that one of them
/// can be given another value.
fn open_plates(values: &mut Node, plates: &[String]) -> Result<(), String> {
    let names: Vec<String> = match &values.form {
        Form::Table(_) => return Ok(()),
        Form::List(nodes) if nodes.is_empty() => Vec::new(),
        Form::List(nodes) if nodes.len() == plates.len() => plates.to_vec(),
        Form::List(nodes) => {
            return Err(format!(
                "expected a value for each of {} plates, found {}",
                plates.len(),
                nodes.len()
            ));
        }
        _ => vec![OTHERS.to_owned()],
    };
    let old = std::mem::replace(&mut values.form, Form::Table(Vec::new()));
    let nodes = match old {
        Form::List(nodes) => nodes,
        form => vec![Node {
            span: values.span.clone(),
            form,
        }],
    };
    let entries = names.into_iter().zip(nodes).map(|(name, node)| {
        let key = Key {
            span: node.span.clone(),
            name,
        };
        (key, node)
    });
    values.form = Form::Table(entries.collect());
    Ok(())
}

/// Whether this is the file itself, whose lists of tables are no short values.
fn is_file(section: &Section) -> bool {
    section.name == FILE.name
}

/// A table by its number, `[2]`; a table that stands alone is the first.
fn numbered<'n>(list: &'n mut Node, step: &Step) -> Result<&'n mut Node, Box<Fault>> {
    if let Form::Table(_) = list.form {
        let only = list.clone();
        list.form = Form::List(vec![only]);
    }
    let Form::List(nodes) = &mut list.form else {
        return Err(Box::new(bad(
            step,
            format!("`{}` is not a table in the file", step.name),
        )));
    };
    let count = nodes.len();
    let index = step.index.unwrap_or(1);
    nodes.get_mut(index.wrapping_sub(1)).ok_or_else(|| {
        Box::new(
            bad(step, format!("the file has no `{}[{index}]`", step.name))
                .expecting(format!("expected from 1 to {count}")),
        )
    })
}

/// The table of a list that a path names: `plate.upper`, `fastener[2]`, or the only one.
fn element<'n, 's>(
    list: &'n mut Node,
    section: &Section,
    step: &Step,
    rest: &'s [Step],
) -> Result<(&'n mut Node, &'s [Step]), Box<Fault>> {
    let made = section.shorthand.is_some()
        && !matches!(&list.form, Form::List(nodes) if !nodes.is_empty());
    if made || matches!(list.form, Form::Table(_)) {
        // A table that may stand alone is made when it is absent, and opened when it is a plain value.
        let only = list.clone();
        list.form = Form::List(vec![only]);
    }
    if step.index.is_some() {
        return Ok((numbered(list, step)?, rest));
    }
    let Form::List(nodes) = &mut list.form else {
        return Err(Box::new(bad(
            step,
            format!("`{}` is not a table in the file", step.name),
        )));
    };
    let count = nodes.len();
    let names: Vec<String> = nodes
        .iter()
        .enumerate()
        .filter_map(|(place, node)| {
            let default = default_name(section, (place, count));
            own_name(node, section).or(default).map(str::to_owned)
        })
        .collect();
    if let Some((name, after)) = rest.split_first()
        && let Some(place) = names.iter().position(|known| *known == name.name)
        && names.len() == count
    {
        return Ok((&mut nodes[place], after));
    }
    if count == 1 && names.is_empty() {
        return Ok((&mut nodes[0], rest));
    }
    let at = rest.first().unwrap_or(step);
    let told = bad(
        at,
        format!("no `{}` is called `{}`", step.name, short(&at.name)),
    );
    Err(Box::new(if names.is_empty() {
        bad(step, format!("the file has {count} tables `{}`", step.name))
            .expecting(format!("expected `{}[1]`, counted from one", step.name))
    } else {
        let known: Vec<&str> = names.iter().map(String::as_str).collect();
        let told = told.expecting(format!("expected {}", listed(&known)));
        match diagnostic::nearest(&at.name, known.into_iter()) {
            Some(near) => told.help(format!("did you mean `{near}`?")),
            None => told,
        }
    }))
}

/// Place of the `=` between path and value, outside quotes.
fn equals(text: &str) -> Option<usize> {
    let mut quoted = false;
    text.char_indices().find_map(|(at, letter)| {
        if letter == '"' {
            quoted = !quoted;
        }
        (letter == '=' && !quoted).then_some(at)
    })
}

/// The steps of a path: keys joined by dots, in quotes where a name has a dot, with `[n]`.
pub(super) fn steps(path: &str, shift: usize) -> Result<Vec<Step>, Span> {
    let mut steps = Vec::new();
    let mut start = 0;
    let mut quoted = false;
    let ends = path.char_indices().filter(|(_, letter)| {
        if *letter == '"' {
            quoted = !quoted;
        }
        *letter == '.' && !quoted
    });
    let ends: Vec<usize> = ends.map(|(at, _)| at).chain([path.len()]).collect();
    for end in ends {
        let part = &path[start..end];
        let offset = shift + start + (part.len() - part.trim_start().len());
        let part = part.trim();
        let span = offset..offset + part.len();
        let (name, index) = match part
            .strip_suffix(']')
            .and_then(|part| part.rsplit_once('['))
        {
            Some((name, index)) => match index.trim().parse() {
                Ok(index) => (name, Some(index)),
                Err(_) => return Err(span),
            },
            None => (part, None),
        };
        let name = name.trim().trim_matches('"').to_owned();
        if name.is_empty() {
            return Err(span.start..span.end.max(span.start + 1));
        }
        steps.push(Step { span, name, index });
        start = end + 1;
    }
    Ok(steps)
}
