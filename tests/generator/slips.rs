//! Every slip of the review, put into an entry on purpose.

use super::Rng;
use super::ship::{Kind, Ship};
use super::voyage::{Entry, Style, Truth, deviation_deg, on_horizon, seen, stars, tenth, write_results};
use shadowpin::angle::{wrap_180_deg, wrap_360_deg};
use shadowpin::horizon::{HorizonLine, Limb, triangle};
use shadowpin::sky::{self, Body};

/// Where a slip sits.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Where {
    /// What is written is wrong, the results are right.
    Record,
    /// The record is right, the results are wrong.
    Working,
    /// The reading itself was wrong, and the results follow it.
    Both,
}

/// Every slip, with the places it is tried in.
pub const SLIPS: [(&str, Where); 48] = [
    ("hour", Where::Record),
    ("hour", Where::Working),
    ("clock-change", Where::Record),
    ("clock-change", Where::Working),
    ("half-day", Where::Record),
    ("half-day", Where::Working),
    ("zone-sign", Where::Record),
    ("zone-sign", Where::Working),
    ("ship-time-as-utc", Where::Record),
    ("ship-time-as-utc", Where::Working),
    ("day", Where::Record),
    ("year", Where::Record),
    ("date-swapped", Where::Record),
    ("date-swapped", Where::Working),
    ("latitude-name", Where::Record),
    ("latitude-name", Where::Working),
    ("longitude-name", Where::Record),
    ("longitude-name", Where::Working),
    ("stale-position", Where::Record),
    ("stale-position", Where::Working),
    ("body", Where::Record),
    ("body", Where::Working),
    ("declination-name", Where::Working),
    ("180-z", Where::Working),
    ("360-z", Where::Working),
    ("reciprocal", Where::Record),
    ("reciprocal", Where::Both),
    ("reciprocal", Where::Working),
    ("read-backwards", Where::Record),
    ("read-backwards", Where::Both),
    ("relative-bearing", Where::Record),
    ("relative-bearing", Where::Both),
    ("ten-degrees", Where::Record),
    ("ten-degrees", Where::Both),
    ("hundred-degrees", Where::Record),
    ("hundred-degrees", Where::Both),
    ("digits-swapped", Where::Record),
    ("digits-swapped", Where::Both),
    ("columns-swapped", Where::Record),
    ("columns-swapped", Where::Both),
    ("error-name", Where::Working),
    ("variation-name", Where::Working),
    ("card-by-bearing", Where::Working),
    ("arithmetic", Where::Working),
    ("horizon", Where::Record),
    ("horizon", Where::Working),
    // Twice, since it is the commonest.
    ("longitude-name", Where::Record),
    ("hour", Where::Working),
];

/// The azimuth that would be worked with these figures.
fn worked(entry: &Entry, body: Body, unix_s: i64, lat: f64, lon: f64) -> Option<f64> {
    if entry.method == "azimuth" {
        seen(body, unix_s, lat, lon).map(|(azimuth, _)| azimuth)
    } else {
        let line = line(entry, entry.horizon == "visible");
        on_horizon(body, entry.method == "rising", line, unix_s, lat, lon).map(|(azimuth, _)| azimuth)
    }
}

fn line(entry: &Entry, visible: bool) -> HorizonLine {
    if visible { HorizonLine::Visible { limb: Limb::Centre, eye_height_m: entry.eye_height_m } } else { HorizonLine::Celestial }
}

/// Days of the civil calendar from 1970-01-01 and back (proleptic Gregorian), by chrono.
fn day_month_exchanged(unix_s: i64) -> Option<i64> {
    use chrono::{DateTime, Datelike};
    let at = DateTime::from_timestamp(unix_s, 0)?;
    let swapped = at.with_day(1)?.with_month(at.day())?.with_day(at.month())?;
    (swapped != at).then(|| swapped.timestamp())
}

