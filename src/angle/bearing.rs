//! Directions by the instrument they were read on.

use super::degrees::{wrap_180_deg, wrap_360_deg};
use super::signed::{CompassError, Deviation, GyroError, Variation};
use std::ops::{Add, Sub};

macro_rules! direction {
    ($(#[$doc:meta])* $name:ident) => {
        $(#[$doc])*
        ///
        /// Degrees, `0 <= x < 360`, clockwise. 360 is kept as 0.
        #[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
        pub struct $name(f64);

        impl $name {
            /// The direction `deg`, in degrees, brought into `0 <= x < 360`. `deg` is finite.
            pub fn wrapping_deg(deg: f64) -> Self {
                Self(wrap_360_deg(deg))
            }

            /// Degrees, `0 <= x < 360`.
            pub fn deg(self) -> f64 {
                self.0
            }

            /// The opposite direction.
            #[must_use]
            pub fn reciprocal(self) -> Self {
                Self::wrapping_deg(self.0 + 180.0)
            }

            /// The turn from `other` to this direction, degrees, `-180 < x <= 180`, clockwise +.
            pub fn turn_from_deg(self, other: Self) -> f64 {
                wrap_180_deg(self.0 - other.0)
            }
        }
    };
}

direction! {
    /// A direction from true north: an azimuth, a charted bearing, a true heading.
    TrueBearing
}
direction! {
    /// A bearing or heading as read on a gyrocompass or its repeater.
    GyroBearing
}
direction! {
    /// A bearing or heading as read on a magnetic compass.
    CompassBearing
}
direction! {
    /// A direction from magnetic north.
    MagneticBearing
}

/// Gyro error = true - gyro; east + (the gyro reads low).
impl Sub<GyroBearing> for TrueBearing {
    type Output = GyroError;
    fn sub(self, gyro: GyroBearing) -> GyroError {
        GyroError::wrapping_deg(self.0 - gyro.0)
    }
}

/// Compass error = true - compass; east +.
impl Sub<CompassBearing> for TrueBearing {
    type Output = CompassError;
    fn sub(self, compass: CompassBearing) -> CompassError {
        CompassError::wrapping_deg(self.0 - compass.0)
    }
}

/// Variation = true - magnetic; east +.
impl Sub<MagneticBearing> for TrueBearing {
    type Output = Variation;
    fn sub(self, magnetic: MagneticBearing) -> Variation {
        Variation::wrapping_deg(self.0 - magnetic.0)
    }
}

/// Deviation = magnetic - compass; east +.
impl Sub<CompassBearing> for MagneticBearing {
    type Output = Deviation;
    fn sub(self, compass: CompassBearing) -> Deviation {
        Deviation::wrapping_deg(self.0 - compass.0)
    }
}

/// True = gyro + gyro error.
impl Add<GyroError> for GyroBearing {
    type Output = TrueBearing;
    fn add(self, error: GyroError) -> TrueBearing {
        TrueBearing::wrapping_deg(self.0 + error.deg())
    }
}

/// True = compass + compass error.
impl Add<CompassError> for CompassBearing {
    type Output = TrueBearing;
    fn add(self, error: CompassError) -> TrueBearing {
        TrueBearing::wrapping_deg(self.0 + error.deg())
    }
}

/// Magnetic = compass + deviation.
impl Add<Deviation> for CompassBearing {
    type Output = MagneticBearing;
    fn add(self, deviation: Deviation) -> MagneticBearing {
        MagneticBearing::wrapping_deg(self.0 + deviation.deg())
    }
}

/// True = magnetic + variation.
impl Add<Variation> for MagneticBearing {
    type Output = TrueBearing;
    fn add(self, variation: Variation) -> TrueBearing {
        TrueBearing::wrapping_deg(self.0 + variation.deg())
    }
}

/// Magnetic = true - variation.
impl Sub<Variation> for TrueBearing {
    type Output = MagneticBearing;
    fn sub(self, variation: Variation) -> MagneticBearing {
        MagneticBearing::wrapping_deg(self.0 - variation.deg())
    }
}

/// Gyro bearing to expect = true - gyro error.
impl Sub<GyroError> for TrueBearing {
    type Output = GyroBearing;
    fn sub(self, error: GyroError) -> GyroBearing {
        GyroBearing::wrapping_deg(self.0 - error.deg())
    }
}

/// Compass bearing to expect = true - compass error.
impl Sub<CompassError> for TrueBearing {
    type Output = CompassBearing;
    fn sub(self, error: CompassError) -> CompassBearing {
        CompassBearing::wrapping_deg(self.0 - error.deg())
    }
}
