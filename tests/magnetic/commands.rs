//! `swing` and `variation` as their user runs them.

use serde_json::Value;
use std::io::Write;
use std::process::{Command, Output, Stdio};

fn run(args: &[&str], input: &str) -> Output {
    let mut child = Command::new(env!("CARGO_BIN_EXE_shadowpin"))
        .args(args)
        .current_dir(env!("CARGO_MANIFEST_DIR"))
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    // The program may end before it reads.
    let _ = child.stdin.take().unwrap().write_all(input.as_bytes());
    child.wait_with_output().unwrap()
}

fn text(bytes: &[u8]) -> String {
    String::from_utf8(bytes.to_vec()).unwrap()
}

fn expected(name: &str) -> String {
    std::fs::read_to_string(format!("{}/fixtures/reports/{name}", env!("CARGO_MANIFEST_DIR"))).unwrap()
}

#[test]
fn swing_of_the_handbooks_example() {
    let out = run(
        &[
            "swing",
            "fixtures/published/deviation_pub226.csv",
            "--vessel",
            "Amber Tern",
            "--compass",
            "standard",
            "--utc",
            "2026-03-01",
            "--place",
            "Invented Roads",
            "--correctors",
            "none moved",
            "--heading",
            "45",
            "--every",
            "22.5",
        ],
        "",
    );
    assert_eq!(out.status.code(), Some(0), "{}", text(&out.stderr));
    assert_eq!(text(&out.stdout), expected("swing_pub226.txt"));
}

#[test]
fn swing_with_blunders_as_text() {
    let out = run(&["swing", "fixtures/swings/swing_19.csv"], "");
    assert_eq!(text(&out.stdout), expected("swing_19.txt"));
}

#[test]
fn swing_as_json_has_the_keys_agreed() {
    let out = run(&["swing", "fixtures/swings/swing_11.csv", "--format", "json", "--every", "10"], "");
    let v: Value = serde_json::from_slice(&out.stdout).unwrap();
    let keys: Vec<&String> = v.as_object().unwrap().keys().collect();
    assert_eq!(keys, ["coefficients", "handbook", "rms", "set_aside", "card", "unproven_headings", "notices"]);
    let names: Vec<&String> = v["coefficients"].as_object().unwrap().keys().collect();
    assert_eq!(names, ["A", "A_u", "B", "B_u", "C", "C_u", "D", "D_u", "E", "E_u"]);
    // Rows 1 and 6 counted from 0.
    assert_eq!(v["set_aside"].as_array().unwrap().iter().map(|s| s["row"].as_u64().unwrap()).collect::<Vec<_>>(), [2, 7]);
    assert_eq!(v["card"].as_array().unwrap().len(), 36);
    assert!(v["card"][35]["deviation_u"].as_f64().unwrap() < 0.5);
}

#[test]
fn a_narrow_arc_is_null_where_it_cannot_tell() {
    let rows: String = (0..10).map(|i| format!("{},{}\n", 30 + 4 * i, 2.0 + 0.1 * f64::from(i))).collect();
    let out = run(&["swing", "-", "--format", "json"], &format!("compass_heading,deviation\n{rows}"));
    assert_eq!(out.status.code(), Some(0));
    let v: Value = serde_json::from_slice(&out.stdout).unwrap();
    for key in ["A", "B", "C", "D", "E", "A_u", "E_u"] {
        assert_eq!(v["coefficients"][key], Value::Null);
    }
    assert_eq!(v["unproven_headings"], serde_json::json!([[66.0, 30.0]]));
    assert_eq!(v["card"][12]["compass_heading"], 180.0);
    assert_eq!(v["card"][12]["deviation"], Value::Null);
    assert!(v["card"][3]["deviation"].is_number());
    assert!(v["notices"].as_array().unwrap().contains(&"undetermined".into()));
}

#[test]
fn too_few_headings_are_refused_in_words() {
    let out = run(&["swing", "-"], "compass_heading,deviation\n0,1\n90,2\n180,1\n270,0\n");
    assert_eq!(out.status.code(), Some(2));
    assert_eq!(
        text(&out.stderr),
        "shadowpin: standard input: deviations on 4 different headings: five coefficients need at least 5, and 8 all round to be trusted\n"
    );
}

