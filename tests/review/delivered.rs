//! The log made with another ephemeris and another field program, with its truth.

use super::measure::{Known, Table};
use super::read::{read, review};
use shadowpin::limits::Limits;

fn fixture(name: &str) -> String {
    std::fs::read_to_string(format!("{}/fixtures/logs/{name}", env!("CARGO_MANIFEST_DIR"))).unwrap()
}

#[test]
fn slips_patterns_and_quiet_on_the_delivered_log() {
    let rows = read(&fixture("fleet_2025.csv"));
    let (fleet, verdicts) = review(&rows, &Limits::default());
    let vessels: serde_json::Value = serde_json::from_str(&fixture("fleet_2025_vessels.json")).unwrap();
    let kind = |name: &str| {
        let vessel = vessels.as_array().unwrap().iter().find(|v| v["vessel"] == name).unwrap();
        vessel["kind"].as_str().unwrap().to_owned()
    };
    let truth_text = fixture("fleet_2025_truth.csv");
    let mut truth = csv::Reader::from_reader(truth_text.as_bytes());
    let mut table = Table::default();
    for ((row, verdict), truth) in rows.iter().zip(&verdicts).zip(truth.records()) {
        let truth = truth.unwrap();
        let known = Known {
            slip: Some(truth[1].to_owned()).filter(|s| !s.is_empty()),
            place: truth[2].to_owned(),
            shift_deg: truth[3].parse().unwrap(),
            pattern: kind(&row.vessel) != "good",
        };
        table.add(&known, verdict);
    }
    println!("{table}");
    for vessel in vessels.as_array().unwrap() {
        let name = vessel["vessel"].as_str().unwrap();
        let expected = match kind(name).as_str() {
            "good" => vec![],
            "corrector-off" => vec!["speed-corrector-off"],
            "step" => vec!["gyro-step"],
            "invented" => vec!["too-regular"],
            "stale-variation" => vec!["variation-stale"],
            other => panic!("kind {other} is new here"),
        };
        let found: Vec<&str> = fleet.patterns(name).map(|p| p.id()).collect();
        println!("{name}: {found:?}");
        assert_eq!(found, expected, "{name}");
    }
    assert!(table.found_share() >= 0.98);
    assert!(table.first_share() >= 0.85);
    assert!(table.first_three_share() >= 0.95);
    assert!(table.cried_wolf_share() <= 0.005);
}
