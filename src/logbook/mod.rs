//! The log: its columns and their reading.

pub mod card;
mod figures;
pub mod swing;
mod table;

pub use figures::read_day;
