//! The rows of a reviewed log: the input's cells as they were, then ours; as CSV or as JSON Lines.

use super::rows::{RowFigures, push_json_text};
use crate::logbook::columns::ADDED;
use crate::logbook::log::{Record, readable};

/// Form of the rows.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum RowsAs {
    /// The input's delimiter.
    Csv,
    /// One object a line.
    JsonLines,
}

/// Writes rows under one header.
#[derive(Debug, Clone)]
pub struct LogRows {
    form: RowsAs,
    delimiter: u8,
    /// Columns of the input that are left out, for ours take their place.
    replaced: Vec<usize>,
    titles: Vec<String>,
    /// Number of columns of the input.
    width: usize,
}

impl LogRows {
    /// A writer for rows under `titles`, of which those at `replaced` are left out.
    pub fn new(form: RowsAs, delimiter: u8, titles: &Record, replaced: &[usize]) -> Self {
        let mut names: Vec<String> = Vec::with_capacity(titles.width());
        for (i, title) in titles.cells().enumerate() {
            // A member of an object stands once: a column without a name, or with one that was there before, goes by its place.
            let name = match readable(title).trim() {
                "" => format!("column {}", i + 1),
                name if names.iter().any(|before| before == name) => format!("{name} (column {})", i + 1),
                name => name.to_owned(),
            };
            names.push(name);
        }
        Self { form, delimiter, replaced: replaced.to_vec(), titles: names, width: titles.width() }
    }

    /// Appends the header; nothing for JSON Lines. `names_separator` repeats the input's first line `sep=`.
    pub fn push_header(&self, out: &mut Vec<u8>, titles: &Record, names_separator: bool) {
        if self.form == RowsAs::JsonLines {
            return;
        }
        if names_separator {
            out.extend_from_slice(b"sep=");
            out.extend_from_slice(&[self.delimiter, b'\n']);
        }
        self.push_cells(out, titles, 0..self.width);
        for column in ADDED {
            out.push(self.delimiter);
            out.extend_from_slice(column.name.as_bytes());
        }
        out.push(b'\n');
    }

    /// Appends one row. Cells beyond the header's width are kept, behind ours.
    pub fn push(&self, out: &mut Vec<u8>, record: &Record, figures: &RowFigures) {
        match self.form {
            RowsAs::Csv => {
                self.push_cells(out, record, 0..self.width);
                figures.push_csv(out, self.delimiter);
                for extra in self.width..record.width() {
                    out.push(self.delimiter);
                    push_cell(out, record.cell(extra).unwrap_or_default(), self.delimiter);
                }
                out.push(b'\n');
            }
            RowsAs::JsonLines => self.push_object(out, record, figures),
        }
    }

    fn push_cells(&self, out: &mut Vec<u8>, record: &Record, range: std::ops::Range<usize>) {
        let mut first = true;
        for index in range.filter(|i| !self.replaced.contains(i)) {
            if !first {
                out.push(self.delimiter);
            }
            first = false;
            push_cell(out, record.cell(index).unwrap_or_default(), self.delimiter);
        }
    }

    fn push_object(&self, out: &mut Vec<u8>, record: &Record, figures: &RowFigures) {
        out.push(b'{');
        let mut first = true;
        for index in (0..self.width.max(record.width())).filter(|i| !self.replaced.contains(i)) {
            if !first {
                out.push(b',');
            }
            first = false;
            match self.titles.get(index) {
                Some(title) => push_json_text(out, title),
                None => push_json_text(out, &format!("column {}", index + 1)),
            }
            out.push(b':');
            match record.cell(index).unwrap_or_default() {
                [] => out.extend_from_slice(b"null"),
                cell => push_json_text(out, &readable(cell)),
            }
        }
        if first {
            // No cell of the input is left: our first member must not begin with a comma.
            out.extend_from_slice(b"\"row\":null");
        }
        figures.push_json(out);
        out.extend_from_slice(b"}\n");
    }
}

/// A cell of the input with its content unchanged, quoted where the form asks for it.
fn push_cell(out: &mut Vec<u8>, cell: &[u8], delimiter: u8) {
    if !cell.iter().any(|b| *b == delimiter || matches!(b, b'"' | b'\n' | b'\r')) {
        out.extend_from_slice(cell);
        return;
    }
    out.push(b'"');
    for byte in cell {
        if *byte == b'"' {
            out.push(b'"');
        }
        out.push(*byte);
    }
    out.push(b'"');
}
