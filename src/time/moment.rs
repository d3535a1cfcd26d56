//! An instant together with the step it is written in.

use super::instant::UtcInstant;

/// An instant as written: `06:12` is written in steps of a minute.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Moment {
    /// The instant.
    pub utc: UtcInstant,
    /// The step of the figure, seconds: 60 for HH:MM.
    pub step_s: f64,
}
