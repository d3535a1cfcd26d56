//! The fit.

use super::blunders;
use super::coefficients::{Coefficients, harmonics};
use super::coverage;
use super::exact::{self, ExactCoefficients};
use super::handbook::eight_headings;
use super::least_squares::{Solution, solve};
use super::{DeviationReading, Turn};
use crate::angle::CompassBearing;
use crate::notice::Notice;

/// Different headings that five coefficients need.
const LEAST_HEADINGS: usize = 5;
/// The least scatter of readings that is believed, degrees: few headings flatter themselves (common practice: read to half a degree).
const LEAST_SCATTER_DEG: f64 = 0.5;
/// A scatter that says that something is wrong with the swing as a whole, degrees (our own).
const LARGE_SCATTER_DEG: f64 = 1.5;
/// Beyond this deviation, degrees, the exact form is fitted too (common practice).
const LARGE_DEVIATION_DEG: f64 = 20.0;
/// A coefficient with a larger u, degrees, is not determined (our own: no card could use it).
const UNDETERMINED_DEG: f64 = 2.0;
/// Where the curve's u is larger, degrees, it says nothing (our own).
const UNKNOWN_DEG: f64 = 3.0;

/// Why there is no curve.
#[derive(Debug, Clone, Copy, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum NoCurve {
    /// Not enough different headings.
    #[error(
        "deviations on {have} different heading{}: five coefficients need at least 5, and 8 all round to be trusted",
        if *have == 1 { "" } else { "s" }
    )]
    TooFewHeadings {
        /// Headings at least a degree apart.
        have: usize,
    },
}

/// A deviation from the curve, with its standard uncertainty; both degrees, east +.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Estimate {
    /// The deviation.
    pub deviation_deg: f64,
    /// Its standard uncertainty, that of the curve alone: a single reading scatters about it by [`Curve::scatter_deg`] more.
    pub u_deg: f64,
}

/// A reading that was left out of the fit.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SetAside {
    /// Which, counted from 0.
    pub index: usize,
    /// Observed - curve through the others, degrees.
    pub residual_deg: f64,
    /// A slip of the pen that would explain it.
    pub slip: Option<ReadingSlip>,
}

/// What may have happened to a reading that does not belong.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum ReadingSlip {
    /// East and west exchanged.
    OtherName,
    /// Ten degrees too far east.
    TenTooFarEast,
    /// Ten degrees too far west.
    TenTooFarWest,
}

impl ReadingSlip {
    /// How near the curve a reading must come when the slip is undone, degrees (our own: three sigma of a reading).
    const NEAR_DEG: f64 = 1.5;

    fn of(deviation_deg: f64, residual_deg: f64) -> Option<Self> {
        let slips = [(Self::OtherName, 2.0 * deviation_deg), (Self::TenTooFarEast, 10.0), (Self::TenTooFarWest, -10.0)];
        let left = slips.map(|(slip, shift)| (slip, (residual_deg - shift).abs()));
        left.into_iter().filter(|(_, left)| *left <= Self::NEAR_DEG).min_by(|a, b| a.1.total_cmp(&b.1)).map(|(slip, _)| slip)
    }
}

impl std::fmt::Display for ReadingSlip {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.write_str(match self {
            Self::OtherName => "with the other name it would fit",
            Self::TenTooFarEast => "ten degrees further west it would fit",
            Self::TenTooFarWest => "ten degrees further east it would fit",
        })
    }
}

