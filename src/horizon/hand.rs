//! The working an officer can check by hand with an almanac and tables: hour and increment, then A, B and C.

use crate::angle::{Position, wrap_180_deg, wrap_360_deg};
use crate::sky::{self, Body};
use crate::time::UtcInstant;

/// From the almanac's whole hour to the hour angle at the ship.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct HandWorking {
    /// The whole hour of UTC at or before the instant.
    pub hour: UtcInstant,
    /// GHA of the body, or of Aries for a star, at the whole hour, degrees.
    pub gha_at_hour_deg: f64,
    /// Increment for the minutes and seconds at the almanac's nominal rate, degrees.
    pub increment_deg: f64,
    /// What the body's own motion adds to that, degrees; signed.
    pub own_motion_deg: f64,
    /// Sidereal hour angle, degrees, for a star.
    pub sha_deg: Option<f64>,
    /// GHA at the instant, degrees.
    pub gha_deg: f64,
    /// LHA at the ship, degrees, `0 <= x < 360`, westward.
    pub lha_deg: f64,
    /// Declination, degrees, north +.
    pub declination_deg: f64,
    /// The figures of the azimuth; `None` on the meridian and at the poles, where they have no value.
    pub abc: Option<Abc>,
}

/// A, B and C, each north + and south -.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Abc {
    /// tan(latitude) / tan(meridian angle), named opposite to the latitude, the same where the meridian angle passes 90.
    pub a: f64,
    /// tan(declination) / sin(meridian angle), named as the declination.
    pub b: f64,
    /// A and B together.
    pub c: f64,
    /// Azimuth as an angle from north or south (the name of C) to east or west, degrees, 0 to 90.
    pub azimuth_angle_deg: f64,
    /// Whether that angle is counted to the west: LHA under 180.
    pub west: bool,
}

impl Abc {
    /// A, B and C for a latitude and declination (north +) and a local hour angle, degrees; `None` on the meridian and at the poles.
    ///
    /// Source: four-part formula of the spherical triangle, cut into A, B and C as in the nautical tables of that name;
    /// names by common practice.
    pub fn new(lat_deg: f64, declination_deg: f64, lha_deg: f64) -> Option<Self> {
        let meridian_angle_deg = wrap_180_deg(lha_deg);
        let t = meridian_angle_deg.abs().to_radians();
        let cos_lat = lat_deg.to_radians().cos();
        if t.sin() < 1e-9 || cos_lat < 1e-9 {
            return None;
        }
        let a = -lat_deg.to_radians().tan() / t.tan();
        let b = declination_deg.to_radians().tan() / t.sin();
        let c = a + b;
        let azimuth_angle_deg = 1.0_f64.atan2(c.abs() * cos_lat).to_degrees();
        Some(Self { a, b, c, azimuth_angle_deg, west: meridian_angle_deg > 0.0 })
    }

    /// The azimuth that the angle means, degrees, `0 <= x < 360`.
    pub fn azimuth_deg(&self) -> f64 {
        wrap_360_deg(match (self.c >= 0.0, self.west) {
            (true, false) => self.azimuth_angle_deg,
            (true, true) => 360.0 - self.azimuth_angle_deg,
            (false, false) => 180.0 - self.azimuth_angle_deg,
            (false, true) => 180.0 + self.azimuth_angle_deg,
        })
    }
}

/// The hourly rate that the almanac's increments are made with, degrees: sun and planets 15, Aries 15-02.46', moon 14-19.0'.
///
/// Source: explanation of the increments and corrections in The Nautical Almanac.
fn nominal_rate_deg_per_h(body: Body) -> f64 {
    match body {
        Body::Sun | Body::Planet(_) => 15.0,
        Body::Moon => 14.0 + 19.0 / 60.0,
        Body::Star(_) => 15.0 + 2.46 / 60.0,
    }
}

/// The working by hand for `body` at an instant and a position.
pub fn by_hand(body: Body, utc: UtcInstant, at: Position) -> HandWorking {
    const HOUR_MS: i64 = 3_600_000;
    let into_hour_ms = utc.unix_ms().rem_euclid(HOUR_MS);
    // The whole hour at or before an instant that is in range is in range too.
    let hour = UtcInstant::from_unix_ms(utc.unix_ms() - into_hour_ms).unwrap_or(utc);
    let place = sky::apparent_place(body, utc);
    let star = matches!(body, Body::Star(_));
    let (gha_at_hour_deg, end_deg) =
        if star { (sky::aries_gha_deg(hour), sky::aries_gha_deg(utc)) } else { (sky::apparent_place(body, hour).gha_deg, place.gha_deg) };
    let increment_deg = nominal_rate_deg_per_h(body) * into_hour_ms as f64 / HOUR_MS as f64;
    let lha_deg = wrap_360_deg(place.gha_deg + at.lon.deg());
    HandWorking {
        hour,
        gha_at_hour_deg,
        increment_deg,
        own_motion_deg: wrap_180_deg(end_deg - gha_at_hour_deg - increment_deg),
        sha_deg: star.then(|| wrap_360_deg(place.gha_deg - end_deg)),
        gha_deg: place.gha_deg,
        lha_deg,
        declination_deg: place.declination_deg,
        abc: Abc::new(at.lat.deg(), place.declination_deg, lha_deg),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    #[test]
    fn names_of_c_and_the_hour_angle_give_the_quadrant() {
        // (lat, dec, lha) in each quadrant, against the azimuth by the cosine formula.
        for lat in [-50.0_f64, -10.0, 10.0, 50.0] {
            for dec in [-20.0_f64, 20.0] {
                for lha in [20.0_f64, 80.0, 130.0, 230.0, 280.0, 340.0] {
                    let (l, d, h) = (lat.to_radians(), dec.to_radians(), lha.to_radians());
                    let direct = (-h.sin() * d.cos()).atan2(d.sin() * l.cos() - d.cos() * l.sin() * h.cos()).to_degrees();
                    let abc = Abc::new(lat, dec, lha).unwrap();
                    assert_abs_diff_eq!(wrap_180_deg(abc.azimuth_deg() - direct), 0.0, epsilon = 1e-9);
                }
            }
        }
        assert!(Abc::new(10.0, 20.0, 0.0).is_none());
        assert!(Abc::new(90.0, 20.0, 40.0).is_none());
    }
}
