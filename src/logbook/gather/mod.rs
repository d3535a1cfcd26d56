//! Several logs as one: files, and sheets of workbooks, each with columns of its own, in the order of time.
//!
//! A log keeps its own order of rows, so that one whose time is a slip stands where it stood; all others go by their times, so that logs
//! of one vessel are woven together and logs of months follow each other. Of every row 32 bytes are held; the rest is on disk.

mod order;
mod places;
mod union;

pub use places::{Part, PartKind, Places};

use super::entry::{Faults, ReadAs, read_entry};
use super::log::{LONGEST_ROW, LogForm, LogReader, Record};
use super::sheet::SheetText;
use crate::error::{Error, Result};
use std::collections::HashMap;
use std::io::{BufReader, BufWriter, Read, Seek, SeekFrom, Write};
use union::{Layout, Union};

/// Gathers logs, one after another.
pub struct Gather<S: Write> {
    form: LogForm,
    read_as: ReadAs,
    union: Union,
    parts: Vec<(Part, Layout)>,
    keys: Vec<Key>,
    spool: BufWriter<S>,
    written: u64,
}

/// Where a row stands in time, and in the spool. Ordered by the fields in turn.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
struct Key {
    unix_ms: i64,
    offset: u64,
    line: u64,
    part: u32,
}

impl<S: Read + Write + Seek> Gather<S> {
    /// Nothing gathered yet. `spool` is an empty file, written and read again.
    pub fn new(form: LogForm, read_as: ReadAs, spool: S) -> Self {
        Self { form, read_as, union: Union::default(), parts: Vec::new(), keys: Vec::new(), spool: BufWriter::new(spool), written: 0 }
    }

    /// Adds a log in comma, semicolon or tab separated text; `file` is its name as it was given.
    ///
    /// # Errors
    /// As [`LogReader::open`].
    pub fn add_file(&mut self, file: &str, source: impl Read) -> Result<()> {
        let log = LogReader::open(source, file, &self.form)?;
        let decimal_comma = self.read_as.decimal_comma;
        self.add(Part { file: file.to_owned(), kind: PartKind::Text }, log, decimal_comma)
    }

    /// Adds a sheet of a workbook, as it was written out.
    ///
    /// # Errors
    /// As [`LogReader::open`].
    pub fn add_sheet(&mut self, file: &str, sheet: &str, text: SheetText, source: impl Read) -> Result<()> {
        let form = LogForm { header: None, ..self.form.clone() };
        let log = LogReader::open(source, &format!("{file}, sheet {sheet}"), &form)?;
        self.add(Part { file: file.to_owned(), kind: PartKind::Sheet { name: sheet.to_owned(), text } }, log, false)
    }

    fn add(&mut self, part: Part, mut log: LogReader<impl Read>, decimal_comma: bool) -> Result<()> {
        let layout = self.union.add(&log.titles, &self.form.names);
        let number = self.parts.len() as u32;
        let read_as = ReadAs { decimal_comma, ..self.read_as };
        let (mut record, mut faults) = (Record::default(), Faults::default());
        let first = self.keys.len();
        let mut by_vessel: HashMap<String, Vec<(usize, Option<i64>)>> = HashMap::new();
        while let Some(row) = log.next(&mut record)? {
            faults.clear();
            let entry = read_entry(&row, read_as, &mut faults);
            let stands = (self.keys.len(), entry.moment.map(|m| m.utc.unix_ms()));
            match by_vessel.get_mut(entry.vessel.as_ref()) {
                Some(rows) => rows.push(stands),
                None => drop(by_vessel.insert(entry.vessel.into_owned(), vec![stands])),
            }
            let line = part.line_of(row.number, row.record.line);
            self.keys.push(Key { unix_ms: i64::MIN, offset: self.written, line, part: number });
            self.keep(&record)?;
        }
        let keys = self.keys.get_mut(first..).unwrap_or_default();
        for rows in by_vessel.into_values() {
            let times: Vec<Option<i64>> = rows.iter().map(|(_, time)| *time).collect();
            for ((at, _), unix_ms) in rows.iter().zip(order::settled(&times)) {
                if let Some(key) = keys.get_mut(at - first) {
                    key.unix_ms = unix_ms;
                }
            }
        }
        self.parts.push((part, layout));
        Ok(())
    }

