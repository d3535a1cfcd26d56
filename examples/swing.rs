//! Deviations observed on eight headings, the curve through them, and what it says between.
//!
//! `cargo run --example swing`

use shadowpin::angle::{CompassBearing, Deviation};
use shadowpin::compass::curve::{DeviationReading, fit};

fn main() -> Result<(), Box<dyn std::error::Error>> {
    let observed = [(0.0, 2.5), (45.0, 4.0), (90.0, 1.5), (135.0, -1.0), (180.0, -1.5), (225.0, -2.0), (270.0, -2.5), (315.0, -0.5)];
    let readings: Vec<DeviationReading> = observed
        .iter()
        .map(|&(heading, deviation)| DeviationReading {
            heading: CompassBearing::wrapping_deg(heading),
            deviation: Deviation::wrapping_deg(deviation),
            turn: None,
        })
        .collect();
    let curve = fit(&readings)?;
    for heading in (0..360).step_by(30) {
        match curve.on(CompassBearing::wrapping_deg(f64::from(heading))) {
            Some(on) => println!("{heading:03} {:+.1} (u {:.1})", on.deviation_deg, on.u_deg),
            None => println!("{heading:03} cannot be told"),
        }
    }
    Ok(())
}
