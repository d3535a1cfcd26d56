// What each fuzz target does with bytes: read them, and hold what must hold of whatever could be read.
// Included by the fuzz workspace and by the test that replays the kept inputs.

use shadowpin::angle::text::{self as angle_text, ErrorSign, Letters};
use shadowpin::book::{self, Book};
use shadowpin::limits::Limits;
use shadowpin::logbook::card::read_cards;
use shadowpin::logbook::entry::{Faults, ReadAs, read_entry};
use shadowpin::logbook::log::{LogReader, Record};
use shadowpin::logbook::nmea::{Ages, Bridge};
use shadowpin::time::text as time_text;

/// Directions and signed errors.
pub fn angle(bytes: &[u8]) {
    let text = String::from_utf8_lossy(bytes);
    if let Ok(direction) = angle_text::read_direction(&text) {
        assert!((0.0..360.0).contains(&direction.value) && direction.step_deg > 0.0);
        assert!(angle_text::write::direction(direction.value, 1) != "360.0");
    }
    for sign in [ErrorSign::EastPlus, ErrorSign::HighPlus] {
        if let Ok(error) = angle_text::read_error(&text, sign, Letters::LowHighToo) {
            assert!(error.value.abs() <= 180.0);
            let back = angle_text::read_error(&angle_text::write::east_west(error.value), sign, Letters::EastWest).map(|e| e.value);
            assert!(back.is_ok_and(|b| (b - error.value).abs() <= 0.051));
        }
    }
}

/// Instants, dates, times of day, zones.
pub fn time(bytes: &[u8]) {
    let text = String::from_utf8_lossy(bytes);
    if let Ok(moment) = time_text::read_utc(&text) {
        let back = time_text::read_utc(&time_text::write::iso(moment.utc));
        assert!(back.is_ok_and(|b| b.utc.seconds_since(moment.utc).abs() <= 0.5));
    }
    for zone in [time_text::read_zone(&text), time_text::read_clock_offset(&text)].into_iter().flatten() {
        assert!(time_text::read_zone(&time_text::write::zone(zone)).is_ok_and(|z| z == zone));
    }
    let _ = time_text::read_time_of_day(&text);
    for order in [time_text::DateOrder::DayMonthYear, time_text::DateOrder::MonthDayYear] {
        let _ = time_text::read_date_time(&text, order);
    }
}

/// Latitudes, longitudes, both in one cell.
pub fn position(bytes: &[u8]) {
    let text = String::from_utf8_lossy(bytes);
    if let Ok(lat) = angle_text::read_latitude(&text) {
        assert!(lat.value.deg().abs() <= 90.0);
        assert!(angle_text::read_latitude(&angle_text::write::latitude(lat.value)).is_ok());
    }
    if let Ok(lon) = angle_text::read_longitude(&text) {
        assert!(lon.value.deg().abs() <= 180.0);
    }
    let _ = angle_text::read_position(&text);
}

/// A whole log: whatever its bytes, it ends, and every row says what is wrong or gives an entry.
pub fn log(bytes: &[u8]) {
    let Ok(mut log) = LogReader::new(bytes, "fuzzed", true) else { return };
    let (mut record, mut faults) = (Record::default(), Faults::default());
    while let Ok(Some(row)) = log.next(&mut record) {
        faults.clear();
        let entry = read_entry(&row, ReadAs::default(), &mut faults);
        assert!(entry.nothing_had || entry.observation.is_some() || !faults.is_empty() || row.record.is_blank());
        let _ = faults.in_one();
    }
}

/// A deviation card.
pub fn card(bytes: &[u8]) {
    if let Ok(cards) = read_cards("fuzzed", bytes) {
        for card in cards.iter() {
            let deviation = card.as_given(shadowpin::angle::CompassBearing::wrapping_deg(123.0));
            assert!(deviation.deg().is_finite());
        }
    }
}

/// A limits file.
pub fn limits(bytes: &[u8]) {
    let text = String::from_utf8_lossy(bytes);
    if let Ok(limits) = Limits::from_toml(&text, "fuzzed") {
        for setting in shadowpin::limits::SETTINGS {
            assert!((setting.least..=setting.most).contains(&(setting.get)(&limits)));
        }
    }
}

/// A stream of sentences: what is found is in range, and the same wherever it is cut.
pub fn nmea(bytes: &[u8]) {
    let listen = |chunk: usize| {
        let mut bridge = Bridge::new(None);
        bytes.chunks(chunk).for_each(|c| bridge.push(c, std::time::Duration::ZERO));
        bridge.found(Ages::ByStream, &Limits::default())
    };
    let found = listen(bytes.len().max(1));
    assert!(found == listen(1) && found == listen(7));
    assert!(found.position.is_none_or(|p| p.value.position.lat.deg().abs() <= 90.0));
    assert!(found.gyro_heading.is_none_or(|h| (0.0..360.0).contains(&h.value.value.deg())));
    assert!(found.compass_heading.is_none_or(|h| (0.0..360.0).contains(&h.value.value.deg())));
    assert!(found.speed_kn.is_none_or(|v| (0.0..=100.0).contains(&v.value)));
}

/// A ship's own record: whatever its bytes, a check ends, and so does its page.
pub fn book(bytes: &[u8]) {
    let Ok(book) = Book::parse("fuzzed", bytes) else { return };
    let checked = book::check(&book);
    assert!(checked.findings.len() <= 2 * book.entries.len() + 1);
    let page = book::page(&book, book.entries.iter(), "");
    assert!(page.text().ends_with('\n') && page.html().ends_with('\n'));
    assert!(book.torn.is_none_or(|torn| torn.start + torn.length == bytes.len()));
}
