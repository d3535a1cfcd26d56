//! What was not taken, and why.

use super::sentence::SentenceName;
use std::collections::BTreeMap;
use std::fmt;

/// Why a sentence, or a figure of it, was not taken.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
#[non_exhaustive]
pub enum Refusal {
    /// There is no checksum.
    NoChecksum,
    /// The checksum is not that of the sentence.
    WrongChecksum,
    /// A field that cannot be read: 61 minutes, latitude 99, a 30th of February.
    Unreadable,
    /// The fields that matter are empty.
    Empty,
    /// Its status is not A.
    Status,
    /// By its mode it is estimated, set by hand, simulated, or not valid.
    Mode(char),
    /// By its quality there is no fix, or one that is estimated, set by hand or simulated.
    Quality(char),
    /// A true heading that a magnetic compass worked out.
    TrueFromMagnetic,
    /// A true heading of an instrument that is not known to be a gyro.
    NotTheGyro,
    /// A true heading of another talker than the one named.
    NotTheNamed,
    /// A magnetic sensor's sentence from a gyro.
    SensorOfGyro,
}

impl fmt::Display for Refusal {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::NoChecksum => write!(f, "no checksum"),
            Self::WrongChecksum => write!(f, "wrong checksum"),
            Self::Unreadable => write!(f, "a field that cannot be read"),
            Self::Empty => write!(f, "its fields are empty"),
            Self::Status => write!(f, "status not A: not valid"),
            Self::Mode(mode) => match mode {
                'E' => write!(f, "mode E: estimated"),
                'M' => write!(f, "mode M: set by hand"),
                'S' => write!(f, "mode S: simulated"),
                'N' | 'V' => write!(f, "mode {mode}: not valid"),
                other => write!(f, "mode {other}: not known"),
            },
            Self::Quality(quality) => match quality {
                '0' => write!(f, "quality 0: no fix"),
                '6' => write!(f, "quality 6: estimated"),
                '7' => write!(f, "quality 7: set by hand"),
                '8' => write!(f, "quality 8: simulated"),
                other => write!(f, "quality {other}: not known"),
            },
            Self::TrueFromMagnetic => write!(f, "a true heading worked out from a magnetic compass"),
            Self::NotTheGyro => write!(f, "a true heading, not known to be a gyro's; --nmea-heading names its talker"),
            Self::NotTheNamed => write!(f, "not the talker of --nmea-heading"),
            Self::SensorOfGyro => write!(f, "a magnetic sensor's heading from a gyro"),
        }
    }
}

/// How often each was refused; sentences whose name is not known stand under none.
#[derive(Debug, Clone, PartialEq, Eq, Default)]
pub struct Refused(BTreeMap<(Option<SentenceName>, Refusal), u64>);

impl Refused {
    pub(super) fn count(&mut self, name: Option<SentenceName>, why: Refusal) {
        *self.0.entry((name, why)).or_default() += 1;
    }

    /// Each reason with its count, in order of sentence.
    pub fn iter(&self) -> impl Iterator<Item = (Option<SentenceName>, Refusal, u64)> + '_ {
        self.0.iter().map(|((name, why), count)| (*name, *why, *count))
    }

    /// Whether nothing was refused.
    pub fn is_empty(&self) -> bool {
        self.0.is_empty()
    }
}
