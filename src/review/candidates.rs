//! Every slip, with what it would change, on one row.

use super::bodies;
use super::case::{Case, Results, Sight, Turn};
use super::evidence::Context;
use super::row::Row;
use super::slip::{Place, Slip};
use crate::angle::{Position, wrap_180_deg, wrap_360_deg};
use crate::compass::{HorizonKind, Target};
use crate::horizon::{Limb, RisingOrSetting};
use crate::sky::Body;
use crate::time::UtcInstant;
use chrono::Datelike;

/// What a slip changes.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Change {
    /// The written time is this many seconds later than it should be.
    Later(i64),
    /// The time is this one.
    Time(UtcInstant),
    Position(Position),
    /// The position lies on the track between the neighbours, that far known, degrees of azimuth.
    OnTrack(Position, f64),
    Target(Target),
    Gyro(f64),
    Compass(f64),
    Bearings(f64, f64),
    GyroHeading(f64),
    CompassHeading(f64),
    Headings(f64, f64),
    Turn(Turn),
    Results(Results),
}

/// A slip to try.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Candidate {
    pub slip: Slip,
    pub place: Place,
    /// How many forms the slip has here: the more there are, the likelier one fits by chance.
    pub forms: usize,
    pub change: Change,
}

impl Candidate {
    /// `case` with this slip made as well.
    pub fn made(&self, case: &Case) -> Option<Case> {
        let mut made = *case;
        match self.change {
            Change::Turn(turn) => made.turn = Some(turn),
            Change::Results(results) => made.results = made.results.and(results),
            change => match self.place {
                // What is written is wrong, so what was so is the other thing; the results are right.
                Place::Record => {
                    apply(change, -1, &mut made.so, &mut made.loose_deg)?;
                    apply(change, -1, &mut made.used, &mut made.loose_deg)?;
                }
                Place::RecordFollowed => apply(change, -1, &mut made.so, &mut made.loose_deg)?,
                Place::Working => apply(change, 1, &mut made.used, &mut made.loose_deg)?,
            },
        }
        Some(made)
    }
}

fn apply(change: Change, way: i64, sight: &mut Sight, loose_deg: &mut f64) -> Option<()> {
    match change {
        Change::Later(seconds) => sight.utc = Some(sight.utc?.plus_seconds((way * seconds) as f64).ok()?),
        Change::Time(utc) => sight.utc = Some(utc),
        Change::Position(position) => sight.position = Some(position),
        Change::OnTrack(position, loose) => {
            sight.position = Some(position);
            *loose_deg = loose;
        }
        Change::Target(target) => sight.target = target,
        Change::Gyro(deg) => sight.gyro = Some(deg),
        Change::Compass(deg) => sight.compass = Some(deg),
        Change::Bearings(gyro, compass) => (sight.gyro, sight.compass) = (Some(gyro), Some(compass)),
        Change::GyroHeading(deg) => sight.gyro_heading = Some(deg),
        Change::CompassHeading(deg) => sight.compass_heading = Some(deg),
        Change::Headings(gyro, compass) => (sight.gyro_heading, sight.compass_heading) = (Some(gyro), Some(compass)),
        Change::Turn(_) | Change::Results(_) => {}
    }
    Some(())
}

/// The list while it grows.
struct List<'a> {
    found: Vec<Candidate>,
    sight: &'a Sight,
}

impl List<'_> {
    /// One slip with all its forms, in each of these places.
    fn add(&mut self, slip: Slip, places: &[Place], forms: &[Change]) {
        for &change in forms {
            self.found.extend(places.iter().map(|&place| Candidate { slip, place, forms: forms.len(), change }));
        }
    }
}

const ANYWHERE: [Place; 3] = [Place::Record, Place::Working, Place::RecordFollowed];
const RECORD: [Place; 2] = [Place::Record, Place::RecordFollowed];
const WORKING: [Place; 1] = [Place::Working];

/// The slips in readings, in results and in an azimuth once worked: no other time, place or body is looked at.
pub fn slips_at_hand(row: &Row, sight: &Sight, context: &Context) -> Vec<Candidate> {
    let mut list = List { found: Vec::with_capacity(128), sight };
    azimuths(&mut list);
    bearings(&mut list);
    headings(&mut list);
    results(row, context, &mut list);
    list.found
}

