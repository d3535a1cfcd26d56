//! Single fields: times, dates, latitudes, headings, speeds.

use super::refused::Refusal;
use crate::angle::text::read_number;
use crate::angle::{Latitude, Longitude, Position, Reading};
use crate::compass::Place;
use crate::time::text::TimeOfDay;
use crate::time::{Moment, UtcInstant};
use chrono::{Datelike, NaiveDate};

/// Milliseconds of a day.
pub(super) const DAY_MS: i64 = 86_400_000;

fn figures(text: &str) -> Option<u32> {
    (!text.is_empty() && text.bytes().all(|b| b.is_ascii_digit())).then(|| text.parse().ok()).flatten()
}

/// Whole part and decimals of a plain number; the decimals of `12` and `12.` are none.
fn parted(text: &str) -> Option<(&str, &str)> {
    let (whole, decimals) = text.split_once('.').unwrap_or((text, ""));
    decimals.bytes().all(|b| b.is_ascii_digit()).then_some((whole, decimals))
}

/// The step of the last of so many decimals.
fn step(decimals: &str) -> f64 {
    10_f64.powi(-(decimals.len().min(9) as i32))
}

/// `hhmmss` with or without decimals of a second. The second 60 is taken at 23:59 alone.
pub(super) fn time_of_day(text: &str) -> Result<TimeOfDay, Refusal> {
    if text.is_empty() {
        return Err(Refusal::Empty);
    }
    let read = || {
        let (whole, decimals) = parted(text)?;
        let two = |at: usize| figures(whole.get(at..at + 2)?);
        let (hour, minute, second) = (two(0)?, two(2)?, two(4)?);
        let leap = second == 60;
        if whole.len() != 6 || hour > 23 || minute > 59 || second > 60 || (leap && (hour, minute) != (23, 59)) {
            return None;
        }
        let ms = decimals.bytes().chain(*b"000").take(3).fold(0, |sum, digit| sum * 10 + u32::from(digit - b'0'));
        Some(TimeOfDay { ms: (hour * 3600 + minute * 60 + second) * 1000 + ms, step_s: step(decimals).max(0.001), leap })
    };
    read().ok_or(Refusal::Unreadable)
}

/// `ddmmyy`, as RMC has it: 80 to 99 are 1980 to 1999, 00 to 79 are 2000 to 2079.
pub(super) fn date_of_six_figures(text: &str) -> Result<NaiveDate, Refusal> {
    if text.is_empty() {
        return Err(Refusal::Empty);
    }
    let two = |at: usize| text.get(at..at + 2).filter(|_| text.len() == 6).and_then(figures);
    let (Some(day), Some(month), Some(year)) = (two(0), two(2), two(4)) else { return Err(Refusal::Unreadable) };
    let year = i32::try_from(year).unwrap_or_default() + if year >= 80 { 1900 } else { 2000 };
    NaiveDate::from_ymd_opt(year, month, day).ok_or(Refusal::Unreadable)
}

/// Day, month and year in three fields, as ZDA has them.
pub(super) fn date_of_three_fields(day: &str, month: &str, year: &str) -> Result<NaiveDate, Refusal> {
    if [day, month, year].iter().any(|f| f.is_empty()) {
        return Err(Refusal::Empty);
    }
    let read = || {
        let (day, month, whole_year) = (figures(day)?, figures(month)?, figures(year)?);
        NaiveDate::from_ymd_opt(i32::try_from(whole_year).ok().filter(|_| year.len() == 4)?, month, day)
    };
    read().ok_or(Refusal::Unreadable)
}

/// The instant of that date and time.
///
/// A leap second is taken at the end of any June or December, for those to come stand in no table.
pub(super) fn instant(date: NaiveDate, time: TimeOfDay) -> Result<Moment, Refusal> {
    if time.leap && !matches!((date.month(), date.day()), (6, 30) | (12, 31)) {
        return Err(Refusal::Unreadable);
    }
    let midnight_ms = date.and_time(chrono::NaiveTime::MIN).and_utc().timestamp_millis();
    let utc = UtcInstant::from_unix_ms(midnight_ms + i64::from(time.ms)).map_err(|_| Refusal::Unreadable)?;
    Ok(Moment { utc, step_s: time.step_s })
}

/// Latitude `ddmm.mm`, its letter, longitude `dddmm.mm`, its letter.
pub(super) fn place([lat, north, lon, east]: [&str; 4]) -> Result<Place, Refusal> {
    if [lat, north, lon, east].iter().any(|f| f.is_empty()) {
        return Err(Refusal::Empty);
    }
    let angle = |text: &str, degree_figures: usize, side: &str, plus: &str, minus: &str| -> Option<(f64, f64)> {
        let (whole, decimals) = parted(text)?;
        let (degrees, minutes) = whole.split_at_checked(degree_figures).filter(|(_, m)| m.len() == 2)?;
        let minutes_of_arc = format!("{minutes}.{decimals}0").parse::<f64>().ok()?;
        figures(minutes).filter(|m| *m < 60)?;
        let deg = f64::from(figures(degrees)?) + minutes_of_arc / 60.0;
        let sign = if side == plus { 1.0 } else { (side == minus).then_some(-1.0)? };
        Some((sign * deg, step(decimals) / 60.0))
    };
    let read = || {
        let (lat_deg, lat_step_deg) = angle(lat, 2, north, "N", "S")?;
        let (lon_deg, lon_step_deg) = angle(lon, 3, east, "E", "W")?;
        let position = Position { lat: Latitude::from_deg(lat_deg)?, lon: Longitude::from_deg(lon_deg)? };
        Some(Place { position, step_deg: lat_step_deg.max(lon_step_deg) })
    };
    read().ok_or(Refusal::Unreadable)
}

