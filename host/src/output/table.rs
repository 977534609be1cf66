//! Aligned columns of text.

use std::fmt::Write;

/// A table: names in a first column are aligned to the left, all else to the right.
pub struct Table {
    named: bool,
    rows: Vec<Vec<String>>,
}

impl Table {
    /// A table with these headings and names in its first column.
    pub fn named<S: Into<String>>(headings: impl IntoIterator<Item = S>) -> Self {
        let headings = headings.into_iter().map(Into::into).collect();
        Self {
            named: true,
            rows: vec![headings],
        }
    }

    /// A table with these headings and figures in all of its columns.
    pub fn of_figures<S: Into<String>>(headings: impl IntoIterator<Item = S>) -> Self {
        Self {
            named: false,
            ..Self::named(headings)
        }
    }

    /// Adds a row.
    pub fn row<S: Into<String>>(&mut self, cells: impl IntoIterator<Item = S>) {
        self.rows.push(cells.into_iter().map(Into::into).collect());
    }

    /// The rows, two blanks between columns, each line ended; `indent` blanks before each.
    pub fn text(&self, indent: usize) -> String {
        let columns = self.rows.iter().map(Vec::len).max().unwrap_or(0);
        let width = |column: usize| {
            let cells = self.rows.iter().filter_map(|row| row.get(column));
            cells.map(|cell| cell.chars().count()).max().unwrap_or(0)
        };
        let widths: Vec<_> = (0..columns).map(width).collect();
        let mut text = String::new();
        for row in &self.rows {
            let mut line = " ".repeat(indent);
            for (column, (cell, width)) in row.iter().zip(&widths).enumerate() {
                let gap = if column == 0 { "" } else { "  " };
                let _ = if column == 0 && self.named {
                    write!(line, "{cell:<width$}")
                } else {
                    write!(line, "{gap}{cell:>width$}")
                };
            }
            text.push_str(line.trim_end());
            text.push('\n');
        }
        text
    }
}