#[test]
fn a_bad_row_is_a_problem_and_the_run_goes_on() {
    let input = "compass_heading,deviation\n0,1W\n45,x\n90,2E\n135,1.5\n180,1\n225,0\n270,-1\n315,-1.5\n";
    let out = run(&["swing", "-"], input);
    assert_eq!(out.status.code(), Some(3));
    assert!(text(&out.stdout).contains("      2   not used: deviation: \"x\": expected an error such as 1.5E, 1.5 W, -1.5 or 1½ W"));
}

#[test]
fn the_card_written_is_read_back() {
    let path = std::env::temp_dir().join(format!("shadowpin-card-{}.csv", std::process::id()));
    let out = run(
        &[
            "swing",
            "fixtures/swings/swing_04.csv",
            "--every",
            "10",
            "--card-out",
            path.to_str().unwrap(),
            "--vessel",
            "Tern, Amber",
            "--compass",
            "standard",
            "--utc",
            "2026-03-01T10:00Z",
            "--format",
            "json",
        ],
        "",
    );
    assert_eq!(out.status.code(), Some(0), "{}", text(&out.stderr));
    let v: Value = serde_json::from_slice(&out.stdout).unwrap();
    let cards = shadowpin::logbook::card::read_cards("card", &std::fs::read(&path).unwrap()).unwrap();
    std::fs::remove_file(&path).unwrap();
    let card = cards.iter().next().unwrap();
    assert_eq!((card.of.vessel.as_str(), card.of.magnetic_compass.as_str(), card.points().len()), ("Tern, Amber", "standard", 36));
    let found = card.curve().unwrap().coefficients.to_array();
    for (name, found) in ["A", "B", "C", "D", "E"].into_iter().zip(found) {
        assert!((v["coefficients"][name].as_f64().unwrap() - found).abs() < 0.01);
    }
    assert!(card.notices(None, 24).is_empty());
}

#[test]
fn elsewhere_from_one_place_is_bounded_not_guessed() {
    let args = [
        "swing",
        "fixtures/swings/swing_08.csv",
        "--lat",
        "50N",
        "--lon",
        "5W",
        "--utc",
        "2026-03-01",
        "--for-lat",
        "34S",
        "--for-lon",
        "18E",
    ];
    let out = text(&run(&args, "").stdout);
    assert!(out.contains("If B and C are all permanent: B +"), "{out}");
    assert!(out.contains("Notice: the readings cannot tell permanent from induced magnetism"), "{out}");
    let refused = run(&["swing", "fixtures/swings/swing_08.csv", "--for-lat", "34S", "--for-lon", "18E"], "");
    assert_eq!(refused.status.code(), Some(2));
}

#[test]
fn variation_as_json_has_the_keys_agreed() {
    let out = run(&["variation", "--lat", "-36.096", "--lon", "174.335", "--year", "2026.5", "--format", "json"], "");
    let v: Value = serde_json::from_slice(&out.stdout).unwrap();
    let keys: Vec<&String> = v.as_object().unwrap().keys().collect();
    assert_eq!(
        keys,
        [
            "variation",
            "variation_u",
            "annual_change",
            "inclination",
            "horizontal_nt",
            "north_nt",
            "east_nt",
            "down_nt",
            "total_nt",
            "model",
            "valid_from",
            "valid_to"
        ]
    );
    assert_eq!(v["model"], "WMM2025");
}

#[test]
fn variation_at_its_edges() {
    let variation = |args: &[&str]| {
        let out = run(&[&["variation"], args].concat(), "");
        (out.status.code().unwrap(), text(&out.stdout) + &text(&out.stderr))
    };
    let (code, out) = variation(&["--lat", "90", "--lon", "0", "--year", "2026"]);
    assert!(code == 0 && out.contains("reckoned from the meridian") && out.contains("of no use here"), "{out}");
    let (code, out) = variation(&["--lat", "10", "--lon", "180W", "--utc", "2030-06-01T00:00Z"]);
    assert!(code == 0 && out.contains("the field model ended at 2030.0"), "{out}");
    let (code, out) = variation(&["--lat", "10", "--lon", "20", "--year", "2031.5"]);
    assert_eq!((code, out.as_str()), (2, "shadowpin: no field model for 2031.50: the models span 1900.0 to 2031.0\n"));
    let (code, out) = variation(&["--lat", "91", "--lon", "20", "--year", "2026"]);
    assert_eq!(
        (code, out.as_str()),
        (2, "shadowpin: --lat: \"91\": expected a latitude from 90 S to 90 N; are latitude and longitude exchanged?\n")
    );
    let (code, _) = variation(&["--lat", "10", "--lon", "20"]);
    assert_eq!(code, 2);
}

