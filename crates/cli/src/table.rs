//! Tables for people: a thin rule under the head, groups set apart, numbers to the right.

use comfy_table::{CellAlignment, LineStyle, Table as Drawn, TableStyle};
use std::fmt;

/// Where a column's text stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Align {
    /// Words.
    Left,
    /// Numbers.
    Right,
}

/// A table that is being filled.
#[derive(Debug)]
pub(crate) struct Table {
    columns: Vec<Align>,
    drawn: Drawn,
}

impl Table {
    /// An empty table with these columns.
    pub(crate) fn new(columns: &[(&str, Align)]) -> Self {
        let mut drawn = Drawn::new();
        let rule = LineStyle::none().fill('─').junction('─');
        drawn.load_style(TableStyle::new().header_separator(rule));
        drawn.set_header(columns.iter().map(|(name, _)| *name));
        Self { columns: columns.iter().map(|(_, align)| *align).collect(), drawn }
    }

    /// Adds a row, one text for each column.
    pub(crate) fn row(&mut self, cells: Vec<String>) {
        self.drawn.add_row(cells);
    }

    /// Sets what follows apart from what is there.
    pub(crate) fn gap(&mut self) {
        self.drawn.add_row(vec![""; self.columns.len()]);
    }
}

impl fmt::Display for Table {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let mut drawn = self.drawn.clone();
        for (column, align) in drawn.column_iter_mut().zip(&self.columns) {
            column.set_padding((0, 2));
            column.set_cell_alignment(match align {
                Align::Left => CellAlignment::Left,
                Align::Right => CellAlignment::Right,
            });
        }
        f.write_str(drawn.trim_fmt().trim_end())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_stand_to_the_right_and_groups_apart() {
        let mut table = Table::new(&[("work", Align::Left), ("median", Align::Right)]);
        table.row(vec!["smooth".to_owned(), "1.25 ms".to_owned()]);
        table.gap();
        table.row(vec!["µ".to_owned(), "812 µs".to_owned()]);
        let lines: Vec<String> =
            table.to_string().lines().map(|l| l.trim_end().to_owned()).collect();
        assert_eq!(lines[0], "work      median");
        assert!(lines[1].chars().all(|c| c == '─') && !lines[1].is_empty());
        assert_eq!(lines[2..], ["smooth   1.25 ms", "", "µ         812 µs"]);
    }
}
