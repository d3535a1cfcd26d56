//! Latitudes and longitudes in every form that logs are written in.

use super::plain::plain;
use super::token::{Token, Tokens, decimal_step};
use crate::angle::{Latitude, Longitude, Reading};
use crate::error::BadValue;

const LATITUDE: &str = "a latitude such as -36.096, 36.096S, 36-05.8S, 36°05.8'S or 36 05 45 S";
const LONGITUDE: &str = "a longitude such as -130.56, 130.56W, 130-33.6W, 130°33.6'W or 130 33 36 W";
const POSITION: &str = "latitude and longitude such as 36-05.8S 130-33.6W or -36.096, -130.56";

/// A latitude: decimal degrees, degrees and minutes, or degrees, minutes and seconds; a sign or a letter, never both.
///
/// Units and signs: degrees, north +. The step is that of the last figure written.
///
/// # Errors
/// [`BadValue`] with the value, the forms and a hint: both sign and letter, the letter O, minutes of 60 or more, over 90.
///
/// # Example
/// ```
/// use shadowpin::angle::text::read_latitude;
/// let lat = read_latitude("36-05.8S")?;
/// assert!((lat.value.deg() + 36.096_666_7).abs() < 1e-6);
/// assert!(read_latitude("-36.1S").is_err());
/// # Ok::<(), shadowpin::error::BadValue>(())
/// ```
pub fn read_latitude(text: &str) -> Result<Reading<Latitude>, BadValue> {
    let (deg, step_deg) = coordinate(text, LATITUDE, Axis::Latitude)?;
    let latitude = Latitude::from_deg(deg)
        .ok_or_else(|| BadValue::new(text, "a latitude from 90 S to 90 N").hint("are latitude and longitude exchanged?"))?;
    Ok(Reading::new(latitude, step_deg))
}

/// A longitude; forms, hints and step as [`read_latitude`].
///
/// Units and signs: degrees, east +.
///
/// # Errors
/// As [`read_latitude`]; over 180.
pub fn read_longitude(text: &str) -> Result<Reading<Longitude>, BadValue> {
    let (deg, step_deg) = coordinate(text, LONGITUDE, Axis::Longitude)?;
    let longitude = Longitude::from_deg(deg).ok_or_else(|| BadValue::new(text, "a longitude from 180 W to 180 E"))?;
    Ok(Reading::new(longitude, step_deg))
}

/// Both in one cell: latitude first, with a comma, semicolon or slash between, or told apart by their letters.
///
/// # Errors
/// As [`read_latitude`], and where the cell cannot be parted in two.
pub fn read_position(text: &str) -> Result<(Reading<Latitude>, Reading<Longitude>), BadValue> {
    let (lat, lon) = part_in_two(text.trim()).ok_or_else(|| BadValue::new(text, POSITION))?;
    // The message shows the whole cell, not the half that failed.
    let whole = |bad: BadValue| BadValue { value: BadValue::new(text, "").value, ..bad };
    Ok((read_latitude(lat).map_err(whole)?, read_longitude(lon).map_err(whole)?))
}

/// Where latitude ends: at a separator, behind its trailing letter, before the longitude's leading letter, at the only blank.
fn part_in_two(text: &str) -> Option<(&str, &str)> {
    if let Some(parts) = text.split_once([',', ';', '/']) {
        return Some((parts.0.trim(), parts.1.trim()));
    }
    let name = |c: char, names: &str| names.contains(c.to_ascii_uppercase());
    if text.starts_with(|c| name(c, "NS")) {
        let at = text.find(|c| name(c, "EW"))?;
        return Some((text.get(..at)?.trim(), text.get(at..)?.trim()));
    }
    if let Some(at) = text.find(|c| name(c, "NS")) {
        // The whole word: "North" as well as "N".
        let end = at + text.get(at..)?.find(|c: char| !c.is_alphabetic()).unwrap_or(text.len() - at);
        return Some((text.get(..end)?.trim(), text.get(end..)?.trim()));
    }
    let mut parts = text.split_whitespace();
    match (parts.next(), parts.next(), parts.next()) {
        (Some(lat), Some(lon), None) => Some((lat, lon)),
        _ => None,
    }
}

#[derive(Clone, Copy, PartialEq)]
enum Axis {
    Latitude,
    Longitude,
}

impl Axis {
    /// +1 or -1 for a letter or word that names a side; `None` for another axis' or no side.
    fn side(self, letters: &str) -> Option<f64> {
        let is = |word: &str| letters.eq_ignore_ascii_case(word) || letters.eq_ignore_ascii_case(word.get(..1).unwrap_or_default());
        match self {
            Self::Latitude if is("north") => Some(1.0),
            Self::Latitude if is("south") => Some(-1.0),
            Self::Longitude if is("east") => Some(1.0),
            Self::Longitude if is("west") => Some(-1.0),
            _ => None,
        }
    }

    fn letter_hint(self, letters: &str) -> &'static str {
        let other = if self == Self::Latitude { Self::Longitude } else { Self::Latitude };
        if letters.eq_ignore_ascii_case("o") {
            "the letter O is west in some languages and east in others: write W or E"
        } else if other.side(letters).is_some() {
            "are latitude and longitude exchanged?"
        } else if self == Self::Latitude {
            "the letter must be N or S"
        } else {
            "the letter must be E or W"
        }
    }
}

