//! A log: a header, and rows under it.

use super::cells::Cells;
use super::header::Header;
use super::record::{LONGEST_ROW, MOST_CELLS, Record, Records};
use crate::error::{Error, Result};
use crate::logbook::columns::Column;
use std::io::Read;

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

/// Reads a log.
pub struct LogReader<R: Read> {
    records: Records<R>,
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
        let mut records = Records::new(source)?;
        let mut titles = Record::default();
        let content = |line, message: String| Error::Content { file: name.to_owned(), line, message };
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
        let header = Header::read(titles.cells(), again).map_err(|message| content(titles.line, message))?;
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
    /// The rows, named by that header.
    pub fn rows<'r>(&'r self, header: &'r Header) -> impl Iterator<Item = LogRow<'r>> {
        self.records.iter().take(self.used).zip(self.first..).map(move |(record, number)| LogRow { header, record, number })
    }
}
