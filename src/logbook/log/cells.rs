//! The cells of one row, by column.

use crate::logbook::columns::Column;
use std::borrow::Cow;

/// Anything that has cells under the log's columns: a row of a file, or options of a command line.
pub trait Cells {
    /// Whether there is such a column, blank or not.
    fn has(&self, column: Column) -> bool;

    /// The cell as it stands, untrimmed; blank where there is none.
    fn bytes(&self, column: Column) -> &[u8];

    /// The cell as text, trimmed.
    ///
    /// Bytes that are not UTF-8 are taken for what spreadsheets write as single bytes: the degree sign, fractions, dashes and minute
    /// marks of Windows-1252; any other is shown as unreadable.
    fn text(&self, column: Column) -> Cow<'_, str> {
        text_of(self.bytes(column))
    }
}

/// A cell's bytes as text, blanks about it kept; what is not UTF-8 is read as [`Cells::text`] says.
pub fn readable(bytes: &[u8]) -> Cow<'_, str> {
    match std::str::from_utf8(bytes) {
        Ok(text) => Cow::Borrowed(text),
        Err(_) => encoding_rs::WINDOWS_1252.decode_without_bom_handling(bytes).0,
    }
}

/// A cell's bytes as trimmed text.
pub(crate) fn text_of(bytes: &[u8]) -> Cow<'_, str> {
    // Nearly every cell is blank, or begins and ends with something to read.
    let (Some(first), Some(last)) = (bytes.first(), bytes.last()) else { return Cow::Borrowed("") };
    if first.is_ascii_graphic()
        && last.is_ascii_graphic()
        && let Ok(text) = std::str::from_utf8(bytes)
    {
        return Cow::Borrowed(text);
    }
    match readable(bytes) {
        Cow::Borrowed(text) => Cow::Borrowed(text.trim()),
        Cow::Owned(text) => Cow::Owned(text.trim().to_owned()),
    }
}
