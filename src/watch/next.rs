//! What to take next.

use super::before::{Before, Names};
use crate::angle::text::write::direction;
use crate::angle::{GyroError, TrueBearing};
use crate::compass::work;
use crate::horizon::RisingOrSetting;
use crate::limits::Limits;
use crate::logbook::entry::Entry;
use crate::plan::{Ask, Plan, Track, plan};
use crate::report::plan::PlanPage;
use crate::time::text::write as time_text;
use crate::time::{UtcInstant, Zone};
use serde_json::{Value, json};

/// Hours looked ahead: a watch.
const HOURS: f64 = 4.0;
/// Windows named; the text has the rest.
const NAMED: usize = 6;

/// The best windows and the risings and settings of the next watch; null without time and place.
///
/// The way is the gyro heading, corrected by the gyro error of this entry or the last of the record.
pub(super) fn next(entry: &Entry<'_>, limits: &Limits, before: &[&Before]) -> Value {
    let (Some(moment), Some(place)) = (entry.moment, entry.place) else { return Value::Null };
    let observation = entry.observation;
    let names = Names::of(entry);
    let last = before.iter().rev().filter(|b| b.names.same_gyro(&names)).find_map(|b| b.gyro_error_deg).map(GyroError::wrapping_deg);
    let gyro_error = observation.and_then(|o| work(&o, None, limits).gyro_error).map(|e| e.value).or(last);
    let heading = observation.and_then(|o| o.gyro_heading).map(|h| h.value);
    let course = heading.map(|h| gyro_error.map_or(TrueBearing::wrapping_deg(h.deg()), |e| h + e));
    let speed_kn = observation.and_then(|o| o.speed_kn).filter(|_| course.is_some()).unwrap_or(0.0);
    let ask = Ask {
        track: Track { from: moment.utc, position: place.position, course, speed_kn },
        hours: HOURS,
        eye_height_m: observation.and_then(|o| o.eye_height_m).unwrap_or(limits.uncertainty.eye_height_assumed_m),
        limits,
    };
    let plan = plan(&ask);
    let text = PlanPage { ask: &ask, plan: &plan, zone: entry.zone, gyro_error, compass_error: None, all: false }.text();
    json!({"list": list(&plan, entry.zone, gyro_error), "text": text})
}

/// The best few, in order of time.
fn list(plan: &Plan, zone: Option<Zone>, gyro_error: Option<GyroError>) -> Vec<Value> {
    let gyro = |azimuth: TrueBearing| gyro_error.map_or_else(String::new, |e| format!(", gyro {}", direction((azimuth - e).deg(), 1)));
    let mut list: Vec<(UtcInstant, Value)> = plan
        .windows
        .iter()
        .filter(|w| plan.rank(w) <= NAMED)
        .map(|w| {
            let text = format!(
                "azimuth {} to {}, altitude {:.0} to {:.0}, u {:.1}{}",
                direction(w.from.azimuth.deg(), 1),
                direction(w.to.azimuth.deg(), 1),
                w.from.altitude_deg + 0.0,
                w.to.altitude_deg + 0.0,
                w.u_deg,
                gyro(w.from.azimuth)
            );
            let when = format!("{} to {}", clock(w.from.utc, zone), clock(w.to.utc, zone));
            (w.from.utc, json!({"body": w.body.name(), "method": "azimuth", "when": when, "text": text, "best": plan.rank(w) == 1}))
        })
        .collect();
    list.extend(plan.horizon.iter().map(|h| {
        let (method, word) = if h.event == RisingOrSetting::Rising { ("rising", "rises") } else { ("setting", "sets") };
        let text = format!("{word}, azimuth {}{}", direction(h.azimuth.deg(), 1), gyro(h.azimuth));
        (h.utc, json!({"body": h.body.name(), "method": method, "when": clock(h.utc, zone), "text": text, "best": false}))
    }));
    list.sort_by_key(|(utc, _)| *utc);
    list.into_iter().map(|(_, value)| value).collect()
}

/// Hours and minutes of UTC, or of ship's time where its zone is known.
fn clock(utc: UtcInstant, zone: Option<Zone>) -> String {
    let nearest = UtcInstant::from_unix_ms((utc.unix_ms() + 30_000).div_euclid(60_000) * 60_000).unwrap_or(utc);
    time_text::ship_date_time(nearest, zone.unwrap_or(Zone::UTC)).get(11..16).unwrap_or_default().to_owned()
}
