//! Reading a book back.

use super::cells::EntryCells;
use super::entry::{Entry, Kind};
use super::seal::{Seal, sealed_names};
use super::torn::{Torn, last_line};
use crate::error::{Error, Result};
use crate::logbook::columns::{Column, KEPT};
use crate::logbook::log::{LogReader, Record, readable};
use std::fs::File;
use std::io::Read as _;
use std::path::Path;
use std::time::Duration;

/// A file larger than this, bytes, is no book: at an entry an hour it is a ship's whole life.
const LARGEST: u64 = 256 << 20;
/// How often a file in use is tried, and the pause between.
pub(super) const TRIES: u32 = 500;
pub(super) const PAUSE: Duration = Duration::from_millis(20);

/// How the file is laid out; an entry is written in the same way.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Layout {
    /// The column at each place; `None` for one that the program does not know.
    pub columns: Vec<Option<&'static str>>,
    pub delimiter: u8,
    pub line_end: &'static str,
    /// Whether a line can be added as bytes of UTF-8.
    pub plain: bool,
}

/// A book as read.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Book {
    /// What messages call it.
    pub name: String,
    /// Its entries, in the order of the file.
    pub entries: Vec<Entry>,
    /// Columns with something in them that no seal covers.
    pub unsealed: Vec<String>,
    /// A last line that is not a whole entry.
    pub torn: Option<Torn>,
    /// Whether the last line has its line end.
    pub(super) ended: bool,
    pub(super) layout: Layout,
}

impl Book {
    /// Reads a book from a file, while nobody writes to it where that can be had.
    ///
    /// # Errors
    /// [`Error::File`] where it cannot be read; as [`Book::parse`].
    pub fn open(path: &Path) -> Result<Self> {
        let failed = |source| Error::File { path: path.to_owned(), source };
        let mut file = File::open(path).map_err(failed)?;
        // A reader must not be kept out for good by a writer that hangs, nor by a disk that knows no locks.
        for _ in 0..TRIES {
            match file.try_lock_shared() {
                Err(std::fs::TryLockError::WouldBlock) => std::thread::sleep(PAUSE),
                _ => break,
            }
        }
        let bytes = content(&mut file).map_err(failed)?;
        Self::parse(&path.display().to_string(), &bytes)
    }

    /// Reads a book from the bytes of its file; `name` stands in messages.
    ///
    /// # Errors
    /// [`Error::Content`] for a file that is no book: without a header of the log's columns, or without those of a book.
    pub fn parse(name: &str, bytes: &[u8]) -> Result<Self> {
        if bytes.is_empty() || is_torn_header(bytes) {
            let torn = (!bytes.is_empty()).then_some(Torn { start: 0, length: bytes.len() });
            return Ok(Self { torn, ..Self::empty(name) });
        }
        let last = last_line(bytes);
        let whole = read(name, bytes)?;
        if last.start > 0 && (last.zeros || !last.ended) {
            let before = read(name, bytes.get(..last.start).unwrap_or_default())?;
            let is_entry = whole.entries.len() > before.entries.len() && is_whole(&whole);
            if last.zeros || !is_entry {
                let torn = Torn { start: last.start, length: bytes.len() - last.start };
                return Ok(Self { torn: Some(torn), ..before });
            }
        }
        Ok(Self { ended: last.ended, ..whole })
    }

    /// A book that is yet to be begun.
    pub(super) fn empty(name: &str) -> Self {
        let columns = Column::ALL.iter().map(|c| Some(c.info().name)).chain(KEPT.iter().map(|c| Some(c.name))).collect();
        let layout = Layout { columns, delimiter: b',', line_end: "\n", plain: true };
        Self { name: name.to_owned(), entries: Vec::new(), unsealed: Vec::new(), torn: None, ended: true, layout }
    }

    /// The entry of that number; the first where several claim it.
    pub fn entry(&self, number: u64) -> Option<&Entry> {
        self.entries.iter().find(|e| e.number == Some(number))
    }

    /// The entry that strikes `number` through; the last where there are several.
    pub fn struck_by(&self, number: u64) -> Option<&Entry> {
        self.entries.iter().rev().find(|e| e.corrects == Some(number))
    }

    /// The number that the next entry gets.
    pub fn next_number(&self) -> u64 {
        self.entries.iter().filter_map(|e| e.number).max().unwrap_or(0).saturating_add(1)
    }

