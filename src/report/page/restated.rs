//! A page in another system of units: tables by their columns, sentences by the units in them.

use crate::{
    report::{
        number::four,
        page::{
            Page,
            table::{Column, Table},
        },
    },
    units::{Shown, System},
};

/// Units of columns in SI with what the columns tell.
const COLUMNS: [(&str, Shown); 5] = [
    ("N·m", Shown::Torque),
    ("kN", Shown::Force),
    ("mm", Shown::Length),
    ("kg", Shown::Mass),
    ("MPa", Shown::Pressure),
];

impl Page<'_> {
    /// Tells in a system of units everything but what is stated as written, and what comes told in it.
    pub(super) fn restate(&mut self, units: System) {
        if units == System::Si {
            return;
        }
        let told = |text: &mut String| *text = units.restated(text);
        told(&mut self.headline.verdict);
        table(&mut self.bolts, units);
        for each in &mut self.steps {
            each.told.iter_mut().for_each(told);
        }
        for case in &mut self.cases {
            told(&mut case.sink);
            case.told.iter_mut().for_each(told);
        }
        if let Some(torque) = &mut self.torque {
            torque.told.iter_mut().for_each(told);
            table(&mut torque.table, units);
            table(&mut torque.limits, units);
        }
        for each in [&mut self.drivers, &mut self.comparison]
            .into_iter()
            .flatten()
        {
            table(each, units);
        }
        for caution in &mut self.cautions {
            told(&mut caution.text);
        }
    }
}

/// Tells a table; the name of a row stands as it is.
fn table(table: &mut Table, units: System) {
    for (place, column) in table.columns.iter_mut().enumerate() {
        let cells = table.rows.iter_mut().filter(|row| !row.heading);
        let cells = cells.filter_map(|row| row.cells.get_mut(place));
        if !column.number {
            if place > 0 {
                cells.for_each(|cell| *cell = units.restated(cell));
            }
            continue;
        }
        let Some((name, shown)) = unit_of(column) else {
            continue;
        };
        // The same column in SI, so that a number is divided by the ratio of both.
        let (old, new) = (System::Si.unit(shown), units.unit(shown));
        column.unit = column.unit.replace(name, new.name);
        if old.name == new.name {
            continue;
        }
        for cell in cells {
            if let Ok(value) = cell.parse::<f64>() {
                *cell = four(value * old.size / new.size);
            }
        }
    }
}

/// The unit that a column names, alone or behind a word: `least kN`.
fn unit_of(column: &Column) -> Option<(&'static str, Shown)> {
    let last = column.unit.rsplit(' ').next()?;
    COLUMNS.into_iter().find(|(name, _)| *name == last)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::report::page::table::{numbers, words};

    #[test]
    fn columns_are_told_by_known_conversions_and_words_by_their_units() {
        let mut told = Table::new(
            "",
            "",
            vec![
                words("limit of 5 mm"),
                numbers("torque", "N·m"),
                numbers("assembly", "least kN"),
                numbers("x", "mm"),
                numbers("contact", "K/W"),
                words("what to do"),
            ],
        );
        let cells = ["5 mm", "1.130", "4.448", "25.4", "0.1691", "lap to 50.8 µm"];
        told.row(cells.map(str::to_owned).to_vec());
        table(&mut told, System::Inch);
        // 1 in·lbf is 0.1129848 N·m, 1 lbf 4.448222 N, 1 in 25.4 mm.
        assert_eq!(
            told.rows[0].cells,
            [
                "5 mm",
                "10.00",
                "1000",
                "1.000",
                "0.1691",
                "lap to 2.00 mil"
            ]
        );
        let units: Vec<&str> = told.columns.iter().map(|each| each.unit.as_str()).collect();
        assert_eq!(units, ["", "in·lbf", "least lbf", "in", "K/W", ""]);
    }
}
