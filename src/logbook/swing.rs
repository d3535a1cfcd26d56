//! Reading a swing: headings and deviations already worked out.

use super::figures::{read_deviation, read_heading_deg};
use super::table::{Row, Table};
use crate::angle::{CompassBearing, MagneticBearing};
use crate::compass::curve::{Reading, Turn};
use crate::error::{BadValue, Result};

/// A row that cannot be used, with the reason.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct BadRow {
    /// Data row, from 1.
    pub number: usize,
    /// Why.
    pub why: String,
}

/// A swing as read.
#[derive(Debug, Clone, Default)]
pub struct Swing {
    /// Readings, each with its data row, from 1.
    pub readings: Vec<(usize, Reading)>,
    /// Rows that cannot be used.
    pub bad_rows: Vec<BadRow>,
}

/// Reads `compass_heading` (or `magnetic_heading`), `deviation` and, where noted, `turn`.
///
/// `name` is what messages call the file.
///
/// # Errors
/// [`crate::error::Error::Content`] where the file as a whole cannot be used. Single rows that cannot are listed.
pub fn read_swing(name: &str, bytes: &[u8]) -> Result<Swing> {
    let table = Table::read(name, bytes)?;
    let [compass, magnetic, deviation, turn] = ["compass_heading", "magnetic_heading", "deviation", "turn"].map(|name| table.column(name));
    if !deviation.is_there() || compass.is_there() == magnetic.is_there() {
        return Err(table.unusable(format!(
            "a swing has compass_heading and deviation, or the columns of an observation; the columns are {}",
            table.columns()
        )));
    }
    let reading = |row: &Row| -> std::result::Result<Reading, (&str, BadValue)> {
        let deviation = read_deviation(row.cell(deviation)).map_err(|bad| ("deviation", bad))?;
        let heading = if compass.is_there() {
            CompassBearing::wrapping_deg(read_heading_deg(row.cell(compass)).map_err(|bad| ("compass_heading", bad))?)
        } else {
            MagneticBearing::wrapping_deg(read_heading_deg(row.cell(magnetic)).map_err(|bad| ("magnetic_heading", bad))?) - deviation
        };
        Ok(Reading { heading, deviation, turn: read_turn(row.cell(turn)).map_err(|bad| ("turn", bad))? })
    };
    let mut swing = Swing::default();
    for row in &table.rows {
        match reading(row) {
            Ok(reading) => swing.readings.push((row.number, reading)),
            Err((column, bad)) => swing.bad_rows.push(BadRow { number: row.number, why: format!("{column}: {bad}") }),
        }
    }
    Ok(swing)
}

/// Which way the ship was turning; blank where not noted.
pub(crate) fn read_turn(text: &str) -> std::result::Result<Option<Turn>, BadValue> {
    match text.to_ascii_lowercase().as_str() {
        "" => Ok(None),
        "clockwise" => Ok(Some(Turn::Clockwise)),
        "anticlockwise" => Ok(Some(Turn::Anticlockwise)),
        _ => Err(BadValue::new(text, "clockwise or anticlockwise")),
    }
}
