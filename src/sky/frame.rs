//! What every body but the sun needs for one instant: the earth's place and motion, and the turn to the equator of date.

use super::segments::Segments;
use sofars::pnp;
use vsop87::{RectangularCoordinates, vsop87e};

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

/// From the dynamical ecliptic and equinox of VSOP87 to the equator of FK5, J2000.0 (which is within 0.03" of the ICRS).
///
/// Source: P. Bretagnon and G. Francou, the notes that come with VSOP87 (from memory; held by the JPL rows).
const ECLIPTIC_TO_EQUATOR: [Vector; 3] = [
    [1.0, 0.000_000_440_360, -0.000_000_190_919],
    [-0.000_000_479_966, 0.917_482_137_087, -0.397_776_982_902],
    [0.0, 0.397_776_982_902, 0.917_482_137_087],
];

/// A place as the series of VSOP87E gives it, on the axes of the equator of J2000.0: astronomical units from the solar system's
/// centre of mass, at `days` of TT from J2000.0.
pub(super) fn from_barycentre(series: fn(f64) -> RectangularCoordinates, days: f64) -> Vector {
    let RectangularCoordinates { x, y, z } = series(J2000 + days);
    turned(&ECLIPTIC_TO_EQUATOR, [x, y, z])
}

/// The earth from the solar system's centre of mass, by VSOP87E, which unlike shorter series has no edge in the years that are answered.
static EARTH: Segments<3, 14> = Segments::new(32.0, |days| from_barycentre(vsop87e::earth, days));
/// What a [`Frame`] holds, number by number.
static FRAME: Segments<15, 10> = Segments::new(8.0, |days| Frame::fresh(days).numbers());

/// The earth and its equator at one instant, axes of the equator of J2000.0.
#[derive(Debug, Clone, Copy)]
pub(super) struct Frame {
    /// The earth from the solar system's centre of mass, astronomical units.
    pub earth: Vector,
    /// Its motion about that centre, astronomical units a day.
    pub velocity: Vector,
    /// The matrix from ICRS axes to the true equator and equinox of date: bias, precession, nutation.
    pub to_equator: [Vector; 3],
}

impl Frame {
    /// The frame at `days` of TT from J2000.0.
    ///
    /// Error bound, 1900-2100: 2e-7 of an astronomical unit from the sun and 0.0001" of aberration, against the ephemeris of Simon et al.
    /// and Harada and Fukushima (test `earth_against_another_ephemeris`); axes 0.005" against the whole IAU 2006/2000A matrix (test
    /// `equator_against_the_whole_nutation`). The centre of mass itself is 1e-5 away from the other ephemeris: no matter, since
    /// planets are taken from the same centre and stars are far.
    pub fn at(days: f64) -> Self {
        Self::from_numbers(FRAME.at(days))
    }

    /// The frame by its series, slowly.
    pub fn fresh(days: f64) -> Self {
        // Half the step of the difference that gives the velocity, days: the curve of the orbit costs 1e-7 of it.
        const HALF_STEP: f64 = 0.05;
        Self {
            earth: EARTH.at(days),
            velocity: sum([(0.5 / HALF_STEP, EARTH.at(days + HALF_STEP)), (-0.5 / HALF_STEP, EARTH.at(days - HALF_STEP))]),
            to_equator: to_equator_of_date(days),
        }
    }

    fn numbers(self) -> [f64; 15] {
        let [r1, r2, r3] = self.to_equator;
        let vectors = [self.earth, self.velocity, r1, r2, r3];
        std::array::from_fn(|i| vectors[i / 3][i % 3])
    }

    fn from_numbers([ex, ey, ez, vx, vy, vz, a, b, c, d, e, f, g, h, i]: [f64; 15]) -> Self {
        Self { earth: [ex, ey, ez], velocity: [vx, vy, vz], to_equator: [[a, b, c], [d, e, f], [g, h, i]] }
    }
}

/// The matrix from ICRS axes to the true equator and equinox of date: bias and precession of IAU 2006, nutation by the 77 terms of
/// IAU 2000B, a twentieth of the work of 2000A.
fn to_equator_of_date(days: f64) -> [Vector; 3] {
    let (gamma_bar, phi_bar, psi_bar, mean_obliquity) = pnp::pfw06(J2000, days);
    let (longitude, obliquity) = pnp::nut00b(J2000, days);
    pnp::fw2m(gamma_bar, phi_bar, psi_bar + longitude, mean_obliquity + obliquity)
}

/// A direction as it appears from the moving earth: aberration to first order in v/c (what is left out is under 0.001").
pub(super) fn aberrated(direction: Vector, earth_velocity: Vector) -> Vector {
    sum([(1.0, direction), (length(direction) / LIGHT_AU_PER_DAY, earth_velocity)])
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Days from J2000.0 over 1900-2100, to the very edges of the other ephemeris, in steps that fall on no period.
    fn days() -> impl Iterator<Item = f64> {
        (0..400).map(|step| -36_524.9 + f64::from(step) * 182.624)
    }

    fn apart(a: Vector, b: Vector) -> f64 {
        length(sum([(1.0, a), (-1.0, b)]))
    }

    #[test]
    fn earth_against_another_ephemeris() {
        let (mut from_sun, mut from_centre, mut arcsec) = (0.0_f64, 0.0_f64, 0.0_f64);
        for days in days() {
            let ours = Frame::at(days);
            let (helio, bary) = sofars::eph::epv00(J2000, days).unwrap();
            let sun = from_barycentre(vsop87e::sun, days);
            from_sun = from_sun.max(apart(sum([(1.0, ours.earth), (-1.0, sun)]), helio[0]));
            from_centre = from_centre.max(apart(ours.earth, bary[0]));
            arcsec = arcsec.max((apart(ours.velocity, bary[1]) / LIGHT_AU_PER_DAY).to_degrees() * 3600.0);
        }
        println!("earth: {from_sun:.1e} au from the sun, {from_centre:.1e} au from the centre of mass, aberration {arcsec:.6}\"");
        assert!(from_sun < 2e-7 && from_centre < 1e-5 && arcsec < 1e-4);
    }

    #[test]
    fn equator_against_the_whole_nutation() {
        let worst = days()
            .flat_map(|days| {
                let (ours, theirs) = (Frame::at(days).to_equator, pnp::pnm06a(J2000, days));
                (0..3).map(move |row| apart(ours[row], theirs[row]).to_degrees() * 3600.0)
            })
            .fold(0.0, f64::max);
        println!("axes {worst:.5}\"");
        assert!(worst < 0.005);
    }
}
