//! Venus, Mars, Jupiter and Saturn.

use super::body::Planet;
use super::frame::{self, LIGHT_AU_PER_DAY, Vector};
use crate::time::Tt;
use vsop87::vsop87e;

/// From the solar system's centre of mass, astronomical units, equator of J2000.0.
fn from_barycentre(planet: Planet, days: f64) -> Vector {
    let series = match planet {
        Planet::Venus => vsop87e::venus,
        Planet::Mars => vsop87e::mars,
        Planet::Jupiter => vsop87e::jupiter,
        Planet::Saturn => vsop87e::saturn,
    };
    frame::from_barycentre(series, days)
}

/// The planet from the earth's centre as it appears: astronomical units, true equator and equinox of date; light time and
/// aberration allowed for. The disc's lit side is not: at most 10" of Venus.
pub(super) fn apparent(planet: Planet, tt: Tt) -> Vector {
    let days = tt.days_j2000();
    let earth = frame::earth(tt);
    let seen_at = |light_days: f64| frame::sum([(1.0, from_barycentre(planet, days - light_days)), (-1.0, earth.from_barycentre)]);
    // Two rounds settle the light time.
    let once = frame::length(seen_at(0.0)) / LIGHT_AU_PER_DAY;
    let twice = frame::length(seen_at(once)) / LIGHT_AU_PER_DAY;
    let direction = frame::aberrated(seen_at(twice), earth.velocity);
    frame::turned(&frame::to_equator_of_date(tt), direction)
}
