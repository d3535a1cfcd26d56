//! Run-ups of gyros.

mod made;
mod runups;

use shadowpin::compass::gyro::settle::RunUpReading;

/// Readings from minutes and errors.
pub fn readings(pairs: &[(f64, f64)]) -> Vec<RunUpReading> {
    pairs
        .iter()
        .enumerate()
        .map(|(i, (minutes, error_deg))| RunUpReading { row: i + 1, minutes: *minutes, error_deg: *error_deg })
        .collect()
}
