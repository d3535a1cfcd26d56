//! What an entry lacks, from the ship's instruments.

use super::super::nmea::{Heard, NmeaArgs};
use shadowpin::angle::text::{read_direction, read_number, write};
use shadowpin::angle::{CompassBearing, GyroBearing, Reading};
use shadowpin::book::EntryCells;
use shadowpin::compass::{Observation, Target};
use shadowpin::error::Result;
use shadowpin::limits::Limits;
use shadowpin::logbook::columns::Column;
use shadowpin::logbook::entry::{Faults, ReadAs, read_entry};
use shadowpin::logbook::nmea::Item;
use shadowpin::time::text::write::iso;

/// Fills blank cells from what is heard; answers it, where a source was given.
pub fn fill(cells: &mut EntryCells, read_as: ReadAs, nmea: &NmeaArgs, limits: &Limits) -> Result<Option<Heard>> {
    if !nmea.is_given() {
        return Ok(None);
    }
    let mut observation = by_hand(cells, read_as);
    let (before, wanted) = (observation, wanted(cells, &observation));
    let heard = nmea.fill(&mut observation, &wanted, limits)?;
    if let (None, Some(moment)) = (before.moment, observation.moment) {
        cells.set(Column::Utc, &iso(moment.utc));
    }
    if let (None, Some(place)) = (before.place, observation.place) {
        // Written as a log is: 36-05.8S.
        let plain = |text: String| text.replace('°', "-").replace('\'', "");
        cells.set(Column::Lat, &plain(write::latitude(place.position.lat)));
        cells.set(Column::Lon, &plain(write::longitude(place.position.lon)));
    }
    if let (None, Some(heading)) = (before.gyro_heading, observation.gyro_heading) {
        cells.set(Column::GyroHeading, &write::direction(heading.value.deg(), 1));
    }
    if let (None, Some(heading)) = (before.compass_heading, observation.compass_heading) {
        cells.set(Column::CompassHeading, &write::direction(heading.value.deg(), 1));
    }
    if let (None, Some(speed_kn)) = (before.speed_kn, observation.speed_kn) {
        cells.set(Column::Speed, &format!("{speed_kn:.1}"));
    }
    Ok(heard)
}

/// What was given by hand and can be read.
fn by_hand(cells: &EntryCells, read_as: ReadAs) -> Observation {
    let entry = read_entry(cells, read_as, &mut Faults::default());
    let direction = |column| read_direction(cells.get(column)).ok();
    Observation {
        moment: entry.moment,
        place: entry.place,
        gyro_heading: direction(Column::GyroHeading).map(|d| Reading::new(GyroBearing::wrapping_deg(d.value), d.step_deg)),
        compass_heading: direction(Column::CompassHeading).map(|d| Reading::new(CompassBearing::wrapping_deg(d.value), d.step_deg)),
        speed_kn: read_number(cells.get(Column::Speed), 0.0..=100.0, "").ok(),
        ..Observation::of(Target::Headings)
    }
}

/// The items to fill or to mention: those that stand in no cell, and those that could be read from theirs. One that is written wrongly is
/// neither, for its fault is said.
fn wanted(cells: &EntryCells, observation: &Observation) -> Vec<Item> {
    let blank = |columns: &[Column]| columns.iter().all(|c| cells.get(*c).is_empty());
    let fits = |item: &Item| match item {
        Item::Time => observation.moment.is_some() || blank(&[Column::Utc, Column::ShipTime, Column::Date]),
        Item::Position => observation.place.is_some() || blank(&[Column::Position, Column::Lat, Column::Lon]),
        Item::GyroHeading => observation.gyro_heading.is_some() || blank(&[Column::GyroHeading]),
        Item::CompassHeading => observation.compass_heading.is_some() || blank(&[Column::CompassHeading]),
        Item::Speed => observation.speed_kn.is_some() || blank(&[Column::Speed]),
    };
    Item::ALL.into_iter().filter(fits).collect()
}
