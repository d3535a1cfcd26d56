//! Minute by minute about the instant on the horizon: what a bearing taken early or late would show.

use super::{Horizontal, Limb, SUN_DIAMETER_DEG, height_above_visible_horizon_deg, horizontal};
use crate::angle::{Position, wrap_180_deg};
use crate::error::NoAnswer;
use crate::sky::{self, Body};
use crate::time::UtcInstant;

/// One minute of the ladder.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Rung {
    /// The instant, a whole minute.
    pub utc: UtcInstant,
    /// The body then.
    pub seen: Horizontal,
    /// Height of the limb that is watched above the visible horizon, sun's diameters; negative below it.
    pub limb_diameters: f64,
    /// What the error found would be out by, were the bearing read then and worked as if the body were on its horizon:
    /// azimuth of the amplitude - azimuth then, degrees, east +.
    pub error_deg: f64,
}

/// The limb that is watched against the visible horizon: the sun's lower, the moon's upper, the whole of a star or planet.
pub fn watched_limb(body: Body) -> Limb {
    match body {
        Body::Sun => Limb::Lower,
        Body::Moon => Limb::Upper,
        Body::Planet(_) | Body::Star(_) => Limb::Centre,
    }
}

/// How high the watched limb stands above the visible horizon, sun's diameters, for a height of eye in metres.
pub fn limb_diameters(body: Body, utc: UtcInstant, at: Position, eye_height_m: f64) -> f64 {
    let place = sky::apparent_place(body, utc);
    let altitude_deg = super::altitude_deg(&place, at);
    height_above_visible_horizon_deg(altitude_deg, place.semidiameter_deg, watched_limb(body), eye_height_m) / SUN_DIAMETER_DEG
}

/// Each whole minute for `minutes` either side of `about`, the instant when the body is on its horizon, bearing `azimuth_deg`.
///
/// # Errors
/// As [`horizontal`]; an instant beyond the years answered.
pub fn ladder(
    body: Body,
    at: Position,
    about: UtcInstant,
    azimuth_deg: f64,
    eye_height_m: f64,
    minutes: u16,
) -> Result<Vec<Rung>, NoAnswer> {
    const MINUTE_MS: i64 = 60_000;
    let middle_ms = (about.unix_ms() + MINUTE_MS / 2).div_euclid(MINUTE_MS) * MINUTE_MS;
    (-i64::from(minutes)..=i64::from(minutes))
        .map(|minute| {
            let utc = UtcInstant::from_unix_ms(middle_ms + minute * MINUTE_MS)?;
            let seen = horizontal(&sky::apparent_place(body, utc), at)?;
            let limb_diameters = limb_diameters(body, utc, at, eye_height_m);
            Ok(Rung { utc, seen, limb_diameters, error_deg: wrap_180_deg(azimuth_deg - seen.azimuth.deg()) })
        })
        .collect()
}
