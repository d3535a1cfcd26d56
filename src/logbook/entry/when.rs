//! The time of a row, from whichever columns carry it.

use super::{Faults, Reader};
use crate::error::BadValue;
use crate::logbook::columns::Column;
use crate::logbook::log::Cells;
use crate::time::text::write::iso;
use crate::time::text::{TimeOfDay, moment, read_clock_offset, read_date, read_date_time, read_time_of_day, read_utc_ordered, read_zone};
use crate::time::{Moment, Zone};
use chrono::NaiveDate;

/// The columns that a moment can stand in.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Way {
    Utc,
    ShipTime,
    DateAndUtcTime,
    DateAndTime,
}

impl Way {
    /// In the order that they are preferred in.
    const ALL: [Self; 4] = [Self::Utc, Self::ShipTime, Self::DateAndUtcTime, Self::DateAndTime];

    /// The column of the time of day.
    fn column(self) -> Column {
        match self {
            Self::Utc => Column::Utc,
            Self::ShipTime => Column::ShipTime,
            Self::DateAndUtcTime => Column::UtcTime,
            Self::DateAndTime => Column::Time,
        }
    }
}

impl<C: Cells> Reader<'_, C> {
    /// The moment and the zone written; a fault where the time is `needed` and not there.
    ///
    /// A log may keep UTC and ship's time side by side. Then UTC is taken, and the other must say the same to the step that they are
    /// written in; where it has no zone, or cannot be read, it is left alone.
    pub(super) fn moment(&mut self, needed: bool) -> (Option<Moment>, Option<Zone>) {
        let before = self.faults.iter().count();
        let zone = self.zone();
        let zone_at_fault = self.faults.iter().count() > before;
        let mut ways = Way::ALL.map(|way| self.is_written(way).then_some(way)).into_iter().flatten();
        let Some(first) = ways.next() else {
            if needed {
                self.no_time();
            }
            return (None, zone);
        };
        let found = self.by(first, zone, zone_at_fault);
        if let Some(found) = found {
            ways.for_each(|other| self.compare(first, found, other, zone));
        }
        (found, zone)
    }

    fn is_written(&self, way: Way) -> bool {
        let dated = !matches!(way, Way::DateAndUtcTime | Way::DateAndTime) || self.cell(Column::Date).is_some();
        dated && self.cell(way.column()).is_some()
    }

    fn by(&mut self, way: Way, zone: Option<Zone>, zone_at_fault: bool) -> Option<Moment> {
        let order = self.read_as.date_order;
        match way {
            Way::Utc => self.read(Column::Utc, |text| read_utc_ordered(text, order)),
            Way::ShipTime => {
                let local = self.read(Column::ShipTime, |text| read_date_time(text, order));
                self.by_ships_clock(Column::ShipTime, local, zone, zone_at_fault)
            }
            Way::DateAndUtcTime | Way::DateAndTime => {
                let date = self.read(Column::Date, |text| read_date(text, order));
                let time = self.read(way.column(), read_time_of_day);
                if way == Way::DateAndTime {
                    return self.by_ships_clock(Column::Time, date.zip(time), zone, zone_at_fault);
                }
                date.zip(time).and_then(|(date, time)| self.put_together(Column::UtcTime, date, time, Zone::UTC))
            }
        }
    }

    /// A fault where `other`, as far as it can be read, is another moment than the one `found`.
    fn compare(&mut self, first: Way, found: Moment, other: Way, zone: Option<Zone>) {
        let mut unsaid = Faults::default();
        let seen = Reader { cells: self.cells, read_as: self.read_as, faults: &mut unsaid }.by(other, zone, false);
        let Some(seen) = seen.filter(|seen| seen.utc.seconds_since(found.utc).abs() > seen.step_s.max(found.step_s)) else { return };
        let text = self.cell(other.column()).unwrap_or_default();
        let bad = BadValue::new(&text, format!("the moment of {}, {}", first.column().info().name, iso(found.utc)))
            .hint(format!("as written it is {}: which of the two is right?", iso(seen.utc)));
        self.faults.add(other.column(), bad);
    }

    /// Says what is missing, of the columns that the log has.
    fn no_time(&mut self) {
        let half = self.cell(Column::Date).is_some() || self.cell(Column::UtcTime).is_some() || self.cell(Column::Time).is_some();
        let (column, expected) = if self.cell(Column::Date).is_some() {
            (if self.cells.has(Column::UtcTime) { Column::UtcTime } else { Column::Time }, "the time of day")
        } else if half {
            (Column::Date, "the date")
        } else {
            let whole = [Column::Utc, Column::ShipTime, Column::Date].into_iter().find(|c| self.cells.has(*c));
            (whole.unwrap_or(Column::Utc), "the date and time")
        };
        self.faults.add(column, BadValue::new("", expected).hint("without it there is no azimuth"));
    }

    fn by_ships_clock(
        &mut self,
        column: Column,
        local: Option<(NaiveDate, TimeOfDay)>,
        zone: Option<Zone>,
        zone_at_fault: bool,
    ) -> Option<Moment> {
        let (date, time) = local?;
        match zone {
            Some(zone) => self.put_together(column, date, time, zone),
            None => {
                if !zone_at_fault {
                    self.faults.add(
                        Column::Zone,
                        BadValue::new("", "the zone of the ship's time")
                            .hint("give zone (added to ship's time to get UTC, east -) or utc_offset (the opposite sign)"),
                    );
                }
                None
            }
        }
    }

    fn put_together(&mut self, column: Column, date: NaiveDate, time: TimeOfDay, zone: Zone) -> Option<Moment> {
        moment(date, time, zone).map_err(|bad| self.faults.add(column, bad)).ok()
    }

    /// The zone, by description or by the clock's offset; both must say the same.
    fn zone(&mut self) -> Option<Zone> {
        let described = self.read(Column::Zone, read_zone);
        let offset = self.read(Column::UtcOffset, read_clock_offset);
        if let (Some(described), Some(offset)) = (described, offset)
            && described != offset
        {
            let text = self.cell(Column::UtcOffset).unwrap_or_default();
            let bad = BadValue::new(&text, "the offset that the zone means").hint("zone description and clock offset have opposite signs");
            self.faults.add(Column::UtcOffset, bad);
            return None;
        }
        described.or(offset)
    }
}
