//! A voyage: the track, the sky over it, the bearings taken and what the officers made of them.

use super::ship::{Kind, Ship};
use super::slips;
use super::{Rng, Where};
use shadowpin::angle::{Position, wrap_180_deg, wrap_360_deg};
use shadowpin::compass::field;
use shadowpin::horizon::{self, HorizonLine, Limb, RisingOrSetting, Search, Target, nearest_event};
use shadowpin::sky::{self, Body, Planet};
use shadowpin::time::UtcInstant;

/// How a log is kept.
#[derive(Debug, Clone, Copy)]
pub struct Style {
    /// Entries (with those that say none could be had).
    pub entries: usize,
    /// Bearings and headings are read to this, degrees.
    pub resolution_deg: f64,
    pub gyro_noise_deg: f64,
    pub compass_noise_deg: f64,
    /// Share of observations with a slip.
    pub slips: f64,
    /// Bearings of charted marks are taken when the sky is hidden.
    pub marks: bool,
}

impl Default for Style {
    fn default() -> Self {
        Self { entries: 260, resolution_deg: 0.5, gyro_noise_deg: 0.3, compass_noise_deg: 0.7, slips: 0.06, marks: true }
    }
}

/// What was so, whatever was written.
#[derive(Debug, Clone)]
pub struct Truth {
    pub slip: Option<&'static str>,
    pub place: Where,
    /// What the slip moves, degrees.
    pub shift_deg: f64,
    /// The entry as it would be without.
    pub without: Option<Box<Entry>>,
}

