//! The position of a row.

use super::Reader;
use crate::angle::text::{read_latitude, read_longitude, read_position};
use crate::angle::{Latitude, Longitude, Position, Reading, wrap_180_deg};
use crate::compass::Place;
use crate::error::BadValue;
use crate::logbook::columns::Column;
use crate::logbook::log::Cells;

impl<C: Cells> Reader<'_, C> {
    /// The place; a fault where it is `needed` and not there, and where `position` and `lat` or `lon` are both written and differ.
    pub(super) fn place(&mut self, needed: bool) -> Option<Place> {
        let (lat, lon) = if self.cell(Column::Position).is_some() {
            let (lat, lon) = self.read(Column::Position, read_position)?;
            self.beside_position(lat, lon);
            (lat, lon)
        } else {
            let missing = |text: &'static str| BadValue::new("", text).hint("without it there is no azimuth");
            let apart = self.cells.has(Column::Lat) || self.cells.has(Column::Lon);
            if needed && !apart && self.cells.has(Column::Position) {
                self.faults.add(Column::Position, missing("a latitude and a longitude"));
                return None;
            }
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

    /// Latitude and longitude written beside the position must say the same, to the step that they are written in.
    fn beside_position(&mut self, lat: Reading<Latitude>, lon: Reading<Longitude>) {
        let apart_lat = self.read(Column::Lat, read_latitude).map(|r| (r.value.deg() - lat.value.deg(), r.step_deg.max(lat.step_deg)));
        let apart_lon =
            self.read(Column::Lon, read_longitude).map(|r| (wrap_180_deg(r.value.deg() - lon.value.deg()), r.step_deg.max(lon.step_deg)));
        for (column, apart) in [(Column::Lat, apart_lat), (Column::Lon, apart_lon)] {
            // A thousandth of the step for the rounding of the subtraction.
            if let Some((difference_deg, step_deg)) = apart
                && difference_deg.abs() > step_deg * 1.001
            {
                let text = self.cell(column).unwrap_or_default();
                let what = if column == Column::Lat { "the latitude of position" } else { "the longitude of position" };
                self.faults.add(column, BadValue::new(&text, what).hint("two places are written: which of the two is right?"));
            }
        }
    }
}
