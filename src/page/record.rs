//! The ship's book: its last entries, and one more.

use serde_json::{Value, json};
use shadowpin::book::{Appended, Book, EntryCells, Kind, append};
use shadowpin::compass::{Target, work};
use shadowpin::error::{BadValue, Error, Result};
use shadowpin::limits::Limits;
use shadowpin::logbook::columns::Column;
use shadowpin::logbook::entry::{Faults, ReadAs, read_entry};
use shadowpin::time::UtcInstant;
use shadowpin::watch::{Before, Kept, Typed};
use std::io::ErrorKind;
use std::path::PathBuf;
use std::sync::Arc;
use std::time::SystemTime;

/// Entries looked back to.
const LAST: usize = 200;

/// A book, and what was read of it.
#[derive(Debug)]
pub struct Record {
    path: PathBuf,
    /// Length and date of the file that `before` was read from.
    seen: Option<(u64, SystemTime)>,
    before: Arc<[Before]>,
}

impl Record {
    /// The book of that name; it is begun with its first entry.
    ///
    /// # Errors
    /// Where there is a file that is no book.
    pub fn open(path: PathBuf, limits: &Limits) -> Result<Self> {
        let mut record = Self { path, seen: None, before: Arc::from([]) };
        record.before(limits)?;
        Ok(record)
    }

    /// What the page calls it.
    pub fn name(&self) -> String {
        self.path.file_name().unwrap_or(self.path.as_os_str()).to_string_lossy().into_owned()
    }

    /// The last entries that are not struck through, oldest first. The file is read where it has changed.
    pub fn before(&mut self, limits: &Limits) -> Result<Arc<[Before]>> {
        let now = match std::fs::metadata(&self.path) {
            Ok(metadata) => (metadata.len(), metadata.modified().unwrap_or(SystemTime::UNIX_EPOCH)),
            Err(why) if why.kind() == ErrorKind::NotFound => {
                (self.seen, self.before) = (None, Arc::from([]));
                return Ok(Arc::clone(&self.before));
            }
            Err(source) => return Err(Error::File { path: self.path.clone(), source }),
        };
        if self.seen != Some(now) {
            let book = Book::open(&self.path)?;
            let stands = |entry: &&shadowpin::book::Entry| entry.number.is_none_or(|number| book.struck_by(number).is_none());
            let observed = book.entries.iter().rev().filter(|e| e.kind() == Kind::Observation).filter(stands).take(LAST);
            let mut before: Vec<Before> = observed.filter_map(|e| Before::of(&e.cells, Kept::Book, limits)).collect();
            before.sort_by_key(|b| b.utc);
            (self.seen, self.before) = (Some(now), before.into());
        }
        Ok(Arc::clone(&self.before))
    }

    /// Enters what was typed, worked; or the faults that keep it out.
    ///
    /// # Errors
    /// Where the book cannot be written to.
    pub fn add(&mut self, typed: &Typed, limits: &Limits) -> Result<std::result::Result<Appended, Vec<Value>>> {
        let cells = match entry(typed, limits) {
            Ok(cells) => cells,
            Err(faults) => return Ok(Err(faults)),
        };
        let added = append(&self.path, true, |_| {
            let mut cells = cells;
            cells.set_recorded(UtcInstant::from_unix_ms(chrono::Utc::now().timestamp_millis())?);
            Ok(cells)
        })?;
        // Dates of files are coarse: a second entry of the same length and moment must be seen too.
        self.seen = None;
        Ok(Ok(added))
    }
}

/// The cells of an entry: as typed, the time in UTC, body and method in so many words, and what was worked out.
fn entry(typed: &Typed, limits: &Limits) -> std::result::Result<EntryCells, Vec<Value>> {
    let mut faults = Faults::default();
    let entry = read_entry(typed, ReadAs::default(), &mut faults);
    if let Some(observation) = &entry.observation
        && observation.target != Target::Headings
        && observation.gyro_bearing.is_none()
        && observation.compass_bearing.is_none()
    {
        faults.add(Column::GyroBearing, BadValue::new("", "a bearing by gyro or by magnetic compass").hint("an entry without one is none"));
    }
    if entry.nothing_had && entry.remarks.trim().is_empty() {
        faults.add(Column::Remarks, BadValue::new("", "why nothing could be had"));
    }
    if entry.moment.is_none() && faults.is_empty() {
        faults.add(Column::Utc, BadValue::new("", "when it was"));
    }
    let mut cells = EntryCells::default();
    typed.iter().for_each(|(column, text)| cells.set(column, text));
    let Some(moment) = entry.moment.filter(|_| faults.is_empty()) else {
        return Err(faults.iter().map(|f| json!({"field": f.column, "text": f.bad.to_string()})).collect());
    };
    cells.set_moment(moment, entry.zone);
    if let Some(observation) = entry.observation {
        if let Some(body) = observation.body() {
            cells.set(Column::Body, body.name());
        }
        if cells.get(Column::Method).is_empty() {
            cells.set(Column::Method, "azimuth");
        }
        cells.set_worked(&work(&observation, None, limits));
    }
    Ok(cells)
}
