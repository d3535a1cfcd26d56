//! What the air and the height of the eye do near the horizon.

/// Below this apparent altitude, degrees, the formula was never meant: the refraction there is taken.
const LOWEST_APPARENT_DEG: f64 = -1.5;

/// Refraction at an apparent altitude, degrees, to be taken from it.
///
/// Range: apparent altitudes from -1.5 (eye on a high bridge, body in the dip of the horizon) to 90 degrees; below, the value
/// at -1.5. At 10 C and 1010 hPa. Never negative.
/// Error bound: 0.1' of the mean atmosphere; the real one differs by 1' to 3' within a degree of the horizon, now and then by
/// more.
/// Source: G. G. Bennett, The Calculation of Astronomical Refraction in Marine Navigation, Journal of Navigation 35 (1982).
pub fn refraction_from_apparent_deg(apparent_altitude_deg: f64) -> f64 {
    let h = apparent_altitude_deg.max(LOWEST_APPARENT_DEG);
    (1.0 / (h + 7.31 / (h + 4.4)).to_radians().tan() / 60.0).max(0.0)
}

/// Refraction at a true altitude, degrees, to be added to it: [`refraction_from_apparent_deg`] turned round.
///
/// There and back to 1e-9 degrees (test `there_and_back`).
pub fn refraction_from_true_deg(true_altitude_deg: f64) -> f64 {
    // Refraction shrinks upward by at most 0.24 degrees a degree: each round divides the error by four or more.
    let mut refraction = 0.0;
    for _ in 0..20 {
        refraction = refraction_from_apparent_deg(true_altitude_deg + refraction);
    }
    refraction
}

/// Dip of the visible horizon below the horizontal, degrees, for a height of eye in metres; 0 for heights that are not
/// positive.
///
/// Source: 1.76' x sqrt(height), The Nautical Almanac.
pub fn dip_deg(eye_height_m: f64) -> f64 {
    1.76 / 60.0 * eye_height_m.max(0.0).sqrt()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn there_and_back() {
        let mut worst = 0.0_f64;
        for i in -1500..=9000 {
            let apparent = f64::from(i) / 100.0;
            if apparent < LOWEST_APPARENT_DEG {
                continue;
            }
            let true_altitude = apparent - refraction_from_apparent_deg(apparent);
            worst = worst.max((refraction_from_true_deg(true_altitude) - refraction_from_apparent_deg(apparent)).abs());
        }
        println!("worst {worst:e}");
        assert!(worst < 1e-9);
    }

    #[test]
    fn falls_steadily_and_never_below_zero() {
        let mut last = f64::INFINITY;
        for i in -900..=900 {
            let refraction = refraction_from_apparent_deg(f64::from(i) / 10.0);
            assert!((0.0..=last).contains(&refraction), "{i}");
            last = refraction;
        }
    }
}
