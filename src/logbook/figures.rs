//! Single figures of cards and swings.

use crate::angle::Deviation;
use crate::angle::text::{ErrorSign, Letters, read_error};
use crate::error::BadValue;
use crate::time::UtcInstant;
use crate::time::text::{DateOrder, read_date, read_utc};

/// A deviation: `1.5W`, `1.5 E`, `-1.5`; east +.
pub(crate) fn read_deviation(text: &str) -> Result<Deviation, BadValue> {
    read_error(text, ErrorSign::EastPlus, Letters::EastWest).map(|reading| Deviation::wrapping_deg(reading.value))
}

/// The start of a date, `2026-03-01`, or an instant of UTC.
pub fn read_day(text: &str) -> Result<UtcInstant, BadValue> {
    if text.contains(':') {
        return read_utc(text).map(|moment| moment.utc);
    }
    let day = read_date(text, DateOrder::Iso)?;
    UtcInstant::from_naive(day.and_time(chrono::NaiveTime::MIN)).map_err(|outside| BadValue::new(text, outside.to_string()))
}
