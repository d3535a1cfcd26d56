//! Queries that a row raises by itself, whatever the other rows say.

use super::query::{OffHorizon, Query, Sum};
use super::row::Row;
use crate::angle::{Position, Reading, wrap_180_deg};
use crate::compass::{Target, step_u};
use crate::horizon::{self, RisingOrSetting, Search};
use crate::limits::Limits;
use crate::notice::Notice;
use crate::sky::{self, Body, Planet};
use crate::time::UtcInstant;

/// Fastest change of an altitude, degrees a second: 15 degrees an hour.
const SKY_DEG_PER_S: f64 = 15.0 / 3600.0;
/// Brighter than this a star or planet is found in stronger twilight.
const BRIGHT_MAGNITUDE: f64 = 0.0;
/// The sun is called too high to be taken from here, degrees; well below any house's rule, so that none is contradicted.
const MAY_BE_HIGH_DEG: f64 = 30.0;
/// The sun is up for certain from here, degrees.
const SURELY_UP_DEG: f64 = 5.0;

/// Altitude of the sun, degrees.
pub fn sun_altitude_deg(utc: UtcInstant, position: Position) -> f64 {
    horizon::altitude_deg(&sky::apparent_place(Body::Sun, utc), position)
}

/// The sun's altitude over which the body is not seen, degrees; `None` for the sun and the moon, and for Venus, which keen eyes find.
pub fn dark_from_deg(body: Body, limits: &Limits) -> Option<f64> {
    match body {
        Body::Sun | Body::Moon | Body::Planet(Planet::Venus) => None,
        other if other.magnitude().is_some_and(|m| m <= BRIGHT_MAGNITUDE) => Some(limits.thresholds.not_dark_bright_deg),
        _ => Some(limits.thresholds.not_dark_faint_deg),
    }
}

/// Adds the queries that `row` raises by itself, and notices that go with them.
pub fn row_queries(row: &Row, route: Route, limits: &Limits, queries: &mut Vec<Query>, notices: &mut Vec<Notice>) {
    if row.observation.is_none() {
        queries.extend(reason(row));
        return;
    }
    sky_queries(row, limits, queries, notices);
    if let Some(by_deg) = azimuth_off_deg(row) {
        let step = row.logged.azimuth.map_or(0.0, |a| a.step_deg);
        let most_deg = limits.thresholds.azimuth_differs_deg.max(3.0 * row.worked.azimuth_budget.u_deg()).max(step);
        if by_deg.abs() > most_deg {
            queries.push(Query::AzimuthDiffers { by_deg, most_deg });
        }
    }
    for (sum, by_deg, step_deg) in sums(row, route).into_iter().flatten() {
        let most_deg = limits.thresholds.arithmetic_deg.max(step_deg / 2.0 + 0.05);
        // A tenth of a rounding stands on the edge: figures in tenths are compared in tenths.
        if by_deg.abs() > most_deg + 1e-6 {
            queries.push(Query::Arithmetic { sum, by_deg, most_deg });
        }
    }
}

fn sky_queries(row: &Row, limits: &Limits, queries: &mut Vec<Query>, notices: &mut Vec<Notice>) {
    let (Some(observation), Some(at_time)) = (row.observation, row.worked.at_time) else { return };
    let Some(body) = observation.body() else { return };
    match observation.target {
        Target::OnHorizon { event, .. } => queries.extend(far_from_horizon(row, event, limits)),
        _ => {
            let altitude_deg = at_time.altitude_deg;
            if altitude_deg < limits.thresholds.below_horizon_deg {
                queries.push(Query::BelowHorizon { body, altitude_deg, least_deg: limits.thresholds.below_horizon_deg });
            }
            if altitude_deg > limits.thresholds.too_high_deg {
                queries.push(Query::TooHigh { altitude_deg, most_deg: limits.thresholds.too_high_deg });
            }
        }
    }
    let (Some(moment), Some(place)) = (row.moment, row.place) else { return };
    if let Some(most_deg) = dark_from_deg(body, limits) {
        let sun_altitude_deg = sun_altitude_deg(moment.utc, place.position);
        if sun_altitude_deg > most_deg {
            queries.push(Query::NotDark { body, sun_altitude_deg, most_deg });
        }
    } else if body == Body::Planet(Planet::Venus) {
        let sun_altitude_deg = sun_altitude_deg(moment.utc, place.position);
        if sun_altitude_deg > limits.thresholds.not_dark_bright_deg {
            notices.push(Notice::VenusByDay { sun_altitude_deg });
        }
    }
}

fn far_from_horizon(row: &Row, event: RisingOrSetting, limits: &Limits) -> Option<Query> {
    let on = row.worked.on_horizon?;
    let moment = row.moment?;
    let most_deg = limits.thresholds.far_from_horizon_deg + moment.step_s * SKY_DEG_PER_S;
    let off_deg = on.off_deg;
    let query = |how| Some(Query::FarFromHorizon { event, how, off_deg, most_deg });
    match on.search {
        Search::At(crossing) => {
            if off_deg.abs() > most_deg {
                return query(OffHorizon::Away);
            }
            // Near the horizon, but on the other side of the sky.
            let eastern = row.worked.at_time?.azimuth.deg() < 180.0;
            let far = crossing.utc.seconds_since(moment.utc).abs() * SKY_DEG_PER_S > most_deg + 5.0;
            if far && eastern != (event == RisingOrSetting::Rising) { query(OffHorizon::OtherEvent) } else { None }
        }
        _ => (off_deg.abs() > most_deg).then_some(Query::FarFromHorizon { event, how: OffHorizon::Never, off_deg, most_deg }),
    }
}

