//! The moon.

use super::frame::{self, J2000, LIGHT_AU_PER_DAY, Vector};
use crate::time::Tt;
use sofars::eph;

/// The moon from the earth's centre as it appears: astronomical units, true equator and equinox of date.
///
/// Light time is allowed for. Aberration is not: moon and earth share their motion about the sun, and the light's 1.3 s of it is
/// the aberration itself.
///
/// Error bound: the truncated series of Meeus after Chapront, some 10" (documentation of the SOFA routine).
pub(super) fn apparent(tt: Tt) -> Vector {
    let at = |days: f64| eph::moon98(J2000, days)[0];
    let days = tt.days_j2000();
    let light_days = frame::length(at(days)) / LIGHT_AU_PER_DAY;
    frame::turned(&frame::to_equator_of_date(tt), at(days - light_days))
}