/// The slips in time, place, body and horizon.
pub fn slips_of_the_sky(row: &Row, sight: &Sight, context: &Context) -> Vec<Candidate> {
    let mut list = List { found: Vec::with_capacity(128), sight };
    times(row, &mut list);
    positions(context, &mut list);
    other_bodies(row, context, &mut list);
    horizons(&mut list);
    list.found
}

fn times(row: &Row, list: &mut List) {
    let (Some(utc), true) = (list.sight.utc, list.sight.body().is_some()) else { return };
    list.add(Slip::HourAhead, &ANYWHERE, &[Change::Later(3600)]);
    list.add(Slip::HourBehind, &ANYWHERE, &[Change::Later(-3600)]);
    let minutes = [20, 30, 40, -20, -30, -40].map(|m| Change::Later(m * 60));
    list.add(Slip::ClockChange, &ANYWHERE, &minutes);
    list.add(Slip::HalfDay, &ANYWHERE, &[Change::Later(43_200), Change::Later(-43_200)]);
    list.add(Slip::DayAhead, &ANYWHERE, &[Change::Later(86_400)]);
    list.add(Slip::DayBehind, &ANYWHERE, &[Change::Later(-86_400)]);
    // UTC = ship's time + zone. Applied the wrong way: ship's time - zone, later by twice -zone.
    let zones = zones_min(row, list.sight);
    let by = |hours: i64| zones.iter().filter(|z| **z != 0).map(|z| Change::Later(-hours * z * 60)).collect::<Vec<_>>();
    list.add(Slip::ZoneSign, &ANYWHERE, &by(2));
    list.add(Slip::ShipTimeAsUtc, &ANYWHERE, &by(1));
    let years: Vec<Change> = [-1, 1].iter().filter_map(|y| other_year(utc, *y)).map(Change::Time).collect();
    list.add(Slip::Year, &ANYWHERE, &years);
    if let Some(swapped) = day_and_month_exchanged(utc) {
        list.add(Slip::DateSwapped, &ANYWHERE, &[Change::Time(swapped)]);
    }
    // Figures of hours and minutes exchanged, with those of bearings below.
    let day = utc.unix_ms().div_euclid(86_400_000) * 86_400_000;
    let in_day = utc.unix_ms() - day;
    let (hour, minute, rest) = (in_day / 3_600_000, in_day / 60_000 % 60, in_day % 60_000);
    let swapped = |v: i64| v % 10 * 10 + v / 10;
    let clock: Vec<Change> = [(swapped(hour), minute), (hour, swapped(minute))]
        .into_iter()
        .filter(|&(h, m)| h < 24 && m < 60 && (h, m) != (hour, minute))
        .filter_map(|(h, m)| UtcInstant::from_unix_ms(day + h * 3_600_000 + m * 60_000 + rest).ok())
        .map(Change::Time)
        .collect();
    for &change in &clock {
        for place in ANYWHERE {
            list.found.push(Candidate { slip: Slip::DigitsSwapped, place, forms: 8, change });
        }
    }
}

/// Zone descriptions that the clocks may have kept, minutes: the one written, else the one of the longitude, and near the edge of
/// a zone the one beside it.
fn zones_min(row: &Row, sight: &Sight) -> Vec<i64> {
    if let Some(zone) = row.zone {
        return vec![i64::from(zone.description_minutes())];
    }
    let Some(position) = sight.position else { return Vec::new() };
    let exact = -position.lon.deg() / 15.0;
    let nominal = exact.round();
    let mut zones = vec![nominal as i64 * 60];
    if (exact - nominal).abs() > 0.4 {
        zones.push((nominal + (exact - nominal).signum()) as i64 * 60);
    }
    zones
}

fn other_year(utc: UtcInstant, by: i32) -> Option<UtcInstant> {
    let at = utc.to_chrono();
    UtcInstant::from_unix_ms(at.with_year(at.year() + by)?.timestamp_millis()).ok()
}

