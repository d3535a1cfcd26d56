//! The log: its columns and their reading; and what the ship's instruments say.

pub mod card;
pub mod columns;
pub mod entry;
mod figures;
pub mod gather;
pub mod log;
pub mod names;
pub mod nmea;
pub mod runup;
pub mod sheet;
pub mod swing;
mod table;

pub use figures::read_day;
pub use table::TableForm;
