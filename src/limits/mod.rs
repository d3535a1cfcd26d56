//! Every threshold and uncertainty, with its origin: one table that the defaults, the reader of the limits file and the list
//! of limits are all made from.

mod near;
mod read;
mod settings;

pub use near::nearest;
pub use settings::{Limits, SETTINGS, Setting, Ship, Table, Thresholds, Uncertainty, Watches};
