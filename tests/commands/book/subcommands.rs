//! What each subcommand enters and shows.

use super::{Place, SUN, entered, rewrite, seal};
use crate::commands::shadowpin;

#[test]
fn an_observation_is_worked_and_entered() {
    let place = Place::new();
    let ran = place.run("add", &[&SUN[..], &["--gyro", "318.5", "--compass", "314.5", "--observer", "2/O"]].concat());
    assert!(ran.code == Some(0) && ran.err.is_empty(), "{}", ran.err);
    // The same working as the command for one bearing.
    let worked = shadowpin(&[&["azimuth"][..], &SUN, &["--gyro", "318.5", "--compass", "314.5"]].concat(), b"").out;
    assert!(ran.out.starts_with(&worked), "{}", ran.out);
    assert_eq!(entered(&ran), Some(1));
    let text = place.text();
    let row = text.lines().last().unwrap();
    for part in ["2026-06-14T06:12:00Z", "36-05.8S,130-33.6E", ",Sun,azimuth,", ",318.5,314.5,", ",318.4,0.1 H,3.9 E,4.6 E,0.7 W,2/O,,1,"] {
        assert!(row.contains(part), "{part} {row}");
    }
    assert!(row.ends_with(&seal(&ran)));
    let json = place.run("add", &[&SUN[..], &["--gyro", "319", "--format", "json"]].concat());
    let object: serde_json::Value = serde_json::from_str(&json.out).unwrap();
    assert_eq!((&object["entry"], &object["gyro_bearing"], &object["limb"]), (&"2".into(), &"319".into(), &serde_json::Value::Null));
}

#[test]
fn every_method_and_none() {
    let place = Place::new();
    let at = &SUN[..6];
    let risen = ["--utc", "2026-06-13T22:30:00Z", "--zone", "-9", "--position", "36-05.8S 130-33.6E", "--body", "sun"];
    let ran = place.run("add", &[&risen[..], &["--method", "rising", "--gyro", "060.5", "--eye-height", "18"]].concat());
    assert!(ran.out.starts_with("Sun rising on the celestial horizon") && entered(&ran) == Some(1), "{}{}", ran.out, ran.err);
    let mark = ["--method", "transit", "--mark", "North Rock light", "--charted-bearing", "045.5", "--gyro", "045"];
    let ran = place.run("add", &[at, &mark].concat());
    assert!(ran.out.contains("gyro error                           0.5 L") && entered(&ran) == Some(2), "{}{}", ran.out, ran.err);
    let ran = place.run("add", &[at, &["--method", "comparison", "--gyro-heading", "204", "--compass-heading", "200.5"]].concat());
    assert!(ran.out.starts_with("Headings compared") && entered(&ran) == Some(3), "{}{}", ran.out, ran.err);
    let ran = place.run("add", &["--utc", "now", "--none", "overcast"]);
    assert!(ran.out.starts_with("No observation: overcast") && entered(&ran) == Some(4), "{}{}", ran.out, ran.err);
    // A star by day is entered as it was seen, with a notice.
    let ran = place.run("add", &[at, &["--body", "vega", "--gyro", "10"]].concat());
    assert!(ran.out.contains("Notice: ") && entered(&ran) == Some(5), "{}{}", ran.out, ran.err);
    assert_eq!(place.findings(), []);
    let shown = place.run("show", &[]).out;
    for part in [
        "2026-06-14 07:30:00 (zone -9)",
        "North Rock light transit (045.5 by the chart)",
        "headings compared",
        "no observation",
        "overcast",
    ] {
        assert!(shown.contains(part), "{part}\n{shown}");
    }
}

#[test]
fn what_is_missing_or_wrong_is_said_and_nothing_entered() {
    let place = Place::new();
    for (args, part) in [
        (&["--body", "sun"][..], "--utc: blank"),
        (&["--utc", "2026-06-14T06:12Z", "--lat", "95S", "--lon", "130E", "--body", "sun", "--gyro", "1"], "--lat: \"95S\""),
        (&SUN[..], "--gyro, --compass: a bearing"),
        (&SUN[..6], "say --none with the reason"),
        (&["--none", "fog"], "--utc: blank"),
        (&["--utc", "yesterday", "--none", "fog"], "--utc: \"yesterday\""),
        (&["--utc", "now", "--none", " "], "--none: the reason is missing"),
        (&["--utc", "now", "--none", "fog", "--body", "sun"], "cannot be used with"),
        (&["--ship-time", "2026-06-14 15:12", "--none", "fog"], "--zone: blank"),
    ] {
        let ran = place.run("add", args);
        assert_eq!(ran.code, Some(2), "{args:?}");
        assert!(ran.err.contains(part), "{args:?}\n{}", ran.err);
        assert!(!place.path.exists(), "{args:?}");
    }
    for (subcommand, args) in
        [("show", &[][..]), ("check", &[]), ("print", &[]), ("sign", &["--rank", "Master"]), ("correct", &["1", "--why", "x"])]
    {
        assert_eq!(place.run(subcommand, args).code, Some(2));
        assert!(!place.path.exists(), "{subcommand} began a book");
    }
    let over = place.run("add", &[&SUN[..], &["--gyro", "1", "-o", place.name()]].concat());
    assert!(over.code == Some(2) && over.err.contains("never overwritten"), "{}", over.err);
}

