//! Aligned tables without borders: names to the left, numbers to the right.

use comfy_table::{Cell, CellAlignment, ContentArrangement, Table, presets};

/// On which side the cells of a column stand.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Side {
    /// Words.
    Left,
    /// Numbers.
    Right,
}

/// A table as text, one line per row, the heading first; a heading may hold line breaks.
///
/// Rows shorter than the heading are filled with empty cells.
pub fn aligned(headings: &[(&str, Side)], rows: &[Vec<String>]) -> String {
    let mut table = Table::new();
    table
        .load_style(presets::NOTHING)
        .set_content_arrangement(ContentArrangement::Disabled);
    table.set_header(headings.iter().map(|(heading, side)| cell(heading, *side)));
    for row in rows {
        table.add_row(
            headings
                .iter()
                .enumerate()
                .map(|(index, (_, side))| cell(row.get(index).map_or("", String::as_str), *side)),
        );
    }
    for column in table.column_iter_mut() {
        column.set_padding((0, 2));
    }
    let mut text = table.trim_fmt();
    text.push('\n');
    text
}

fn cell(text: &str, side: Side) -> Cell {
    Cell::new(text).set_alignment(match side {
        Side::Left => CellAlignment::Left,
        Side::Right => CellAlignment::Right,
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_end_in_one_column_even_after_wide_letters() {
        let text = aligned(
            &[("name", Side::Left), ("K/W\nlow", Side::Right)],
            &[
                vec!["µm·Ω".to_owned(), "0.5".to_owned()],
                vec!["plate".to_owned(), "12.25".to_owned()],
            ],
        );
        assert_eq!(
            text,
            "name     K/W\n         low\nµm·Ω     0.5\nplate  12.25\n"
        );
    }
}
