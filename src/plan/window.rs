//! From when to when a body can be used, and how good it would be.

use super::sampled::{STEP_S, crossings};
use super::{Ask, sun_altitude_deg};
use crate::angle::{GyroBearing, Position, Reading, TrueBearing, wrap_360_deg};
use crate::compass::{Observation, Place, Target, work};
use crate::horizon::{Horizontal, horizontal};
use crate::limits::Limits;
use crate::sky::{self, Body};
use crate::time::{Moment, UtcInstant};

/// Nearer to the sun than this the moon is too thin to be sighted, degrees (our own band).
const THIN_MOON_DEG: f64 = 20.0;

/// A shorter window is not worth going out for, seconds (our own).
const SHORTEST_S: f64 = 600.0;

/// One end of a window.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct WindowEnd {
    /// When.
    pub utc: UtcInstant,
    /// Azimuth then.
    pub azimuth: TrueBearing,
    /// Altitude then, degrees.
    pub altitude_deg: f64,
}

/// A span in which a body can be used.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Window {
    /// The body.
    pub body: Body,
    /// Its beginning.
    pub from: WindowEnd,
    /// Its end.
    pub to: WindowEnd,
    /// Whether it keeps within the altitudes of first choice.
    pub first_choice: bool,
    /// Azimuth by time in the middle, degrees in ten minutes.
    pub rate_deg_per_10_min: f64,
    /// Uncertainty of a gyro error found at the better end, degrees.
    pub u_deg: f64,
}

impl Window {
    /// Relative bearing at an end for a true course, degrees `0 <= x < 360` from ahead.
    pub fn relative_bearing_deg(end: &WindowEnd, course: TrueBearing) -> f64 {
        wrap_360_deg(end.azimuth.deg() - course.deg())
    }
}

/// The altitudes of first choice, and the highest that is used at all, degrees.
///
/// Source: low bodies, common practice; the highest is the limits' `altitude_weak`.
fn altitudes(body: Body, limits: &Limits) -> (f64, f64, f64) {
    match body {
        Body::Sun | Body::Moon => (5.0, 30.0, limits.thresholds.altitude_weak_deg),
        Body::Planet(_) | Body::Star(_) => (10.0, 40.0, limits.thresholds.altitude_weak_deg),
    }
}

/// Whether a body can be seen against the sky: the sun and the moon always, others with the sun low enough for their magnitude.
pub fn dark_enough(body: Body, utc: UtcInstant, at: Position, limits: &Limits) -> bool {
    let Some(magnitude) = body.magnitude().filter(|_| !matches!(body, Body::Sun | Body::Moon)) else { return true };
    let t = &limits.thresholds;
    sun_altitude_deg(utc, at) <= if magnitude <= 0.0 { t.not_dark_bright_deg } else { t.not_dark_faint_deg }
}

/// Degrees inside (+) or outside (-) of everything that makes a body usable: the least of its margins.
fn margin_deg(ask: &Ask, body: Body, (low_deg, high_deg): (f64, f64), utc: UtcInstant) -> f64 {
    let at = ask.track.at(utc);
    let Ok(Horizontal { azimuth, altitude_deg }) = horizontal(&sky::apparent_place(body, utc), at) else { return -1.0 };
    let mut margin = (altitude_deg - low_deg).min(high_deg - altitude_deg);
    if let Some(magnitude) = body.magnitude().filter(|_| !matches!(body, Body::Sun | Body::Moon)) {
        let t = &ask.limits.thresholds;
        let depth_deg = if magnitude <= 0.0 { t.not_dark_bright_deg } else { t.not_dark_faint_deg };
        margin = margin.min(depth_deg - sun_altitude_deg(utc, at));
    }
    if body == Body::Moon {
        margin = margin.min(elongation_deg(utc) - THIN_MOON_DEG);
    }
    margin.min(clear_of_blind_arcs_deg(ask, azimuth))
}

