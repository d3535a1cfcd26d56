//! How the curve changes with magnetic latitude: B and C each have a part from permanent magnetism, which goes as 1/H, and a part induced in
//! vertical iron, which goes as Z/H, the tangent of the inclination. A, D and E stay as they are.

use super::blunders;
use super::coefficients::{Coefficients, harmonics};
use super::fit::NoCurve;
use super::least_squares::{Solution, solve};
use super::{Curve, DeviationReading, fit};
use crate::angle::CompassBearing;
use crate::compass::field::Field;

/// A part with a larger u than this, degrees, is not told from the other (our own; as for the coefficients).
const UNTOLD_DEG: f64 = 2.0;
/// The least scatter of readings that is believed, degrees (as for the curve).
const LEAST_SCATTER_DEG: f64 = 0.5;
/// Unknowns: A, D, E, and two parts of B and of C.
const UNKNOWNS: usize = 7;

/// What of the earth's field at a place a compass feels.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct MagneticPlace {
    /// Horizontal intensity, nanotesla.
    pub horizontal_nt: f64,
    /// Tangent of the inclination, north magnetic latitude +.
    pub tan_inclination: f64,
}

impl MagneticPlace {
    /// From the field; `None` where the horizontal field vanishes.
    pub fn of(field: &Field) -> Option<Self> {
        let (horizontal_nt, tan_inclination) = (field.horizontal_nt, field.down_nt / field.horizontal_nt);
        tan_inclination.is_finite().then_some(Self { horizontal_nt, tan_inclination })
    }
}

/// Ratio of the horizontal intensities from which on two places are different for a compass (our own: a tenth of B and C).
const DIFFERENT_RATIO: f64 = 1.1;
/// Difference of the tangents of the inclination, likewise.
const DIFFERENT_TANGENT: f64 = 0.2;

/// Whether B and C may differ much between these places.
pub fn are_different(places: impl Iterator<Item = MagneticPlace>) -> bool {
    let (mut weakest, mut strongest, mut lowest, mut highest) = (f64::MAX, 0.0_f64, f64::MAX, f64::MIN);
    for place in places {
        (weakest, strongest) = (weakest.min(place.horizontal_nt), strongest.max(place.horizontal_nt));
        (lowest, highest) = (lowest.min(place.tan_inclination), highest.max(place.tan_inclination));
    }
    strongest > DIFFERENT_RATIO * weakest || highest - lowest > DIFFERENT_TANGENT
}

/// A figure with its standard uncertainty, degrees.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Part {
    /// The figure, east +.
    pub value_deg: f64,
    /// Its standard uncertainty.
    pub u_deg: f64,
}

/// A curve whose B and C depend on the place.
#[derive(Debug, Clone)]
pub struct LatitudeCurve {
    /// The intensity at which the permanent parts are stated, nanotesla: that of the first reading.
    pub reference_nt: f64,
    /// Readings left out, counted from 0.
    pub set_aside: Vec<usize>,
    /// Scatter of the readings, degrees, 0.5 at least.
    pub scatter_deg: f64,
    solution: Solution,
}

