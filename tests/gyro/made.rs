//! Run-ups of our own making, so that nothing is fitted to sixteen files; and those that are no run-ups.

use super::generator::{Rng, With, make};
use super::readings;
use shadowpin::compass::gyro::settle::{Settled, Why, assess};

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
        let found = assess(&readings(&made.rows), None);
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
    for (name, seed, hours, with) in [
        ("six hours", 101, 6.0, clean),
        ("six hours, a gap", 102, 6.0, gap),
        ("five hours, a blunder", 103, 5.0, blunder),
        ("five hours, a blunder and a gap", 104, 5.0, With { blunder: true, gap: true }),
        ("four hours", 105, 4.0, clean),
        ("three hours", 106, 3.0, clean),
        ("two hours", 107, 2.0, clean),
        ("two hours, a blunder", 108, 2.0, blunder),
    ] {
        let runs = 150;
        let t = tally(seed, runs, hours, with);
        println!("{name}, {runs} runs: {t:?}");
    }
}

#[test]
fn what_is_no_run_up() {
    let line = |n: u32, f: &dyn Fn(f64) -> f64| readings(&(0..n).map(|i| f64::from(i) * 10.0).map(|t| (t, f(t))).collect::<Vec<_>>());
    assert_eq!(assess(&[], None).settled, Settled::CannotTell(Why::TooShort { readings: 0, minutes: 0.0 }));
    assert!(matches!(assess(&line(1, &|_| 1.0), None).settled, Settled::CannotTell(Why::TooShort { readings: 1, .. })));
    assert!(matches!(assess(&line(2, &|t| t), None).settled, Settled::CannotTell(Why::TooShort { readings: 2, .. })));
    assert_eq!(assess(&line(20, &|_| 12.0), None).settled, Settled::CannotTell(Why::NeverMoves));
    let Settled::CannotTell(Why::MovesEvenly { deg_per_h }) = assess(&line(30, &|t| 0.05 * t + 0.1 * (t * 1.7).sin()), None).settled else {
        panic!("a drift is no swing")
    };
    assert!((deg_per_h - 3.0).abs() < 0.2);
    // Settled from the first reading on: it only scatters.
    let steady = assess(&line(20, &|t| 0.4 + 0.2 * (t * 1.7).sin()), None);
    assert_eq!(steady.settled, Settled::Since { minutes: 0.0 });
    assert!((steady.settle_point.unwrap().0 - 0.4).abs() < 0.1);
    // A swing that does not die away.
    let undamped = assess(&line(40, &|t| 10.0 * (t / 14.0).cos()), None).settled;
    assert!(!matches!(undamped, Settled::Since { .. }), "{undamped:?}");
    // Noise alone.
    let noise = assess(&line(30, &|t| 5.0 * (t * 7.31).sin()), None).settled;
    assert!(!matches!(noise, Settled::Since { .. }), "{noise:?}");
}
