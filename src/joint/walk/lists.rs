//! Repeated tables, points, pairs, values per plate.

use crate::{
    diagnostic::Fault,
    joint::{
        MOST_PLACES, MOST_PLATES,
        collector::{Wording, fault},
        fields::{Measure, OTHERS, Section},
        record::{PerPlate, Point, Record},
        sections::{default_name, own_name},
        tree::{Form, Key, Node, Span},
        walk::{Stated, Walk, too_many, wrong_type},
    },
    units::Quantity,
};

/// What the coordinates of a point are.
const LENGTH: Measure = Measure::Quantity(Quantity::Length);

impl Walk<'_> {
    pub(super) fn records(
        &mut self,
        stated: Stated<'_>,
        section: &'static Section,
    ) -> Option<Vec<Record>> {
        let nodes = match &stated.node.form {
            Form::List(nodes) => nodes.as_slice(),
            Form::Table(entries) if names_tables(entries, section) => {
                self.collector.report(
                    wrong_type(stated.node, &format!("`{}`", stated.field.key), "a table")
                        .expecting(format!("expected `[[{}]]`", section.name))
                        .help(format!(
                            "head each with `[[{}]]` and put its name inside: `name = \"{}\"`",
                            section.name, entries[0].0.name
                        )),
                );
                return None;
            }
            Form::Table(_) => std::slice::from_ref(stated.node),
            // A plain value stands for the shorthand of the table.
            _ if section.shorthand.is_some() => std::slice::from_ref(stated.node),
            _ => {
                self.collector.report(
                    wrong_type(stated.node, &format!("`{}`", stated.field.key), "a table").help(
                        if stated.path == section.name {
                            format!("head it with `[[{}]]`", section.name)
                        } else {
                            format!("for example `{}`", stated.field.line())
                        },
                    ),
                );
                return None;
            }
        };
        if !self.few_enough(stated, nodes.len()) {
            return None;
        }
        let mut records = Vec::with_capacity(nodes.len());
        for (index, node) in nodes.iter().enumerate() {
            let name = own_name(node, section).or(default_name(section, (index, nodes.len())));
            let path = match name {
                Some(name) => format!("{}.{name}", stated.path),
                None if nodes.len() == 1 => stated.path.to_owned(),
                None => format!("{}[{}]", stated.path, index + 1),
            };
            if matches!(node.form, Form::Table(_)) || section.shorthand.is_some() {
                records.extend(self.record(node, section, &path));
            } else {
                self.collector
                    .report(wrong_type(node, &format!("`{}`", section.name), "a table"));
            }
        }
        (records.len() == nodes.len()).then_some(records)
    }

    /// One word, or a list of them.
    pub(super) fn choices(
        &mut self,
        stated: Stated<'_>,
        words: &[&'static str],
    ) -> Option<Vec<String>> {
        let nodes = match &stated.node.form {
            Form::List(nodes) if nodes.is_empty() => {
                self.wrong(stated);
                return None;
            }
            Form::List(nodes) => nodes.as_slice(),
            _ => std::slice::from_ref(stated.node),
        };
        if !self.few_enough(stated, nodes.len()) {
            return None;
        }
        let found: Vec<String> = nodes
            .iter()
            .filter_map(|node| self.choice(Stated { node, ..stated }, words))
            .collect();
        (found.len() == nodes.len()).then_some(found)
    }

    pub(super) fn per_plate(&mut self, stated: Stated<'_>, measure: Measure) -> Option<PerPlate> {
        match &stated.node.form {
            Form::List(nodes) if nodes.len() > 2 && nodes.len() <= MOST_PLATES => {
                let values = nodes
                    .iter()
                    .map(|node| self.single(Stated { node, ..stated }, measure));
                let values: Vec<Option<f64>> = values.collect();
                values
                    .into_iter()
                    .collect::<Option<Vec<f64>>>()
                    .map(PerPlate::Each)
            }
            Form::List(nodes) => self
                .two(stated, nodes, [measure; 2])
                .map(|two| PerPlate::Each(two.to_vec())),
            Form::Table(entries) => {
                let mut others = None;
                let mut named = Vec::with_capacity(entries.len());
                for (key, node) in entries {
                    let value = self.single(Stated { node, ..stated }, measure)?;
                    if key.name == OTHERS {
                        others = Some(value);
                    } else {
                        named.push((key.name.clone(), key.span.clone(), value));
                    }
                }
                Some(PerPlate::Named { others, named })
            }
            _ => self.single(stated, measure).map(PerPlate::Both),
        }
    }

    pub(super) fn names(&mut self, stated: Stated<'_>) -> Option<[(String, Span); 2]> {
        let Form::List(nodes) = &stated.node.form else {
            self.wrong(stated);
            return None;
        };
        let [first, second] = nodes.as_slice() else {
            self.collector.report(not_two(stated, nodes.len()));
            return None;
        };
        let mut name = |node: &Node| {
            let text = self.text(Stated { node, ..stated });
            text.map(|text| (text, node.span.clone()))
        };
        let (first, second) = (name(first), name(second));
        Some([first?, second?])
    }

    pub(super) fn point(&mut self, stated: Stated<'_>) -> Option<Point> {
        if let Form::List(nodes) = &stated.node.form {
            self.two(stated, nodes, [LENGTH; 2])
        } else {
            self.wrong(stated);
            None
        }
    }

    pub(super) fn points(&mut self, stated: Stated<'_>) -> Option<Vec<(Point, Span)>> {
        // A single place may stand without its outer brackets.
        if let Form::List(nodes) = &stated.node.form
            && let [first, _] = nodes.as_slice()
            && matches!(first.form, Form::Text(_))
        {
            let point = self.two(stated, nodes, [LENGTH; 2])?;
            return Some(vec![(point, stated.node.span.clone())]);
        }
        self.pairs(stated, [LENGTH; 2])
    }

    pub(super) fn pairs(
        &mut self,
        stated: Stated<'_>,
        measures: [Measure; 2],
    ) -> Option<Vec<(Point, Span)>> {
        let Form::List(nodes) = &stated.node.form else {
            self.wrong(stated);
            return None;
        };
        if !self.few_enough(stated, nodes.len()) {
            return None;
        }
        let mut pairs = Vec::with_capacity(nodes.len());
        for node in nodes {
            let item = Stated { node, ..stated };
            if let Form::List(parts) = &node.form {
                pairs.extend(
                    self.two(item, parts, measures)
                        .map(|pair| (pair, node.span.clone())),
                );
            } else {
                self.wrong(item);
            }
        }
        (pairs.len() == nodes.len()).then_some(pairs)
    }

    fn two(&mut self, stated: Stated<'_>, nodes: &[Node], measures: [Measure; 2]) -> Option<Point> {
        let [first, second] = nodes else {
            self.collector.report(not_two(stated, nodes.len()));
            return None;
        };
        let first = self.single(
            Stated {
                node: first,
                ..stated
            },
            measures[0],
        );
        let second = self.single(
            Stated {
                node: second,
                ..stated
            },
            measures[1],
        );
        Some([first?, second?])
    }

    fn few_enough(&mut self, stated: Stated<'_>, count: usize) -> bool {
        if count > MOST_PLACES {
            self.collector
                .report(too_many(stated.field.key, &stated.node.span, count));
        }
        count <= MOST_PLACES
    }
}

/// A list of another length than two.
fn not_two(stated: Stated<'_>, count: usize) -> Fault {
    fault(
        "file/wrong-type",
        &stated.node.span,
        format!(
            "`{}` has {count} values here; it takes two",
            stated.field.key
        ),
    )
    .expecting("two values")
    .help(format!("for example `{}`", stated.field.line()))
}

/// Whether a table holds only tables under names of their own: `[plate.upper]`.
fn names_tables(entries: &[(Key, Node)], section: &Section) -> bool {
    !entries.is_empty()
        && entries.iter().all(|(key, node)| {
            section.field(&key.name).is_none() && matches!(node.form, Form::Table(_))
        })
}
