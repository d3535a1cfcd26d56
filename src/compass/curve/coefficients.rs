//! The five coefficients and what they say.

use crate::angle::CompassBearing;

/// The coefficients A to E of a deviation curve, degrees, east +.
///
/// deviation = A + B sin z + C cos z + D sin 2z + E cos 2z, z the heading by compass. A: a lubber line out of true, or a wrong variation;
/// B and C: permanent magnetism and vertical iron; D and E: horizontal iron.
///
/// Source: Handbook of Magnetic Compass Adjustment (formerly NGA Pub. 226).
///
/// # Example
/// ```
/// use shadowpin::{angle::CompassBearing, compass::curve::Coefficients};
/// let curve = Coefficients { a: 1.0, b: 12.0, c: 8.0, d: 5.0, e: 1.5 };
/// assert_eq!(curve.deviation_deg(CompassBearing::wrapping_deg(90.0)), 1.0 + 12.0 - 1.5);
/// ```
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Coefficients {
    /// The same on all headings.
    pub a: f64,
    /// With the sine of the heading.
    pub b: f64,
    /// With the cosine of the heading.
    pub c: f64,
    /// With the sine of twice the heading.
    pub d: f64,
    /// With the cosine of twice the heading.
    pub e: f64,
}

impl Coefficients {
    /// Their names, in order.
    pub const NAMES: [&str; 5] = ["A", "B", "C", "D", "E"];

    /// In order.
    pub fn to_array(self) -> [f64; 5] {
        [self.a, self.b, self.c, self.d, self.e]
    }

    /// From their values in order.
    pub fn from_array([a, b, c, d, e]: [f64; 5]) -> Self {
        Self { a, b, c, d, e }
    }

    /// The deviation on a heading by compass, degrees, east +.
    pub fn deviation_deg(&self, compass_heading: CompassBearing) -> f64 {
        let terms = harmonics(compass_heading);
        self.to_array().into_iter().zip(terms).map(|(coefficient, term)| coefficient * term).sum()
    }
}

/// 1, sin z, cos z, sin 2z, cos 2z: what each coefficient is multiplied with.
pub(super) fn harmonics(heading: CompassBearing) -> [f64; 5] {
    let (sin, cos) = heading.deg().to_radians().sin_cos();
    [1.0, sin, cos, 2.0 * sin * cos, cos * cos - sin * sin]
}
