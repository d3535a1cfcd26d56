//! What the README lists is what the program has.

use shadowpin::limits::{SETTINGS, Table};

#[test]
fn limits_of_the_readme_are_those_of_the_table() {
    let readme = std::fs::read_to_string(concat!(env!("CARGO_MANIFEST_DIR"), "/README.md")).unwrap();
    let section = readme.split("## Limits and uncertainties").nth(1).and_then(|rest| rest.split("\n## ").next()).unwrap();
    let (limits, uncertainties) = section.split_once("`[uncertainty]`").unwrap();
    for (part, table) in [(limits, Table::Limits), (uncertainties, Table::Uncertainty)] {
        // `watches` is a word, not a number, and has a row of its own.
        let listed: Vec<&str> = part.lines().filter(|l| l.starts_with("| `") && !l.starts_with("| `watches` |")).collect();
        let wanted: Vec<String> = SETTINGS
            .iter()
            .filter(|s| s.table == table)
            .map(|s| format!("| `{}` | {} | {} | {} |", s.key, format!("{} {}", s.default, s.unit).trim_end(), s.what, s.origin))
            .collect();
        assert_eq!(listed, wanted);
    }
}

#[test]
fn queries_of_the_readme_are_those_of_the_list() {
    use shadowpin::report::glossary::{List, words};
    let readme = std::fs::read_to_string(concat!(env!("CARGO_MANIFEST_DIR"), "/README.md")).unwrap();
    let section = readme.split("## What is asked").nth(1).and_then(|rest| rest.split("\n## ").next()).unwrap();
    let listed: Vec<&str> = section.lines().filter(|l| l.starts_with("| `")).collect();
    let keys = |keys: &[&str]| keys.iter().map(|k| format!("`{k}`")).collect::<Vec<_>>().join(", ");
    let queries = words().into_iter().filter(|w| w.list == List::Query);
    let wanted: Vec<String> = queries.map(|w| format!("| `{}` | {} | {} |", w.id, w.when, keys(w.keys))).collect();
    assert_eq!(listed, wanted);
}
