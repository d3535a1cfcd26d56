//! The speed error, and whether an observed one looks like it.

use shadowpin::angle::{GyroBearing, GyroError, Latitude, TrueBearing};
use shadowpin::compass::GyroType;
use shadowpin::compass::gyro::speed::{EquatorSpeed, SpeedVerdict, speed_error, speed_error_by_gyro_course, speed_verdict};

/// The error by the gyro's course is the error on the true course that follows from it, in every latitude that is answered.
#[test]
fn repetition_ends_at_the_true_course() {
    for lat in [-89.0, -60.0, 0.0, 45.0, 80.0, 85.0, 88.0] {
        let latitude = Latitude::from_deg(lat).unwrap();
        for course in (0..360).step_by(15) {
            for speed in [0.0, 12.0, 30.0] {
                let by_gyro = GyroBearing::wrapping_deg(f64::from(course));
                let Some(error) = speed_error_by_gyro_course(speed, by_gyro, latitude, EquatorSpeed::Handbook) else {
                    assert!(f64::abs(lat) > 87.0, "{lat} {course} {speed}");
                    continue;
                };
                let on_true = speed_error(speed, by_gyro + error, latitude, EquatorSpeed::Handbook).unwrap();
                let off = (on_true.deg() - error.deg()).abs();
                assert!(off < 1e-6, "{lat} {course} {speed}: {off}");
            }
        }
    }
}

#[test]
fn where_there_is_no_speed_error() {
    let north = TrueBearing::wrapping_deg(0.0);
    let at = |speed, lat| speed_error(speed, north, Latitude::from_deg(lat).unwrap(), EquatorSpeed::Earth);
    assert!(at(20.0, 90.0).is_none() && at(20.0, -89.9).is_none());
    assert!(at(f64::NAN, 50.0).is_none() && at(f64::INFINITY, 50.0).is_none() && at(-5.0, 50.0).is_none());
    // Westward faster than the earth turns eastward there.
    let west = TrueBearing::wrapping_deg(270.0);
    assert!(speed_error(20.0, west, Latitude::from_deg(89.0).unwrap(), EquatorSpeed::Handbook).is_none());
    assert_eq!(at(0.0, 50.0).unwrap().deg(), 0.0);
}

#[test]
fn verdicts_on_an_observed_error() {
    let expected = GyroError::wrapping_deg(-2.0);
    let verdict = |observed: f64, u: f64| speed_verdict(GyroType::Spinning, GyroError::wrapping_deg(observed), u, expected);
    assert_eq!(verdict(-1.8, 0.3), SpeedVerdict::LooksUncorrected);
    assert_eq!(verdict(0.3, 0.3), SpeedVerdict::LooksCorrected);
    assert_eq!(verdict(-4.2, 0.3), SpeedVerdict::LooksDoubled);
    assert_eq!(verdict(2.0, 0.3), SpeedVerdict::Neither);
    assert_eq!(verdict(-1.0, 0.3), SpeedVerdict::Neither);
    assert_eq!(verdict(-2.0, 1.1), SpeedVerdict::TooSmallToTell);
    assert_eq!(speed_verdict(GyroType::Other, expected, 0.3, expected), SpeedVerdict::NoSpeedError);
}
