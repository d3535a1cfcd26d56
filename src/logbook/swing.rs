//! Reading a swing: headings with the deviation on each, or with the bearing that shows it.

use super::figures::{read_day, read_deviation};
use super::table::{Column, Row, Table, TableForm};
use crate::angle::text::{read_direction, read_latitude, read_longitude};
use crate::angle::{CompassBearing, MagneticBearing, Position, TrueBearing};
use crate::compass::curve::{DeviationReading, Turn};
use crate::compass::{Observation, Place, Target};
use crate::error::{BadValue, Result};
use crate::sky::Body;
use crate::time::UtcInstant;
use crate::time::text::read_utc;

/// The names of the columns of a swing.
pub const COLUMNS: [&str; 10] =
    ["compass_heading", "magnetic_heading", "deviation", "turn", "lat", "lon", "utc", "body", "charted_bearing", "compass_bearing"];

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
    pub reading: DeviationReading,
    /// Where and when, where the row says so.
    pub taken: Option<(Position, UtcInstant)>,
}

/// A row of a swing with a bearing, whose deviation is not worked out yet.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SightRow {
    /// Data row, from 1.
    pub number: usize,
    /// The bearing, of what, and where and when as far as the row says so.
    pub observation: Observation,
    /// Ship's head by the compass.
    pub heading: CompassBearing,
    /// Which way the ship was turning, where it was noted.
    pub turn: Option<Turn>,
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
pub fn read_swing(name: &str, bytes: &[u8], form: &TableForm) -> Result<Swing> {
    let table = Table::read_as(name, bytes, form)?;
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
        Ok(SwingRow { number: row.number, reading: DeviationReading { heading, deviation, turn }, taken: self.taken(row)? })
    }

    fn read_sight(&self, row: &Row) -> std::result::Result<SightRow, InColumn> {
        let direction = |name: &'static str, column| read_direction(row.cell(column)).map_err(|bad| (name, bad));
        let compass = |name, column| direction(name, column).map(|reading| reading.map(CompassBearing::wrapping_deg));
        let target = match (row.cell(self.charted_bearing), row.cell(self.body)) {
            ("", "") => return Err(("body", BadValue::new("", "a body, or a charted_bearing"))),
            ("", body) => Target::Body(Body::from_name(body).map_err(|bad| ("body", bad))?),
            _ => {
                let charted = direction("charted_bearing", self.charted_bearing)?;
                Target::Mark { charted: TrueBearing::wrapping_deg(charted.value), step_deg: charted.step_deg }
            }
        };
        let heading = compass("compass_heading", self.compass_heading)?;
        let mut observation = Observation::of(target);
        observation.compass_heading = Some(heading);
        observation.compass_bearing = Some(compass("compass_bearing", self.compass_bearing)?);
        if !row.cell(self.utc).is_empty() {
            observation.moment = Some(read_utc(row.cell(self.utc)).map_err(|bad| ("utc", bad))?);
        }
        observation.place = self.place(row)?;
        let turn = read_turn(row.cell(self.turn)).map_err(|bad| ("turn", bad))?;
        Ok(SightRow { number: row.number, observation, heading: heading.value, turn })
    }

    /// Both cells, or none.
    fn place(&self, row: &Row) -> std::result::Result<Option<Place>, InColumn> {
        let (lat, lon) = (row.cell(self.lat), row.cell(self.lon));
        if lat.is_empty() && lon.is_empty() {
            return Ok(None);
        }
        let lat = read_latitude(lat).map_err(|bad| ("lat", bad))?;
        let lon = read_longitude(lon).map_err(|bad| ("lon", bad))?;
        Ok(Some(Place { position: Position { lat: lat.value, lon: lon.value }, step_deg: lat.step_deg.max(lon.step_deg) }))
    }

    /// Where and when, where both are there.
    fn taken(&self, row: &Row) -> std::result::Result<Option<(Position, UtcInstant)>, InColumn> {
        let place = self.place(row)?;
        let utc = row.cell(self.utc);
        let day = if utc.is_empty() { None } else { Some(read_day(utc).map_err(|bad| ("utc", bad))?) };
        Ok(place.map(|place| place.position).zip(day))
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
