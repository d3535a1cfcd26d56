//! Reading a swing: headings with the deviation on each, or with the bearing that shows it.

use super::figures::{read_day, read_deviation};
use super::table::{Column, Row, Table};
use crate::angle::text::{read_direction, read_latitude, read_longitude};
use crate::angle::{CompassBearing, MagneticBearing, Position, TrueBearing};
use crate::compass::curve::{Reading, Turn};
use crate::compass::sight::Sighted;
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

/// A row of a swing with a bearing, whose deviation is not worked out yet.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SightRow {
    /// Data row, from 1.
    pub number: usize,
    /// Ship's head by the compass.
    pub heading: CompassBearing,
    /// Which way the ship was turning, where it was noted.
    pub turn: Option<Turn>,
    /// What the bearing was taken of.
    pub sighted: Sighted,
    /// The bearing by the compass.
    pub bearing: CompassBearing,
    /// Where and when, where the row says so.
    pub taken: Option<(Position, UtcInstant)>,
}

/// A swing as read.
#[derive(Debug, Clone, Default)]
pub struct Swing {
    /// Rows with a deviation.
    pub rows: Vec<SwingRow>,
    /// Rows with a bearing.
    pub sights: Vec<SightRow>,
    /// Rows that cannot be used.
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
    body: Column,
    charted_bearing: Column,
    compass_bearing: Column,
}

/// Reads `compass_heading` (or `magnetic_heading`) and `deviation`; or `compass_heading`, `compass_bearing` and `body` or `charted_bearing`.
///
/// Where noted, `turn`, and `lat`, `lon`, `utc`. Where deviations stand there, bearings are not read.
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
        body: table.column("body"),
        charted_bearing: table.column("charted_bearing"),
        compass_bearing: table.column("compass_bearing"),
    };
    let worked_out = columns.deviation.is_there() && columns.compass_heading.is_there() != columns.magnetic_heading.is_there();
    let sighted = columns.compass_heading.is_there() && columns.compass_bearing.is_there();
    if !worked_out && !sighted {
        return Err(table.unusable(format!(
            "a swing has compass_heading and deviation, or compass_heading, compass_bearing and body or charted_bearing; the columns are {}",
            table.columns()
        )));
    }
    let mut swing = Swing::default();
    for row in &table.rows {
        let read = if worked_out {
            columns.read(row).map(|read| swing.rows.push(read))
        } else {
            columns.read_sight(row).map(|read| swing.sights.push(read))
        };
        if let Err((column, bad)) = read {
            swing.bad_rows.push(BadRow { number: row.number, why: format!("{column}: {bad}") });
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

    fn read_sight(&self, row: &Row) -> std::result::Result<SightRow, InColumn> {
        let direction = |name: &'static str, column| read_direction(row.cell(column)).map(|r| r.value).map_err(|bad| (name, bad));
        let sighted = match (row.cell(self.charted_bearing), row.cell(self.body)) {
            ("", body) => read_body(body).map_err(|bad| ("body", bad))?,
            _ => Sighted::Mark(TrueBearing::wrapping_deg(direction("charted_bearing", self.charted_bearing)?)),
        };
        Ok(SightRow {
            number: row.number,
            heading: CompassBearing::wrapping_deg(direction("compass_heading", self.compass_heading)?),
            turn: read_turn(row.cell(self.turn)).map_err(|bad| ("turn", bad))?,
            sighted,
            bearing: CompassBearing::wrapping_deg(direction("compass_bearing", self.compass_bearing)?),
            taken: self.taken(row)?,
        })
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

fn read_body(text: &str) -> std::result::Result<Sighted, BadValue> {
    if text.eq_ignore_ascii_case("sun") { Ok(Sighted::Sun) } else { Err(BadValue::new(text, "Sun, or a charted_bearing")) }
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