/// Deviations observed in the English Channel and off the Cape, of a compass with permanent and induced parts.
#[test]
fn elsewhere_from_two_latitudes() {
    use shadowpin::angle::{CompassBearing, Position};
    use shadowpin::compass::curve::{Coefficients, latitude::MagneticPlace};
    use shadowpin::compass::field::field_in_year;
    let b_at = |lat: f64, lon: f64| {
        let place = MagneticPlace::of(&field_in_year(Position::from_deg(lat, lon).unwrap(), 2026.16, 0.0).unwrap()).unwrap();
        5.0 * 20_000.0 / place.horizontal_nt - 3.0 * place.tan_inclination
    };
    let mut rows = String::from("compass_heading,deviation,lat,lon,utc\n");
    for (lat, lon) in [(50.0, -5.0), (-34.0, 18.0)] {
        let curve = Coefficients { a: 0.0, b: b_at(lat, lon), c: 1.0, d: 0.5, e: 0.0 };
        for heading in (0..360).step_by(30) {
            let deviation = curve.deviation_deg(CompassBearing::wrapping_deg(f64::from(heading)));
            rows += &format!("{heading},{deviation:.1},{lat},{lon},2026-03-01T12:00Z\n");
        }
    }
    let out = run(&["swing", "-", "--for-lat", "1-15N", "--for-lon", "103-50E", "--format", "json"], &rows);
    let v: Value = serde_json::from_slice(&out.stdout).unwrap_or_else(|e| panic!("{e}: {}", text(&out.stderr)));
    let b = &v["elsewhere"]["coefficients"]["B"];
    let off = b["value"].as_f64().unwrap() - b_at(1.25, 103.0 + 50.0 / 60.0);
    // The figures are written to 0.1: far inside the u that readings at sea would have.
    assert!(off.abs() < 0.1 && b["u"].as_f64().unwrap() < 0.5, "{b} {off}");
    assert_eq!(v["notices"], serde_json::json!(["latitudes-mixed"]));
    assert_eq!(v["elsewhere"]["card"].as_array().unwrap().len(), 24);
    let words = text(&run(&["swing", "-", "--for-lat", "1-15N", "--for-lon", "103-50E"], &rows).stdout);
    assert!(words.contains("B, permanent part") && words.contains("Deviation to expect there"), "{words}");
}

/// Bearings of the sun on twelve headings, and of a mark, made from known coefficients, give these back.
#[test]
fn swing_from_bearings() {
    use shadowpin::angle::{CompassBearing, Deviation, Position, TrueBearing};
    use shadowpin::compass::curve::Coefficients;
    use shadowpin::compass::field::field;
    use shadowpin::horizon::horizontal;
    use shadowpin::sky::sun;
    use shadowpin::time::text::read_utc;

    let made = Coefficients { a: -0.5, b: 6.0, c: -3.0, d: 1.5, e: 0.5 };
    let here = Position::from_deg(-36.0, 174.9).unwrap();
    let (mut of_sun, mut of_mark) = (
        String::from("utc,lat,lon,body,compass_heading,compass_bearing,turn\n"),
        String::from("compass_heading,charted_bearing,compass_bearing\n"),
    );
    for i in 0..12 {
        let (time, heading) = (format!("2026-03-01T20:{:02}:30Z", 4 * i), CompassBearing::wrapping_deg(30.0 * f64::from(i)));
        let utc = read_utc(&time).unwrap().utc;
        let variation = field(here, utc, 0.0).unwrap().variation;
        // Compass bearing to expect = true - (variation + deviation).
        let bearing = |seen: TrueBearing| seen - (variation + Deviation::wrapping_deg(made.deviation_deg(heading)));
        let sun = bearing(horizontal(&sun::apparent_place(utc), here).unwrap().azimuth).deg();
        of_sun += &format!("{time},36-00.0S,174-54.0E,Sun,{},{sun:.1},clockwise\n", heading.deg());
        let mark = bearing(TrueBearing::wrapping_deg(2.0)).deg();
        of_mark += &format!("{},002,{mark:.1}\n", heading.deg());
    }
    let coefficients = |args: &[&str], input: &str| {
        let out = run(&[&["swing", "-", "--format", "json"], args].concat(), input);
        let v: Value = serde_json::from_slice(&out.stdout).unwrap_or_else(|e| panic!("{e}: {}", text(&out.stderr)));
        assert_eq!((out.status.code(), v["set_aside"].as_array().unwrap().len()), (Some(0), 0));
        ["A", "B", "C", "D", "E"].map(|name| v["coefficients"][name].as_f64().unwrap())
    };
    let by_sun = coefficients(&[], &of_sun);
    let by_mark = coefficients(&["--lat", "36S", "--lon", "174.9E", "--utc", "2026-03-01T20:20Z"], &of_mark);
    for ((by_sun, by_mark), made) in by_sun.into_iter().zip(by_mark).zip(made.to_array()) {
        // Bearings written to 0.1.
        assert!((by_sun - made).abs() < 0.05 && (by_mark - made).abs() < 0.05, "{by_sun} {by_mark} {made}");
    }

    // A mark with no place: every row is a problem, and there is no curve.
    let out = run(&["swing", "-"], &of_mark);
    assert_eq!(out.status.code(), Some(2));
    assert_eq!(
        text(&out.stderr),
        "shadowpin: standard input: deviations on 0 different headings: five coefficients need at least 5, and 8 all round to be trusted; \
         12 rows could not be used, the first is row 1: no place and time: lat, lon and utc, or for a mark --lat, --lon and --utc\n"
    );
    // One row of a body that is not known.
    let out = run(&["swing", "-"], &of_sun.replacen("Sun", "Sum", 1));
    assert_eq!(out.status.code(), Some(3));
    assert!(text(&out.stdout).contains("      1   not used: body: \"Sum\""));
}

