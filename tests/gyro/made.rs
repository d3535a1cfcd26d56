//! Run-ups of our own making, so that nothing is fitted to sixteen files; and those that are no run-ups.

use super::generator::{Rng, With, make};
use super::readings;
use shadowpin::angle::Latitude;
use shadowpin::compass::gyro::settle::{NotYet, RunUpReading, Settled, Why, assess};
use shadowpin::limits::Limits;

/// What the method is measured by, over the run-ups of one kind.
#[derive(Debug, Default)]
struct Tally {
    told: usize,
    within_2u: usize,
    within_3u: usize,
    period_3u: usize,
    ratio_3u: usize,
    instant: usize,
    settled: usize,
    wrongly: usize,
    too_early: usize,
    blunder_found: usize,
    others_aside: usize,
}

fn tally(seed: u64, runs: usize, hours: f64, with: With) -> Tally {
    let (mut rng, mut t) = (Rng(seed), Tally::default());
    for _ in 0..runs {
        let made = make(&mut rng, hours, with);
        let found = assess(&readings(&made.rows), None, &Limits::default());
        if let Some((point, u)) = found.settle_point {
            t.told += 1;
            t.within_2u += usize::from((point - made.point).abs() <= 2.0 * u);
            t.within_3u += usize::from((point - made.point).abs() <= 3.0 * u);
        }
        let near = |at: f64| (at - made.within_min).abs() <= 10.0;
        t.instant += usize::from(found.within_band_min.is_some_and(|(early, late)| near(early) || near(late)));
        if let Settled::Since { minutes } = found.settled {
            t.settled += 1;
            t.wrongly += usize::from(made.within_min > made.rows.last().unwrap().0);
            t.too_early += usize::from(minutes < made.within_min - 10.0);
        }
        if let Some(swing) = found.swing {
            t.period_3u += usize::from((swing.period_min - made.period).abs() <= 3.0 * swing.period_u_min);
            t.ratio_3u += usize::from((swing.half_swing_ratio - made.ratio).abs() <= 3.0 * swing.half_swing_ratio_u);
            for (row, _) in swing.set_aside {
                if made.blunder == Some(row) { t.blunder_found += 1 } else { t.others_aside += 1 }
            }
        }
    }
    t
}

#[test]
fn figures_of_many_run_ups() {
    let (clean, gap, blunder) = (With::default(), With { gap: true, ..With::default() }, With { blunder: true, ..With::default() });
    let both = With { blunder: true, gap: true };
    let runs = 150;
    let mut all = 0;
    for (name, seed, hours, with) in [
        ("six hours", 101, 6.0, clean),
        ("six hours, a gap", 102, 6.0, gap),
        ("five hours, a blunder", 103, 5.0, blunder),
        ("five hours, a blunder and a gap", 104, 5.0, both),
        ("four hours", 105, 4.0, clean),
        ("three hours", 106, 3.0, clean),
        ("two hours", 107, 2.0, clean),
        ("two hours, a blunder", 108, 2.0, blunder),
    ] {
        let t = tally(seed, runs, hours, with);
        println!("{name}, {runs} runs: {t:?}");
        all += t.within_2u;
        assert_eq!(t.wrongly, 0, "{name}");
        assert!(t.told >= runs * 90 / 100 && t.within_2u * 100 >= t.told * 90 && t.within_3u * 100 >= t.told * 97, "{name}: {t:?}");
        assert!(t.period_3u * 100 >= t.told * 95 && t.ratio_3u * 100 >= t.told * 95, "{name}: {t:?}");
        assert!(t.instant >= runs * if hours >= 5.0 { 95 } else { 88 } / 100 && t.too_early <= 2 && t.others_aside <= 6, "{name}: {t:?}");
        assert!(
            t.blunder_found
                >= if !with.blunder {
                    0
                } else if hours >= 5.0 {
                    runs * 95 / 100
                } else {
                    runs * 85 / 100
                },
            "{name}: {t:?}"
        );
    }
    println!("settle point within 2 u in {all} of {}", 8 * runs);
    assert!(all * 100 >= 8 * runs * 92);
}

