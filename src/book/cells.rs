//! The cells of one entry.

use super::seal::{Digested, sealed_names};
use crate::angle::text::write::{direction, east_west, low_high};
use crate::compass::Worked;
use crate::logbook::columns::Column;
use crate::logbook::log::Cells;
use crate::time::text::write as time_text;
use crate::time::{Moment, UtcInstant, Zone};
use std::collections::BTreeMap;

/// The longest cell that is taken, bytes.
const LONGEST_CELL: usize = 4000;

/// Cells by the name of their column; blank ones are not there.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct EntryCells {
    by_name: BTreeMap<&'static str, String>,
}

impl EntryCells {
    /// Puts a text under a log's column, on one line and without blanks about it; nothing empties the cell.
    pub fn set(&mut self, column: Column, text: &str) {
        self.put(column.info().name, text);
    }

    /// The text under a log's column.
    pub fn get(&self, column: Column) -> &str {
        self.named(column.info().name)
    }

    /// The text under a column of a log or a book.
    pub fn named(&self, name: &str) -> &str {
        self.by_name.get(name).map_or("", String::as_str)
    }

    /// Every cell that is not blank, by order of the columns' names.
    pub fn iter(&self) -> impl Iterator<Item = (&'static str, &str)> {
        self.by_name.iter().map(|(name, text)| (*name, text.as_str()))
    }

    /// Whether there is nothing in it.
    pub fn is_empty(&self) -> bool {
        self.by_name.is_empty()
    }

    /// Whether anything stands under a log's column.
    pub fn says_anything(&self) -> bool {
        Column::ALL.iter().any(|c| !self.get(*c).is_empty())
    }

    /// When. Written as UTC in the step that it was given in, with the zone beside it: a ship's time in a cell of its own would come back
    /// from a spreadsheet in the order of dates of its country.
    pub fn set_moment(&mut self, moment: Moment, zone: Option<Zone>) {
        for column in [Column::ShipTime, Column::UtcOffset, Column::Date, Column::UtcTime, Column::Time] {
            self.set(column, "");
        }
        let text = if moment.step_s >= 60.0 {
            moment.utc.to_chrono().format("%Y-%m-%dT%H:%MZ").to_string()
        } else if moment.step_s >= 1.0 {
            time_text::iso(moment.utc)
        } else {
            moment.utc.to_chrono().format("%Y-%m-%dT%H:%M:%S%.3fZ").to_string()
        };
        self.set(Column::Utc, &text);
        // With a word before it, for a spreadsheet takes the plus from +3.5, and a zone needs its sign.
        self.set(Column::Zone, &zone.map_or_else(String::new, |zone| format!("ZD {}", time_text::zone(zone))));
    }

    /// What the program worked out, under the columns of what an officer works out: to 0.1, each with its name.
    pub fn set_worked(&mut self, worked: &Worked) {
        let by_bearing = worked.compass_error.is_some();
        let compass_error = if by_bearing { worked.compass_error } else { worked.compass_error_by_comparison };
        let deviation = if by_bearing { worked.deviation } else { worked.deviation_by_comparison };
        let text = |text: Option<String>| text.unwrap_or_default();
        self.set(Column::LoggedAzimuth, &text(worked.true_azimuth.map(|z| direction(z.deg(), 1))));
        self.set(Column::LoggedGyroError, &text(worked.gyro_error.map(|e| low_high(e.value.deg()))));
        self.set(Column::LoggedCompassError, &text(compass_error.map(|e| east_west(e.value.deg()))));
        let variation = worked.variation.filter(|_| compass_error.is_some());
        self.set(Column::LoggedVariation, &text(variation.map(|v| east_west(v.value.deg()))));
        self.set(Column::LoggedDeviation, &text(deviation.map(|d| east_west(d.value.deg()))));
    }

    /// That the entry strikes another through, and why.
    pub fn set_corrects(&mut self, entry: u64, why: &str) {
        self.put("corrects", &entry.to_string());
        self.put("reason", why);
    }

    /// That it confirms the entries so far, and in what rank.
    pub fn set_signed(&mut self, rank: &str) {
        self.put("signed", rank);
    }

    /// When it is entered, by the computer's clock.
    pub fn set_recorded(&mut self, utc: UtcInstant) {
        self.put("recorded_utc", &time_text::iso(utc));
    }

    /// Puts a text under a column of either kind; a name that is neither's is passed over.
    pub(super) fn put(&mut self, name: &str, text: &str) {
        let Some(name) = sealed_names().find(|known| *known == name) else { return };
        let text = on_one_line(text);
        if text.is_empty() {
            self.by_name.remove(name);
        } else {
            self.by_name.insert(name, text);
        }
    }

    /// As it stands in a file.
    pub(super) fn keep(&mut self, name: &'static str, text: &str) {
        if !text.is_empty() {
            self.by_name.insert(name, text.to_owned());
        }
    }

    pub(super) fn digested(&self) -> Digested {
        Digested::of(self.iter())
    }
}

/// An entry is one line of the file, so that one cut short can be told.
fn on_one_line(text: &str) -> String {
    let mut line: String =
        text.split(|c: char| c.is_control() || c.is_whitespace()).filter(|w| !w.is_empty()).collect::<Vec<_>>().join(" ");
    let end = (0..=LONGEST_CELL.min(line.len())).rev().find(|at| line.is_char_boundary(*at)).unwrap_or(0);
    line.truncate(end);
    line
}

impl Cells for EntryCells {
    fn has(&self, _: Column) -> bool {
        true
    }

    fn bytes(&self, column: Column) -> &[u8] {
        self.get(column).as_bytes()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn cells_stand_on_one_line() {
        let mut cells = EntryCells::default();
        cells.set(Column::Remarks, " two\r\nlines\tand\u{7} more ");
        assert_eq!(cells.get(Column::Remarks), "two lines and more");
        cells.set(Column::Remarks, &"é".repeat(LONGEST_CELL));
        assert_eq!(cells.get(Column::Remarks).len(), LONGEST_CELL);
        cells.set(Column::Remarks, " ");
        assert!(cells.is_empty());
    }
}
