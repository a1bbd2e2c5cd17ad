//! Tables of a page: words to the left, numbers to the right, with what they mean above them.

use askama::Template;

/// A column.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) struct Column {
    /// Its heading; what stands after a line break is its unit.
    pub(super) name: String,
    /// Its unit; empty where it has none.
    pub(super) unit: String,
    /// Whether it holds numbers.
    pub(super) number: bool,
}

/// A row.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub(super) struct Row {
    /// Its cells; the first names the row.
    pub(super) cells: Vec<String>,
    /// Words for the style: `strong`, `over`.
    pub(super) class: &'static str,
    /// Whether it is a heading over the rows that follow.
    pub(super) heading: bool,
}

/// A table.
#[derive(Clone, Debug, Default, PartialEq, Eq, Template)]
#[template(config = "src/report/page/askama.toml", path = "table.html")]
pub(super) struct Table {
    /// Its name in the page, for what reads it; empty where nothing does.
    pub(super) id: &'static str,
    /// What it holds, in a sentence.
    pub(super) caption: String,
    /// The columns.
    pub(super) columns: Vec<Column>,
    /// The rows.
    pub(super) rows: Vec<Row>,
}

impl Table {
    /// An empty table.
    pub(super) fn new(id: &'static str, caption: impl Into<String>, columns: Vec<Column>) -> Self {
        Self {
            id,
            caption: caption.into(),
            columns,
            rows: Vec::new(),
        }
    }

    /// The cells of a row with their columns; what a row lacks is empty.
    fn cells<'a>(&'a self, row: &'a Row) -> impl Iterator<Item = (&'a Column, &'a str)> {
        let columns = self.columns.iter().enumerate();
        columns.map(|(index, column)| (column, row.cells.get(index).map_or("", String::as_str)))
    }

    /// Adds a row.
    pub(super) fn row(&mut self, cells: Vec<String>) {
        self.styled(cells, "");
    }

    /// Adds a row with words for the style.
    pub(super) fn styled(&mut self, cells: Vec<String>, class: &'static str) {
        self.rows.push(Row {
            cells,
            class,
            heading: false,
        });
    }

    /// Adds a heading over the rows that follow.
    pub(super) fn heading(&mut self, text: impl Into<String>) {
        self.rows.push(Row {
            cells: vec![text.into()],
            class: "",
            heading: true,
        });
    }
}

/// A column of words.
pub(super) fn words(name: &str) -> Column {
    Column {
        name: name.to_owned(),
        unit: String::new(),
        number: false,
    }
}

/// A column of numbers in a unit.
pub(super) fn numbers(name: &str, unit: &str) -> Column {
    Column {
        name: name.to_owned(),
        unit: unit.to_owned(),
        number: true,
    }
}
