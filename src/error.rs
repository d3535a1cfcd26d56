//! What could not be done: a value that could not be read, a question that has no answer, a run that could not start.

use std::borrow::Cow;
use std::path::PathBuf;

/// A written value that could not be read.
///
/// Its text is one sentence: the value, what was expected, and a hint where there is one. Where the value stood (file,
/// line, column) is added by whoever was reading.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("{}: expected {expected}{}", shown(.value), hint_tail(.hint))]
pub struct BadValue {
    /// The value as written, cut to a printable length.
    pub value: String,
    /// What would have been right: "a latitude, 90 S to 90 N".
    pub expected: Cow<'static, str>,
    /// What the writer probably meant or could do; may be empty.
    pub hint: Cow<'static, str>,
}

impl BadValue {
    /// The longest part of a value that a message repeats, in characters.
    pub const SHOWN: usize = 60;

    /// A message about `value`; control characters are shown as a dot, so that a log cannot steer a terminal.
    pub fn new(value: &str, expected: impl Into<Cow<'static, str>>) -> Self {
        let mut shown: String = value.chars().take(Self::SHOWN).map(|c| if c.is_control() { '·' } else { c }).collect();
        if value.chars().nth(Self::SHOWN).is_some() {
            shown.push('…');
        }
        Self { value: shown, expected: expected.into(), hint: Cow::Borrowed("") }
    }

    /// The same message with a hint.
    #[must_use]
    pub fn hint(mut self, hint: impl Into<Cow<'static, str>>) -> Self {
        self.hint = hint.into();
        self
    }
}

/// Edits between two words, an exchange of neighbours counted once (optimal string alignment).
pub(crate) fn edits(a: &str, b: &str) -> usize {
    let (a, b): (Vec<char>, Vec<char>) = (a.chars().collect(), b.chars().collect());
    // Three rows of the table: two before, one before, now.
    let (mut older, mut old): (Vec<usize>, Vec<usize>) = (Vec::new(), (0..=b.len()).collect());
    for (i, ca) in a.iter().enumerate() {
        let mut now = vec![i + 1];
        for (j, cb) in b.iter().enumerate() {
            let at = |row: &[usize], j: usize| row.get(j).copied().unwrap_or(usize::MAX / 2);
            let mut best = (at(&old, j + 1) + 1).min(at(&now, j) + 1).min(at(&old, j) + usize::from(ca != cb));
            if i > 0 && j > 0 && a.get(i - 1) == Some(cb) && b.get(j - 1) == Some(ca) {
                best = best.min(at(&older, j - 1) + 1);
            }
            now.push(best);
        }
        (older, old) = (old, now);
    }
    old.last().copied().unwrap_or(usize::MAX)
}

/// The value in quotes, or that there is none.
fn shown(value: &str) -> String {
    if value.is_empty() { "blank".to_owned() } else { format!("\"{value}\"") }
}

fn hint_tail(hint: &str) -> String {
    if hint.is_empty() { String::new() } else { format!("; {hint}") }
}

/// A question about the sky or the earth's field that has no answer there and then.
///
/// These are answers, not failures: the caller says them and goes on.
#[derive(Debug, Clone, Copy, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum NoAnswer {
    /// The body stands in the zenith, where every direction is its azimuth.
    #[error("the body is in the zenith (altitude {altitude_deg:.3}): it has no azimuth")]
    Zenith {
        /// Topocentric altitude, degrees.
        altitude_deg: f64,
    },
    /// At a geographic pole every direction is south or north.
    #[error("at the pole (latitude {latitude_deg:.5}) there is no azimuth: every direction is the same")]
    Pole {
        /// Latitude, degrees, north +.
        latitude_deg: f64,
    },
    /// The instant lies outside the years the formulas were checked for.
    #[error("the year {year} is outside {first}-{last}, for which the formulas were checked")]
    Year {
        /// Calendar year, UTC.
        year: i32,
        /// First year answered.
        first: i32,
        /// Last year answered.
        last: i32,
    },
    /// The field model does not reach that date.
    #[error("no field model for {year:.2}: the models span {from:.1} to {to:.1}")]
    FieldModel {
        /// Decimal year asked for.
        year: f64,
        /// First decimal year covered.
        from: f64,
        /// Last decimal year answered.
        to: f64,
    },
    /// The field is not answered at that height.
    #[error("no field for a height of {height_km} km: {from} to {to} km above the ellipsoid are answered")]
    Height {
        /// Height asked for, kilometres above the ellipsoid.
        height_km: f64,
        /// Lowest answered.
        from: f64,
        /// Highest answered.
        to: f64,
    },
    /// The horizontal field is too weak for a compass to point.
    #[error("the horizontal field is {horizontal_nt:.0} nT: a magnetic compass does not point there")]
    WeakField {
        /// Horizontal intensity, nanotesla.
        horizontal_nt: f64,
    },
}

/// A run that could not be done at all (exit 2).
#[derive(Debug, thiserror::Error)]
#[non_exhaustive]
pub enum Error {
    /// An option or argument with a value that cannot be read.
    #[error("{what}: {bad}")]
    Option {
        /// The option as written on the command line, for instance `--lat`.
        what: String,
        /// What was wrong with it.
        bad: BadValue,
    },
    /// Options that do not go together, or one that is missing.
    #[error("{0}")]
    Usage(String),
    /// The question has no answer.
    #[error(transparent)]
    NoAnswer(#[from] NoAnswer),
    /// A file that cannot be opened, read or written.
    #[error("{}: {source}", path.display())]
    File {
        /// The file.
        path: PathBuf,
        /// What the system said.
        source: std::io::Error,
    },
    /// A file whose content cannot be used as a whole (header, limits, card).
    #[error("{file}{}: {message}", line_tail(*.line))]
    Content {
        /// Name of the file, or "standard input".
        file: String,
        /// Line, from 1; 0 where no line is meant.
        line: u64,
        /// What is wrong and what to do.
        message: String,
    },
    /// Reading or writing a stream.
    #[error("{what}: {source}")]
    Stream {
        /// What was being done.
        what: &'static str,
        /// What the system said.
        source: std::io::Error,
    },
}

fn line_tail(line: u64) -> String {
    if line == 0 { String::new() } else { format!(", line {line}") }
}

/// The result of a run.
pub type Result<T, E = Error> = std::result::Result<T, E>;
