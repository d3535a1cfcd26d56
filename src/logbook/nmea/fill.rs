//! The gaps of an observation filled from the stream.

use super::bridge::FromBridge;
use super::clock::ClockCheck;
use super::latest::Found;
use crate::compass::Observation;

/// What a stream can fill.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Item {
    /// Time of UTC.
    Time,
    /// Position.
    Position,
    /// Ship's head by gyro.
    GyroHeading,
    /// Ship's head by magnetic compass.
    CompassHeading,
    /// Speed.
    Speed,
}

impl Item {
    /// All of them.
    pub const ALL: [Self; 5] = [Self::Time, Self::Position, Self::GyroHeading, Self::CompassHeading, Self::Speed];

    /// What a person calls it.
    pub fn name(self) -> &'static str {
        match self {
            Self::Time => "time",
            Self::Position => "position",
            Self::GyroHeading => "gyro heading",
            Self::CompassHeading => "compass heading",
            Self::Speed => "speed",
        }
    }
}

/// What became of it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Fill {
    /// Taken from the stream.
    Taken,
    /// Given by hand, which goes before the stream.
    ByHand,
    /// Too old.
    Stale,
    /// By this computer's clock it cannot be right.
    ClockFarOff,
    /// The stream does not say it.
    Absent,
}

impl FromBridge {
    /// Fills what `observation` lacks of the items wanted, and answers what became of each; what it has stays.
    ///
    /// A stale figure is not taken, nor a time that [`ClockCheck::refuses`].
    pub fn fill(&self, observation: &mut Observation, wanted: &[Item], clock: Option<ClockCheck>) -> Vec<(Item, Fill)> {
        let far_off = clock.is_some_and(ClockCheck::refuses);
        let mut one = |item: &Item| match item {
            Item::Time => match put(&mut observation.moment, self.time.filter(|_| !far_off)) {
                Fill::Absent if self.time.is_some() => Fill::ClockFarOff,
                fill => fill,
            },
            Item::Position => put(&mut observation.place, self.position),
            Item::GyroHeading => put(&mut observation.gyro_heading, self.gyro_heading),
            Item::CompassHeading => put(&mut observation.compass_heading, self.compass_heading),
            Item::Speed => put(&mut observation.speed_kn, self.speed_kn),
        };
        wanted.iter().map(|item| (*item, one(item))).collect()
    }

    /// Whether the stream has a fresh figure for an item.
    pub fn has_fresh(&self, item: Item) -> bool {
        match item {
            Item::Time => self.time.is_some_and(|f| !f.stale),
            Item::Position => self.position.is_some_and(|f| !f.stale),
            Item::GyroHeading => self.gyro_heading.is_some_and(|f| !f.stale),
            Item::CompassHeading => self.compass_heading.is_some_and(|f| !f.stale),
            Item::Speed => self.speed_kn.is_some_and(|f| !f.stale),
        }
    }
}

fn put<T: Copy>(slot: &mut Option<T>, found: Option<Found<T>>) -> Fill {
    match (&slot, found) {
        (Some(_), _) => Fill::ByHand,
        (None, None) => Fill::Absent,
        (None, Some(found)) if found.stale => Fill::Stale,
        (None, Some(found)) => {
            *slot = Some(found.value);
            Fill::Taken
        }
    }
}