/// An officer asks again and again while the gyro runs up: at no time is one called settled that is not.
#[test]
fn no_beginning_of_a_run_up_is_called_settled_too_soon() {
    let (mut asked, mut settled) = (0, 0);
    for (seed, with) in [(201, With::default()), (202, With { blunder: true, gap: false }), (203, With { blunder: true, gap: true })] {
        let mut rng = Rng(seed);
        for _ in 0..40 {
            let made = make(&mut rng, 6.0, with);
            for until in (70..=360).step_by(20) {
                let rows: Vec<(f64, f64)> = made.rows.iter().copied().filter(|(t, _)| *t <= f64::from(until)).collect();
                asked += 1;
                if let Settled::Since { minutes } = assess(&readings(&rows), None, &Limits::default()).settled {
                    settled += 1;
                    assert!(
                        made.within_min <= rows.last().unwrap().0,
                        "seed {seed}, asked at {until}: settled since {minutes} by us, {}",
                        made.within_min
                    );
                }
            }
        }
    }
    println!("asked {asked} times, settled {settled}, none wrongly");
    assert!(settled > 300);
}

fn verdict(readings: &[RunUpReading]) -> Settled {
    assess(readings, None, &Limits::default()).settled
}

fn every_ten_minutes(n: u32, error: &dyn Fn(f64) -> f64) -> Vec<RunUpReading> {
    readings(&(0..n).map(|i| f64::from(i) * 10.0).map(|t| (t, error(t))).collect::<Vec<_>>())
}

/// A swing of period 86 about 0.5, within 0.7 since minute 182 or so.
fn swing(t: f64) -> f64 {
    0.5 + 30.0 * (-0.02 * t).exp() * (std::f64::consts::TAU * t / 86.0 + 1.0).cos()
}

fn jitter(t: f64) -> f64 {
    0.2 * (t * 1.7).sin()
}

#[test]
fn too_few_readings_or_too_little_time() {
    for n in 0..3 {
        let minutes = f64::from(u32::saturating_sub(n, 1)) * 10.0;
        let why = Why::TooShort { readings: n as usize, minutes };
        assert_eq!(verdict(&every_ten_minutes(n, &|t| t)), Settled::CannotTell(why));
    }
    let each = |minutes: f64, error: &dyn Fn(f64) -> f64| {
        verdict(&readings(&(0..12).map(|i| f64::from(i) * minutes).map(|t| (t, error(t))).collect::<Vec<_>>()))
    };
    // Half an hour of a swing looks like a straight line, ten minutes at its end like rest, one instant like anything.
    for (minutes, error) in [(2.5, &swing as &dyn Fn(f64) -> f64), (1.0, &|_| 12.0), (0.0, &jitter), (5.0, &|t| 0.3 * t)] {
        assert!(matches!(each(minutes, error), Settled::CannotTell(Why::TooShort { readings: 12, .. })), "{minutes}");
    }
}

#[test]
fn what_never_moves_or_moves_evenly() {
    assert_eq!(verdict(&every_ten_minutes(20, &|_| 12.0)), Settled::CannotTell(Why::NeverMoves));
    for blunder in [0.0, 9.0] {
        let drift = |t: f64| 0.05 * t + jitter(t) + if t == 100.0 { blunder } else { 0.0 };
        let Settled::CannotTell(Why::MovesEvenly { deg_per_h }) = verdict(&every_ten_minutes(30, &drift)) else {
            panic!("a drift is no swing")
        };
        assert!((deg_per_h - 3.0).abs() < 0.2);
    }
}

#[test]
fn at_rest_from_the_first_reading() {
    let steady = assess(&every_ten_minutes(20, &|t| 0.4 + jitter(t)), None, &Limits::default());
    assert_eq!(steady.settled, Settled::Since { minutes: 0.0 });
    assert!((steady.settle_point.unwrap().0 - 0.4).abs() < 0.1);
    // One reading misread.
    let misread = |t: f64| if t == 60.0 { 8.4 } else { 0.4 + jitter(t) };
    let found = assess(&every_ten_minutes(20, &misread), None, &Limits::default());
    assert_eq!((found.settled, found.set_aside.len(), found.set_aside[0].0), (Settled::Since { minutes: 0.0 }, 1, 7));
    // Read to half degrees, settled for long.
    let coarse = |t: f64| if (t * 1.7).sin() > 0.3 { 0.5 } else { 0.0 };
    assert_eq!(verdict(&every_ten_minutes(13, &coarse)), Settled::Since { minutes: 0.0 });
    // An hour about the end of a slow swing that goes on beyond the band.
    let slow_extreme = |t: f64| 1.1 * (std::f64::consts::TAU * (t - 30.0) / 120.0).cos();
    assert!(!matches!(verdict(&every_ten_minutes(7, &slow_extreme)), Settled::Since { .. }));
}

