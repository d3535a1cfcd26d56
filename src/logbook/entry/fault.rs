//! What is wrong with a row.

use crate::error::BadValue;
use crate::logbook::columns::Column;
use std::fmt;

/// One cell, or one missing, and what is wrong with it.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Fault {
    /// The column.
    pub column: &'static str,
    /// What is wrong.
    pub bad: BadValue,
}

/// `lat: "95": expected ...; hint`.
impl fmt::Display for Fault {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}: {}", self.column, self.bad)
    }
}

/// Everything that is wrong with a row.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct Faults {
    list: Vec<Fault>,
    essential: bool,
}

/// Columns without which there is no direction to reckon from.
const ESSENTIAL: [Column; 17] = [
    Column::Utc,
    Column::ShipTime,
    Column::Zone,
    Column::UtcOffset,
    Column::Date,
    Column::UtcTime,
    Column::Time,
    Column::Lat,
    Column::Lon,
    Column::Position,
    Column::Body,
    Column::Method,
    Column::Horizon,
    Column::Limb,
    Column::ChartedBearing,
    Column::GyroType,
    Column::Where,
];

impl Faults {
    /// Adds a fault of a cell.
    pub fn add(&mut self, column: Column, bad: BadValue) {
        self.essential |= ESSENTIAL.contains(&column);
        self.list.push(Fault { column: column.info().name, bad });
    }

    /// Says that a fault of `column`, where there is one, leaves nothing to reckon from in this row.
    pub(super) fn need(&mut self, column: Column) {
        self.essential |= self.list.iter().any(|fault| fault.column == column.info().name);
    }

    /// Adds a fault of the row as a whole; `what` stands where a column's name would.
    pub fn add_row(&mut self, what: &'static str, bad: BadValue) {
        self.essential = true;
        self.list.push(Fault { column: what, bad });
    }

    /// Forgets all.
    pub fn clear(&mut self) {
        self.list.clear();
        self.essential = false;
    }

    /// Whether one of them leaves nothing to reckon from.
    pub fn essential(&self) -> bool {
        self.essential
    }

    /// Whether there is none.
    pub fn is_empty(&self) -> bool {
        self.list.is_empty()
    }

    /// Each of them.
    pub fn iter(&self) -> impl Iterator<Item = &Fault> {
        self.list.iter()
    }

    /// All in one cell, ` | ` between.
    pub fn in_one(&self) -> String {
        self.list.iter().map(ToString::to_string).collect::<Vec<_>>().join(" | ")
    }
}