fn day_and_month_exchanged(utc: UtcInstant) -> Option<UtcInstant> {
    let at = utc.to_chrono();
    if at.day() == at.month() {
        return None;
    }
    let swapped = at.with_day(1)?.with_month(at.day())?.with_day(at.month())?;
    UtcInstant::from_unix_ms(swapped.timestamp_millis()).ok()
}

fn positions(context: &Context, list: &mut List) {
    let Some(position) = list.sight.position else { return };
    let (lat, lon) = (position.lat.deg(), position.lon.deg());
    let at = |lat: f64, lon: f64| Position::from_deg(lat, wrap_180_deg(lon)).map(Change::Position);
    list.add(Slip::LatitudeName, &ANYWHERE, at(-lat, lon).as_slice());
    list.add(Slip::LongitudeName, &ANYWHERE, at(lat, -lon).as_slice());
    let tens: Vec<Change> =
        [(10.0, 0.0), (-10.0, 0.0), (0.0, 10.0), (0.0, -10.0)].iter().filter_map(|(a, b)| at(lat + a, lon + b)).collect();
    for &change in &tens {
        list.found.push(Candidate { slip: Slip::TenDegrees, place: Place::Record, forms: 8, change });
    }
    if lat.abs() != lon.abs() && lon.abs() <= 90.0 {
        for place in RECORD {
            list.found.extend(at(lon, lat).map(|change| Candidate { slip: Slip::ColumnsSwapped, place, forms: 4, change }));
        }
    }
    // An earlier position kept in the working ...
    let old: Vec<Change> = context.earlier.iter().filter_map(|f| f.place()).filter_map(|(a, b)| at(a, b)).collect();
    list.add(Slip::StalePosition, &WORKING, &old);
    // ... or written again: then the ship was on the track between its neighbours.
    let same = |(a, b): (f64, f64)| (a - lat).abs() < 0.01 && wrap_180_deg(b - lon).abs() < 0.01;
    if context.earlier.iter().filter_map(|f| f.place()).any(same)
        && let Some((track, loose_miles)) = context.on_track(list.sight.utc)
        && let Some(position) = Position::from_deg(track.0, wrap_180_deg(track.1))
    {
        // 30' of longitude move an azimuth 0.34 degrees in the middle.
        list.add(Slip::StalePosition, &RECORD, &[Change::OnTrack(position, loose_miles / 60.0 * 0.7)]);
    }
}

fn other_bodies(row: &Row, context: &Context, list: &mut List) {
    let Some(body) = list.sight.body() else { return };
    let with = |other: Body| match list.sight.target {
        Target::OnHorizon { event, horizon, .. } => Target::OnHorizon { body: other, event, horizon },
        _ => Target::Body(other),
    };
    // On the horizon only the sun and the moon are taken.
    if let Target::OnHorizon { .. } = list.sight.target {
        let others: Vec<Body> = [Body::Sun, Body::Moon].into_iter().filter(|b| *b != body).collect();
        for &other in &others {
            list.add(Slip::Body(other), &ANYWHERE, &[Change::Target(with(other))]);
        }
        return;
    }
    let forms = bodies::count() - 1;
    for other in bodies::in_direction(list.sight, &directions(row, context)).filter(|b| *b != body) {
        for place in ANYWHERE {
            list.found.push(Candidate { slip: Slip::Body(other), place, forms, change: Change::Target(with(other)) });
        }
    }
}

/// Where a body that explains the row would have to stand: as logged, as the gyro has it, as the magnetic compass has it; degrees.
fn directions(row: &Row, context: &Context) -> [Option<f64>; 3] {
    let observation = row.observation;
    let variation = row.worked.variation.map_or(0.0, |v| v.value.deg());
    [
        row.logged.azimuth.map(|a| a.value).or_else(|| Some(observation?.gyro_bearing?.value.deg() + row.logged.gyro_error?.value)),
        observation.and_then(|o| o.gyro_bearing).map(|b| b.value.deg() + context.gyro.0),
        observation.and_then(|o| o.compass_bearing).map(|b| b.value.deg() + variation),
    ]
}

