//! Venus, Mars, Jupiter and Saturn.

use super::body::Planet;
use super::frame::{self, Frame, LIGHT_AU_PER_DAY, Vector};
use super::segments::Segments;
use vsop87::vsop87e;

/// From the solar system's centre of mass, astronomical units, equator of J2000.0.
static VENUS: Segments<3, 12> = Segments::new(32.0, |days| frame::from_barycentre(vsop87e::venus, days));
static MARS: Segments<3, 12> = Segments::new(32.0, |days| frame::from_barycentre(vsop87e::mars, days));
static JUPITER: Segments<3, 12> = Segments::new(64.0, |days| frame::from_barycentre(vsop87e::jupiter, days));
static SATURN: Segments<3, 12> = Segments::new(64.0, |days| frame::from_barycentre(vsop87e::saturn, days));

/// The planet from the earth's centre as it appears at `days` of TT from J2000.0: astronomical units, true equator and equinox of date;
/// light time and aberration allowed for. The disc's lit side is not: at most 10" of Venus.
pub(super) fn apparent(planet: Planet, days: f64, frame: &Frame) -> Vector {
    let track = match planet {
        Planet::Venus => &VENUS,
        Planet::Mars => &MARS,
        Planet::Jupiter => &JUPITER,
        Planet::Saturn => &SATURN,
    };
    let seen_at = |light_days: f64| frame::sum([(1.0, track.at(days - light_days)), (-1.0, frame.earth)]);
    // Two rounds settle the light time.
    let once = frame::length(seen_at(0.0)) / LIGHT_AU_PER_DAY;
    let twice = frame::length(seen_at(once)) / LIGHT_AU_PER_DAY;
    frame::turned(&frame.to_equator, frame::aberrated(seen_at(twice), frame.velocity))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The tracks against their series, at places that are no nodes. Venus at her nearest, 0.26 au: 2e-9 au are 0.002".
    #[test]
    fn tracks_follow_their_series() {
        for (name, track, series) in [
            ("Venus", &VENUS, vsop87e::venus as fn(f64) -> _),
            ("Mars", &MARS, vsop87e::mars),
            ("Jupiter", &JUPITER, vsop87e::jupiter),
            ("Saturn", &SATURN, vsop87e::saturn),
        ] {
            let worst = (0..60)
                .map(|step| -36_520.0 + f64::from(step) * 1_237.73)
                .map(|days| frame::length(frame::sum([(1.0, track.at(days)), (-1.0, frame::from_barycentre(series, days))])))
                .fold(0.0, f64::max);
            println!("{name}: {worst:.1e} au");
            assert!(worst < 2e-9, "{name}");
        }
    }
}
