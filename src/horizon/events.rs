//! When a body rises, sets, or crosses any other altitude.

use super::amplitude::{HorizonLine, RisingOrSetting};
use super::crossing::{self, Crossing};
use super::direct;
use super::observer::{altitude_deg, geocentric_altitude_deg};
use crate::angle::Position;
use crate::sky::ApparentPlace;
use crate::time::UtcInstant;
use std::ops::ControlFlow;

/// The altitude that is crossed.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Target {
    /// The centre's topocentric altitude, no refraction, is this many degrees.
    CentreAltitude {
        /// Degrees, up +.
        altitude_deg: f64,
    },
    /// The body is on this horizon.
    Horizon(HorizonLine),
}

impl Target {
    /// How far the body stands above the target, degrees; negative below.
    pub fn excess_deg(self, place: &ApparentPlace, position: Position) -> f64 {
        match self {
            Self::CentreAltitude { altitude_deg: target } => altitude_deg(place, position) - target,
            Self::Horizon(HorizonLine::Celestial) => geocentric_altitude_deg(place, position),
            Self::Horizon(line) => altitude_deg(place, position) - line.centre_altitude_deg(place.semidiameter_deg),
        }
    }
}

/// The depths of the sun that bound the twilights.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Twilight {
    /// Sun 6 degrees down: the horizon is clear, the brightest stars show.
    Civil,
    /// Sun 12 degrees down: the horizon fades.
    Nautical,
    /// Sun 18 degrees down: dark.
    Astronomical,
}

impl From<Twilight> for Target {
    fn from(twilight: Twilight) -> Self {
        let altitude_deg = match twilight {
            Twilight::Civil => -6.0,
            Twilight::Nautical => -12.0,
            Twilight::Astronomical => -18.0,
        };
        Self::CentreAltitude { altitude_deg }
    }
}

/// A crossing of a target.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct HorizonEvent {
    /// When.
    pub utc: UtcInstant,
    /// Upward or downward.
    pub event: RisingOrSetting,
    /// Where the body was then.
    pub place: ApparentPlace,
}

/// The answer to a search for one crossing.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Search {
    /// Found.
    At(HorizonEvent),
    /// The body stayed above the target for the whole span.
    AlwaysAbove,
    /// The body stayed below the target for the whole span.
    AlwaysBelow,
    /// It crossed the target in the span, but not this way: the moon on a day without moonrise.
    NotInSpan,
}

/// The longest time from one rising of the moon to its next in ordinary latitudes, rounded up: a span in which every body
/// that rises at all rises once, seconds.
pub const DAY_SPAN_S: f64 = 25.5 * 3600.0;

/// The first crossing in the `span_s` seconds after `from` of a body that stands at `place(utc)`, for an observer who stays where
/// he is.
///
/// Error bound: the sun's within 5 s of JPL DE421 to latitude 60 (test `published::jpl_rise_set`). A body that grazes the target
/// is found where it comes through by 0.000001 degrees or more.
/// A span is cut at the ends of the years that are answered.
pub fn next_event(
    place: impl Fn(UtcInstant) -> ApparentPlace,
    position: Position,
    target: Target,
    event: RisingOrSetting,
    from: UtcInstant,
    span_s: f64,
) -> Search {
    first_along(place, position, target, event, from, span_s.max(0.0))
}

/// The last crossing in the `span_s` seconds before `until`; otherwise as [`next_event`].
pub fn previous_event(
    place: impl Fn(UtcInstant) -> ApparentPlace,
    position: Position,
    target: Target,
    event: RisingOrSetting,
    until: UtcInstant,
    span_s: f64,
) -> Search {
    first_along(place, position, target, event, until, -span_s.max(0.0))
}

/// The crossing nearest to `about`, within half of [`DAY_SPAN_S`] either way; otherwise as [`next_event`].
pub fn nearest_event(
    place: impl Fn(UtcInstant) -> ApparentPlace,
    position: Position,
    target: Target,
    event: RisingOrSetting,
    about: UtcInstant,
) -> Search {
    direct::nearest(&place, position, target, event, about)
        .map_or_else(|| nearest_along(&place, position, target, event, about), Search::At)
}

/// The same by a search along the day.
pub(super) fn nearest_along(
    place: impl Fn(UtcInstant) -> ApparentPlace,
    position: Position,
    target: Target,
    event: RisingOrSetting,
    about: UtcInstant,
) -> Search {
    let after = first_along(&place, position, target, event, about, DAY_SPAN_S / 2.0);
    // Nothing earlier can be nearer than what was found after.
    let back = if let Search::At(found) = after { found.utc.seconds_since(about) } else { DAY_SPAN_S / 2.0 };
    match (first_along(&place, position, target, event, about, -back), after) {
        (before @ Search::At(_), _) => before,
        (_, after @ Search::At(_)) => after,
        (before, after) if before == after => before,
        _ => Search::NotInSpan,
    }
}