/// One entry as written.
#[derive(Debug, Clone)]
pub struct Entry {
    pub vessel: String,
    pub repeater: &'static str,
    pub unix_s: i64,
    pub zone_h: i64,
    pub lat: f64,
    pub lon: f64,
    pub body: Option<Body>,
    pub method: &'static str,
    pub horizon: &'static str,
    pub eye_height_m: f64,
    pub mark: Option<(&'static str, f64)>,
    pub gyro_bearing: Option<f64>,
    pub compass_bearing: Option<f64>,
    pub gyro_heading: Option<f64>,
    pub compass_heading: Option<f64>,
    pub speed_kn: f64,
    pub azimuth: Option<f64>,
    pub gyro_error: Option<f64>,
    pub compass_error: Option<f64>,
    pub variation: Option<f64>,
    pub deviation: Option<f64>,
    pub observer: &'static str,
    pub remarks: &'static str,
    pub truth: Truth,
}

pub fn instant(unix_s: i64) -> UtcInstant {
    UtcInstant::from_unix_ms(unix_s * 1000).unwrap()
}

pub fn position(lat: f64, lon: f64) -> Position {
    Position::from_deg(lat, wrap_180_deg(lon)).unwrap()
}

/// Azimuth and altitude of a body.
pub fn seen(body: Body, unix_s: i64, lat: f64, lon: f64) -> Option<(f64, f64)> {
    let place = sky::apparent_place(body, instant(unix_s));
    horizon::horizontal(&place, position(lat, lon)).ok().map(|h| (h.azimuth.deg(), h.altitude_deg))
}

/// Azimuth on the horizon nearest to that time, and when.
pub fn on_horizon(body: Body, rising: bool, line: HorizonLine, unix_s: i64, lat: f64, lon: f64) -> Option<(f64, i64)> {
    let event = if rising { RisingOrSetting::Rising } else { RisingOrSetting::Setting };
    let found = nearest_event(|t| sky::apparent_place(body, t), position(lat, lon), Target::Horizon(line), event, instant(unix_s));
    let Search::At(at) = found else { return None };
    let azimuth = horizon::horizontal(&at.place, position(lat, lon)).ok()?.azimuth.deg();
    Some((azimuth, at.utc.unix_ms() / 1000))
}

pub fn deviation_deg(coefficients: [f64; 5], heading_deg: f64) -> f64 {
    let (s, c) = heading_deg.to_radians().sin_cos();
    let (s2, c2) = (2.0 * heading_deg).to_radians().sin_cos();
    let [a, b, cc, d, e] = coefficients;
    a + b * s + cc * c + d * s2 + e * c2
}

pub fn round_to(value: f64, step: f64) -> f64 {
    (value / step).round() * step
}

fn round_bearing(deg: f64, step: f64) -> f64 {
    wrap_360_deg(round_to(wrap_360_deg(deg), step))
}

pub fn tenth(deg: f64) -> f64 {
    (deg * 10.0).round() / 10.0
}

const STARS: [&str; 24] = [
    "Achernar",
    "Acrux",
    "Aldebaran",
    "Altair",
    "Antares",
    "Arcturus",
    "Betelgeuse",
    "Canopus",
    "Capella",
    "Deneb",
    "Fomalhaut",
    "Hadar",
    "Pollux",
    "Procyon",
    "Regulus",
    "Rigel",
    "Rigil Kentaurus",
    "Sirius",
    "Spica",
    "Vega",
    "Adhara",
    "Bellatrix",
    "Miaplacidus",
    "Shaula",
];

/// The stars that the log's officers know.
pub fn stars() -> Vec<Body> {
    STARS.iter().filter_map(|name| Body::from_name(name).ok()).collect()
}

/// What is taken at that moment, if the sky allows.
fn choose(unix_s: i64, lat: f64, lon: f64, rng: &mut Rng) -> Option<(Body, &'static str, i64)> {
    let (_, sun) = seen(Body::Sun, unix_s, lat, lon)?;
    if sun.abs() < 15.0 && rng.chance(0.85) {
        for rising in [true, false] {
            if let Some((_, at)) = on_horizon(Body::Sun, rising, HorizonLine::Celestial, unix_s, lat, lon)
                && (at - unix_s).abs() < 5400
            {
                return Some((Body::Sun, if rising { "rising" } else { "setting" }, at));
            }
        }
    }
    if sun > 3.0 {
        return (sun < 62.0).then_some((Body::Sun, "azimuth", unix_s));
    }
    if sun > -5.5 {
        return None;
    }
    let mut up: Vec<Body> = stars();
    up.extend([
        Body::Moon,
        Body::Planet(Planet::Venus),
        Body::Planet(Planet::Mars),
        Body::Planet(Planet::Jupiter),
        Body::Planet(Planet::Saturn),
    ]);
    up.retain(|b| seen(*b, unix_s, lat, lon).is_some_and(|(_, altitude)| (8.0..55.0).contains(&altitude)));
    (!up.is_empty()).then(|| (rng.pick(&up), "azimuth", unix_s))
}

/// The entries of one vessel.
pub fn voyage(ship: &Ship, style: Style) -> Vec<Entry> {
    let rng = &mut Rng::new(ship.seed);
    let (mut lat, mut lon) = ship.start;
    let mut now = ship.start_unix_s;
    let (mut course, mut speed) = (rng.between(0.0, 360.0), rng.between(10.0, 18.0));
    let (mut wander, mut local) = (rng.normal(0.12), rng.normal(0.26));
    let mut entries: Vec<Entry> = Vec::new();
    let step_entry = (style.entries as f64 * ship.step_at) as usize;
    while entries.len() < style.entries {
        // The next watch.
        let hours = 4.0 + rng.between(-0.5, 0.5);
        let skip = if ship.kind == Kind::WatchesMissing && rng.chance(0.6) { 4.0 * rng.between(1.0, 3.0).round() } else { 0.0 };
        let dt = ((hours + skip) * 3600.0) as i64;
        now += dt;
        if rng.chance(0.08) {
            course = rng.between(0.0, 360.0);
            speed = rng.between(10.0, 18.0);
        }
        let away = |course: f64| lat + speed * (dt as f64 / 3600.0) / 60.0 * course.to_radians().cos();
        if !(ship.lat_band.0..=ship.lat_band.1).contains(&away(course)) {
            course = wrap_360_deg(180.0 - course);
        }
        lat = away(course).clamp(-88.0, 88.0);
        lon = wrap_180_deg(lon + speed * (dt as f64 / 3600.0) / 60.0 * course.to_radians().sin() / lat.to_radians().cos());
        wander = wander * 0.9 + rng.normal(0.12 * 0.436);
        local = local * 0.97 + rng.normal(0.26 * 0.243);
        let zone_h = -(lon / 15.0).round() as i64;
        let after_step = entries.len() >= step_entry;

        let mut entry = blank(ship, now, zone_h, lat, lon, speed, rng);
        let overcast = rng.chance(0.25);
        let chosen = if overcast { None } else { choose(now, lat, lon, rng) };
        if style.marks && chosen.is_none() && rng.chance(0.3) {
            transit(ship, &mut entry, (wander, local, after_step), course, style, rng);
            house(ship, &mut entry);
            entries.push(entry);
            continue;
        }
        let Some((body, method, at)) = chosen else {
            let up = seen(Body::Sun, now, lat, lon).is_some_and(|(_, a)| a > 62.0);
            if !overcast && rng.chance(0.3) {
                comparison(ship, &mut entry, wander, after_step, course, style, rng);
            } else {
                entry.method = "none";
                entry.remarks = if !overcast && up { "sun too high" } else { rng.pick(&["overcast", "rain", "fog"]) };
            }
            house(ship, &mut entry);
            entries.push(entry);
            continue;
        };
        let moved = (at - now) as f64 / 3600.0;
        entry.unix_s = at + if method == "azimuth" { 0 } else { rng.normal(25.0) as i64 };
        now = entry.unix_s;
        lat += speed * moved / 60.0 * course.to_radians().cos();
        lon = wrap_180_deg(lon + speed * moved / 60.0 * course.to_radians().sin() / lat.to_radians().cos());
        entry.lat = (lat * 1000.0).round() / 1000.0;
        entry.lon = (lon * 1000.0).round() / 1000.0;
        entry.zone_h = -(lon / 15.0).round() as i64;
        entry.body = Some(body);
        entry.method = method;
        observe(ship, &mut entry, (wander, local, after_step), course, style, rng);
        if entry.azimuth.is_none() {
            continue;
        }
        house(ship, &mut entry);
        if rng.chance(style.slips) {
            slips::inject(ship, &entries, &mut entry, style, rng);
        }
        entries.push(entry);
    }
    entries
}

fn blank(ship: &Ship, unix_s: i64, zone_h: i64, lat: f64, lon: f64, speed: f64, rng: &mut Rng) -> Entry {
    Entry {
        vessel: ship.name.clone(),
        repeater: "",
        unix_s,
        zone_h,
        lat: (lat * 1000.0).round() / 1000.0,
        lon: (lon * 1000.0).round() / 1000.0,
        body: None,
        method: "none",
        horizon: "",
        eye_height_m: ship.eye_height_m,
        mark: None,
        gyro_bearing: None,
        compass_bearing: None,
        gyro_heading: None,
        compass_heading: None,
        speed_kn: tenth(speed),
        azimuth: None,
        gyro_error: None,
        compass_error: None,
        variation: None,
        deviation: None,
        observer: rng.pick(&["C/O", "2/O", "3/O", "Cadet"]),
        remarks: "",
        truth: Truth { slip: None, place: Where::Record, shift_deg: 0.0, without: None },
    }
}

/// The gyro's true error on that course and bearing.
fn gyro_error(ship: &Ship, entry: &Entry, wander: f64, after_step: bool, course: f64) -> f64 {
    let speed_error = -entry.speed_kn * course.to_radians().cos() / (5.0 * std::f64::consts::PI * entry.lat.to_radians().cos());
    ship.gyro_level_deg
        + wander
        + ship.drift_deg_per_day * (entry.unix_s - ship.start_unix_s) as f64 / 86_400.0
        + match ship.kind {
            Kind::CorrectorOff => speed_error,
            Kind::CorrectorDoubled => -speed_error,
            Kind::LatitudeCorrectorOff => 1.75 * entry.lat.to_radians().tan(),
            Kind::Step if after_step => ship.step_deg,
            _ => 0.0,
        }
}

/// A to E there: what the earth's field makes of the ship's iron.
fn coefficients(ship: &Ship, entry: &Entry) -> [f64; 5] {
    let [a, mut b, c, d, e] = ship.coefficients;
    if let Ok(field) = field::field(position(entry.lat, entry.lon), instant(entry.unix_s), 0.0) {
        b += ship.induced_deg * field.inclination_deg.to_radians().tan() + ship.permanent_deg * (25_000.0 / field.horizontal_nt - 1.0);
    }
    [a, b, c, d, e]
}

fn variation_deg(entry: &Entry) -> f64 {
    field::field(position(entry.lat, entry.lon), instant(entry.unix_s), 0.0).map_or(0.0, |f| f.variation.deg())
}

/// Headings on both compasses.
fn headings(ship: &Ship, entry: &mut Entry, error: f64, magnetic: f64, course: f64, style: Style, rng: &mut Rng) -> f64 {
    let yaw = rng.normal(0.4);
    // The compass heading that shows this true course: two rounds of the fixed point are enough for a smooth curve.
    let coefficients = coefficients(ship, entry);
    let mut heading = course - magnetic;
    for _ in 0..4 {
        heading = course - magnetic - deviation_deg(coefficients, heading);
    }
    entry.gyro_heading = Some(round_bearing(course - error + yaw, style.resolution_deg));
    entry.compass_heading = Some(round_bearing(heading + yaw + rng.normal(0.4), style.resolution_deg));
    heading
}

fn comparison(ship: &Ship, entry: &mut Entry, wander: f64, after_step: bool, course: f64, style: Style, rng: &mut Rng) {
    entry.method = "comparison";
    let error = gyro_error(ship, entry, wander, after_step, course);
    let magnetic = variation_deg(entry);
    headings(ship, entry, error, magnetic, course, style, rng);
}

/// A range or a lighthouse on a charted bearing.
fn transit(ship: &Ship, entry: &mut Entry, (wander, local, after_step): (f64, f64, bool), course: f64, style: Style, rng: &mut Rng) {
    let charted = tenth(rng.between(0.0, 359.9));
    entry.method = "transit";
    entry.mark = Some((rng.pick(&["Gull Rock light", "entrance range", "Skerry beacon"]), charted));
    let magnetic = variation_deg(entry);
    let error = gyro_error(ship, entry, wander, after_step, course);
    let heading = headings(ship, entry, error, magnetic + local, course, style, rng);
    let deviation = deviation_deg(coefficients(ship, entry), heading);
    let side =
        if matches!(ship.kind, Kind::RepeaterDiffers | Kind::WingDiffers) && wrap_180_deg(charted - course) > 0.0 { 1.6 } else { 0.0 };
    if ship.kind == Kind::RepeaterDiffers {
        entry.repeater = if side > 0.0 { "starboard" } else { "port" };
    }
    let noise = if ship.kind == Kind::Invented { (0.02, 0.05) } else { (style.gyro_noise_deg, style.compass_noise_deg) };
    let steady = if ship.kind == Kind::Invented { wander } else { 0.0 };
    entry.gyro_bearing = Some(round_bearing(charted - error + steady - side + rng.normal(noise.0), style.resolution_deg));
    entry.compass_bearing = Some(round_bearing(charted - magnetic - local - deviation + rng.normal(noise.1), style.resolution_deg));
    let variation = tenth(magnetic + ship.stale_variation_deg + rng.normal(0.08));
    write_results(entry, charted, variation);
    // A chart gives the bearing; no azimuth is worked.
    entry.azimuth = None;
}

/// Takes the bearings and works them as a careful officer does.
fn observe(ship: &Ship, entry: &mut Entry, (wander, local, after_step): (f64, f64, bool), course: f64, style: Style, rng: &mut Rng) {
    let Some(body) = entry.body else { return };
    let Some((at_time, altitude)) = seen(body, entry.unix_s, entry.lat, entry.lon) else { return };
    let (azimuth, worked) = if entry.method == "azimuth" {
        (at_time, at_time)
    } else {
        let rising = entry.method == "rising";
        let visible = rng.chance(0.3);
        let line = |visible| {
            if visible { HorizonLine::Visible { limb: Limb::Centre, eye_height_m: ship.eye_height_m } } else { HorizonLine::Celestial }
        };
        entry.horizon = if visible && ship.kind != Kind::VisibleHorizon { "visible" } else { "celestial" };
        // A house that takes the sun on the line of sea and sky and works it as if it stood on the celestial horizon.
        let real = visible || ship.kind == Kind::VisibleHorizon;
        let Some((azimuth, at)) = on_horizon(body, rising, line(real), entry.unix_s, entry.lat, entry.lon) else { return };
        entry.unix_s = at + rng.normal(25.0) as i64;
        let Some((worked, _)) = on_horizon(body, rising, line(entry.horizon == "visible"), entry.unix_s, entry.lat, entry.lon) else {
            return;
        };
        (azimuth, worked)
    };
    let magnetic = variation_deg(entry);
    let error = gyro_error(ship, entry, wander, after_step, course);
    let heading = headings(ship, entry, error, magnetic + local, course, style, rng);
    let starboard = wrap_180_deg(azimuth - course) > 0.0;
    let sighting = match ship.kind {
        Kind::CircleTilt => 1.6 * altitude.max(0.0).to_radians().tan(),
        Kind::RepeaterDiffers | Kind::WingDiffers if starboard => 1.6,
        _ => 0.0,
    };
    if ship.kind == Kind::RepeaterDiffers {
        entry.repeater = if starboard { "starboard" } else { "port" };
    }
    let tilt = rng.normal(if ship.kind == Kind::Invented { 0.0 } else { 0.15 }) * altitude.max(0.0).to_radians().tan();
    // Bearings nobody read: worked backwards from the errors they should give, to the half degree below.
    let (gyro_noise, compass_noise) =
        if ship.kind == Kind::Invented { (0.02, 0.05) } else { (style.gyro_noise_deg, style.compass_noise_deg) };
    let gyro_wander = if ship.kind == Kind::Invented { wander } else { 0.0 };
    let gyro = azimuth - error + gyro_wander - sighting + tilt + rng.normal(gyro_noise);
    let compass = azimuth - magnetic - local - deviation_deg(coefficients(ship, entry), heading) + tilt + rng.normal(compass_noise);
    let gyro = round_bearing(gyro, style.resolution_deg);
    let compass = round_bearing(compass, style.resolution_deg);
    let worked = wrap_360_deg(tenth(worked));
    let variation = tenth(magnetic + ship.stale_variation_deg + rng.normal(0.08));
    entry.gyro_bearing = Some(gyro);
    entry.compass_bearing = Some(compass);
    write_results(entry, worked, variation);
}

/// The results as they follow from an azimuth, the bearings and a variation.
pub fn write_results(entry: &mut Entry, azimuth: f64, variation: f64) {
    entry.azimuth = Some(azimuth);
    entry.gyro_error = entry.gyro_bearing.map(|b| tenth(wrap_180_deg(azimuth - b)));
    entry.compass_error = entry.compass_bearing.map(|b| tenth(wrap_180_deg(azimuth - b)));
    entry.variation = Some(variation);
    entry.deviation = entry.compass_error.map(|e| tenth(wrap_180_deg(e - variation)));
}

/// What this house does on every entry.
fn house(ship: &Ship, entry: &mut Entry) {
    match ship.kind {
        Kind::SignConvention => entry.gyro_error = entry.gyro_error.map(|e| -e),
        Kind::ZoneSign => entry.unix_s -= 2 * entry.zone_h * 3600,
        Kind::ShipTimeAsUtc => entry.unix_s -= entry.zone_h * 3600,
        _ => {}
    }
}
