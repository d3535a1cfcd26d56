//! Workbooks, folders and several logs as one; column names other than ours.

use super::{fixture, shadowpin};
use std::collections::BTreeMap;
use std::io::{Cursor, Write};
use std::path::Path;

const RECORD: &str = "fixtures/workbooks/record.xlsx";
const NAMES: &str = "fixtures/workbooks/names.toml";

/// The figures of each row by vessel and time of day: what must not hang on where a row was read from.
fn figures(out: &str) -> BTreeMap<String, Vec<String>> {
    let mut reader = csv::Reader::from_reader(out.as_bytes());
    let titles = reader.headers().unwrap().clone();
    let at = |name: &str| titles.iter().position(|t| t == name).unwrap();
    let when = ["utc", "Time UTC"].iter().find_map(|name| titles.iter().position(|t| t == *name)).unwrap();
    let vessel = ["vessel", "Ship"].iter().find_map(|name| titles.iter().position(|t| t == *name)).unwrap();
    let day = titles.iter().position(|t| t == "Date");
    let ours = ["true_azimuth", "altitude", "gyro_error", "compass_error", "deviation", "queries"].map(at);
    reader
        .records()
        .map(|row| {
            let row = row.unwrap();
            let date = day.map_or(String::new(), |d| format!("{} ", &row[d]));
            (format!("{} {date}{}", &row[vessel], &row[when]), ours.iter().map(|&i| row[i].to_owned()).collect())
        })
        .collect()
}

#[test]
fn a_tab_a_month_is_one_log() {
    let ran = shadowpin(&["review", RECORD, "--columns", NAMES, "--all-sheets"], b"");
    assert_eq!(ran.code, Some(1), "{}", ran.err);
    assert!(ran.err.contains("record.xlsx, sheet 1-11 March: passed over: 6 rows that hold headings, 5 blank rows"), "{}", ran.err);
    assert!(ran.err.contains("sheet Notes: no row among its first 100"), "{}", ran.err);
    // The same rows in the log that the workbook was made from.
    let from_log = figures(&shadowpin(&["review", "fixtures/logs/demo.csv", "-q"], b"").out);
    let found = figures(&ran.out);
    assert_eq!(found.len(), 80);
    for (key, row) in &found {
        assert_eq!(from_log.get(key), Some(row), "{key}");
    }
    // Without being asked for more, the first tab, and it is said.
    let first = shadowpin(&["review", RECORD, "--columns", NAMES], b"");
    assert!(first.err.contains("1-11 March, the first of 3 sheets, is read") && figures(&first.out).len() == 58, "{}", first.err);
    let named = shadowpin(&["review", RECORD, "--columns", NAMES, "--sheet", "12-21 march", "-q"], b"");
    assert_eq!(figures(&named.out).len(), 22);
    let none = shadowpin(&["review", RECORD, "--columns", NAMES, "--sheet", "April"], b"");
    assert!(none.code == Some(2) && none.err.contains("has no sheet April; it has 1-11 March, 12-21 March, Notes"), "{}", none.err);
    // From standard input as well.
    let bytes = std::fs::read(fixture("workbooks/record.xlsx")).unwrap();
    assert_eq!(shadowpin(&["review", "-", "--columns", NAMES, "--sheet", "12-21 march", "-q"], &bytes).out.lines().count(), 23);
}

#[test]
fn a_name_that_is_not_there_comes_with_the_nearest() {
    let folder = tempfile::tempdir().unwrap();
    let names = folder.path().join("names.toml");
    std::fs::write(&names, std::fs::read_to_string(fixture("workbooks/names.toml")).unwrap().replace("Brg Gyro", "Bearing Gyro")).unwrap();
    let ran = shadowpin(&["review", RECORD, "--columns", names.to_str().unwrap()], b"");
    assert_eq!(ran.code, Some(2));
    assert!(ran.err.contains("no column \"bearing gyro\"") && ran.err.contains("Brg Gyro"), "{}", ran.err);
}

