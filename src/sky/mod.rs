//! Where a body is, as seen from the centre of the earth.

mod body;
pub mod earth;
mod frame;
mod moon;
mod place;
mod planets;
mod segments;
mod stars;
pub mod sun;

pub use body::{Body, Planet};
pub use earth::aries_gha_deg;
pub use place::apparent_place;
pub use stars::Star;

/// The direction of a body's centre as seen from the centre of the earth: apparent place, true equator and equinox of date.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ApparentPlace {
    /// Greenwich hour angle, degrees, `0 <= x < 360`, westward.
    pub gha_deg: f64,
    /// Declination, degrees, north +.
    pub declination_deg: f64,
    /// Equatorial horizontal parallax, degrees; 0 for a star.
    pub horizontal_parallax_deg: f64,
    /// Apparent semidiameter, degrees; 0 for a star or a planet.
    pub semidiameter_deg: f64,
}