/// Fits readings taken at different magnetic latitudes.
///
/// # Errors
/// [`NoCurve::TooFewHeadings`] with fewer than five different headings.
pub fn fit_by_latitude(readings: &[(DeviationReading, MagneticPlace)]) -> Result<LatitudeCurve, NoCurve> {
    let only: Vec<DeviationReading> = readings.iter().map(|(r, _)| *r).collect();
    // The ordinary fit refuses what is too little for this one too.
    let plain = fit(&only);
    let Some(reference_nt) = readings.first().map(|(_, place)| place.horizontal_nt) else {
        return Err(NoCurve::TooFewHeadings { have: 0 });
    };
    plain?;
    let design: Vec<Vec<f64>> = readings.iter().map(|(r, place)| row(r.heading, *place, reference_nt).to_vec()).collect();
    let observed: Vec<f64> = only.iter().map(|r| r.deviation.deg()).collect();
    let set_aside = blunders::find(&design, &observed);
    let keep = |i: &usize| set_aside.binary_search(i).is_err();
    let rows: Vec<Vec<f64>> = design.iter().enumerate().filter(|(i, _)| keep(i)).map(|(_, r)| r.clone()).collect();
    let values: Vec<f64> = observed.iter().enumerate().filter(|(i, _)| keep(i)).map(|(_, v)| *v).collect();
    let solution = solve(&rows, &values).ok_or(NoCurve::TooFewHeadings { have: 0 })?;
    let freedom = rows.len().saturating_sub(solution.rank());
    let scatter = if freedom == 0 { 0.0 } else { (solution.sum_of_squares() / freedom as f64).sqrt() };
    Ok(LatitudeCurve { reference_nt, set_aside, scatter_deg: scatter.max(LEAST_SCATTER_DEG), solution })
}

/// A, the permanent parts of B and C, D, E, the induced parts of B and C.
fn row(heading: CompassBearing, place: MagneticPlace, reference_nt: f64) -> [f64; UNKNOWNS] {
    let [one, sin, cos, sin_2, cos_2] = harmonics(heading);
    let (permanent, induced) = (reference_nt / place.horizontal_nt, place.tan_inclination);
    [one, permanent * sin, permanent * cos, sin_2, cos_2, induced * sin, induced * cos]
}

impl LatitudeCurve {
    fn part(&self, weights: &[f64; UNKNOWNS]) -> Option<Part> {
        let u_deg = self.scatter_deg * self.solution.variance(weights).sqrt();
        (u_deg <= UNTOLD_DEG).then(|| Part { value_deg: self.solution.value(weights), u_deg })
    }

    fn unknown(&self, i: usize) -> Option<Part> {
        self.part(&std::array::from_fn(|j| f64::from(u8::from(i == j))))
    }

    /// The permanent parts of B and C at the [reference intensity](Self::reference_nt); `None` where the data cannot tell them.
    pub fn permanent(&self) -> [Option<Part>; 2] {
        [self.unknown(1), self.unknown(2)]
    }

    /// The induced parts of B and C where the tangent of the inclination is 1; `None` where the data cannot tell them.
    pub fn induced(&self) -> [Option<Part>; 2] {
        [self.unknown(5), self.unknown(6)]
    }

    /// Coefficients A to E at a place; `None` where the data cannot tell.
    pub fn coefficients_at(&self, place: MagneticPlace) -> [Option<Part>; 5] {
        let (permanent, induced) = (self.reference_nt / place.horizontal_nt, place.tan_inclination);
        [
            self.unknown(0),
            self.part(&[0.0, permanent, 0.0, 0.0, 0.0, induced, 0.0]),
            self.part(&[0.0, 0.0, permanent, 0.0, 0.0, 0.0, induced]),
            self.unknown(3),
            self.unknown(4),
        ]
    }

    /// The deviation on a heading at a place; `None` where the data cannot tell.
    pub fn on(&self, heading: CompassBearing, place: MagneticPlace) -> Option<Part> {
        self.part(&row(heading, place, self.reference_nt))
    }
}

/// The two ends of what one swing allows elsewhere: B and C all permanent, and all induced.
///
/// The second is `None` where the swing was made on the magnetic equator: there nothing is induced in vertical iron.
pub fn bounds(curve: &Curve, swung_at: MagneticPlace, place: MagneticPlace) -> [Option<Coefficients>; 2] {
    let scaled = |factor: f64| {
        let Coefficients { b, c, .. } = curve.coefficients;
        factor.is_finite().then_some(Coefficients { b: b * factor, c: c * factor, ..curve.coefficients })
    };
    [scaled(swung_at.horizontal_nt / place.horizontal_nt), scaled(place.tan_inclination / swung_at.tan_inclination)]
}