#[test]
fn a_swing_in_a_workbook_names_the_cell() {
    let book = "fixtures/workbooks/swing.xlsx";
    let ran = shadowpin(&["swing", book, "--columns", "fixtures/workbooks/swing_names.toml"], b"");
    assert_eq!(ran.code, Some(3), "{}", ran.err);
    assert!(ran.out.contains("not used: cell B6: deviation: \"2.5 X\""), "{}", ran.out);
    assert_eq!(shadowpin(&["swing", book], b"").code, Some(2));
    // Commas between cells and within figures.
    let text = b"compass_heading,deviation\n\"0,0\",\"1,5\"\n90,\"2,0\"\n180,\"-0,5\"\n270,0\n45,\"1,0\"\n";
    let ran = shadowpin(&["swing", "-", "--decimal-comma"], text);
    assert!(ran.code == Some(0) && ran.out.contains("000.0       1.5 E"), "{} {}", ran.out, ran.err);
}

/// A workbook of one sheet, written by hand so that it can hold what no honest one does.
fn workbook(path: &Path, sheet: &str, strings: &str) {
    let mut zip = zip::ZipWriter::new(Cursor::new(Vec::new()));
    let mut part = |name: &str, text: &str| {
        zip.start_file(name, zip::write::SimpleFileOptions::default()).unwrap();
        zip.write_all(text.as_bytes()).unwrap();
    };
    part(
        "_rels/.rels",
        "<Relationships xmlns=\"http://schemas.openxmlformats.org/package/2006/relationships\"><Relationship Id=\"rId1\" \
         Type=\"http://schemas.openxmlformats.org/officeDocument/2006/relationships/officeDocument\" Target=\"xl/workbook.xml\"/>\
         </Relationships>",
    );
    part(
        "xl/workbook.xml",
        "<workbook xmlns=\"http://schemas.openxmlformats.org/spreadsheetml/2006/main\" \
         xmlns:r=\"http://schemas.openxmlformats.org/officeDocument/2006/relationships\"><sheets>\
         <sheet name=\"One\" sheetId=\"1\" r:id=\"rId1\"/></sheets></workbook>",
    );
    part(
        "xl/_rels/workbook.xml.rels",
        "<Relationships xmlns=\"http://schemas.openxmlformats.org/package/2006/relationships\"><Relationship Id=\"rId1\" \
         Type=\"http://schemas.openxmlformats.org/officeDocument/2006/relationships/worksheet\" Target=\"worksheets/sheet1.xml\"/>\
         </Relationships>",
    );
    part("xl/sharedStrings.xml", strings);
    part("xl/worksheets/sheet1.xml", &format!("<worksheet><sheetData>{sheet}</sheetData></worksheet>"));
    std::fs::write(path, zip.finish().unwrap().into_inner()).unwrap();
}

fn row(number: usize, cells: &[&str]) -> String {
    let cell = |(at, text): (usize, &&str)| format!("<c r=\"{}{number}\" t=\"str\"><v>{text}</v></c>", char::from(b'A' + at as u8));
    format!("<row r=\"{number}\">{}</row>", cells.iter().enumerate().map(cell).collect::<String>())
}

#[test]
fn a_workbook_cannot_use_up_the_memory() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("made.xlsx");
    let run = || shadowpin(&["review", path.to_str().unwrap()], b"");
    let header = row(1, &["utc", "lat", "lon", "body", "gyro_bearing"]);
    let good = row(2, &["2026-06-14T06:12:00Z", "36-05.8S", "130-33.6E", "Sun", "319.5"]);
    // One cell at the far corner of the largest sheet there is.
    let far = "<row r=\"1048576\"><c r=\"XFD1048576\"><v>1</v></c></row>";
    workbook(&path, &format!("{header}{good}{far}"), "<sst/>");
    let ran = run();
    assert!(ran.err.contains("1 cell beyond the last column") && ran.out.contains("319."), "{}\n{}", ran.out, ran.err);
    // More words promised than there can be.
    workbook(&path, &format!("{header}{good}"), "<sst uniqueCount=\"99999999999999\"/>");
    let ran = run();
    assert!(ran.code == Some(2) && ran.err.contains("it is damaged"), "{}", ran.err);
    // Half a workbook, and nothing but its first bytes.
    let whole = std::fs::read(&path).unwrap();
    for length in [4, 30, whole.len() / 2, whole.len() - 1] {
        std::fs::write(&path, &whole[..length]).unwrap();
        let ran = run();
        assert!(ran.code == Some(2) && ran.err.contains("no workbook that can be read"), "{length}: {}", ran.err);
    }
    // A cell that cannot be read, named as the sheet has it.
    workbook(&path, &format!("{header}{good}{}", row(7, &["2026-06-14T07:00Z", "95", "130-33.6E", "Sun", "319.5"])), "<sst/>");
    let ran = run();
    assert!(ran.code == Some(3) && ran.err.contains("made.xlsx, sheet One, cell B7 (row 2): lat: \"95\""), "{}", ran.err);
}

