//! The header of a log: which column stands where.

use crate::error::edits;
use crate::logbook::columns::{ADDED, Column};

/// Where each column stands, and which stand there that are not ours to read.
#[derive(Debug, Clone)]
pub struct Header {
    places: [Option<u16>; Column::ALL.len()],
    /// Places of columns that this program adds, from an earlier run; left out of the output with `again`.
    pub replaced: Vec<usize>,
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
        let names: Vec<String> = cells.map(|c| String::from_utf8_lossy(c).trim().to_ascii_lowercase()).collect();
        if names.iter().all(String::is_empty) {
            return Err("the first row is blank: a header with the columns' names was expected".into());
        }
        let mut header = Self { places: [None; Column::ALL.len()], replaced: Vec::new(), width: names.len() };
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
        Ok(header)
    }

    /// Where a column stands.
    pub fn place(&self, column: Column) -> Option<usize> {
        self.places.get(column as usize).copied().flatten().map(usize::from)
    }

    fn has(&self, column: Column) -> bool {
        self.place(column).is_some()
    }

    /// A log without a single column that a bearing could stand in, or with no time, is another file.
    fn usable(&self, names: &[String]) -> Result<(), String> {
        use Column as C;
        let readings = [C::GyroBearing, C::CompassBearing, C::GyroHeading, C::CompassHeading];
        let times = self.has(C::Utc) || self.has(C::ShipTime) || (self.has(C::Date) && (self.has(C::UtcTime) || self.has(C::Time)));
        let places = self.has(C::Position) || (self.has(C::Lat) && self.has(C::Lon));
        let missing = if !times {
            (
                "no column with the time: utc, or ship_time with zone or utc_offset, or date with utc_time",
                &["utc", "ship_time", "date", "utc_time"][..],
            )
        } else if !places {
            ("no columns with the position: lat and lon, or position", &["lat", "lon", "position"][..])
        } else if !readings.iter().any(|c| self.has(*c)) && !self.has(C::Body) {
            (
                "no column with a body or a bearing: body, gyro_bearing, compass_bearing",
                &["body", "gyro_bearing", "compass_bearing", "gyro_heading", "compass_heading"][..],
            )
        } else {
            return Ok(());
        };
        let near: Vec<&str> = names
            .iter()
            .filter(|name| !name.is_empty() && missing.1.iter().any(|wanted| *name != wanted && like(name, wanted)))
            .map(String::as_str)
            .collect();
        let hint = if names.iter().any(|n| n.contains('\0')) {
            "; the file looks like UTF-16 without a mark: save it as UTF-8".to_owned()
        } else if near.is_empty() {
            format!("; the columns are {}", names.iter().filter(|n| !n.is_empty()).map(String::as_str).collect::<Vec<_>>().join(", "))
        } else {
            format!("; is it {}? rename the column", near.join(" or "))
        };
        Err(format!("{}{hint}", missing.0))
    }
}

/// Whether a header's name is one of ours written a little otherwise.
fn like(name: &str, wanted: &str) -> bool {
    let plain = |text: &str| text.chars().filter(char::is_ascii_alphanumeric).collect::<String>();
    let (name, wanted) = (plain(name), plain(wanted));
    name.contains(&wanted) || (wanted.contains(&name) && name.len() >= 3) || edits(&name, &wanted) * 3 <= wanted.len()
}
