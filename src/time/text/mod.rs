//! Dates, times and zones as text.

mod clock;
mod date;
mod full;
mod leap;
pub mod write;
mod zone;

pub use clock::{TimeOfDay, read_time_of_day};
pub use date::{DateOrder, read_date};
pub use zone::{read_clock_offset, read_zone};

use super::{Moment, UtcInstant, Zone};
use crate::error::BadValue;
use chrono::NaiveDate;

const UTC: &str = "a date and time such as 2026-06-14T06:12:30Z";

/// A date and a time of day apart by a `T` or a blank; `tail` takes what follows the time (`Z`, an offset).
fn parted<'t>(text: &'t str, expected: &'static str) -> Result<(&'t str, &'t str, Option<&'t str>), BadValue> {
    let trimmed = text.trim();
    // A date has no colon, so the blank or T before the first colon's hour parts the two.
    let colon = trimmed.find(':').ok_or_else(|| BadValue::new(text, expected).hint("the time of day is missing"))?;
    let before = trimmed.get(..colon).unwrap_or_default();
    let part = before.rfind(['T', 't', ' ']).ok_or_else(|| BadValue::new(text, expected))?;
    let (date, rest) = (trimmed.get(..part).unwrap_or_default(), trimmed.get(part + 1..).unwrap_or_default());
    let end = rest.find(|c: char| !(c.is_ascii_digit() || matches!(c, ':' | '.' | ','))).unwrap_or(rest.len());
    let (clock, tail) = (rest.get(..end).unwrap_or_default(), rest.get(end..).unwrap_or_default().trim());
    Ok((date.trim(), clock, (!tail.is_empty()).then_some(tail)))
}

/// An instant of a column that says it is UTC: ISO 8601 with `Z`, an offset or neither; `HH:MM` without seconds is allowed.
///
/// # Errors
/// [`BadValue`] with what is wrong: no time of day, no such day, a leap second that never was, a year outside 1900 to 2100.
///
/// # Example
/// ```
/// use shadowpin::time::text::read_utc;
/// assert_eq!(read_utc("2026-06-14 06:12")?.utc, read_utc("2026-06-14T15:12:00+09:00")?.utc);
/// # Ok::<(), shadowpin::error::BadValue>(())
/// ```
pub fn read_utc(text: &str) -> Result<Moment, BadValue> {
    read_utc_ordered(text, DateOrder::Iso)
}

/// As [`read_utc`], with dates in another order allowed.
///
/// # Errors
/// As [`read_utc`].
pub fn read_utc_ordered(text: &str, order: DateOrder) -> Result<Moment, BadValue> {
    let whole = |bad: BadValue| BadValue { value: BadValue::new(text, "").value, ..bad };
    if let Some((date, time)) = full::read(text) {
        return moment(date, time, Zone::UTC).map_err(whole);
    }
    let (date, clock, tail) = parted(text, UTC)?;
    let zone = match tail {
        None => Zone::UTC,
        Some(tail) if tail.eq_ignore_ascii_case("utc") => Zone::UTC,
        Some(tail) => read_clock_offset(tail).map_err(whole)?,
    };
    moment(read_date(date, order).map_err(whole)?, read_time_of_day(clock).map_err(whole)?, zone).map_err(whole)
}

/// Date and time of day of a ship's clock, from one cell; the zone stands elsewhere.
///
/// # Errors
/// [`BadValue`]; also where the cell itself carries `Z` or an offset, which would make the zone said twice.
pub fn read_date_time(text: &str, order: DateOrder) -> Result<(NaiveDate, TimeOfDay), BadValue> {
    const SHIP: &str = "ship's date and time such as 2026-06-14 15:12";
    let whole = |bad: BadValue| BadValue { value: BadValue::new(text, "").value, ..bad };
    let (date, clock, tail) = parted(text, SHIP)?;
    if tail.is_some() {
        return Err(BadValue::new(text, SHIP).hint("ship's time carries no Z or offset: use the column utc, or zone or utc_offset"));
    }
    Ok((read_date(date, order).map_err(whole)?, read_time_of_day(clock).map_err(whole)?))
}