fn adjacent_digits_swapped(bearing: f64, rng: &mut Rng) -> Option<f64> {
    let whole = bearing.floor();
    let [h, t, u] = [(whole / 100.0).floor(), (whole / 10.0).floor() % 10.0, whole % 10.0];
    let forms: Vec<f64> = [h * 100.0 + u * 10.0 + t, t * 100.0 + h * 10.0 + u]
        .into_iter()
        .filter(|v| *v < 360.0 && *v != whole)
        .map(|v| v + bearing - whole)
        .collect();
    (!forms.is_empty()).then(|| rng.pick(&forms))
}

/// Puts one slip into `entry`, where one that applies is found.
pub fn inject(ship: &Ship, before: &[Entry], entry: &mut Entry, style: Style, rng: &mut Rng) {
    if matches!(ship.kind, Kind::SignConvention | Kind::ZoneSign | Kind::ShipTimeAsUtc) {
        return;
    }
    for _ in 0..20 {
        let (slip, place) = rng.pick(&SLIPS);
        let mut tried = entry.clone();
        if let Some(shift_deg) = apply(slip, place, ship, before, &mut tried, style, rng) {
            tried.truth = Truth { slip: Some(slip), place, shift_deg: shift_deg.abs(), without: Some(Box::new(entry.clone())) };
            *entry = tried;
            return;
        }
    }
}

