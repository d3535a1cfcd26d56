//! Reading a gyro's run-up: times with gyro errors, with headings against a known true one, or with bearings of a body or mark.

use super::columns::Column as LogColumn;
use super::entry::{Faults, ReadAs, read_entry};
use super::log::Cells;
use super::table::{Column, Row, Table};
use crate::angle::text::{ErrorSign, Letters, read_direction, read_error};
use crate::angle::{GyroBearing, TrueBearing};
use crate::compass::gyro::settle::RunUpReading;
use crate::compass::work;
use crate::error::{Error, Result};
use crate::limits::Limits;
use crate::time::UtcInstant;

/// A run-up as read.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct RunUp {
    /// The first reading's time; none where there is no reading.
    pub start: Option<UtcInstant>,
    /// The readings, in order of time.
    pub readings: Vec<RunUpReading>,
    /// Whether the rows stood in another order.
    pub sorted: bool,
    /// Rows that say what an earlier row says; counted once.
    pub copies: Vec<usize>,
    /// Pairs of rows with one time and different readings; both are counted.
    pub same_time: Vec<(usize, usize)>,
    /// Rows that could not be used, each with why.
    pub problems: Vec<String>,
}

/// The columns of a run-up that are not the log's own, or that decide how a row is read.
struct Columns {
    gyro_error: Column,
    gyro_heading: Column,
    gyro_bearing: Column,
}

/// Reads a run-up. `true_heading` is the ship's, for rows that have a `gyro_heading` and neither error nor bearing.
///
/// Times stand in any of the log's columns for them; a row with a `gyro_bearing` is read and worked as a row of a log is.
///
/// # Errors
/// [`Error::Content`] for a file without a time and one of `gyro_error`, `gyro_heading` or `gyro_bearing`, with several gyros, or with one
/// that does not settle; [`Error::Usage`] for headings without `true_heading`.
pub fn read_run_up(name: &str, bytes: &[u8], true_heading: Option<TrueBearing>, limits: &Limits) -> Result<RunUp> {
    let table = Table::read(name, bytes)?;
    let [gyro_error, gyro_heading, gyro_bearing] = ["gyro_error", "gyro_heading", "gyro_bearing"].map(|column| table.column(column));
    let timed = ["utc", "ship_time", "date"].iter().any(|column| table.column(column).is_there());
    if !timed || ![gyro_error, gyro_heading, gyro_bearing].iter().any(|column| column.is_there()) {
        return Err(
            table.unusable(format!("expected the columns utc and gyro_error, gyro_heading or gyro_bearing; they are {}", table.columns()))
        );
    }
    if !gyro_error.is_there() && !gyro_bearing.is_there() && true_heading.is_none() {
        return Err(Error::Usage(format!("{name} has headings: say the ship's true heading with --true-heading")));
    }
    one_that_settles(&table)?;
    let columns = Columns { gyro_error, gyro_heading, gyro_bearing };
    let mut run_up = RunUp::default();
    let mut rows: Vec<(UtcInstant, usize, f64)> = Vec::new();
    for row in &table.rows {
        match columns.read(&table, row, true_heading, limits) {
            Ok(Some((utc, error_deg))) => rows.push((utc, row.number, error_deg)),
            Ok(None) => {}
            Err(why) => run_up.problems.push(format!("{name}, line {} (row {}): {why}", row.line, row.number)),
        }
    }
    run_up.put_in_order(rows);
    Ok(run_up)
}

/// Refuses a file of several gyros, and one of a kind that has nothing to settle.
fn one_that_settles(table: &Table) -> Result<()> {
    for (column, what) in [("gyro", "gyros"), ("vessel", "vessels")] {
        let column = table.column(column);
        let mut names = table.rows.iter().map(|row| row.cell(column));
        let first = names.next().unwrap_or("");
        if let Some(other) = names.find(|name| !name.eq_ignore_ascii_case(first)) {
            return Err(table.unusable(format!("two {what}, \"{first}\" and \"{other}\": a run-up is of one")));
        }
    }
    let kind = table.column("gyro_type");
    match table.rows.iter().find(|row| row.cell(kind).eq_ignore_ascii_case("other")) {
        Some(row) => Err(table.error(row, "a gyro of the type other does not swing: there is nothing to settle".to_owned())),
        None => Ok(()),
    }
}

