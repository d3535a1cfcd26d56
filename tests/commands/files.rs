//! Logs in and out: what is kept, what is refused, what the shell is told.

use super::{fixture, shadowpin};

const HEADER: &str = "utc,lat,lon,body,gyro_bearing,note to self\n";

fn log(rows: &str) -> Vec<u8> {
    format!("{HEADER}{rows}").into_bytes()
}

/// A sun bearing that needs no explanation.
const GOOD: &str = "2026-06-14T06:12:00Z,36-05.8S,130-33.6E,Sun,319.0,\"kept, as \"\"it\"\" is\"\n";

#[test]
fn cells_are_carried_unchanged_and_rows_keep_their_place() {
    let rows = format!("{GOOD}2026-06-14T06:12:00Z,95,130-33.6E,Sun,319.5,x\n,,,,,\n{GOOD}");
    let ran = shadowpin(&["review", "-", "-q"], &log(&rows));
    assert_eq!(ran.code, Some(3));
    let lines: Vec<&str> = ran.out.lines().collect();
    assert_eq!(lines.len(), 5);
    assert!(lines[0].starts_with(HEADER.trim_end()));
    assert!(lines[1].starts_with(GOOD.trim_end()));
    assert!(lines[2].contains("lat: \"\"95\"\": expected a latitude from 90 S to 90 N"), "{}", lines[2]);
    assert!(lines[3].chars().all(|c| c == ','), "{}", lines[3]);
    let width =
        |line: &str| csv::ReaderBuilder::new().has_headers(false).from_reader(line.as_bytes()).records().next().unwrap().unwrap().len();
    assert!(lines.iter().all(|l| width(l) == 6 + 23));
}

#[test]
fn file_and_standard_input_give_the_same_bytes() {
    let path = fixture("logs/fleet_2025.csv");
    let from_file = shadowpin(&["review", path.to_str().unwrap(), "-q"], b"");
    let from_input = shadowpin(&["review", "-", "-q"], &std::fs::read(&path).unwrap());
    assert_eq!(from_file.code, Some(1));
    assert!(from_file.out == from_input.out && from_file.out.lines().count() == 2128);
}

#[test]
fn the_log_itself_is_never_written() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("log.csv");
    std::fs::write(&path, log(GOOD)).unwrap();
    let name = path.to_str().unwrap();
    for option in ["-o", "--summary"] {
        let ran = shadowpin(&["review", name, option, name], b"");
        assert_eq!(ran.code, Some(2));
        assert!(ran.err.contains("a log is never overwritten"), "{}", ran.err);
    }
    assert_eq!(std::fs::read(&path).unwrap(), log(GOOD));
}

#[test]
fn an_earlier_output_is_replaced_only_when_asked() {
    let once = shadowpin(&["review", "-", "-q"], &log(GOOD)).out;
    let refused = shadowpin(&["review", "-", "-q"], once.as_bytes());
    assert_eq!(refused.code, Some(2));
    assert!(refused.err.contains("--again"), "{}", refused.err);
    assert_eq!(shadowpin(&["review", "-", "-q", "--again"], once.as_bytes()).out, once);
}

#[test]
fn json_lines_have_the_same_names() {
    let ran = shadowpin(&["review", "-", "-q", "--format", "json"], &log(&format!("{GOOD},,,,,\n")));
    assert_eq!(ran.code, Some(0));
    let rows: Vec<serde_json::Value> = ran.out.lines().map(|l| serde_json::from_str(l).unwrap()).collect();
    assert_eq!(rows[0]["note to self"], "kept, as \"it\" is");
    assert!(rows[0]["gyro_error"].is_f64() && rows[0]["compass_error"].is_null());
    assert!(rows[1].as_object().unwrap().values().all(serde_json::Value::is_null));
    let csv = shadowpin(&["review", "-", "-q"], &log(GOOD)).out;
    let names: Vec<&str> = csv.lines().next().unwrap().split(',').collect();
    assert_eq!(rows[0].as_object().unwrap().keys().map(String::as_str).collect::<Vec<_>>(), names);
}

#[test]
fn json_lines_keep_what_spreadsheets_write_and_name_each_column_once() {
    let bytes = b"utc,lat,lon,body,gyro_bearing,extra,extra,\n2026-06-14T06:12Z,36\xB005.8\x92S,130E,Sun,319,a,b,c\n";
    let ran = shadowpin(&["review", "-", "-q", "--format", "json"], bytes);
    let found: serde_json::Value = serde_json::from_str(ran.out.trim()).unwrap();
    assert_eq!(found["lat"], "36°05.8’S");
    assert_eq!((&found["extra"], &found["extra (column 7)"], &found["column 8"]), (&"a".into(), &"b".into(), &"c".into()));
}

#[test]
fn decimal_commas_are_read_and_carried_as_they_are() {
    let point = "utc;position;body;gyro_bearing;logged_gyro_error\n2026-06-14T06:12Z;36-05.8S, 130-33.6E;Sun;319.5;1.1W\n";
    let comma = "utc;position;body;gyro_bearing;logged_gyro_error\n2026-06-14T06:12Z;36-05,8S, 130-33,6E;Sun;319,5;1,1W\n";
    let with_point = shadowpin(&["review", "-", "-q"], point.as_bytes());
    let with_comma = shadowpin(&["review", "-", "-q", "--decimal-comma"], comma.as_bytes());
    let ours = |ran: &super::Ran, log: &str| ran.out.lines().last().unwrap().strip_prefix(log.lines().last().unwrap()).map(str::to_owned);
    assert!(ours(&with_point, point).is_some_and(|figures| figures.starts_with(";318.379;")), "{}", with_point.out);
    assert_eq!(ours(&with_comma, comma), ours(&with_point, point));
    let bad = comma.replace("319,5", "419,5");
    assert!(shadowpin(&["review", "-", "--decimal-comma"], bad.as_bytes()).err.contains("gyro_bearing: \"419,5\": expected"));
}

