//! Logs of invented vessels with known truth: voyages, bearings with noise, and every slip of the review put in on purpose.
//!
//! Azimuths and variation are the library's own, which other tests hold against outside values; what is tested with these logs is
//! the review.

mod demo;
mod rng;
mod ship;
mod slips;
mod voyage;
mod write;

pub use rng::Rng;
pub use ship::{Kind, Ship};
pub use slips::Where;
pub use voyage::Style;
pub use write::{Columns, Log, csv, shows};
