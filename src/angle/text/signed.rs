//! Signed errors as written: with a letter, a word or a sign.

use super::plain::plain;
use super::token::{Token, Tokens, figure_deg, reading_step_deg};
use crate::angle::Reading;
use crate::error::BadValue;

/// What an error without a letter means.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum ErrorSign {
    /// East, or a gyro that reads low, is +.
    #[default]
    EastPlus,
    /// A gyro that reads high, or a westerly error, is +.
    HighPlus,
}

/// Which letters name the side.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Letters {
    /// E and W.
    EastWest,
    /// E and W; for a gyro also L, low (east) and H, high (west).
    LowHighToo,
}

const EAST_WEST: &str = "an error such as 1.5E, 1.5 W, -1.5 or 1½ W";
const LOW_HIGH: &str = "a gyro error such as 1.5E, 0.5L, 0.5 high, -1.5 or 1½ W";

/// A signed error: degrees with a letter or word before or behind, or with a sign, never both.
///
/// Units and signs: degrees, east +. A letter says the side; an unlettered figure is taken by `sign`. The step is as for a
/// direction.
///
/// # Errors
/// [`BadValue`] for both sign and letter, the letter O, more than 180.
///
/// # Example
/// ```
/// use shadowpin::angle::text::{ErrorSign, Letters, read_error};
/// assert_eq!(read_error("0.5 high", ErrorSign::EastPlus, Letters::LowHighToo)?.value, -0.5);
/// assert_eq!(read_error("1½ W", ErrorSign::EastPlus, Letters::EastWest)?.value, -1.5);
/// # Ok::<(), shadowpin::error::BadValue>(())
/// ```
pub fn read_error(text: &str, sign: ErrorSign, letters: Letters) -> Result<Reading<f64>, BadValue> {
    let expected = if letters == Letters::LowHighToo { LOW_HIGH } else { EAST_WEST };
    let unlettered = match sign {
        ErrorSign::EastPlus => 1.0,
        ErrorSign::HighPlus => -1.0,
    };
    if let Some(plain) = plain(text)
        && plain.value <= 180.0
    {
        let factor = plain.sign.unwrap_or(1.0) * unlettered;
        return Ok(Reading::new(factor * plain.value + 0.0, reading_step_deg(plain.value, plain.decimals)));
    }
    let refuse = |hint: &'static str| BadValue::new(text, expected).hint(hint);
    let tokens = Tokens::of(text, expected)?;
    let mut rest = tokens.as_slice();
    let mut side = None;
    if let [Token::Letters(word), tail @ ..] = rest {
        if word.eq_ignore_ascii_case("nil") && tail.is_empty() {
            return Ok(Reading::new(0.0, 0.5));
        }
        (side, rest) = (Some(*word), tail);
    }
    let mut signed = None;
    if let [first @ (Token::Minus | Token::Plus), tail @ ..] = rest {
        signed = Some(if *first == Token::Minus { -1.0 } else { 1.0 });
        rest = tail;
    }
    if let [head @ .., Token::Letters(word)] = rest {
        if side.is_some() {
            return Err(refuse("it has two letters"));
        }
        (side, rest) = (Some(*word), head);
    }
    let side = side.map(|word| side_of(word, letters).ok_or_else(|| refuse(side_hint(word, letters)))).transpose()?;
    if side.is_some() && signed.is_some() {
        return Err(refuse("a sign or a letter, not both"));
    }
    let (deg, step_deg) = figure_deg(rest).ok_or_else(|| refuse(""))?;
    if deg > 180.0 {
        return Err(refuse("an error is at most 180 degrees"));
    }
    let factor = side.unwrap_or_else(|| signed.unwrap_or(1.0) * unlettered);
    Ok(Reading::new(factor * deg + 0.0, step_deg))
}

fn side_of(word: &str, letters: Letters) -> Option<f64> {
    let is = |words: [&str; 2]| words.iter().any(|w| word.eq_ignore_ascii_case(w));
    if is(["e", "east"]) {
        Some(1.0)
    } else if is(["w", "west"]) {
        Some(-1.0)
    } else if letters == Letters::LowHighToo && is(["l", "low"]) {
        Some(1.0)
    } else if letters == Letters::LowHighToo && is(["h", "high"]) {
        Some(-1.0)
    } else {
        None
    }
}

fn side_hint(word: &str, letters: Letters) -> &'static str {
    if word.eq_ignore_ascii_case("o") {
        "the letter O is west in some languages and east in others: write W or E"
    } else if letters == Letters::EastWest && side_of(word, Letters::LowHighToo).is_some() {
        "low and high are said of a gyro: write E or W"
    } else {
        "the letter must be E or W"
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn gyro(text: &str) -> f64 {
        read_error(text, ErrorSign::EastPlus, Letters::LowHighToo).unwrap_or_else(|e| panic!("{e}")).value
    }

    #[test]
    fn each_sign_once() {
        for (text, deg) in [
            ("1.5E", 1.5),
            ("1.5 W", -1.5),
            ("W 1.5", -1.5),
            ("0.5L", 0.5),
            ("0.5 low", 0.5),
            ("0.5H", -0.5),
            ("0.5 high", -0.5),
            ("High 0.5", -0.5),
            ("+1.5", 1.5),
            ("-1.5", -1.5),
            ("−1.5", -1.5),
            ("1½ W", -1.5),
            ("½E", 0.5),
            ("1.5°W", -1.5),
            ("nil", 0.0),
            ("0", 0.0),
        ] {
            assert_eq!(gyro(text), deg, "{text}");
        }
        assert_eq!(read_error("1.5", ErrorSign::HighPlus, Letters::LowHighToo).unwrap().value, -1.5);
        assert_eq!(read_error("1.5L", ErrorSign::HighPlus, Letters::LowHighToo).unwrap().value, 1.5);
        assert!(gyro("-0").is_sign_positive());
    }

    #[test]
    fn refused() {
        for text in ["-1.5W", "1.5O", "190E", "E 1 W", "x", "", "1,5E"] {
            assert!(read_error(text, ErrorSign::EastPlus, Letters::LowHighToo).is_err(), "{text}");
        }
        let error = read_error("0.5L", ErrorSign::EastPlus, Letters::EastWest).unwrap_err();
        assert_eq!(error.hint, "low and high are said of a gyro: write E or W");
    }
}