#[test]
fn a_file_that_is_no_swing_is_refused_in_words() {
    let out = run(&["swing", "-"], "heading,dev\n1,2\n");
    assert_eq!(out.status.code(), Some(2));
    assert!(text(&out.stderr).ends_with("the columns are heading, dev\n"), "{}", text(&out.stderr));
    assert_eq!(run(&["swing", "no-such-file.csv"], "").status.code(), Some(2));
}

#[test]
fn the_card_beside_an_azimuth() {
    let path = std::env::temp_dir().join(format!("shadowpin-beside-{}.csv", std::process::id()));
    let with_card = |card: &str, more: &[&str]| {
        std::fs::write(&path, card).unwrap();
        let fixed = [
            "azimuth",
            "--utc",
            "2026-06-14T06:12:00Z",
            "--lat",
            "36-05.8S",
            "--lon",
            "130-33.6E",
            "--body",
            "sun",
            "--compass",
            "316",
            "--compass-heading",
            "22.5",
            "--card",
            path.to_str().unwrap(),
        ];
        run(&[&fixed, more].concat(), "")
    };
    // B 4, C 2 on eight headings: by the curve 4 sin 22.5 + 2 cos 22.5 = 3.38; half way between 2.0 and 4.2 in a straight line 3.1.
    let card = "compass_heading,deviation\n0,2.0E\n45,4.2E\n90,4.0E\n135,1.4E\n180,2.0W\n225,4.2W\n270,4.0W\n315,1.4W\n";
    let deviation = |more: &[&str]| {
        let out = with_card(card, &[&["--format", "json"], more].concat());
        let v: Value = serde_json::from_slice(&out.stdout).unwrap_or_else(|e| panic!("{e}: {}", text(&out.stderr)));
        v["card_deviation"].as_f64().unwrap()
    };
    assert!((deviation(&[]) - 3.38).abs() < 0.03);
    assert!((deviation(&["--card-as-given"]) - 3.1).abs() < 1e-9);
    let words = text(&with_card(card, &[]).stdout);
    assert!(words.contains("Card: deviation 3.4 E on heading 022.5 by its curve\nObserved by bearing less card: 5.5 W (u 0.8)"), "{words}");

    let two = with_card("compass_heading,deviation,magnetic_compass\n0,1,standard\n0,2,steering\n", &[]);
    assert_eq!(two.status.code(), Some(2));
    assert!(text(&two.stderr).contains("it holds the cards of several compasses"), "{}", text(&two.stderr));
    let later = with_card("compass_heading,deviation,valid_from\n0,1,2026-07-01\n", &[]);
    assert!(text(&later.stderr).contains("no card in it was in force at that time"), "{}", text(&later.stderr));
    std::fs::remove_file(&path).unwrap();
}
