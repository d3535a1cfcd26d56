//! The officer's way: the spherical triangle of pole, zenith and body, from latitude, declination and hour angle.

use super::{Horizontal, has_azimuth};
use crate::angle::{Latitude, TrueBearing};
use crate::error::NoAnswer;

/// Altitude and azimuth from latitude, declination and local hour angle, as the tables give them: no parallax.
///
/// Units and signs: degrees; north +; the hour angle westward, any number of turns.
///
/// # Errors
/// [`NoAnswer::Pole`] and [`NoAnswer::Zenith`] as for [`horizontal`](super::horizontal).
///
/// # Example
/// ```
/// use shadowpin::{angle::Latitude, horizon::triangle};
/// let seen = triangle(Latitude::from_deg(33.0).ok_or("no such latitude")?, -19.0, 51.0)?;
/// assert_eq!(format!("{:.1}", seen.azimuth.deg()), "230.9"); // tables: 129.1 from north, west
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub fn triangle(latitude: Latitude, declination_deg: f64, lha_deg: f64) -> Result<Horizontal, NoAnswer> {
    let (sin_lat, cos_lat) = latitude.deg().to_radians().sin_cos();
    let (sin_dec, cos_dec) = declination_deg.to_radians().sin_cos();
    let (sin_lha, cos_lha) = lha_deg.to_radians().sin_cos();
    // The cosine rule loses digits near the zenith; this form of it in half angles does not.
    let hav = |deg: f64| (deg.to_radians() / 2.0).sin().powi(2);
    let hav_zenith_distance = (hav(latitude.deg() - declination_deg) + cos_lat * cos_dec * hav(lha_deg)).clamp(0.0, 1.0);
    let zenith_distance = 2.0 * hav_zenith_distance.sqrt().atan2((1.0 - hav_zenith_distance).sqrt());
    let altitude_deg = 90.0 - zenith_distance.to_degrees();
    has_azimuth(latitude.deg(), altitude_deg)?;
    // The four-part formula, its fraction multiplied by cos(declination).
    let azimuth = (-sin_lha * cos_dec).atan2(sin_dec * cos_lat - cos_dec * cos_lha * sin_lat);
    Ok(Horizontal { azimuth: TrueBearing::wrapping_deg(azimuth.to_degrees()), altitude_deg })
}

/// Parallactic angle: at the body, from the direction of the pole to that of the zenith, degrees, `-180 < x <= 180`, + west of
/// the meridian; 0 where it is undefined (body in the zenith, or both at a pole).
pub fn parallactic_angle_deg(latitude: Latitude, declination_deg: f64, lha_deg: f64) -> f64 {
    let (sin_lat, cos_lat) = latitude.deg().to_radians().sin_cos();
    let (sin_dec, cos_dec) = declination_deg.to_radians().sin_cos();
    let (sin_lha, cos_lha) = lha_deg.to_radians().sin_cos();
    let toward_pole = sin_lat * cos_dec - cos_lat * sin_dec * cos_lha;
    crate::angle::wrap_180_deg((cos_lat * sin_lha).atan2(toward_pole).to_degrees())
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::{Position, wrap_180_deg};
    use crate::horizon::horizontal;
    use crate::sky::ApparentPlace;
    use proptest::prelude::*;

    /// Parallax in hour angle and declination, on the ellipsoid by its reduced latitude (Meeus, Astronomical Algorithms, 2nd
    /// ed., chapters 11 and 40), so that the triangle answers for the moon as well.
    fn by_the_triangle(place: &ApparentPlace, position: Position) -> Result<Horizontal, NoAnswer> {
        let lat = position.lat.deg().to_radians();
        let b_over_a = 1.0 - 1.0 / 298.257_223_563;
        let u = (b_over_a * lat.sin()).atan2(lat.cos());
        let (rho_sin, rho_cos) = (b_over_a * u.sin(), u.cos());
        let sin_hp = place.horizontal_parallax_deg.to_radians().sin();
        let h = (place.gha_deg + position.lon.deg()).to_radians();
        let dec = place.declination_deg.to_radians();
        let shift = (-rho_cos * sin_hp * h.sin()).atan2(dec.cos() - rho_cos * sin_hp * h.cos());
        let seen_dec = ((dec.sin() - rho_sin * sin_hp) * shift.cos()).atan2(dec.cos() - rho_cos * sin_hp * h.cos());
        triangle(position.lat, seen_dec.to_degrees(), (h - shift).to_degrees())
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(20_000))]
        #[test]
        fn two_methods_agree(lat in -89.9..89.9_f64, lon in -180.0..180.0_f64, gha in 0.0..360.0_f64, dec in -89.0..89.0_f64, hp in prop_oneof![Just(0.0), 0.0..1.03_f64]) {
            let place = ApparentPlace { gha_deg: gha, declination_deg: dec, horizontal_parallax_deg: hp, semidiameter_deg: 0.0 };
            let position = Position::from_deg(lat, lon).unwrap();
            match (horizontal(&place, position), by_the_triangle(&place, position)) {
                (Ok(vector), Ok(triangle)) => {
                    let sky = wrap_180_deg(vector.azimuth.deg() - triangle.azimuth.deg()) * vector.altitude_deg.to_radians().cos();
                    prop_assert!(sky.abs() < 1e-9, "azimuth {vector:?} {triangle:?}");
                    prop_assert!((vector.altitude_deg - triangle.altitude_deg).abs() < 1e-9, "{vector:?} {triangle:?}");
                    if vector.altitude_deg.abs() < 85.0 {
                        prop_assert!(wrap_180_deg(vector.azimuth.deg() - triangle.azimuth.deg()).abs() < 1e-9);
                    }
                }
                (a, b) => prop_assert!(a.is_err() && b.is_err(), "{a:?} {b:?}"),
            }
        }
    }

    #[test]
    fn zenith_and_poles_have_no_azimuth() {
        let lat = |deg| Latitude::from_deg(deg).unwrap();
        assert!(matches!(triangle(lat(20.0), 20.0, 0.0), Err(NoAnswer::Zenith { .. })));
        assert!(matches!(triangle(lat(20.0), -20.0, 180.0), Err(NoAnswer::Zenith { .. })));
        assert!(matches!(triangle(lat(90.0), 20.0, 30.0), Err(NoAnswer::Pole { .. })));
        assert!(matches!(triangle(lat(-90.0), 20.0, 30.0), Err(NoAnswer::Pole { .. })));
        assert!(triangle(lat(89.99), 20.0, 30.0).is_ok());
        assert!(triangle(lat(20.0), 20.02, 0.0).is_ok());
    }
}
