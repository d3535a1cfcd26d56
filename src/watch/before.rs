//! An entry before this one, as far as a later one is compared with it.

use crate::angle::CompassBearing;
use crate::compass::work;
use crate::limits::Limits;
use crate::logbook::entry::{Entry, Faults, ReadAs, read_entry};
use crate::logbook::log::Cells;
use crate::time::UtcInstant;

/// Where it is kept.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Kept {
    /// In the ship's book.
    Book,
    /// Only here, until the page is closed.
    Here,
}

/// An earlier entry, worked again from what was observed.
#[derive(Debug, Clone, PartialEq)]
pub struct Before {
    /// When.
    pub utc: UtcInstant,
    /// Vessel, gyro, repeater, magnetic compass: as written, in small letters.
    pub(super) names: Names,
    /// The body; blank for a mark.
    pub body: String,
    /// Gyro error, degrees, east +.
    pub gyro_error_deg: Option<f64>,
    /// Compass error, degrees, east +: by bearing, else by comparison.
    pub compass_error_deg: Option<f64>,
    /// Deviation, likewise.
    pub deviation_deg: Option<f64>,
    /// Ship's head by that compass.
    pub compass_heading: Option<CompassBearing>,
    /// Where it is kept.
    pub kept: Kept,
}

/// Which instruments.
#[derive(Debug, Clone, PartialEq, Eq, Default)]
pub(super) struct Names {
    pub vessel: String,
    pub gyro: String,
    pub repeater: String,
    pub magnetic_compass: String,
}

impl Names {
    pub fn of(entry: &Entry<'_>) -> Self {
        let [vessel, gyro, repeater, magnetic_compass] =
            [&entry.vessel, &entry.gyro, &entry.repeater, &entry.magnetic_compass].map(|name| name.trim().to_lowercase());
        Self { vessel, gyro, repeater, magnetic_compass }
    }

    pub fn same_gyro(&self, other: &Self) -> bool {
        (&self.vessel, &self.gyro, &self.repeater) == (&other.vessel, &other.gyro, &other.repeater)
    }

    pub fn same_compass(&self, other: &Self) -> bool {
        (&self.vessel, &self.magnetic_compass) == (&other.vessel, &other.magnetic_compass)
    }
}

impl Before {
    /// The entry in `cells`; `None` where nothing was observed or it cannot be worked.
    pub fn of(cells: &impl Cells, kept: Kept, limits: &Limits) -> Option<Self> {
        let entry = read_entry(cells, ReadAs::default(), &mut Faults::default());
        let observation = entry.observation?;
        let worked = work(&observation, None, limits);
        let compass_error = worked.compass_error.or(worked.compass_error_by_comparison);
        let deviation = worked.deviation.or(worked.deviation_by_comparison);
        Some(Self {
            utc: observation.moment?.utc,
            names: Names::of(&entry),
            body: observation.body().map_or("", |b| b.name()).to_owned(),
            gyro_error_deg: worked.gyro_error.map(|e| e.value.deg()),
            compass_error_deg: compass_error.map(|e| e.value.deg()),
            deviation_deg: deviation.map(|d| d.value.deg()),
            compass_heading: observation.compass_heading.map(|h| h.value),
            kept,
        })
    }
}
