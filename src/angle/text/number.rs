//! Plain numbers in a range.

use super::plain::plain;
use crate::error::BadValue;

/// A plain decimal number within `range`; `what` is what the message says was wanted, for instance "a speed in knots, 0 to 100".
///
/// # Errors
/// [`BadValue`] for anything else: words, exponents, infinities, a decimal comma (with a hint).
pub fn read_number(text: &str, range: std::ops::RangeInclusive<f64>, what: &'static str) -> Result<f64, BadValue> {
    if let Some(plain) = plain(text) {
        // Not -0.
        let value = plain.sign.unwrap_or(1.0) * plain.value + 0.0;
        return if range.contains(&value) { Ok(value) } else { Err(BadValue::new(text, what)) };
    }
    let trimmed = text.trim();
    let plain = trimmed.strip_prefix('\u{2212}');
    let (negative, digits) = match (plain, trimmed.strip_prefix('-'), trimmed.strip_prefix('+')) {
        (Some(rest), _, _) | (None, Some(rest), _) => (true, rest),
        (None, None, Some(rest)) => (false, rest),
        _ => (false, trimmed),
    };
    // `str::parse` would also take exponents, "inf" and "nan".
    if digits.is_empty() || !digits.bytes().all(|b| b.is_ascii_digit() || b == b'.') {
        let hint = if digits.contains(',') {
            "is that a decimal comma? say --decimal-comma"
        } else if digits.starts_with(|c: char| c.is_ascii_digit()) && digits.ends_with(char::is_alphabetic) {
            "write the figure alone, without its unit"
        } else {
            ""
        };
        return Err(BadValue::new(text, what).hint(hint));
    }
    let value: f64 = digits.parse().map_err(|_| BadValue::new(text, what))?;
    let value = if negative { -value + 0.0 } else { value };
    if range.contains(&value) { Ok(value) } else { Err(BadValue::new(text, what)) }
}
