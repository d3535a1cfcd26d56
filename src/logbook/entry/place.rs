//! The position of a row.

use super::Reader;
use crate::angle::Position;
use crate::angle::text::{read_latitude, read_longitude, read_position};
use crate::compass::Place;
use crate::error::BadValue;
use crate::logbook::columns::Column;
use crate::logbook::log::Cells;

impl<C: Cells> Reader<'_, C> {
    /// The place; a fault where it is `needed` and not there.
    pub(super) fn place(&mut self, needed: bool) -> Option<Place> {
        let (lat, lon) = if self.cell(Column::Position).is_some() && self.cell(Column::Lat).is_none() && self.cell(Column::Lon).is_none() {
            // A comma may part the two here, so it is never a decimal one.
            let text = self.cell(Column::Position).unwrap_or_default();
            read_position(&text).map_err(|bad| self.faults.add(Column::Position, bad)).ok()?
        } else {
            let missing = |text: &'static str| BadValue::new("", text).hint("without it there is no azimuth");
            for (column, what) in [(Column::Lat, "a latitude"), (Column::Lon, "a longitude")] {
                let other = if column == Column::Lat { Column::Lon } else { Column::Lat };
                if self.cell(column).is_none() && (needed || self.cell(other).is_some()) {
                    self.faults.add(column, missing(what));
                }
            }
            let (lat, lon) = (self.read(Column::Lat, read_latitude), self.read(Column::Lon, read_longitude));
            (lat?, lon?)
        };
        Some(Place { position: Position { lat: lat.value, lon: lon.value }, step_deg: lat.step_deg.max(lon.step_deg) })
    }
}
