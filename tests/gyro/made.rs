//! Run-ups of our own making, so that nothing is fitted to sixteen files; and those that are no run-ups.

use super::readings;
use shadowpin::compass::gyro::settle::{Settled, Why, assess};

/// A small generator of numbers that are the same on every machine (splitmix64).
struct Rng(u64);

impl Rng {
    fn next(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        z ^ (z >> 31)
    }

    fn between(&mut self, low: f64, high: f64) -> f64 {
        low + (high - low) * (self.next() >> 11) as f64 / (1_u64 << 53) as f64
    }

    fn normal(&mut self) -> f64 {
        (0..12).map(|_| self.between(0.0, 1.0)).sum::<f64>() - 6.0
    }
}

struct Made {
    rows: Vec<(f64, f64)>,
    point: f64,
    within_min: f64,
    blunder: Option<usize>,
}

fn make(rng: &mut Rng, hours: f64, blunder: bool, gaps: bool) -> Made {
    let (point, period, ratio) = (rng.between(-1.5, 1.5), rng.between(65.0, 120.0), rng.between(0.2, 0.55));
    let (size, phase, noise) = (rng.between(10.0, 60.0), rng.between(-3.0, 3.0), rng.between(0.1, 0.3));
    let spacing = [5.0, 10.0, 15.0][(rng.next() % 3) as usize];
    let k = -2.0 * f64::ln(ratio) / period;
    let off = |t: f64| size * (-k * t).exp() * (std::f64::consts::TAU * t / period + phase).cos();
    let mut rows: Vec<(f64, f64)> = (0..=(hours * 60.0 / spacing) as u32)
        .map(|i| f64::from(i) * spacing)
        .map(|t| (t, ((point + off(t) + noise * rng.normal()) / 0.1).round() * 0.1))
        .collect();
    if gaps {
        let at = rng.between(40.0, 120.0);
        rows.retain(|(t, _)| *t < at || *t > at + 40.0);
    }
    let blunder = blunder.then(|| {
        let at = rng.next() as usize % rows.len();
        rows[at].1 += if rng.next() % 2 == 0 { 8.0 } else { -5.0 };
        at + 1
    });
    let within_min = (0..20_000).map(|i| f64::from(i) / 10.0).filter(|t| off(*t).abs() > 0.7).fold(0.0, f64::max);
    Made { rows, point, within_min, blunder }
}

#[test]
fn figures_of_many_run_ups() {
    for (name, hours, blunder, gaps) in [
        ("six hours", 6.0, false, false),
        ("six hours, a gap", 6.0, false, true),
        ("five hours, a blunder", 5.0, true, false),
        ("two hours", 2.0, false, false),
    ] {
        let mut rng = Rng(7 + hours as u64);
        let (mut inside, mut told, mut near, mut settled, mut wrongly, mut found_blunder) = (0, 0, 0, 0, 0, 0);
        let runs = 150;
        for _ in 0..runs {
            let made = make(&mut rng, hours, blunder, gaps);
            let found = assess(&readings(&made.rows), None);
            if let Some((point, u)) = found.settle_point {
                told += 1;
                inside += usize::from((point - made.point).abs() <= 3.0 * u);
            }
            near += usize::from(
                found.within_band_min.is_some_and(|(a, b)| (a - made.within_min).abs() <= 10.0 || (b - made.within_min).abs() <= 10.0),
            );
            if let Settled::Since { .. } = found.settled {
                settled += 1;
                wrongly += usize::from(made.within_min > made.rows.last().unwrap().0);
            }
            let aside = found.swing.map(|s| s.set_aside).unwrap_or_default();
            found_blunder += usize::from(made.blunder.is_some_and(|row| aside.iter().any(|(r, _)| *r == row)));
        }
        println!(
            "{name}: settle point told in {told} of {runs}, within 3 u in {inside}; instant within 10 minutes {near}; settled {settled}, wrongly {wrongly}; blunder found {found_blunder}"
        );
        assert_eq!(wrongly, 0, "{name}");
        if hours >= 5.0 {
            assert!(told >= runs * 97 / 100 && inside >= told * 95 / 100 && near >= runs * 85 / 100, "{name}");
        }
        if blunder {
            assert!(found_blunder >= runs * 90 / 100);
        }
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
