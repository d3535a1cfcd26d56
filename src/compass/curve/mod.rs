//! The deviation curve: five coefficients from the deviations of a swing or of a log.

mod blunders;
mod coefficients;
mod coverage;
mod exact;
mod fit;
mod handbook;
pub mod latitude;
mod least_squares;
mod student;

pub use coefficients::Coefficients;
pub use exact::ExactCoefficients;
pub use fit::{Curve, Estimate, NoCurve, ReadingSlip, SetAside, fit};
pub use handbook::eight_headings;

use crate::angle::{CompassBearing, Deviation};

/// Which way the ship was turning when a reading was taken.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Turn {
    /// To starboard.
    Clockwise,
    /// To port.
    Anticlockwise,
}

/// One deviation, on one heading.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct DeviationReading {
    /// Ship's head by the compass.
    pub heading: CompassBearing,
    /// The deviation found, east +.
    pub deviation: Deviation,
    /// Which way the ship was turning, where it was noted.
    pub turn: Option<Turn>,
}
