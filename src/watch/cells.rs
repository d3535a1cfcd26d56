//! What was typed, under the log's columns.

use crate::error::BadValue;
use crate::logbook::columns::Column;
use crate::logbook::log::Cells;
use serde_json::Value;

/// The longest text that a cell may hold, bytes.
const LONGEST: usize = 1000;

/// Cells as they were typed.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct Typed {
    cells: Vec<(Column, String)>,
}

impl Typed {
    /// Cells from an object of texts by the names of columns.
    ///
    /// # Errors
    /// [`BadValue`] for anything else: another form, a column that the log does not have, a text that is too long.
    pub fn of(object: &Value) -> Result<Self, BadValue> {
        let Value::Object(members) = object else {
            return Err(BadValue::new(&object.to_string(), "cells: an object of texts by column"));
        };
        let mut cells = Vec::new();
        for (name, value) in members {
            let Some(column) = Column::ALL.iter().copied().find(|c| c.info().name == name) else {
                return Err(BadValue::new(name, "a column of the log"));
            };
            match value {
                Value::String(text) if text.len() <= LONGEST => cells.push((column, text.trim().to_owned())),
                Value::Null => {}
                other => return Err(BadValue::new(&other.to_string(), format!("{name}: a text of at most {LONGEST} bytes"))),
            }
        }
        Ok(Self { cells })
    }

    /// Each cell that is not blank, with its column.
    pub fn iter(&self) -> impl Iterator<Item = (Column, &str)> {
        self.cells.iter().filter(|(_, text)| !text.is_empty()).map(|(column, text)| (*column, text.as_str()))
    }
}

impl Cells for Typed {
    fn has(&self, column: Column) -> bool {
        self.cells.iter().any(|(c, _)| *c == column)
    }

    fn bytes(&self, column: Column) -> &[u8] {
        self.cells.iter().find(|(c, _)| *c == column).map_or(b"", |(_, text)| text.as_bytes())
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use serde_json::json;

    #[test]
    fn cells_and_what_is_none() {
        let typed = Typed::of(&json!({"lat": " 36S ", "lon": null, "body": ""})).unwrap();
        assert_eq!(typed.iter().collect::<Vec<_>>(), [(Column::Lat, "36S")]);
        assert!(typed.has(Column::Body) && !typed.has(Column::Lon));
        for bad in [json!(null), json!([]), json!({"lat": 1}), json!({"latitude": "1"}), json!({"lat": "1".repeat(LONGEST + 1)})] {
            assert!(Typed::of(&bad).is_err(), "{bad}");
        }
    }
}
