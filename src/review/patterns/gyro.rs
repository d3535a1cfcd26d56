//! What a gyro's error follows.

use super::super::fact::Fact;
use super::super::learn::Logbook;
use super::super::pattern::{NotEvaluated, Pattern, PatternId};
use super::super::run::{Run, Term};
use super::super::vessel::{Gyro, Vessel};
use crate::limits::Limits;
use crate::time::UtcInstant;

/// Fewest rows to look for anything.
const LEAST_ROWS: usize = 12;
/// Spread of V cos C / (5 pi cos lat) from which its effect can be told, degrees.
const LEAST_SPEED_SPREAD_DEG: f64 = 0.8;
/// Spread of tan latitude, and of tan altitude, from which an effect can be told.
const LEAST_TAN_SPREAD: f64 = 0.5;
/// Correlation from which two things go together too nearly to be told apart.
const TOGETHER: f64 = 0.8;
/// Rows at a rising or setting above latitude 15, from which an effect can be told.
const LEAST_ON_HORIZON: usize = 6;

/// Adds the patterns that each gyro's run shows, and what could not be judged.
pub fn find(vessel: &mut Vessel, book: &Logbook, limits: &Limits) {
    let mut patterns = Vec::new();
    let mut not = Vec::new();
    for gyro in &vessel.runs {
        let facts: Vec<&Fact> = vessel.facts.iter().filter(|f| gyro.repeaters.contains(&f.gyro) && f.gyro_error_deg().is_some()).collect();
        if facts.is_empty() && vessel.runs.len() > 1 {
            continue;
        }
        let run = gyro.run.as_ref().filter(|r| r.established());
        let found = run.map(|r| named(vessel, gyro, r, limits)).unwrap_or_default();
        for id in [
            PatternId::GyroStep,
            PatternId::SpeedCorrectorOff,
            PatternId::LatitudeCorrectorOff,
            PatternId::RepeaterDiffers,
            PatternId::AzimuthCircleTilt,
            PatternId::VisibleHorizon,
        ] {
            if found.iter().all(|p| p.id != id)
                && let Some(why) = cannot(id, &facts, run, book)
            {
                let of = if gyro.name.is_empty() { String::new() } else { format!("{}: ", gyro.name) };
                not.push(NotEvaluated { id, why: format!("{of}{why}") });
            }
        }
        patterns.extend(found);
    }
    vessel.patterns.extend(patterns);
    vessel.not_evaluated.extend(not);
}

fn spread(mut values: Vec<f64>) -> f64 {
    values.sort_by(f64::total_cmp);
    let n = values.len();
    match (values.get(n / 20), values.get(n.saturating_sub(1 + n / 20))) {
        (Some(low), Some(high)) => high - low,
        _ => 0.0,
    }
}

/// How nearly tan latitude and time go together: the size of their correlation.
fn together(facts: &[&Fact]) -> f64 {
    let points: Vec<(f64, f64)> = facts.iter().filter_map(|f| Some((f.seconds()? as f64, f.tan_lat()))).collect();
    let n = points.len() as f64;
    let (mx, my) = points.iter().fold((0.0, 0.0), |(a, b), p| (a + p.0 / n, b + p.1 / n));
    let (xx, xy, yy) =
        points.iter().map(|p| (p.0 - mx, p.1 - my)).fold((0.0, 0.0, 0.0), |s, (x, y)| (s.0 + x * x, s.1 + x * y, s.2 + y * y));
    if xx > 0.0 && yy > 0.0 { (xy / (xx * yy).sqrt()).abs() } else { 0.0 }
}