#[test]
fn exit_zero_is_for_engines() {
    let bad = log("2026-06-14T06:12:00Z,95,1,Sun,319.5,\n");
    assert_eq!(shadowpin(&["review", "-", "-q"], &bad).code, Some(3));
    assert_eq!(shadowpin(&["review", "-", "-q", "--exit-zero"], &bad).code, Some(0));
    assert_eq!(shadowpin(&["review", "-", "-q", "--exit-zero"], b"").code, Some(2));
}

#[test]
fn a_reader_that_goes_away_is_no_fault() {
    use std::process::{Command, Stdio};
    let mut child = Command::new(env!("CARGO_BIN_EXE_shadowpin"))
        .args(["review", fixture("logs/fleet_2025.csv").to_str().unwrap(), "-q"])
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    drop(child.stdout.take());
    let output = child.wait_with_output().unwrap();
    assert_eq!((output.status.code(), output.stderr), (Some(0), Vec::new()));
}

/// A card whose east and west were exchanged is said once, and a card near nil on every heading too.
#[test]
fn cards_are_doubted_aloud() {
    let folder = tempfile::tempdir().unwrap();
    let (log_path, card_path) = (folder.path().join("log.csv"), folder.path().join("card.csv"));
    // Deviation +6 sin(heading), observed by comparison on twelve headings; the card says the opposite.
    let mut rows = String::from("utc,lat,lon,body,gyro_bearing,gyro_heading,compass_heading\n");
    let mut card = String::from("compass_heading,deviation\n");
    for i in 0..12 {
        let heading = f64::from(i) * 30.0;
        let deviation = 6.0 * heading.to_radians().sin();
        card.push_str(&format!("{heading},{:.1}\n", -deviation));
        // True heading = compass heading + deviation + variation (4.6 E there and then); the gyro is right, the sun at 318.4.
        let true_heading = (heading + deviation + 4.6).rem_euclid(360.0);
        rows.push_str(&format!("2026-06-14T06:12:{i:02}Z,36-05.8S,130-33.6E,Sun,318.4,{true_heading:.1},{heading:.1}\n"));
    }
    std::fs::write(&log_path, rows).unwrap();
    std::fs::write(&card_path, card).unwrap();
    let ran = shadowpin(&["review", log_path.to_str().unwrap(), "--card", card_path.to_str().unwrap(), "-o", "/dev/null"], b"");
    assert!(ran.err.contains("Notice: the card: ") && ran.err.contains("card-reversed"), "{}", ran.err);
    std::fs::write(&card_path, "compass_heading,deviation\n0,0.1\n60,0\n120,-0.1\n180,0\n240,0.1\n300,0\n").unwrap();
    let ran = shadowpin(&["review", log_path.to_str().unwrap(), "--card", card_path.to_str().unwrap(), "-o", "/dev/null"], b"");
    assert!(ran.err.contains("card-near-nil"), "{}", ran.err);
}

/// Nor is a card or a limits file, by any command that reads one.
#[test]
fn nothing_that_is_read_is_written_over() {
    let folder = tempfile::tempdir().unwrap();
    let (card, limits) = (folder.path().join("card.csv"), folder.path().join("limits.toml"));
    let (card_text, limits_text) = ("compass_heading,deviation\n0,1\n90,2\n180,-1\n270,-2\n", "[limits]\ndeviation = 4\n");
    std::fs::write(&card, card_text).unwrap();
    std::fs::write(&limits, limits_text).unwrap();
    let (card_name, limits_name) = (card.to_str().unwrap(), limits.to_str().unwrap());
    let place = ["--utc", "2026-06-14T06:12Z", "--lat", "36S", "--lon", "130E"];
    let log = fixture("logs/demo.csv");
    for (command, file, option) in [
        (vec!["review", log.to_str().unwrap()], card_name, "--card"),
        (vec!["review", log.to_str().unwrap()], limits_name, "--limits"),
        ([&["azimuth", "--body", "sun", "--compass-heading", "200"][..], &place].concat(), card_name, "--card"),
        ([&["azimuth", "--body", "sun"][..], &place].concat(), limits_name, "--limits"),
        ([&["amplitude", "--event", "setting"][..], &place].concat(), limits_name, "--limits"),
        ([&["plan"][..], &place].concat(), limits_name, "--limits"),
        (vec!["limits"], limits_name, "--limits"),
        (vec!["settle", "fixtures/runups/runup_00.csv"], limits_name, "--limits"),
    ] {
        let line = [&command[..], &[option, file, "-o", file]].concat();
        let ran = shadowpin(&line, b"");
        assert_eq!(ran.code, Some(2), "{line:?}");
        assert!(ran.err.contains("is the input itself"), "{line:?} {}", ran.err);
    }
    assert_eq!(std::fs::read_to_string(&card).unwrap(), card_text);
    assert_eq!(std::fs::read_to_string(&limits).unwrap(), limits_text);
}