fn apply(slip: &str, place: Where, ship: &Ship, before: &[Entry], e: &mut Entry, style: Style, rng: &mut Rng) -> Option<f64> {
    let (body, azimuth, variation) = (e.body?, e.azimuth?, e.variation?);
    let (gyro, compass) = (e.gyro_bearing?, e.compass_bearing?);
    let time = match slip {
        "hour" => Some(e.unix_s + 3600 * rng.pick(&[-1, 1])),
        "clock-change" => Some(e.unix_s + 60 * rng.pick(&[-40, -30, -20, 20, 30, 40])),
        "half-day" => Some(e.unix_s + 43_200 * rng.pick(&[-1, 1])),
        "zone-sign" if e.zone_h != 0 => Some(e.unix_s - 2 * e.zone_h * 3600),
        "ship-time-as-utc" if e.zone_h != 0 => Some(e.unix_s - e.zone_h * 3600),
        "day" => Some(e.unix_s + 86_400 * rng.pick(&[-1, 1])),
        "year" => Some(e.unix_s - 365 * 86_400),
        "date-swapped" => Some(day_month_exchanged(e.unix_s)?),
        _ => None,
    };
    let position = match slip {
        "latitude-name" => Some((-e.lat, e.lon)),
        "longitude-name" => Some((e.lat, -e.lon)),
        "stale-position" => {
            let old = before.iter().rev().nth(rng.pick(&[0, 1, 4, 5]))?;
            (old.truth.slip.is_none()).then_some((old.lat, old.lon))
        }
        _ => None,
    };
    if time.is_some() || position.is_some() {
        let (unix_s, (lat, lon)) = (time.unwrap_or(e.unix_s), position.unwrap_or((e.lat, e.lon)));
        let other = if e.method == "azimuth" {
            worked(e, body, unix_s, lat, lon)?
        } else {
            worked(e, body, unix_s, lat, lon).unwrap_or(azimuth + 20.0)
        };
        if place == Where::Record {
            (e.unix_s, e.lat, e.lon) = (unix_s, lat, lon);
        } else {
            write_results(e, wrap_360_deg(tenth(other)), variation);
        }
        return Some(wrap_180_deg(other - azimuth));
    }
    match slip {
        "body" => {
            let up: Vec<Body> = stars()
                .into_iter()
                .filter(|b| *b != body && seen(*b, e.unix_s, e.lat, e.lon).is_some_and(|(_, altitude)| altitude > 10.0))
                .collect();
            if up.is_empty() || e.method != "azimuth" || body == Body::Sun {
                return None;
            }
            let wrong = rng.pick(&up);
            let other = worked(e, wrong, e.unix_s, e.lat, e.lon)?;
            if place == Where::Record {
                e.body = Some(wrong);
            } else {
                write_results(e, wrap_360_deg(tenth(other)), variation);
            }
            Some(wrap_180_deg(other - azimuth))
        }
        "declination-name" | "180-z" | "360-z" => {
            let other = match slip {
                "180-z" => 180.0 - azimuth,
                "360-z" => 360.0 - azimuth,
                _ if e.method != "azimuth" => 180.0 - azimuth,
                _ => {
                    let sky = sky::apparent_place(body, super::voyage::instant(e.unix_s));
                    let lat = super::voyage::position(e.lat, e.lon).lat;
                    triangle(lat, -sky.declination_deg, sky.gha_deg + e.lon).ok()?.azimuth.deg()
                }
            };
            write_results(e, wrap_360_deg(tenth(wrap_360_deg(other))), variation);
            Some(wrap_180_deg(other - azimuth))
        }
        "reciprocal" if place == Where::Working => {
            write_results(e, wrap_360_deg(azimuth + 180.0), variation);
            Some(180.0)
        }
        "columns-swapped" => {
            (e.gyro_bearing, e.compass_bearing) = (Some(compass), Some(gyro));
            follow(e, place, azimuth, variation);
            Some(wrap_180_deg(gyro - compass))
        }
        "reciprocal" | "read-backwards" | "relative-bearing" | "ten-degrees" | "hundred-degrees" | "digits-swapped" => {
            let on_gyro = rng.chance(0.7);
            let (was, heading) = if on_gyro { (gyro, e.gyro_heading?) } else { (compass, e.compass_heading?) };
            let wrong = match slip {
                "reciprocal" => was + 180.0,
                "read-backwards" => 2.0 * (was / 10.0).round() * 10.0 - was,
                "relative-bearing" => was - heading,
                "ten-degrees" => was + 10.0 * rng.sign(),
                "hundred-degrees" => was + 100.0 * rng.sign(),
                _ => adjacent_digits_swapped(was, rng)?,
            };
            let wrong = wrap_360_deg(wrong);
            if (wrap_180_deg(wrong - was)).abs() < style.resolution_deg {
                return None;
            }
            if on_gyro {
                e.gyro_bearing = Some(wrong);
            } else {
                e.compass_bearing = Some(wrong);
            }
            follow(e, place, azimuth, variation);
            Some(wrap_180_deg(wrong - was))
        }
        "error-name" => {
            let was = e.gyro_error?;
            if was == 0.0 {
                return None;
            }
            e.gyro_error = Some(-was);
            Some(2.0 * was)
        }
        "variation-name" => {
            if variation == 0.0 {
                return None;
            }
            e.deviation = Some(tenth(wrap_180_deg(e.compass_error? + variation)));
            Some(2.0 * variation)
        }
        "card-by-bearing" => {
            let by_bearing = tenth(deviation_deg(ship.coefficients, compass));
            let shift = by_bearing - e.deviation?;
            e.deviation = Some(by_bearing);
            Some(shift)
        }
        "arithmetic" => {
            let by = rng.pick(&[1.0, 10.0]) * rng.sign();
            e.gyro_error = Some(tenth(e.gyro_error? + by));
            Some(by)
        }
        "horizon" if e.method != "azimuth" => {
            let other = on_horizon(body, e.method == "rising", line(e, e.horizon != "visible"), e.unix_s, e.lat, e.lon)?.0;
            if place == Where::Record {
                e.horizon = if e.horizon == "visible" { "celestial" } else { "visible" };
            } else {
                write_results(e, wrap_360_deg(tenth(other)), variation);
            }
            Some(wrap_180_deg(other - azimuth))
        }
        _ => None,
    }
}

/// Results that follow a wrong reading, or stay right.
fn follow(e: &mut Entry, place: Where, azimuth: f64, variation: f64) {
    if place == Where::Both {
        write_results(e, azimuth, variation);
    }
}
