//! The reports: one page each, that holds by itself.

mod html;

use crate::commands::{Ran, expected, fixture, shadowpin};
use html::sound;
use std::path::Path;

/// Runs a command with `--report`; its page.
fn report(args: &[&str], input: &str) -> (Ran, String) {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("report.html");
    let ran = shadowpin(&[args, &["--report", path.to_str().unwrap()]].concat(), input.as_bytes());
    let page = std::fs::read_to_string(&path).unwrap_or_else(|e| panic!("no report: {e}\n{}", ran.err));
    (ran, page)
}

/// A review of `log`, given on standard input; the rows go nowhere.
fn review(log: &str, more: &[&str]) -> String {
    let (ran, page) = report(&[&["review", "-", "-q", "-o", "/dev/null"], more].concat(), log);
    assert!(ran.code == Some(0) || ran.code == Some(1) || ran.code == Some(3), "{}", ran.err);
    page
}

/// Compares with a page of `fixtures/reports` that a person has looked at; says where they part, for a whole page is too long to print.
fn same(page: &str, file: &str) {
    let wanted = expected(file);
    if page != wanted {
        let at = page.bytes().zip(wanted.bytes()).take_while(|(a, b)| a == b).count();
        let around = |text: &str| {
            String::from_utf8_lossy(text.as_bytes().get(at.saturating_sub(60)..).unwrap_or_default()).chars().take(160).collect::<String>()
        };
        panic!("{file} differs at byte {at}:\n{}\ninstead of\n{}", around(page), around(&wanted));
    }
}

#[test]
fn whole_pages_are_as_they_were_looked_at() {
    let demo = ["review", "fixtures/logs/demo.csv", "-q", "-o", "/dev/null"];
    let (ran, page) = report(&demo, "");
    assert_eq!(ran.code, Some(1));
    same(&page, "review_demo.html");
    assert!(page == report(&demo, "").1, "another page for the same log");
    assert_eq!(sound(&page).len(), 15);
    let (ran, page) = report(&["swing", "fixtures/swings/swing_19.csv"], "");
    assert_eq!(ran.code, Some(0));
    same(&page, "swing_19.html");
    sound(&page);
    assert!(page.contains("<h1>Table of observed deviations - not an adjuster's certificate</h1>"));
    let (ran, page) = report(&["settle", "fixtures/runups/runup_11.csv", "--lat", "51N"], "");
    assert_eq!(ran.code, Some(1));
    same(&page, "settle_not_yet.html");
    sound(&page);
}

/// What every report must say, and that the words of one's own log are found in it.
#[test]
fn what_a_review_says() {
    let page = expected("review_demo.html");
    for said in [
        "What needs an explanation",
        "What was not evaluated",
        "Limits and models used",
        "not a means of navigation",
        "World Magnetic Model",
        "Never look at the sun",
        "Gyro error over time, Saltmarsh, No.1",
        "Deviation against compass heading, Saltmarsh, standard",
        "Entries by watch, Saltmarsh",
        "hour-1(0.1)",
        "grey band: two u of the curve",
        "prefers-color-scheme: dark",
        "size: A4",
        "fixtures/logs/demo.csv",
    ] {
        assert!(page.contains(said), "{said}");
    }
    // Every query of the rows' output stands on its row's entry.
    let rows = shadowpin(&["review", "fixtures/logs/demo.csv", "-q"], b"").out;
    let mut reader = csv::Reader::from_reader(rows.as_bytes());
    let at = reader.headers().unwrap().iter().position(|h| h == "queries").unwrap();
    for (number, row) in (1..).zip(reader.records()) {
        for query in row.unwrap()[at].split(';').filter(|q| !q.is_empty()) {
            let entry = page.split(&format!("<article id=\"row-{number}\"")).nth(1).unwrap().split("</article>").next().unwrap();
            assert!(entry.contains(&format!("<code>{query}</code>")), "row {number} {query}");
        }
    }
}

const HEADER: &str = "vessel,gyro,repeater,magnetic_compass,utc,lat,lon,body,method,gyro_bearing,compass_bearing,gyro_heading,compass_heading,logged_azimuth,remarks\n";

/// A row in the afternoon of 14 June; the sun bears 318.4 there.
fn row(vessel: &str, minute: u32, logged_azimuth: &str, remarks: &str) -> String {
    format!("{vessel},,,,2026-06-14T06:{minute:02}:00Z,36-05.8S,130-33.6E,Sun,,318.5,314.5,204,200.5,{logged_azimuth},{remarks}\n")
}

