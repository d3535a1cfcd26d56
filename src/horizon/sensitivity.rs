//! How much the azimuth moves for a small change of time, place or altitude: exact derivatives.

use super::has_azimuth;
use super::observer::Local;
use crate::angle::{Latitude, Position, TrueBearing, wrap_180_deg};
use crate::error::NoAnswer;
use crate::sky::ApparentPlace;

/// How fast a body moves across the sky of Greenwich.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Motion {
    /// Hour angle, degrees a second, westward +.
    pub gha_deg_per_s: f64,
    /// Declination, degrees a second, northward +.
    pub declination_deg_per_s: f64,
}

impl Motion {
    /// The sun's mean motion: 15 degrees an hour.
    pub const SUN: Self = Self { gha_deg_per_s: 15.0 / 3600.0, declination_deg_per_s: 0.0 };
    /// A star's: one turn in a sidereal day, 15 degrees 2.46' an hour; a planet's to 0.02 degrees an hour or so.
    pub const STAR: Self = Self { gha_deg_per_s: 15.041_07 / 3600.0, declination_deg_per_s: 0.0 };
    /// The moon's mean motion, 14 degrees 29.5' an hour; it varies by 0.2 degrees an hour.
    pub const MOON: Self = Self { gha_deg_per_s: 14.492_05 / 3600.0, declination_deg_per_s: 0.0 };

    /// The motion from `before` to `after`, places of one body `seconds` apart, less than half a day; `seconds` is not 0.
    pub fn between(before: &ApparentPlace, after: &ApparentPlace, seconds: f64) -> Self {
        Self {
            gha_deg_per_s: wrap_180_deg(after.gha_deg - before.gha_deg) / seconds,
            declination_deg_per_s: (after.declination_deg - before.declination_deg) / seconds,
        }
    }
}

/// Derivatives of the topocentric azimuth and altitude at one place and instant.
///
/// Signs: azimuth clockwise +; latitude north +; longitude east +.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Sensitivity {
    /// Azimuth by time, degrees a second.
    pub azimuth_deg_per_s: f64,
    /// Altitude by time, degrees a second.
    pub altitude_deg_per_s: f64,
    /// Azimuth by latitude, degrees a degree.
    pub azimuth_per_latitude: f64,
    /// Azimuth by longitude, degrees a degree of longitude (not of departure).
    pub azimuth_per_longitude: f64,
}

/// The derivatives of azimuth and altitude, parallax and the ellipsoid included.
///
/// Error bound: exact for `place` and `motion`; checked against small differences in `small_differences_agree`.
///
/// # Errors
/// As [`horizontal`](super::horizontal).
pub fn sensitivity(place: &ApparentPlace, position: Position, motion: Motion) -> Result<Sensitivity, NoAnswer> {
    let o = Local::new(place, position);
    has_azimuth(position.lat.deg(), o.altitude_deg())?;
    let level_2 = o.east * o.east + o.north * o.north;
    let level = level_2.sqrt();
    let azimuth = |d_east: f64, d_north: f64| (o.north * d_east - o.east * d_north) / level_2;
    let altitude = |d_east: f64, d_north: f64, d_up: f64| {
        let d_level = (o.east * d_east + o.north * d_north) / level;
        (level * d_up - o.up * d_level) / (level_2 + o.up * o.up)
    };

    // East, north and up of the body, derived by the hour angle ...
    let outward_by_lha = -o.cos_dec * o.sin_lha;
    let by_lha = (-o.cos_dec * o.cos_lha, -o.sin_lat * outward_by_lha, o.cos_lat * outward_by_lha);
    // ... by declination ...
    let outward_by_dec = -o.sin_dec * o.cos_lha;
    let by_dec =
        (o.sin_dec * o.sin_lha, o.cos_lat * o.cos_dec - o.sin_lat * outward_by_dec, o.cos_lat * outward_by_dec + o.sin_lat * o.cos_dec);
    // ... and by latitude: the zenith turns, and the observer moves along the meridian.
    let north_by_lat = -(o.up + o.meridian_radius);

    let by_time = |lha: f64, dec: f64| motion.gha_deg_per_s * lha + motion.declination_deg_per_s * dec;
    let azimuth_by_lha = azimuth(by_lha.0, by_lha.1);
    Ok(Sensitivity {
        azimuth_deg_per_s: by_time(azimuth_by_lha, azimuth(by_dec.0, by_dec.1)),
        altitude_deg_per_s: by_time(altitude(by_lha.0, by_lha.1, by_lha.2), altitude(by_dec.0, by_dec.1, by_dec.2)),
        azimuth_per_latitude: azimuth(0.0, north_by_lat),
        azimuth_per_longitude: azimuth_by_lha,
    })
}

