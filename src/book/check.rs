//! Whether the chain of seals holds, and where it does not.

use super::entry::Entry;
use super::read::Book;
use super::seal::Seal;
use std::collections::{BTreeMap, BTreeSet};
use std::fmt;

/// Rows ahead that are asked whether the chain goes on without the row in doubt.
const AHEAD: usize = 200;

/// Something that the seals do not bear out.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Finding {
    /// The cells of an entry, or its seal, are not what was sealed.
    Altered {
        /// Its number.
        entry: u64,
        /// Its line.
        line: u64,
    },
    /// Entries are missing between two others.
    Removed {
        /// The first of them.
        first: u64,
        /// The last of them.
        last: u64,
        /// Line of the entry that now stands in their place.
        line: u64,
    },
    /// A row that the chain does not need.
    Inserted {
        /// The number that it claims.
        entry: Option<u64>,
        /// Its line.
        line: u64,
    },
    /// An entry that stands before the one it was sealed after.
    Moved {
        /// Its number.
        entry: u64,
        /// Its line.
        line: u64,
    },
    /// A last line that was cut short.
    Torn {
        /// Its length, bytes.
        length: usize,
    },
}

impl Finding {
    /// Its name in JSON.
    pub fn id(&self) -> &'static str {
        match self {
            Self::Altered { .. } => "altered",
            Self::Removed { .. } => "removed",
            Self::Inserted { .. } => "inserted",
            Self::Moved { .. } => "moved",
            Self::Torn { .. } => "torn",
        }
    }

    /// The entry that it names, and the line.
    pub fn place(&self) -> (Option<u64>, Option<u64>) {
        match self {
            Self::Altered { entry, line } | Self::Moved { entry, line } => (Some(*entry), Some(*line)),
            Self::Removed { first, line, .. } => (Some(*first), Some(*line)),
            Self::Inserted { entry, line } => (*entry, Some(*line)),
            Self::Torn { .. } => (None, None),
        }
    }
}

impl fmt::Display for Finding {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Altered { entry, line } => {
                write!(f, "entry {entry} (line {line}) is not as it was sealed: a cell or the seal itself was altered")
            }
            Self::Removed { first, last, line } if first == last => write!(f, "entry {first} was removed: it stood before line {line}"),
            Self::Removed { first, last, line } => write!(f, "entries {first} to {last} were removed: they stood before line {line}"),
            Self::Inserted { entry: Some(entry), line } => {
                write!(f, "line {line} (it says entry {entry}) was inserted: no seal carries on from it")
            }
            Self::Inserted { entry: None, line } => write!(f, "line {line} was inserted: it has no number, and no seal carries on from it"),
            Self::Moved { entry, line } => {
                write!(f, "entry {entry} (line {line}) was moved: it stands before the entry that it was sealed after")
            }
            Self::Torn { length } => {
                write!(f, "the last line was cut short ({length} bytes): an entry that was never confirmed; the next one sets it aside")
            }
        }
    }
}

/// What the seals of a book show.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Check {
    /// How many entries stand in it.
    pub entries: usize,
    /// Number and seal of the last that has one.
    pub last: Option<(u64, Seal)>,
    /// What they do not bear out, in the order of the file; none where the chain holds.
    pub findings: Vec<Finding>,
    /// Columns with something in them that no seal covers.
    pub unsealed: Vec<String>,
}

/// Checks every seal against its entry and the seal before it.
///
/// # What it cannot show
/// A tail that was cut off, and a whole file written anew: see the [module](crate::book).
pub fn check(book: &Book) -> Check {
    let mut chain = Chain::of(&book.entries);
    for at in 0..book.entries.len() {
        chain.step(at);
    }
    let mut findings = chain.findings;
    findings.extend(book.torn.map(|torn| Finding::Torn { length: torn.length }));
    Check { entries: book.entries.len(), last: book.last_seal(), findings, unsealed: book.unsealed.clone() }
}

/// The walk along the rows.
struct Chain<'b> {
    entries: &'b [Entry],
    by_number: BTreeMap<u64, Vec<usize>>,
    /// The seal that the next entry hangs on; `None` where that of the one before was lost.
    before: Option<Seal>,
    expected: u64,
    /// Rows found to be no part of the chain.
    aside: BTreeSet<usize>,
    findings: Vec<Finding>,
}

/// Where the entry stands that another was sealed after.
enum After {
    Start,
    Row(usize),
}