/// A deviation curve fitted to readings.
#[derive(Debug, Clone)]
pub struct Curve {
    /// A to E by least squares; only those that [`Curve::u_deg`] gives a figure for are determined.
    pub coefficients: Coefficients,
    /// Scatter of the readings that is reckoned with, degrees: their residual standard deviation, 0.5 at least.
    pub scatter_deg: f64,
    /// Root mean square of the residuals of the readings kept, degrees.
    pub rms_deg: f64,
    /// Residual of every reading, observed - curve, degrees; of those set aside too.
    pub residuals_deg: Vec<f64>,
    /// Readings left out, in order.
    pub set_aside: Vec<SetAside>,
    /// By the rule for eight headings, from the readings kept, where the headings allow.
    pub handbook: Option<Coefficients>,
    /// The exact form, where a deviation passes 20 degrees and it fits better: then the curve is this.
    pub exact: Option<ExactCoefficients>,
    /// Half the difference clockwise - anticlockwise and its u, degrees, where both turns were made: the curve lies midway.
    pub half_turn_difference_deg: Option<(f64, f64)>,
    /// Sectors never observed, clockwise from the first to the second heading.
    pub unproven: Vec<(CompassBearing, CompassBearing)>,
    /// What should be said of it.
    pub notices: Vec<Notice>,
    solution: Solution,
    exact_solution: Option<(Solution, f64)>,
}

/// Fits the five coefficients by least squares, setting aside readings that cannot belong.
///
/// Units and signs: degrees, east +.
///
/// Error bound: on swings with known coefficients (`tests/magnetic/swings.rs`) they are inside 3 u in over 99 of 100.
///
/// Undefined: coefficients that the headings cannot tell have no [u](Curve::u_deg).
///
/// # Errors
/// [`NoCurve::TooFewHeadings`] with fewer than five different headings.
///
/// Source: Handbook of Magnetic Compass Adjustment for the form; Archibald Smith for the exact one.
///
/// # Example
/// ```
/// use shadowpin::{angle::{CompassBearing, Deviation}, compass::curve::{DeviationReading, fit}};
/// let swing = [(0.0, 10.5), (45.0, 20.0), (90.0, 11.5), (135.0, -1.2), (180.0, -5.5), (225.0, -8.0), (270.0, -12.5), (315.0, -6.8)];
/// let readings = swing.map(|(heading, deviation)| DeviationReading {
///     heading: CompassBearing::wrapping_deg(heading),
///     deviation: Deviation::wrapping_deg(deviation),
///     turn: None,
/// });
/// let curve = fit(&readings).unwrap();
/// assert_eq!(format!("{:.2}", curve.coefficients.b), "11.94");
/// ```
pub fn fit(readings: &[DeviationReading]) -> Result<Curve, NoCurve> {
    let headings: Vec<CompassBearing> = readings.iter().map(|r| r.heading).collect();
    let have = coverage::distinct(headings.iter().copied());
    let too_few = NoCurve::TooFewHeadings { have };
    if have < LEAST_HEADINGS {
        return Err(too_few);
    }
    let deviations: Vec<f64> = readings.iter().map(|r| r.deviation.deg()).collect();
    let design = design(readings);

    let mut aside = blunders::find(&design, &deviations);
    let mut solution = solve(&without(&design, &aside), &without(&deviations, &aside)).ok_or(too_few)?;
    let mut exact_fit = None;
    let largest = |aside: &[usize]| without(&deviations, aside).into_iter().fold(0.0, |most: f64, d| most.max(d.abs()));
    if largest(&aside) > LARGE_DEVIATION_DEG {
        let even = turns_averaged(&design, &deviations, &solution);
        let start = first_exact(&solution);
        // Once to know the curve, and once more without what that curve shows to be wrong.
        if let Some((near, _)) = exact::fit(start, &without(&headings, &aside), &without(&even, &aside)) {
            let (slopes, misses) = exact::linear(&near, &headings, &even);
            aside = blunders::find(&slopes, &misses);
            solution = solve(&without(&design, &aside), &without(&deviations, &aside)).ok_or(too_few)?;
            exact_fit = exact::fit(near.to_array(), &without(&headings, &aside), &without(&even, &aside));
        }
    }
    let exact_fit = exact_fit.filter(|(_, exact)| exact.sum_of_squares() < solution.sum_of_squares());

    let kept: Vec<DeviationReading> = without(readings, &aside);
    let unproven = coverage::unproven(kept.iter().map(|r| r.heading));
    let sum = exact_fit.as_ref().map_or(solution.sum_of_squares(), |(_, exact)| exact.sum_of_squares());
    let mut curve = Curve {
        coefficients: first_five(&solution),
        scatter_deg: scatter(&solution, kept.len()),
        rms_deg: (sum / kept.len().max(1) as f64).sqrt(),
        residuals_deg: Vec::new(),
        set_aside: Vec::new(),
        handbook: eight_headings(&kept),
        exact: exact_fit.as_ref().map(|(coefficients, _)| *coefficients),
        half_turn_difference_deg: None,
        unproven,
        notices: Vec::new(),
        exact_solution: exact_fit.map(|(_, exact)| {
            let scatter = scatter(&exact, kept.len());
            (exact, scatter)
        }),
        solution,
    };
    if let Some(half) = curve.solution.values.get(5).copied() {
        let u = curve.scatter_deg * curve.solution.variance(&[0.0, 0.0, 0.0, 0.0, 0.0, 1.0]).sqrt();
        curve.half_turn_difference_deg = u.is_finite().then_some((half, u));
    }
    let half = curve.half_turn_difference_deg.map_or(0.0, |(half, _)| half);
    let residual = |r: &DeviationReading| r.deviation.deg() - curve.deviation_deg(r.heading) - half * sense(r.turn);
    curve.residuals_deg = readings.iter().map(residual).collect();
    let with_residual = |index: usize| {
        let residual_deg = *curve.residuals_deg.get(index)?;
        Some(SetAside { index, residual_deg, slip: ReadingSlip::of(*deviations.get(index)?, residual_deg) })
    };
    curve.set_aside = aside.iter().filter_map(|index| with_residual(*index)).collect();
    curve.notices = notices(&curve, largest(&aside), kept.len());
    Ok(curve)
}