    /// Writes a row to the spool: the number of its cells, then each with its length before it.
    fn keep(&mut self, record: &Record) -> Result<()> {
        let count = if record.too_long { u32::MAX } else { record.width() as u32 };
        let mut put = |bytes: &[u8]| -> Result<()> {
            self.written += bytes.len() as u64;
            self.spool.write_all(bytes).map_err(spooling)
        };
        put(&count.to_le_bytes())?;
        for cell in record.cells() {
            put(&(cell.len() as u32).to_le_bytes())?;
            put(cell)?;
        }
        Ok(())
    }

    /// Writes all rows as one log in comma separated text, with a column that says where each came from.
    ///
    /// # Errors
    /// [`Error::Stream`] where writing or reading back fails; [`Error::Content`] where a name that was given for a column stands in
    /// none of the logs.
    pub fn finish(mut self, out: impl Write) -> Result<Places> {
        if let Some(message) = self.form.names.missing(self.union.titles.iter().map(String::as_str)) {
            let file = self.parts.first().map_or_else(String::new, |(part, _)| part.file.clone());
            return Err(Error::Content { file, line: 0, message });
        }
        if self.parts.len() > 1 {
            self.keys.sort_unstable();
        }
        let mut spool = self.spool.into_inner().map_err(|e| spooling(e.into_error()))?;
        spool.seek(SeekFrom::Start(0)).map_err(spooling)?;
        let mut spool = Spool { source: BufReader::with_capacity(1 << 16, spool), at: 0 };
        let mut writer = csv::WriterBuilder::new().flexible(true).buffer_capacity(1 << 16).from_writer(out);
        let failed = |e: csv::Error| spooling(e.into());
        writer.write_record(self.union.titles.iter().map(String::as_bytes).chain([self.union.origin().as_bytes()])).map_err(failed)?;
        let mut places = Places::default();
        let (mut cells, mut row): (Vec<Vec<u8>>, Vec<Vec<u8>>) = (Vec::new(), Vec::new());
        let width = self.union.titles.len();
        for key in &self.keys {
            let Some((part, layout)) = self.parts.get(key.part as usize) else { continue };
            let whole = spool.row(key.offset, &mut cells)?;
            layout.lay(&mut cells, &mut row, width, part.cell_of(key.line).into_bytes());
            if !whole {
                // As it was: longer than a row can be.
                row.resize(width + 1, Vec::new());
                row.push(vec![b'.'; LONGEST_ROW + 1]);
            }
            writer.write_record(&row).map_err(failed)?;
            places.add(key.part, key.line);
        }
        writer.flush().map_err(spooling)?;
        places.parts = self.parts.into_iter().map(|(part, _)| part).collect();
        Ok(places)
    }
}

fn spooling(source: std::io::Error) -> Error {
    Error::Stream { what: "gathering the logs in a temporary file", source }
}

/// Rows read back, mostly one behind the other.
struct Spool<S> {
    source: BufReader<S>,
    at: u64,
}

impl<S: Read + Seek> Spool<S> {
    /// The row at `offset`; false where it had been too long to keep.
    fn row(&mut self, offset: u64, cells: &mut Vec<Vec<u8>>) -> Result<bool> {
        if offset != self.at {
            // Within the buffer where it is near.
            self.source.seek_relative(offset as i64 - self.at as i64).map_err(spooling)?;
            self.at = offset;
        }
        let count = self.number()?;
        cells.clear();
        if count == u32::MAX {
            return Ok(false);
        }
        for _ in 0..count {
            let length = self.number()?;
            let mut cell = vec![0; length as usize];
            self.source.read_exact(&mut cell).map_err(spooling)?;
            self.at += u64::from(length);
            cells.push(cell);
        }
        Ok(true)
    }

    fn number(&mut self) -> Result<u32> {
        let mut bytes = [0; 4];
        self.source.read_exact(&mut bytes).map_err(spooling)?;
        self.at += 4;
        Ok(u32::from_le_bytes(bytes))
    }
}
