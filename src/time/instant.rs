//! An instant of UTC, to the millisecond.

use super::scales::Ut1;
use crate::error::NoAnswer;
use chrono::{DateTime, Datelike, NaiveDateTime, Utc};

/// First calendar year (UTC) that is answered.
pub const FIRST_YEAR: i32 = 1900;
/// Last calendar year (UTC) that is answered.
pub const LAST_YEAR: i32 = 2100;

const FIRST_MS: i64 = -2_208_988_800_000; // 1900-01-01T00:00:00Z
const END_MS: i64 = 4_133_980_800_000; // 2101-01-01T00:00:00Z
/// 2000-01-01T12:00:00Z, the epoch J2000.0, in milliseconds of the Unix count.
const J2000_MS: i64 = 946_728_000_000;
const DAY_MS: f64 = 86_400_000.0;

/// An instant of UTC in the years 1900 to 2100, kept in milliseconds of the Unix count.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct UtcInstant {
    unix_ms: i64,
}

impl UtcInstant {
    /// From milliseconds of the Unix count.
    ///
    /// # Errors
    /// [`NoAnswer::Year`] outside 1900 to 2100.
    pub fn from_unix_ms(unix_ms: i64) -> Result<Self, NoAnswer> {
        if (FIRST_MS..END_MS).contains(&unix_ms) {
            Ok(Self { unix_ms })
        } else {
            let year = DateTime::from_timestamp_millis(unix_ms).map_or(if unix_ms < 0 { i32::MIN } else { i32::MAX }, |t| t.year());
            Err(NoAnswer::Year { year, first: FIRST_YEAR, last: LAST_YEAR })
        }
    }

    /// From a date and time of UTC.
    ///
    /// # Errors
    /// [`NoAnswer::Year`] outside 1900 to 2100.
    pub fn from_naive(utc: NaiveDateTime) -> Result<Self, NoAnswer> {
        Self::from_unix_ms(utc.and_utc().timestamp_millis())
    }

    /// Milliseconds of the Unix count.
    pub fn unix_ms(self) -> i64 {
        self.unix_ms
    }

    /// The calendar date and time, UTC.
    pub fn to_chrono(self) -> DateTime<Utc> {
        // In range by construction; the epoch stands in for the case that cannot be.
        DateTime::from_timestamp_millis(self.unix_ms).unwrap_or_default()
    }

    /// This instant on the scale UT1, with UTC taken as UT1: at most 0.9 s, 0.004 degrees of hour angle.
    pub fn ut1(self) -> Ut1 {
        Ut1::from_days_j2000((self.unix_ms - J2000_MS) as f64 / DAY_MS)
    }

    /// The instant `seconds` later (earlier where negative).
    ///
    /// # Errors
    /// [`NoAnswer::Year`] outside 1900 to 2100.
    pub fn plus_seconds(self, seconds: f64) -> Result<Self, NoAnswer> {
        // Saturates far outside the years that are answered.
        Self::from_unix_ms(self.unix_ms.saturating_add((seconds * 1000.0).round() as i64))
    }

    /// Seconds from `earlier` to this instant; negative where `earlier` is the later one.
    pub fn seconds_since(self, earlier: Self) -> f64 {
        (self.unix_ms - earlier.unix_ms) as f64 / 1000.0
    }

    /// Decimal year, by days of the calendar year: 2025-07-02T12:00Z is 2025.5.
    pub fn decimal_year(self) -> f64 {
        let utc = self.to_chrono();
        let year = utc.year();
        let start = |y: i32| {
            chrono::NaiveDate::from_ymd_opt(y, 1, 1).map_or(0, |d| d.and_time(chrono::NaiveTime::MIN).and_utc().timestamp_millis())
        };
        let (from, to) = (start(year), start(year + 1));
        f64::from(year) + (self.unix_ms - from) as f64 / (to - from) as f64
    }
}
