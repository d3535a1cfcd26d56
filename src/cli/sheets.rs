//! Sheets of workbooks, as the text that the readers take.

use super::read;
use shadowpin::error::{Error, Result};
use shadowpin::logbook::names::ColumnNames;
use shadowpin::logbook::sheet::{SheetText, Workbook, is_workbook, sheet_as_csv};
use std::io::{Cursor, Read, Seek};
use std::path::Path;

/// The column names of `--columns`; ours where it is not given.
pub fn names(path: Option<&Path>) -> Result<ColumnNames> {
    let Some(path) = path else { return Ok(ColumnNames::default()) };
    let (name, bytes) = read::content(path)?;
    ColumnNames::read(&name, &String::from_utf8_lossy(&bytes))
}

/// The sheets that are meant: the one of that name, in any case; else the first, or all.
pub fn wanted<R: Read + Seek>(workbook: &Workbook<R>, file: &str, sheet: Option<&str>, all_sheets: bool) -> Result<Vec<String>> {
    let mut all = workbook.sheets();
    if let Some(sheet) = sheet {
        let found = all.iter().find(|s| s.trim().eq_ignore_ascii_case(sheet.trim()));
        let none = || Error::Usage(format!("{file} has no sheet {sheet}; it has {}", all.join(", ")));
        return found.cloned().map(|one| vec![one]).ok_or_else(none);
    }
    if all.is_empty() {
        return Err(Error::Content { file: file.to_owned(), line: 0, message: "the workbook has no sheet".into() });
    }
    if !all_sheets {
        all.truncate(1);
    }
    Ok(all)
}

/// A small table, whole: its name, its text, and where its rows stand if it was a sheet. `columns` names columns that it may have.
pub fn table(path: &Path, sheet: Option<&str>, names: &ColumnNames, columns: &[&str]) -> Result<(String, Vec<u8>, Option<SheetText>)> {
    let (name, bytes) = read::content(path)?;
    if !is_workbook(&bytes) {
        return match sheet {
            Some(_) => Err(Error::Usage(format!("{name} is no workbook: --sheet is for .xlsx"))),
            None => Ok((name, bytes, None)),
        };
    }
    let mut workbook = Workbook::open(Cursor::new(bytes), &name)?;
    let sheet = wanted(&workbook, &name, sheet, false)?.swap_remove(0);
    let mut text = Vec::new();
    let said = sheet_as_csv(&mut workbook, &sheet, names, Some(columns), &mut text)?;
    Ok((format!("{name}, sheet {sheet}"), text, Some(said)))
}

/// What is wrong with a row of a sheet, with its cell before it. `why` begins with the name of the column.
pub fn with_cell(sheet: &SheetText, number: usize, why: &str) -> String {
    let column = why.split(':').next().unwrap_or_default();
    match (sheet.letters_of(column), sheet.row_of(number as u64)) {
        (Some(letters), Some(row)) => format!("cell {letters}{row}: {why}"),
        (None, Some(row)) => format!("row {row} of the sheet: {why}"),
        _ => why.to_owned(),
    }
}
