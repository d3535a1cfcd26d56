//! What an observer sees: altitude and azimuth, amplitude, rising and setting, twilight, and how fast they change.

mod amplitude;
mod crossing;
mod direct;
mod events;
mod hand;
mod ladder;
mod observer;
mod refraction;
mod sensitivity;
mod triangle;

pub use amplitude::{
    Amplitude, AmplitudeAnswer, HorizonLine, Limb, RisingOrSetting, SUN_DIAMETER_DEG, amplitude_at_altitude,
    height_above_visible_horizon_deg,
};
pub use events::{DAY_SPAN_S, HorizonEvent, Search, Target, Twilight, events_between, nearest_event, next_event, previous_event};
pub use hand::{Abc, HandWorking, by_hand};
pub use ladder::{Rung, ladder, limb_diameters, watched_limb};
pub use observer::{Horizontal, altitude_deg, geocentric_altitude_deg, horizontal, lha_deg};
pub use refraction::{dip_deg, refraction_from_apparent_deg, refraction_from_true_deg};
pub use sensitivity::{Motion, Sensitivity, azimuth_per_altitude_on_horizon, sensitivity};
pub use triangle::{parallactic_angle_deg, triangle};

use crate::error::NoAnswer;

/// Nearer to the zenith than this, degrees, there is no azimuth: the few seconds of arc that an almanac place is good for
/// would turn it by degrees.
pub const ZENITH_DEG: f64 = 0.01;

/// Nearer to a pole than this, degrees (110 m), there is no azimuth: a ship's length of position would turn it by degrees.
pub const POLE_DEG: f64 = 0.001;

/// Refuses a pole and a zenith, in that order.
fn has_azimuth(latitude_deg: f64, altitude_deg: f64) -> Result<(), NoAnswer> {
    if latitude_deg.abs() > 90.0 - POLE_DEG {
        Err(NoAnswer::Pole { latitude_deg })
    } else if altitude_deg.abs() > 90.0 - ZENITH_DEG {
        Err(NoAnswer::Zenith { altitude_deg })
    } else {
        Ok(())
    }
}
