//! One observation worked: from what was written to errors, each with its uncertainty.

use super::budget::{Budget, step_u};
use super::direction;
use super::field::{self, Field};
use super::observation::{Observation, Target};
use super::trust::Trust;
use crate::angle::{CompassError, Deviation, GyroError, TrueBearing, Variation};
use crate::error::NoAnswer;
use crate::horizon::{Horizontal, Search};
use crate::limits::Limits;
use crate::notice::Notice;

/// A figure with what its uncertainty is made of.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Figure<T> {
    /// The figure.
    pub value: T,
    /// The terms of its uncertainty.
    pub budget: Budget,
}

impl<T> Figure<T> {
    /// One standard uncertainty, degrees.
    pub fn u_deg(&self) -> f64 {
        self.budget.u_deg()
    }
}

/// What is known of a gyro's error from its other observations, for rows on which it was not observed.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct GyroRun {
    /// The gyro's error at that time.
    pub error: GyroError,
    /// Its standard uncertainty, degrees.
    pub u_deg: f64,
    /// Hours since its last observation.
    pub age_h: f64,
}

/// How a body stood to the horizon it was said to be on.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct OnHorizon {
    /// When and where it crossed that horizon, or that it does not.
    pub search: Search,
    /// Degrees of altitude from that horizon at the time written, up +.
    pub off_deg: f64,
}

/// What one observation gives.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Worked {
    /// The direction that the errors are reckoned from.
    pub true_azimuth: Option<TrueBearing>,
    /// Uncertainty of that direction (no reading in it).
    pub azimuth_budget: Budget,
    /// The body at the time written.
    pub at_time: Option<Horizontal>,
    /// For a rising or setting: how the body stood to that horizon.
    pub on_horizon: Option<OnHorizon>,
    /// Why there is no azimuth, where the body is in the zenith or the ship at a pole.
    pub no_azimuth: Option<NoAnswer>,
    /// Gyro error.
    pub gyro_error: Option<Figure<GyroError>>,
    /// Compass error by a bearing read on the magnetic compass.
    pub compass_error: Option<Figure<CompassError>>,
    /// Altitude that the tilt of the instrument counts with, degrees; `None` for a mark or headings.
    pub sighted_altitude_deg: Option<f64>,
    /// Ship's head, true.
    pub true_heading: Option<TrueBearing>,
    /// Compass error by comparison of headings.
    pub compass_error_by_comparison: Option<Figure<CompassError>>,
    /// Variation of the field model.
    pub variation: Option<Figure<Variation>>,
    /// The earth's field there and then.
    pub field: Option<Field>,
    /// Deviation, by bearing.
    pub deviation: Option<Figure<Deviation>>,
    /// Deviation, by comparison of headings.
    pub deviation_by_comparison: Option<Figure<Deviation>>,
    /// How far the row's figures can be trusted.
    pub trust: Option<Trust>,
    /// Done, but less surely.
    pub notices: Vec<Notice>,
}

/// Works one observation.
///
/// `run` is what other observations say of the gyro at that time; it is used only where headings alone were compared.
/// Whatever is not written, or has no answer, leaves its figures blank: a body in the zenith says so in `no_azimuth`.
///
/// Signs: as in the [conventions](crate#conventions). Source of the uncertainties: [`Budget`].
pub fn work(observation: &Observation, run: Option<GyroRun>, limits: &Limits) -> Worked {
    let mut worked = Worked::default();
    earth_field(observation, &mut worked);
    direction::reckon(observation, limits, &mut worked);
    by_bearing(observation, limits, &mut worked);
    by_comparison(observation, run, limits, &mut worked);
    worked.deviation = worked.compass_error.zip(worked.variation).map(deviation);
    worked.deviation_by_comparison = worked.compass_error_by_comparison.zip(worked.variation).map(deviation);
    worked.trust = trust(&worked, limits);
    notices(observation, limits, &mut worked);
    worked
}

fn earth_field(observation: &Observation, worked: &mut Worked) {
    let (Some(moment), Some(place)) = (observation.moment, observation.place) else { return };
    // A compass aboard a ship: height 0. Outside the models' years there is no variation, and the row shows none.
    let Ok(field) = field::field(place.position, moment.utc, 0.0) else { return };
    worked.notices.extend(field.notices());
    worked.variation =
        Some(Figure { value: field.variation, budget: Budget { variation_deg: field.variation_u_deg, ..Budget::default() } });
    worked.field = Some(field);
}

