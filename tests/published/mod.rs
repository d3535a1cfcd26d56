//! Values from outside sources, one file a source; nothing else in the tests holds outside numbers.
//!
//! The files they read stand in `fixtures/published`; `fixtures/README.md` names the source of each.

mod pub226;
mod wmm2025;

/// A published file as delivered: its path below `fixtures/published`.
pub fn file(name: &str) -> String {
    let path = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("fixtures/published").join(name);
    std::fs::read_to_string(&path).unwrap_or_else(|e| panic!("{}: {e}", path.display()))
}

mod azimuth_table;
mod gyro_speed;
mod jpl_bodies;
mod jpl_rise_set;
mod jpl_sun;
mod worked_errors;
mod worked_examples;
