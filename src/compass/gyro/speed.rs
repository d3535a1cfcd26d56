//! The error of a north-seeking gyro from the ship's own motion, and what is left of it when the corrector is off.

use crate::angle::{GyroBearing, GyroError, Latitude, TrueBearing};
use crate::compass::GyroType;

/// Speed of the earth's surface at the equator, knots.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum EquatorSpeed {
    /// 900: the handbooks' round figure.
    #[default]
    Handbook,
    /// The equator of WGS 84 turning once in a sidereal day, in miles of 1852 m: 904.1. Where a minute of the equator is taken for a mile,
    /// 21600 of them in that day give the 902.5 of other texts; the difference is 0.2 % of the speed error.
    Earth,
}

/// Radius of the equator, metres (WGS 84), the earth's rate of turn, radians a second (WGS 84), metres in a nautical mile.
const EQUATOR_M: f64 = 6_378_137.0;
const TURN_RAD_PER_S: f64 = 7.292_115e-5;
const MILE_M: f64 = 1852.0;

impl EquatorSpeed {
    /// Knots.
    pub fn kn(self) -> f64 {
        match self {
            Self::Handbook => 900.0,
            Self::Earth => EQUATOR_M * TURN_RAD_PER_S * 3600.0 / MILE_M,
        }
    }
}

/// Nearer to a pole than this the earth's own turn no longer shows a gyro the north, degrees (our own).
const POLE_DEG: f64 = 0.5;

/// The gyro error from speed on a true course: tan e = V cos C / (900 cos lat + V sin C).
///
/// Units and signs: knots, degrees; the gyro reads high (west, -) on northerly courses, low (east, +) on southerly, in both
/// hemispheres; nil due east and west.
///
/// Undefined: `None` within half a degree of a pole, for a speed that is negative or not a finite number, and where the ship outruns the
/// earth.
///
/// Source: common practice in gyrocompass manuals; worked values in `tests/published/gyro_speed.rs`.
///
/// # Example
/// ```
/// use shadowpin::angle::{Latitude, TrueBearing};
/// use shadowpin::compass::gyro::speed::{EquatorSpeed, speed_error};
/// let lat = Latitude::from_deg(50.0).unwrap();
/// let north = speed_error(20.0, TrueBearing::wrapping_deg(0.0), lat, EquatorSpeed::Handbook).unwrap();
/// assert_eq!(format!("{:.2}", north.deg()), "-1.98");
/// ```
pub fn speed_error(speed_kn: f64, course: TrueBearing, latitude: Latitude, equator: EquatorSpeed) -> Option<GyroError> {
    if latitude.deg().abs() > 90.0 - POLE_DEG || !(0.0..f64::INFINITY).contains(&speed_kn) {
        return None;
    }
    let (sin_course, cos_course) = course.deg().to_radians().sin_cos();
    let eastward_kn = equator.kn() * latitude.deg().to_radians().cos() + speed_kn * sin_course;
    // The spin axis settles at right angles to the ship's whole motion in space, which points west of north on northerly courses.
    (eastward_kn > 0.0).then(|| GyroError::wrapping_deg(-(speed_kn * cos_course).atan2(eastward_kn).to_degrees()))
}

/// The same where only the course by that gyro is known: sin e = -V cos G / (900 cos lat), G the gyro course.
///
/// Gyro north stands at right angles to the ship's whole motion in space, so nothing of that motion lies along it:
/// 900 cos lat sin e + V cos G = 0, with G = C - e.
///
/// Undefined: as [`speed_error`]; `None` for a negative speed, and where the ship may outrun the earth.
pub fn speed_error_by_gyro_course(speed_kn: f64, course: GyroBearing, latitude: Latitude, equator: EquatorSpeed) -> Option<GyroError> {
    if latitude.deg().abs() > 90.0 - POLE_DEG || !(0.0..f64::INFINITY).contains(&speed_kn) {
        return None;
    }
    let (sin_course, cos_course) = course.deg().to_radians().sin_cos();
    let earth_kn = equator.kn() * latitude.deg().to_radians().cos();
    let sine = -speed_kn * cos_course / earth_kn;
    if sine.abs() >= 1.0 {
        return None;
    }
    let error = sine.asin();
    let eastward_by_gyro_kn = earth_kn * error.cos() + speed_kn * sin_course;
    let eastward_kn = earth_kn + speed_kn * (course.deg().to_radians() + error).sin();
    (eastward_by_gyro_kn > 0.0 && eastward_kn > 0.0).then(|| GyroError::wrapping_deg(error.to_degrees()))
}

/// Whether an observed gyro error looks like a speed error that was not corrected.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum SpeedVerdict {
    /// The gyro has no speed error.
    NoSpeedError,
    /// Too small to tell from nothing with that uncertainty, or the observed error fits both.
    TooSmallToTell,
    /// It does: the observed error is within 2 u of the expected one, and not of nothing.
    LooksUncorrected,
    /// It does not.
    LooksCorrected,
    /// It is twice what is expected, as with the corrector set the wrong way.
    LooksDoubled,
    /// It is neither.
    Neither,
}

