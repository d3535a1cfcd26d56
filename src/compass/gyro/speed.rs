//! The error of a north-seeking gyro from the ship's own motion, and what is left of it when the corrector is off.

use crate::angle::{GyroBearing, GyroError, Latitude, TrueBearing};
use crate::compass::GyroType;

/// Speed of the earth's surface at the equator, knots.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum EquatorSpeed {
    /// 900: the handbooks' round figure.
    #[default]
    Handbook,
    /// One sidereal turn of the equator of WGS 84 in miles of 1852 m: 904.1 (902.5 were a mile a minute of the equator).
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
/// Undefined: `None` within half a degree of a pole, for a speed that is not a finite number, and where the ship outruns the earth.
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
    if latitude.deg().abs() > 90.0 - POLE_DEG || !speed_kn.is_finite() {
        return None;
    }
    let (sin_course, cos_course) = course.deg().to_radians().sin_cos();
    let eastward_kn = equator.kn() * latitude.deg().to_radians().cos() + speed_kn * sin_course;
    // The spin axis settles at right angles to the ship's whole motion in space, which points west of north on northerly courses.
    (eastward_kn > 0.0).then(|| GyroError::wrapping_deg(-(speed_kn * cos_course).atan2(eastward_kn).to_degrees()))
}

/// The same where only the course by that gyro is known: true course = gyro course + the error itself, found by repetition.
///
/// Undefined: as [`speed_error`].
pub fn speed_error_by_gyro_course(speed_kn: f64, course: GyroBearing, latitude: Latitude, equator: EquatorSpeed) -> Option<GyroError> {
    let mut error = GyroError::wrapping_deg(0.0);
    // Each round shrinks what is left by V / (900 cos lat); ten leave nothing at any speed of a ship below latitude 85.
    for _ in 0..10 {
        error = speed_error(speed_kn, course + error, latitude, equator)?;
    }
    Some(error)
}

/// Whether an observed gyro error looks like a speed error that was not corrected.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum SpeedVerdict {
    /// The gyro has no speed error.
    NoSpeedError,
    /// Too small to tell from nothing with that uncertainty.
    TooSmallToTell,
    /// It does: the observed error is nearer to the expected one than to nothing, and within 2 u of it.
    LooksUncorrected,
    /// It does not.
    LooksCorrected,
    /// It is twice what is expected, as with the corrector set the wrong way.
    LooksDoubled,
    /// It is neither.
    Neither,
}

/// Compares an observed gyro error with the speed error to expect were the corrector off.
///
/// One observation cannot prove it: other errors add to it. Over many, the review fits the slope.
pub fn speed_verdict(gyro_type: GyroType, observed: GyroError, u_deg: f64, expected: GyroError) -> SpeedVerdict {
    if gyro_type == GyroType::Other {
        return SpeedVerdict::NoSpeedError;
    }
    if expected.deg().abs() < 2.0 * u_deg {
        return SpeedVerdict::TooSmallToTell;
    }
    let near = |times: f64| (observed.deg() - times * expected.deg()).abs();
    // The corrector set against its sense doubles the error.
    let nearest =
        [(near(0.0), SpeedVerdict::LooksCorrected), (near(1.0), SpeedVerdict::LooksUncorrected), (near(2.0), SpeedVerdict::LooksDoubled)]
            .into_iter()
            .min_by(|a, b| a.0.total_cmp(&b.0));
    match nearest {
        Some((off, verdict)) if off <= 2.0 * u_deg => verdict,
        _ => SpeedVerdict::Neither,
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
