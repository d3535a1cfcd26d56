//! One cell of a sheet as a log would have it written.

use crate::logbook::columns::Column;
use calamine::{DataRef, ExcelDateTime};
use std::fmt::Write as _;

/// Decimals that a figure is written with at most: a sheet's arithmetic leaves dust behind the tenth.
const DECIMALS: usize = 9;

/// A cell's value.
#[derive(Debug, Clone, PartialEq)]
pub enum SheetCell {
    /// Nothing.
    Blank,
    /// Words, or anything that is shown as it stands.
    Text(String),
    /// A figure.
    Number(f64),
    /// A date, a time of day, or both.
    Stamp(Stamp),
}

/// A date and a time of day as a sheet keeps them.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Stamp {
    /// Year, month and day; `None` for a time of day alone.
    date: Option<(u16, u8, u8)>,
    hour: u8,
    minute: u8,
    second: u8,
    ms: u16,
}

impl SheetCell {
    /// From a cell as it was read.
    pub fn of(value: &DataRef) -> Self {
        match value {
            DataRef::Empty => Self::Blank,
            DataRef::Int(n) => Self::Text(n.to_string()),
            DataRef::Float(f) => Self::Number(*f),
            DataRef::String(text) => Self::Text(text.clone()),
            DataRef::SharedString(text) => Self::Text((*text).to_owned()),
            DataRef::Bool(yes) => Self::Text(if *yes { "TRUE" } else { "FALSE" }.to_owned()),
            DataRef::DateTime(stamp) => Self::Stamp(Stamp::of(stamp)),
            DataRef::DateTimeIso(text) | DataRef::DurationIso(text) => Self::Text(text.clone()),
            DataRef::Error(error) => Self::Text(error.to_string()),
        }
    }

    /// Whether there is nothing to read in it.
    pub fn is_blank(&self) -> bool {
        match self {
            Self::Blank => true,
            Self::Text(text) => text.trim().is_empty(),
            _ => false,
        }
    }

    /// The text of the cell under `column` (`None`: one that is carried through).
    pub fn text(&self, column: Option<Column>) -> String {
        match self {
            Self::Blank => String::new(),
            Self::Text(text) => text.clone(),
            Self::Number(value) => number(*value),
            Self::Stamp(stamp) => stamp.text(column),
        }
    }
}

/// The shortest figure that is the same to nine decimals.
fn number(value: f64) -> String {
    if !value.is_finite() || value.abs() >= 1e15 {
        return value.to_string();
    }
    let text = format!("{value:.DECIMALS$}");
    let text = text.trim_end_matches('0').trim_end_matches('.');
    if text == "-0" { "0".to_owned() } else { text.to_owned() }
}

impl Stamp {
    fn of(stamp: &ExcelDateTime) -> Self {
        let (year, month, day, hour, minute, second, ms) = stamp.to_ymd_hms_milli();
        // Under one day there is no date in it.
        let date = (stamp.as_f64() >= 1.0).then_some((year, month, day));
        Self { date, hour, minute, second, ms }
    }

    /// Date and time; only the one that is there, where the column holds one of them. Without seconds where they are nil: a sheet does
    /// not say whether 06:12 was read to the second, and whole minutes claim less.
    fn text(self, column: Option<Column>) -> String {
        let mut clock = format!("{:02}:{:02}", self.hour, self.minute);
        if (self.second, self.ms) != (0, 0) {
            let _ = write!(clock, ":{:02}", self.second);
        }
        if self.ms != 0 {
            let _ = write!(clock, ".{:03}", self.ms);
        }
        let midnight = (self.hour, self.minute, self.second, self.ms) == (0, 0, 0, 0);
        match self.date {
            None => clock,
            Some((year, month, day)) => {
                let date = format!("{year:04}-{month:02}-{day:02}");
                let alone = midnight && !matches!(column, Some(Column::Utc | Column::ShipTime));
                if alone { date } else { format!("{date}T{clock}") }
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use calamine::ExcelDateTimeType;

    fn stamp(value: f64, column: Option<Column>) -> String {
        SheetCell::of(&DataRef::DateTime(ExcelDateTime::new(value, ExcelDateTimeType::DateTime, false))).text(column)
    }

    #[test]
    fn dates_and_times() {
        // 2026-06-14 is day 46187 of the count that has 1900-01-01 as day 1 and a 29 February 1900 that never was.
        assert_eq!(stamp(46_187.0, Some(Column::Date)), "2026-06-14");
        assert_eq!(stamp(46_187.0, Some(Column::Utc)), "2026-06-14T00:00");
        assert_eq!(stamp(46_187.0 + (6.0 * 60.0 + 12.0) / 1440.0, Some(Column::Utc)), "2026-06-14T06:12");
        assert_eq!(stamp(46_187.0 + 22_350.0 / 86_400.0, Some(Column::ShipTime)), "2026-06-14T06:12:30");
        assert_eq!(stamp(22_350.0 / 86_400.0, Some(Column::UtcTime)), "06:12:30");
        assert_eq!(stamp(0.5, Some(Column::Time)), "12:00");
    }

    #[test]
    fn figures() {
        let texts = [0.1 + 0.2, -36.5, 247.0, -0.0, 1e-12, 130.56].map(number);
        assert_eq!(texts, ["0.3", "-36.5", "247", "0", "0", "130.56"]);
    }
}
