//! Reading a gyro's run-up: times with gyro errors, with headings against a known true one, or with bearings of a body.

use super::table::{Row, Table};
use crate::angle::text::{ErrorSign, Letters, read_direction, read_error, read_latitude, read_longitude};
use crate::angle::{GyroBearing, Position, TrueBearing};
use crate::compass::gyro::settle::RunUpReading;
use crate::compass::{Observation, Place, Target, work};
use crate::error::{BadValue, Error, Result};
use crate::limits::Limits;
use crate::sky::Body;
use crate::time::text::read_utc;
use crate::time::{Moment, UtcInstant};

/// A run-up as read.
#[derive(Debug, Clone, PartialEq)]
pub struct RunUp {
    /// The first reading's time.
    pub start: UtcInstant,
    /// The readings, in order of time.
    pub readings: Vec<RunUpReading>,
    /// Whether the rows stood in another order.
    pub sorted: bool,
    /// Rows that could not be used, each with why.
    pub problems: Vec<String>,
}

/// Reads a run-up. `true_heading` is the ship's, for rows that have a `gyro_heading` and no error.
///
/// # Errors
/// [`Error::Content`] for a file without a time and one of `gyro_error`, `gyro_heading` or `gyro_bearing`, or without a usable row.
pub fn read_run_up(name: &str, bytes: &[u8], true_heading: Option<TrueBearing>, limits: &Limits) -> Result<RunUp> {
    let table = Table::read(name, bytes)?;
    let [utc, error, heading, bearing, lat, lon, body] =
        ["utc", "gyro_error", "gyro_heading", "gyro_bearing", "lat", "lon", "body"].map(|column| table.column(column));
    if !utc.is_there() || !(error.is_there() || heading.is_there() || bearing.is_there()) {
        return Err(
            table.unusable(format!("expected the columns utc and gyro_error, gyro_heading or gyro_bearing; they are {}", table.columns()))
        );
    }
    if !error.is_there() && !bearing.is_there() && true_heading.is_none() {
        return Err(Error::Usage(format!("{name} has headings: say the ship's true heading with --true-heading")));
    }
    let of_row = |row: &Row| -> Result<Option<(UtcInstant, f64)>, (&'static str, BadValue)> {
        let moment: Moment = read_utc(row.cell(utc)).map_err(|bad| ("utc", bad))?;
        if !row.cell(error).is_empty() {
            let read = read_error(row.cell(error), ErrorSign::EastPlus, Letters::LowHighToo).map_err(|bad| ("gyro_error", bad))?;
            return Ok(Some((moment.utc, read.value)));
        }
        if let (Some(true_heading), false) = (true_heading, row.cell(heading).is_empty()) {
            let read = read_direction(row.cell(heading)).map_err(|bad| ("gyro_heading", bad))?;
            return Ok(Some((moment.utc, (true_heading - GyroBearing::wrapping_deg(read.value)).deg())));
        }
        if row.cell(bearing).is_empty() {
            return Ok(None);
        }
        let gyro = read_direction(row.cell(bearing)).map_err(|bad| ("gyro_bearing", bad))?;
        let lat = read_latitude(row.cell(lat)).map_err(|bad| ("lat", bad))?;
        let lon = read_longitude(row.cell(lon)).map_err(|bad| ("lon", bad))?;
        let body = Body::from_name(row.cell(body)).map_err(|bad| ("body", bad))?;
        let place = Place { position: Position { lat: lat.value, lon: lon.value }, step_deg: lat.step_deg.max(lon.step_deg) };
        let observation = Observation {
            moment: Some(moment),
            place: Some(place),
            gyro_bearing: Some(gyro.map(GyroBearing::wrapping_deg)),
            ..Observation::of(Target::Body(body))
        };
        let error = work(&observation, None, limits).gyro_error;
        Ok(error.map(|e| (moment.utc, e.value.deg())))
    };
    let mut rows: Vec<(UtcInstant, usize, f64)> = Vec::new();
    let mut problems = Vec::new();
    for row in &table.rows {
        match of_row(row) {
            Ok(Some((utc, error_deg))) => rows.push((utc, row.number, error_deg)),
            Ok(None) => {}
            Err((column, bad)) => problems.push(format!("{name}, line {} (row {}): {column}: {bad}", row.line, row.number)),
        }
    }
    let sorted = rows.windows(2).any(|pair| matches!(pair, [a, b] if a.0 > b.0));
    rows.sort_by_key(|r| (r.0, r.1));
    let Some(start) = rows.first().map(|r| r.0) else {
        let why = problems.first().cloned().unwrap_or_else(|| "it has no rows".to_owned());
        return Err(table.unusable(format!("no reading of the gyro in it: {why}")));
    };
    let readings = rows.iter().map(|(utc, row, error_deg)| RunUpReading {
        row: *row,
        minutes: utc.seconds_since(start) / 60.0,
        error_deg: *error_deg,
    });
    Ok(RunUp { start, readings: readings.collect(), sorted, problems })
}
