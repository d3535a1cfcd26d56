//! The apparent place of any body.

use super::body::{Body, Planet};
use super::earth::{apparent_sidereal_time_deg, mean_obliquity_deg, nutation};
use super::frame::{self, Frame, Vector};
use super::segments::Segments;
use super::stars::Star;
use super::{ApparentPlace, moon, planets, sun};
use crate::angle::wrap_360_deg;
use crate::time::{Tt, UtcInstant};

/// Kilometres in an astronomical unit (IAU 2012), and the earth's equatorial radius, kilometres (WGS 84).
const AU_KM: f64 = 149_597_870.7;
const EARTH_RADIUS_KM: f64 = 6378.137;
/// The moon's radius in radii of the earth's equator (IAU, for the almanacs' semidiameter).
const MOON_RADIUS: f64 = 0.272_507_6;

static MOON: Segments<3, 10> = Segments::new(1.0, |days| moon::apparent(days, &Frame::at(days)));
static VENUS: Segments<3, 10> = Segments::new(8.0, |days| planets::apparent(Planet::Venus, days, &Frame::at(days)));
static MARS: Segments<3, 10> = Segments::new(8.0, |days| planets::apparent(Planet::Mars, days, &Frame::at(days)));
static JUPITER: Segments<3, 10> = Segments::new(8.0, |days| planets::apparent(Planet::Jupiter, days, &Frame::at(days)));
static SATURN: Segments<3, 10> = Segments::new(8.0, |days| planets::apparent(Planet::Saturn, days, &Frame::at(days)));

/// The direction of a body's centre from the earth's centre: apparent place, true equator and equinox of date.
///
/// Error bound: the sun's is that of [`sun::apparent_place`]; for the others azimuth within 0.02 degrees of JPL DE421 for altitudes
/// -1 to 60, 1990-2050, UTC taken as UT1 in both (test `published::jpl_bodies`, which prints what it measures).
///
/// Outside those years, to 1900 and to 2100, the planets are held to a rougher theory (test `planets_throughout_against_another_theory`).
///
/// Source: precession and nutation by routines of the SOFA collection (IAU 2006/2000B); the moon by the series of Meeus after
/// Chapront there; earth and planets by VSOP87; stars by the Hipparcos catalogue, new reduction.
///
/// # Example
/// ```
/// use shadowpin::sky::{self, Body};
/// use shadowpin::time::text::read_utc;
/// let vega = sky::apparent_place(Body::from_name("vega")?, read_utc("2026-06-14T06:12:00Z")?.utc);
/// assert!((vega.declination_deg - 38.81).abs() < 0.01);
/// # Ok::<(), shadowpin::error::BadValue>(())
/// ```
pub fn apparent_place(body: Body, utc: UtcInstant) -> ApparentPlace {
    let days = Tt::from(utc.ut1()).days_j2000();
    let seen = match body {
        Body::Sun => return sun::apparent_place(utc),
        Body::Moon => MOON.at(days),
        Body::Planet(Planet::Venus) => VENUS.at(days),
        Body::Planet(Planet::Mars) => MARS.at(days),
        Body::Planet(Planet::Jupiter) => JUPITER.at(days),
        Body::Planet(Planet::Saturn) => SATURN.at(days),
        Body::Star(star) => return at_infinity(direction_of(star, days, &Frame::at(days)), utc),
    };
    let distance_au = frame::length(seen);
    let sin_parallax = EARTH_RADIUS_KM / AU_KM / distance_au;
    let semidiameter_deg = if body == Body::Moon { (MOON_RADIUS * sin_parallax).asin().to_degrees() } else { 0.0 };
    ApparentPlace { horizontal_parallax_deg: sin_parallax.asin().to_degrees(), semidiameter_deg, ..at_infinity(seen, utc) }
}

/// A star's direction on the true equator and equinox of date.
fn direction_of(star: Star, days: f64, frame: &Frame) -> Vector {
    frame::turned(&frame.to_equator, frame::aberrated(star.direction(days / 365.25, frame.earth), frame.velocity))
}

