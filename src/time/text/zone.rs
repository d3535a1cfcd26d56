//! Zone descriptions and clock offsets as written.

use crate::error::BadValue;
use crate::time::Zone;

const ZONE: &str = "a zone description from -14 to +12, such as -9, +3.5, -12.75 or a zone letter";
const OFFSET: &str = "a clock's offset from UTC from -12:00 to +14:00, such as +09:00";

/// A zone description, the hours added to ship's time to get UTC (east -, west +): `-9`, `+3.5`, `-0930`, `ZD -9`, a zone
/// letter (A to M but J east, N to Y west, Z none).
///
/// # Errors
/// [`BadValue`] without a sign, beyond the range, not to the quarter hour, or the letter J (the observer's own time).
pub fn read_zone(text: &str) -> Result<Zone, BadValue> {
    let trimmed = text.trim();
    let trimmed =
        if trimmed.get(..2).is_some_and(|zd| zd.eq_ignore_ascii_case("zd")) { trimmed.get(2..).unwrap_or_default() } else { trimmed }
            .trim();
    if let [letter] = trimmed.as_bytes()
        && letter.is_ascii_alphabetic()
    {
        return by_letter(letter.to_ascii_uppercase())
            .ok_or_else(|| BadValue::new(text, ZONE).hint("J is the observer's own time, not a zone"));
    }
    let minutes = signed_minutes(trimmed).map_err(|hint| BadValue::new(text, ZONE).hint(hint))?;
    Zone::from_description_minutes(minutes).ok_or_else(|| BadValue::new(text, ZONE).hint(range_hint(minutes)))
}

/// The offset of a clock, the hours that it shows more than UTC (east +, west -): `+09:00`, `+9`, `-03:30`, `Z`.
///
/// # Errors
/// As [`read_zone`].
pub fn read_clock_offset(text: &str) -> Result<Zone, BadValue> {
    let trimmed = text.trim();
    if trimmed.eq_ignore_ascii_case("z") {
        return Ok(Zone::UTC);
    }
    let minutes = signed_minutes(trimmed).map_err(|hint| BadValue::new(text, OFFSET).hint(hint))?;
    Zone::from_clock_offset_minutes(minutes).ok_or_else(|| BadValue::new(text, OFFSET).hint(range_hint(minutes)))
}

fn range_hint(minutes: i16) -> &'static str {
    if minutes % 15 == 0 {
        "zone description and clock offset have opposite signs: which one is meant?"
    } else {
        "zones go by quarters of an hour"
    }
}

/// A to M (without J) east of Greenwich, description - ; N to Y west, +; Z none.
fn by_letter(letter: u8) -> Option<Zone> {
    let hours = match letter {
        b'Z' => 0,
        b'A'..=b'I' => -i16::from(letter - b'A' + 1),
        b'K'..=b'M' => -i16::from(letter - b'A'),
        b'N'..=b'Y' => i16::from(letter - b'N' + 1),
        _ => return None,
    };
    Zone::from_description_minutes(hours * 60)
}

/// Minutes of `+9`, `-3.5`, `-3½`, `+09:00`, `-0930`; the error is the hint.
fn signed_minutes(text: &str) -> Result<i16, &'static str> {
    let (negative, size) = match text.chars().next() {
        Some('-' | '\u{2212}') => (true, text.trim_start_matches(['-', '\u{2212}'])),
        Some('+') => (false, text.trim_start_matches('+')),
        Some(_) if text.bytes().all(|b| b == b'0' || b == b':') => (false, text),
        Some(c) if c.is_ascii_digit() => return Err("write the sign"),
        _ => return Err(""),
    };
    let size = size.trim();
    let whole = |part: &str| -> Option<i16> {
        (!part.is_empty() && part.len() <= 2 && part.bytes().all(|b| b.is_ascii_digit())).then(|| part.parse().ok()).flatten()
    };
    let minutes = if let Some((hours, minutes)) = size.split_once(':') {
        whole(hours).zip(whole(minutes)).filter(|(_, m)| *m < 60).map(|(h, m)| h * 60 + m)
    } else if size.len() == 4 && size.bytes().all(|b| b.is_ascii_digit()) {
        whole(size.get(..2).unwrap_or_default())
            .zip(whole(size.get(2..).unwrap_or_default()))
            .filter(|(_, m)| *m < 60)
            .map(|(h, m)| h * 60 + m)
    } else if let Some(hours) = size.strip_suffix('½') {
        whole(hours).map(|h| h * 60 + 30)
    } else if let Some((hours, part)) = size.split_once('.') {
        let quarter = match part.trim_end_matches('0') {
            "" => Some(0),
            "25" => Some(15),
            "5" => Some(30),
            "75" => Some(45),
            _ => return Err("zones go by quarters of an hour"),
        };
        whole(hours).zip(quarter).map(|(h, m)| h * 60 + m)
    } else {
        whole(size).map(|h| h * 60)
    };
    minutes.map(|m| if negative { -m } else { m }).ok_or("")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn descriptions_and_offsets_have_opposite_signs() {
        for (text, minutes) in [
            ("-9", -540),
            ("+3.5", 210),
            ("-12.75", -765),
            ("-0930", -570),
            ("ZD -9", -540),
            ("zd+4", 240),
            ("-9:30", -570),
            ("-3½", -210),
            ("0", 0),
            ("+12", 720),
            ("−14", -840),
        ] {
            assert_eq!(read_zone(text).unwrap_or_else(|e| panic!("{e}")).description_minutes(), minutes, "{text}");
        }
        assert_eq!(read_clock_offset("+09:00").unwrap().description_minutes(), -540);
        assert_eq!(read_clock_offset("-03:30").unwrap().description_minutes(), 210);
        assert_eq!(read_clock_offset("Z").unwrap(), Zone::UTC);
    }

    /// Letters: common practice; A is an hour east of Greenwich, M and Y meet at the date line.
    #[test]
    fn letters() {
        for (letter, hours) in [("A", -1), ("I", -9), ("K", -10), ("M", -12), ("N", 1), ("Y", 12), ("Z", 0), ("k", -10)] {
            assert_eq!(read_zone(letter).unwrap().description_minutes(), hours * 60, "{letter}");
        }
        assert!(read_zone("J").is_err());
    }

    #[test]
    fn refused_with_a_reason() {
        assert_eq!(read_zone("9").unwrap_err().hint, "write the sign");
        assert_eq!(read_zone("+14").unwrap_err().hint, "zone description and clock offset have opposite signs: which one is meant?");
        assert_eq!(read_zone("+3.3").unwrap_err().hint, "zones go by quarters of an hour");
        assert!(read_zone("").is_err() && read_zone("+").is_err() && read_zone("-9:75").is_err());
    }
}
