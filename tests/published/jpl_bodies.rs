//! Moon, planets and stars against JPL DE421, by the library skyfield 1.55 (MIT): apparent place, WGS 84, no refraction, UTC taken
//! as UT1.

use super::file;
use shadowpin::angle::{Position, wrap_180_deg};
use shadowpin::horizon::{RisingOrSetting, Search, Target, horizontal, nearest_event};
use shadowpin::sky::{Body, apparent_place};
use shadowpin::time::UtcInstant;
use std::collections::BTreeMap;

fn utc(text: &str) -> UtcInstant {
    UtcInstant::from_naive(text.trim_end_matches('Z').parse().unwrap()).unwrap()
}

/// Worst difference of azimuth and of altitude for each body over altitudes -1 to 60, degrees, with the number of rows.
fn worst_of_each(name: &str) -> BTreeMap<&'static str, (usize, f64, f64)> {
    let mut worst: BTreeMap<&'static str, (usize, f64, f64)> = BTreeMap::new();
    for row in csv::Reader::from_reader(file(name).as_bytes()).records() {
        let row = row.unwrap();
        let number = |i: usize| row[i].parse::<f64>().unwrap();
        if !(-1.0..=60.0).contains(&number(5)) {
            continue;
        }
        let body = Body::from_name(&row[3]).unwrap();
        let seen = horizontal(&apparent_place(body, utc(&row[0])), Position::from_deg(number(1), number(2)).unwrap()).unwrap();
        let entry = worst.entry(body.name()).or_default();
        entry.0 += 1;
        entry.1 = entry.1.max(wrap_180_deg(seen.azimuth.deg() - number(4)).abs());
        entry.2 = entry.2.max((seen.altitude_deg - number(5)).abs());
    }
    worst
}

/// The bound stated in the program: 0.02 degrees of azimuth for each body.
#[test]
fn azimuth_within_two_hundredths() {
    let mut bodies = 0;
    for name in ["jpl_de421/moon_planets.csv", "jpl_de421/stars.csv"] {
        for (body, (rows, azimuth, altitude)) in worst_of_each(name) {
            println!("{body:16} {rows:4} rows: azimuth {azimuth:.5}, altitude {altitude:.5}");
            assert!(rows > 0 && azimuth < 0.02 && altitude < 0.02, "{body}");
            bodies += 1;
        }
    }
    assert_eq!(bodies, 5 + 58);
}

/// 15 s of the moon are 0.06 degrees of its path; the file's instants are to the second, its latitudes to 60.
#[test]
fn moon_rises_and_sets_within_seconds() {
    let (mut rows, mut worst_s, mut worst_deg) = (0, 0.0_f64, 0.0_f64);
    for row in csv::Reader::from_reader(file("jpl_de421/rise_set.csv").as_bytes()).records() {
        let row = row.unwrap();
        if &row[0] != "Moon" {
            continue;
        }
        let number = |i: usize| row[i].parse::<f64>().unwrap();
        let position = Position::from_deg(number(2), number(3)).unwrap();
        let event = if row[1].ends_with("rising") { RisingOrSetting::Rising } else { RisingOrSetting::Setting };
        let theirs = utc(&row[5]);
        let about = theirs.plus_seconds(3600.0).unwrap();
        let target = Target::CentreAltitude { altitude_deg: number(4) };
        let Search::At(found) = nearest_event(|t| apparent_place(Body::Moon, t), position, target, event, about) else {
            panic!("{row:?}: not found");
        };
        rows += 1;
        worst_s = worst_s.max(found.utc.seconds_since(theirs).abs());
        worst_deg = worst_deg.max(wrap_180_deg(horizontal(&found.place, position).unwrap().azimuth.deg() - number(6)).abs());
    }
    println!("moon: {rows} instants, worst {worst_s:.2} s, azimuth {worst_deg:.4}");
    assert!(rows > 100 && worst_s < 15.0 && worst_deg < 0.02);
}
