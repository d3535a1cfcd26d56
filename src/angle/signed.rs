//! Signed errors: east +, west -.

use super::bearing::MagneticBearing;
use super::degrees::wrap_180_deg;
use std::ops::{Add, Sub};

macro_rules! signed_error {
    ($(#[$doc:meta])* $name:ident) => {
        $(#[$doc])*
        ///
        /// Degrees, `-180 < x <= 180`, east +, west -.
        #[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
        pub struct $name(f64);

        impl $name {
            /// `deg` degrees, east +, brought into `-180 < x <= 180`. `deg` is finite.
            pub fn wrapping_deg(deg: f64) -> Self {
                Self(wrap_180_deg(deg))
            }

            /// Degrees, `-180 < x <= 180`, east +.
            pub fn deg(self) -> f64 {
                self.0
            }
        }
    };
}

signed_error! {
    /// Gyro error = azimuth - gyro bearing. East: the gyro reads low; west: it reads high.
    GyroError
}
signed_error! {
    /// Compass error = azimuth - compass bearing, of a magnetic compass.
    CompassError
}
signed_error! {
    /// Variation = true - magnetic, of the earth's field at a place and date.
    Variation
}
signed_error! {
    /// Deviation = compass error - variation, of one magnetic compass on one heading.
    Deviation
}

/// Deviation = compass error - variation.
impl Sub<Variation> for CompassError {
    type Output = Deviation;
    fn sub(self, variation: Variation) -> Deviation {
        Deviation::wrapping_deg(self.0 - variation.0)
    }
}

/// Compass error = variation + deviation.
impl Add<Deviation> for Variation {
    type Output = CompassError;
    fn add(self, deviation: Deviation) -> CompassError {
        CompassError::wrapping_deg(self.0 + deviation.0)
    }
}

/// Compass bearing to expect = magnetic - deviation.
impl Sub<Deviation> for MagneticBearing {
    type Output = super::bearing::CompassBearing;
    fn sub(self, deviation: Deviation) -> super::bearing::CompassBearing {
        super::bearing::CompassBearing::wrapping_deg(self.deg() - deviation.0)
    }
}
