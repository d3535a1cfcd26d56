//! What the endpoints have at hand.

use super::Address;
use super::record::Record;
use serde_json::{Map, Value};
use shadowpin::compass::card::Cards;
use shadowpin::limits::Limits;
use std::fmt;
use std::sync::{Mutex, MutexGuard, PoisonError};

/// Asks what the ship's instruments say now.
pub type Heard = Box<dyn Fn() -> Value + Send + Sync>;

/// The ship, her book and her instruments.
pub struct Desk {
    /// Where the page answers.
    pub address: Address,
    /// The limits in force.
    pub limits: Limits,
    /// The deviation cards.
    pub cards: Option<Cards>,
    /// What the page calls them.
    pub card_name: Option<String>,
    /// Whether a card is read in a straight line.
    pub card_as_given: bool,
    /// The ship's instruments.
    pub heard: Option<Heard>,
    /// Cells that are filled in from the start, by column.
    pub given: Map<String, Value>,
    /// Whether it opens in night colours.
    pub night: bool,
    /// The book, where there is one.
    pub record: Option<Mutex<Record>>,
}

impl Desk {
    /// The book, for one at a time; a panic while it was held leaves it as usable as a crash would.
    pub fn record(&self) -> Option<MutexGuard<'_, Record>> {
        self.record.as_ref().map(|record| record.lock().unwrap_or_else(PoisonError::into_inner))
    }
}

impl fmt::Debug for Desk {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.debug_struct("Desk").field("host", &self.address.host).finish_non_exhaustive()
    }
}
