//! The seal of an entry.

use crate::logbook::columns::{Column, KEPT};
use crate::time::text::read_utc;
use sha2::{Digest, Sha256};
use std::borrow::Cow;
use std::fmt;

/// What every seal begins with, so that it is no other program's hash of the same bytes.
const TAG: &[u8] = b"shadowpin book, seal 1";
/// Hexadecimal figures in a group, as they are written and copied to paper.
const GROUP: usize = 8;

/// A seal: 32 bytes.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub struct Seal([u8; 32]);

/// The digest of an entry's cells; with the seal before it, it gives the entry's own.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Digested([u8; 32]);

impl Digested {
    /// Of cells by name, in the order of the names; blank ones and the seal itself do not count.
    pub(super) fn of<'c>(cells: impl Iterator<Item = (&'static str, &'c str)>) -> Self {
        let mut hash = Sha256::new();
        let mut put = |text: &str| {
            hash.update((text.len() as u64).to_be_bytes());
            hash.update(text.as_bytes());
        };
        for (name, text) in cells.filter(|(name, _)| *name != "seal") {
            let meant = meaning(name, text);
            if !meant.is_empty() {
                put(name);
                put(&meant);
            }
        }
        Self(hash.finalize().into())
    }

    /// The seal of these cells after that of the entry before.
    pub(super) fn after(&self, before: &Seal) -> Seal {
        let mut hash = Sha256::new();
        hash.update((TAG.len() as u64).to_be_bytes());
        hash.update(TAG);
        hash.update(before.0);
        hash.update(self.0);
        Seal(hash.finalize().into())
    }
}

impl Seal {
    /// What stands before the first entry.
    pub const BEFORE_FIRST: Self = Self([0; 32]);

    /// A seal as written: 64 hexadecimal figures in any case, with or without marks and blanks between groups.
    pub fn read(text: &str) -> Option<Self> {
        let figures = figures(text)?;
        let mut bytes = [0; 32];
        if figures.len() != 2 * bytes.len() {
            return None;
        }
        for (byte, pair) in bytes.iter_mut().zip(figures.chunks(2)) {
            *byte = pair.iter().fold(0, |sum, figure| sum * 16 + figure);
        }
        Some(Self(bytes))
    }

    /// Whether `text`, as copied from paper, is this seal or its beginning. At least sixteen figures are asked for.
    pub fn begins(&self, text: &str) -> bool {
        let own = figures(&self.to_string()).unwrap_or_default();
        figures(text).is_some_and(|given| given.len() >= 16 && own.starts_with(&given))
    }
}

/// The values of the hexadecimal figures of a text; `None` where anything else stands there.
fn figures(text: &str) -> Option<Vec<u8>> {
    text.chars().filter(|c| *c != '-' && !c.is_whitespace()).map(|c| c.to_digit(16).map(|d| d as u8)).collect()
}

/// Groups of eight, so that no spreadsheet takes it for a number and a person can copy it.
impl fmt::Display for Seal {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        for (at, byte) in self.0.iter().enumerate() {
            if at > 0 && at % (GROUP / 2) == 0 {
                f.write_str("-")?;
            }
            write!(f, "{byte:02x}")?;
        }
        Ok(())
    }
}

/// What a cell says, however it is spelled.
pub(super) fn meaning<'t>(name: &str, text: &'t str) -> Cow<'t, str> {
    let text = text.trim();
    if matches!(name, "utc" | "recorded_utc")
        && let Ok(moment) = read_utc(text)
    {
        return Cow::Owned(moment.utc.to_chrono().format("%Y-%m-%dT%H:%M:%S%.3fZ").to_string());
    }
    if is_figures(name)
        && let Some(figure) = plain_figure(text)
    {
        return Cow::Owned(figure);
    }
    if text.contains('\r') { Cow::Owned(text.replace("\r\n", "\n").replace('\r', "\n")) } else { Cow::Borrowed(text) }
}

/// Whether a column holds figures rather than words.
pub(super) fn is_figures(name: &str) -> bool {
    matches!(name, "entry" | "corrects") || Column::ALL.iter().any(|c| c.info().name == name && !c.info().unit.is_empty())
}

