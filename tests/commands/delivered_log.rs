//! Figures of the delivered log against its truth, which was made with JPL DE421 and WMM2025 by other programs.

use super::{fixture, shadowpin};
use shadowpin::angle::wrap_180_deg;
use std::collections::{BTreeMap, HashMap};

type Row = HashMap<String, String>;

fn rows(text: &str) -> Vec<Row> {
    csv::Reader::from_reader(text.as_bytes()).deserialize().map(|r| r.unwrap()).collect()
}

fn number(row: &Row, name: &str) -> Option<f64> {
    row[name].parse().ok()
}

fn reviewed() -> Vec<(Row, Row)> {
    let ran = shadowpin(&["review", fixture("logs/fleet_2025.csv").to_str().unwrap(), "-q"], b"");
    assert_eq!(ran.code, Some(1), "{}", ran.err);
    let truth = std::fs::read_to_string(fixture("logs/fleet_2025_truth.csv")).unwrap();
    let pairs: Vec<(Row, Row)> = rows(&ran.out).into_iter().zip(rows(&truth)).collect();
    assert_eq!(pairs.len(), 2127);
    pairs
}

/// 0.015 degrees are the sun's bound of 0.01 and the file's rounding of time and position; on the visible horizon 0.1, for mean
/// refraction is an assumption there.
#[test]
fn azimuths_agree_with_the_truth() {
    let (mut rows, mut on_visible, mut worst, mut worst_visible) = (0, 0, 0.0_f64, 0.0_f64);
    for (row, truth) in reviewed() {
        assert_eq!(row["problem"], "", "row {}", truth["row"]);
        let (Some(ours), Some(theirs)) = (number(&row, "true_azimuth"), number(&truth, "true_azimuth")) else { continue };
        if !truth["slip"].is_empty() && truth["where"] == "record" {
            continue;
        }
        let off = wrap_180_deg(ours - theirs).abs();
        if row["horizon"] == "visible" {
            (on_visible, worst_visible) = (on_visible + 1, worst_visible.max(off));
        } else {
            (rows, worst) = (rows + 1, worst.max(off));
        }
    }
    println!("{rows} rows, worst {worst:.4}; {on_visible} on the visible horizon, worst {worst_visible:.4}");
    assert!(rows > 1000 && worst < 0.015);
    assert!(on_visible > 50 && worst_visible < 0.1);
}

/// Two u cover what two standard uncertainties should, and are not padded: in no band of altitude is u twice the scatter.
#[test]
fn two_u_cover_the_truth() {
    // Each figure: how far it is off, and its u.
    let (mut gyro, mut deviation) = (Vec::new(), Vec::new());
    let mut bands: BTreeMap<i32, Vec<(f64, f64)>> = BTreeMap::new();
    for (row, truth) in reviewed() {
        // The vessel whose readings were not read.
        if !truth["slip"].is_empty() || row["vessel"] == "Blue Gannet" {
            continue;
        }
        if let (Some(error), Some(u), Some(theirs)) =
            (number(&row, "gyro_error"), number(&row, "gyro_error_u"), number(&truth, "true_gyro_error"))
        {
            gyro.push((error - theirs, u));
            bands.entry((number(&row, "altitude").unwrap() / 15.0).floor() as i32).or_default().push((error - theirs, u));
        }
        if let (Some(error), Some(u), Some(theirs)) =
            (number(&row, "deviation"), number(&row, "deviation_u"), number(&truth, "true_deviation"))
        {
            deviation.push((error - theirs, u));
        }
    }
    for (name, figures) in [("gyro error", &gyro), ("deviation", &deviation)] {
        let covered = figures.iter().filter(|(off, u): &&(f64, f64)| off.abs() <= 2.0 * u).count() as f64 / figures.len() as f64;
        println!("{name}: {} figures, two u cover {:.1} %", figures.len(), 100.0 * covered);
        assert!(figures.len() > 900 && (0.93..=0.998).contains(&covered), "{name} {covered}");
    }
    for (band, figures) in bands {
        let n = figures.len() as f64;
        let scatter = (figures.iter().map(|(off, _)| off * off).sum::<f64>() / n).sqrt();
        let u = figures.iter().map(|(_, u)| u).sum::<f64>() / n;
        println!("altitude {:>3} to {:>2}: {n:>4} figures, scatter {scatter:.3}, u {u:.3}", band * 15, band * 15 + 15);
        assert!(n < 30.0 || u < 2.0 * scatter);
    }
}
