//! One bearing of the sun worked to the errors of both compasses, with the uncertainty of each.
//!
//! `cargo run --example azimuth`

use shadowpin::angle::{CompassBearing, GyroBearing, Position, Reading};
use shadowpin::compass::{Observation, Place, Target, work};
use shadowpin::limits::Limits;
use shadowpin::sky::Body;
use shadowpin::time::text::read_utc;

fn main() -> Result<(), Box<dyn std::error::Error>> {
    let mut sight = Observation::of(Target::Body(Body::Sun));
    sight.moment = Some(read_utc("2026-06-14T06:12:30Z")?);
    let position = Position::from_deg(-36.097, 130.56).ok_or("no such place")?;
    sight.place = Some(Place { position, step_deg: 0.001 });
    // Bearings as read, in steps of half a degree.
    sight.gyro_bearing = Some(Reading::new(GyroBearing::wrapping_deg(318.5), 0.5));
    sight.compass_bearing = Some(Reading::new(CompassBearing::wrapping_deg(315.5), 0.5));

    let worked = work(&sight, None, &Limits::default());
    let azimuth = worked.true_azimuth.ok_or("there is no azimuth there")?;
    println!("azimuth {:.1}", azimuth.deg());
    for (what, value) in [
        ("gyro error", worked.gyro_error.map(|e| (e.value.deg(), e.u_deg()))),
        ("compass error", worked.compass_error.map(|e| (e.value.deg(), e.u_deg()))),
        ("variation", worked.variation.map(|v| (v.value.deg(), v.u_deg()))),
        ("deviation", worked.deviation.map(|d| (d.value.deg(), d.u_deg()))),
    ] {
        if let Some((deg, u)) = value {
            println!("{what} {:.1} {} (u {u:.1})", deg.abs(), if deg < 0.0 { "W" } else { "E" });
        }
    }
    Ok(())
}