impl<'b> Chain<'b> {
    fn of(entries: &'b [Entry]) -> Self {
        let mut by_number: BTreeMap<u64, Vec<usize>> = BTreeMap::new();
        for (at, entry) in entries.iter().enumerate() {
            if let Some(number) = entry.number {
                by_number.entry(number).or_default().push(at);
            }
        }
        Self { entries, by_number, before: Some(Seal::BEFORE_FIRST), expected: 1, aside: BTreeSet::new(), findings: Vec::new() }
    }

    fn step(&mut self, at: usize) {
        let Some(entry) = self.entries.get(at) else { return };
        if self.carries_on(entry) {
            self.go_on(entry.seal, entry.number);
        } else if self.is_copy(at, entry) {
            self.set_aside(at, entry);
        } else if let Some(after) = self.sealed_after(entry) {
            self.out_of_line(at, entry, after);
        } else if self.entries.iter().skip(at + 1).take(AHEAD).any(|later| self.carries_on(later)) {
            self.set_aside(at, entry);
        } else {
            self.broken(at, entry);
        }
    }

    /// Whether it is the next entry of the chain.
    fn carries_on(&self, entry: &Entry) -> bool {
        entry.number == Some(self.expected) && self.before.map_or(entry.seal.is_some(), |before| entry.fits(&before))
    }

    fn go_on(&mut self, seal: Option<Seal>, number: Option<u64>) {
        self.before = seal;
        self.expected = number.unwrap_or(self.expected).saturating_add(1);
    }

    fn set_aside(&mut self, at: usize, entry: &Entry) {
        self.aside.insert(at);
        self.findings.push(Finding::Inserted { entry: entry.number, line: entry.line });
    }

    /// Whether the same entry, seal and all, stood before.
    fn is_copy(&self, at: usize, entry: &Entry) -> bool {
        let alike = entry.number.and_then(|number| self.by_number.get(&number)).into_iter().flatten();
        alike.filter(|other| **other < at).any(|other| self.entries.get(*other).is_some_and(|o| o.seal.is_some() && o.cells == entry.cells))
    }

    /// Where the entry stands that this one was sealed after, anywhere in the file.
    fn sealed_after(&self, entry: &Entry) -> Option<After> {
        let before = entry.number?.checked_sub(1)?;
        if before == 0 && entry.fits(&Seal::BEFORE_FIRST) {
            return Some(After::Start);
        }
        let rows = self.by_number.get(&before)?;
        rows.iter().copied().find(|row| self.entries.get(*row).and_then(|e| e.seal).is_some_and(|seal| entry.fits(&seal))).map(After::Row)
    }

    /// A sound entry in the wrong place, or behind rows that do not belong there.
    fn out_of_line(&mut self, at: usize, entry: &Entry, after: After) {
        let first = match after {
            After::Start => 0,
            After::Row(row) if row > at => {
                self.aside.insert(at);
                self.findings.push(Finding::Moved { entry: entry.number.unwrap_or(0), line: entry.line });
                return;
            }
            // Its own place is known to be wrong; nothing between is.
            After::Row(row) if self.aside.contains(&row) => at,
            After::Row(row) => row + 1,
        };
        for between in first..at {
            if let Some(other) = self.entries.get(between).filter(|_| !self.aside.contains(&between)) {
                self.set_aside(between, other);
            }
        }
        self.go_on(entry.seal, entry.number);
    }

