//! Which body is that?

use crate::angle::{Position, TrueBearing};
use crate::horizon::horizontal;
use crate::sky::{self, Body};
use crate::time::UtcInstant;

/// A body that could be the one sighted.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Candidate {
    /// The body.
    pub body: Body,
    /// Its azimuth.
    pub azimuth: TrueBearing,
    /// Its altitude, degrees.
    pub altitude_deg: f64,
    /// Azimuth less the bearing sighted, degrees.
    pub azimuth_off_deg: f64,
    /// Altitude less the one measured, degrees, where one was.
    pub altitude_off_deg: Option<f64>,
}

impl Candidate {
    /// How far it is from what was sighted: on the sky where the altitude is known, otherwise along the horizon, degrees.
    pub fn off_deg(&self) -> f64 {
        match self.altitude_off_deg {
            Some(altitude) => (self.azimuth_off_deg * self.altitude_deg.to_radians().cos()).hypot(altitude),
            None => self.azimuth_off_deg.abs(),
        }
    }
}

/// Every body above the horizon within `tolerance_deg` of a true bearing and, where it is given, of an altitude; the nearest first.
///
/// Which bodies: the sun, the moon, four planets, the navigational stars. A bright star that is not among them is not found, and
/// Mercury neither.
pub fn identify(at: Position, utc: UtcInstant, bearing: TrueBearing, altitude_deg: Option<f64>, tolerance_deg: f64) -> Vec<Candidate> {
    let mut found: Vec<Candidate> = Body::all()
        .filter_map(|body| {
            let seen = horizontal(&sky::apparent_place(body, utc), at).ok()?;
            Some(Candidate {
                body,
                azimuth: seen.azimuth,
                altitude_deg: seen.altitude_deg,
                azimuth_off_deg: seen.azimuth.turn_from_deg(bearing),
                altitude_off_deg: altitude_deg.map(|a| seen.altitude_deg - a),
            })
        })
        .filter(|c| c.altitude_deg > -1.0 && c.off_deg() <= tolerance_deg)
        .collect();
    found.sort_by(|a, b| a.off_deg().total_cmp(&b.off_deg()));
    found
}
