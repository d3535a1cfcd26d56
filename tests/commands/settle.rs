//! The command settle: whole answers, and what it refuses.

use super::{answers, shadowpin};
use std::fs;

#[test]
fn settled_not_yet_and_cannot_be_told() {
    answers("settle fixtures/runups/runup_00.csv --lat 51-30N", "settle_settled.txt", 0);
    answers("settle fixtures/runups/runup_11.csv --lat 72N", "settle_not_yet.txt", 1);
    answers("settle fixtures/runups/runup_11.csv --format json", "settle_not_yet.json", 1);
    answers("settle fixtures/runups/runup_11.csv --format csv", "settle_not_yet.csv", 1);
}

fn settle(input: &str, more: &[&str]) -> super::Ran {
    let args: Vec<&str> = ["settle", "-"].iter().chain(more).copied().collect();
    shadowpin(&args, input.as_bytes())
}

#[test]
fn rows_of_any_kind_and_order() {
    let none = settle("utc,gyro_error\n", &[]);
    assert_eq!((none.code, none.out.contains("there is no reading of the gyro")), (Some(1), true), "{}", none.out);
    // Across north; a time with an offset of the clock; a row with nothing in it.
    let headings = "date,time,utc_offset,gyro_heading\n2027-03-04,15:00,+09:00,359.5\n2027-03-04,15:10,+09:00,000.5\n,,,\n";
    let by_heading = settle(headings, &["--true-heading", "000", "--format", "csv"]);
    assert_eq!(by_heading.out.lines().nth(1), Some("1,2027-03-04T06:00:00Z,0.50,,,,"), "{}", by_heading.err);
    assert_eq!(by_heading.out.lines().nth(2), Some("2,2027-03-04T06:10:00Z,-0.50,,,,"));
    let mixed =
        "utc,gyro_error\n2027-03-04T06:10Z,0.5L\n2027-03-04T06:00Z,2H\n2027-03-04T06:10Z,0.5\n2027-03-04T06:10Z,-3\n2027-03-04T06:20Z,x\n";
    let mixed = settle(mixed, &[]);
    assert_eq!(mixed.code, Some(3));
    for said in [
        "3 readings from 2027-03-04 06:00 UTC over 10 minutes",
        "put in order of time",
        "copies of an earlier one were left out: 3.",
        "Rows 1 and 4 have the same time",
    ] {
        assert!(mixed.out.contains(said), "{said}\n{}", mixed.out);
    }
    assert!(mixed.err.starts_with("standard input, line 6 (row 5): gyro_error: \"x\""), "{}", mixed.err);
}

/// A bearing of the sun in a run-up gives the gyro error that `azimuth` gives of it.
#[test]
fn bearings_are_worked_as_any_observation() {
    let row = "ship_time,zone,position,body,gyro_bearing,gyro\n2026-06-14 15:12,-9,36-05.8S 130-33.6E,Sun,318.5,No.1\n";
    let run_up = settle(row, &["--format", "csv"]);
    let azimuth = "azimuth --utc 2026-06-14T06:12:00Z --lat 36-05.8S --lon 130-33.6E --body Sun --gyro 318.5 --format json";
    let worked: serde_json::Value = serde_json::from_str(&shadowpin(&azimuth.split(' ').collect::<Vec<_>>(), b"").out).unwrap();
    let error = format!("{:.2}", worked["gyro_error"].as_f64().unwrap());
    assert_eq!(run_up.out.lines().nth(1), Some(format!("1,2026-06-14T06:12:00Z,{error},,,,").as_str()), "{}", run_up.err);
}

