//! Reading a swing: headings and deviations already worked out.

use super::figures::{read_day, read_deviation};
use super::table::{Column, Row, Table};
use crate::angle::text::{read_direction, read_latitude, read_longitude};
use crate::angle::{CompassBearing, MagneticBearing, Position};
use crate::compass::curve::{Reading, Turn};
use crate::error::{BadValue, Result};
use crate::time::UtcInstant;

/// A row that cannot be used, with the reason.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct BadRow {
    /// Data row, from 1.
    pub number: usize,
    /// Why.
    pub why: String,
}

/// A row of a swing.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SwingRow {
    /// Data row, from 1.
    pub number: usize,
    /// Heading and deviation.
    pub reading: Reading,
    /// Where and when, where the row says so.
    pub taken: Option<(Position, UtcInstant)>,
}

/// A swing as read.
#[derive(Debug, Clone, Default)]
pub struct Swing {
    /// Rows that can be used.
    pub rows: Vec<SwingRow>,
    /// Rows that cannot.
    pub bad_rows: Vec<BadRow>,
}

/// What cannot be read: the column, and why.
type InColumn = (&'static str, BadValue);

/// The columns of a swing.
struct Columns {
    compass_heading: Column,
    magnetic_heading: Column,
    deviation: Column,
    turn: Column,
    lat: Column,
    lon: Column,
    utc: Column,
}

/// Reads `compass_heading` (or `magnetic_heading`), `deviation` and, where noted, `turn`, and `lat`, `lon`, `utc`.
///
/// `name` is what messages call the file.
///
/// # Errors
/// [`crate::error::Error::Content`] where the file as a whole cannot be used. Single rows that cannot are listed.
pub fn read_swing(name: &str, bytes: &[u8]) -> Result<Swing> {
    let table = Table::read(name, bytes)?;
    let columns = Columns {
        compass_heading: table.column("compass_heading"),
        magnetic_heading: table.column("magnetic_heading"),
        deviation: table.column("deviation"),
        turn: table.column("turn"),
        lat: table.column("lat"),
        lon: table.column("lon"),
        utc: table.column("utc"),
    };
    if !columns.deviation.is_there() || columns.compass_heading.is_there() == columns.magnetic_heading.is_there() {
        return Err(table.unusable(format!(
            "a swing has compass_heading and deviation, or the columns of an observation; the columns are {}",
            table.columns()
        )));
    }
    let mut swing = Swing::default();
    for row in &table.rows {
        match columns.read(row) {
            Ok(read) => swing.rows.push(read),
            Err((column, bad)) => swing.bad_rows.push(BadRow { number: row.number, why: format!("{column}: {bad}") }),
        }
    }
    Ok(swing)
}

impl Columns {
    fn read(&self, row: &Row) -> std::result::Result<SwingRow, InColumn> {
        let direction = |name: &'static str, column| read_direction(row.cell(column)).map(|r| r.value).map_err(|bad| (name, bad));
        let deviation = read_deviation(row.cell(self.deviation)).map_err(|bad| ("deviation", bad))?;
        let heading = if self.compass_heading.is_there() {
            CompassBearing::wrapping_deg(direction("compass_heading", self.compass_heading)?)
        } else {
            MagneticBearing::wrapping_deg(direction("magnetic_heading", self.magnetic_heading)?) - deviation
        };
        let turn = read_turn(row.cell(self.turn)).map_err(|bad| ("turn", bad))?;
        Ok(SwingRow { number: row.number, reading: Reading { heading, deviation, turn }, taken: self.taken(row)? })
    }

    /// Where and when: all three cells, or none.
    fn taken(&self, row: &Row) -> std::result::Result<Option<(Position, UtcInstant)>, InColumn> {
        let (lat, lon, utc) = (row.cell(self.lat), row.cell(self.lon), row.cell(self.utc));
        if [lat, lon, utc].contains(&"") {
            return Ok(None);
        }
        let lat = read_latitude(lat).map_err(|bad| ("lat", bad))?.value;
        let lon = read_longitude(lon).map_err(|bad| ("lon", bad))?.value;
        let utc = read_day(utc).map_err(|bad| ("utc", bad))?;
        Ok(Some((Position { lat, lon }, utc)))
    }
}

/// Which way the ship was turning; blank where not noted.
fn read_turn(text: &str) -> std::result::Result<Option<Turn>, BadValue> {
    match text.to_ascii_lowercase().as_str() {
        "" => Ok(None),
        "clockwise" => Ok(Some(Turn::Clockwise)),
        "anticlockwise" => Ok(Some(Turn::Anticlockwise)),
        _ => Err(BadValue::new(text, "clockwise or anticlockwise")),
    }
}
