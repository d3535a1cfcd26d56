//! Small tables: a card, a swing, a run-up. A header and rows of a few figures, read whole.

use super::names::ColumnNames;
use crate::error::{Error, Result};

/// A table larger than this, bytes, is no card or swing (our own).
const LARGEST: usize = 16 << 20;

/// The form of a small table, where it is not what is usual.
#[derive(Debug, Clone, Default)]
pub struct TableForm {
    /// Names that some columns have instead of ours.
    pub names: ColumnNames,
    /// Figures are written with a decimal comma though commas part the cells.
    pub decimal_comma: bool,
}

/// A small table with its header.
#[derive(Debug)]
pub(crate) struct Table {
    /// Name of the file, or "standard input".
    pub name: String,
    header: Vec<String>,
    /// The rows that are not blank.
    pub rows: Vec<Row>,
}

/// One row.
#[derive(Debug)]
pub(crate) struct Row {
    /// Data row, from 1.
    pub number: usize,
    /// Line of the file, from 1.
    pub line: u64,
    cells: Vec<String>,
}

/// A column that a table has, or not.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Column(Option<usize>);

impl Column {
    pub(crate) fn is_there(self) -> bool {
        self.0.is_some()
    }
}

impl Row {
    /// The cell, trimmed; blank where the row or the table has none.
    pub(crate) fn cell(&self, column: Column) -> &str {
        column.0.and_then(|i| self.cells.get(i)).map_or("", String::as_str)
    }
}

impl Table {
    /// Reads comma, semicolon or tab separated text; in the latter two a decimal comma is read as a point.
    pub(crate) fn read(name: &str, bytes: &[u8]) -> Result<Self> {
        Self::read_as(name, bytes, &TableForm::default())
    }

    /// The same of another form.
    pub(crate) fn read_as(name: &str, bytes: &[u8], form: &TableForm) -> Result<Self> {
        let content = |message: String| Error::Content { file: name.to_owned(), line: 0, message };
        if bytes.len() > LARGEST {
            return Err(content(format!("{} bytes are too many for a card or a swing", bytes.len())));
        }
        let text = String::from_utf8_lossy(bytes);
        let text = text.trim_start_matches('\u{feff}');
        // The line by which spreadsheets name their separator.
        let text = if text.starts_with("sep=") { text.split_once('\n').map_or("", |(_, rest)| rest) } else { text };
        let first = text.lines().find(|l| !l.trim().is_empty()).unwrap_or("");
        let separator = (*b",;\t").into_iter().max_by_key(|s| first.bytes().filter(|b| b == s).count()).unwrap_or(b',');
        let mut reader = csv::ReaderBuilder::new()
            .delimiter(separator)
            .flexible(true)
            .has_headers(false)
            .trim(csv::Trim::All)
            .from_reader(text.as_bytes());
        let mut header = Vec::new();
        let mut rows = Vec::new();
        for record in reader.records() {
            let record = record.map_err(|e| content(e.to_string()))?;
            let line = record.position().map_or(0, csv::Position::line);
            if record.iter().all(str::is_empty) {
                continue;
            }
            if header.is_empty() {
                if let Some(message) = form.names.missing(record.iter()) {
                    return Err(content(message));
                }
                let ours = |title: &str| form.names.ours(title).map_or_else(|| title.to_ascii_lowercase(), str::to_owned);
                header = record.iter().map(ours).collect();
                continue;
            }
            let points = separator == b',' && !form.decimal_comma;
            let cell = |cell: &str| if points { cell.to_owned() } else { cell.replace(',', ".") };
            rows.push(Row { number: rows.len() + 1, line, cells: record.iter().map(cell).collect() });
        }
        if header.is_empty() {
            return Err(content("the file is empty: a header and rows were expected".to_owned()));
        }
        for (i, column) in header.iter().enumerate() {
            if !column.is_empty() && header.iter().skip(i + 1).any(|other| other == column) {
                return Err(content(format!("the column {column} stands there twice")));
            }
        }
        Ok(Self { name: name.to_owned(), header, rows })
    }

    pub(crate) fn column(&self, name: &str) -> Column {
        Column(self.header.iter().position(|h| h == name))
    }

    /// An error at a row.
    pub(crate) fn error(&self, row: &Row, message: String) -> Error {
        Error::Content { file: self.name.clone(), line: row.line, message }
    }

    /// An error of the table as a whole.
    pub(crate) fn unusable(&self, message: String) -> Error {
        Error::Content { file: self.name.clone(), line: 0, message }
    }

    /// The columns there are, for a message.
    pub(crate) fn columns(&self) -> String {
        self.header.join(", ")
    }
}
