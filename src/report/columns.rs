//! The list of columns.

use super::rows::push_csv_text;
use crate::logbook::columns::{ADDED, Column, ColumnInfo, KEPT};
use std::fmt::Write as _;

/// Each column with whether it is read, added, or kept by a book.
fn all() -> impl Iterator<Item = (&'static str, ColumnInfo)> {
    Column::ALL
        .iter()
        .map(|c| ("read", c.info()))
        .chain(ADDED.into_iter().map(|c| ("added", c)))
        .chain(KEPT.into_iter().map(|c| ("kept", c)))
}

/// The meaning with the unit, where there is one.
fn meaning(column: &ColumnInfo) -> String {
    if column.unit.is_empty() { column.meaning.to_owned() } else { format!("{} ({})", column.meaning, column.unit) }
}

/// As text.
pub fn text() -> String {
    let mut text = String::from("Read, in any order; all but time, place and body may be left out. Other columns are carried through.\n");
    let mut group = "";
    for column in Column::ALL.iter().map(|c| c.info()) {
        if column.group != group {
            group = column.group;
            let _ = writeln!(text, "\n{group}");
        }
        let _ = writeln!(text, "  {:<22}{}\n  {:<22}such as {}", column.name, meaning(&column), "", column.example);
    }
    text.push_str("\nAdded behind the log's own, in this order\n");
    for column in ADDED {
        let decimals = column.decimals.map(|d| format!("; {d} decimals")).unwrap_or_default();
        let _ = writeln!(text, "  {:<32}{}{decimals}", column.name, meaning(&column));
    }
    text.push_str("\nKept by a book behind the log's own, in this order\n");
    for column in KEPT {
        let _ = writeln!(text, "  {:<32}{}", column.name, column.meaning);
    }
    text
}

/// As a list of objects; blank is `null`.
pub fn json() -> String {
    let given = |text: &'static str| if text.is_empty() { None } else { Some(text) };
    let object = |(kind, c): (&str, ColumnInfo)| {
        serde_json::json!({
            "column": c.name, "kind": kind, "group": c.group, "meaning": c.meaning, "unit": given(c.unit), "example": given(c.example),
            "decimals": c.decimals,
        })
    };
    serde_json::Value::Array(all().map(object).collect()).to_string()
}

/// As rows.
pub fn csv() -> String {
    let mut out = b"column,kind,group,meaning,unit,example,decimals\n".to_vec();
    for (kind, c) in all() {
        let decimals = c.decimals.map(|d| d.to_string()).unwrap_or_default();
        for (at, text) in [c.name, kind, c.group, c.meaning, c.unit, c.example, &decimals].into_iter().enumerate() {
            if at > 0 {
                out.push(b',');
            }
            push_csv_text(&mut out, text, b',');
        }
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