/// Signed degrees and the step written.
fn coordinate(text: &str, expected: &'static str, axis: Axis) -> Result<(f64, f64), BadValue> {
    if let Some(plain) = plain(text) {
        return Ok((plain.sign.unwrap_or(1.0) * plain.value, decimal_step(plain.decimals)));
    }
    let refuse = |hint: &'static str| BadValue::new(text, expected).hint(hint);
    let tokens = Tokens::of(text, expected)?;
    let mut rest = tokens.as_slice();
    let mut letters = None;
    let mut sign = None;
    if let [Token::Letters(word), tail @ ..] = rest {
        (letters, rest) = (Some(*word), tail);
    }
    if let [Token::Minus | Token::Plus, tail @ ..] = rest {
        sign = Some(if rest.first() == Some(&Token::Minus) { -1.0 } else { 1.0 });
        rest = tail;
    }
    if let [head @ .., Token::Letters(word)] = rest {
        if letters.is_some() {
            return Err(refuse("it has two letters"));
        }
        (letters, rest) = (Some(*word), head);
    }
    let side = match letters {
        None => 1.0,
        Some(word) => axis.side(word).ok_or_else(|| refuse(axis.letter_hint(word)))?,
    };
    if letters.is_some() && sign.is_some() {
        return Err(refuse("a sign or a letter, not both"));
    }
    let (deg, step_deg) = magnitude(rest, refuse)?;
    Ok((sign.unwrap_or(side) * deg, step_deg))
}

/// Degrees, then minutes, then seconds, each with or without its mark.
fn magnitude(mut rest: &[Token<'_>], refuse: impl Fn(&'static str) -> BadValue) -> Result<(f64, f64), BadValue> {
    let (mut total, mut unit) = (0.0, 1.0);
    let mut last_decimals = 0;
    for place in 0..3 {
        let [Token::Number { value, decimals }, tail @ ..] = rest else {
            return Err(refuse(if place == 0 { "" } else { "something follows that is no number" }));
        };
        if last_decimals > 0 {
            return Err(refuse("only the last figure can have decimals"));
        }
        if place > 0 && *value >= 60.0 {
            return Err(refuse("minutes and seconds are under 60"));
        }
        total += value * unit;
        let step = decimal_step(*decimals) * unit;
        last_decimals = *decimals;
        unit /= 60.0;
        let mark = [Token::Degree, Token::Minute, Token::Second][place];
        rest = match tail {
            [found, after @ ..] if *found == mark => after,
            [Token::Minus | Token::Colon, after @ ..] if !after.is_empty() => after,
            [Token::Degree | Token::Minute | Token::Second, ..] => return Err(refuse("the marks are ° ' \" in that order")),
            _ => tail,
        };
        // A dash may follow a mark: 36°-05.8'.
        if let [Token::Minus, after @ ..] = rest {
            rest = after;
        }
        if rest.is_empty() {
            return Ok((total, step));
        }
    }
    Err(refuse("degrees, minutes and seconds are at most three figures"))
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    fn lat(text: &str) -> f64 {
        read_latitude(text).unwrap_or_else(|e| panic!("{e}")).value.deg()
    }

    #[test]
    fn every_form_of_one_latitude() {
        for text in [
            "-36.096666667",
            "36.096666667S",
            "s 36.096666667",
            "36-05.8S",
            "36°05.8'S",
            "36 05 48 S",
            "36º 05′ 48″ South",
            "S36-05.8",
            "−36°05.8’",
            "36:05:48 S",
            "36°-05.8'S",
        ] {
            assert_abs_diff_eq!(lat(text), -36.096_666_667, epsilon = 1e-8);
        }
        assert_abs_diff_eq!(lat("-0.5"), -0.5);
        assert_abs_diff_eq!(lat("-0-30"), -0.5);
        assert_abs_diff_eq!(lat("36-05.8"), 36.096_666_667, epsilon = 1e-8);
    }

    #[test]
    fn the_step_is_that_of_the_last_figure() {
        assert_abs_diff_eq!(read_latitude("36.1").unwrap().step_deg, 0.1, epsilon = 1e-12);
        assert_abs_diff_eq!(read_latitude("36-05S").unwrap().step_deg, 1.0 / 60.0, epsilon = 1e-12);
        assert_abs_diff_eq!(read_latitude("36-05.8S").unwrap().step_deg, 0.1 / 60.0, epsilon = 1e-12);
    }

    #[test]
    fn what_is_refused_and_why() {
        let hint = |text: &str| read_latitude(text).map(|l| l.value.deg()).unwrap_err().hint.into_owned();
        assert_eq!(hint("-36.1S"), "a sign or a letter, not both");
        assert_eq!(hint("36.1E"), "are latitude and longitude exchanged?");
        assert_eq!(hint("95.1"), "are latitude and longitude exchanged?");
        assert_eq!(hint("36-60.0S"), "minutes and seconds are under 60");
        assert_eq!(hint("36.5-10S"), "only the last figure can have decimals");
        assert!(read_longitude("12.5 O").unwrap_err().hint.contains("west in some languages"));
        assert_eq!(hint("36,1"), "is that a decimal comma? say --decimal-comma");
        assert!(read_latitude("1e3").is_err() && read_latitude("nan").is_err() && read_latitude("").is_err());
    }

    #[test]
    fn both_in_one_cell() {
        for text in [
            "36-05.8S 130-33.6E",
            "-36.09667, 130.56",
            "S 36 05.8 E 130 33.6",
            "36 05.8 S 130 33.6 E",
            "-36.09667 130.56",
            "36°05.8'S/130°33.6'E",
        ] {
            let (lat, lon) = read_position(text).unwrap_or_else(|e| panic!("{e}"));
            assert_abs_diff_eq!(lat.value.deg(), -36.096_67, epsilon = 1e-5);
            assert_abs_diff_eq!(lon.value.deg(), 130.56, epsilon = 1e-9);
        }
        assert!(read_position("36 05 130 33").is_err());
    }
}