#[test]
fn what_is_refused() {
    for (input, more, said) in [
        (
            "utc,gyro_heading\n2027-03-04T06:00Z,1\n",
            &[][..],
            "standard input has headings: say the ship's true heading with --true-heading",
        ),
        ("utc,heading\n", &[], "expected the columns utc and gyro_error"),
        ("utc,gyro,gyro_error\n2027-03-04T06:00Z,1,0\n2027-03-04T06:10Z,2,0\n", &[], "two gyros, \"1\" and \"2\": a run-up is of one"),
        ("utc,gyro_type,gyro_error\n2027-03-04T06:00Z,other,0\n", &[], "line 2: a gyro of the type other does not swing"),
        ("", &[], "the file is empty"),
        ("utc,gyro_error\n", &["--lat", "95"], "--lat"),
    ] {
        let ran = settle(input, more);
        assert_eq!(ran.code, Some(2), "{input}");
        assert!(ran.err.contains(said), "{said}: {}", ran.err);
    }
}

/// What was read is never written over, whatever the output is called, and no two outputs are one file.
#[test]
fn the_input_is_never_written_over() {
    let folder = tempfile::tempdir().unwrap();
    let run_up = folder.path().join("run_up.csv");
    let text = "utc,gyro_error\n2027-03-04T06:00Z,1\n";
    fs::write(&run_up, text).unwrap();
    let name = run_up.to_str().unwrap();
    let otherwise = format!("{}/./run_up.csv", folder.path().display());
    let picture = format!("{}/picture.svg", folder.path().display());
    for outputs in [["-o", name, "-q", "-q"], ["--chart", &otherwise, "-o", &picture], ["--chart", &picture, "-o", &picture]] {
        let args: Vec<&str> = ["settle", name].into_iter().chain(outputs.into_iter().filter(|a| *a != "-q")).collect();
        let ran = shadowpin(&args, b"");
        assert_eq!((ran.code, ran.out.as_str()), (Some(2), ""), "{args:?}");
        assert_eq!(fs::read_to_string(&run_up).unwrap(), text, "{args:?}");
    }
    let swing = shadowpin(&["swing", name, "--card-out", name], b"");
    assert_eq!((swing.code, fs::read_to_string(&run_up).unwrap().as_str()), (Some(2), text), "{}", swing.err);
    assert!(swing.err.contains("is the input itself"), "{}", swing.err);
}

/// The same bytes each time, the readings as marks, and words for those who cannot see it.
#[test]
fn the_chart() {
    let folder = tempfile::tempdir().unwrap();
    let draw = |name: &str| {
        let path = folder.path().join(name);
        let ran = shadowpin(&["settle", "fixtures/runups/runup_11.csv", "--chart", path.to_str().unwrap(), "-q"], b"");
        assert_eq!(ran.code, Some(1), "{}", ran.err);
        fs::read_to_string(path).unwrap()
    };
    let svg = draw("a.svg");
    assert_eq!(svg, draw("b.svg"));
    assert!(svg.starts_with("<svg ") && svg.contains("<title") && svg.contains("Not yet: it is expected"));
    // Thirteen readings: nine on the scale, two above it and two below.
    assert_eq!((svg.matches("<circle").count(), svg.matches(" z\"").count()), (9, 4));
    assert!(svg.contains("stroke-dasharray") && !svg.contains("NaN") && !svg.contains("-0.0"));
}

/// The speed error beside an observed one: what it looks like, and what is wanting.
#[test]
fn speed_error_beside_an_observation() {
    let azimuth = |more: &str| {
        let line = format!("azimuth --utc 2027-03-04T08:00:00Z --lat 50N --lon 5W --body Sun --gyro 113 {more}");
        shadowpin(&line.split_whitespace().collect::<Vec<_>>(), b"").out
    };
    let said = azimuth("--gyro-heading 005 --speed 20");
    assert!(
        said.contains("Speed error at 20 kn on that course, were the corrector off: 2.0 H; the error observed looks like it: is the speed corrector on?\n"),
        "{said}"
    );
    assert!(azimuth("--speed 20").contains("Speed error: it goes with the course, so the heading by gyro is needed too.\n"));
    assert!(!azimuth("--gyro-heading 005").contains("Speed error"));
}
