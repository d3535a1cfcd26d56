//! What the ship's instruments say, as texts for the cells they belong to.

use crate::angle::text::write::direction;
use crate::logbook::nmea::{ClockCheck, Found, FromBridge};
use crate::time::text::write::iso;
use serde_json::{Value, json};

/// Each cell that the instruments can fill: `field`, `text`, `from` (the sentence and its age), and, where it must not be taken, `why_not`;
/// then what does not agree.
pub fn heard(found: &FromBridge, clock: Option<ClockCheck>) -> Value {
    let far_off = clock.filter(|c| c.refuses()).map(|c| c.to_string());
    let mut items = Vec::new();
    if let Some(time) = &found.time {
        items.push(item("utc", "time", iso(time.value.utc), time, far_off));
    }
    if let Some(place) = &found.position {
        let position = place.value.position;
        items.push(item("lat", "latitude", degrees_minutes(position.lat.deg(), 2, ['N', 'S']), place, None));
        items.push(item("lon", "longitude", degrees_minutes(position.lon.deg(), 3, ['E', 'W']), place, None));
    }
    if let Some(heading) = &found.gyro_heading {
        items.push(item("gyro_heading", "gyro heading", direction(heading.value.value.deg(), 1), heading, None));
    }
    if let Some(heading) = &found.compass_heading {
        items.push(item("compass_heading", "compass heading", direction(heading.value.value.deg(), 1), heading, None));
    }
    if let Some(speed) = &found.speed_kn {
        items.push(item("speed_kn", "speed", format!("{:.1}", speed.value), speed, None));
    }
    let mut doubts: Vec<String> = found.doubts.iter().map(ToString::to_string).collect();
    doubts.extend(clock.filter(|c| matches!(c, ClockCheck::Apart { .. })).map(|c| c.to_string()));
    json!({"items": items, "doubts": doubts})
}

fn item<T>(field: &str, name: &str, text: String, found: &Found<T>, far_off: Option<String>) -> Value {
    let age = found.age_s.map_or_else(|| "of unknown age".to_owned(), |age| format!("{age:.0} s old"));
    let about = if found.about.is_empty() { String::new() } else { format!("; {}", found.about) };
    let why_not = far_off.or_else(|| found.stale.then(|| format!("too old: {age}")));
    json!({"field": field, "name": name, "text": text, "from": format!("{}, {age}{about}", found.from), "why_not": why_not})
}

/// `36-05.812S`: to a thousandth of a minute, as a receiver says it, with the name that reading asks for.
fn degrees_minutes(deg: f64, width: usize, [plus, minus]: [char; 2]) -> String {
    let thousandths = (deg.abs() * 60_000.0).round() as u64;
    let (whole, rest) = (thousandths / 60_000, thousandths % 60_000);
    format!("{whole:0width$}-{:06.3}{}", rest as f64 / 1000.0, if deg < 0.0 { minus } else { plus })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::text::{read_latitude, read_longitude};

    #[test]
    fn degrees_and_minutes_read_back() {
        assert_eq!(degrees_minutes(-36.096_866_7, 2, ['N', 'S']), "36-05.812S");
        assert_eq!(degrees_minutes(9.999_999_9, 3, ['E', 'W']), "010-00.000E");
        assert!((read_latitude("36-05.812S").unwrap().value.deg() + 36.096_866_7).abs() < 1e-6);
        assert!((read_longitude(&degrees_minutes(-0.05, 3, ['E', 'W'])).unwrap().value.deg() + 0.05).abs() < 1e-6);
    }
}