/// On the horizon, degrees of azimuth for a degree of altitude along the body's daily path: tan(latitude) / sin(azimuth).
///
/// Infinite where the body grazes the horizon due north or south.
pub fn azimuth_per_altitude_on_horizon(latitude: Latitude, azimuth: TrueBearing) -> f64 {
    let sin_azimuth = azimuth.deg().to_radians().sin();
    // Due south in radians is not quite pi.
    if sin_azimuth.abs() < 1e-12 { f64::INFINITY } else { latitude.deg().to_radians().tan() / sin_azimuth }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::horizon::horizontal;
    use proptest::prelude::*;

    fn at(place: ApparentPlace, lat: f64, lon: f64) -> (f64, f64) {
        let seen = horizontal(&place, Position::from_deg(lat, lon).unwrap()).unwrap();
        (seen.azimuth.deg(), seen.altitude_deg)
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(4000))]
        #[test]
        fn small_differences_agree(lat in -80.0..80.0_f64, lon in -179.0..179.0_f64, gha in 0.0..360.0_f64, dec in -60.0..60.0_f64, hp in prop_oneof![Just(0.0), 0.0..1.03_f64], climb in -5e-5..5e-5_f64) {
            let place = ApparentPlace { gha_deg: gha, declination_deg: dec, horizontal_parallax_deg: hp, semidiameter_deg: 0.0 };
            let position = Position::from_deg(lat, lon).unwrap();
            if horizontal(&place, position).unwrap().altitude_deg.abs() > 80.0 {
                return Ok(());
            }
            let motion = Motion { declination_deg_per_s: climb, ..Motion::MOON };
            let exact = sensitivity(&place, position, motion).unwrap();
            let step = 1e-3;
            let slope = |one: (f64, f64), two: (f64, f64), by: f64| (wrap_180_deg(two.0 - one.0) / by, (two.1 - one.1) / by);
            let moved = |s: f64| ApparentPlace { gha_deg: gha + s * motion.gha_deg_per_s, declination_deg: dec + s * climb, ..place };
            let (azimuth, altitude) = slope(at(moved(-0.2), lat, lon), at(moved(0.2), lat, lon), 0.4);
            // Central differences over 0.001 degrees: their own error stays below 2e-6 of a slope of a few units.
            prop_assert!((azimuth - exact.azimuth_deg_per_s).abs() < 1e-7);
            prop_assert!((altitude - exact.altitude_deg_per_s).abs() < 1e-7);
            let by_lat = slope(at(place, lat - step, lon), at(place, lat + step, lon), 2.0 * step).0;
            prop_assert!((by_lat - exact.azimuth_per_latitude).abs() < 1e-5, "{by_lat} {exact:?}");
            let by_lon = slope(at(place, lat, lon - step), at(place, lat, lon + step), 2.0 * step).0;
            prop_assert!((by_lon - exact.azimuth_per_longitude).abs() < 1e-5, "{by_lon} {exact:?}");
        }

        #[test]
        fn slope_on_the_horizon(lat in -60.0..60.0_f64, dec in -28.0..28.0_f64, rising: bool) {
            let cos_lha = -lat.to_radians().tan() * dec.to_radians().tan();
            let lha = cos_lha.acos().to_degrees() * if rising { -1.0 } else { 1.0 };
            let place = |gha| ApparentPlace { gha_deg: gha, declination_deg: dec, horizontal_parallax_deg: 0.0, semidiameter_deg: 0.0 };
            let (one, two) = (at(place(lha - 1e-3), lat, 0.0), at(place(lha + 1e-3), lat, 0.0));
            let numeric = wrap_180_deg(two.0 - one.0) / (two.1 - one.1);
            let middle = at(place(lha), lat, 0.0);
            let exact = azimuth_per_altitude_on_horizon(Latitude::from_deg(lat).unwrap(), TrueBearing::wrapping_deg(middle.0));
            prop_assert!((numeric - exact).abs() < 1e-5, "{numeric} {exact}");
        }
    }

    /// dZ/dt = 15 degrees an hour x (sin lat - cos lat tan altitude cos Z), the handbooks' form.
    #[test]
    fn the_handbook_form_is_the_same() {
        let place = ApparentPlace { gha_deg: 310.0, declination_deg: 20.0, horizontal_parallax_deg: 0.0, semidiameter_deg: 0.0 };
        let position = Position::from_deg(44.5, 0.0).unwrap();
        let (azimuth, altitude) = at(place, 44.5, 0.0);
        let (lat, h, z) = (44.5_f64.to_radians(), altitude.to_radians(), azimuth.to_radians());
        let handbook = 15.0 / 3600.0 * (lat.sin() - lat.cos() * h.tan() * z.cos());
        assert!((sensitivity(&place, position, Motion::SUN).unwrap().azimuth_deg_per_s - handbook).abs() < 1e-12);
    }

    #[test]
    fn due_south_is_no_number() {
        for (lat, azimuth) in [(0.0, 0.0), (60.0, 180.0), (-60.0, 0.0)] {
            let slope = azimuth_per_altitude_on_horizon(Latitude::from_deg(lat).unwrap(), TrueBearing::wrapping_deg(azimuth));
            assert_eq!(slope, f64::INFINITY);
        }
    }
}