impl Curve {
    /// Standard uncertainty of each coefficient, degrees; `None` where the headings cannot tell it.
    pub fn u_deg(&self) -> [Option<f64>; 5] {
        std::array::from_fn(|i| {
            let u = self.scatter_deg * self.solution.variance(&unit(i, self.solution.values.len())).sqrt();
            (u <= UNDETERMINED_DEG).then_some(u)
        })
    }

    /// Correlation of two coefficients (0 for A to 4 for E); `None` where either is not determined.
    pub fn correlation(&self, one: usize, other: usize) -> Option<f64> {
        let size = self.solution.values.len();
        let u = self.u_deg();
        (*u.get(one)?)?;
        (*u.get(other)?)?;
        let covariance = |i, j| self.solution.covariance(&unit(i, size), &unit(j, size));
        Some(covariance(one, other) / (covariance(one, one) * covariance(other, other)).sqrt())
    }

    /// The deviation on a heading by compass; `None` where the headings observed cannot tell it (u over 3 degrees).
    pub fn on(&self, heading: CompassBearing) -> Option<Estimate> {
        let (variance, scatter) = match (&self.exact, &self.exact_solution) {
            (Some(exact), Some((solution, scatter))) => (solution.variance(&exact.slopes_deg(heading)), *scatter),
            _ => (self.solution.variance(&row(heading, 0.0, self.solution.values.len())), self.scatter_deg),
        };
        let u_deg = scatter * variance.sqrt();
        (u_deg <= UNKNOWN_DEG).then(|| Estimate { deviation_deg: self.deviation_deg(heading), u_deg })
    }

    /// The deviation on a heading by compass, degrees, east +, whether or not the headings observed can tell it: see [`Curve::on`].
    pub fn deviation_deg(&self, heading: CompassBearing) -> f64 {
        match &self.exact {
            Some(exact) => exact.on_compass_heading(heading).deg(),
            None => self.coefficients.deviation_deg(heading),
        }
    }
}

