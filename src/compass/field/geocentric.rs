//! Geodetic to geocentric, WGS 84.

use crate::angle::Position;

/// Equatorial radius of the WGS 84 ellipsoid, kilometres (definition).
const EQUATORIAL_RADIUS_KM: f64 = 6_378.137;
/// Flattening of the WGS 84 ellipsoid (definition).
const FLATTENING: f64 = 1.0 / 298.257_223_563;

/// A place as the field's series wants it; all latitudes geocentric.
#[derive(Debug, Clone, Copy)]
pub(super) struct Geocentric {
    pub radius_km: f64,
    pub sin_latitude: f64,
    pub cos_latitude: f64,
    pub sin_longitude: f64,
    pub cos_longitude: f64,
    /// Of geocentric less geodetic latitude.
    pub sin_tilt: f64,
    pub cos_tilt: f64,
}

impl Geocentric {
    pub(super) fn of(position: Position, height_km: f64) -> Self {
        let (sin, cos) = position.lat.deg().to_radians().sin_cos();
        // The cosine of 90 degrees in binary is 6e-17; the pole is exact here.
        let cos = if position.lat.deg().abs() == 90.0 { 0.0 } else { cos };
        let (sin_longitude, cos_longitude) = position.lon.deg().to_radians().sin_cos();
        let eccentricity_squared = FLATTENING * (2.0 - FLATTENING);
        let normal_km = EQUATORIAL_RADIUS_KM / (1.0 - eccentricity_squared * sin * sin).sqrt();
        let outward_km = (normal_km + height_km) * cos;
        let northward_km = (normal_km * (1.0 - eccentricity_squared) + height_km) * sin;
        let radius_km = (outward_km * outward_km + northward_km * northward_km).sqrt();
        let (sin_latitude, cos_latitude) = (northward_km / radius_km, outward_km / radius_km);
        Self {
            radius_km,
            sin_latitude,
            cos_latitude,
            sin_longitude,
            cos_longitude,
            sin_tilt: sin_latitude * cos - cos_latitude * sin,
            cos_tilt: cos_latitude * cos + sin_latitude * sin,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_ellipsoid_has_its_known_radii_and_its_steepest_tilt_at_45() {
        let of = |lat| Geocentric::of(Position::from_deg(lat, 0.0).unwrap(), 0.0);
        assert!((of(0.0).radius_km - 6_378.137).abs() < 1e-9);
        // Polar radius: 6356.752314 km, WGS 84 (derived constant of the definition).
        assert!((of(90.0).radius_km - 6_356.752_314).abs() < 1e-6);
        // 11.5' at 45 degrees (from memory).
        assert!((of(45.0).sin_tilt.asin().to_degrees() * 60.0 + 11.5).abs() < 0.05);
        assert_eq!(of(-90.0).cos_latitude, 0.0);
    }
}
