//! One observation worked: from what was written to errors, each with its uncertainty.

use super::budget::{Budget, step_u};
use super::field::{self, Field};
use super::observation::{HorizonEvent, HorizonKind, Observation, Place, Target};
use super::trust::Trust;
use crate::angle::{CompassError, Deviation, GyroError, TrueBearing, Variation};
use crate::error::NoAnswer;
use crate::horizon::{self, Horizontal, Rates};
use crate::limits::Limits;
use crate::notice::Notice;
use crate::sky::{self, Body};
use crate::time::UtcInstant;

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
pub enum OnHorizon {
    /// It was on that horizon `seconds` after the time written (before where negative).
    Crossed {
        /// The instant on that horizon.
        utc: UtcInstant,
        /// Degrees of altitude from that horizon at the time written, up +.
        off_deg: f64,
    },
    /// It does not come to that horizon there on that day.
    Never {
        /// Altitude at the time written, degrees.
        altitude_deg: f64,
    },
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