#[test]
fn markup_and_script_of_a_log_are_text() {
    let evil = "<script>alert(1)</script>";
    let picture = "\"\"\"><svg onload=alert(1)>\"";
    let mut log = String::from(HEADER);
    for minute in 10..22 {
        log.push_str(&format!(
            "{evil},<img src=x onerror=alert(1)>,{picture},</style><b>,2026-06-14T06:{minute}:00Z,36-05.8S,130-33.6E,Sun,,318.5,314.5,204,200.5,{},{picture}\n",
            300 + minute
        ));
    }
    log.push_str("</title><script>alert(2)</script>,,,,<script>,x,y,Sun,,1,,,,,\n");
    let page = review(&log, &[]);
    assert_eq!(sound(&page), [10, 7]);
    for shown in [
        "&lt;script&gt;alert(1)&lt;/script&gt;",
        "&lt;img src=x onerror=alert(1)&gt;",
        "&quot;&gt;&lt;svg onload=alert(1)&gt;",
        "&lt;/style&gt;&lt;b&gt;",
    ] {
        assert!(page.contains(shown), "{shown}");
    }
    // In titles of pictures as well, and in the reason why a row could not be used.
    assert!(page.contains("Gyro error over time, &lt;script&gt;") && page.contains("Row 13: <bdi>"));
    let swing = "compass_heading,deviation\n0,1\n60,2\n120,0\n180,-1\n240,-2\n300,<script>\n330,1\n";
    let (_, page) = report(&["swing", "-", "--vessel", evil, "--place", "\"><svg onload=x>", "--compass", "</style>"], swing);
    sound(&page);
    assert!(
        page.contains("<bdi>&lt;script&gt;alert(1)&lt;/script&gt;</bdi>") && page.contains("<bdi>&quot;&gt;&lt;svg onload=x&gt;</bdi>")
    );
    let (_, page) = report(&["settle", "-"], "utc,gyro_error\n2027-03-04T06:00Z,1\n2027-03-04T06:10Z,<script>x</script>\n");
    sound(&page);
    assert!(page.contains("&lt;script&gt;"));
}

#[test]
fn logs_with_nothing_in_them_and_nothing_to_ask() {
    let page = review(HEADER, &[]);
    assert!(sound(&page).is_empty());
    assert!(page.contains("No row has a query.") && page.contains("Nothing of any vessel needs an explanation.") && !page.contains("<svg"));
    let page = review(&format!("{HEADER}{}{}", row("", 12, "318.4", ""), row("", 13, "", "")), &[]);
    assert!(sound(&page).is_empty() && page.contains("<dd>2</dd>"));
    // A row without time or place that could not be used.
    let page = review(&format!("{HEADER}A,,,,,,,Sun,,1,,,,,\n"), &[]);
    assert!(sound(&page).is_empty() && page.contains("Row 1: <bdi>"));
}

/// By how far what was measured is over its threshold, then by row.
#[test]
fn the_worst_stand_first() {
    let azimuths = ["319.9", "318.4", "328.0", "319.9", "322.0"];
    let rows: String = azimuths.iter().zip(12..).map(|(z, minute)| row("A", minute, z, "")).collect();
    let page = review(&format!("{HEADER}{rows}"), &[]);
    let order = sound(&page);
    // Rows 1 and 4 are the same but for the sun's own way in three minutes, which takes row 4 further off.
    assert_eq!(order, [3, 5, 4, 1]);
}

#[test]
fn many_queries_and_many_vessels_keep_a_page_in_bounds() {
    let mut log = String::from(HEADER);
    for i in 0..2100 {
        log.push_str(&row("A", 10 + i % 3, if i % 2 == 0 { "320.0" } else { "300" }, ""));
    }
    let page = review(&log, &[]);
    assert_eq!(sound(&page).len(), 2000);
    assert!(page.contains("The worst 2000 are given here; 100 more stand in the rows' output."), "{}", page.len());

    let mut log = String::from(HEADER);
    for vessel in 0..300 {
        for minute in 10..16 {
            // Every third vessel has one azimuth to ask about.
            log.push_str(&row(&format!("Vessel {vessel:03}"), minute, if vessel % 3 == 0 && minute == 12 { "325" } else { "" }, ""));
        }
    }
    let page = review(&log, &[]);
    assert_eq!(sound(&page).len(), 100);
    assert!(page.contains("40 more vessels with something to explain have no pictures here"));
    assert!(page.contains("Vessels with nothing to explain stand in the table at the head only: 200."));
    assert!((0..300).all(|v| page.contains(&format!("<bdi>Vessel {v:03}</bdi>"))));
    assert_eq!(page.matches("Entries by watch, ").count(), 60);
    assert!(page.len() < 1_500_000, "{}", page.len());
}

