//! Instants along the track, where the ship herself moves: samples, then halving.

use super::{Ask, sun_altitude_deg};
use crate::angle::TrueBearing;
use crate::horizon::{HorizonLine, RisingOrSetting, Target, Twilight, horizontal, limb_diameters};
use crate::sky::{self, Body};
use crate::time::UtcInstant;

/// Distance of the samples, seconds.
pub(super) const STEP_S: f64 = 300.0;

/// A body on the celestial horizon.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct HorizonInstant {
    /// The body: sun, moon or a planet.
    pub body: Body,
    /// Rising or setting.
    pub event: RisingOrSetting,
    /// When.
    pub utc: UtcInstant,
    /// Azimuth then.
    pub azimuth: TrueBearing,
    /// Height of the watched limb above the visible horizon, sun's diameters.
    pub limb_diameters: f64,
}

/// The sun at the depth of a twilight.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct TwilightInstant {
    /// Which twilight begins or ends: in the morning it begins with the sun's rise to that depth.
    pub twilight: Twilight,
    /// Morning or evening.
    pub event: RisingOrSetting,
    /// When.
    pub utc: UtcInstant,
}

/// Every crossing of nil by `height_deg` along the instants: when, and whether upward; to half a second.
pub(super) fn crossings(instants: &[UtcInstant], height_deg: impl Fn(UtcInstant) -> f64) -> Vec<(UtcInstant, bool)> {
    let samples: Vec<(UtcInstant, f64)> = instants.iter().map(|utc| (*utc, height_deg(*utc))).collect();
    let mut found = Vec::new();
    for pair in samples.windows(2) {
        let [(mut early, from), (mut late, to)] = *pair else { continue };
        if (from > 0.0) == (to > 0.0) {
            continue;
        }
        while late.seconds_since(early) > 0.5 {
            let Ok(middle) = early.plus_seconds(late.seconds_since(early) / 2.0) else { break };
            if (height_deg(middle) > 0.0) == (from > 0.0) { early = middle } else { late = middle }
        }
        found.push((late, to > 0.0));
    }
    found
}

fn event(upward: bool) -> RisingOrSetting {
    if upward { RisingOrSetting::Rising } else { RisingOrSetting::Setting }
}

/// Sun, moon and planets on the celestial horizon, in order of time.
pub(super) fn horizon(ask: &Ask) -> Vec<HorizonInstant> {
    let instants = ask.instants(STEP_S);
    let target = Target::Horizon(HorizonLine::Celestial);
    let mut found: Vec<HorizonInstant> = Body::all()
        .filter(|b| !matches!(b, Body::Star(_)))
        .flat_map(|body| {
            let height = |utc| target.excess_deg(&sky::apparent_place(body, utc), ask.track.at(utc));
            let crossed = crossings(&instants, height);
            crossed.into_iter().filter_map(move |(utc, upward)| {
                let azimuth = horizontal(&sky::apparent_place(body, utc), ask.track.at(utc)).ok()?.azimuth;
                // A planet on the horizon is lost in the haze, and by day it is not seen at all.
                let seen = matches!(body, Body::Sun | Body::Moon);
                let limb_diameters = limb_diameters(body, utc, ask.track.at(utc), ask.eye_height_m);
                seen.then_some(HorizonInstant { body, event: event(upward), utc, azimuth, limb_diameters })
            })
        })
        .collect();
    found.sort_by_key(|h| h.utc);
    found
}

/// The twilights, in order of time.
pub(super) fn twilights(ask: &Ask) -> Vec<TwilightInstant> {
    let instants = ask.instants(STEP_S);
    let mut found: Vec<TwilightInstant> = [(Twilight::Civil, -6.0), (Twilight::Nautical, -12.0), (Twilight::Astronomical, -18.0)]
        .into_iter()
        .flat_map(|(twilight, depth_deg)| {
            crossings(&instants, |utc| sun_altitude_deg(utc, ask.track.at(utc)) - depth_deg)
                .into_iter()
                .map(move |(utc, upward)| TwilightInstant { twilight, event: event(upward), utc })
        })
        .collect();
    found.sort_by_key(|t| t.utc);
    found
}
