//! Bearings, headings and azimuths as written.

use super::plain::{Plain, plain};
use super::token::{Token, Tokens, figure_deg, reading_step_deg};
use crate::angle::Reading;
use crate::error::BadValue;

const DIRECTION: &str = "a direction from 000 to 360, such as 045, 045.5, 045½ or N 68 E";

/// A direction: three figures, with a decimal or a half, or from north or south towards east or west.
///
/// Units and signs: degrees clockwise, `0 <= x < 360`; 360 is read as 0. The step is 1 for whole degrees, 0.5 where the one
/// decimal is 0 or 5, otherwise that of the last decimal.
///
/// # Errors
/// [`BadValue`] for a sign, for more than 360, for more than 90 from north or south.
///
/// # Example
/// ```
/// use shadowpin::angle::text::read_direction;
/// assert_eq!(read_direction("045½")?.value, 45.5);
/// assert_eq!(read_direction("S 12 W")?.value, 192.0);
/// # Ok::<(), shadowpin::error::BadValue>(())
/// ```
pub fn read_direction(text: &str) -> Result<Reading<f64>, BadValue> {
    if let Some(Plain { sign: None, value, decimals }) = plain(text)
        && value <= 360.0
    {
        return Ok(Reading::new(crate::angle::wrap_360_deg(value), reading_step_deg(value, decimals)));
    }
    let refuse = |hint: &'static str| BadValue::new(text, DIRECTION).hint(hint);
    let tokens = Tokens::of(text, DIRECTION)?;
    let (rest, quadrant) = quadrant(tokens.as_slice()).ok_or_else(|| refuse(""))?;
    if let [Token::Minus | Token::Plus, ..] = rest {
        return Err(refuse("a direction has no sign"));
    }
    let (deg, step_deg) = figure_deg(rest).ok_or_else(|| refuse(""))?;
    let deg = match quadrant {
        None if deg > 360.0 => return Err(refuse("it is over 360")),
        None => deg,
        Some(_) if deg > 90.0 => return Err(refuse("an angle from north or south is at most 90")),
        Some(Quadrant { south: false, west: false }) => deg,
        Some(Quadrant { south: false, west: true }) => 360.0 - deg,
        Some(Quadrant { south: true, west: false }) => 180.0 - deg,
        Some(Quadrant { south: true, west: true }) => 180.0 + deg,
    };
    Ok(Reading::new(crate::angle::wrap_360_deg(deg), step_deg))
}

struct Quadrant {
    south: bool,
    west: bool,
}

/// The figure between the letters, and what they mean; `None` for letters that mean nothing here.
fn quadrant<'a, 't>(tokens: &'a [Token<'t>]) -> Option<(&'a [Token<'t>], Option<Quadrant>)> {
    match tokens {
        [Token::Letters(from), rest @ .., Token::Letters(to)] => {
            let south = match *from {
                "N" | "n" => false,
                "S" | "s" => true,
                _ => return None,
            };
            let west = match *to {
                "E" | "e" => false,
                "W" | "w" => true,
                _ => return None,
            };
            Some((rest, Some(Quadrant { south, west })))
        }
        [Token::Letters(_), ..] | [.., Token::Letters(_)] => None,
        rest => Some((rest, None)),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn read(text: &str) -> (f64, f64) {
        let reading = read_direction(text).unwrap_or_else(|e| panic!("{e}"));
        (reading.value, reading.step_deg)
    }

    #[test]
    fn forms_and_steps() {
        assert_eq!(read("045"), (45.0, 1.0));
        assert_eq!(read("045.0"), (45.0, 0.5));
        assert_eq!(read("045.5"), (45.5, 0.5));
        assert_eq!(read("45.3°"), (45.3, 0.1));
        assert_eq!(read("045½"), (45.5, 0.5));
        assert_eq!(read("45 ½"), (45.5, 0.5));
        assert_eq!(read("360"), (0.0, 1.0));
        assert_eq!(read("N 68 E"), (68.0, 1.0));
        assert_eq!(read("n68.5w"), (291.5, 0.5));
        assert_eq!(read("S 12 E"), (168.0, 1.0));
        assert_eq!(read("S 0 E"), (180.0, 1.0));
        assert_eq!(read("N 0 W"), (0.0, 1.0));
    }

    #[test]
    fn refused() {
        for text in ["-5", "+5", "361", "N 91 E", "E 10 N", "045.5½", "12 13", "T 045", "", "inf", "1e2", "360.1"] {
            assert!(read_direction(text).is_err(), "{text}");
        }
    }
}