/// The card is drawn with the deviations, the curve aside.
#[test]
fn the_card_stands_in_the_picture() {
    let folder = tempfile::tempdir().unwrap();
    let card = folder.path().join("card.csv");
    std::fs::write(
        &card,
        "compass_heading,deviation,vessel,valid_from\n0,1\n45,3\n90,0\n135,-2\n180,-1\n225,1\n270,-1\n315,-2\n"
            .replace(",deviation,vessel,valid_from", ",deviation"),
    )
    .unwrap();
    let (_, page) = report(&["review", "fixtures/logs/demo.csv", "-q", "-o", "/dev/null", "--card", card.to_str().unwrap()], "");
    sound(&page);
    assert!(
        page.contains("broken line and diamonds: card") && page.contains("Card at its start") && page.contains("Any vessel, any compass")
    );
}

/// Days, watches and what stands in them, in ship's time by the zone of the longitude.
#[test]
fn watches_are_counted() {
    let at = |utc: &str, method: &str, azimuth: &str| {
        let body = if method == "none" { "" } else { "Sun" };
        format!("A,,,,{utc},10N,030E,{body},{method},{},,,,{azimuth},fog\n", if method == "none" { "" } else { "090" })
    };
    // Two hours east: 05 to 06 UTC is the watch 04-08; the fourth day has nothing, the twentieth begins anew.
    let rows = [
        at("2026-06-14T05:00Z", "", "090"),
        at("2026-06-14T10:00Z", "none", ""),
        at("2026-06-15T05:00Z", "none", ""),
        at("2026-06-16T05:00Z", "", "090"),
        at("2026-06-18T05:00Z", "", "090"),
        at("2026-07-04T05:00Z", "", "090"),
    ];
    let page = review(&format!("{HEADER}{}", rows.concat()), &[]);
    sound(&page);
    let cells =
        |watch: &str, n: [u32; 4]| format!("<th scope=\"row\">{watch}</th>{}", n.map(|n| format!("<td class=\"n\">{n}</td>")).concat());
    // 14 to 18 June and 4 July: six days.
    for line in [cells("04-08", [6, 4, 1, 1]), cells("12-16", [6, 0, 1, 5]), cells("00-04", [6, 0, 0, 6])] {
        assert!(page.contains(&line), "{line}\n{}", page.split("Days with an entry").nth(1).unwrap_or_default());
    }
}

#[test]
fn a_report_is_never_written_over_what_is_read_nor_over_another_output() {
    let folder = tempfile::tempdir().unwrap();
    let log = folder.path().join("log.csv");
    let text = format!("{HEADER}{}", row("", 12, "318.4", ""));
    std::fs::write(&log, &text).unwrap();
    let name = log.to_str().unwrap();
    let otherwise = format!("{}/./log.csv", folder.path().display());
    let out = format!("{}/out", folder.path().display());
    for line in [
        vec!["review", name, "--report", &otherwise],
        vec!["review", name, "-o", &out, "--report", &out],
        vec!["review", name, "--summary", &out, "--report", &out],
        vec!["swing", name, "--report", name],
        vec!["settle", name, "--report", &otherwise],
        vec!["settle", name, "--chart", &out, "--report", &out],
    ] {
        let ran = shadowpin(&line, b"");
        assert_eq!(ran.code, Some(2), "{line:?} {}", ran.err);
        assert!(ran.err.contains("is the input itself") || ran.err.contains("asked for twice"), "{line:?} {}", ran.err);
    }
    assert_eq!(std::fs::read_to_string(&log).unwrap(), text);
    // A folder that is not there is known before the work; nothing is left behind.
    let nowhere = format!("{}/none/report.html", folder.path().display());
    let ran = shadowpin(&["review", name, "-o", &out, "--report", &nowhere], b"");
    assert_eq!(ran.code, Some(2), "{}", ran.err);
    let left: Vec<_> = std::fs::read_dir(folder.path()).unwrap().map(|e| e.unwrap().file_name()).collect();
    assert_eq!(left, ["log.csv"]);
    assert!(!Path::new(&out).exists() && fixture("reports").exists());
}