/// A heading in degrees, 0 to 360, with the step of its last figure.
pub(super) fn heading(text: &str) -> Result<Reading<f64>, Refusal> {
    if text.is_empty() {
        return Err(Refusal::Empty);
    }
    let deg = read_number(text, 0.0..=360.0, "a heading").map_err(|_| Refusal::Unreadable)?;
    let (_, decimals) = parted(text).ok_or(Refusal::Unreadable)?;
    Ok(Reading::new(deg, step(decimals)))
}

/// A speed in knots, 0 to 100.
pub(super) fn speed_kn(text: &str) -> Result<f64, Refusal> {
    if text.is_empty() {
        return Err(Refusal::Empty);
    }
    read_number(text, 0.0..=100.0, "a speed").map_err(|_| Refusal::Unreadable)
}

/// The letter of a mode or status field; `None` where it is empty, as in older editions of the standard.
pub(super) fn letter(text: &str) -> Result<Option<char>, Refusal> {
    let mut chars = text.chars();
    match (chars.next(), chars.next()) {
        (None, _) => Ok(None),
        (Some(c), None) => Ok(Some(c)),
        _ => Err(Refusal::Unreadable),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn times_and_dates() {
        assert_eq!(time_of_day("235960.00").unwrap().ms, 86_400_000);
        assert_eq!(time_of_day("061230.25"), Ok(TimeOfDay { ms: 22_350_250, step_s: 0.01, leap: false }));
        assert_eq!(time_of_day("061230").unwrap().step_s, 1.0);
        for bad in ["0612", "06:12:30", "246000", "066000", "061260", "061261", "-61230", "061230.x", "0612301", "6 1230"] {
            assert_eq!(time_of_day(bad), Err(Refusal::Unreadable), "{bad}");
        }
        assert_eq!(date_of_six_figures("230394"), Ok(NaiveDate::from_ymd_opt(1994, 3, 23).unwrap()));
        assert_eq!(date_of_six_figures("140679"), Ok(NaiveDate::from_ymd_opt(2079, 6, 14).unwrap()));
        assert_eq!(date_of_six_figures("140680"), Ok(NaiveDate::from_ymd_opt(1980, 6, 14).unwrap()));
        assert_eq!(date_of_six_figures("300226"), Err(Refusal::Unreadable));
        assert_eq!(date_of_three_fields("14", "06", "26"), Err(Refusal::Unreadable));
        assert_eq!(date_of_three_fields("", "06", "2026"), Err(Refusal::Empty));
    }

    #[test]
    fn leap_seconds() {
        let at = |date| instant(date_of_six_figures(date).unwrap(), time_of_day("235960").unwrap());
        assert_eq!(at("311216").unwrap().utc.unix_ms(), 1_483_228_800_000); // 2017-01-01T00:00:00Z
        assert!(at("300627").is_ok());
        assert_eq!(at("290627"), Err(Refusal::Unreadable));
        assert_eq!(instant(NaiveDate::from_ymd_opt(9999, 1, 1).unwrap(), time_of_day("000000").unwrap()), Err(Refusal::Unreadable));
    }

    #[test]
    fn places() {
        let south = place(["3605.80", "S", "13033.6", "W"]).unwrap();
        assert!((south.position.lat.deg() + 36.0 - -5.8 / 60.0).abs() < 1e-12 && (south.position.lon.deg() + 130.56).abs() < 1e-12);
        assert!((south.step_deg - 0.1 / 60.0).abs() < 1e-12);
        assert!(place(["0000", "S", "00000", "E"]).is_ok());
        for bad in [
            ["9900.00", "N", "00000.00", "E"],
            ["9000.01", "N", "00000.00", "E"],
            ["3660.00", "N", "00000.00", "E"],
            ["3600.00", "E", "00000.00", "N"],
            ["3600.00", "n", "00000.00", "E"],
            ["3600.00", "N", "0000.00", "E"],
            ["3600.00", "N", "18000.01", "E"],
            ["36-00.0", "N", "00000.00", "E"],
            ["3600.0.0", "N", "00000.00", "E"],
        ] {
            assert_eq!(place(bad), Err(Refusal::Unreadable), "{bad:?}");
        }
        assert_eq!(place(["", "", "", ""]), Err(Refusal::Empty));
    }

    #[test]
    fn headings_and_speeds() {
        assert_eq!(heading("204.0"), Ok(Reading::new(204.0, 0.1)));
        assert_eq!(
            (heading("360.1"), heading("-1"), heading("1e2"), heading("")),
            (Err(Refusal::Unreadable), Err(Refusal::Unreadable), Err(Refusal::Unreadable), Err(Refusal::Empty))
        );
        assert_eq!((speed_kn("12.3"), speed_kn("101")), (Ok(12.3), Err(Refusal::Unreadable)));
        assert_eq!((letter("A"), letter(""), letter("AB")), (Ok(Some('A')), Ok(None), Err(Refusal::Unreadable)));
    }
}
