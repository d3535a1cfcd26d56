//! Errors of the gyrocompass and the magnetic compass.