    /// Nothing in the file bears the row out.
    fn broken(&mut self, at: usize, entry: &Entry) {
        let later = |number: u64| self.by_number.range(number + 1..).next().is_some();
        match entry.number {
            Some(number) if number > self.expected => {
                self.findings.push(Finding::Removed { first: self.expected, last: number - 1, line: entry.line });
                self.go_on(entry.seal, entry.number);
            }
            // Written by hand at the end, without a seal.
            Some(number) if number == self.expected && (entry.seal.is_some() || later(number)) => {
                self.findings.push(Finding::Altered { entry: number, line: entry.line });
                // Where the seal itself was altered, the next entry still hangs on the one that was there.
                let own = self.before.map(|before| entry.sealed_after(&before));
                let next = self.entries.get(at + 1);
                let seal = own.filter(|own| next.is_some_and(|next| next.fits(own))).or(entry.seal);
                self.go_on(seal, entry.number);
            }
            _ => self.set_aside(at, entry),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::book::cells::EntryCells;
    use crate::logbook::columns::Column;

    /// A sound book of `count` entries.
    fn made(count: u64) -> Book {
        let mut book = Book::empty("book.csv");
        for number in 1..=count {
            push(&mut book.entries, number, "Sun");
        }
        book
    }

    /// Adds an entry that is sealed as it should be.
    fn push(entries: &mut Vec<Entry>, number: u64, body: &str) {
        let before = entries.last().and_then(|e| e.seal).unwrap_or(Seal::BEFORE_FIRST);
        let entry = sealed(number, body, &before, entries.len() as u64 + 2);
        entries.push(entry);
    }

    fn sealed(number: u64, body: &str, before: &Seal, line: u64) -> Entry {
        let mut cells = EntryCells::default();
        cells.put("entry", &number.to_string());
        cells.set(Column::Body, body);
        let seal = Entry::of(line, cells.clone()).sealed_after(before);
        cells.put("seal", &seal.to_string());
        Entry::of(line, cells)
    }

    fn found(book: &Book) -> Vec<(&'static str, Option<u64>)> {
        check(book).findings.iter().map(|f| (f.id(), f.place().0)).collect()
    }

    /// The same entry with another cell.
    fn altered(entry: &Entry, name: &'static str, text: &str) -> Entry {
        let mut cells = entry.cells.clone();
        cells.put(name, text);
        Entry::of(entry.line, cells)
    }

    #[test]
    fn a_sound_book() {
        assert!(found(&made(0)).is_empty() && found(&made(1)).is_empty() && found(&made(30)).is_empty());
    }

    #[test]
    fn one_cell_or_one_seal_altered() {
        for at in [0, 4, 9] {
            for (name, text) in [("body", "Moon"), ("seal", &Seal::BEFORE_FIRST.to_string()), ("remarks", "so")] {
                let mut book = made(10);
                book.entries[at] = altered(&book.entries[at], name, text);
                assert_eq!(found(&book), [("altered", Some(at as u64 + 1))], "{name} of {at}");
            }
        }
        let mut book = made(10);
        book.entries[4] = altered(&book.entries[4], "seal", "");
        assert_eq!(found(&book), [("altered", Some(5))]);
    }

    #[test]
    fn removed_from_the_middle_or_the_start() {
        for (from, to) in [(0, 1), (3, 4), (3, 6), (0, 9)] {
            let mut book = made(10);
            book.entries.drain(from..to);
            assert_eq!(found(&book), [("removed", Some(from as u64 + 1))]);
        }
    }

    #[test]
    fn inserted_with_and_without_a_seal_that_fits() {
        for at in [0_usize, 1, 5, 9] {
            let mut book = made(10);
            let before = at.checked_sub(1).and_then(|b| book.entries[b].seal).unwrap_or(Seal::BEFORE_FIRST);
            book.entries.insert(at, sealed(at as u64 + 1, "Moon", &before, 99));
            assert_eq!(found(&book), [("inserted", Some(at as u64 + 1))], "sealed, at {at}");
            let mut cells = EntryCells::default();
            cells.set(Column::Body, "Moon");
            book.entries[at] = Entry::of(99, cells.clone());
            assert_eq!(found(&book), [("inserted", None)], "without number or seal, at {at}");
            cells.put("entry", &(at + 1).to_string());
            book.entries[at] = Entry::of(99, cells);
            assert_eq!(found(&book), [("inserted", Some(at as u64 + 1))], "without seal, at {at}");
        }
        let mut book = made(10);
        book.entries.insert(7, book.entries[5].clone());
        assert_eq!(found(&book), [("inserted", Some(6))], "a copy");
        let mut book = made(3);
        book.entries.push(Entry::of(9, EntryCells::default()));
        assert_eq!(found(&book), [("inserted", None)], "by hand at the end");
    }

    #[test]
    fn moved() {
        let mut book = made(10);
        book.entries.swap(4, 5);
        assert_eq!(found(&book), [("moved", Some(6))]);
        let mut book = made(4);
        book.entries.reverse();
        assert_eq!(found(&book), [("moved", Some(4)), ("moved", Some(3)), ("moved", Some(2))]);
    }

    /// What no chain can show; the signed page does.
    #[test]
    fn a_tail_cut_off_is_not_shown_but_its_seal_is_missed() {
        let mut book = made(10);
        let (_, seal) = book.last_seal().unwrap();
        assert_eq!(book.entry_sealed(&seal.to_string()).unwrap().number, Some(10));
        book.entries.truncate(7);
        assert!(found(&book).is_empty() && book.entry_sealed(&seal.to_string()).is_none());
    }

    #[test]
    fn several_places_are_all_named_in_order() {
        let mut book = made(20);
        book.entries[15] = altered(&book.entries[15], "body", "Moon");
        book.entries.remove(10);
        book.entries[3] = altered(&book.entries[3], "body", "Moon");
        assert_eq!(found(&book), [("altered", Some(4)), ("removed", Some(11)), ("altered", Some(16))]);
    }
}
