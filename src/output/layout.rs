//! What the pages for reading share: plain tables, wrapped text, numbered notes.
//!
//! A page is at most [`PAGE_WIDTH`] columns wide, without colour, and without lines where white
//! space will do.

use std::io;

use comfy_table::{CellAlignment, ContentArrangement, LineStyle, Row, Table, TableStyle};

/// Columns of a page.
pub(super) const PAGE_WIDTH: u16 = 98;

/// A table with these headings and rows; columns named in `right` are set flush right.
pub(super) fn table(headings: &[&str], right: &[usize], rows: Vec<Vec<String>>) -> String {
    let mut table = Table::new();
    table.load_style(TableStyle::new().header_separator(LineStyle::none().fill('-').junction(' ')));
    table.set_content_arrangement(ContentArrangement::Dynamic).set_width(PAGE_WIDTH);
    table.set_header(headings.to_vec());
    table.add_rows(rows.into_iter().map(Row::from));
    for &index in right {
        if let Some(column) = table.column_mut(index) {
            column.set_cell_alignment(CellAlignment::Right);
        }
    }
    table.trim_fmt()
}

/// Writes text broken at spaces, every line after the first set in by `indent` columns.
pub(super) fn write_wrapped(text: &str, indent: usize, out: &mut dyn io::Write) -> io::Result<()> {
    let mut line = String::new();
    for word in text.split(' ') {
        let width = line.chars().count() + 1 + word.chars().count();
        if width > usize::from(PAGE_WIDTH) && !line.trim().is_empty() {
            writeln!(out, "{line}")?;
            line = " ".repeat(indent) + word;
        } else {
            if !line.is_empty() {
                line.push(' ');
            }
            line.push_str(word);
        }
    }
    writeln!(out, "{line}")
}

/// Notes below a table, each distinct text once, numbered from 1 as they are met.
#[derive(Debug, Default)]
pub(super) struct Notes(Vec<String>);

impl Notes {
    /// The number of a note.
    pub(super) fn number(&mut self, text: String) -> usize {
        if let Some(index) = self.0.iter().position(|known| *known == text) {
            return index + 1;
        }
        self.0.push(text);
        self.0.len()
    }

    /// Writes the notes, if there are any.
    pub(super) fn write(&self, out: &mut dyn io::Write) -> io::Result<()> {
        if self.0.is_empty() {
            return Ok(());
        }
        writeln!(out, "\nNotes")?;
        for (index, text) in self.0.iter().enumerate() {
            write_wrapped(&format!("{} {text}", index + 1), 3, out)?;
        }
        Ok(())
    }
}

/// A number with what is counted, in the singular or the plural.
pub(super) fn counted(n: usize, what: &str) -> String {
    if n == 1 { format!("1 {what}") } else { format!("{n} {what}s") }
}