/// GHA and declination of a direction on the true equator and equinox of date.
fn at_infinity([x, y, z]: Vector, utc: UtcInstant) -> ApparentPlace {
    let ut1 = utc.ut1();
    let tt = Tt::from(ut1);
    let nutation = nutation(tt);
    let obliquity_deg = mean_obliquity_deg(tt) + nutation.obliquity_deg;
    let right_ascension_deg = y.atan2(x).to_degrees();
    ApparentPlace {
        gha_deg: wrap_360_deg(apparent_sidereal_time_deg(ut1, nutation, obliquity_deg) - right_ascension_deg),
        declination_deg: z.atan2(x.hypot(y)).to_degrees(),
        horizontal_parallax_deg: 0.0,
        semidiameter_deg: 0.0,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The polynomials against what they are fitted to, at places between their nodes and at their seams: 0.01" of direction.
    #[test]
    fn segments_follow_their_series() {
        let apart = |a: Vector, b: Vector| {
            let cross = [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
            (frame::length(cross) / frame::length(a) / frame::length(b)).to_degrees() * 3600.0
        };
        let (mut worst_moon, mut worst_planet, mut worst_star) = (0.0_f64, 0.0_f64, 0.0_f64);
        for step in 0..400 {
            let days = -36_500.0 + f64::from(step) * 183.437;
            let fresh = Frame::fresh(days);
            worst_moon = worst_moon.max(apart(MOON.at(days), moon::apparent(days, &fresh)));
            for (planet, segments) in
                [(Planet::Venus, &VENUS), (Planet::Mars, &MARS), (Planet::Jupiter, &JUPITER), (Planet::Saturn, &SATURN)]
            {
                worst_planet = worst_planet.max(apart(segments.at(days), planets::apparent(planet, days, &fresh)));
            }
            for star in Star::all().take(5) {
                let exact = direction_of(star, days, &fresh);
                worst_star = worst_star.max(apart(direction_of(star, days, &Frame::at(days)), exact));
            }
        }
        println!("moon {worst_moon:.5}\", planets {worst_planet:.5}\", stars {worst_star:.5}\"");
        assert!(worst_moon < 0.01 && worst_planet < 0.01 && worst_star < 0.01);
    }

    /// The planets against another theory, rougher but good for a thousand years: they must be right from the first instant that
    /// is answered to the last. Its own error is 0.08 degrees on the sky at most, Saturn's; its earth is the earth and moon's
    /// common centre, 0.006 degrees of Venus at her nearest; 0.006 more are aberration, left out here.
    #[test]
    fn planets_throughout_against_another_theory() {
        let (first, last) = (-2_208_988_800_000, 4_133_980_799_999);
        let ends = (0..200).flat_map(|step| [first + step * 7_000_000, last - step * 158_000_000]);
        let between = (0..=150).map(|i| first + (last - first) / 150 * i);
        let mut worst = [0.0_f64; 4];
        for unix_ms in ends.chain(between) {
            let utc = UtcInstant::from_unix_ms(unix_ms).unwrap();
            let days = Tt::from(utc.ut1()).days_j2000();
            let earth = sofars::eph::plan94(frame::J2000, days, 3).unwrap().0[0];
            for ((planet, number), worst) in Planet::ALL.into_iter().zip([2, 4, 5, 6]).zip(&mut worst) {
                let at = |days: f64| sofars::eph::plan94(frame::J2000, days, number).unwrap().0[0];
                let light_days = frame::length(frame::sum([(1.0, at(days)), (-1.0, earth)])) / frame::LIGHT_AU_PER_DAY;
                let theirs = frame::sum([(1.0, at(days - light_days)), (-1.0, earth)]);
                let theirs = at_infinity(frame::turned(&Frame::at(days).to_equator, theirs), utc);
                let ours = apparent_place(Body::Planet(planet), utc);
                let across = crate::angle::wrap_180_deg(ours.gha_deg - theirs.gha_deg) * ours.declination_deg.to_radians().cos();
                let apart = across.hypot(ours.declination_deg - theirs.declination_deg);
                assert!(apart < 0.1, "{planet:?} at {}: {apart} degrees", utc.to_chrono());
                *worst = worst.max(apart);
            }
        }
        println!("Venus, Mars, Jupiter, Saturn against plan94: {worst:.4?} degrees");
    }

    /// Every body has a finite place at both ends of the years answered and between.
    #[test]
    fn every_body_throughout() {
        let (first, last) = (-2_208_988_800_000, 4_133_980_799_999);
        for i in 0..=500 {
            let utc = UtcInstant::from_unix_ms(first + (last - first) / 500 * i).unwrap();
            for body in Body::all() {
                let place = apparent_place(body, utc);
                assert!((0.0..360.0).contains(&place.gha_deg), "{} {place:?}", body.name());
                assert!((-90.0..=90.0).contains(&place.declination_deg), "{} {place:?}", body.name());
                assert!((0.0..1.1).contains(&place.horizontal_parallax_deg) && (0.0..0.3).contains(&place.semidiameter_deg));
            }
        }
    }
}