/// The demo log's rows, parted by `which`, under its header.
fn parts(which: impl Fn(usize, &str) -> usize, count: usize) -> Vec<String> {
    let text = std::fs::read_to_string(fixture("logs/demo.csv")).unwrap();
    let (header, rows) = text.split_once('\n').unwrap();
    let mut parts = vec![format!("{header}\n"); count];
    for (at, row) in rows.lines().enumerate() {
        let part = &mut parts[which(at, row)];
        part.push_str(row);
        part.push('\n');
    }
    parts
}

#[test]
fn a_folder_is_one_log_in_time_order() {
    let whole = figures(&shadowpin(&["review", "fixtures/logs/demo.csv", "-q"], b"").out);
    let folder = tempfile::tempdir().unwrap();
    // Two that must be woven together, one of an earlier month that comes last by name and has another order of columns, and no logs.
    let late = |row: &str| row.split(',').nth(1).unwrap() >= "2026-04-13";
    let made = parts(|at, row| if late(row) { at % 2 } else { 2 }, 3);
    std::fs::write(folder.path().join("a.csv"), &made[0]).unwrap();
    std::fs::write(folder.path().join("b.csv"), &made[1]).unwrap();
    let mut turned = csv::WriterBuilder::new().delimiter(b';').from_path(folder.path().join("z.csv")).unwrap();
    for record in csv::ReaderBuilder::new().has_headers(false).from_reader(made[2].as_bytes()).records() {
        turned.write_record(record.unwrap().iter().rev()).unwrap();
    }
    turned.flush().unwrap();
    drop(turned);
    std::fs::write(folder.path().join("notes.pdf"), "no log").unwrap();
    std::fs::write(folder.path().join("~$a.xlsx"), "a lock").unwrap();
    let path = folder.path().to_str().unwrap();
    let ran = shadowpin(&["review", path, "-q"], b"");
    let found = figures(&ran.out);
    assert_eq!(found.keys().collect::<Vec<_>>(), whole.keys().collect::<Vec<_>>());
    let order = |row: &[String]| row[5].contains("out-of-order") || row[5].contains("too-far");
    for (key, row) in &found {
        assert_eq!(row[..5], whole[key][..5], "{key}");
        // Whether a row whose time is a slip is out of order may hang on its neighbours; no other row's queries do.
        assert!(row[5] == whole[key][5] || order(row) || order(&whole[key]), "{key}: {row:?} {:?}", whole[key]);
    }
    assert!(found.values().filter(|row| order(row)).count() <= whole.values().filter(|row| order(row)).count() + 1);
    assert!(ran.out.contains("z.csv:2,") && ran.out.contains("a.csv:2,"));
    // The same files, named: the same log. And no output is among what is read.
    let files = ["a.csv", "b.csv", "z.csv"].map(|f| folder.path().join(f).to_str().unwrap().to_owned());
    assert_eq!(shadowpin(&["review", &files[0], &files[1], &files[2], "-q"], b"").out, ran.out);
    let over = shadowpin(&["review", path, "-o", &files[1]], b"");
    assert!(over.code == Some(2) && over.err.contains("a log is never overwritten"), "{}", over.err);
    let empty = tempfile::tempdir().unwrap();
    let none = shadowpin(&["review", empty.path().to_str().unwrap()], b"");
    assert!(none.code == Some(2) && none.err.contains("holds no log"), "{}", none.err);
}

#[test]
fn a_log_without_a_header() {
    let text = std::fs::read_to_string(fixture("logs/demo.csv")).unwrap();
    let (header, rows) = text.split_once('\n').unwrap();
    let titled = shadowpin(&["review", "-", "-q"], text.as_bytes()).out;
    let bare = shadowpin(&["review", "-", "-q", "--header", header], rows.as_bytes());
    assert_eq!(bare.code, Some(1));
    assert_eq!(Some(bare.out.as_str()), titled.split_once('\n').map(|(_, rest)| rest));
    let faulty = shadowpin(&["review", "-", "--header", "utc,lat,lon,body"], b"2026-06-14T06:12Z,95,130,Sun\n");
    assert!(faulty.err.contains("standard input, line 1 (row 1)"), "{}", faulty.err);
}
