//! Times of day.

use crate::error::BadValue;

/// A time of day as written.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct TimeOfDay {
    /// Milliseconds since midnight; from 86,400,000 on only in a leap second.
    pub ms: u32,
    /// The step of the figure, seconds: 60 for HH:MM.
    pub step_s: f64,
    /// Whether the second is written 60.
    pub leap: bool,
}

const TIME: &str = "a time of day such as 06:12:30 or 06:12";

/// A time of day: `HH:MM`, `HH:MM:SS`, with decimals of a second.
///
/// The second 60 is taken only as the last of a minute; whether a leap second was inserted then is checked by
/// [`moment`](super::moment).
///
/// # Errors
/// [`BadValue`] for hours over 23, minutes over 59, seconds over 60.
pub fn read_time_of_day(text: &str) -> Result<TimeOfDay, BadValue> {
    let refuse = |hint: &'static str| BadValue::new(text, TIME).hint(hint);
    let trimmed = text.trim();
    let mut parts = trimmed.split(':');
    let (Some(h), Some(m), s, None) = (parts.next(), parts.next(), parts.next(), parts.next()) else {
        let plain = trimmed.len() == 4 && trimmed.bytes().all(|b| b.is_ascii_digit());
        return Err(refuse(if plain { "write a colon between hours and minutes" } else { "" }));
    };
    let two = |part: &str| -> Option<u32> {
        ((1..=2).contains(&part.len()) && part.bytes().all(|b| b.is_ascii_digit())).then(|| part.parse().ok()).flatten()
    };
    let (Some(hour), Some(minute)) = (two(h), two(m)) else { return Err(refuse("")) };
    if hour > 23 || minute > 59 {
        return Err(refuse(if hour == 24 { "midnight is 00:00 of the next day" } else { "hours are under 24 and minutes under 60" }));
    }
    let minute_ms = (hour * 60 + minute) * 60_000;
    let Some(seconds) = s else { return Ok(TimeOfDay { ms: minute_ms, step_s: 60.0, leap: false }) };
    let (whole, fraction) = seconds.split_once(['.', ',']).unwrap_or((seconds, ""));
    let Some(second) = two(whole).filter(|s| *s <= 60) else { return Err(refuse("seconds are under 60")) };
    if !fraction.bytes().all(|b| b.is_ascii_digit()) {
        return Err(refuse(""));
    }
    // Milliseconds are kept; further decimals are below what any clock on a bridge is good for.
    let ms = fraction.bytes().chain(*b"000").take(3).fold(0, |sum, digit| sum * 10 + u32::from(digit - b'0'));
    let step_s = 10_f64.powi(-(fraction.len().min(3) as i32));
    Ok(TimeOfDay { ms: minute_ms + second * 1000 + ms, step_s, leap: second == 60 })
}