impl Columns {
    /// Time and gyro error, degrees; nothing for a row without a reading of the gyro; or why it cannot be used.
    fn read(
        &self,
        table: &Table,
        row: &Row,
        true_heading: Option<TrueBearing>,
        limits: &Limits,
    ) -> std::result::Result<Option<(UtcInstant, f64)>, String> {
        let mut faults = Faults::default();
        let cells = InTable { table, row };
        let entry = read_entry(&cells, ReadAs::default(), &mut faults);
        // What a bearing needs besides is no concern of a row that has its error already.
        let when = || {
            let at_fault = || faults.iter().find(|f| TIMES.iter().any(|c| c.info().name == f.column)).map(ToString::to_string);
            entry.moment.map(|m| m.utc).ok_or_else(|| at_fault().unwrap_or_else(|| "no date and time".to_owned()))
        };
        let (error, heading) = (row.cell(self.gyro_error), row.cell(self.gyro_heading));
        if !error.is_empty() {
            let read = read_error(error, ErrorSign::EastPlus, Letters::LowHighToo).map_err(|bad| format!("gyro_error: {bad}"))?;
            return Ok(Some((when()?, read.value)));
        }
        if !row.cell(self.gyro_bearing).is_empty() {
            if !faults.is_empty() {
                return Err(faults.in_one());
            }
            let Some(observation) = entry.observation else { return Ok(None) };
            let worked = work(&observation, None, limits);
            let error = worked.gyro_error.ok_or("no azimuth can be had for that time and place")?;
            return Ok(Some((when()?, error.value.deg())));
        }
        if let (Some(true_heading), false) = (true_heading, heading.is_empty()) {
            let read = read_direction(heading).map_err(|bad| format!("gyro_heading: {bad}"))?;
            return Ok(Some((when()?, (true_heading - GyroBearing::wrapping_deg(read.value)).deg())));
        }
        Ok(None)
    }
}

/// The log's columns that carry a time.
const TIMES: [LogColumn; 7] =
    [LogColumn::Utc, LogColumn::ShipTime, LogColumn::Zone, LogColumn::UtcOffset, LogColumn::Date, LogColumn::UtcTime, LogColumn::Time];

/// A row of a small table under the log's columns.
struct InTable<'t> {
    table: &'t Table,
    row: &'t Row,
}

impl Cells for InTable<'_> {
    fn has(&self, column: LogColumn) -> bool {
        self.table.column(column.info().name).is_there()
    }

    fn bytes(&self, column: LogColumn) -> &[u8] {
        self.row.cell(self.table.column(column.info().name)).as_bytes()
    }
}

impl RunUp {
    fn put_in_order(&mut self, mut rows: Vec<(UtcInstant, usize, f64)>) {
        self.sorted = rows.windows(2).any(|pair| matches!(pair, [a, b] if a.0 > b.0));
        rows.sort_by_key(|r| (r.0, r.1));
        self.start = rows.first().map(|r| r.0);
        let mut last: Option<(UtcInstant, usize)> = None;
        // Readings of the time before, for a copy of any of them.
        let mut at_that_time: Vec<f64> = Vec::new();
        for (utc, row, error_deg) in rows {
            match last {
                Some((before, _)) if before == utc && at_that_time.contains(&error_deg) => {
                    self.copies.push(row);
                    continue;
                }
                Some((before, row_before)) if before == utc => self.same_time.push((row_before, row)),
                _ => at_that_time.clear(),
            }
            at_that_time.push(error_deg);
            last = Some((utc, row));
            let minutes = self.start.map_or(0.0, |start| utc.seconds_since(start) / 60.0);
            self.readings.push(RunUpReading { row, minutes, error_deg });
        }
    }
}
