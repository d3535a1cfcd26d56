//! The list of columns.

use super::rows::push_csv_text;
use crate::logbook::columns::{ADDED, Column, ColumnInfo};
use std::fmt::Write as _;

/// Each column with whether it is read or added.
fn all() -> impl Iterator<Item = (&'static str, ColumnInfo)> {
    Column::ALL.iter().map(|c| ("read", c.info())).chain(ADDED.into_iter().map(|c| ("added", c)))
}

/// As text.
pub fn text() -> String {
    let mut text = String::from("Read, in any order; all but time, place and body may be left out. Other columns are carried through.\n\n");
    for column in Column::ALL.iter().map(|c| c.info()) {
        let _ = writeln!(text, "{:<22}{}\n{:<22}such as {}", column.name, column.meaning, "", column.example);
    }
    text.push_str("\nAdded behind the log's own, in this order:\n\n");
    for column in ADDED {
        let _ = writeln!(text, "{:<32}{}", column.name, column.meaning);
    }
    text
}

/// As a list of objects.
pub fn json() -> String {
    let list: Vec<serde_json::Value> =
        all().map(|(kind, c)| serde_json::json!({"column": c.name, "kind": kind, "meaning": c.meaning, "example": c.example})).collect();
    serde_json::Value::Array(list).to_string()
}

/// As rows.
pub fn csv() -> String {
    let mut out = b"column,kind,meaning,example\n".to_vec();
    for (kind, c) in all() {
        out.extend_from_slice(format!("{},{kind},", c.name).as_bytes());
        push_csv_text(&mut out, c.meaning, b',');
        out.push(b',');
        push_csv_text(&mut out, c.example, b',');
        out.push(b'\n');
    }
    String::from_utf8_lossy(&out).into_owned()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::report::rows::RowFigures;

    #[test]
    fn the_rows_have_the_columns_of_the_list() {
        let written: Vec<&str> = RowFigures::default().cells().iter().map(|(name, _)| *name).collect();
        assert_eq!(written, ADDED.map(|c| c.name));
    }
}
