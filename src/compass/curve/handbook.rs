//! The handbook's rule for eight headings.

use super::{Coefficients, DeviationReading};
use crate::angle::CompassBearing;

/// How far from the cardinal and half-cardinal points a heading may be for the rule, degrees (our own).
const NEAR_DEG: f64 = 3.0;

/// Coefficients by the rule for eight headings: A the mean of all, B (E - W)/2, C (N - S)/2, D (NE - SE + SW - NW)/4, E (N - E + S - W)/4.
///
/// `None` unless each of the eight points was observed within 3 degrees; several readings at a point are averaged.
///
/// Source: Handbook of Magnetic Compass Adjustment (formerly NGA Pub. 226).
pub fn eight_headings(readings: &[DeviationReading]) -> Option<Coefficients> {
    let at = |point: f64| {
        let point = CompassBearing::wrapping_deg(point);
        let near = readings.iter().filter(|r| r.heading.turn_from_deg(point).abs() <= NEAR_DEG).map(|r| r.deviation.deg());
        let (count, sum) = near.fold((0u32, 0.0), |(count, sum), deviation| (count + 1, sum + deviation));
        (count > 0).then(|| sum / f64::from(count))
    };
    let (north, northeast, east, southeast) = (at(0.0)?, at(45.0)?, at(90.0)?, at(135.0)?);
    let (south, southwest, west, northwest) = (at(180.0)?, at(225.0)?, at(270.0)?, at(315.0)?);
    Some(Coefficients {
        a: (north + northeast + east + southeast + south + southwest + west + northwest) / 8.0,
        b: (east - west) / 2.0,
        c: (north - south) / 2.0,
        d: (northeast - southeast + southwest - northwest) / 4.0,
        e: (north - east + south - west) / 4.0,
    })
}
