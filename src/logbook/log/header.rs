//! The header of a log: which column stands where.

use crate::error::{BadValue, edits};
use crate::logbook::columns::{ADDED, Column};
use crate::logbook::names::ColumnNames;

/// Where each column stands, and which stand there that are not ours to read.
#[derive(Debug, Clone)]
pub struct Header {
    places: [Option<u16>; Column::ALL.len()],
    /// Places of columns that this program adds, from an earlier run; left out of the output with `again`.
    pub replaced: Vec<usize>,
    /// A sentence for each column that is carried through unread but is named almost as one that is read, which the log lacks.
    pub hints: Vec<String>,
    /// Number of columns.
    pub width: usize,
}

impl Header {
    /// Reads the header's cells. `again` says that columns which this program adds are an earlier output, to be replaced.
    ///
    /// # Errors
    /// The message for the whole file: nothing in it, a column twice, a column that would be added already there, or no time, place
    /// or readings at all, with the nearest names.
    pub fn read<'c>(cells: impl Iterator<Item = &'c [u8]>, again: bool) -> Result<Self, String> {
        Self::read_as(cells, again, &ColumnNames::default())
    }

    /// As [`Header::read`], with other names for some columns.
    ///
    /// # Errors
    /// As [`Header::read`].
    pub fn read_as<'c>(cells: impl Iterator<Item = &'c [u8]>, again: bool, others: &ColumnNames) -> Result<Self, String> {
        let ours = |name: String| others.ours(&name).map_or(name, str::to_owned);
        let names: Vec<String> = cells.map(|c| ours(String::from_utf8_lossy(c).trim().to_ascii_lowercase())).collect();
        if names.iter().all(String::is_empty) {
            return Err("the first row is blank: a header with the columns' names was expected".into());
        }
        let mut header = Self { places: [None; Column::ALL.len()], replaced: Vec::new(), hints: Vec::new(), width: names.len() };
        for (at, name) in names.iter().enumerate().filter(|(_, name)| !name.is_empty()) {
            if ADDED.iter().any(|c| c.name == name) {
                if !again {
                    return Err(format!(
                        "column {}, {name}, is one that this program adds; rename it, or say --again if the log is an earlier output",
                        at + 1
                    ));
                }
                header.replaced.push(at);
            }
            let Some(column) = Column::ALL.iter().find(|c| c.info().name == name) else { continue };
            let Some(place) = header.places.get_mut(*column as usize) else { continue };
            if let Some(first) = place {
                return Err(format!("column {name} stands there twice, as columns {} and {}; rename one", *first + 1, at + 1));
            }
            *place = u16::try_from(at).ok();
        }
        header.usable(&names)?;
        let nearly = names.iter().enumerate().filter_map(|(at, name)| Some((at + 1, name, header.nearly(name)?.info().name)));
        header.hints = nearly
            .map(|(at, name, ours)| format!("column {at}, {}, is carried through unread; is it {ours}? then rename it", shown(name)))
            .collect();
        Ok(header)
    }

    /// Where a column stands.
    pub fn place(&self, column: Column) -> Option<usize> {
        self.places.get(column as usize).copied().flatten().map(usize::from)
    }

    /// The column that an unread one is probably meant for: the same letters, or in a longer name a slip or two.
    fn nearly(&self, name: &str) -> Option<Column> {
        // A name many times longer than any of ours is none of ours.
        if name.len() > 60 || Column::ALL.iter().any(|c| c.info().name == name) {
            return None;
        }
        let distance = |c: &Column| edits(&plain(name), &plain(c.info().name));
        // The nearest of all: where the log has that one already, another of the same name is meant to stand beside it.
        let nearest = Column::ALL.iter().copied().min_by_key(distance)?;
        let slips = if nearest.info().name.len() >= 8 { 2 } else { 0 };
        (distance(&nearest) <= slips && !self.has(nearest)).then_some(nearest)
    }

    fn has(&self, column: Column) -> bool {
        self.place(column).is_some()
    }

    /// A log without a single column that a bearing could stand in, or with no time or place, is another file. What every row would lack
    /// is said once, here.
    fn usable(&self, names: &[String]) -> Result<(), String> {
        use Column as C;
        let readings = [C::Body, C::GyroBearing, C::CompassBearing, C::GyroHeading, C::CompassHeading];
        let by_clock = self.has(C::ShipTime) || (self.has(C::Date) && self.has(C::Time));
        let by_utc = self.has(C::Utc) || (self.has(C::Date) && self.has(C::UtcTime));
        let zoned = self.has(C::Zone) || self.has(C::UtcOffset);
        let missing = if !by_utc && !by_clock {
            (
                "no column with the time: utc, or ship_time with zone or utc_offset, or date with utc_time",
                &["utc", "ship_time", "date", "utc_time"][..],
            )
        } else if !by_utc && !zoned {
            (
                "ship's time without a column zone (added to ship's time to get UTC, east -) or utc_offset (the opposite sign)",
                &["zone", "utc_offset"][..],
            )
        } else if !self.has(C::Position) && !self.has(C::Lat) && !self.has(C::Lon) {
            ("no columns with the position: lat and lon, or position", &["lat", "lon", "position"][..])
        } else if !self.has(C::Position) && !self.has(C::Lon) {
            ("a column lat, but none with the longitude: lon", &["lon"][..])
        } else if !self.has(C::Position) && !self.has(C::Lat) {
            ("a column lon, but none with the latitude: lat", &["lat"][..])
        } else if !readings.iter().any(|c| self.has(*c)) {
            (
                "no column with a body or a bearing: body, gyro_bearing, compass_bearing",
                &["body", "gyro_bearing", "compass_bearing", "gyro_heading", "compass_heading"][..],
            )
        } else {
            return Ok(());
        };
        let near: Vec<String> = names
            .iter()
            .filter(|name| !name.is_empty() && missing.1.iter().any(|wanted| *name != wanted && like(name, wanted)))
            .map(|name| shown(name))
            .collect();
        let hint = if names.iter().any(|n| n.contains('\0')) {
            "; the file looks like UTF-16 without a mark: save it as UTF-8".to_owned()
        } else if near.is_empty() {
            format!("; the columns are {}", names.iter().filter(|n| !n.is_empty()).map(|n| shown(n)).collect::<Vec<_>>().join(", "))
        } else {
            format!("; is it {}? rename the column", near.join(" or "))
        };
        Err(format!("{}{hint}", missing.0))
    }
}

