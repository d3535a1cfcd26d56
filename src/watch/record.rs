//! The last entries, as a list and as figures for a strip along the foot.

use super::before::{Before, Kept};
use crate::angle::Latitude;
use crate::angle::text::write::{direction, east_west, low_high};
use crate::compass::gyro::limit::gyro_limit_deg;
use crate::limits::Limits;
use crate::time::text::write::to_the_minute;
use serde_json::{Value, json};

/// Entries shown.
const SHOWN: usize = 30;

/// The last thirty, oldest first; the limit of the gyro error goes with the latitude.
pub(super) fn record(before: &[&Before], latitude: Option<Latitude>, limits: &Limits) -> Value {
    let mut last: Vec<&Before> = before.to_vec();
    last.sort_by_key(|b| b.utc);
    let last = last.split_off(last.len().saturating_sub(SHOWN));
    let entries: Vec<Value> = last
        .iter()
        .map(|b| {
            json!({
                "when": to_the_minute(b.utc),
                "body": b.body,
                "gyro_error": b.gyro_error_deg.map(low_high),
                "compass_error": b.compass_error_deg.map(east_west),
                "deviation": b.deviation_deg.map(east_west),
                "compass_heading": b.compass_heading.map(|h| direction(h.deg(), 1)),
                "gyro_error_deg": b.gyro_error_deg,
                "deviation_deg": b.deviation_deg,
                "kept": if b.kept == Kept::Book { "book" } else { "here" },
            })
        })
        .collect();
    let gyro_limit_deg = latitude.map(|lat| gyro_limit_deg(lat, limits));
    let words =
        [words("gyro error", &last, |b| b.gyro_error_deg.map(low_high)), words("deviation", &last, |b| b.deviation_deg.map(east_west))];
    json!({
        "entries": entries,
        "strip": {"gyro_limit_deg": gyro_limit_deg, "deviation_limit_deg": limits.thresholds.deviation_deg, "words": words.join(" ")},
    })
}

/// The strip for those who cannot see it.
fn words(what: &str, last: &[&Before], text: impl Fn(&Before) -> Option<String>) -> String {
    let figures: Vec<String> = last.iter().filter_map(|b| text(b)).collect();
    match figures.len() {
        0 => format!("No {what} on record."),
        1 => format!("The only {what} on record: {}.", figures.concat()),
        count => format!("The last {count} {what}s, oldest first: {}.", figures.join(", ")),
    }
}
