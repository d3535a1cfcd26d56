//! Errors of the gyrocompass and the magnetic compass.

pub mod card;
pub mod curve;
pub mod field;
pub mod sight;
