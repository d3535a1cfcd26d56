//! Where the ship will be.

use crate::angle::{Latitude, Longitude, Position, TrueBearing};
use crate::time::UtcInstant;

/// A ship that keeps course and speed, or lies still.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Track {
    /// When she is at `position`.
    pub from: UtcInstant,
    /// Where she is then.
    pub position: Position,
    /// True course.
    pub course: Option<TrueBearing>,
    /// Speed, knots; 0 for a ship that lies still.
    pub speed_kn: f64,
}

impl Track {
    /// The position at `utc` by plane sailing with the middle latitude.
    ///
    /// Error bound: a mile in a day's run below latitude 70; near a pole the ship is held at 89.9.
    /// Source: plane and middle-latitude sailing, common practice.
    pub fn at(&self, utc: UtcInstant) -> Position {
        let Some(course) = self.course else { return self.position };
        let miles = self.speed_kn * utc.seconds_since(self.from) / 3600.0;
        let (sin_course, cos_course) = course.deg().to_radians().sin_cos();
        let lat = self.position.lat.deg();
        let to = (lat + miles * cos_course / 60.0).clamp(-89.9, 89.9);
        let middle = f64::midpoint(lat, to).to_radians().cos().max(0.001);
        Position {
            lat: Latitude::from_deg(to).unwrap_or(self.position.lat),
            lon: Longitude::wrapping_deg(self.position.lon.deg() + miles * sin_course / 60.0 / middle),
        }
    }
}
