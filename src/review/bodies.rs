//! Which bodies stood about where one would have to stand.

use super::case::Sight;
use crate::angle::wrap_180_deg;
use crate::sky::{self, Body};
use crate::time::UtcInstant;
use std::sync::OnceLock;

/// 2030-01-01: the stars' places are kept for this day.
const KEPT_MS: i64 = 1_893_456_000_000;
/// Precession, degrees a year of hour angle at the most in the latitudes of the navigational stars; Polaris is looked at always.
const DEG_PER_YEAR: f64 = 0.03;
/// How far from the direction a body may stand and still explain it, degrees of arc across: the compasses' own scatter.
const NEAR_DEG: f64 = 4.0;
/// Declination beyond which a star's hour angle says little of its azimuth.
const POLAR_DEG: f64 = 80.0;

/// A star: sidereal hour angle and declination, degrees.
struct Kept {
    body: Body,
    sha_deg: f64,
    sin_dec: f64,
    cos_dec: f64,
}

fn stars() -> &'static [Kept] {
    static STARS: OnceLock<Vec<Kept>> = OnceLock::new();
    STARS.get_or_init(|| {
        let Ok(utc) = UtcInstant::from_unix_ms(KEPT_MS) else { return Vec::new() };
        let aries = sky::aries_gha_deg(utc);
        Body::stars()
            .map(|body| {
                let place = sky::apparent_place(body, utc);
                let (sin_dec, cos_dec) = place.declination_deg.to_radians().sin_cos();
                Kept { body, sha_deg: place.gha_deg - aries, sin_dec, cos_dec }
            })
            .collect()
    })
}

/// How many bodies there are.
pub fn count() -> usize {
    static COUNT: OnceLock<usize> = OnceLock::new();
    *COUNT.get_or_init(|| Body::all().count())
}

/// The bodies that stand within a few degrees of one of these azimuths, and those that move too fast to be kept.
pub fn in_direction(sight: &Sight, azimuths: &[Option<f64>]) -> impl Iterator<Item = Body> {
    let moving = Body::all().filter(|b| !matches!(b, Body::Star(_)));
    let stars = sight.utc.zip(sight.position).map(|(utc, position)| {
        let years = (utc.unix_ms() - KEPT_MS).abs() as f64 / 3.155_76e10;
        let lha_of_aries = sky::aries_gha_deg(utc) + position.lon.deg();
        let (sin_lat, cos_lat) = position.lat.deg().to_radians().sin_cos();
        let near_deg = NEAR_DEG + years * DEG_PER_YEAR;
        stars().iter().filter(move |star| {
            let (sin_h, cos_h) = (lha_of_aries + star.sha_deg).to_radians().sin_cos();
            let (east, north) = (-star.cos_dec * sin_h, cos_lat * star.sin_dec - sin_lat * star.cos_dec * cos_h);
            let azimuth = east.atan2(north).to_degrees();
            // High up, a small error of place is a large one of azimuth.
            let near = near_deg / east.hypot(north).max(0.05);
            star.sin_dec.abs() > POLAR_DEG.to_radians().sin() || azimuths.iter().flatten().any(|z| wrap_180_deg(azimuth - z).abs() < near)
        })
    });
    moving.chain(stars.into_iter().flatten().map(|s| s.body))
}