/// Logged azimuth less the recomputed one, degrees. Where it is not written, a bearing and its logged error say what it was.
fn azimuth_off_deg(row: &Row) -> Option<f64> {
    let (logged, observation) = (row.logged, row.observation?);
    let by_gyro = || Some(observation.gyro_bearing?.value.deg() + logged.gyro_error?.value);
    let by_compass = || Some(observation.compass_bearing?.value.deg() + logged.compass_error?.value);
    let azimuth = logged.azimuth.map(|a| a.value).or_else(by_gyro).or_else(by_compass)?;
    Some(wrap_180_deg(azimuth - row.worked.true_azimuth?.deg()))
}

/// Which way the officers of a vessel work the compass error where a bearing was read on the magnetic compass.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum Route {
    /// By the bearing or by the headings: either will do.
    #[default]
    Either,
    /// By the bearing, as on nearly all entries: that it comes out by the headings is chance.
    Bearing,
}

/// Whether the logged compass error comes out by the bearing, and by the headings; `None` where one of them cannot be told.
pub fn comes_out(row: &Row, limits: &Limits) -> Option<(bool, bool)> {
    let bearing = sums(row, Route::Bearing).get(1).copied().flatten()?;
    let either = sums(row, Route::Either).get(1).copied().flatten()?;
    let fits = |by: f64| by.abs() <= limits.thresholds.arithmetic_deg;
    Some((fits(bearing.1), fits(either.1)))
}

/// A subtraction: which, by how much it does not come out, degrees, and the step its result is written in.
pub type OffSum = Option<(Sum, f64, f64)>;

/// Each logged error less what its own logged parts give, with the step it is written in.
pub fn sums(row: &Row, route: Route) -> [OffSum; 3] {
    let logged = row.logged;
    let Some(observation) = row.observation else { return [None; 3] };
    let charted = match observation.target {
        Target::Mark { charted, .. } => Some(charted.deg()),
        _ => None,
    };
    let azimuth = logged.azimuth.map(|a| a.value).or(charted);
    // Where the azimuth is not written, the gyro's bearing and error say what it was.
    let by_gyro = || observation.gyro_bearing.zip(logged.gyro_error).map(|(b, e)| b.value.deg() + e.value);
    let less = |figure: Option<Reading<f64>>, parts: Option<f64>| Some((wrap_180_deg(figure?.value - parts?), figure?.step_deg));
    let gyro = less(logged.gyro_error, azimuth.zip(observation.gyro_bearing).map(|(a, b)| a - b.value.deg()));
    let by_bearing = less(logged.compass_error, azimuth.or_else(by_gyro).zip(observation.compass_bearing).map(|(a, b)| a - b.value.deg()));
    let by_headings = less(
        logged.compass_error,
        logged
            .gyro_error
            .zip(observation.gyro_heading)
            .zip(observation.compass_heading)
            .map(|((error, gyro), compass)| gyro.value.deg() + error.value - compass.value.deg()),
    );
    let compass = match (by_bearing, by_headings) {
        (Some(a), Some(b)) if route == Route::Either => Some(if b.0.abs() < a.0.abs() { b } else { a }),
        (Some(a), _) => Some(a),
        // A bearing read, and no azimuth to work it with: nothing to compare with.
        (None, b) => b.filter(|_| observation.compass_bearing.is_none()),
    };
    let deviation = less(logged.deviation, logged.compass_error.zip(logged.variation).map(|(e, v)| e.value - v.value));
    [
        gyro.map(|(by, step)| (Sum::GyroError, by, step)),
        compass.map(|(by, step)| (Sum::CompassError, by, step)),
        deviation.map(|(by, step)| (Sum::Deviation, by, step)),
    ]
}

/// Whether all that is asked of a row is arithmetic off by no more than the rounding of its own readings: the errors were worked
/// from readings finer than those written.
pub fn unrounded(row: &Row, queries: &[Query]) -> bool {
    let Some(observation) = row.observation else { return false };
    let gyro = observation.gyro_bearing.map_or(0.0, |b| b.step_deg);
    let compass = observation.compass_bearing.map_or(0.0, |b| b.step_deg);
    !queries.is_empty()
        && queries.iter().all(|q| match q {
            // Half the step, and the rounding of the result.
            Query::Arithmetic { by_deg, .. } => by_deg.abs() <= gyro.max(compass).max(0.5) / 2.0 + 0.06,
            _ => false,
        })
}

/// What the sky says to the reason given for having no observation. Cloud is never contradicted.
fn reason(row: &Row) -> Option<Query> {
    let said = |word: &str| contains_ignoring_case(row.remarks, word);
    if !said("sun") {
        return None;
    }
    let sun_altitude_deg = sun_altitude_deg(row.moment?.utc, row.place?.position);
    if said("high") || said("zenith") || said("overhead") {
        return (sun_altitude_deg < MAY_BE_HIGH_DEG).then_some(Query::ReasonDoubtful { sun_altitude_deg, said_high: true });
    }
    let not_up = said("below") || said("not up") || said("not risen") || said("down");
    (not_up && sun_altitude_deg > SURELY_UP_DEG).then_some(Query::ReasonDoubtful { sun_altitude_deg, said_high: false })
}

fn contains_ignoring_case(text: &str, word: &str) -> bool {
    text.as_bytes().windows(word.len()).any(|w| w.eq_ignore_ascii_case(word.as_bytes()))
}

/// Uncertainty of a logged figure against what it was worked from, degrees.
pub fn written_u_deg(figure: Reading<f64>) -> f64 {
    step_u(figure.step_deg) * std::f64::consts::SQRT_2
}
