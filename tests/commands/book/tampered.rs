//! What a check shows of a book that was tampered with, and what it cannot.

use super::{Place, rewrite, seal};

/// A book of six entries, and the answer to the last.
fn six() -> (Place, String) {
    let place = Place::new();
    let last = ["318", "318.5", "319", "319.5", "320", "320.5"].map(|gyro| seal(&place.add(gyro)));
    (place, last[5].clone())
}

/// What a check says first after a change of the lines; the header is line 0.
fn first_said(change: impl FnOnce(Vec<String>) -> Vec<String>) -> String {
    let (place, _) = six();
    rewrite(&place.path, change);
    let ran = place.run("check", &[]);
    assert_eq!(ran.code, Some(1), "{}", ran.out);
    ran.out.lines().nth(1).unwrap().to_owned()
}

#[test]
fn sound_until_touched() {
    let (place, last) = six();
    let ran = place.run("check", &[]);
    assert!(ran.code == Some(0) && ran.out.contains("6 entries, the seals hold") && ran.out.contains(&last), "{}", ran.out);
}

#[test]
fn the_first_entry_touched_is_named() {
    let edit = |at: usize, from: &'static str, to: &'static str| {
        move |mut lines: Vec<String>| {
            assert!(lines[at].contains(from), "{}", lines[at]);
            lines[at] = lines[at].replacen(from, to, 1);
            lines
        }
    };
    assert!(first_said(edit(3, ",319,", ",318,")).starts_with("entry 3 (line 4) is not as it was sealed"));
    assert!(first_said(edit(1, "Sun", "Moon")).starts_with("entry 1 (line 2) is not"));
    assert!(first_said(edit(6, "06:12", "06:13")).starts_with("entry 6 (line 7) is not"));
    let removed = first_said(|mut lines| {
        lines.drain(3..5);
        lines
    });
    assert_eq!(removed, "entries 3 to 4 were removed: they stood before line 4");
    let inserted = first_said(|mut lines| {
        lines.insert(3, lines[4].replace(",319.5,", ",300,"));
        lines
    });
    assert!(inserted.starts_with("line 4 (it says entry 4) was inserted"), "{inserted}");
    let moved = first_said(|mut lines| {
        lines.swap(3, 4);
        lines
    });
    assert!(moved.starts_with("entry 4 (line 4) was moved"), "{moved}");
    let by_hand = first_said(|mut lines| {
        lines.push(lines[1].split(",1,").next().unwrap().to_owned());
        lines
    });
    assert!(by_hand.starts_with("line 8 was inserted"), "{by_hand}");
}

#[test]
fn findings_for_a_program() {
    let (place, _) = six();
    rewrite(&place.path, |mut lines| {
        lines.remove(2);
        lines[4] = lines[4].replace(",320,", ",321,");
        lines
    });
    let ran = place.run("check", &["--format", "json"]);
    let found: serde_json::Value = serde_json::from_str(&ran.out).unwrap();
    assert_eq!((ran.code, &found["holds"], &found["entries"]), (Some(1), &false.into(), &5.into()));
    let ids: Vec<_> = found["findings"].as_array().unwrap().iter().map(|f| (f["id"].as_str().unwrap(), f["entry"].as_u64())).collect();
    assert_eq!(ids, [("removed", Some(2)), ("altered", Some(5))]);
    let csv = place.run("check", &["--format", "csv"]).out;
    assert!(csv.starts_with("finding,entry,line,text\nremoved,2,3,"), "{csv}");
    assert!(place.run("check", &[]).out.contains("\nfirst: entry 2 was removed"));
    // The record goes on, and says what it found.
    let ran = place.add("318");
    assert_eq!(ran.err.lines().count(), 2, "{}", ran.err);
    assert_eq!(place.findings().len(), 2);
}

/// The seals alone cannot show a tail cut off, or a file written anew; the seal on a signed page does.
#[test]
fn the_seal_of_a_signed_page() {
    let (place, last) = six();
    let signed = place.run("check", &["--seal", &last]);
    assert!(signed.code == Some(0) && signed.out.contains("is that of entry 6"), "{}", signed.out);
    let beginning = last[..18].to_uppercase();
    assert_eq!(place.run("check", &["--seal", &beginning]).code, Some(0));
    rewrite(&place.path, |mut lines| {
        lines.truncate(5);
        lines
    });
    let cut = place.run("check", &[]);
    assert!(cut.code == Some(0) && cut.out.contains("Not shown by the seals: a tail cut off"), "{}", cut.out);
    let missed = place.run("check", &["--seal", &last]);
    assert!(missed.code == Some(1) && missed.out.contains("no entry has the seal of that page"), "{}", missed.out);
    for bad in ["12345678", "not a seal at all", ""] {
        assert_eq!(place.run("check", &["--seal", bad]).code, Some(2), "{bad}");
    }
}

/// Saved again with semicolons, quotes, other line ends and a mark, figures without their noughts: nothing was altered.
#[test]
fn a_re_save_is_no_alteration() {
    let (place, last) = six();
    let rows: Vec<csv::StringRecord> =
        csv::ReaderBuilder::new().has_headers(false).from_path(&place.path).unwrap().records().map(Result::unwrap).collect();
    let mut text = String::from("\u{feff}sep=;\r\n");
    for row in rows {
        let cells: Vec<String> = row.iter().map(|cell| format!("\"{}\"", if cell == "318" { "0318.0" } else { cell })).collect();
        text += &(cells.join(";") + ";;\r\n");
    }
    std::fs::write(&place.path, text).unwrap();
    let ran = place.run("check", &["--seal", &last]);
    assert_eq!(ran.code, Some(0), "{}", ran.out);
    assert_eq!(super::entered(&place.add("321")), Some(7));
    assert_eq!(place.findings(), []);
}
