//! A written angle cut into numbers, letters and marks, without allocation.

use crate::error::BadValue;

/// One piece of a written angle.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Token<'t> {
    /// Digits with at most one point.
    Number {
        /// The value, never negative.
        value: f64,
        /// Digits after the point.
        decimals: u8,
    },
    /// ¼, ½ or ¾.
    Fraction(f64),
    /// A run of letters.
    Letters(&'t str),
    /// A sign, or the dash between degrees and minutes.
    Minus,
    /// A plus sign.
    Plus,
    /// °, or a mark that is used for it.
    Degree,
    /// '
    Minute,
    /// "
    Second,
    /// :
    Colon,
}

/// More pieces than any angle has.
const MOST: usize = 12;

/// The pieces of one written angle.
pub(super) struct Tokens<'t> {
    list: [Token<'t>; MOST],
    len: usize,
}

impl<'t> Tokens<'t> {
    /// Cuts `text` up; `expected` is what the message says was wanted.
    pub fn of(text: &'t str, expected: &'static str) -> Result<Self, BadValue> {
        let mut tokens = Self { list: [Token::Plus; MOST], len: 0 };
        let mut rest = text.trim();
        if rest.is_empty() {
            return Err(BadValue::new(text, expected).hint("nothing is written there"));
        }
        while let Some(first) = rest.chars().next() {
            let (token, length) = match first {
                '0'..='9' | '.' => number(rest).ok_or_else(|| BadValue::new(text, expected).hint("one number too many points"))?,
                c if c.is_whitespace() => {
                    rest = rest.trim_start();
                    continue;
                }
                '-' | '\u{2212}' | '\u{2013}' | '\u{2010}' | '\u{2011}' => (Token::Minus, first.len_utf8()),
                '+' => (Token::Plus, 1),
                '°' | 'º' | '˚' => (Token::Degree, first.len_utf8()),
                '"' | '\u{2033}' | '\u{201d}' => (Token::Second, first.len_utf8()),
                '\'' if rest.starts_with("''") => (Token::Second, 2),
                '\'' | '\u{2032}' | '\u{2019}' | '\u{b4}' | '`' => (Token::Minute, first.len_utf8()),
                ':' => (Token::Colon, 1),
                '½' => (Token::Fraction(0.5), first.len_utf8()),
                '¼' => (Token::Fraction(0.25), first.len_utf8()),
                '¾' => (Token::Fraction(0.75), first.len_utf8()),
                c if c.is_alphabetic() => {
                    let length = rest.find(|c: char| !c.is_alphabetic()).unwrap_or(rest.len());
                    (Token::Letters(rest.get(..length).unwrap_or_default()), length)
                }
                ',' => return Err(BadValue::new(text, expected).hint("is that a decimal comma? say --decimal-comma")),
                _ => return Err(BadValue::new(text, expected)),
            };
            let Some(slot) = tokens.list.get_mut(tokens.len) else { return Err(BadValue::new(text, expected)) };
            *slot = token;
            tokens.len += 1;
            rest = rest.get(length..).unwrap_or_default();
        }
        Ok(tokens)
    }

    /// The pieces in order.
    pub fn as_slice(&self) -> &[Token<'t>] {
        self.list.get(..self.len).unwrap_or_default()
    }
}

/// A number at the start of `text` and its length; `None` where it has two points or no digit.
fn number(text: &str) -> Option<(Token<'static>, usize)> {
    let length = text.find(|c: char| !c.is_ascii_digit() && c != '.').unwrap_or(text.len());
    let digits = text.get(..length)?;
    let decimals = digits.find('.').map_or(0, |point| length - point - 1);
    let value: f64 = digits.parse().ok()?;
    Some((Token::Number { value, decimals: decimals.min(12) as u8 }, length))
}

/// The step of a number with so many decimals.
pub(super) fn decimal_step(decimals: u8) -> f64 {
    const STEPS: [f64; 13] = [1.0, 1e-1, 1e-2, 1e-3, 1e-4, 1e-5, 1e-6, 1e-7, 1e-8, 1e-9, 1e-10, 1e-11, 1e-12];
    STEPS.get(usize::from(decimals)).copied().unwrap_or(1e-12)
}

/// The step that a figure in degrees was probably read in: a fraction's own, whole degrees, halves where the one decimal
/// is 0 or 5, otherwise the last decimal.
///
/// One figure cannot tell 247.5 read to halves from 247.5 read to tenths; halves is the honest one, for it claims less.
pub(super) fn reading_step_deg(value: f64, decimals: u8) -> f64 {
    match decimals {
        0 => 1.0,
        1 if ((value * 10.0).round() as i64) % 5 == 0 => 0.5,
        _ => decimal_step(decimals),
    }
}

/// A figure in degrees with or without its mark: a number, a number and a fraction, or a fraction alone; with its step.
pub(super) fn figure_deg(tokens: &[Token<'_>]) -> Option<(f64, f64)> {
    let fraction_step_deg = |part: f64| if part == 0.5 { 0.5 } else { 0.25 };
    match tokens {
        [Token::Number { value, decimals }] | [Token::Number { value, decimals }, Token::Degree] => {
            Some((*value, reading_step_deg(*value, *decimals)))
        }
        [Token::Number { value, decimals: 0 }, Token::Fraction(part)]
        | [Token::Number { value, decimals: 0 }, Token::Fraction(part), Token::Degree]
        | [Token::Number { value, decimals: 0 }, Token::Degree, Token::Fraction(part)] => Some((value + part, fraction_step_deg(*part))),
        [Token::Fraction(part)] | [Token::Fraction(part), Token::Degree] => Some((*part, fraction_step_deg(*part))),
        _ => None,
    }
}
