//! Entries as they are shown and printed.

use super::check::check;
use super::entry::{Entry, Kind};
use super::read::Book;
use crate::logbook::columns::Column;
use crate::report::book_page::{BookLine, BookPage, LineKind};
use crate::time::text::write as time_text;
use crate::time::text::{read_utc, read_zone};

/// The page of some entries of a book; `span` says in words from when to when, and is empty for all.
pub fn page<'b>(book: &'b Book, entries: impl Iterator<Item = &'b Entry>, span: &str) -> BookPage {
    let checked = check(book);
    BookPage {
        name: book.name.clone(),
        span: span.to_owned(),
        lines: entries.map(|entry| line(book, entry)).collect(),
        entries: checked.entries,
        last_seal: checked.last.map(|(entry, seal)| (entry, seal.to_string())),
        found: checked.findings.iter().map(ToString::to_string).collect(),
        unsealed: checked.unsealed,
    }
}

fn line(book: &Book, entry: &Entry) -> BookLine {
    let cell = |column: Column| entry.cells.get(column).to_owned();
    let (kind, says) = said(entry);
    let moment = read_utc(entry.cells.get(Column::Utc)).ok();
    // To the minute where it was given so.
    let clock = |text: String, step_s: f64| if step_s >= 60.0 { text.get(..16).unwrap_or(&text).to_owned() } else { text };
    let ship_time = moment.zip(read_zone(entry.cells.get(Column::Zone)).ok()).map(|(moment, zone)| {
        format!("{} (zone {})", clock(time_text::ship_date_time(moment.utc, zone), moment.step_s), time_text::zone(zone))
    });
    let position = [Column::Position, Column::Lat, Column::Lon].map(|c| entry.cells.get(c)).join(" ");
    BookLine {
        kind,
        entry: entry.number.map_or_else(|| "?".to_owned(), |n| n.to_string()),
        utc: moment.map_or_else(|| cell(Column::Utc), |m| format!("{} UTC", clock(time_text::date_time(m.utc), m.step_s))),
        ship_time: ship_time.unwrap_or_default(),
        recorded: entry.cells.named("recorded_utc").to_owned(),
        vessel: cell(Column::Vessel),
        position: position.trim().to_owned(),
        observed: observed(entry),
        gyro_heading: cell(Column::GyroHeading),
        compass_heading: cell(Column::CompassHeading),
        gyro_bearing: cell(Column::GyroBearing),
        compass_bearing: cell(Column::CompassBearing),
        azimuth: cell(Column::LoggedAzimuth),
        gyro_error: cell(Column::LoggedGyroError),
        compass_error: cell(Column::LoggedCompassError),
        variation: cell(Column::LoggedVariation),
        deviation: cell(Column::LoggedDeviation),
        observer: cell(Column::Observer),
        remarks: cell(Column::Remarks),
        says,
        struck: entry.number.and_then(|number| book.struck_by(number)).map(|by| {
            let number = by.number.map_or_else(|| format!("line {}", by.line), |n| format!("entry {n}"));
            format!("{number}: {}", by.cells.named("reason"))
        }),
    }
}

fn said(entry: &Entry) -> (LineKind, String) {
    let reason = entry.cells.named("reason");
    match (entry.kind(), entry.corrects) {
        (Kind::Signature, _) => {
            let last = entry.number.unwrap_or(0).saturating_sub(1);
            (LineKind::Signature, format!("Signed, {}: entries 1 to {last} confirmed", entry.cells.named("signed")))
        }
        (Kind::Strike, Some(struck)) => (LineKind::Strike, format!("Strikes entry {struck} through: {reason}")),
        (_, Some(struck)) => (LineKind::Entry, format!("In the place of entry {struck}: {reason}")),
        _ => (LineKind::Entry, String::new()),
    }
}

/// `Sun`, `Sun rising (visible horizon, upper limb)`, `no observation`.
fn observed(entry: &Entry) -> String {
    let cell = |column| entry.cells.get(column);
    let method = cell(Column::Method).to_ascii_lowercase();
    let of = if method == "transit" { cell(Column::Mark) } else { cell(Column::Body) };
    let how = match method.as_str() {
        "none" => "no observation",
        "azimuth" => "",
        "comparison" => "headings compared",
        "transit" if of.is_empty() => "mark in transit",
        other => other,
    };
    let charted = if method == "transit" { cell(Column::ChartedBearing) } else { "" };
    let horizon = [(cell(Column::Horizon), " horizon"), (cell(Column::Limb), " limb"), (charted, " by the chart")];
    let horizon: Vec<String> = horizon.iter().filter(|(text, _)| !text.is_empty()).map(|(text, what)| format!("{text}{what}")).collect();
    let mut words = [of, how].iter().filter(|w| !w.is_empty()).copied().collect::<Vec<_>>().join(" ");
    if !horizon.is_empty() {
        words.push_str(&format!(" ({})", horizon.join(", ")));
    }
    words
}