    /// The last seal in the file, with the number of its entry.
    pub fn last_seal(&self) -> Option<(u64, Seal)> {
        self.entries.iter().rev().find_map(|e| Some((e.number.unwrap_or(0), e.seal?)))
    }

    /// The entry whose seal is the one copied from a signed page, or begins so.
    pub fn entry_sealed(&self, text: &str) -> Option<&Entry> {
        self.entries.iter().find(|e| e.seal.is_some_and(|seal| seal.begins(text)))
    }

    /// Entries that may be struck through are neither signatures, nor strikes, nor struck already: why this one is not, where it is not.
    pub fn cannot_be_struck(&self, number: u64) -> Option<String> {
        let Some(entry) = self.entry(number) else {
            let last = self.next_number() - 1;
            return Some(format!("there is no entry {number}; the last is {last}"));
        };
        if let Some(by) = self.struck_by(number) {
            let by_number = by.number.map_or_else(|| format!("on line {}", by.line), |n| n.to_string());
            return Some(format!("entry {number} is struck through already, by entry {by_number}: {}", by.cells.named("reason")));
        }
        match entry.kind() {
            Kind::Signature => Some(format!("entry {number} is a signature: it stands")),
            Kind::Strike => Some(format!("entry {number} strikes another through: enter that one anew instead")),
            Kind::Observation | Kind::Nothing => None,
        }
    }
}

/// The whole of a file that is not too large for a book.
pub(super) fn content(file: &mut File) -> std::io::Result<Vec<u8>> {
    let length = file.metadata()?.len();
    if length > LARGEST {
        return Err(std::io::Error::other(format!("{length} bytes are too many for a book")));
    }
    let mut bytes = Vec::new();
    file.take(LARGEST).read_to_end(&mut bytes)?;
    Ok(bytes)
}

/// The header of a book that is begun, with its line end.
pub(super) fn header() -> String {
    let names: Vec<&str> = sealed_names().collect();
    names.join(",") + "\n"
}

/// Whether the file is the beginning of a book whose first writing was cut short.
fn is_torn_header(bytes: &[u8]) -> bool {
    let header = header();
    bytes.iter().all(|b| *b == 0) || (bytes.len() < header.len() && header.as_bytes().starts_with(bytes))
}

/// Whether the last entry has every column, and a whole seal.
fn is_whole(book: &Book) -> bool {
    book.entries.last().is_some_and(|e| e.seal.is_some() && e.number.is_some())
}

fn read(name: &str, bytes: &[u8]) -> Result<Book> {
    // Columns that a review adds are no fault here: they are named as not sealed.
    let mut log = LogReader::new(bytes, name, true)?;
    let titles: Vec<String> = log.titles.cells().map(|c| readable(c).trim().to_ascii_lowercase()).collect();
    let columns: Vec<Option<&'static str>> = titles.iter().map(|title| sealed_names().find(|name| name == title)).collect();
    let refuse = |message: String| Error::Content { file: name.to_owned(), line: log.titles.line, message };
    for own in KEPT {
        match columns.iter().filter(|c| **c == Some(own.name)).count() {
            1 => {}
            0 => return Err(refuse(format!("no column {}: it is no book; book add begins one in a new file", own.name))),
            _ => return Err(refuse(format!("the column {} stands there twice", own.name))),
        }
    }
    let layout = Layout {
        columns,
        delimiter: log.delimiter(),
        line_end: if bytes.windows(2).any(|w| w == b"\r\n") { "\r\n" } else { "\n" },
        plain: !(bytes.starts_with(&[0xff, 0xfe]) || bytes.starts_with(&[0xfe, 0xff])),
    };
    let mut book = Book { entries: Vec::new(), unsealed: Vec::new(), torn: None, ended: true, name: name.to_owned(), layout };
    let mut record = Record::default();
    while let Some(row) = log.next(&mut record)? {
        if row.record.is_blank() {
            continue;
        }
        let mut cells = EntryCells::default();
        for (at, cell) in row.record.cells().enumerate() {
            let text = readable(cell);
            let text = text.trim();
            match book.layout.columns.get(at).copied().flatten() {
                Some(column) => cells.keep(column, text),
                None if text.is_empty() => {}
                None => {
                    let title = titles.get(at).filter(|t| !t.is_empty()).cloned().unwrap_or_else(|| format!("column {}", at + 1));
                    if !book.unsealed.contains(&title) {
                        book.unsealed.push(title);
                    }
                }
            }
        }
        book.entries.push(Entry::of(row.record.line, cells));
    }
    Ok(book)
}
