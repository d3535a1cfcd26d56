//! The exact form of the deviation curve, for deviations that are not small.
//!
//! sin d = A cos d + B sin z + C cos z + D sin(2z + d) + E cos(2z + d), z the heading by compass, d the deviation; on magnetic headings
//! m = z + d the same is tan d = (A + B sin m + C cos m + D sin 2m + E cos 2m) / (1 + B cos m - C sin m + D cos 2m - E sin 2m).
//! The five exact coefficients are numbers, near the sines of the approximate ones.
//!
//! Source: Archibald Smith, in the Admiralty Manual for the Deviations of the Compass (19th century; formulas from memory, and held
//! against each other and against the forces they come from in the tests).

use super::least_squares::{Solution, solve};
use crate::angle::{CompassBearing, Deviation, MagneticBearing, wrap_180_deg};

/// Rounds of linearising; each gains many digits.
const ROUNDS: usize = 20;
/// A change of the coefficients below this ends the rounds.
const SETTLED: f64 = 1e-12;

/// The exact coefficients, numbers without a unit.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ExactCoefficients(pub(super) [f64; 5]);

impl ExactCoefficients {
    /// From A to E; `None` unless every heading has one deviation: A, the length of B and C, and that of D and E sum to under 1.
    pub fn new([a, b, c, d, e]: [f64; 5]) -> Option<Self> {
        // Then the ship's own field never outweighs the earth's.
        (a.abs() + b.hypot(c) + d.hypot(e) < 1.0).then_some(Self([a, b, c, d, e]))
    }

    /// A to E.
    pub fn to_array(self) -> [f64; 5] {
        self.0
    }

    /// The deviation on a heading by compass.
    pub fn on_compass_heading(&self, heading: CompassBearing) -> Deviation {
        let [a, b, c, d, e] = self.0;
        let (sin, cos) = heading.deg().to_radians().sin_cos();
        let (sin_2, cos_2) = (2.0 * sin * cos, cos * cos - sin * sin);
        // p sin d - q cos d = r, solved by turning through the angle of p and q.
        let (p, q, r) = (1.0 - d * cos_2 + e * sin_2, a + d * sin_2 + e * cos_2, b * sin + c * cos);
        let length = p.hypot(q);
        Deviation::wrapping_deg((q.atan2(p) + (r / length).clamp(-1.0, 1.0).asin()).to_degrees())
    }

    /// The deviation on a magnetic heading.
    pub fn on_magnetic_heading(&self, heading: MagneticBearing) -> Deviation {
        let [a, b, c, d, e] = self.0;
        let (sin, cos) = heading.deg().to_radians().sin_cos();
        let (sin_2, cos_2) = (2.0 * sin * cos, cos * cos - sin * sin);
        let east = a + b * sin + c * cos + d * sin_2 + e * cos_2;
        let north = 1.0 + b * cos - c * sin + d * cos_2 - e * sin_2;
        Deviation::wrapping_deg(east.atan2(north).to_degrees())
    }

    /// How the deviation on a heading by compass, degrees, follows each coefficient.
    pub(super) fn slopes_deg(&self, heading: CompassBearing) -> [f64; 5] {
        let deviation = self.on_compass_heading(heading).deg();
        let [a, _, _, d, e] = self.0;
        let (z, dev) = (heading.deg().to_radians(), deviation.to_radians());
        let (sin_2, cos_2) = (2.0 * z + dev).sin_cos();
        // Of sin d - A cos d - D sin(2z + d) - E cos(2z + d), by d.
        let by_deviation = dev.cos() + a * dev.sin() - d * cos_2 + e * sin_2;
        [dev.cos(), z.sin(), z.cos(), sin_2, cos_2].map(|term| (term / by_deviation).to_degrees())
    }
}

/// Least squares of the residuals in degrees. `None` where it does not settle on coefficients that give one deviation to each heading.
pub(super) fn fit(start: [f64; 5], headings: &[CompassBearing], deviations_deg: &[f64]) -> Option<(ExactCoefficients, Solution)> {
    let mut now = ExactCoefficients::new(start)?;
    for _ in 0..ROUNDS {
        let (design, misses) = linear(&now, headings, deviations_deg);
        let solution = solve(&design, &misses)?;
        let mut next = now.0;
        next.iter_mut().zip(&solution.values).for_each(|(coefficient, step)| *coefficient += step);
        now = ExactCoefficients::new(next)?;
        if solution.values.iter().all(|step| step.abs() < SETTLED) {
            return Some((now, solution));
        }
    }
    None
}

/// The slopes, and observed - computed, at `now`.
pub(super) fn linear(now: &ExactCoefficients, headings: &[CompassBearing], deviations_deg: &[f64]) -> (Vec<Vec<f64>>, Vec<f64>) {
    let design = headings.iter().map(|h| now.slopes_deg(*h).to_vec()).collect();
    let miss = |(h, observed): (&CompassBearing, &f64)| wrap_180_deg(observed - now.on_compass_heading(*h).deg());
    (design, headings.iter().zip(deviations_deg).map(miss).collect())
}

#[cfg(test)]
mod tests {
    use super::*;

    fn strong() -> ExactCoefficients {
        ExactCoefficients::new([0.01, 0.42, -0.3, 0.08, -0.02]).unwrap()
    }

    #[test]
    fn both_headings_and_the_defining_equation_agree() {
        let k = strong();
        let [a, b, c, d, e] = k.to_array();
        for heading in (0..360).step_by(5) {
            let compass = CompassBearing::wrapping_deg(f64::from(heading));
            let deviation = k.on_compass_heading(compass);
            assert!((deviation.deg() - k.on_magnetic_heading(compass + deviation).deg()).abs() < 1e-9, "{heading}");
            let (z, dev) = (compass.deg().to_radians(), deviation.deg().to_radians());
            let right = a * dev.cos() + b * z.sin() + c * z.cos() + d * (2.0 * z + dev).sin() + e * (2.0 * z + dev).cos();
            assert!((dev.sin() - right).abs() < 1e-12);
        }
    }

    /// From the forces: a ship's permanent magnet of 0.5 of the horizontal field, to starboard of a ship heading north by compass.
    #[test]
    fn a_magnet_to_starboard_turns_the_needle_east() {
        let k = ExactCoefficients::new([0.0, 0.0, 0.5, 0.0, 0.0]).unwrap();
        // Heading by compass north, the magnet pulls square to the needle's line: sin d = 0.5.
        assert!((k.on_compass_heading(CompassBearing::wrapping_deg(0.0)).deg() - 30.0).abs() < 1e-12);
        // Heading magnetic north, it pulls square to the earth's field: tan d = 0.5.
        assert!((k.on_magnetic_heading(MagneticBearing::wrapping_deg(0.0)).deg() - 0.5f64.atan().to_degrees()).abs() < 1e-12);
    }

    #[test]
    fn the_fit_recovers_what_made_the_deviations() {
        let headings: Vec<_> = (0..12).map(|i| CompassBearing::wrapping_deg(30.0 * f64::from(i) + 7.0)).collect();
        let deviations: Vec<f64> = headings.iter().map(|h| strong().on_compass_heading(*h).deg()).collect();
        let (found, solution) = fit([0.0; 5], &headings, &deviations).unwrap();
        for (found, made) in found.to_array().into_iter().zip(strong().to_array()) {
            assert!((found - made).abs() < 1e-9);
        }
        assert!(solution.sum_of_squares() < 1e-15);
        assert!(ExactCoefficients::new([0.0, 0.8, 0.7, 0.0, 0.0]).is_none());
    }
}
