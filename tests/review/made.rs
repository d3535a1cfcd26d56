//! Logs of our own making, with every slip and every pattern, in many seeds and houses.

use super::measure::{Known, Table};
use super::read::{read, review};
use crate::generator::{Columns, Kind, Log, Rng, Ship, Style, Where, csv, shows};
use shadowpin::limits::Limits;

/// One log: vessels of these kinds, written that way.
struct House<'a> {
    name: &'a str,
    kinds: &'a [Kind],
    lat_band: (f64, f64),
    style: Style,
    columns: Columns<'a>,
    mixed: bool,
}

const ORDINARY: (f64, f64) = (-58.0, 58.0);

fn place(place: Where) -> &'static str {
    match place {
        Where::Record => "record",
        Where::Working => "working",
        Where::Both => "both",
    }
}

/// Reviews one log of that house; the table, and what was named against what should have been.
fn measure(house: &House, seed: u64) -> (Table, Vec<(Kind, Vec<&'static str>)>) {
    let mut rng = Rng::new(seed);
    let ships: Vec<Ship> =
        house.kinds.iter().enumerate().map(|(at, kind)| Ship::draw(&format!("Vessel {at}"), *kind, house.lat_band, &mut rng)).collect();
    let log = Log::of(&ships, house.style, house.mixed);
    let rows = read(&csv(&log, house.columns));
    let (fleet, verdicts) = review(&rows, &Limits::default());
    let mut table = Table::default();
    for (entry, verdict) in log.entries.iter().zip(&verdicts) {
        let kind = ships.iter().find(|s| s.name == entry.vessel).unwrap().kind;
        let known = Known {
            slip: entry.truth.slip.filter(|_| shows(entry, house.columns)).map(str::to_owned),
            place: place(entry.truth.place).to_owned(),
            shift_deg: entry.truth.shift_deg,
            pattern: kind != Kind::Good,
        };
        table.add(&known, verdict);
    }
    let named = ships.iter().map(|s| (s.kind, fleet.patterns(&s.name).map(|p| p.id()).collect())).collect();
    (table, named)
}

/// Runs a house over several seeds and holds the bounds.
fn hold(house: &House, seeds: std::ops::Range<u64>, first: f64, three: f64) {
    let mut table = Table::default();
    let mut wrong = Vec::new();
    let mut missed = Vec::new();
    for seed in seeds {
        let (one, named) = measure(house, seed);
        table.merge(one);
        for (kind, found) in named {
            match kind.pattern() {
                None if !found.is_empty() => wrong.push(format!("seed {seed}: {found:?} on a good vessel")),
                Some(id) if !found.contains(&id) => missed.push(format!("seed {seed}: {kind:?} not named, but {found:?}")),
                _ => {}
            }
        }
    }
    println!("{}\n{table}\nnamed on good vessels: {wrong:?}\nmissed: {missed:?}", house.name);
    assert!(wrong.is_empty(), "{wrong:?}");
    assert!(missed.is_empty(), "{missed:?}");
    assert!(table.found_share() >= 0.98, "{table}");
    assert!(table.first_share() >= first, "{table}");
    assert!(table.first_three_share() >= three, "{table}");
    assert!(table.cried_wolf_share() <= 0.005, "{table}");
    assert!(table.one_by_one_share() <= 0.01, "{table}");
}

const GOOD: [Kind; 4] = [Kind::Good; 4];

#[test]
fn ordinary_houses() {
    let house = House {
        name: "ordinary",
        kinds: &Kind::ALL,
        lat_band: ORDINARY,
        style: Style::default(),
        columns: Columns::default(),
        mixed: true,
    };
    hold(&house, 1..4, 0.85, 0.95);
}

#[test]
fn good_vessels_in_quantity() {
    let house = House {
        name: "good",
        kinds: &GOOD,
        lat_band: ORDINARY,
        style: Style { slips: 0.1, ..Style::default() },
        columns: Columns::default(),
        mixed: false,
    };
    hold(&house, 10..14, 0.85, 0.95);
}

#[test]
fn read_to_tenths_and_to_whole_degrees() {
    for (name, resolution_deg) in [("tenths", 0.1), ("whole", 1.0)] {
        let house = House {
            name,
            kinds: &GOOD,
            lat_band: ORDINARY,
            style: Style { resolution_deg, slips: 0.1, ..Style::default() },
            columns: Columns::default(),
            mixed: true,
        };
        hold(&house, 20..22, 0.85, 0.95);
    }
}

#[test]
fn a_rough_sea() {
    let house = House {
        name: "rough",
        kinds: &GOOD,
        lat_band: ORDINARY,
        style: Style { gyro_noise_deg: 0.6, compass_noise_deg: 1.3, slips: 0.1, ..Style::default() },
        columns: Columns::default(),
        mixed: true,
    };
    hold(&house, 70..73, 0.85, 0.95);
}

#[test]
fn few_rows() {
    let house = House {
        name: "few",
        kinds: &[Kind::Good; 12],
        lat_band: ORDINARY,
        style: Style { entries: 24, slips: 0.1, ..Style::default() },
        columns: Columns::default(),
        mixed: true,
    };
    hold(&house, 30..34, 0.85, 0.95);
}

#[test]
fn polar_and_tropical() {
    for (name, lat_band) in [("polar", (60.0, 78.0)), ("tropical", (-12.0, 12.0))] {
        let house = House {
            name,
            kinds: &GOOD,
            lat_band,
            style: Style { slips: 0.1, ..Style::default() },
            columns: Columns::default(),
            mixed: true,
        };
        hold(&house, 40..42, 0.85, 0.95);
    }
}

#[test]
fn ships_time_instead_of_utc() {
    let house = House {
        name: "ship's time",
        kinds: &GOOD,
        lat_band: ORDINARY,
        style: Style { slips: 0.1, ..Style::default() },
        columns: Columns { ship_time: true, ..Columns::default() },
        mixed: true,
    };
    hold(&house, 50..52, 0.85, 0.95);
}

/// Less is written, so less can be told apart; nothing may be cried for all that.
#[test]
fn columns_missing() {
    for (name, without) in [
        ("no logged azimuth", &["logged_azimuth"][..]),
        ("no headings", &["gyro_heading", "compass_heading", "speed_kn"][..]),
        (
            "no magnetic compass",
            &["compass_bearing", "compass_heading", "logged_compass_error", "logged_variation", "logged_deviation"][..],
        ),
    ] {
        let house = House {
            name,
            kinds: &GOOD,
            lat_band: ORDINARY,
            style: Style { slips: 0.1, ..Style::default() },
            columns: Columns { without, ..Columns::default() },
            mixed: true,
        };
        hold(&house, 60..62, 0.7, 0.85);
    }
}
