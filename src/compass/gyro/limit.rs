//! Errors against their limits.

use crate::angle::{Deviation, GyroError, Latitude};
use crate::limits::Limits;

/// How an error stands to its limit.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Against {
    /// Inside, also with its uncertainty.
    Inside,
    /// Over it or near enough to be.
    MayBeOver,
    /// Over it by more than two standard uncertainties.
    Over,
}

impl Against {
    fn of(error_deg: f64, u_deg: f64, limit_deg: f64) -> Self {
        if error_deg.abs() - 2.0 * u_deg > limit_deg {
            Self::Over
        } else if error_deg.abs() > limit_deg {
            Self::MayBeOver
        } else {
            Self::Inside
        }
    }

    /// In words, behind "the limit of 1.6".
    pub fn words(self) -> &'static str {
        match self {
            Self::Inside => "inside",
            Self::MayBeOver => "may be over",
            Self::Over => "over",
        }
    }
}

/// The limit of a gyro error at a latitude, degrees: settle point error times sec(latitude), and the margin of repeater and reading.
///
/// Above the latitude set a gyro is doubtful; from 89 on the secant is held.
pub fn gyro_limit_deg(latitude: Latitude, limits: &Limits) -> f64 {
    let t = &limits.thresholds;
    t.gyro_settle_deg / latitude.deg().abs().min(89.0).to_radians().cos() + t.gyro_margin_deg
}

/// A gyro error against its limit.
pub fn gyro_against(error: GyroError, u_deg: f64, latitude: Latitude, limits: &Limits) -> Against {
    Against::of(error.deg(), u_deg, gyro_limit_deg(latitude, limits))
}

/// A deviation against its limit.
pub fn deviation_against(deviation: Deviation, u_deg: f64, limits: &Limits) -> Against {
    Against::of(deviation.deg(), u_deg, limits.thresholds.deviation_deg)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn limits_grow_with_latitude() {
        let limits = Limits::default();
        let at = |lat: f64| gyro_limit_deg(Latitude::from_deg(lat).unwrap(), &limits) - 0.5;
        // 0.75 sec(lat) at 0, 40, 50, 60, 70 (computed).
        for (lat, expected) in [(0.0, 0.75), (40.0, 0.98), (50.0, 1.17), (60.0, 1.50), (-70.0, 2.19)] {
            assert!((at(lat) - expected).abs() < 0.005, "{lat}");
        }
        assert!(at(90.0).is_finite());
        let lat = Latitude::from_deg(0.0).unwrap();
        let against = |deg: f64| gyro_against(GyroError::wrapping_deg(deg), 0.3, lat, &limits);
        assert_eq!((against(-1.2), against(1.3), against(-1.9)), (Against::Inside, Against::MayBeOver, Against::Over));
    }
}