#[test]
fn what_is_no_damped_swing() {
    for (what, error) in [
        ("undamped", (&|t: f64| 10.0 * (t / 14.0).cos()) as &dyn Fn(f64) -> f64),
        ("noise", &|t| 5.0 * (t * 7.31).sin()),
        ("restarted half way", &|t| swing(if t >= 180.0 { t - 180.0 } else { t })),
        ("a jump half way", &|t| swing(t) + if t >= 180.0 { 6.0 } else { 0.0 }),
    ] {
        let found = verdict(&every_ten_minutes(37, error));
        println!("{what}: {found:?}");
        let as_expected = match what {
            "undamped" => found == Settled::NotYet(NotYet::DoesNotDieAway),
            "noise" => matches!(found, Settled::CannotTell(Why::OnlyScatters { .. })),
            _ => matches!(found, Settled::CannotTell(Why::NoSwing { scatter_deg: Some(off) }) if off > 1.0),
        };
        assert!(as_expected, "{what}: {found:?}");
    }
}

/// One reading off inside the hour may be misread; the last one, or several, may be the gyro.
#[test]
fn readings_off_at_the_end() {
    let off_at = |off: &[u32]| {
        let error = |t: f64| swing(t) + jitter(t) + if off.contains(&(t as u32)) { 3.0 } else { 0.0 };
        verdict(&every_ten_minutes(37, &error))
    };
    assert!(matches!(off_at(&[]), Settled::Since { .. }));
    assert!(matches!(off_at(&[330]), Settled::Since { .. }));
    assert_eq!(off_at(&[360]), Settled::NotYet(NotYet::LastReadingsOff { readings: 1 }));
    assert_eq!(off_at(&[340, 350, 360]), Settled::NotYet(NotYet::LastReadingsOff { readings: 3 }));
    assert_eq!(off_at(&[310, 330, 350]), Settled::NotYet(NotYet::NotShown));
}

/// What a profile allows is what is held to; the limits grow with the secant of the latitude.
#[test]
fn held_to_the_limits_in_force() {
    let sixty = Latitude::from_deg(60.0).unwrap();
    let rows = every_ten_minutes(37, &|t| swing(t) + jitter(t));
    let held = |toml: &str| {
        let found = assess(&rows, Some(sixty), &Limits::from_toml(toml, "test.toml").unwrap());
        (found.settle_point_held.unwrap(), found.scatter_held.unwrap(), found.too_slow)
    };
    let (point, scatter, slow) = held("");
    assert!((point.limit_deg - 1.5).abs() < 1e-9 && (scatter.limit_deg - 0.5).abs() < 1e-9);
    assert_eq!((point.inside, scatter.inside, slow), (Some(true), Some(true), false));
    let (point, scatter, slow) = held("[limits]\ngyro_settle = 0.1\ngyro_scatter = 0.02\ngyro_settles_within_h = 1\n");
    assert_eq!((point.inside, scatter.inside, slow), (Some(false), Some(false), true));
}

#[test]
fn readings_to_come_are_those_that_come() {
    let found = assess(&every_ten_minutes(13, &|t| swing(t) + jitter(t)), None, &Limits::default());
    assert_eq!(found.settled, Settled::NotYet(NotYet::Swinging));
    assert_eq!(found.to_come.iter().map(|r| r.minutes).collect::<Vec<_>>(), [130.0, 140.0, 150.0, 160.0, 170.0, 180.0]);
    for r in &found.to_come {
        assert!((r.error_deg - swing(r.minutes)).abs() <= 3.0 * r.u_deg && r.u_deg < 1.0, "{r:?}");
    }
}

/// A repeater logged each minute or each five seconds: single readings scatter beyond the band, and the answer is the same, and soon there.
#[test]
fn readings_by_the_thousand() {
    for (spacing, n) in [(1.0, 361_u32), (1.0 / 12.0, 4321)] {
        let mut rng = Rng(305);
        let rows: Vec<(f64, f64)> =
            (0..n).map(|i| f64::from(i) * spacing).map(|t| (t, ((swing(t) + 0.3 * rng.normal()) * 10.0).round() / 10.0)).collect();
        let last_hour = rows.iter().filter(|(t, _)| *t >= 300.0);
        assert!(last_hour.filter(|(_, e)| (e - 0.5).abs() > 0.7).count() > 0, "the case is no longer one: none strays");
        let found = assess(&readings(&rows), None, &Limits::default());
        assert!(matches!(found.settled, Settled::Since { .. }), "{:?}", found.settled);
        assert!((found.settle_point.unwrap().0 - 0.5).abs() < 0.05);
        // The same of a gyro at rest.
        let at_rest: Vec<(f64, f64)> = rows.iter().map(|(t, e)| (*t, e - swing(*t))).collect();
        let found = assess(&readings(&at_rest), None, &Limits::default());
        assert!(matches!(found.settled, Settled::Since { minutes: 0.0 }), "{:?}", found.settled);
    }
}
