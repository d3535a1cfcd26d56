//! What shows in many entries of a vessel together.

use crate::time::UtcInstant;

/// The kinds of pattern.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum PatternId {
    /// One slip explains nearly all affected rows.
    SameSlipThroughout,
    /// The gyro error jumps at an instant.
    GyroStep,
    /// The gyro error follows V cos C / cos lat.
    SpeedCorrectorOff,
    /// The gyro error follows tan lat.
    LatitudeCorrectorOff,
    /// Repeaters disagree.
    RepeaterDiffers,
    /// The error grows with tan altitude.
    AzimuthCircleTilt,
    /// The deviation is off by a constant on every heading.
    ConstantA,
    /// The logged variation is of an older year, or off by a constant.
    VariationStale,
    /// Risings and settings follow the visible horizon.
    VisibleHorizon,
    /// Errors scatter less than readings can.
    TooRegular,
    /// Watches under way have no entry.
    WatchesWithoutEntry,
}

impl PatternId {
    /// All of them, the weightiest first.
    pub const ALL: [Self; 11] = [
        Self::SameSlipThroughout,
        Self::GyroStep,
        Self::SpeedCorrectorOff,
        Self::LatitudeCorrectorOff,
        Self::RepeaterDiffers,
        Self::AzimuthCircleTilt,
        Self::ConstantA,
        Self::VariationStale,
        Self::VisibleHorizon,
        Self::TooRegular,
        Self::WatchesWithoutEntry,
    ];

    /// The id.
    pub fn id(self) -> &'static str {
        match self {
            Self::SameSlipThroughout => "same-slip-throughout",
            Self::GyroStep => "gyro-step",
            Self::SpeedCorrectorOff => "speed-corrector-off",
            Self::LatitudeCorrectorOff => "latitude-corrector-off",
            Self::RepeaterDiffers => "repeater-differs",
            Self::AzimuthCircleTilt => "azimuth-circle-tilt",
            Self::ConstantA => "constant-a",
            Self::VariationStale => "variation-stale",
            Self::VisibleHorizon => "visible-horizon",
            Self::TooRegular => "too-regular",
            Self::WatchesWithoutEntry => "watches-without-entry",
        }
    }
}

/// A pattern of one vessel.
#[derive(Debug, Clone, PartialEq)]
pub struct Pattern {
    /// Which.
    pub id: PatternId,
    /// One sentence: a question with the innocent causes first, then what was measured.
    pub detail: String,
    /// Since when, where it began at an instant.
    pub since: Option<UtcInstant>,
}

/// A pattern that the data do not allow to be judged.
#[derive(Debug, Clone, PartialEq)]
pub struct NotEvaluated {
    /// Which.
    pub id: PatternId,
    /// Because.
    pub why: String,
}