/// Every crossing of the target from `from` to `to`, in order of time; none where `to` is not later.
pub fn events_between(
    place: impl Fn(UtcInstant) -> ApparentPlace,
    position: Position,
    target: Target,
    from: UtcInstant,
    to: UtcInstant,
) -> Vec<HorizonEvent> {
    let mut found = Vec::new();
    let span_ms = to.unix_ms().saturating_sub(from.unix_ms()).max(0);
    walk(&place, position, target, from, span_ms, |event| {
        found.push(event);
        ControlFlow::Continue(())
    });
    found
}

fn first_along(
    place: impl Fn(UtcInstant) -> ApparentPlace,
    position: Position,
    target: Target,
    event: RisingOrSetting,
    from: UtcInstant,
    span_s: f64,
) -> Search {
    let (mut found, mut crossed) = (None, false);
    walk(&place, position, target, from, (span_s * 1000.0) as i64, |crossing| {
        crossed = true;
        if crossing.event == event {
            found = Some(crossing);
            return ControlFlow::Break(());
        }
        ControlFlow::Continue(())
    });
    match found {
        Some(found) => Search::At(found),
        None if crossed => Search::NotInSpan,
        None if target.excess_deg(&place(from), position) >= 0.0 => Search::AlwaysAbove,
        None => Search::AlwaysBelow,
    }
}

