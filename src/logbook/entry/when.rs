//! The time of a row, from whichever columns carry it.

use super::Reader;
use crate::error::BadValue;
use crate::logbook::columns::Column;
use crate::logbook::log::Cells;
use crate::time::text::{moment, read_clock_offset, read_date, read_date_time, read_time_of_day, read_utc_ordered, read_zone};
use crate::time::{Moment, Zone};

impl<C: Cells> Reader<'_, C> {
    /// The moment and the zone written; a fault where the time is `needed` and not there.
    pub(super) fn moment(&mut self, needed: bool) -> (Option<Moment>, Option<Zone>) {
        let order = self.read_as.date_order;
        let before = self.faults.iter().count();
        let zone = self.zone();
        let zone_at_fault = self.faults.iter().count() > before;
        if self.cell(Column::Utc).is_some() {
            return (self.read(Column::Utc, |text| read_utc_ordered(text, order)), zone);
        }
        let found = if self.cell(Column::ShipTime).is_some() {
            let local = self.read(Column::ShipTime, |text| read_date_time(text, order));
            self.by_ships_clock(Column::ShipTime, local, zone, zone_at_fault)
        } else if self.cell(Column::Date).is_some() && self.cell(Column::UtcTime).is_some() {
            let date = self.read(Column::Date, |text| read_date(text, order));
            let time = self.read(Column::UtcTime, read_time_of_day);
            date.zip(time).and_then(|(date, time)| self.put_together(Column::UtcTime, date, time, Zone::UTC))
        } else if self.cell(Column::Date).is_some() && self.cell(Column::Time).is_some() {
            let date = self.read(Column::Date, |text| read_date(text, order));
            let time = self.read(Column::Time, read_time_of_day);
            self.by_ships_clock(Column::Time, date.zip(time), zone, zone_at_fault)
        } else {
            if needed {
                let column = if self.cell(Column::Date).is_some() { Column::UtcTime } else { Column::Utc };
                self.faults.add(column, BadValue::new("", "the date and time").hint("without it there is no azimuth"));
            }
            None
        };
        (found, zone)
    }

    fn by_ships_clock(
        &mut self,
        column: Column,
        local: Option<(chrono::NaiveDate, crate::time::text::TimeOfDay)>,
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

    fn put_together(&mut self, column: Column, date: chrono::NaiveDate, time: crate::time::text::TimeOfDay, zone: Zone) -> Option<Moment> {
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