/// Gyro error = azimuth - gyro bearing; compass error = azimuth - compass bearing.
fn by_bearing(observation: &Observation, limits: &Limits, worked: &mut Worked) {
    let Some(azimuth) = worked.true_azimuth else { return };
    let tilt_deg = worked.sighted_altitude_deg.map_or(0.0, |altitude| limits.uncertainty.tilt_deg * altitude.to_radians().tan().abs());
    let budget = |reading_deg: f64, step_deg: f64| Budget { reading_deg, step_deg: step_u(step_deg), tilt_deg, ..worked.azimuth_budget };
    if let Some(gyro) = observation.gyro_bearing {
        let budget = budget(limits.uncertainty.reading_gyro_deg, gyro.step_deg);
        worked.gyro_error = Some(Figure { value: azimuth - gyro.value, budget });
    }
    if let Some(compass) = observation.compass_bearing {
        let budget = budget(limits.uncertainty.reading_compass_deg, compass.step_deg);
        worked.compass_error = Some(Figure { value: azimuth - compass.value, budget });
    }
}

/// True heading = gyro heading + gyro error; compass error by comparison = true heading - compass heading.
fn by_comparison(observation: &Observation, run: Option<GyroRun>, limits: &Limits, worked: &mut Worked) {
    let Some(gyro_heading) = observation.gyro_heading else { return };
    let (gyro_error, gyro_u_deg) = match (worked.gyro_error, run) {
        (Some(observed), _) => (observed.value, observed.u_deg()),
        (None, Some(run)) if observation.target == Target::Headings => {
            worked.notices.push(Notice::GyroErrorFromRun { age_h: run.age_h });
            (run.error, run.u_deg)
        }
        _ => return,
    };
    let true_heading = gyro_heading.value + gyro_error;
    worked.true_heading = Some(true_heading);
    let Some(compass_heading) = observation.compass_heading else { return };
    let headings_deg =
        limits.uncertainty.heading_comparison_deg.hypot(step_u(gyro_heading.step_deg)).hypot(step_u(compass_heading.step_deg));
    worked.compass_error_by_comparison = Some(Figure {
        value: true_heading - compass_heading.value,
        budget: Budget { headings_deg, gyro_deg: gyro_u_deg, ..Budget::default() },
    });
}

/// Deviation = compass error - variation.
fn deviation((error, variation): (Figure<CompassError>, Figure<Variation>)) -> Figure<Deviation> {
    Figure { value: error.value - variation.value, budget: Budget { variation_deg: variation.u_deg(), ..error.budget } }
}

/// The band of the best figure of the row: a bearing by gyro, else by magnetic compass, else by comparison.
fn trust(worked: &Worked, limits: &Limits) -> Option<Trust> {
    let u_deg = worked
        .gyro_error
        .map(|f| f.u_deg())
        .or(worked.compass_error.map(|f| f.u_deg()))
        .or(worked.compass_error_by_comparison.map(|f| f.u_deg()))?;
    // A body that cannot be seen gives nothing to trust, however sure the arithmetic.
    if worked.sighted_altitude_deg.is_some_and(|altitude| altitude < limits.thresholds.below_horizon_deg) {
        return Some(Trust::Weak);
    }
    Some(Trust::of(u_deg, worked.sighted_altitude_deg, limits))
}

fn notices(observation: &Observation, limits: &Limits, worked: &mut Worked) {
    use super::observation::Whereabouts;
    if let Some(altitude_deg) = worked.sighted_altitude_deg.filter(|a| *a > limits.thresholds.altitude_weak_deg) {
        worked.notices.push(Notice::High { altitude_deg });
    }
    if let Some(heel_deg) = observation.heel_deg.filter(|h| h.abs() > limits.thresholds.heeled_deg) {
        worked.notices.push(Notice::Heeled { heel_deg });
    }
    if observation.whereabouts == Whereabouts::Berth {
        worked.notices.push(Notice::AtBerth);
    }
    if let Some(place) = observation.place
        && worked.gyro_error.is_some()
        && place.position.lat.deg().abs() > limits.thresholds.gyro_doubtful_latitude_deg
    {
        worked.notices.push(Notice::GyroDoubtful { latitude_deg: place.position.lat.deg() });
    }
}
