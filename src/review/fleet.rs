//! What the first pass has learned, ready to judge rows by, in any order.

use super::pattern::PatternId;
use super::row::Names;
use super::vessel::Vessel;
use crate::angle::GyroError;
use crate::compass::GyroRun;
use crate::limits::Limits;
use std::collections::HashMap;

/// All vessels of a log.
#[derive(Debug, Clone)]
pub struct Fleet {
    vessels: Vec<Vessel>,
    by_name: HashMap<String, usize>,
    pub(super) limits: Limits,
}

impl Fleet {
    pub(super) fn new(vessels: Vec<Vessel>, by_name: HashMap<String, usize>, limits: Limits) -> Self {
        Self { vessels, by_name, limits }
    }

    pub(super) fn vessels(&self) -> &[Vessel] {
        &self.vessels
    }

    /// Place of a vessel among them.
    pub(super) fn index(&self, name: &str) -> Option<usize> {
        self.by_name.get(name).copied()
    }

    pub(super) fn vessel(&self, name: &str) -> Option<&Vessel> {
        self.vessels.get(*self.by_name.get(name)?)
    }

    /// The patterns of a vessel, the weightiest first.
    pub fn patterns(&self, vessel: &str) -> impl Iterator<Item = PatternId> {
        self.vessel(vessel).into_iter().flat_map(|v| v.patterns.iter().map(|p| p.id))
    }

    /// What the other rows say of the gyro's error at the time of the row `number`, for a row on which it was not observed.
    pub fn gyro_run(&self, names: Names, number: u64) -> Option<GyroRun> {
        let vessel = self.vessel(names.vessel)?;
        let at = vessel.place_of(number)?;
        let fact = vessel.facts.get(at)?;
        let (error_deg, scatter_deg) = vessel.expected(at, fact.gyro)?;
        let gyro = vessel.gyro_of(fact.gyro)?;
        let observed = |f: &&super::fact::Fact| {
            f.gyro_error_deg().is_some() && vessel.gyro_of(f.gyro).is_some_and(|g| g.name == gyro.name) && f.seconds().is_some()
        };
        let last = vessel.facts.get(..at)?.iter().rev().take(512).find(observed)?;
        let age_h = (fact.seconds()? - last.seconds()?) as f64 / 3600.0;
        // The run is known better than one reading scatters: half of it is the ship's and the gyro's own.
        Some(GyroRun { error: GyroError::wrapping_deg(error_deg), u_deg: scatter_deg * 0.5, age_h: age_h.max(0.0) })
    }
}
