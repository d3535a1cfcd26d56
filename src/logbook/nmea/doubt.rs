//! Talkers that do not agree.

use super::latest::Found;
use super::sentence::SentenceName;
use crate::angle::{Position, wrap_180_deg};
use crate::compass::Place;
use crate::time::Moment;
use std::fmt;

/// Clocks of two talkers further apart than this are worth a word, seconds.
const CLOCKS_AGREE_S: f64 = 2.0;

/// Two talkers that do not agree.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Doubt {
    /// About the position.
    Positions {
        /// The one taken.
        taken: SentenceName,
        /// The other.
        other: SentenceName,
        /// Miles between them.
        miles: f64,
    },
    /// About the time.
    Clocks {
        /// The one taken.
        taken: SentenceName,
        /// The other.
        other: SentenceName,
        /// Other - taken, seconds.
        apart_s: f64,
    },
}

impl fmt::Display for Doubt {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Positions { taken, other, miles } => {
                write!(
                    f,
                    "{other} gives a position {miles:.1} miles from that of {taken}, which is taken: is one of them not on satellites?"
                )
            }
            Self::Clocks { taken, other, apart_s } => {
                let side = if *apart_s > 0.0 { "ahead of" } else { "behind" };
                write!(f, "the clock of {other} is {:.0} seconds {side} that of {taken}, which is taken", apart_s.abs())
            }
        }
    }
}

/// What the other fresh talkers say against the one taken.
pub(super) fn doubts(times: &[Found<Moment>], positions: &[Found<Place>], position_nm: f64) -> Vec<Doubt> {
    let mut doubts = Vec::new();
    if let Some((taken, others)) = positions.split_first() {
        for other in others.iter().filter(|o| !o.stale) {
            let miles = miles_between(taken.value.position, other.value.position);
            if miles > position_nm {
                doubts.push(Doubt::Positions { taken: taken.from, other: other.from, miles });
            }
        }
    }
    if let Some((taken, others)) = times.split_first() {
        // Each as it would stand now.
        let now = |time: &Found<Moment>| time.value.utc.unix_ms() as f64 / 1000.0 + time.age_s.unwrap_or(0.0);
        for other in others.iter().filter(|o| !o.stale) {
            let apart_s = now(other) - now(taken);
            if apart_s.abs() > CLOCKS_AGREE_S {
                doubts.push(Doubt::Clocks { taken: taken.from, other: other.from, apart_s });
            }
        }
    }
    doubts
}

/// Miles along the great circle (haversine; the earth a sphere of 60 miles a degree, which is near enough to ask).
fn miles_between(a: Position, b: Position) -> f64 {
    let half = |deg: f64| (deg.to_radians() / 2.0).sin().powi(2);
    let (lat_a, lat_b) = (a.lat.deg(), b.lat.deg());
    let h = half(lat_b - lat_a) + lat_a.to_radians().cos() * lat_b.to_radians().cos() * half(wrap_180_deg(b.lon.deg() - a.lon.deg()));
    2.0 * h.clamp(0.0, 1.0).sqrt().asin().to_degrees() * 60.0
}
