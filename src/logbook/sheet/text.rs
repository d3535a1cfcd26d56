//! A sheet as comma separated text, with where each of its rows came from.

use super::cell::SheetCell;
use super::header::{SEARCHED, Titles};
use super::{Workbook, letters};
use crate::error::{Error, Result};
use crate::logbook::names::ColumnNames;
use std::io::{Read, Seek, Write};

/// What is to be said of a sheet that was read.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct SheetText {
    /// The row of the sheet, from 1, of each data row.
    rows: Vec<(u64, u32)>,
    written: u64,
    /// Rows that are none of the log's: headings above and between, names of columns repeated.
    pub passed_over: u64,
    /// Blank rows between others.
    pub blank: u64,
    /// Cells beyond the last column that is read.
    pub beyond: u64,
    /// The names of the columns: ours where they are read, otherwise theirs in small letters.
    pub titles: Vec<String>,
    /// The row of the sheet that they stand in, from 1.
    pub titles_row: u32,
}

impl SheetText {
    /// The row of the sheet, from 1, of the data row `number`, from 1.
    pub fn row_of(&self, number: u64) -> Option<u32> {
        let at = self.rows.partition_point(|(first, _)| *first <= number).checked_sub(1)?;
        let (first, row) = self.rows.get(at)?;
        Some(row + u32::try_from(number - first).ok()?)
    }

    /// The letters of the column of that name.
    pub fn letters_of(&self, column: &str) -> Option<String> {
        self.titles.iter().position(|t| t == column).map(letters)
    }

    /// One sentence where anything was passed over; nothing otherwise.
    pub fn passed_over(&self) -> Option<String> {
        let (mut parts, plural) = (Vec::new(), |n: u64| if n == 1 { "" } else { "s" });
        for (count, what) in [(self.passed_over, "row"), (self.blank, "blank row"), (self.beyond, "cell")] {
            if count > 0 {
                let which = match what {
                    "row" => " that hold headings",
                    "cell" => " beyond the last column that is read",
                    _ => "",
                };
                parts.push(format!("{count} {what}{}{which}", plural(count)));
            }
        }
        (!parts.is_empty()).then(|| format!("passed over: {}", parts.join(", ")))
    }

    fn add_row(&mut self, row: u32) {
        self.written += 1;
        let follows = self.row_of(self.written) == Some(row);
        if !follows {
            self.rows.push((self.written, row));
        }
    }
}

/// Writes a sheet as comma separated text: its names of columns, and every row that is an entry.
///
/// `table` names columns of a small table that is wanted instead of a log.
///
/// # Errors
/// [`Error::Content`] for a sheet that cannot be read, or in whose first hundred rows no names of columns stand.
pub fn sheet_as_csv<R: Read + Seek>(
    workbook: &mut Workbook<R>,
    sheet: &str,
    names: &ColumnNames,
    table: Option<&[&str]>,
    out: impl Write,
) -> Result<SheetText> {
    let file = format!("{}, sheet {sheet}", workbook.name);
    let mut writer = csv::WriterBuilder::new().flexible(true).from_writer(out);
    let failed = |source: csv::Error| Error::Stream { what: "copying a sheet", source: source.into() };
    let (mut titles, mut said, mut last): (Option<Titles>, SheetText, Option<u32>) = (None, SheetText::default(), None);
    let mut first_row: Option<Vec<String>> = None;
    let beyond = workbook.rows(sheet, |row, cells| {
        if cells.iter().all(SheetCell::is_blank) {
            return Ok(());
        }
        let Some(titles) = &titles else {
            if row > SEARCHED {
                return Ok(());
            }
            let found = match table {
                Some(wanted) => Titles::of_table(cells, names, wanted),
                None => Titles::of(cells, names),
            };
            let Some(found) = found else {
                if cells.iter().filter(|c| !c.is_blank()).count() > 1 {
                    first_row.get_or_insert_with(|| cells.iter().map(|c| c.text(None)).collect());
                }
                said.passed_over += 1;
                return Ok(());
            };
            writer.write_record(&found.names).map_err(failed)?;
            (said.titles, said.titles_row) = (found.ours.clone(), row);
            (titles, last) = (Some(found), Some(row));
            return Ok(());
        };
        said.blank += u64::from(last.map_or(0, |l| row.saturating_sub(l + 1)));
        last = Some(row);
        if titles.passes_over(cells) {
            said.passed_over += 1;
            return Ok(());
        }
        said.add_row(row);
        let text = |(at, cell): (usize, &SheetCell)| cell.text(titles.columns.get(at).copied().flatten());
        writer.write_record(cells.iter().enumerate().map(text)).map_err(failed)
    })?;
    said.beyond = beyond.0;
    if titles.is_none() {
        let seen = first_row.map_or_else(String::new, |cells| {
            let cells: Vec<&str> = cells.iter().map(|c| c.trim()).filter(|c| !c.is_empty()).collect();
            let missing = names.missing(cells.iter().copied()).map_or_else(String::new, |missing| format!("; {missing}"));
            format!("; the first row with several cells is {}{missing}", cells.join(", "))
        });
        let what = if table.is_some() { "of the columns" } else { "of a time, a place and a bearing" };
        return Err(Error::Content {
            file,
            line: 0,
            message: format!("no row among its first {SEARCHED} holds the names {what} (`shadowpin columns`, or --columns){seen}"),
        });
    }
    writer.flush().map_err(|source| Error::Stream { what: "copying a sheet", source })?;
    Ok(said)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn rows_of_the_sheet() {
        let mut said = SheetText::default();
        for row in [4, 5, 6, 9, 10, 20] {
            said.add_row(row);
        }
        assert_eq!(said.rows.len(), 3);
        assert_eq!([1, 3, 4, 5, 6].map(|n| said.row_of(n).unwrap()), [4, 6, 9, 10, 20]);
        assert_eq!(said.row_of(0), None);
    }
}
