//! The book that comes with the project is what the library writes, and is shown as the README says.

use crate::commands::{answers, fixture};
use shadowpin::book::{EntryCells, append};
use shadowpin::compass::work;
use shadowpin::limits::Limits;
use shadowpin::logbook::columns::Column as C;
use shadowpin::logbook::entry::{Faults, ReadAs, read_entry};
use shadowpin::time::text::read_utc;
use std::path::Path;

/// Enters cells as the command does, with a time of entry of our own.
fn enter(path: &Path, recorded: &str, given: &[(C, &str)], mark: impl FnOnce(&mut EntryCells)) {
    let mut cells = EntryCells::default();
    given.iter().for_each(|(column, text)| cells.set(*column, text));
    let mut faults = Faults::default();
    let entry = read_entry(&cells, ReadAs::default(), &mut faults);
    let (moment, zone, observation) = (entry.moment, entry.zone, entry.observation);
    if let Some(moment) = moment {
        cells.set_moment(moment, zone);
    }
    if let Some(observation) = observation {
        assert!(faults.is_empty(), "{}", faults.in_one());
        cells.set_worked(&work(&observation, None, &Limits::default()));
    }
    mark(&mut cells);
    cells.set_recorded(read_utc(recorded).unwrap().utc);
    let made = append(path, true, |_| Ok(cells)).unwrap();
    assert_eq!(made.found, Vec::<String>::new());
}

/// A watch or two of an invented ship.
fn make(path: &Path) {
    let ship = [(C::Vessel, "Amber Tern"), (C::Gyro, "No.1"), (C::Zone, "-9")];
    let entry = |recorded: &str, given: &[(C, &str)], mark: fn(&mut EntryCells)| enter(path, recorded, &[&ship[..], given].concat(), mark);
    let sun = [(C::Body, "Sun"), (C::Lat, "36-05.8S"), (C::Lon, "130-33.6E"), (C::MagneticCompass, "standard"), (C::Observer, "2/O")];
    let noon = [(C::Utc, "2026-06-14T06:12:00Z"), (C::Method, "azimuth"), (C::GyroHeading, "204"), (C::CompassHeading, "200.5")];
    entry(
        "2026-06-13T22:34:10Z",
        &[
            (C::Utc, "2026-06-13T22:30:00Z"),
            (C::Lat, "34-51.0S"),
            (C::Lon, "131-02.0E"),
            (C::Body, "Sun"),
            (C::Method, "rising"),
            (C::Repeater, "starboard"),
            (C::EyeHeight, "18"),
            (C::GyroBearing, "060.5"),
            (C::Observer, "C/O"),
        ],
        |_| {},
    );
    entry("2026-06-14T06:15:40Z", &[&sun[..], &noon, &[(C::GyroBearing, "318.5"), (C::CompassBearing, "341.5")]].concat(), |_| {});
    entry("2026-06-14T06:20:05Z", &[&sun[..], &noon, &[(C::GyroBearing, "318.5"), (C::CompassBearing, "314.5")]].concat(), |cells| {
        cells.set_corrects(2, "314.5 written as 341.5");
    });
    entry(
        "2026-06-14T10:31:22Z",
        &[(C::Utc, "2026-06-14T10:30Z"), (C::Method, "none"), (C::Remarks, "overcast"), (C::Observer, "3/O")],
        |_| {},
    );
    enter(path, "2026-06-14T11:00:00Z", &[], |cells| cells.set_signed("Master"));
}

#[test]
fn the_fixture_is_what_is_written() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("book.csv");
    make(&path);
    let made = std::fs::read_to_string(&path).unwrap();
    assert_eq!(made, std::fs::read_to_string(fixture("books/amber_tern.csv")).unwrap_or_default(), "{made}");
}

#[test]
fn shown_and_printed() {
    answers("book show fixtures/books/amber_tern.csv", "book_show.txt", 0);
    answers("book print fixtures/books/amber_tern.csv --from 2026-06-13 --to 2026-06-14", "book_page.html", 0);
    answers("book check fixtures/books/amber_tern.csv --format json", "book_check.json", 0);
}