/// One row of the design: the harmonics and, where both turns were made, the turn.
fn row(heading: CompassBearing, turn: f64, size: usize) -> Vec<f64> {
    harmonics(heading).into_iter().chain([turn]).take(size).collect()
}

fn design(readings: &[DeviationReading]) -> Vec<Vec<f64>> {
    let both = [Turn::Clockwise, Turn::Anticlockwise].iter().all(|turn| readings.iter().any(|r| r.turn == Some(*turn)));
    // A sixth unknown is only worth its place where something is left to tell it from the five.
    let size = if both && readings.len() > LEAST_HEADINGS + 1 { 6 } else { 5 };
    readings.iter().map(|r| row(r.heading, sense(r.turn), size)).collect()
}

/// Clockwise +1, anticlockwise -1.
fn sense(turn: Option<Turn>) -> f64 {
    match turn {
        Some(Turn::Clockwise) => 1.0,
        Some(Turn::Anticlockwise) => -1.0,
        None => 0.0,
    }
}

/// The deviations with the difference between the turns taken out.
fn turns_averaged(design: &[Vec<f64>], deviations: &[f64], solution: &Solution) -> Vec<f64> {
    let half = solution.values.get(5).copied().unwrap_or(0.0);
    design.iter().zip(deviations).map(|(row, d)| d - half * row.get(5).copied().unwrap_or(0.0)).collect()
}

fn without<T: Clone>(all: &[T], aside: &[usize]) -> Vec<T> {
    all.iter().enumerate().filter(|(i, _)| aside.binary_search(i).is_err()).map(|(_, x)| x.clone()).collect()
}

fn unit(i: usize, size: usize) -> Vec<f64> {
    (0..size).map(|j| f64::from(u8::from(i == j))).collect()
}

fn first_five(solution: &Solution) -> Coefficients {
    let mut values = solution.values.iter().copied();
    Coefficients::from_array(std::array::from_fn(|_| values.next().unwrap_or(0.0)))
}

fn first_exact(solution: &Solution) -> [f64; 5] {
    first_five(solution).to_array().map(|degrees| degrees.to_radians().sin())
}

/// Residual standard deviation, 0.5 at least.
fn scatter(solution: &Solution, rows: usize) -> f64 {
    match rows.saturating_sub(solution.rank()) {
        0 => LEAST_SCATTER_DEG,
        freedom => (solution.sum_of_squares() / freedom as f64).sqrt().max(LEAST_SCATTER_DEG),
    }
}

fn notices(curve: &Curve, largest_deg: f64, kept: usize) -> Vec<Notice> {
    let mut notices = Vec::new();
    if !curve.set_aside.is_empty() {
        notices.push(Notice::ReadingsSetAside { count: curve.set_aside.len() });
    }
    let scatter_deg = curve.exact_solution.as_ref().map_or(curve.scatter_deg, |(_, scatter)| *scatter);
    if scatter_deg > LARGE_SCATTER_DEG {
        notices.push(Notice::LargeScatter { scatter_deg });
    }
    if kept <= curve.solution.rank() + 1 {
        notices.push(Notice::HardlyChecked { readings: kept });
    }
    let determined = curve.u_deg().map(|u| u.is_some());
    if determined.contains(&false) {
        notices.push(Notice::Undetermined { determined });
    }
    let sector = |(from, to): &(CompassBearing, CompassBearing)| Notice::UnprovenHeadings { from_deg: from.deg(), to_deg: to.deg() };
    notices.extend(curve.unproven.iter().map(sector));
    if largest_deg > LARGE_DEVIATION_DEG {
        notices.push(Notice::LargeDeviation { deviation_deg: largest_deg, exact: curve.exact.is_some() });
    }
    if let Some((half, u)) = curve.half_turn_difference_deg.filter(|(half, u)| half.abs() > 2.0 * u) {
        notices.push(Notice::TurnsDiffer { difference_deg: 2.0 * half, u_deg: 2.0 * u });
    }
    notices
}