/// Calls `each` with the crossings met on the way from `from` to `from + span_ms`, which may lie in the past.
fn walk(
    place: &impl Fn(UtcInstant) -> ApparentPlace,
    position: Position,
    target: Target,
    from: UtcInstant,
    span_ms: i64,
    mut each: impl FnMut(HorizonEvent) -> ControlFlow<()>,
) {
    let excess = |ms: i64| UtcInstant::from_unix_ms(ms).ok().map(|utc| target.excess_deg(&place(utc), position));
    crossing::walk(&excess, from.unix_ms(), span_ms, |Crossing { at_ms, upward }| match UtcInstant::from_unix_ms(at_ms) {
        Ok(utc) => {
            let event = if upward { RisingOrSetting::Rising } else { RisingOrSetting::Setting };
            each(HorizonEvent { utc, event, place: place(utc) })
        }
        Err(_) => ControlFlow::Break(()),
    });
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::wrap_360_deg;
    use crate::horizon::Limb;
    use crate::sky::sun;
    use proptest::prelude::*;

    fn utc(text: &str) -> UtcInstant {
        UtcInstant::from_naive(text.parse().unwrap()).unwrap()
    }

    fn at(lat: f64, lon: f64) -> Position {
        Position::from_deg(lat, lon).unwrap()
    }

    const CENTRE: Target = Target::CentreAltitude { altitude_deg: 0.0 };
    const LIMB: Target = Target::Horizon(HorizonLine::Visible { limb: Limb::Upper, eye_height_m: 15.0 });

    /// A moon that runs as fast and as far north and south as the real one, so that days without a moonrise occur.
    fn moonlike(utc: UtcInstant) -> ApparentPlace {
        let days = utc.ut1().days_j2000();
        ApparentPlace {
            gha_deg: wrap_360_deg(347.809_25 * days),
            declination_deg: 28.0 * (days / 27.32 * std::f64::consts::TAU).sin(),
            horizontal_parallax_deg: 0.95,
            semidiameter_deg: 0.26,
        }
    }

    #[test]
    fn the_sun_that_circles_and_the_sun_that_stays_away() {
        let from = utc("2026-06-21T00:00:00");
        for (lat, wanted) in [(70.0, Search::AlwaysAbove), (-70.0, Search::AlwaysBelow), (90.0, Search::AlwaysAbove)] {
            for event in [RisingOrSetting::Rising, RisingOrSetting::Setting] {
                let place = at(lat, 20.0);
                assert_eq!(next_event(sun::apparent_place, place, CENTRE, event, from, DAY_SPAN_S), wanted);
                assert_eq!(previous_event(sun::apparent_place, place, LIMB, event, from, DAY_SPAN_S), wanted);
                assert_eq!(nearest_event(sun::apparent_place, place, CENTRE, event, from), wanted);
            }
        }
    }

    #[test]
    fn the_pole_has_one_sunrise_a_year() {
        let rises = events_between(sun::apparent_place, at(90.0, 0.0), CENTRE, utc("2026-01-01T00:00:00"), utc("2027-01-01T00:00:00"));
        assert_eq!(rises.len(), 2);
        assert_eq!(rises[0].utc.to_chrono().format("%m").to_string(), "03");
    }

    #[test]
    fn a_day_without_moonrise_says_so() {
        let place = at(50.0, 0.0);
        let start = utc("2026-03-01T00:00:00");
        let mut without = 0;
        for day in 0..60 {
            let from = start.plus_seconds(f64::from(day) * 86_400.0).unwrap();
            match next_event(moonlike, place, CENTRE, RisingOrSetting::Rising, from, 86_400.0) {
                Search::NotInSpan => without += 1,
                Search::At(found) => assert!((0.0..=86_400.0).contains(&found.utc.seconds_since(from))),
                other => panic!("{other:?}"),
            }
        }
        assert!((1..=4).contains(&without), "{without} days of sixty");
    }

    #[test]
    fn the_ends_of_the_years_end_the_search() {
        let last = utc("2100-12-31T23:59:00");
        let first = utc("1900-01-01T00:00:00");
        let place = at(0.0, 0.0);
        assert_eq!(next_event(sun::apparent_place, place, CENTRE, RisingOrSetting::Rising, last, DAY_SPAN_S), Search::AlwaysBelow);
        assert_eq!(previous_event(sun::apparent_place, place, CENTRE, RisingOrSetting::Setting, first, DAY_SPAN_S), Search::AlwaysBelow);
        assert!(matches!(nearest_event(sun::apparent_place, place, CENTRE, RisingOrSetting::Rising, first), Search::At(_)));
    }

    /// What the sun's place at its worst (9" of hour angle and 3" of declination, `sky::sun`) does to the instants of a whole year.
    #[test]
    fn the_place_is_worth_seconds() {
        let off = |sign: f64| {
            move |utc| {
                let place = sun::apparent_place(utc);
                ApparentPlace {
                    gha_deg: wrap_360_deg(place.gha_deg + 9.0 / 3600.0),
                    declination_deg: place.declination_deg + sign * 3.0 / 3600.0,
                    ..place
                }
            }
        };
        for (lat, bound) in [(0.0, 1.0), (60.0, 2.0), (65.0, 6.0)] {
            let mut worst = 0.0_f64;
            for day in 0..365 {
                let about = utc("2026-01-01T06:00:00").plus_seconds(f64::from(day) * 86_400.0).unwrap();
                let find = |place: &dyn Fn(UtcInstant) -> ApparentPlace| match nearest_event(
                    place,
                    at(lat, 0.0),
                    CENTRE,
                    RisingOrSetting::Rising,
                    about,
                ) {
                    Search::At(found) => found.utc,
                    other => panic!("{other:?}"),
                };
                let right = find(&sun::apparent_place);
                for sign in [-1.0, 1.0] {
                    worst = worst.max(find(&off(sign)).seconds_since(right).abs());
                }
            }
            println!("latitude {lat}: {worst:.2} s");
            assert!(worst < bound);
        }
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(300))]
        /// Against every ten seconds of the day looked at, days that graze the horizon among them.
        #[test]
        fn nothing_is_missed(lat in prop_oneof![-90.0..90.0_f64, 64.0..68.0_f64, -68.0..-64.0_f64, 89.0..90.0_f64], lon in -180.0..180.0_f64, day in 0..365_u32, moon: bool) {
            let body = if moon { moonlike } else { sun::apparent_place };
            let from = utc("2026-01-01T00:00:00").plus_seconds(f64::from(day) * 86_400.0).unwrap();
            let to = from.plus_seconds(90_000.0).unwrap();
            let position = at(lat, lon);
            let found = events_between(body, position, LIMB, from, to);
            let mut looked = Vec::new();
            let mut above = LIMB.excess_deg(&body(from), position) >= 0.0;
            for i in 1..=9000 {
                let t = from.plus_seconds(f64::from(i) * 10.0).unwrap();
                let now = LIMB.excess_deg(&body(t), position) >= 0.0;
                if now != above {
                    looked.push((t, if now { RisingOrSetting::Rising } else { RisingOrSetting::Setting }));
                }
                above = now;
            }
            // A body that comes through for less than ten seconds may be missed by the looking, never by the search.
            prop_assert!(found.len() >= looked.len(), "{found:?} {looked:?}");
            for pair in found.windows(2) {
                prop_assert!(pair[0].utc < pair[1].utc && pair[0].event != pair[1].event);
            }
            for event in &found {
                prop_assert!(LIMB.excess_deg(&event.place, position).abs() < 1e-5, "{event:?}");
            }
            if found.len() == looked.len() {
                for (event, (t, way)) in found.iter().zip(&looked) {
                    prop_assert!(event.event == *way && (0.0..=10.0).contains(&t.seconds_since(event.utc)));
                }
            }
        }

        #[test]
        fn forward_backward_and_nearest_are_one(lat in -60.0..60.0_f64, lon in -180.0..180.0_f64, hours in 0.0..8760.0_f64, rising: bool) {
            let event = if rising { RisingOrSetting::Rising } else { RisingOrSetting::Setting };
            let position = at(lat, lon);
            let about = utc("2026-01-01T00:00:00").plus_seconds(hours * 3600.0).unwrap();
            let Search::At(next) = next_event(sun::apparent_place, position, CENTRE, event, about, DAY_SPAN_S) else { panic!() };
            let Search::At(last) = previous_event(sun::apparent_place, position, CENTRE, event, about, DAY_SPAN_S) else { panic!() };
            let Search::At(nearest) = nearest_event(sun::apparent_place, position, CENTRE, event, about) else { panic!() };
            let (after, before) = (next.utc.seconds_since(about), about.seconds_since(last.utc));
            prop_assert!(after >= 0.0 && before >= 0.0 && (after + before - 86_400.0).abs() < 400.0);
            let wanted = if after < before { next.utc } else { last.utc };
            prop_assert!(nearest.utc.seconds_since(wanted).abs() < 0.01);
        }
    }
}
