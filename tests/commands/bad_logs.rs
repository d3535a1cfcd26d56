//! Each file of `fixtures/bad_logs` has one fault; the file beside it has the exit code and the exact messages.

use super::{fixture, shadowpin};

#[test]
fn every_fault_gets_its_message() {
    let mut seen = 0;
    let mut wrong = Vec::new();
    let mut paths: Vec<_> = std::fs::read_dir(fixture("bad_logs")).unwrap().map(|e| e.unwrap().path()).collect();
    paths.sort();
    for path in paths.iter().filter(|p| p.extension().is_some_and(|e| e == "csv")) {
        let name = format!("fixtures/bad_logs/{}", path.file_name().unwrap().to_str().unwrap());
        let ran = shadowpin(&["review", &name], b"");
        let messages: Vec<&str> = ran.err.lines().filter(|l| l.starts_with("shadowpin: ") || l.starts_with("fixtures/bad_logs/")).collect();
        let found = format!("exit {}\n{}", ran.code.unwrap(), messages.iter().map(|m| format!("{m}\n")).collect::<String>());
        let expected = std::fs::read_to_string(path.with_extension("messages.txt")).unwrap();
        if found != expected {
            wrong.push(format!("{name}\n--- expected\n{expected}--- found\n{found}"));
        }
        // Nothing is lost: each row of the file is a row of the answer.
        if ran.code != Some(2) {
            let rows = |bytes: &[u8]| csv::ReaderBuilder::new().flexible(true).from_reader(bytes).byte_records().count();
            let text = std::fs::read(path).unwrap();
            if text.starts_with(b"utc,") {
                assert_eq!(rows(ran.out.as_bytes()), rows(&text), "{name}");
            }
        }
        seen += 1;
    }
    assert!(seen > 30, "only {seen} files");
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}
