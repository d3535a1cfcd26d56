//! Entries as lines of the file.

use super::cells::EntryCells;
use super::entry::Entry;
use super::read::{Layout, header};
use super::seal::{is_figures, plain_figure, sealed_names};
use crate::report::rows::push_csv_text;

/// One line, laid out as the file is, with its line end.
pub(super) fn line(layout: &Layout, cells: &EntryCells) -> Vec<u8> {
    let mut out = Vec::new();
    for (at, column) in layout.columns.iter().enumerate() {
        if at > 0 {
            out.push(layout.delimiter);
        }
        if let Some(column) = column {
            push_cell(&mut out, column, cells.named(column), layout.delimiter);
        }
    }
    out.extend_from_slice(layout.line_end.as_bytes());
    out
}

/// A minus before a figure is a figure; before anything else it must not begin a spreadsheet's formula.
fn push_cell(out: &mut Vec<u8>, column: &str, text: &str, delimiter: u8) {
    if is_figures(column) && plain_figure(text).is_some() && !text.contains(char::from(delimiter)) {
        out.extend_from_slice(text.as_bytes());
    } else {
        push_csv_text(out, text, delimiter);
    }
}

/// Entries under the header of a book that is begun.
pub fn rows<'e>(entries: impl Iterator<Item = &'e Entry>) -> String {
    let columns = sealed_names().map(Some).collect();
    let layout = Layout { columns, delimiter: b',', line_end: "\n", plain: true };
    let mut out = header().into_bytes();
    entries.for_each(|entry| out.append(&mut line(&layout, &entry.cells)));
    String::from_utf8_lossy(&out).into_owned()
}
