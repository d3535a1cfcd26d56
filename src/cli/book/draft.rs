//! From cells to an entry that can be made: read as a row of a log is, worked, and written as the book keeps it.

use super::entry_args::{EntryArgs, flag_of};
use super::working;
use shadowpin::book::EntryCells;
use shadowpin::compass::{Observation, Target, Worked, doubts, work};
use shadowpin::error::{BadValue, Error, Result};
use shadowpin::logbook::columns::Column;
use shadowpin::logbook::entry::{Faults, ReadAs, read_entry};
use shadowpin::time::{Moment, Zone};

/// Columns of time and place: also an entry without an observation says when and where.
const WHEN_WHERE: [Column; 8] =
    [Column::Utc, Column::ShipTime, Column::Zone, Column::UtcOffset, Column::Date, Column::Lat, Column::Lon, Column::Position];

/// An entry worked, ready to be made.
#[derive(Debug)]
pub struct Ready {
    /// Its cells, all but those that the book adds.
    pub cells: EntryCells,
    /// The working for a person; for an entry without an observation, its reason.
    pub working: String,
}

/// Reads and works the cells.
pub fn ready(mut cells: EntryCells, args: &EntryArgs) -> Result<Ready> {
    let nothing = is_none(&cells);
    let (moment, zone, observation) = read(&cells, args.read_as())?;
    cells.set_moment(moment, zone);
    let Some(observation) = observation else {
        let working = format!("No observation: {}\n", cells.get(Column::Remarks));
        return if nothing { Ok(Ready { cells, working }) } else { Err(Error::Usage("give --body, or --none with the reason".into())) };
    };
    let limits = args.limits()?;
    let mut worked = work(&observation, None, &limits);
    worked.notices.extend(doubts(&observation, &worked, &limits));
    name(&mut cells, &observation);
    cells.set_worked(&worked);
    let working = working::text(&observation, &worked, (moment, zone), cells.get(Column::Mark), args, &limits)?;
    Ok(Ready { cells, working })
}

/// The body by its name, the method in so many words.
fn name(cells: &mut EntryCells, observation: &Observation) {
    if let Some(body) = observation.body() {
        cells.set(Column::Body, body.name());
    }
    if cells.get(Column::Method).is_empty() {
        cells.set(Column::Method, "azimuth");
    }
    let method = cells.get(Column::Method).to_ascii_lowercase();
    cells.set(Column::Method, &method);
}

/// Whether the cells say that nothing could be had.
pub fn is_none(cells: &EntryCells) -> bool {
    cells.get(Column::Method).eq_ignore_ascii_case("none")
}

/// When, the zone, and what was observed; every fault in one error.
fn read(cells: &EntryCells, read_as: ReadAs) -> Result<(Moment, Option<Zone>, Option<Observation>)> {
    let mut faults = Faults::default();
    let mut said = Vec::new();
    let entry = if is_none(cells) {
        // A row of a log without an observation is never at fault; a new entry can still be put right.
        let mut probe = cells.clone();
        probe.set(Column::Method, "comparison");
        let _ = read_entry(&probe, read_as, &mut faults);
        said.extend(faults.iter().filter(|f| WHEN_WHERE.iter().any(|c| c.info().name == f.column)).map(in_words));
        if cells.get(Column::Remarks).is_empty() {
            said.push("--none: the reason is missing".to_owned());
        }
        faults.clear();
        read_entry(cells, read_as, &mut faults)
    } else {
        let entry = read_entry(cells, read_as, &mut faults);
        said.extend(faults.iter().map(in_words));
        if let Some(observation) = entry.observation.filter(|_| said.is_empty()) {
            said.extend(without_reading(&observation));
        }
        entry
    };
    let timed = |flag: &str| said.iter().any(|s| s.starts_with(flag));
    let moment = match entry.moment {
        Some(moment) if said.is_empty() => moment,
        None if !["--utc", "--ship-time", "--zone"].into_iter().any(timed) => {
            said.push(format!("--utc: {}", BadValue::new("", "when it was, or now")));
            return Err(Error::Usage(said.join("\n  ")));
        }
        _ => return Err(Error::Usage(said.join("\n  "))),
    };
    Ok((moment, entry.zone, entry.observation))
}

fn in_words(fault: &shadowpin::logbook::entry::Fault) -> String {
    let mut bad = fault.bad.clone();
    if fault.column == "body" && bad.value.is_empty() {
        bad = bad.hint("where none could be had, say --none with the reason");
    }
    format!("{}: {bad}", flag_of(fault.column))
}

/// An entry that compares nothing with the azimuth is none.
fn without_reading(observation: &Observation) -> Option<String> {
    let read = observation.gyro_bearing.is_some() || observation.compass_bearing.is_some();
    let needed = observation.target != Target::Headings;
    (needed && !read)
        .then(|| "--gyro, --compass: a bearing by one of them is missing; where none could be had, say --none with the reason".to_owned())
}

/// What is wrong with the text under a column; `None` for a blank one.
pub fn fault(column: Column, text: &str, read_as: ReadAs) -> Option<BadValue> {
    let mut probe = EntryCells::default();
    probe.set(column, text);
    let mut faults = Faults::default();
    let _ = read_entry(&probe, read_as, &mut faults);
    let found = faults.iter().find(|f| f.column == column.info().name).map(|f| f.bad.clone());
    found.filter(|_| !text.trim().is_empty())
}

/// Whether something that no entry can do without is missing.
pub fn lacks(cells: &EntryCells) -> bool {
    let blank = |column| cells.get(column).is_empty();
    let timeless = blank(Column::Utc) && blank(Column::ShipTime);
    let bearing = !blank(Column::GyroBearing) || !blank(Column::CompassBearing);
    let placed = !blank(Column::Position) || (!blank(Column::Lat) && !blank(Column::Lon));
    match cells.get(Column::Method).to_ascii_lowercase().as_str() {
        "none" => timeless || blank(Column::Remarks),
        "comparison" => timeless || blank(Column::GyroHeading) || blank(Column::CompassHeading),
        "transit" => timeless || blank(Column::ChartedBearing) || !bearing,
        _ => timeless || !placed || blank(Column::Body) || !bearing,
    }
}

/// Whether a worked observation has no azimuth at all.
pub fn no_azimuth(worked: &Worked) -> Option<String> {
    worked.true_azimuth.is_none().then(|| worked.no_azimuth.map(|reason| reason.to_string())).flatten()
}
