//! Single figures of cards and swings.

use crate::angle::Deviation;
use crate::error::BadValue;
use crate::time::UtcInstant;
use chrono::{DateTime, NaiveDate, NaiveTime};

/// The largest deviation that is read as one, degrees.
const LARGEST_DEG: f64 = 180.0;

/// A deviation as written: `1.5W`, `1.5 E`, `-1.5`, `+1.5`; a sign or a letter, never both. East +.
pub(crate) fn read_deviation(text: &str) -> Result<Deviation, BadValue> {
    let bad = || BadValue::new(text, "a deviation in degrees, as 1.5W or -1.5");
    let trimmed = text.trim().trim_end_matches('.').trim_end();
    let (figure, letter) = match trimmed.char_indices().next_back() {
        Some((at, letter)) if letter.is_alphabetic() => (trimmed.get(..at).unwrap_or(""), Some(letter.to_ascii_uppercase())),
        _ => (trimmed, None),
    };
    let figure = figure.trim_end_matches('°').trim().replace('\u{2212}', "-");
    let value: f64 = figure.parse().ok().filter(|v: &f64| v.is_finite() && v.abs() <= LARGEST_DEG).ok_or_else(bad)?;
    let signed = figure.starts_with(['+', '-']);
    let deg = match letter {
        None => value,
        Some(_) if signed => return Err(bad().hint("a sign or a letter, not both")),
        Some('E') => value,
        Some('W') => -value,
        Some(_) => return Err(bad().hint("only E and W name a deviation")),
    };
    Ok(Deviation::wrapping_deg(deg))
}

/// A heading of 0 to 360 degrees.
pub(crate) fn read_heading_deg(text: &str) -> Result<f64, BadValue> {
    let figure = text.trim().trim_end_matches('°').parse::<f64>().ok();
    figure.filter(|deg| (0.0..=360.0).contains(deg)).ok_or_else(|| BadValue::new(text, "a heading, 000 to 360"))
}

/// A date, `2026-03-01`, or an instant with `Z` or an offset.
pub(crate) fn read_date(text: &str) -> Result<UtcInstant, BadValue> {
    let bad = || BadValue::new(text, "a date as 2026-03-01");
    let utc = match NaiveDate::parse_from_str(text.trim(), "%Y-%m-%d") {
        Ok(day) => day.and_time(NaiveTime::MIN),
        Err(_) => DateTime::parse_from_rfc3339(text.trim()).map_err(|_| bad())?.naive_utc(),
    };
    UtcInstant::from_naive(utc).map_err(|outside| bad().hint(outside.to_string()))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn both_sign_forms_and_no_mixture() {
        for (text, deg) in [
            ("1.5W", -1.5),
            ("1.5 e", 1.5),
            ("-1.5", -1.5),
            ("+0.5", 0.5),
            ("0", 0.0),
            ("\u{2212}2", -2.0),
            ("3°W", -3.0),
            ("2.0 W.", -2.0),
        ] {
            assert_eq!(read_deviation(text).unwrap().deg(), deg, "{text}");
        }
        for text in ["", "W", "-1.5W", "1.5N", "x", "NaN", "inf", "181", "1.5.2"] {
            assert!(read_deviation(text).is_err(), "{text}");
        }
        assert_eq!(
            read_deviation("-1.5W").unwrap_err().to_string(),
            "\"-1.5W\": expected a deviation in degrees, as 1.5W or -1.5; a sign or a letter, not both"
        );
    }

    #[test]
    fn headings_and_dates() {
        assert_eq!(read_heading_deg("360"), Ok(360.0));
        assert!(read_heading_deg("361").is_err() && read_heading_deg("NaN").is_err() && read_heading_deg("").is_err());
        assert_eq!(read_date("2026-03-01").unwrap(), read_date("2026-03-01T00:00:00Z").unwrap());
        assert!(read_date("01/03/2026").is_err() && read_date("1850-01-01").is_err());
    }
}
