//! The sun, by the low-precision formulas of the almanac and the periodic terms that bring them to a few seconds of arc.

use super::ApparentPlace;
use super::earth::{apparent_sidereal_time_deg, mean_obliquity_deg, nutation};
use crate::angle::wrap_360_deg;
use crate::time::{Tt, UtcInstant};

/// Horizontal parallax of the sun at one astronomical unit, degrees: 8.794" (IAU 1976 system of constants).
const PARALLAX_AT_1_AU_DEG: f64 = 8.794 / 3600.0;
/// Semidiameter of the sun at one astronomical unit, degrees: 959.63" (The Astronomical Almanac).
pub(crate) const SEMIDIAMETER_AT_1_AU_DEG: f64 = 959.63 / 3600.0;
/// Aberration of the sun at one astronomical unit, degrees: 20.4955" (constant of aberration, IAU 1976).
const ABERRATION_AT_1_AU_DEG: f64 = 20.495_5 / 3600.0;

/// The six next largest terms of the earth's longitude: amplitude in radians, phase in radians, radians a Julian century.
/// They take the worst error of the longitude from 16" to 7". Source: P. Bretagnon and G. Francou, VSOP87 (1988).
const NEXT_TERMS: [(f64, f64, f64); 6] = [
    (1.324e-5, 0.742_5, 1_150.676_98),
    (1.273e-5, 2.037_1, 52.969_1),
    (1.199e-5, 1.109_6, 157.734_35),
    (0.990e-5, 5.233, 588.492_7),
    (0.902e-5, 2.045, 2.629_8),
    (0.857e-5, 3.508, 39.814_9),
];

/// The sun as seen from the centre of the earth.
///
/// Error bound: azimuth within 0.01 degrees of JPL DE421 for altitudes up to 60, with UTC taken as UT1 in both; the worst of
/// 3880 rows of 1902-2050 is 0.0026 (test `published::jpl_sun`). The place itself is within 8" in hour angle and 3.1" in
/// declination of the full earth ephemeris in 1900-2099 (test `place_against_the_full_ephemeris`), so the bound holds to 2100.
/// The sun's ecliptic latitude, at most 1.2", is left out.
/// Source: The Astronomical Almanac, page C5 (mean longitude, mean anomaly, equation of centre), with the digits, the
/// changes over the centuries, nutation, aberration and five periodic terms of J. Meeus, Astronomical Formulae for
/// Calculators, chapter 18, and Astronomical Algorithms, 2nd ed., chapter 25.
///
/// # Example
/// ```
/// use shadowpin::{sky::sun, time::UtcInstant};
/// let noon = UtcInstant::from_unix_ms(1_782_043_200_000)?; // 2026-06-21 12:00 UTC
/// let place = sun::apparent_place(noon);
/// assert!((place.declination_deg - 23.437).abs() < 0.002);
/// # Ok::<(), shadowpin::error::NoAnswer>(())
/// ```
pub fn apparent_place(utc: UtcInstant) -> ApparentPlace {
    let ut1 = utc.ut1();
    let tt = Tt::from(ut1);
    let (longitude_deg, radius_au) = longitude_and_distance(tt.centuries_j2000());
    let nutation = nutation(tt);
    let obliquity_deg = mean_obliquity_deg(tt) + nutation.obliquity_deg;
    let apparent_deg = longitude_deg + nutation.longitude_deg - ABERRATION_AT_1_AU_DEG / radius_au;

    let (sin_lon, cos_lon) = apparent_deg.to_radians().sin_cos();
    let (sin_eps, cos_eps) = obliquity_deg.to_radians().sin_cos();
    let right_ascension_deg = (cos_eps * sin_lon).atan2(cos_lon).to_degrees();
    ApparentPlace {
        gha_deg: wrap_360_deg(apparent_sidereal_time_deg(ut1, nutation, obliquity_deg) - right_ascension_deg),
        declination_deg: (sin_eps * sin_lon).asin().to_degrees(),
        horizontal_parallax_deg: PARALLAX_AT_1_AU_DEG / radius_au,
        semidiameter_deg: SEMIDIAMETER_AT_1_AU_DEG / radius_au,
    }
}

