//! Results as text, rows and pictures: content as data in, bytes out. Nothing is computed anew here.

pub mod amplitude;
pub mod azimuth;
mod column;
pub mod fixed;
pub mod rows;
mod words;
