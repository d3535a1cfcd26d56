//! One entry of a book.

use super::cells::EntryCells;
use super::seal::{Digested, Seal, plain_figure};
use crate::logbook::columns::Column;
use crate::time::UtcInstant;
use crate::time::text::read_utc;

/// What an entry is.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Kind {
    /// Something was observed.
    Observation,
    /// Nothing could be had; the remarks say why.
    Nothing,
    /// It strikes another entry through and puts nothing in its place.
    Strike,
    /// It confirms the entries before it.
    Signature,
}

/// An entry as it stands in the file.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Entry {
    /// Line of the file, from 1.
    pub line: u64,
    /// Its number, where one can be read.
    pub number: Option<u64>,
    /// The entry that it strikes through.
    pub corrects: Option<u64>,
    /// Its seal, where one can be read.
    pub seal: Option<Seal>,
    /// Its cells.
    pub cells: EntryCells,
    digested: Digested,
}

impl Entry {
    pub(super) fn of(line: u64, cells: EntryCells) -> Self {
        let whole = |name| plain_figure(cells.named(name)).and_then(|figure| figure.parse().ok());
        let (number, corrects) = (whole("entry"), whole("corrects"));
        Self { line, number, corrects, seal: Seal::read(cells.named("seal")), digested: cells.digested(), cells }
    }

    /// What it is.
    pub fn kind(&self) -> Kind {
        let blank = |column| self.cells.get(column).is_empty();
        if !self.cells.named("signed").is_empty() {
            Kind::Signature
        } else if self.corrects.is_some() && blank(Column::Method) && blank(Column::Body) {
            Kind::Strike
        } else if self.cells.get(Column::Method).eq_ignore_ascii_case("none") {
            Kind::Nothing
        } else {
            Kind::Observation
        }
    }

    /// When it happened: the time observed, else when it was entered.
    pub fn at(&self) -> Option<UtcInstant> {
        [self.cells.get(Column::Utc), self.cells.named("recorded_utc")].iter().find_map(|text| read_utc(text).ok()).map(|m| m.utc)
    }

    /// The seal that its cells give after that of the entry before.
    pub(super) fn sealed_after(&self, before: &Seal) -> Seal {
        self.digested.after(before)
    }

    /// Whether its seal is that of its cells after `before`.
    pub(super) fn fits(&self, before: &Seal) -> bool {
        self.seal == Some(self.sealed_after(before))
    }
}