#[test]
fn a_correction_is_a_new_entry() {
    let place = Place::new();
    ["318.5", "319", "320"].iter().for_each(|gyro| drop(place.add(gyro)));
    let before = place.text();
    let ran = place.run("correct", &["2", "--why", "318 read for 319", "--gyro", "318"]);
    assert!(entered(&ran) == Some(4) && ran.out.contains("gyro bearing                         318.0"), "{}{}", ran.out, ran.err);
    assert_eq!(entered(&place.run("correct", &["3", "--why", "entered twice"])), Some(5));
    assert!(place.text().starts_with(&before), "an earlier line was changed");
    for (args, part) in [
        (&["2", "--why", "again"][..], "entry 2 is struck through already, by entry 4: 318 read for 319"),
        (&["5", "--why", "x"], "strikes another through"),
        (&["9", "--why", "x"], "there is no entry 9; the last is 5"),
        (&["1", "--why", " "], "--why"),
        (&["1", "--why", "x", "--gyro", "400"], "--gyro: \"400\""),
    ] {
        let ran = place.run("correct", args);
        assert!(ran.code == Some(2) && ran.err.contains(part), "{args:?} {}", ran.err);
    }
    // A correction can be corrected, an observation taken back for a reason, and the other way round.
    assert_eq!(entered(&place.run("correct", &["4", "--why", "it was overcast", "--none", "overcast"])), Some(6));
    let back = place.run("correct", &["6", "--why", "it was not", "--body", "sun", "--gyro", "318.5", "--lat", "36-06S"]);
    assert_eq!(entered(&back), Some(7), "{}", back.err);
    let shown = place.run("show", &[]).out;
    assert!(shown.contains("~    2  ") && shown.contains("struck through by entry 4: 318 read for 319"), "{shown}");
    assert!(shown.contains("     5  Strikes entry 3 through: entered twice"), "{shown}");
    assert!(place.text().lines().last().unwrap().contains(",36-06S,130-33.6E,,Sun,azimuth,"), "{}", place.text());
    assert_eq!(place.findings(), []);
}

#[test]
fn signed_and_shown() {
    let place = Place::new();
    (0..15).for_each(|_| drop(place.add("318.5")));
    assert_eq!(entered(&place.run("sign", &["--rank", "Master", "--name", "J.E."])), Some(16));
    let shown = place.run("show", &["--last", "3"]).out;
    assert!(shown.contains("    16  Signed, Master: entries 1 to 15 confirmed") && shown.contains("16 entries, 3 shown"), "{shown}");
    assert!(!shown.contains("    13  ") && place.run("show", &[]).out.contains("     5  "));
    assert!(place.run("correct", &["16", "--why", "x"]).err.contains("is a signature"));
    let lines = place.run("show", &["--last", "2", "--format", "json"]).out;
    let objects: Vec<serde_json::Value> = lines.lines().map(|l| serde_json::from_str(l).unwrap()).collect();
    assert_eq!((objects.len(), &objects[1]["signed"], &objects[0]["struck_by"]), (2, &"Master".into(), &serde_json::Value::Null));
    // As rows, the whole book comes back byte for byte.
    assert_eq!(place.run("show", &["--last", "99", "--format", "csv"]).out, place.text());
}

#[test]
fn a_review_reads_the_book_as_a_log() {
    let place = Place::new();
    for (minute, gyro) in ["318.5", "219", "318", "318.5"].iter().enumerate() {
        let utc = format!("2026-06-14T06:{:02}:00Z", 10 + minute);
        assert_eq!(
            place.run("add", &["--utc", &utc, "--lat", "36-05.8S", "--lon", "130-33.6E", "--body", "sun", "--gyro", gyro]).code,
            Some(0)
        );
    }
    place.run("correct", &["2", "--why", "219 written for 319", "--gyro", "319"]);
    place.run("correct", &["4", "--why", "entered twice"]);
    place.run("sign", &["--rank", "Master"]);
    let ran = shadowpin(&["review", place.name(), "--format", "json"], b"");
    assert_eq!(ran.code, Some(0), "{}\n{}", ran.err, ran.out);
    let rows: Vec<serde_json::Value> = ran.out.lines().map(|l| serde_json::from_str(l).unwrap()).collect();
    let worked: Vec<bool> = rows.iter().map(|row| row["gyro_error"].is_f64()).collect();
    assert_eq!(worked, [true, false, true, false, true, false, false]);
    assert!(rows.iter().all(|row| row["problem"].is_null() && row["queries"].is_null()), "{}", ran.out);
    assert!(ran.err.contains("3 rows, 0 with a query, 0 with a problem"), "{}", ran.err);
}