fn horizons(list: &mut List) {
    let forms: Vec<Change> = match list.sight.target {
        Target::OnHorizon { body, event, horizon } => {
            let other = match event {
                RisingOrSetting::Rising => RisingOrSetting::Setting,
                RisingOrSetting::Setting => RisingOrSetting::Rising,
            };
            let kinds = [
                HorizonKind::Celestial,
                HorizonKind::Visible(Limb::Centre),
                HorizonKind::Visible(Limb::Upper),
                HorizonKind::Visible(Limb::Lower),
            ];
            kinds
                .into_iter()
                .filter(|k| *k != horizon)
                .map(|horizon| Change::Target(Target::OnHorizon { body, event, horizon }))
                .chain([Change::Target(Target::OnHorizon { body, event: other, horizon }), Change::Target(Target::Body(body))])
                .collect()
        }
        Target::Body(body) if matches!(body, Body::Sun | Body::Moon) => [RisingOrSetting::Rising, RisingOrSetting::Setting]
            .map(|event| Change::Target(Target::OnHorizon { body, event, horizon: HorizonKind::Celestial }))
            .to_vec(),
        _ => return,
    };
    list.add(Slip::Horizon, &ANYWHERE, &forms);
}

fn azimuths(list: &mut List) {
    if list.sight.body().is_some() {
        list.add(Slip::DeclinationName, &WORKING, &[Change::Turn(Turn::Declination)]);
    }
    list.add(Slip::FromOtherPole, &WORKING, &[Change::Turn(Turn::FromOtherPole)]);
    list.add(Slip::OtherSide, &WORKING, &[Change::Turn(Turn::OtherSide)]);
    list.add(Slip::Reciprocal, &WORKING, &[Change::Turn(Turn::Reciprocal)]);
}

/// Three-figure directions with two neighbouring figures exchanged.
fn digits_swapped(deg: f64) -> Vec<f64> {
    let whole = deg.floor();
    let [h, t, u] = [(whole / 100.0).floor(), (whole / 10.0).floor() % 10.0, whole % 10.0];
    [h * 100.0 + u * 10.0 + t, t * 100.0 + h * 10.0 + u]
        .into_iter()
        .filter(|v| *v < 360.0 && *v != whole)
        .map(|v| v + deg - whole)
        .collect()
}

/// 247 for 253: as far from the printed ten, on its other side.
fn read_backwards(deg: f64) -> Vec<f64> {
    let past = deg.rem_euclid(10.0);
    let (below, above) = (deg - past, deg - past + 10.0);
    let about = |ten: f64| wrap_360_deg(2.0 * ten - deg);
    match past {
        0.0 => Vec::new(),
        5.0 => vec![about(below), about(above)],
        p if p < 5.0 => vec![about(below)],
        _ => vec![about(above)],
    }
}

fn bearings(list: &mut List) {
    let sight = *list.sight;
    let mut one = |read: Option<f64>, heading: Option<f64>, change: fn(f64) -> Change| {
        let Some(read) = read else { return };
        let as_changes = |values: Vec<f64>| values.into_iter().map(|v| change(wrap_360_deg(v))).collect::<Vec<_>>();
        let mut add = |slip, forms: usize, values: Vec<f64>| {
            for change in as_changes(values) {
                list.found.extend(RECORD.map(|place| Candidate { slip, place, forms, change }));
            }
        };
        add(Slip::Reciprocal, 3, vec![read + 180.0]);
        add(Slip::ReadBackwards, 2, read_backwards(read));
        if let Some(heading) = heading {
            add(Slip::RelativeBearing, 2, vec![read + heading]);
        }
        add(Slip::TenDegrees, 8, vec![read + 10.0, read - 10.0]);
        add(Slip::HundredDegrees, 8, vec![read + 100.0, read - 100.0, read + 200.0, read - 200.0]);
        add(Slip::DigitsSwapped, 8, digits_swapped(read));
    };
    one(sight.gyro, sight.gyro_heading, Change::Gyro);
    one(sight.compass, sight.compass_heading, Change::Compass);
    if let (Some(gyro), Some(compass)) = (sight.gyro, sight.compass) {
        list.found.extend(RECORD.map(|place| Candidate {
            slip: Slip::ColumnsSwapped,
            place,
            forms: 4,
            change: Change::Bearings(compass, gyro),
        }));
        let both = Change::Bearings(wrap_360_deg(gyro + 180.0), wrap_360_deg(compass + 180.0));
        list.found.extend(RECORD.map(|place| Candidate { slip: Slip::Reciprocal, place, forms: 3, change: both }));
    }
}

