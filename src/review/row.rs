//! What the review reads of one row.

use crate::compass::{Observation, Place, Worked};
use crate::logbook::entry::Logged;
use crate::time::{Moment, Zone};

/// Whose compasses a row speaks of; blank names are names like any other.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub struct Names<'a> {
    /// The vessel.
    pub vessel: &'a str,
    /// The gyro.
    pub gyro: &'a str,
    /// The repeater the bearing was read on.
    pub repeater: &'a str,
    /// The magnetic compass.
    pub magnetic_compass: &'a str,
}

/// What the card in force says for a row's heading.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CardFigure {
    /// Deviation, degrees, east +.
    pub deviation_deg: f64,
    /// Age of the card at the time of the row, months, where its date is known.
    pub age_months: Option<f64>,
}

/// One row of a log, read and worked.
#[derive(Debug, Clone, Copy)]
pub struct Row<'a> {
    /// Number of the data row, from 1.
    pub number: u64,
    /// Whose compasses.
    pub names: Names<'a>,
    /// When, as far as written.
    pub moment: Option<Moment>,
    /// Where, as far as written.
    pub place: Option<Place>,
    /// The zone written with a ship's time.
    pub zone: Option<Zone>,
    /// What was observed; `None` where the entry says that nothing could be had.
    pub observation: Option<&'a Observation>,
    /// Why nothing could be had, or any other remark.
    pub remarks: &'a str,
    /// What the officer worked out.
    pub logged: &'a Logged,
    /// What the card says, where one is given.
    pub card: Option<CardFigure>,
    /// The observation worked again.
    pub worked: &'a Worked,
}
