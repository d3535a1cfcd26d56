//! The log: its columns and their reading.

pub mod card;
mod figures;
pub mod swing;
mod table;
