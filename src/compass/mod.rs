//! Errors of the gyrocompass and the magnetic compass.

pub mod field;
