//! A gyro's run-up: where it settles, how fast, and whether it has.

mod fit;
mod judge;
mod still;

pub use fit::{Swing, fit};
pub use judge::{Assessment, Held, NotYet, Settled, ToCome, Why, assess};

/// What settled means by the standards of gyrocompasses; what they allow of settle point, scatter and hours stands in the limits.
///
/// Source: IMO A.424(XI), A.821(19), ISO 8728.
pub mod standard {
    /// Readings this near to the settle point are settled, degrees.
    pub const BAND_DEG: f64 = 0.7;
    /// Minutes over which three readings, half an hour apart, must stay within the band.
    pub const PROOF_MIN: f64 = 60.0;
    /// Part of many readings that may stray beyond the band by reading alone (our own: the standard has three readings in mind).
    pub const STRAY: f64 = 0.05;
}

/// One reading of a run-up.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct RunUpReading {
    /// Row of the file, from 1.
    pub row: usize,
    /// Minutes since the first reading.
    pub minutes: f64,
    /// Gyro error, degrees, east +.
    pub error_deg: f64,
}
