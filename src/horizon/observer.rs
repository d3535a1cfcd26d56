//! A body's direction turned into the observer's own: by vectors, on the ellipsoid.

use super::has_azimuth;
use crate::angle::{Longitude, Position, TrueBearing, wrap_360_deg};
use crate::error::NoAnswer;
use crate::sky::ApparentPlace;

/// Flattening of the WGS 84 ellipsoid.
const FLATTENING: f64 = 1.0 / 298.257_223_563;
/// Square of its eccentricity.
const ECCENTRICITY_2: f64 = FLATTENING * (2.0 - FLATTENING);

/// Where a body stands for an observer at sea level: topocentric, no refraction.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Horizontal {
    /// True direction of the body.
    pub azimuth: TrueBearing,
    /// Altitude of its centre above the horizontal plane, degrees, up +.
    pub altitude_deg: f64,
}

/// Altitude and azimuth of a body's centre, topocentric, no refraction.
///
/// Parallax is that of the WGS 84 ellipsoid, the zenith the geodetic one, so the moon's azimuth is right too: it differs from
/// the geocentric one by up to 0.003 degrees / cos(altitude).
/// Error bound: that of `place`; the turning itself is good to 1e-12 degrees times 1/cos(altitude). A second method agrees
/// to 1e-9 degrees (test `triangle::tests::two_methods_agree`).
///
/// # Errors
/// [`NoAnswer::Pole`] within [`POLE_DEG`](super::POLE_DEG) of a pole, [`NoAnswer::Zenith`] within
/// [`ZENITH_DEG`](super::ZENITH_DEG) of the zenith or the nadir.
///
/// # Example
/// ```
/// use shadowpin::{angle::Position, horizon::horizontal, sky::sun, time::UtcInstant};
/// let utc = UtcInstant::from_unix_ms(1_216_526_772_000)?; // 2008-07-20 04:06:12 UTC
/// let here = Position::from_deg(44.0 + 31.0 / 60.0, 69.7).ok_or("no such place")?;
/// let seen = horizontal(&sun::apparent_place(utc), here)?;
/// assert_eq!(format!("{:.1} {:.1}", seen.azimuth.deg(), seen.altitude_deg), "103.1 42.3");
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub fn horizontal(place: &ApparentPlace, position: Position) -> Result<Horizontal, NoAnswer> {
    let seen = Local::new(place, position);
    let altitude_deg = seen.altitude_deg();
    has_azimuth(position.lat.deg(), altitude_deg)?;
    Ok(Horizontal { azimuth: TrueBearing::wrapping_deg(seen.east.atan2(seen.north).to_degrees()), altitude_deg })
}

/// Topocentric altitude alone, degrees, up +; defined at the poles and in the zenith too.
pub fn altitude_deg(place: &ApparentPlace, position: Position) -> f64 {
    Local::new(place, position).altitude_deg()
}

/// Altitude of the body's direction as seen from the earth's centre above the plane square to the observer's geodetic
/// zenith, degrees, up +: 0 on the celestial horizon.
pub fn geocentric_altitude_deg(place: &ApparentPlace, position: Position) -> f64 {
    Local::new(&ApparentPlace { horizontal_parallax_deg: 0.0, ..*place }, position).altitude_deg()
}

/// Local hour angle, degrees, `0 <= x < 360`, westward: GHA + east longitude.
pub fn lha_deg(place: &ApparentPlace, longitude: Longitude) -> f64 {
    wrap_360_deg(place.gha_deg + longitude.deg())
}

/// Sines, cosines and the geometry of one observer and one body; lengths in distances to the body.
pub(super) struct Local {
    pub sin_lat: f64,
    pub cos_lat: f64,
    pub sin_dec: f64,
    pub cos_dec: f64,
    pub sin_lha: f64,
    pub cos_lha: f64,
    /// The meridian's radius of curvature.
    pub meridian_radius: f64,
    /// The body from the observer.
    pub east: f64,
    pub north: f64,
    pub up: f64,
}

impl Local {
    pub fn new(place: &ApparentPlace, position: Position) -> Self {
        let (sin_lat, cos_lat) = position.lat.deg().to_radians().sin_cos();
        let (sin_dec, cos_dec) = place.declination_deg.to_radians().sin_cos();
        let (sin_lha, cos_lha) = (place.gha_deg + position.lon.deg()).to_radians().sin_cos();
        // The earth's equatorial radius, then the observer's distance from the axis and height above the equator's plane.
        let radius = place.horizontal_parallax_deg.to_radians().sin();
        let shape = 1.0 - ECCENTRICITY_2 * sin_lat * sin_lat;
        let prime_vertical = radius / shape.sqrt();
        let from_axis = prime_vertical * cos_lat;
        let from_equator = prime_vertical * (1.0 - ECCENTRICITY_2) * sin_lat;

        let outward = cos_dec * cos_lha - from_axis;
        let polar = sin_dec - from_equator;
        Self {
            sin_lat,
            cos_lat,
            sin_dec,
            cos_dec,
            sin_lha,
            cos_lha,
            meridian_radius: prime_vertical * (1.0 - ECCENTRICITY_2) / shape,
            east: -cos_dec * sin_lha,
            north: cos_lat * polar - sin_lat * outward,
            up: cos_lat * outward + sin_lat * polar,
        }
    }

    pub fn altitude_deg(&self) -> f64 {
        self.up.atan2(self.east.hypot(self.north)).to_degrees()
    }
}
