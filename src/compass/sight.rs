//! One bearing by magnetic compass, of a body or of a charted mark, to a deviation.

use crate::angle::{CompassBearing, Deviation, Position, TrueBearing, Variation};
use crate::error::NoAnswer;
use crate::horizon;
use crate::sky::sun;
use crate::time::UtcInstant;

/// What a bearing was taken of.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Sighted {
    /// A mark or range, of this true bearing.
    Mark(TrueBearing),
    /// The sun.
    Sun,
}

/// The deviation that a bearing by magnetic compass shows: true bearing - compass bearing - variation, east +.
///
/// Error bound: that of the azimuth; the variation comes with its own u.
///
/// # Errors
/// [`NoAnswer`] where the body has no azimuth.
pub fn deviation(
    sighted: Sighted,
    bearing: CompassBearing,
    position: Position,
    utc: UtcInstant,
    variation: Variation,
) -> Result<Deviation, NoAnswer> {
    let true_bearing = match sighted {
        Sighted::Mark(charted) => charted,
        Sighted::Sun => horizon::horizontal(&sun::apparent_place(utc), position)?.azimuth,
    };
    Ok((true_bearing - bearing) - variation)
}
