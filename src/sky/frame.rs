//! What every body but the sun needs for one instant: the earth's place and motion, and the turn to the equator of date.

use crate::time::Tt;
use sofars::{eph, pnp};

/// A vector in a frame that its context names.
pub(super) type Vector = [f64; 3];

/// Julian date of J2000.0.
pub(super) const J2000: f64 = 2_451_545.0;
/// Speed of light, astronomical units a day (IAU 2009/2012 system of constants).
pub(super) const LIGHT_AU_PER_DAY: f64 = 173.144_632_674;

/// A sum of vectors, each with its factor.
pub(super) fn sum<const N: usize>(terms: [(f64, Vector); N]) -> Vector {
    terms.iter().fold([0.0; 3], |total, (factor, v)| [total[0] + factor * v[0], total[1] + factor * v[1], total[2] + factor * v[2]])
}

/// Length of a vector.
pub(super) fn length(v: Vector) -> f64 {
    (v[0] * v[0] + v[1] * v[1] + v[2] * v[2]).sqrt()
}

/// A vector turned by a matrix.
pub(super) fn turned(m: &[Vector; 3], v: Vector) -> Vector {
    m.map(|row| row[0] * v[0] + row[1] * v[1] + row[2] * v[2])
}

/// The earth, in astronomical units and astronomical units a day, axes of the ICRS.
#[derive(Debug, Clone, Copy)]
pub(super) struct Earth {
    /// From the sun.
    pub from_sun: Vector,
    /// From the solar system's centre of mass.
    pub from_barycentre: Vector,
    /// Its motion about the centre of mass.
    pub velocity: Vector,
}

/// The earth by the series of Simon et al. and Harada and Fukushima.
///
/// Error bound: 11 km in position from the sun, 1900-2100 (documentation of the SOFA routine).
pub(super) fn earth(tt: Tt) -> Earth {
    // `None` only marks a date outside 1900-2100 by more than the series is meant for; instants are inside.
    let (helio, bary) = eph::epv00(J2000, tt.days_j2000()).unwrap_or_default();
    Earth { from_sun: helio[0], from_barycentre: bary[0], velocity: bary[1] }
}

/// The matrix from ICRS axes to the true equator and equinox of date: bias, precession, nutation (IAU 2006/2000A).
pub(super) fn to_equator_of_date(tt: Tt) -> [Vector; 3] {
    pnp::pnm06a(J2000, tt.days_j2000())
}

/// A direction as it appears from the moving earth: aberration to first order in v/c (what is left out is under 0.001").
pub(super) fn aberrated(direction: Vector, earth_velocity: Vector) -> Vector {
    sum([(1.0, direction), (length(direction) / LIGHT_AU_PER_DAY, earth_velocity)])
}
