//! Where the ship is.

use super::degrees::wrap_180_deg;

/// Geodetic latitude, WGS 84: degrees, `-90..=90`, north +.
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct Latitude(f64);

impl Latitude {
    /// `deg` degrees, north +; `None` outside `-90..=90`.
    pub fn from_deg(deg: f64) -> Option<Self> {
        (-90.0..=90.0).contains(&deg).then_some(Self(deg + 0.0))
    }

    /// Degrees, north +.
    pub fn deg(self) -> f64 {
        self.0
    }
}

/// Longitude, WGS 84: degrees, `-180 < x <= 180`, east +.
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct Longitude(f64);

impl Longitude {
    /// `deg` degrees, east +; `None` outside `-180..=180`. -180 is kept as 180.
    pub fn from_deg(deg: f64) -> Option<Self> {
        (-180.0..=180.0).contains(&deg).then(|| Self::wrapping_deg(deg))
    }

    /// `deg` degrees, east +, brought into `-180 < x <= 180`. `deg` is finite.
    pub fn wrapping_deg(deg: f64) -> Self {
        Self(wrap_180_deg(deg))
    }

    /// Degrees, east +.
    pub fn deg(self) -> f64 {
        self.0
    }
}

/// A place on the sea: latitude and longitude.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Position {
    /// Latitude, north +.
    pub lat: Latitude,
    /// Longitude, east +.
    pub lon: Longitude,
}

impl Position {
    /// From degrees, north + and east +; `None` where either is out of range.
    pub fn from_deg(lat_deg: f64, lon_deg: f64) -> Option<Self> {
        Some(Self { lat: Latitude::from_deg(lat_deg)?, lon: Longitude::from_deg(lon_deg)? })
    }
}
