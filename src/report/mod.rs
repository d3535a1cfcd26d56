//! Results as rows and text.

mod figure;
pub mod swing;
pub mod variation;
