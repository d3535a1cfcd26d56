//! A gyro's run-up: where it settles, how fast, and whether it has.

mod fit;
mod judge;

pub use fit::{Swing, fit};
pub use judge::{Assessment, Settled, Why, assess};

/// Standards of the settling of a gyrocompass.
///
/// Source: IMO A.424(XI), A.821(19), ISO 8728.
pub mod standard {
    /// Readings this near to the settle point are settled, degrees.
    pub const BAND_DEG: f64 = 0.7;
    /// Minutes over which three readings, half an hour apart, must stay within the band.
    pub const PROOF_MIN: f64 = 60.0;
    /// Hours within which a gyro must settle.
    pub const WITHIN_H: f64 = 6.0;
    /// Error allowed at the settle point, times sec(latitude), degrees.
    pub const SETTLE_POINT_DEG: f64 = 0.75;
    /// Scatter allowed of single readings about their mean, times sec(latitude), degrees.
    pub const SCATTER_DEG: f64 = 0.25;
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
