//! What a gyrocompass does of itself: speed error, settling, and the limits it is held to.

pub mod limit;
pub mod settle;
pub mod speed;