/// Compares an observed gyro error with the speed error to expect were the corrector off: which of nil, once and twice it lies
/// within 2 u of, where it is one of them only.
///
/// One observation cannot prove it: other errors add to it. Over many, the review fits the slope.
pub fn speed_verdict(gyro_type: GyroType, observed: GyroError, u_deg: f64, expected: GyroError) -> SpeedVerdict {
    if gyro_type == GyroType::Other {
        return SpeedVerdict::NoSpeedError;
    }
    if expected.deg().abs() < 2.0 * u_deg {
        return SpeedVerdict::TooSmallToTell;
    }
    // The corrector set against its sense doubles the error.
    let stories = [(0.0, SpeedVerdict::LooksCorrected), (1.0, SpeedVerdict::LooksUncorrected), (2.0, SpeedVerdict::LooksDoubled)];
    let mut fitting = stories.into_iter().filter(|(times, _)| (observed.deg() - times * expected.deg()).abs() <= 2.0 * u_deg);
    match (fitting.next(), fitting.next()) {
        (Some((_, only)), None) => only,
        (Some(_), Some(_)) => SpeedVerdict::TooSmallToTell,
        (None, _) => SpeedVerdict::Neither,
    }
}

impl SpeedVerdict {
    /// In words.
    pub fn words(self) -> &'static str {
        match self {
            Self::NoSpeedError => "this kind of gyro has no speed error",
            Self::TooSmallToTell => "too small to tell from this observation",
            Self::LooksUncorrected => "the error observed looks like it: is the speed corrector on?",
            Self::LooksCorrected => "the error observed does not look like it",
            Self::LooksDoubled => "the error observed is about twice that: is the corrector set against its sense?",
            Self::Neither => "the error observed is neither that nor nil",
        }
    }
}

/// The damping (latitude) error of some types: sin e = K tan(latitude), east in north latitude.
///
/// `None` where that has no answer, near the poles.
pub fn damping_error(k: f64, latitude: Latitude) -> Option<GyroError> {
    let sine = k * latitude.deg().to_radians().tan();
    (sine.abs() <= 1.0).then(|| GyroError::wrapping_deg(sine.asin().to_degrees()))
}

/// The constant K from an error observed at a latitude; `None` on the equator, where the error says nothing of it.
pub fn damping_constant(error: GyroError, latitude: Latitude) -> Option<f64> {
    let tangent = latitude.deg().to_radians().tan();
    (tangent.abs() > 1e-6).then(|| error.deg().to_radians().sin() / tangent)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn by_gyro_course_is_the_error_on_the_true_course_that_it_gives() {
        let mut answered = 0;
        for latitude in [-89.4, -89.0, -85.0, -40.0, 0.0, 55.0, 88.0, 89.3] {
            for course in (0..360).step_by(7) {
                for speed_kn in [0.0, 6.0, 15.0, 40.0] {
                    let latitude = Latitude::from_deg(latitude).unwrap();
                    let by_gyro = GyroBearing::wrapping_deg(f64::from(course));
                    let Some(error) = speed_error_by_gyro_course(speed_kn, by_gyro, latitude, EquatorSpeed::Handbook) else {
                        // Only where the ship may outrun the earth.
                        assert!(speed_kn >= EquatorSpeed::Handbook.kn() * latitude.deg().to_radians().cos(), "{latitude:?} {course}");
                        continue;
                    };
                    let again = speed_error(speed_kn, by_gyro + error, latitude, EquatorSpeed::Handbook).unwrap();
                    assert!((again.deg() - error.deg()).abs() < 1e-9, "{latitude:?} {course} {speed_kn}: {error:?} {again:?}");
                    answered += 1;
                }
            }
        }
        assert!(answered > 1200, "{answered}");
        let north = GyroBearing::wrapping_deg(0.0);
        for nonsense in [-5.0, f64::NAN, f64::INFINITY] {
            assert!(speed_error_by_gyro_course(nonsense, north, Latitude::from_deg(50.0).unwrap(), EquatorSpeed::Earth).is_none());
        }
    }

    #[test]
    fn verdicts() {
        let verdict = |observed: f64, u_deg: f64, expected: f64, gyro_type: GyroType| {
            speed_verdict(gyro_type, GyroError::wrapping_deg(observed), u_deg, GyroError::wrapping_deg(expected))
        };
        let spinning = |observed: f64, u_deg: f64, expected: f64| verdict(observed, u_deg, expected, GyroType::Spinning);
        assert_eq!(spinning(-1.9, 0.3, -1.98), SpeedVerdict::LooksUncorrected);
        assert_eq!(spinning(0.2, 0.3, -1.98), SpeedVerdict::LooksCorrected);
        assert_eq!(spinning(-3.9, 0.3, -1.98), SpeedVerdict::LooksDoubled);
        assert_eq!(spinning(2.0, 0.3, -1.98), SpeedVerdict::Neither);
        assert_eq!(spinning(-0.5, 0.4, -0.7), SpeedVerdict::TooSmallToTell);
        // Between the two, and within 2 u of both.
        assert_eq!(spinning(-0.55, 0.4, -1.0), SpeedVerdict::TooSmallToTell);
        assert_eq!(verdict(-1.98, 0.3, -1.98, GyroType::Other), SpeedVerdict::NoSpeedError);
    }
}