/// Whether a header's name is one of ours written a little otherwise.
fn like(name: &str, wanted: &str) -> bool {
    let (name, wanted) = (plain(name), plain(wanted));
    name.contains(&wanted) || (wanted.contains(&name) && name.len() >= 3) || edits(&name, &wanted) * 3 <= wanted.len()
}

/// A name as messages show it: cut to a printable length, and nothing in it that could steer a terminal.
fn shown(name: &str) -> String {
    BadValue::new(name, "").value
}

/// A name without what parts its words.
fn plain(name: &str) -> String {
    name.chars().filter(char::is_ascii_alphanumeric).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn read(header: &str) -> Result<Header, String> {
        Header::read(header.split(',').map(str::as_bytes), false)
    }

    #[test]
    fn names_that_are_nearly_ours() {
        let hints = |header: &str| read(header).unwrap().hints;
        assert_eq!(
            hints("utc,lat,lon,Body ,gyro bearing"),
            ["column 5, gyro bearing, is carried through unread; is it gyro_bearing? then rename it"]
        );
        assert!(hints("utc,lat,lon,body,gyro_bearing,gyro bearing,tide,weather").is_empty());
        let two = hints("utc,lat,lon,body,loged_azimuth,CompassHeading");
        assert!(two.len() == 2 && two[0].contains("is it logged_azimuth?") && two[1].contains("is it compass_heading?"), "{two:?}");
    }

    #[test]
    fn what_every_row_would_lack() {
        let said = |header: &str| read(header).unwrap_err();
        assert!(said("ship_time,lat,lon,body").starts_with("ship's time without a column zone"));
        assert!(said("date,time,lat,lon,body").starts_with("ship's time without a column zone"));
        assert!(said("utc,lat,body,long").ends_with("none with the longitude: lon; is it long? rename the column"));
        assert!(read("date,utc_time,time,position,gyro_heading").is_ok());
        assert!(read("ship_time,utc_offset,position,body").is_ok());
    }
}