/// The instant when a clock of that zone showed that date and time: UTC = ship's time + zone description.
///
/// A leap second is kept as the first instant of the next minute, which is what it is on a scale without leap seconds.
///
/// # Errors
/// [`BadValue`] for a second 60 where no leap second was inserted, and for years outside 1900 to 2100.
pub fn moment(date: NaiveDate, time: TimeOfDay, zone: Zone) -> Result<Moment, BadValue> {
    let midnight_ms = date.and_time(chrono::NaiveTime::MIN).and_utc().timestamp_millis();
    let unix_ms = midnight_ms + i64::from(time.ms) + i64::from(zone.description_minutes()) * 60_000;
    let utc = UtcInstant::from_unix_ms(unix_ms)
        .map_err(|year| BadValue::new(&date.to_string(), "a date in the years 1900 to 2100").hint(year.to_string()))?;
    if time.leap {
        let at = utc.to_chrono();
        let midnight = at.timestamp_millis().rem_euclid(86_400_000) < 1000;
        if !midnight || !at.date_naive().pred_opt().is_some_and(leap::ended_with_leap_second) {
            return Err(BadValue::new(&date.to_string(), "a time of day with seconds under 60").hint("no leap second was inserted then"));
        }
    }
    Ok(Moment { utc, step_s: time.step_s })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn ms(text: &str) -> i64 {
        read_utc(text).unwrap_or_else(|e| panic!("{text}: {e}")).utc.unix_ms()
    }

    #[test]
    fn forms_of_one_instant() {
        let at = 1_781_417_520_000; // 2026-06-14T06:12:00Z
        for text in [
            "2026-06-14T06:12:00Z",
            "2026-06-14 06:12",
            "2026-06-14T06:12:00.000Z",
            "2026-06-14t15:12:00+09:00",
            "2026-06-14 06:12 UTC",
            "14 Jun 2026 06:12Z",
            "2026-06-14T02:42:00-03:30",
            "2026-6-14 6:12",
        ] {
            assert_eq!(ms(text), at, "{text}");
        }
        assert_eq!(read_utc("2026-06-14 06:12").unwrap().step_s, 60.0);
        assert_eq!(read_utc("2026-06-14 06:12:00").unwrap().step_s, 1.0);
        assert_eq!(read_utc("2026-06-14 06:12:00.25").unwrap().step_s, 0.01);
    }

    #[test]
    fn ship_time_and_zone() {
        let (date, time) = read_date_time("14/06/2026 15:12", DateOrder::DayMonthYear).unwrap();
        let zone = read_zone("-9").unwrap();
        assert_eq!(moment(date, time, zone).unwrap().utc.unix_ms(), 1_781_417_520_000);
        assert!(read_date_time("2026-06-14T15:12Z", DateOrder::Iso).unwrap_err().hint.contains("carries no Z"));
    }

    #[test]
    fn leap_seconds_only_where_there_was_one() {
        assert_eq!(ms("2016-12-31T23:59:60Z"), ms("2017-01-01T00:00:00Z"));
        assert_eq!(ms("2017-01-01T08:59:60+09:00"), ms("2017-01-01T00:00:00Z"));
        assert_eq!(read_utc("2026-06-30T23:59:60Z").unwrap_err().hint, "no leap second was inserted then");
        assert!(read_utc("2016-12-31T22:59:60Z").is_err());
    }

    #[test]
    fn refused_with_a_reason() {
        let hint = |text: &str| read_utc(text).unwrap_err().hint.into_owned();
        assert_eq!(hint("2026-06-14"), "the time of day is missing");
        assert_eq!(hint("2026-02-30 06:12"), "there is no such day");
        assert_eq!(hint("01/02/2026 06:12"), "day or month first? say --date-order dmy or --date-order mdy");
        assert_eq!(hint("2026-06-14 24:00"), "midnight is 00:00 of the next day");
        assert!(hint("1899-12-31 06:12").contains("1900"));
        assert!(hint("2101-01-01 06:12").contains("2100"));
        assert!(read_utc("2026-06-14 06:61").is_err() && read_utc("").is_err() && read_utc("2026-06-14T06:12:00X").is_err());
    }
}
