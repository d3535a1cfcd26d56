//! Handbook of Magnetic Compass Adjustment (formerly NGA Pub. 226), art. 501: the worked example on eight headings.

use shadowpin::angle::{CompassBearing, Deviation};
use shadowpin::compass::curve::{DeviationReading, fit};

fn readings() -> Vec<DeviationReading> {
    let text = super::file("deviation_pub226.csv");
    let reading = |line: &str| {
        let (heading, deviation) = line.split_once(',').unwrap();
        DeviationReading {
            heading: CompassBearing::wrapping_deg(heading.parse().unwrap()),
            deviation: Deviation::wrapping_deg(deviation.parse().unwrap()),
            turn: None,
        }
    };
    text.lines().skip(1).map(reading).collect()
}

#[test]
fn by_the_handbooks_rule() {
    // The handbook prints A 1.0, B 12.0, C 8.0, D 5.0, E 1.5: to half of the last digit.
    let found = fit(&readings()).unwrap().handbook.unwrap();
    for (found, printed) in found.to_array().into_iter().zip([1.0, 12.0, 8.0, 5.0, 1.5]) {
        assert!((found - printed).abs() <= 0.05, "{found} {printed}");
    }
}

#[test]
fn by_least_squares() {
    // Computed from the same figures outside this program, to two decimals.
    let curve = fit(&readings()).unwrap();
    for (found, computed) in curve.coefficients.to_array().into_iter().zip([1.00, 11.94, 7.96, 5.00, 1.50]) {
        assert!((found - computed).abs() <= 0.005_01, "{found} {computed}");
    }
    assert!(curve.set_aside.is_empty());
    // 20.0 does not pass 20.
    assert!(curve.exact.is_none());
}
