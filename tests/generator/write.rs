//! The log as a file.

use super::ship::Ship;
use super::voyage::{Entry, Style, voyage};
use chrono::DateTime;

/// How time is written, and which columns are not kept.
#[derive(Debug, Clone, Copy, Default)]
pub struct Columns<'a> {
    /// As a ship writes it: positions in degrees and minutes with names, times to the minute, the instruments named.
    pub by_hand: bool,
    /// Ship's time and zone instead of UTC.
    pub ship_time: bool,
    /// Names left out.
    pub without: &'a [&'a str],
}

/// A log with its entries, in the order written.
pub struct Log {
    pub entries: Vec<Entry>,
}

impl Log {
    /// The voyages of these vessels, one after another, or mixed in order of time as a fleet's server gets them.
    pub fn of(ships: &[Ship], style: Style, mixed: bool) -> Self {
        let mut entries: Vec<Entry> = ships.iter().flat_map(|ship| voyage(ship, style)).collect();
        if mixed {
            // Turn and turn about, so that a wrong time does not move a row.
            let mut turns: Vec<(usize, usize)> = Vec::new();
            let mut seen: std::collections::HashMap<String, usize> = std::collections::HashMap::new();
            for (at, entry) in entries.iter().enumerate() {
                let turn = seen.entry(entry.vessel.clone()).or_default();
                turns.push((*turn, at));
                *turn += 1;
            }
            turns.sort_unstable();
            entries = turns.into_iter().map(|(_, at)| entries[at].clone()).collect();
        }
        Self { entries }
    }
}

fn number(value: Option<f64>, decimals: usize) -> String {
    value.map_or(String::new(), |v| format!("{:.decimals$}", v + 0.0))
}

/// Whether the slip of `entry` shows in any column that is kept.
pub fn shows(entry: &Entry, columns: Columns) -> bool {
    entry
        .truth
        .without
        .as_ref()
        .is_some_and(|without| names(columns).iter().any(|name| cell(entry, name, columns) != cell(without, name, columns)))
}

fn names(columns: Columns<'_>) -> Vec<&str> {
    let time = if columns.ship_time { &["ship_time", "zone"][..] } else { &["utc"][..] };
    let rest = [
        "lat",
        "lon",
        "body",
        "method",
        "horizon",
        "eye_height_m",
        "mark",
        "charted_bearing",
        "repeater",
        "gyro_bearing",
        "compass_bearing",
        "gyro_heading",
        "compass_heading",
        "speed_kn",
        "logged_azimuth",
        "logged_gyro_error",
        "logged_compass_error",
        "logged_variation",
        "logged_deviation",
        "observer",
        "remarks",
    ];
    let instruments = if columns.by_hand { &["gyro", "magnetic_compass"][..] } else { &[][..] };
    ["vessel"].iter().chain(time).chain(instruments).chain(rest.iter()).copied().filter(|name| !columns.without.contains(name)).collect()
}

/// The log as CSV.
pub fn csv(log: &Log, columns: Columns) -> String {
    let kept = names(columns);
    let mut writer = csv::Writer::from_writer(Vec::new());
    writer.write_record(&kept).unwrap();
    for e in &log.entries {
        let cells: Vec<String> = kept.iter().map(|name| cell(e, name, columns)).collect();
        writer.write_record(&cells).unwrap();
    }
    String::from_utf8(writer.into_inner().unwrap()).unwrap()
}

fn cell(e: &Entry, name: &str, columns: Columns) -> String {
    if columns.by_hand
        && let Some(cell) = by_hand(e, name)
    {
        return cell;
    }
    match name {
        "vessel" => e.vessel.clone(),
        "utc" => DateTime::from_timestamp(e.unix_s, 0).unwrap().format("%Y-%m-%dT%H:%M:%SZ").to_string(),
        "ship_time" => DateTime::from_timestamp(e.unix_s - e.zone_h * 3600, 0).unwrap().format("%Y-%m-%dT%H:%M:%S").to_string(),
        "zone" => format!("{:+}", e.zone_h),
        "lat" => format!("{:.3}", e.lat),
        "lon" => format!("{:.3}", e.lon),
        "body" => e.body.map_or(String::new(), |b| b.name().to_owned()),
        "method" => e.method.to_owned(),
        "horizon" => e.horizon.to_owned(),
        "eye_height_m" => {
            if e.body.is_some() {
                format!("{:.0}", e.eye_height_m)
            } else {
                String::new()
            }
        }
        "mark" => e.mark.map_or(String::new(), |(name, _)| name.to_owned()),
        "charted_bearing" => number(e.mark.map(|(_, bearing)| bearing), 1),
        "repeater" => e.repeater.to_owned(),
        "gyro_bearing" => number(e.gyro_bearing, 1),
        "compass_bearing" => number(e.compass_bearing, 1),
        "gyro_heading" => number(e.gyro_heading, 1),
        "compass_heading" => number(e.compass_heading, 1),
        "speed_kn" => format!("{:.1}", e.speed_kn),
        "logged_azimuth" => number(e.azimuth, 1),
        "logged_gyro_error" => number(e.gyro_error, 1),
        "logged_compass_error" => number(e.compass_error, 1),
        "logged_variation" => number(e.variation, 1),
        "logged_deviation" => number(e.deviation, 1),
        "observer" => e.observer.to_owned(),
        "remarks" => e.remarks.to_owned(),
        _ => String::new(),
    }
}

/// The cells that a ship writes in another form.
fn by_hand(e: &Entry, name: &str) -> Option<String> {
    use shadowpin::angle::text::write;
    let place = super::voyage::position(e.lat, e.lon);
    Some(match name {
        "utc" => DateTime::from_timestamp((e.unix_s + 30).div_euclid(60) * 60, 0)?.format("%Y-%m-%d %H:%M").to_string(),
        "lat" => write::latitude(place.lat),
        "lon" => write::longitude(place.lon),
        "gyro" if e.method != "none" => "No.1".to_owned(),
        "magnetic_compass" if e.compass_heading.is_some() => "standard".to_owned(),
        _ => return None,
    })
}
