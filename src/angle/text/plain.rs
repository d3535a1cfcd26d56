//! The plainest figures, read without cutting the text up: what nearly every cell of a log holds.

/// Digits with at most one point among them, and a sign before them or none.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Plain {
    /// The sign, where one is written: 1 or -1.
    pub sign: Option<f64>,
    /// The value, never negative.
    pub value: f64,
    /// Digits after the point.
    pub decimals: u8,
}

/// Digits that a whole number of so many can be kept exactly with.
const MOST_DIGITS: usize = 15;
/// Powers of ten up to that of [`MOST_DIGITS`]; each is exact.
const POWERS: [f64; MOST_DIGITS + 1] = [1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15];

/// Reads a plain figure; `None` for anything else, be it right or wrong.
///
/// The value is the nearest to what is written, as of `str::parse`: a whole number under 2^53 divided once by a power of ten.
pub(super) fn plain(text: &str) -> Option<Plain> {
    let (sign, digits) = match text.as_bytes() {
        [b'-', rest @ ..] => (Some(-1.0), rest),
        [b'+', rest @ ..] => (Some(1.0), rest),
        all => (None, all),
    };
    if digits.len() > MOST_DIGITS || !digits.first()?.is_ascii_digit() || !digits.last()?.is_ascii_digit() {
        return None;
    }
    let (mut whole, mut decimals, mut pointed) = (0_u64, 0_u8, 0_u8);
    for byte in digits {
        let digit = byte.wrapping_sub(b'0');
        if digit < 10 {
            whole = whole * 10 + u64::from(digit);
            decimals += pointed;
        } else if *byte == b'.' && pointed == 0 {
            pointed = 1;
        } else {
            return None;
        }
    }
    Some(Plain { sign, value: whole as f64 / POWERS.get(usize::from(decimals))?, decimals })
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    #[test]
    fn what_is_left_to_the_others() {
        for text in ["", "-", "+", ".5", "5.", "1.2.3", "1e3", "1,5", "045½", "--1", "1234567890123456", " 1", "−1"] {
            assert_eq!(plain(text), None, "{text}");
        }
        assert_eq!(plain("-0.50"), Some(Plain { sign: Some(-1.0), value: 0.5, decimals: 2 }));
    }

    proptest! {
        #[test]
        fn the_same_value_to_the_last_bit(text in "[0-9]{1,8}(\\.[0-9]{1,6})?") {
            let read = plain(&text).unwrap();
            prop_assert_eq!(read.value.to_bits(), text.parse::<f64>().unwrap().to_bits());
            prop_assert_eq!(usize::from(read.decimals), text.split_once('.').map_or(0, |(_, d)| d.len()));
        }
    }
}