/// Why a pattern cannot be judged.
fn cannot(id: PatternId, facts: &[&Fact], run: Option<&Run>, book: &Logbook) -> Option<String> {
    if facts.len() < LEAST_ROWS {
        return Some(format!("only {} bearings by gyro, of {LEAST_ROWS} needed", facts.len()));
    }
    if run.is_none() {
        return Some("the gyro errors do not hold together as one run".to_owned());
    }
    match id {
        PatternId::SpeedCorrectorOff if book.other_gyro => Some("not a spinning gyro: it has no speed error".to_owned()),
        PatternId::SpeedCorrectorOff if !book.has_speed => Some("no speed is written".to_owned()),
        PatternId::SpeedCorrectorOff => {
            let spread = spread(facts.iter().filter_map(|f| f.speed_error_deg()).collect());
            (spread < LEAST_SPEED_SPREAD_DEG)
                .then(|| format!("the courses steered differ too little: V cos C / cos lat would move it {spread:.1} degrees"))
        }
        PatternId::LatitudeCorrectorOff if book.other_gyro => Some("not a spinning gyro: it has no latitude error".to_owned()),
        PatternId::LatitudeCorrectorOff => {
            if spread(facts.iter().map(|f| f.tan_lat()).collect()) < LEAST_TAN_SPREAD {
                return Some("the latitudes differ too little".to_owned());
            }
            let drifts = run.is_some_and(|r| r.terms.iter().any(|t| matches!(t, Term::Drift(_))));
            (drifts && together(facts) > TOGETHER)
                .then(|| "the latitude changed steadily with time, and a slow drift would look the same".to_owned())
        }
        PatternId::AzimuthCircleTilt => (spread(facts.iter().map(|f| f.tan_altitude()).collect()) < LEAST_TAN_SPREAD)
            .then(|| "all bodies stood about equally high".to_owned()),
        PatternId::VisibleHorizon => {
            let on: Vec<f64> = facts.iter().map(|f| f.on_horizon()).filter(|x| *x != 0.0).collect();
            (on.len() < LEAST_ON_HORIZON || spread(on) < LEAST_TAN_SPREAD)
                .then(|| "too few risings and settings in higher latitudes".to_owned())
        }
        _ => None,
    }
}

fn named(vessel: &Vessel, gyro: &Gyro, run: &Run, limits: &Limits) -> Vec<Pattern> {
    let of = if gyro.name.is_empty() { String::new() } else { format!("{}: ", gyro.name) };
    run.terms
        .iter()
        .enumerate()
        .filter_map(|(at, term)| {
            let (c, u) = run.coefficient(at);
            let size = c.abs();
            let side = if c < 0.0 { "W" } else { "E" };
            let mut since = None;
            let (id, detail) = match *term {
                Term::Level | Term::Drift(_) => return None,
                Term::Repeater(index) => {
                    if size - 3.0 * u < limits.thresholds.repeater_differs_deg {
                        return None;
                    }
                    let name = |i: u8| vessel.gyros.get(usize::from(i)).map_or("", |g| g.1.as_str());
                    let most_used = gyro.repeaters.first().copied().unwrap_or(0);
                    let detail = format!(
                        "Was the repeater \"{}\" set in step with the master? Gyro errors on it are {size:.1} {side} of those on \"{}\".",
                        name(index),
                        name(most_used)
                    );
                    (PatternId::RepeaterDiffers, detail)
                }
                Term::Side => (
                    PatternId::RepeaterDiffers,
                    format!(
                        "Were the wing repeaters set in step with the master? With the body to starboard, gyro errors are {size:.1} {side} of those to port (the repeater is not written)."
                    ),
                ),
                Term::Speed => {
                    let slope = -c;
                    let meaning = if (slope - 1.0).abs() < 0.35 {
                        "as with the speed corrector off"
                    } else if (slope + 1.0).abs() < 0.35 {
                        "as with the correction made twice"
                    } else {
                        "as with a wrong speed or latitude set"
                    };
                    (
                        PatternId::SpeedCorrectorOff,
                        format!(
                            "Are speed and latitude set on the gyro? Its error follows V cos C / cos lat with a slope of {slope:.2} (u {u:.2}), {meaning}."
                        ),
                    )
                }
                Term::Latitude => (
                    PatternId::LatitudeCorrectorOff,
                    format!("Is the latitude set on the gyro? Its error follows tan lat: {size:.1} {side} for each unit (45 degrees north)."),
                ),
                Term::Altitude => (
                    PatternId::AzimuthCircleTilt,
                    format!("Does the azimuth circle sit level on the repeater? Gyro errors go {side} by {size:.1} times tan altitude."),
                ),
                Term::OnHorizon => (
                    PatternId::VisibleHorizon,
                    format!(
                        "Is the sun taken on the line of sea and sky and worked for the celestial horizon? Errors at rising and setting follow an altitude {size:.1} degrees {} than the stated one.",
                        if c < 0.0 { "lower" } else { "higher" }
                    ),
                ),
                Term::Step(seconds) => {
                    since = UtcInstant::from_unix_ms((seconds + 946_684_800) * 1000).ok();
                    (
                        PatternId::GyroStep,
                        format!("Was the gyro reset or stopped, or a repeater moved? Its error changes by {size:.1} {side} at once, and stays."),
                    )
                }
            };
            Some(Pattern { id, detail: format!("{of}{detail}"), since })
        })
        .collect()
}
