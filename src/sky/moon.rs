//! The moon.

use super::frame::{self, Frame, J2000, LIGHT_AU_PER_DAY, Vector};
use sofars::eph;

/// The moon from the earth's centre as it appears at `days` of TT from J2000.0: astronomical units, true equator and equinox of date.
///
/// Light time is allowed for. Aberration is not: moon and earth share their motion about the sun, and the light's 1.3 s of it is
/// the aberration itself.
///
/// Error bound: the truncated series of Meeus after Chapront, some 10" (documentation of the SOFA routine).
pub(super) fn apparent(days: f64, frame: &Frame) -> Vector {
    let [place, velocity] = eph::moon98(J2000, days);
    let light_days = frame::length(place) / LIGHT_AU_PER_DAY;
    frame::turned(&frame.to_equator, frame::sum([(1.0, place), (-light_days, velocity)]))
}
