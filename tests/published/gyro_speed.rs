//! Worked values of the gyro's speed error and damping error.

use super::file;
use approx::assert_abs_diff_eq;
use shadowpin::angle::{GyroBearing, GyroError, Latitude, TrueBearing};
use shadowpin::compass::gyro::speed::{EquatorSpeed, damping_constant, damping_error, speed_error, speed_error_by_gyro_course};

fn lat(deg: f64) -> Latitude {
    Latitude::from_deg(deg).unwrap()
}

/// An operator's manual, printed to 0.1: half of that. One error high on a northerly course, one low on a southerly.
#[test]
fn speed_errors_of_a_manual() {
    let text = file("gyro_speed.csv");
    let mut rows = 0;
    for row in csv::Reader::from_reader(text.as_bytes()).records() {
        let row = row.unwrap();
        let number = |i: usize| row[i].parse::<f64>().unwrap();
        for equator in [EquatorSpeed::Handbook, EquatorSpeed::Earth] {
            let error = speed_error_by_gyro_course(number(3), GyroBearing::wrapping_deg(number(4)), lat(number(2)), equator).unwrap();
            assert_abs_diff_eq!(error.deg(), number(5), epsilon = 0.05);
        }
        rows += 1;
    }
    assert_eq!(rows, 2);
}

/// 20 knots north at 50: 1.98 (computed for the trade's facts); the same in both hemispheres, nil east and west, low on southerly.
#[test]
fn signs_and_hemispheres() {
    let error = |course: f64, latitude: f64| {
        speed_error(20.0, TrueBearing::wrapping_deg(course), lat(latitude), EquatorSpeed::Handbook).unwrap().deg()
    };
    assert_abs_diff_eq!(error(0.0, 50.0), -1.98, epsilon = 0.005);
    assert_abs_diff_eq!(error(0.0, -50.0), -1.98, epsilon = 0.005);
    assert_abs_diff_eq!(error(180.0, 50.0), 1.98, epsilon = 0.005);
    assert_abs_diff_eq!(error(90.0, 50.0), 0.0, epsilon = 1e-9);
    assert!(speed_error(20.0, TrueBearing::wrapping_deg(0.0), lat(90.0), EquatorSpeed::Handbook).is_none());
    assert!(speed_error(f64::NAN, TrueBearing::wrapping_deg(0.0), lat(50.0), EquatorSpeed::Handbook).is_none());
    // The earth's own speed: 902.5 to 904 by the sources, which take the mile differently and round.
    assert!((902.4..904.2).contains(&EquatorSpeed::Earth.kn()));
}

/// The exercise of a damping error: 2.8 at 58 S becomes 1.01 E at 30 N; printed to 0.01.
#[test]
fn damping_error_changes_name_at_the_equator() {
    let k = damping_constant(GyroError::wrapping_deg(-2.8), lat(-58.0)).unwrap();
    assert_abs_diff_eq!(damping_error(k, lat(30.0)).unwrap().deg(), 1.01, epsilon = 0.005);
    assert!(damping_constant(GyroError::wrapping_deg(1.0), lat(0.0)).is_none());
}
