//! Venus, Mars, Jupiter and Saturn.

use super::body::Planet;
use super::frame::{self, J2000, LIGHT_AU_PER_DAY, Vector};
use crate::time::Tt;
use vsop87::{RectangularCoordinates, vsop87a};

/// From the dynamical ecliptic and equinox of VSOP87A to the equator of FK5, J2000.0 (which is within 0.03" of the ICRS).
///
/// Source: P. Bretagnon and G. Francou, the notes that come with VSOP87 (from memory; held by the JPL rows).
const ECLIPTIC_TO_EQUATOR: [Vector; 3] = [
    [1.0, 0.000_000_440_360, -0.000_000_190_919],
    [-0.000_000_479_966, 0.917_482_137_087, -0.397_776_982_902],
    [0.0, 0.397_776_982_902, 0.917_482_137_087],
];

/// Heliocentric place, astronomical units, equator of J2000.0.
fn from_sun(planet: Planet, days: f64) -> Vector {
    let jde = J2000 + days;
    let RectangularCoordinates { x, y, z } = match planet {
        Planet::Venus => vsop87a::venus(jde),
        Planet::Mars => vsop87a::mars(jde),
        Planet::Jupiter => vsop87a::jupiter(jde),
        Planet::Saturn => vsop87a::saturn(jde),
    };
    frame::turned(&ECLIPTIC_TO_EQUATOR, [x, y, z])
}

/// The planet from the earth's centre as it appears: astronomical units, true equator and equinox of date; light time and
/// aberration allowed for. The disc's lit side is not: at most 10" of Venus.
pub(super) fn apparent(planet: Planet, tt: Tt) -> Vector {
    let days = tt.days_j2000();
    let earth = frame::earth(tt);
    let seen_at = |light_days: f64| frame::sum([(1.0, from_sun(planet, days - light_days)), (-1.0, earth.from_sun)]);
    // The sun moves under 0.01 a second of light: its own motion in the light time is left out. Two rounds settle the time.
    let once = frame::length(seen_at(0.0)) / LIGHT_AU_PER_DAY;
    let twice = frame::length(seen_at(once)) / LIGHT_AU_PER_DAY;
    let direction = frame::aberrated(seen_at(twice), earth.velocity);
    frame::turned(&frame::to_equator_of_date(tt), direction)
}
