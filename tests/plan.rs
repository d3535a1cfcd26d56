//! What to observe: every window keeps what it promises.

use shadowpin::angle::{Position, TrueBearing, wrap_360_deg};
use shadowpin::horizon::{altitude_deg, horizontal};
use shadowpin::limits::Limits;
use shadowpin::plan::{Ask, Plan, Track, Window, identify, plan};
use shadowpin::sky::{Body, apparent_place};
use shadowpin::time::UtcInstant;
use shadowpin::time::text::read_utc;

fn at(text: &str) -> UtcInstant {
    read_utc(text).unwrap().utc
}

fn track(from: &str, lat: f64, lon: f64) -> Track {
    let course = Some(TrueBearing::wrapping_deg(250.0));
    Track { from: at(from), position: Position::from_deg(lat, lon).unwrap(), course, speed_kn: 15.0 }
}

fn planned(track: Track, hours: f64, limits: &Limits) -> Plan {
    plan(&Ask { track, hours, eye_height_m: 15.0, limits })
}

/// Altitude, darkness and clear arcs hold through every window, at places and seasons that differ.
#[test]
fn windows_keep_what_they_promise() {
    let mut limits = Limits::default();
    limits.ship.blind_arcs = vec![(150.0, 210.0), (350.0, 10.0)];
    let mut seen = 0;
    for (from, lat, lon) in [
        ("2026-06-21T10:00Z", 8.0, 80.0),
        ("2026-12-21T16:00Z", 50.0, -20.0),
        ("2026-06-21T20:00Z", 68.0, 5.0),
        ("2026-06-21T18:00Z", -55.0, -65.0),
        ("2026-03-20T05:00Z", 0.0, 179.9),
    ] {
        let track = track(from, lat, lon);
        for w in planned(track, 8.0, &limits).windows {
            seen += 1;
            assert!(w.to.utc.seconds_since(w.from.utc) >= 600.0);
            for part in 0..=10 {
                // A second inside the ends, which are found to half a second.
                let inside = 1.0 + (w.to.utc.seconds_since(w.from.utc) - 2.0) * f64::from(part) / 10.0;
                let utc = w.from.utc.plus_seconds(inside).unwrap();
                let here = track.at(utc);
                let body = horizontal(&apparent_place(w.body, utc), here).unwrap();
                let near = matches!(w.body, Body::Sun | Body::Moon);
                let (low, high) = if near { (5.0, 30.0) } else { (10.0, 40.0) };
                let high = if w.first_choice { high } else { 60.0 };
                assert!((low - 0.01..=high + 0.01).contains(&body.altitude_deg), "{} {}", w.body.name(), body.altitude_deg);
                if let Some(magnitude) = w.body.magnitude() {
                    let sun = altitude_deg(&apparent_place(Body::Sun, utc), here);
                    assert!(sun <= if magnitude <= 0.0 { -2.99 } else { -4.49 }, "{} by day", w.body.name());
                }
                let relative = wrap_360_deg(body.azimuth.deg() - 250.0);
                assert!(!(150.1..209.9).contains(&relative) && !(350.1..360.0).contains(&relative) && !(0.0..9.9).contains(&relative));
            }
        }
    }
    assert!(seen > 60, "{seen}");
}

/// Order of time, and ranks that follow the uncertainty.
#[test]
fn in_order_of_time_and_ranked_by_uncertainty() {
    let limits = Limits::default();
    let plan = planned(track("2026-06-21T10:00Z", 8.0, 80.0), 4.0, &limits);
    assert!(plan.windows.windows(2).all(|pair| pair[0].from.utc <= pair[1].from.utc));
    assert!(plan.horizon.windows(2).all(|pair| pair[0].utc <= pair[1].utc));
    let mut by_rank: Vec<&Window> = plan.windows.iter().collect();
    by_rank.sort_by_key(|w| plan.rank(w));
    assert!(by_rank.windows(2).all(|pair| pair[0].u_deg <= pair[1].u_deg));
    assert_eq!(plan.rank(plan.best_window().unwrap()), 1);
}

/// Each body that stands well up is found by its own bearing and altitude, first; nothing is found where nothing stands.
#[test]
fn who_is_that() {
    let (here, utc) = (Position::from_deg(-36.1, 130.5).unwrap(), at("2026-06-14T10:00Z"));
    let mut found = 0;
    for body in Body::all() {
        let seen = horizontal(&apparent_place(body, utc), here).unwrap();
        if !(5.0..80.0).contains(&seen.altitude_deg) {
            continue;
        }
        found += 1;
        let candidates = identify(here, utc, seen.azimuth, Some(seen.altitude_deg), 3.0);
        assert_eq!(candidates.first().map(|c| c.body), Some(body));
        assert!(candidates.iter().all(|c| c.off_deg() <= 3.0));
    }
    assert!(found > 20);
    assert!(identify(here, utc, TrueBearing::wrapping_deg(100.0), Some(62.0), 2.0).is_empty());
}
