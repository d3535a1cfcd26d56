//! How the earth stands: sidereal time, the obliquity of the ecliptic, and nutation.

use crate::angle::wrap_360_deg;
use crate::time::{Tt, Ut1, UtcInstant};

const ARCSEC: f64 = 1.0 / 3600.0;

/// The wobble of the earth's axis about its mean direction.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Nutation {
    /// In longitude, degrees, added to mean longitudes.
    pub longitude_deg: f64,
    /// In obliquity, degrees, added to the mean obliquity.
    pub obliquity_deg: f64,
}

/// Nutation by its four largest terms.
///
/// Error bound: 0.5" in longitude and 0.1" in obliquity as stated by the source; measured against the whole IAU 1980 series
/// in `nutation_against_the_whole_series`.
/// Source: J. Meeus, Astronomical Algorithms, 2nd ed., chapter 22 (the main terms of the IAU 1980 theory).
pub fn nutation(tt: Tt) -> Nutation {
    let t = tt.centuries_j2000();
    // Longitude of the moon's ascending node; mean longitudes of the sun and the moon.
    let node = (125.044_52 - 1_934.136_261 * t).to_radians();
    let sun = (280.466_5 + 36_000.769_8 * t).to_radians();
    let moon = (218.316_5 + 481_267.881_3 * t).to_radians();
    let ((sn, cn), (s2s, c2s), (s2m, c2m)) = (node.sin_cos(), (2.0 * sun).sin_cos(), (2.0 * moon).sin_cos());
    let (s2n, c2n) = (2.0 * sn * cn, 2.0 * cn * cn - 1.0);
    Nutation {
        longitude_deg: (-17.20 * sn - 1.32 * s2s - 0.23 * s2m + 0.21 * s2n) * ARCSEC,
        obliquity_deg: (9.20 * cn + 0.57 * c2s + 0.10 * c2m - 0.09 * c2n) * ARCSEC,
    }
}

/// The obliquity of the ecliptic without nutation, degrees.
///
/// Error bound: 0.07" in 1900-2100 against the IAU 2006 value (test `sidereal_time_and_obliquity_against_later_standards`).
/// Source: IAU 1980 expression (Lieske and others, 1977), as in Meeus, chapter 22.
pub fn mean_obliquity_deg(tt: Tt) -> f64 {
    let t = tt.centuries_j2000();
    23.0 + 26.0 / 60.0 + (21.448 + t * (-46.815_0 + t * (-0.000_59 + t * 0.001_813))) * ARCSEC
}

/// Greenwich mean sidereal time, degrees, `0 <= x < 360`.
///
/// Error bound: 0.3" in 1900-2100 against the IAU 2006 expression (test `sidereal_time_and_obliquity_against_later_standards`).
/// Source: IAU 1982 expression, as in Meeus, chapter 12.
pub fn mean_sidereal_time_deg(ut1: Ut1) -> f64 {
    let d = ut1.days_j2000();
    let t = d / 36_525.0;
    // Whole turns of the days are taken out first: they cost digits.
    wrap_360_deg(280.460_618_37 + 360.0 * d.fract() + 0.985_647_366_29 * d + t * t * (0.000_387_933 - t / 38_710_000.0))
}

/// Greenwich apparent sidereal time, degrees, `0 <= x < 360`: mean sidereal time and the equation of the equinoxes.
pub fn apparent_sidereal_time_deg(ut1: Ut1, nutation: Nutation, true_obliquity_deg: f64) -> f64 {
    wrap_360_deg(mean_sidereal_time_deg(ut1) + nutation.longitude_deg * true_obliquity_deg.to_radians().cos())
}

/// Greenwich hour angle of Aries, degrees, `0 <= x < 360`, westward.
///
/// Error bound: 0.7" (0.0002 degrees) of computing; UTC taken as UT1 is at most 0.9 s, 0.004 degrees.
pub fn aries_gha_deg(utc: UtcInstant) -> f64 {
    let ut1 = utc.ut1();
    let tt = Tt::from(ut1);
    let nutation = nutation(tt);
    apparent_sidereal_time_deg(ut1, nutation, mean_obliquity_deg(tt) + nutation.obliquity_deg)
}

#[cfg(test)]
mod tests {
    use super::*;
    use sofars::{erst, pnp};

    const J2000: f64 = 2_451_545.0;

    /// Days from J2000 to 1900 and 2100 in steps that fall on no period.
    fn days() -> impl Iterator<Item = f64> {
        (0..7301).map(|i| -36_525.0 + 10.007_3 * f64::from(i))
    }

    #[test]
    fn nutation_against_the_whole_series() {
        let (mut longitude, mut obliquity) = (0.0_f64, 0.0_f64);
        for d in days() {
            let (dpsi, deps) = pnp::nut80(J2000, d);
            let ours = nutation(Tt::from_days_j2000(d));
            longitude = longitude.max((ours.longitude_deg - dpsi.to_degrees()).abs() * 3600.0);
            obliquity = obliquity.max((ours.obliquity_deg - deps.to_degrees()).abs() * 3600.0);
        }
        println!("worst: longitude {longitude:.3}\", obliquity {obliquity:.3}\"");
        assert!(longitude < 0.5 && obliquity < 0.15);
    }

    #[test]
    fn sidereal_time_and_obliquity_against_later_standards() {
        let (mut mean, mut sidereal, mut obliquity) = (0.0_f64, 0.0_f64, 0.0_f64);
        for d in days() {
            let (ut1, tt) = (Ut1::from_days_j2000(d), Tt::from_days_j2000(d));
            let nutation = nutation(tt);
            let ours = apparent_sidereal_time_deg(ut1, nutation, mean_obliquity_deg(tt) + nutation.obliquity_deg);
            let theirs = erst::gst06a(J2000, d, J2000, d).to_degrees();
            sidereal = sidereal.max(crate::angle::wrap_180_deg(ours - theirs).abs() * 3600.0);
            let their_mean = erst::gmst06(J2000, d, J2000, d).to_degrees();
            mean = mean.max(crate::angle::wrap_180_deg(mean_sidereal_time_deg(ut1) - their_mean).abs() * 3600.0);
            obliquity = obliquity.max((mean_obliquity_deg(tt) - pnp::obl06(J2000, d).to_degrees()).abs() * 3600.0);
        }
        println!("worst: mean sidereal time {mean:.3}\", apparent {sidereal:.3}\", mean obliquity {obliquity:.3}\"");
        assert!(mean < 0.3 && sidereal < 0.7 && obliquity < 0.1);
    }
}
