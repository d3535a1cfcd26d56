//! Errors of the gyrocompass and the magnetic compass: one observation worked, variation, deviation, the gyro.

mod budget;
pub mod card;
pub mod curve;
mod direction;
mod doubts;
pub mod field;
pub mod gyro;
mod observation;
mod trust;
mod work;

pub use budget::{Budget, step_u};
pub use direction::almanac_u_deg;
pub use doubts::doubts;
pub use observation::{GyroType, HorizonKind, Observation, Place, Target, Whereabouts};
pub use trust::{FAIR_U_DEG, FIRM_U_DEG, Trust};
pub use work::{Figure, GyroRun, OnHorizon, Worked, work};