/// A plain decimal figure in its shortest form; `None` for anything else.
pub(super) fn plain_figure(text: &str) -> Option<String> {
    let (negative, size) = match text.strip_prefix(['-', '\u{2212}']) {
        Some(size) => (true, size),
        None => (false, text.strip_prefix('+').unwrap_or(text)),
    };
    let (whole, part) = size.split_once(['.', ',']).unwrap_or((size, ""));
    let digits = |t: &str| t.bytes().all(|b| b.is_ascii_digit());
    if whole.len() + part.len() == 0 || !digits(whole) || !digits(part) {
        return None;
    }
    let (whole, part) = (whole.trim_start_matches('0'), part.trim_end_matches('0'));
    let sign = if negative && !(whole.is_empty() && part.is_empty()) { "-" } else { "" };
    let whole = if whole.is_empty() { "0" } else { whole };
    Some(if part.is_empty() { format!("{sign}{whole}") } else { format!("{sign}{whole}.{part}") })
}

/// The names that a seal covers.
pub(super) fn sealed_names() -> impl Iterator<Item = &'static str> {
    Column::ALL.iter().map(|c| c.info().name).chain(KEPT.iter().map(|c| c.name))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn seal(cells: &[(&'static str, &str)]) -> Seal {
        Digested::of(cells.iter().copied()).after(&Seal::BEFORE_FIRST)
    }

    #[test]
    fn written_and_read_back() {
        let own = seal(&[("body", "Sun")]);
        let text = own.to_string();
        assert_eq!((text.len(), text.split('-').count()), (71, 8));
        assert_eq!(Seal::read(&text.to_uppercase().replace('-', " ")), Some(own));
        assert!(own.begins(&text[..20]) && own.begins(&text) && !own.begins(&text[..10]) && !own.begins("0000000000000000"));
        assert!(Seal::read("").is_none() && Seal::read(&text[1..]).is_none() && Seal::read(&text.replace('-', "x")).is_none());
    }

    /// The sum over the bytes that the documentation names, by the hash of an empty entry worked with another program (`sha256sum`).
    #[test]
    fn the_seal_is_the_published_hash_of_the_bytes_named() {
        let inner = Sha256::digest([&[0, 0, 0, 0, 0, 0, 0, 4][..], b"body", &[0, 0, 0, 0, 0, 0, 0, 3], b"Sun"].concat());
        let outer = Sha256::digest([&[0, 0, 0, 0, 0, 0, 0, 22][..], b"shadowpin book, seal 1", &[0; 32], &inner].concat());
        assert_eq!(seal(&[("body", "Sun")]), Seal(outer.into()));
    }

    #[test]
    fn spelling_does_not_count() {
        for (name, one, other) in [
            ("gyro_bearing", "045.0", "45"),
            ("gyro_bearing", "045.50", "45,5"),
            ("zone", "+3.5", "3.5"),
            ("lat", "-0.0", "0"),
            ("entry", "12", " 12.0 "),
            ("utc", "2026-06-14T06:12:00Z", "2026-06-14 06:12"),
            ("remarks", "a\r\nb ", "a\nb"),
            ("observer", "2/O", "2/O"),
        ] {
            assert_eq!(seal(&[(name, one)]), seal(&[(name, other)]), "{name}: {one} {other}");
        }
        assert_eq!(seal(&[("body", "Sun"), ("limb", " ")]), seal(&[("body", "Sun")]));
    }

    #[test]
    fn what_is_said_counts() {
        for (name, one, other) in [
            ("gyro_bearing", "045.5", "045.6"),
            ("lat", "-36", "36"),
            ("lat", "36-05.8S", "36-05.8N"),
            ("observer", "007", "7"),
            ("utc", "2026-06-14T06:12:00Z", "2026-06-14T06:12:00+09:00"),
            ("remarks", "a b", "ab"),
        ] {
            assert_ne!(seal(&[(name, one)]), seal(&[(name, other)]), "{name}: {one} {other}");
        }
        // A cell moved to its neighbour, or a letter from one cell to the next.
        assert_ne!(seal(&[("gyro_bearing", "45")]), seal(&[("compass_bearing", "45")]));
        assert_ne!(seal(&[("body", "ab"), ("limb", "c")]), seal(&[("body", "a"), ("limb", "bc")]));
    }
}
