//! The sixteen run-ups with known settle points.

use super::readings;
use shadowpin::compass::gyro::settle::{Settled, assess};
use shadowpin::time::text::read_utc;

fn fixture(name: &str) -> String {
    std::fs::read_to_string(format!("{}/fixtures/runups/{name}", env!("CARGO_MANIFEST_DIR"))).unwrap()
}

#[test]
fn settle_points_and_instants() {
    let truth: serde_json::Value = serde_json::from_str(&fixture("truth.json")).unwrap();
    let (mut inside, mut predicted, mut long, mut wrongly) = (0, 0, 0, 0);
    for run in truth.as_array().unwrap() {
        let text = fixture(run["file"].as_str().unwrap());
        let rows: Vec<(f64, f64)> = text
            .lines()
            .skip(1)
            .map(|line| {
                let (utc, error) = line.split_once(',').unwrap();
                (read_utc(utc).unwrap().utc.unix_ms() as f64 / 60_000.0, error.parse().unwrap())
            })
            .collect();
        let from = rows[0].0;
        let rows: Vec<(f64, f64)> = rows.into_iter().map(|(t, e)| (t - from, e)).collect();
        let number = |key: &str| run[key].as_f64().unwrap();
        let (point, instant, observed) = (number("settle_point"), number("minutes_until_within_0.7"), number("observed_minutes"));
        let found = assess(&readings(&rows), None);
        let (ours, u) = found.settle_point.unwrap_or((f64::NAN, f64::NAN));
        inside += usize::from((ours - point).abs() <= 3.0 * u);
        let near = found.within_band_min.is_some_and(|(a, b)| (a - instant).abs() <= 10.0 || (b - instant).abs() <= 10.0);
        if observed >= 300.0 {
            long += 1;
            predicted += usize::from(near);
        }
        if let Settled::Since { .. } = found.settled {
            wrongly += usize::from(instant > observed);
        }
        let swing = found.swing.as_ref();
        println!(
            "{} point {point:+.2} found {ours:+.2} u {u:.2}; period {:.1} found {:.1}; ratio {:.2} found {:.2}; within at {instant:.0} found {:?} {:?} aside {:?}",
            run["file"].as_str().unwrap(),
            number("period_min"),
            swing.map_or(f64::NAN, |s| s.period_min),
            number("half_swing_ratio"),
            swing.map_or(f64::NAN, |s| s.half_swing_ratio),
            found.within_band_min.map(|(a, b)| (a.round(), b.round())),
            found.settled,
            swing.map(|s| s.set_aside.clone()),
        );
    }
    println!("settle point within 3 u: {inside} of 16; instant within 10 minutes: {predicted} of {long}; wrongly settled: {wrongly}");
    assert!(inside >= 15 && long == 12 && predicted >= 10 && wrongly == 0);
}