fn headings(list: &mut List) {
    let sight = *list.sight;
    let mut one = |read: Option<f64>, change: fn(f64) -> Change| {
        let Some(read) = read else { return };
        let forms = |slip, forms: usize, values: Vec<f64>| {
            values.into_iter().map(move |v| Candidate { slip, place: Place::Record, forms, change: change(wrap_360_deg(v)) })
        };
        list.found.extend(forms(Slip::Reciprocal, 4, vec![read + 180.0]));
        list.found.extend(forms(Slip::ReadBackwards, 4, read_backwards(read)));
        list.found.extend(forms(Slip::TenDegrees, 8, vec![read + 10.0, read - 10.0]));
        list.found.extend(forms(Slip::HundredDegrees, 8, vec![read + 100.0, read - 100.0, read + 200.0, read - 200.0]));
        list.found.extend(forms(Slip::DigitsSwapped, 8, digits_swapped(read)));
    };
    one(sight.gyro_heading, Change::GyroHeading);
    one(sight.compass_heading, Change::CompassHeading);
    if let (Some(gyro), Some(compass)) = (sight.gyro_heading, sight.compass_heading) {
        let change = Change::Headings(compass, gyro);
        list.found.push(Candidate { slip: Slip::ColumnsSwapped, place: Place::Record, forms: 4, change });
    }
}

fn results(row: &Row, context: &Context, list: &mut List) {
    let logged = row.logged;
    let with = |edit: fn(&mut Results)| {
        let mut results = Results::default();
        edit(&mut results);
        Change::Results(results)
    };
    let mut names = Vec::new();
    if logged.gyro_error.is_some() {
        names.push(with(|r| r.gyro_sign = -1.0));
    }
    if logged.compass_error.is_some() {
        names.push(with(|r| r.compass_sign = -1.0));
    }
    if logged.deviation.is_some() {
        names.push(with(|r| r.deviation_sign = -1.0));
    }
    if names.len() > 1 {
        names.push(with(|r| (r.gyro_sign, r.compass_sign) = (-1.0, -1.0)));
    }
    list.add(Slip::ErrorName, &WORKING, &names);
    if logged.variation.is_some() {
        let forms = [
            // Written right, applied the wrong way; written the wrong way and applied as written; or only written so.
            with(|r| r.applied_sign = -1.0),
            with(|r| (r.variation_sign, r.applied_sign) = (-1.0, 1.0)),
            with(|r| (r.variation_sign, r.applied_sign) = (-1.0, -1.0)),
        ];
        list.add(Slip::VariationName, &WORKING, &forms);
    }
    if logged.deviation.is_some() {
        list.add(Slip::CardByBearing, &WORKING, &[with(|r| r.card_by_bearing = true)]);
    }
    // A figure borrowed or carried wrongly: one, ten or a hundred degrees.
    let mut sums = Vec::new();
    for by in [1.0, -1.0, 10.0, -10.0, 100.0, -100.0] {
        if logged.gyro_error.is_some() {
            sums.push(Change::Results(Results { gyro_by: by, ..Results::default() }));
        }
        if logged.compass_error.is_some() {
            sums.push(Change::Results(Results { compass_by: by, ..Results::default() }));
        }
        if logged.deviation.is_some() {
            sums.push(Change::Results(Results { deviation_by: by, ..Results::default() }));
        }
    }
    list.add(Slip::Arithmetic, &WORKING, &sums);
    // Any other figure: as many forms as there are degrees in the circle.
    let (gyro, compass, deviation) = super::evidence::wrong_by(row, context.route);
    for results in [
        gyro.map(|by| Results { gyro_by: by, ..Results::default() }),
        compass.map(|by| Results { compass_by: by, ..Results::default() }),
        deviation.map(|by| Results { deviation_by: by, ..Results::default() }),
    ]
    .into_iter()
    .flatten()
    {
        list.found.push(Candidate { slip: Slip::Arithmetic, place: Place::Working, forms: 360, change: Change::Results(results) });
    }
}
