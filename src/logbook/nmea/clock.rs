//! A time that the stream says, against the clock of this computer.

use crate::time::UtcInstant;
use std::fmt;

const DAY_S: f64 = 86_400.0;
/// The count of weeks in a satellite's message starts anew after so many.
const ROLLOVER_WEEKS: i64 = 1024;
/// Two clocks of a ship further apart than this are worth a word, seconds.
const WORTH_A_WORD_S: f64 = 60.0;

/// Whether the data come as they are said, or were recorded.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Recorded {
    /// They come from a network or an instrument: the two clocks should agree.
    No,
    /// They may be old.
    Yes,
}

/// What the two clocks say of each other.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum ClockCheck {
    /// They agree to the minute.
    Agrees,
    /// They are apart, or the recording is old: worth a word.
    Apart {
        /// Stream - computer, seconds.
        apart_s: f64,
        /// Whether the data were recorded.
        recorded: bool,
    },
    /// They are apart by a whole number of times 1024 weeks: the receiver has lost count. Not to be taken.
    Rollover {
        /// Weeks, stream - computer.
        weeks: i64,
    },
    /// More than a day apart as the data come: one of the two is wrong. Not to be taken.
    FarOff {
        /// Stream - computer, seconds.
        apart_s: f64,
    },
}

impl ClockCheck {
    /// Compares what the stream says with this computer's clock.
    pub fn of(said: UtcInstant, computer: UtcInstant, recorded: Recorded) -> Self {
        let apart_s = said.seconds_since(computer);
        let times = (apart_s / (7.0 * DAY_S * ROLLOVER_WEEKS as f64)).round() as i64;
        let weeks = times * ROLLOVER_WEEKS;
        if times != 0 && (apart_s - weeks as f64 * 7.0 * DAY_S).abs() <= DAY_S {
            Self::Rollover { weeks }
        } else if recorded == Recorded::No && apart_s.abs() > DAY_S {
            Self::FarOff { apart_s }
        } else if apart_s.abs() > WORTH_A_WORD_S {
            Self::Apart { apart_s, recorded: recorded == Recorded::Yes }
        } else {
            Self::Agrees
        }
    }

    /// Whether the time must not be taken.
    pub fn refuses(self) -> bool {
        matches!(self, Self::Rollover { .. } | Self::FarOff { .. })
    }
}

impl fmt::Display for ClockCheck {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let side = |ahead: bool| if ahead { "ahead of" } else { "behind" };
        match *self {
            Self::Agrees => write!(f, "its time agrees with this computer's clock"),
            Self::Apart { apart_s, recorded: true } if apart_s < 0.0 => {
                write!(f, "its last time is {} before this computer's clock", span(apart_s))
            }
            Self::Apart { apart_s, .. } => {
                write!(f, "its time is {} {} this computer's clock: is either of them wrong?", span(apart_s), side(apart_s > 0.0))
            }
            Self::Rollover { weeks } => write!(
                f,
                "its date is {} weeks {} this computer's clock, which a receiver shows when its count of weeks (1024) has started anew; give the time by hand",
                weeks.abs(),
                side(weeks > 0)
            ),
            Self::FarOff { apart_s } => write!(
                f,
                "its time is {} {} this computer's clock, and one of the two must be wrong; give the time by hand",
                span(apart_s),
                side(apart_s > 0.0)
            ),
        }
    }
}

/// A span of time in the unit that suits it.
fn span(seconds: f64) -> String {
    let seconds = seconds.abs();
    if seconds < 120.0 {
        format!("{seconds:.0} seconds")
    } else if seconds < 2.0 * 3600.0 {
        format!("{:.0} minutes", seconds / 60.0)
    } else if seconds < 2.0 * DAY_S {
        format!("{:.0} hours", seconds / 3600.0)
    } else {
        format!("{:.0} days", seconds / DAY_S)
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::time::text::read_utc;

    fn check(said: &str, recorded: Recorded) -> String {
        let at = |text: &str| read_utc(text).unwrap().utc;
        let check = ClockCheck::of(at(said), at("2026-06-14T06:00:00Z"), recorded);
        format!("{}{check}", if check.refuses() { "refused: " } else { "" })
    }

    #[test]
    fn clocks() {
        use Recorded::{No, Yes};
        assert_eq!(check("2026-06-14T06:00:59Z", No), "its time agrees with this computer's clock");
        assert_eq!(check("2026-06-14T05:55:00Z", No), "its time is 5 minutes behind this computer's clock: is either of them wrong?");
        assert_eq!(check("2026-06-04T06:00:00Z", Yes), "its last time is 10 days before this computer's clock");
        assert!(check("2026-06-24T06:00:00Z", Yes).starts_with("its time is 10 days ahead of"));
        assert!(check("2026-06-04T06:00:00Z", No).starts_with("refused: its time is 10 days behind"));
        // A thousand weeks before; 1024 and 2048 weeks, to a day.
        assert!(check("2007-04-15T06:00:00Z", No).starts_with("refused: its time is 7000 days behind"));
        for recorded in [No, Yes] {
            assert!(check("2006-10-29T18:00:00Z", recorded).starts_with("refused: its date is 1024 weeks behind"));
            assert!(check("2046-01-27T06:00:00Z", recorded).contains("1024 weeks ahead of"));
            assert!(check("1987-03-15T06:00:00Z", recorded).contains("2048 weeks behind"));
        }
        assert!(!check("2006-10-27T05:59:00Z", Yes).starts_with("refused"));
    }
}
