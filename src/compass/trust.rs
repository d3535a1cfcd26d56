//! How far a figure can be trusted, in one word.

use crate::limits::Limits;
use std::fmt;

/// A band of uncertainty and altitude.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Trust {
    /// u to 0.6 and altitude to 30 degrees.
    Firm,
    /// u to 1.2 and altitude to 60 degrees.
    Fair,
    /// Anything less.
    Weak,
}

/// The largest u of a firm figure, degrees.
pub const FIRM_U_DEG: f64 = 0.6;
/// The largest u of a fair figure, degrees.
pub const FAIR_U_DEG: f64 = 1.2;

impl Trust {
    /// The band of a figure with uncertainty `u_deg`, from a body at `altitude_deg` (`None`: a mark, at no altitude).
    ///
    /// Source: the bands of altitude are common practice, those of u our own; altitudes are set in the limits file.
    pub fn of(u_deg: f64, altitude_deg: Option<f64>, limits: &Limits) -> Self {
        let altitude = altitude_deg.unwrap_or(0.0);
        if u_deg <= FIRM_U_DEG && altitude <= limits.thresholds.altitude_fair_deg {
            Self::Firm
        } else if u_deg <= FAIR_U_DEG && altitude <= limits.thresholds.altitude_weak_deg {
            Self::Fair
        } else {
            Self::Weak
        }
    }

    /// The word of the column `trust`.
    pub fn word(self) -> &'static str {
        match self {
            Self::Firm => "firm",
            Self::Fair => "fair",
            Self::Weak => "weak",
        }
    }
}

impl fmt::Display for Trust {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.pad(self.word())
    }
}
