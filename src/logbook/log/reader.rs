//! A log: a header, and rows under it.

use super::cells::Cells;
use super::header::Header;
use super::record::{LONGEST_ROW, MOST_CELLS, Record, Records};
use crate::error::{Error, Result};
use crate::logbook::columns::Column;
use crate::logbook::names::ColumnNames;
use std::io::{Chain, Cursor, Read};

/// A row of a log with the header that names its cells.
#[derive(Debug, Clone, Copy)]
pub struct LogRow<'r> {
    /// Where each column stands.
    pub header: &'r Header,
    /// The cells.
    pub record: &'r Record,
    /// Number of the data row, from 1.
    pub number: u64,
}

impl Cells for LogRow<'_> {
    fn has(&self, column: Column) -> bool {
        self.header.place(column).is_some()
    }

    fn bytes(&self, column: Column) -> &[u8] {
        self.header.place(column).and_then(|i| self.record.cell(i)).unwrap_or_default()
    }
}

/// The form of a log, where it is not what is usual.
#[derive(Debug, Clone, Default)]
pub struct LogForm {
    /// The columns that this program adds may be there from an earlier run and are to be replaced.
    pub again: bool,
    /// Names that some columns have instead of ours.
    pub names: ColumnNames,
    /// The header, of a log whose first row is data already.
    pub header: Option<String>,
}

/// Reads a log.
pub struct LogReader<R: Read> {
    records: Records<Chain<Cursor<Vec<u8>>, R>>,
    rows: u64,
    /// A fault behind the last block, for the next call.
    failed: Option<Error>,
    /// The header's cells as they stand.
    pub titles: Record,
    /// Where each column stands.
    pub header: Header,
}

impl<R: Read> LogReader<R> {
    /// Opens a log and reads its header. `name` stands in messages; `again` says that the columns this program adds may be there from
    /// an earlier run and are to be replaced.
    ///
    /// # Errors
    /// [`Error::Content`] for a file without a usable header; [`Error::Stream`] where reading fails.
    pub fn new(source: R, name: &str, again: bool) -> Result<Self> {
        Self::open(source, name, &LogForm { again, ..LogForm::default() })
    }

    /// As [`LogReader::new`], for a log of another form.
    ///
    /// # Errors
    /// As [`LogReader::new`]; a header that is given is checked as one that is read.
    pub fn open(source: R, name: &str, form: &LogForm) -> Result<Self> {
        let given = form.header.as_ref().map_or_else(String::new, |header| format!("{header}\n"));
        let mut records = Records::new(Cursor::new(given.into_bytes()).chain(source))?;
        let mut titles = Record::default();
        let content = |line, message: String| Error::Content { file: name.to_owned(), line, message };
        if form.header.is_some() {
            // It stands above the first line.
            records.line = 0;
        }
        if records.unusable_separator {
            return Err(content(1, "sep= names nothing that can part cells: a comma, semicolon, tab, | ^ or ~ was expected".into()));
        }
        if !records.next(&mut titles)? {
            return Err(content(0, "the file is empty: a header with the columns' names was expected".into()));
        }
        if titles.too_long {
            let message = format!("the header is longer than {LONGEST_ROW} bytes or {MOST_CELLS} cells: is a quote never closed?");
            return Err(content(titles.line, message));
        }
        let header = Header::read_as(titles.cells(), form.again, &form.names).map_err(|message| content(titles.line, message))?;
        Ok(Self { records, rows: 0, failed: None, titles, header })
    }

    /// What parts the cells.
    pub fn delimiter(&self) -> u8 {
        self.records.delimiter
    }

    /// Whether the file began with a line that names its separator.
    pub fn names_separator(&self) -> bool {
        self.records.names_separator
    }

    /// The next row, its cells in `record`; `None` at the end. Empty lines are passed over; a row of blank cells is a row.
    ///
    /// # Errors
    /// [`Error::Stream`] where reading fails.
    pub fn next<'r>(&'r mut self, record: &'r mut Record) -> Result<Option<LogRow<'r>>> {
        if !self.records.next(record)? {
            return Ok(None);
        }
        self.rows += 1;
        Ok(Some(LogRow { header: &self.header, record, number: self.rows }))
    }

    /// The next rows, as many as make a block; false where there is none left. What was read before a fault is a block of its own.
    ///
    /// # Errors
    /// [`Error::Stream`] where reading fails.
    pub fn fill(&mut self, block: &mut Block) -> Result<bool> {
        (block.used, block.first) = (0, self.rows + 1);
        let mut bytes = 0;
        while block.used < BLOCK_ROWS && bytes < BLOCK_BYTES {
            if block.used == block.records.len() {
                block.records.push(Record::default());
            }
            let Some(record) = block.records.get_mut(block.used) else { break };
            match self.failed.take().map_or_else(|| self.records.next(record), Err) {
                Ok(true) => {}
                Ok(false) => break,
                Err(error) if block.used == 0 => return Err(error),
                Err(error) => {
                    self.failed = Some(error);
                    break;
                }
            }
            self.rows += 1;
            bytes += record.size();
            block.used += 1;
        }
        Ok(block.used > 0)
    }
}

/// Rows of one block at the most.
const BLOCK_ROWS: usize = 1024;
/// Bytes that end a block of long rows.
const BLOCK_BYTES: usize = 1 << 18;

/// Some rows that follow each other, in buffers that are used again for the next.
#[derive(Debug, Default)]
pub struct Block {
    records: Vec<Record>,
    used: usize,
    first: u64,
}

impl Block {
    /// Number of rows.
    pub fn count(&self) -> usize {
        self.used
    }

    /// Bytes of the rows, as far as a delimiter stands behind each cell.
    pub fn bytes(&self) -> usize {
        self.records.iter().take(self.used).map(|r| r.size() + r.width()).sum()
    }

    /// The rows, named by that header.
    pub fn rows<'r>(&'r self, header: &'r Header) -> impl Iterator<Item = LogRow<'r>> {
        self.records.iter().take(self.used).zip(self.first..).map(move |(record, number)| LogRow { header, record, number })
    }
}
