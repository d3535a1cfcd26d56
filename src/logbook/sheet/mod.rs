//! Workbooks (`.xlsx`): the rows of a sheet, one after another, as the text that a log would hold.

mod cell;
mod guard;
mod header;
mod text;

pub use text::{SheetText, sheet_as_csv};

use crate::error::{Error, Result};
use calamine::{DataRef, Reader as _, Xlsx};
use cell::SheetCell;
use std::io::{Read, Seek};

/// Columns of a sheet that are read; what stands beyond is counted (our own: no log has more).
pub(crate) const MOST_COLUMNS: usize = 1 << 10;

/// An open workbook.
pub struct Workbook<R: Read + Seek> {
    inner: Xlsx<R>,
    /// What messages call it.
    name: String,
}

/// Whether these first bytes of a file are those of a workbook.
pub fn is_workbook(start: &[u8]) -> bool {
    start.starts_with(b"PK\x03\x04")
}

impl<R: Read + Seek> Workbook<R> {
    /// Opens a workbook. `name` is what messages call it.
    ///
    /// # Errors
    /// [`Error::Content`] for a file that is none, or that would unpack to more than a log can be.
    pub fn open(mut source: R, name: &str) -> Result<Self> {
        let content = |message: String| Error::Content { file: name.to_owned(), line: 0, message };
        guard::check(&mut source).map_err(content)?;
        let inner = Xlsx::new(source).map_err(|e| content(format!("it is no workbook that can be read: {e}")))?;
        Ok(Self { inner, name: name.to_owned() })
    }

    /// The names of its sheets, in their order.
    pub fn sheets(&self) -> Vec<String> {
        self.inner.sheet_names()
    }

    /// Calls `each` with every row of a sheet that has a cell in it: its number in the sheet, from 1, and its cells.
    fn rows(&mut self, sheet: &str, mut each: impl FnMut(u32, &[SheetCell]) -> Result<()>) -> Result<Beyond> {
        let name = self.name.clone();
        let failed = |e: calamine::XlsxError| Error::Content { file: name.clone(), line: 0, message: format!("sheet {sheet}: {e}") };
        let mut reader = self.inner.worksheet_cells_reader(sheet).map_err(failed)?;
        let (mut row, mut cells, mut beyond) = (None, Vec::new(), Beyond(0));
        while let Some(cell) = reader.next_cell().map_err(failed)? {
            let (at, column) = cell.get_position();
            if matches!(cell.get_value(), DataRef::Empty) {
                continue;
            }
            if row != Some(at) {
                if let Some(done) = row {
                    each(done + 1, &cells)?;
                }
                (row, cells) = (Some(at), Vec::new());
            }
            let column = column as usize;
            if column >= MOST_COLUMNS {
                beyond.0 += 1;
                continue;
            }
            if cells.len() <= column {
                cells.resize(column + 1, SheetCell::Blank);
            }
            if let Some(slot) = cells.get_mut(column) {
                *slot = SheetCell::of(cell.get_value());
            }
        }
        if let Some(done) = row {
            each(done + 1, &cells)?;
        }
        Ok(beyond)
    }
}

/// Cells beyond the last column that is read.
struct Beyond(u64);

/// The letters of a column, from 0: A, B, ... Z, AA, AB.
pub(crate) fn letters(column: usize) -> String {
    let (mut rest, mut letters) = (column + 1, Vec::new());
    while rest > 0 {
        letters.push(char::from(b'A' + ((rest - 1) % 26) as u8));
        rest = (rest - 1) / 26;
    }
    letters.iter().rev().collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn columns_have_letters() {
        assert_eq!([0, 25, 26, 51, 52, 701, 702].map(letters), ["A", "Z", "AA", "AZ", "BA", "ZZ", "AAA"]);
    }
}
