//! Results as text, rows and pictures: content as data in, bytes out. Nothing is computed anew here.

pub mod against;
pub mod amplitude;
pub mod azimuth;
pub mod book_check;
pub mod book_page;
pub mod card;
pub mod chart;
mod column;
pub mod columns;
mod figure;
pub mod fixed;
pub mod limits;
pub mod log_rows;
pub mod nmea;
pub mod plan;
pub mod review_text;
pub mod rows;
pub mod settle;
pub mod swing;
pub mod variation;
pub mod without_body;
mod words;