/// Angle between moon and sun, degrees, from the earth's centre.
fn elongation_deg(utc: UtcInstant) -> f64 {
    let (moon, sun) = (sky::apparent_place(Body::Moon, utc), sky::apparent_place(Body::Sun, utc));
    let (d1, d2) = (moon.declination_deg.to_radians(), sun.declination_deg.to_radians());
    let apart = (moon.gha_deg - sun.gha_deg).to_radians();
    (d1.sin() * d2.sin() + d1.cos() * d2.cos() * apart.cos()).clamp(-1.0, 1.0).acos().to_degrees()
}

/// How far the body is from the nearest blind arc, degrees; negative inside one. Without a course nothing is blind.
fn clear_of_blind_arcs_deg(ask: &Ask, azimuth: TrueBearing) -> f64 {
    let Some(course) = ask.track.course else { return f64::INFINITY };
    let relative = azimuth.deg() - course.deg();
    let clear = |(from, to): &(f64, f64)| {
        // Clockwise from one end to the other: inside, the way back to an end is short of the arc.
        let width = wrap_360_deg(to - from);
        let into = wrap_360_deg(relative - from);
        if into <= width { -into.min(width - into).max(1e-9) } else { (into - width).min(360.0 - into) }
    };
    ask.limits.ship.blind_arcs.iter().map(clear).fold(f64::INFINITY, f64::min)
}

/// The windows of one body: those of first choice, or the higher ones where there are none.
pub(super) fn windows(ask: &Ask, body: Body) -> Vec<Window> {
    let (low, high, highest) = altitudes(body, ask.limits);
    let first = in_band(ask, body, (low, high), true);
    if first.is_empty() { in_band(ask, body, (low, highest), false) } else { first }
}

fn in_band(ask: &Ask, body: Body, band: (f64, f64), first_choice: bool) -> Vec<Window> {
    let instants = ask.instants(STEP_S);
    let (Some(&start), Some(&end)) = (instants.first(), instants.last()) else { return Vec::new() };
    let margin = |utc| margin_deg(ask, body, band, utc);
    let mut opened = (margin(start) > 0.0).then_some(start);
    let mut found = Vec::new();
    for (utc, upward) in crossings(&instants, margin) {
        match (upward, opened.take()) {
            (true, _) => opened = Some(utc),
            (false, Some(from)) => found.extend(window(ask, body, from, utc, first_choice)),
            (false, None) => {}
        }
    }
    if let Some(from) = opened {
        found.extend(window(ask, body, from, end, first_choice));
    }
    found
}

fn window(ask: &Ask, body: Body, from: UtcInstant, to: UtcInstant, first_choice: bool) -> Option<Window> {
    if to.seconds_since(from) < SHORTEST_S {
        return None;
    }
    let end = |utc: UtcInstant| {
        let seen = horizontal(&sky::apparent_place(body, utc), ask.track.at(utc)).ok()?;
        Some(WindowEnd { utc, azimuth: seen.azimuth, altitude_deg: seen.altitude_deg })
    };
    let middle = from.plus_seconds(to.seconds_since(from) / 2.0).ok()?;
    let (before, after) = (end(middle.plus_seconds(-300.0).ok()?)?, end(middle.plus_seconds(300.0).ok()?)?);
    Some(Window {
        body,
        from: end(from)?,
        to: end(to)?,
        first_choice,
        rate_deg_per_10_min: after.azimuth.turn_from_deg(before.azimuth),
        u_deg: u_deg(ask, body, from)?.min(u_deg(ask, body, to)?),
    })
}

/// Uncertainty of the gyro error that an observation then would give, read to the half degree.
fn u_deg(ask: &Ask, body: Body, utc: UtcInstant) -> Option<f64> {
    let observation = Observation {
        moment: Some(Moment { utc, step_s: 1.0 }),
        place: Some(Place { position: ask.track.at(utc), step_deg: 0.0 }),
        gyro_bearing: Some(Reading::new(GyroBearing::wrapping_deg(0.0), 0.5)),
        ..Observation::of(Target::Body(body))
    };
    Some(work(&observation, None, ask.limits).gyro_error?.u_deg())
}