#[test]
fn a_page_for_paper() {
    let place = Place::new();
    for (day, gyro) in [("13", "318"), ("14", "319"), ("15", "320")] {
        let utc = format!("2026-06-{day}T06:12:00Z");
        place.run(
            "add",
            &["--utc", &utc, "--lat", "36-05.8S", "--lon", "130-33.6E", "--body", "sun", "--gyro", gyro, "--remarks", "<b>&\"=1+1"],
        );
    }
    let struck = place.run("correct", &["2", "--why", "misread", "--gyro", "318"]);
    let file = place.folder.path().join("page.html");
    let ran = place.run("print", &["--from", "2026-06-14", "--to", "2026-06-14", "-o", file.to_str().unwrap()]);
    assert!(ran.code == Some(0) && ran.out.is_empty(), "{}", ran.err);
    let page = std::fs::read_to_string(file).unwrap();
    for part in [
        "2026-06-14 to 2026-06-14 UTC",
        "size: A4 landscape",
        "2 entries on this page, 4 in the book",
        "Struck through by entry 4: misread",
        "Initials",
        "Signed ",
        "not type-approved",
        &seal(&struck),
        "&lt;b&gt;&amp;",
    ] {
        assert!(page.contains(part), "{part}\n{page}");
    }
    assert!(!page.contains("<script") && !page.contains("http") && !page.contains("<b>") && !page.contains("2026-06-13 06"));
    assert_eq!(place.run("print", &["--from", "2026-06-15", "--to", "2026-06-14"]).code, Some(2));
    assert!(place.run("print", &["--to", "2026-06-13T06:12:00Z"]).out.contains("1 entry on this page"));
    assert!(place.run("print", &["--to", "2026-06-12"]).out.contains("No entry in this span"));
}

#[test]
fn columns_added_by_hand_are_named() {
    let place = Place::new();
    place.add("318.5");
    rewrite(&place.path, |lines| {
        lines.iter().enumerate().map(|(at, line)| line.clone() + if at == 0 { ",weather" } else { ",fog" }).collect()
    });
    let ran = place.run("check", &[]);
    assert!(ran.code == Some(0) && ran.out.contains("no seal covers what stands under weather"), "{}", ran.out);
    place.add("319");
    assert_eq!(place.findings(), []);
}

#[test]
fn what_the_ships_instruments_say() {
    let place = Place::new();
    let bridge = "fixtures/nmea/bridge.nmea";
    let ran = place.run("add", &["--nmea", bridge, "--body", "sun", "--gyro", "318.5", "--gyro-heading", "205"]);
    assert_eq!(ran.code, Some(0), "{}", ran.err);
    assert!(ran.out.contains("position              36°05.8'S 130°33.6'E   GNRMC"), "{}", ran.out);
    let none = place.run("add", &["--nmea", bridge, "--none", "overcast", "--format", "csv"]);
    assert!(none.code == Some(0) && none.err.contains("From the ship's instruments"), "{}", none.err);
    let shown = place.run("show", &[]).out;
    // What was given by hand stays; the rest is as it was heard.
    for part in ["2026-06-14 06:12:00 UTC   36-05.8S 130-33.6E   Sun", "heading gyro 205 / compass 200.5", "no observation"] {
        assert!(shown.contains(part), "{part}\n{shown}");
    }
    // A stale fix is no position, and nothing is entered.
    let stale = place.run("add", &["--nmea", "fixtures/nmea/nothing.nmea", "--body", "sun", "--gyro", "318.5"]);
    assert_eq!(stale.code, Some(2));
    assert_eq!(place.run("show", &[]).out, shown);
}

#[test]
fn the_last_watches() {
    let book = "fixtures/books/amber_tern.csv";
    let shown = |args: &[&str]| {
        let out = super::super::shadowpin(&[&["book", "show", book][..], args].concat(), b"").out;
        out.lines().filter(|line| line.get(..6).is_some_and(|n| n.trim_start_matches('~').trim().parse::<u32>().is_ok())).count()
    };
    // Entries at 0730, 1512 (and its correction) and 1930 by ship's time, and a signature.
    assert_eq!([1, 2, 3, 4, 6].map(|n| shown(&["--watches", &format!("{n}")])), [2, 4, 5, 5, 5]);
    assert_eq!(shown(&["--last", "3"]), 3);
    assert_eq!(shown(&[]), 5);
}
