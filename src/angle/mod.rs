//! Directions, signed errors and positions, each a type of its own, so that only subtractions that mean something
//! compile; and their reading and writing as text.

mod bearing;
mod degrees;
mod position;
mod reading;
mod signed;
pub mod text;

pub use bearing::{CompassBearing, GyroBearing, MagneticBearing, TrueBearing};
pub use degrees::{wrap_180_deg, wrap_360_deg};
pub use position::{Latitude, Longitude, Position};
pub use reading::Reading;
pub use signed::{CompassError, Deviation, GyroError, Variation};