/// True longitude, degrees from the mean equinox of date, and distance, astronomical units, at `t` Julian centuries of TT
/// from J2000.0. Straight arithmetic, no branch: it can be written over columns.
fn longitude_and_distance(t: f64) -> (f64, f64) {
    let mean_longitude = 280.466_46 + t * (36_000.769_83 + t * 0.000_303_2);
    let anomaly = (357.529_11 + t * (35_999.050_29 - t * 0.000_153_7)).to_radians();
    let (s1, c1) = anomaly.sin_cos();
    let (s2, c2) = (2.0 * s1 * c1, 2.0 * c1 * c1 - 1.0);
    let s3 = s2 * c1 + c2 * s1;
    let centre = (1.914_602 - t * (0.004_817 + t * 0.000_014)) * s1 + (0.019_993 - t * 0.000_101) * s2 + 0.000_289 * s3;

    // The pull of Venus (two terms), of Jupiter, of the moon, and a slow one of Venus, Mars and the earth together. Arguments as
    // published, for the epoch 1900, carried to J2000.0: exactly one century.
    let term = |at_j2000: f64, per_century: f64| (at_j2000 + per_century * t).to_radians();
    let pulls = 0.001_34 * term(351.984_1, 22_518.754_1).cos()
        + 0.001_54 * term(254.078_2, 45_037.508_2).cos()
        + 0.002_00 * term(157.047_7, 32_964.357_7).cos()
        + 0.001_79 * term(297.852_8, 445_267.111_3).sin()
        + 0.001_78 * term(251.390_0, 20.200_0).sin();
    let smaller = NEXT_TERMS.iter().map(|(a, b, c)| a * (b + c * t).cos()).sum::<f64>().to_degrees();

    let eccentricity = 0.016_708_634 - t * (0.000_042_037 + t * 0.000_000_126_7);
    let (_, cos_true_anomaly) = (anomaly + centre.to_radians()).sin_cos();
    let radius = 1.000_001_018 * (1.0 - eccentricity * eccentricity) / (1.0 + eccentricity * cos_true_anomaly);
    (mean_longitude + centre + pulls + smaller, radius)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::wrap_180_deg;
    use sofars::{eph, erst, pnp};

    const J2000: f64 = 2_451_545.0;
    /// Astronomical units a light-day.
    const LIGHT_AU_PER_DAY: f64 = 173.144_632_674;

    /// GHA and declination, degrees, by the IAU 2000/2006 standards and the full earth ephemeris.
    fn by_the_standards(utc: UtcInstant) -> (f64, f64) {
        let (d_ut, d_tt) = (utc.ut1().days_j2000(), Tt::from(utc.ut1()).days_j2000());
        let (helio, bary) = eph::epv00(J2000, d_tt).unwrap();
        let distance = helio[0].iter().map(|x| x * x).sum::<f64>().sqrt();
        // Where the light set out, the sun itself hardly moving in eight minutes; then the tilt of it by the earth's speed.
        let mut seen = [0.0; 3];
        for axis in 0..3 {
            seen[axis] = -helio[0][axis] / distance + bary[1][axis] / LIGHT_AU_PER_DAY;
        }
        let turn = pnp::pnm06a(J2000, d_tt);
        let [x, y, z] = turn.map(|row| row.iter().zip(&seen).map(|(m, v)| m * v).sum::<f64>());
        let gha = erst::gst06a(J2000, d_ut, J2000, d_tt).to_degrees() - y.atan2(x).to_degrees();
        (wrap_360_deg(gha), z.atan2(x.hypot(y)).to_degrees())
    }

    fn worst_arcsec(first_year: i32, last_year: i32) -> (f64, f64) {
        let ms =
            |year: i32| chrono::NaiveDate::from_ymd_opt(year, 1, 1).unwrap().and_time(chrono::NaiveTime::MIN).and_utc().timestamp_millis();
        let (from, to) = (ms(first_year), ms(last_year + 1));
        // Hour angle as arc on the sky.
        let (mut gha, mut dec) = (0.0_f64, 0.0_f64);
        for i in 0..2000 {
            let utc = UtcInstant::from_unix_ms(from + (to - from - 1) / 2000 * i + i).unwrap();
            let (ours, (their_gha, their_dec)) = (apparent_place(utc), by_the_standards(utc));
            let d = wrap_180_deg(ours.gha_deg - their_gha) * ours.declination_deg.to_radians().cos() * 3600.0;
            gha = gha.max(d.abs());
            dec = dec.max((ours.declination_deg - their_dec).abs() * 3600.0);
        }
        println!("{first_year}-{last_year}: hour angle {gha:.2}\", declination {dec:.2}\"");
        (gha, dec)
    }

    /// The full ephemeris stops in the first day of 2100. At altitude 60 the azimuth moves two seconds of arc for one of the
    /// sun's place: 0.01 degrees allow 18".
    #[test]
    fn place_against_the_full_ephemeris() {
        for (first, last, bound) in [(1950, 2050, 10.0), (1900, 1950, 10.0), (2050, 2099, 10.0)] {
            let (gha, dec) = worst_arcsec(first, last);
            assert!(gha < bound && dec < bound, "{first}-{last}");
        }
    }
}
