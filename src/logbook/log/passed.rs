//! Rows of a ship's own book that are no observations to be reviewed.

use super::cells::{Cells, text_of};
use super::reader::{LogReader, LogRow};
use super::record::Record;
use crate::error::Result;
use crate::logbook::columns::{Column, KEPT};
use std::collections::{BTreeMap, BTreeSet};
use std::io::Read;

/// Which rows of a log are passed over: where it is a book, signatures, entries that only strike another through, and entries that
/// were struck through. In any other log, none.
#[derive(Debug, Clone, Default)]
pub struct Passed {
    places: Option<Places>,
    /// Numbers of the rows that were struck through.
    struck: BTreeSet<u64>,
}

/// Where a book's own columns stand.
#[derive(Debug, Clone, Copy)]
struct Places {
    corrects: usize,
    signed: usize,
}

impl Passed {
    /// Reads a book through, for an entry is struck through by a later one; of another log the header alone. Several books may have been
    /// gathered in one log: `book_of` tells by the number of a row which it stood in.
    ///
    /// # Errors
    /// As reading the log.
    pub fn of<R: Read>(mut log: LogReader<R>, book_of: impl Fn(u64) -> usize) -> Result<Self> {
        let names: Vec<String> = log.titles.cells().map(|c| text_of(c).to_ascii_lowercase()).collect();
        let place = |name: &str| names.iter().position(|n| n == name);
        // All of them: a log of another kind may well have a column entry.
        if KEPT.iter().any(|column| place(column.name).is_none()) {
            return Ok(Self::default());
        }
        let (Some(entry), Some(corrects), Some(signed)) = (place("entry"), place("corrects"), place("signed")) else {
            return Ok(Self::default());
        };
        let (mut rows, mut corrected) = (BTreeMap::new(), Vec::new());
        let mut record = Record::default();
        while let Some(row) = log.next(&mut record)? {
            let book = book_of(row.number);
            corrected.extend(number(row.record, corrects).map(|entry| (book, entry)));
            if let Some(entry) = number(row.record, entry) {
                rows.insert((book, entry), row.number);
            }
        }
        let struck = corrected.iter().filter_map(|entry| rows.get(entry).copied()).collect();
        Ok(Self { places: Some(Places { corrects, signed }), struck })
    }

    /// Whether the row is passed over.
    pub fn is(&self, row: &LogRow) -> bool {
        let Some(places) = self.places else { return false };
        let signed = row.record.cell(places.signed).is_some_and(|cell| !text_of(cell).is_empty());
        let blank = |column| row.text(column).is_empty();
        let only_strikes = number(row.record, places.corrects).is_some() && blank(Column::Method) && blank(Column::Body);
        signed || only_strikes || self.struck.contains(&row.number)
    }

    /// Whether the row stands in the place of an earlier one, so that its time belongs further up.
    pub fn is_late(&self, row: &LogRow) -> bool {
        self.places.is_some_and(|places| number(row.record, places.corrects).is_some())
    }
}

/// The number of an entry.
fn number(record: &Record, place: usize) -> Option<u64> {
    let number: f64 = text_of(record.cell(place)?).parse().ok()?;
    (number >= 1.0 && number.fract() == 0.0).then_some(number as u64)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn passed(log: &str) -> Vec<(bool, bool)> {
        let open = || LogReader::new(log.as_bytes(), "log", false).unwrap();
        let passed = Passed::of(open(), |_| 0).unwrap();
        let (mut log, mut record, mut found) = (open(), Record::default(), Vec::new());
        while let Some(row) = log.next(&mut record).unwrap() {
            found.push((passed.is(&row), passed.is_late(&row)));
        }
        found
    }

    #[test]
    fn struck_entries_strikes_and_signatures() {
        let rows = "t,1,2,Sun,,1,,,,,s\nt,1,2,Sun,,2,,,,,s\n,,,Moon,,3,,1,why,,s\n,,,,,4,,2,why,,s\n,,,,,5,,,,Master,s\n,,,,none,6,,,,,s\n";
        let book = format!("utc,lat,lon,body,method,entry,recorded_utc,corrects,reason,signed,seal\n{rows}");
        let (yes, no) = (true, false);
        assert_eq!(passed(&book), [(yes, no), (yes, no), (no, yes), (yes, yes), (yes, no), (no, no)]);
        // Without a seal it is no book.
        let log = format!("utc,lat,lon,body,method,entry,recorded_utc,corrects,reason,signed,seals\n{rows}");
        assert!(passed(&log).iter().all(|found| *found == (no, no)));
    }
}
