//! Small phrases that several pages share.

use crate::time::text::write as time_text;
use crate::time::{UtcInstant, Zone};

/// An uncertainty beside a figure: `u 0.4`; two decimals under 0.1, so that a small one is not shown as nothing.
pub fn u(u_deg: f64) -> String {
    if u_deg > 0.0 && u_deg < 0.005 {
        "u under 0.01".to_owned()
    } else if u_deg < 0.095 {
        format!("u {u_deg:.2}")
    } else {
        format!("u {u_deg:.1}")
    }
}

/// When, in UTC and, where a zone is given, in ship's time.
pub fn when(utc: UtcInstant, zone: Option<Zone>) -> String {
    let universal = format!("{} UTC", time_text::date_time(utc));
    match zone {
        Some(zone) if zone != Zone::UTC => {
            format!("{universal}   ship's time {} (zone {})", time_text::ship_date_time(utc, zone), time_text::zone(zone))
        }
        _ => universal,
    }
}

/// `N` or `S` for a figure that is north + (`S` only where it is south by more than nothing).
pub fn north_south(value: f64) -> char {
    if value < 0.0 { 'S' } else { 'N' }
}
