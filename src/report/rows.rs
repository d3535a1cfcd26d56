//! The columns that a worked row gains, as CSV cells and as JSON members.

use super::fixed::{push_direction, push_fixed};
use crate::compass::{Figure, Worked};
use crate::logbook::columns::ADDED;

/// The decimals that angles have in JSON.
const JSON_DECIMALS: u8 = 4;

/// What is written behind a row's own cells.
#[derive(Debug, Clone, Copy, Default)]
pub struct RowFigures<'a> {
    /// What the observation gives; `None` for a row that could not be worked.
    pub worked: Option<&'a Worked>,
    /// Deviation by the card in force, degrees, east +.
    pub card_deviation_deg: Option<f64>,
    /// Ids of the queries, strongest first, `;` between.
    pub queries: &'a str,
    /// Ids of the slips with the residual each leaves, best first, `;` between.
    pub slip: &'a str,
    /// Ids of the notices, `;` between.
    pub notices: &'a str,
    /// One sentence for a person.
    pub note: &'a str,
    /// Why the row could not be used.
    pub problem: &'a str,
}

/// One cell that is ours.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Cell<'a> {
    /// Nothing.
    Blank,
    /// A figure.
    Figure(f64),
    /// A direction, degrees.
    Direction(f64),
    /// Words.
    Text(&'a str),
}

impl<'a> RowFigures<'a> {
    /// Every column of ours in order: name and cell.
    pub fn cells(&self) -> [(&'static str, Cell<'a>); ADDED.len()] {
        let w = self.worked;
        let direction = |d: Option<f64>| d.map_or(Cell::Blank, Cell::Direction);
        let figure = |f: Option<f64>| f.map_or(Cell::Blank, Cell::Figure);
        fn value<T: Copy>(f: Option<Figure<T>>, deg: impl Fn(T) -> f64) -> Cell<'static> {
            f.map_or(Cell::Blank, |f| Cell::Figure(deg(f.value)))
        }
        fn u<T>(f: Option<Figure<T>>) -> Cell<'static> {
            f.map_or(Cell::Blank, |f| Cell::Figure(f.u_deg()))
        }
        let text = |t: &'a str| if t.is_empty() { Cell::Blank } else { Cell::Text(t) };
        let at_time = w.and_then(|w| w.at_time);
        [
            ("true_azimuth", direction(w.and_then(|w| w.true_azimuth).map(|z| z.deg()))),
            ("altitude", figure(at_time.map(|h| h.altitude_deg))),
            ("azimuth_at_time", direction(at_time.map(|h| h.azimuth.deg()))),
            ("gyro_error", value(w.and_then(|w| w.gyro_error), |e| e.deg())),
            ("gyro_error_u", u(w.and_then(|w| w.gyro_error))),
            ("compass_error", value(w.and_then(|w| w.compass_error), |e| e.deg())),
            ("compass_error_u", u(w.and_then(|w| w.compass_error))),
            ("true_heading", direction(w.and_then(|w| w.true_heading).map(|h| h.deg()))),
            ("compass_error_by_comparison", value(w.and_then(|w| w.compass_error_by_comparison), |e| e.deg())),
            ("compass_error_by_comparison_u", u(w.and_then(|w| w.compass_error_by_comparison))),
            ("variation", value(w.and_then(|w| w.variation), |v| v.deg())),
            ("variation_u", u(w.and_then(|w| w.variation))),
            ("deviation", value(w.and_then(|w| w.deviation), |d| d.deg())),
            ("deviation_u", u(w.and_then(|w| w.deviation))),
            ("deviation_by_comparison", value(w.and_then(|w| w.deviation_by_comparison), |d| d.deg())),
            ("deviation_by_comparison_u", u(w.and_then(|w| w.deviation_by_comparison))),
            ("card_deviation", figure(self.card_deviation_deg)),
            ("trust", w.and_then(|w| w.trust).map_or(Cell::Blank, |t| Cell::Text(t.word()))),
            ("queries", text(self.queries)),
            ("slip", text(self.slip)),
            ("notices", text(self.notices)),
            ("note", text(self.note)),
            ("problem", text(self.problem)),
        ]
    }

    /// Appends the cells with `delimiter` before each.
    pub fn push_csv(&self, out: &mut Vec<u8>, delimiter: u8) {
        for ((_, cell), column) in self.cells().into_iter().zip(&ADDED) {
            let decimals = column.decimals.unwrap_or(JSON_DECIMALS);
            out.push(delimiter);
            match cell {
                Cell::Blank => {}
                Cell::Figure(value) => push_fixed(out, value, decimals),
                Cell::Direction(deg) => push_direction(out, deg, decimals),
                Cell::Text(text) => push_csv_text(out, text, delimiter),
            }
        }
    }

    /// Appends `,"name":value` for each column; blank is `null`.
    pub fn push_json(&self, out: &mut Vec<u8>) {
        for (name, cell) in self.cells() {
            out.extend_from_slice(b",\"");
            out.extend_from_slice(name.as_bytes());
            out.extend_from_slice(b"\":");
            match cell {
                Cell::Blank => out.extend_from_slice(b"null"),
                Cell::Figure(value) => push_fixed(out, value, JSON_DECIMALS),
                Cell::Direction(deg) => push_direction(out, deg, JSON_DECIMALS),
                Cell::Text(text) => push_json_text(out, text),
            }
        }
    }
}

/// A cell of words: quoted where the form asks for it, and never begun so that a spreadsheet takes it for a formula.
pub fn push_csv_text(out: &mut Vec<u8>, text: &str, delimiter: u8) {
    let formula = text.starts_with(['=', '+', '-', '@']);
    let quoted = formula || text.bytes().any(|b| b == delimiter || matches!(b, b'"' | b'\n' | b'\r'));
    if !quoted {
        out.extend_from_slice(text.as_bytes());
        return;
    }
    out.push(b'"');
    if formula {
        out.push(b' ');
    }
    for byte in text.bytes() {
        if byte == b'"' {
            out.push(b'"');
        }
        out.push(byte);
    }
    out.push(b'"');
}

/// A string of JSON, quotes included.
pub fn push_json_text(out: &mut Vec<u8>, text: &str) {
    // Writing a string to a vector does not fail.
    let _ = serde_json::to_writer(out, text);
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn blanks_and_words() {
        let row = RowFigures {
            note: "one, two \"three\"",
            queries: "below-horizon",
            card_deviation_deg: Some(-0.000_01),
            ..RowFigures::default()
        };
        let mut csv = Vec::new();
        row.push_csv(&mut csv, b',');
        assert_eq!(String::from_utf8(csv).unwrap(), ",,,,,,,,,,,,,,,,,0.00,,below-horizon,,,\"one, two \"\"three\"\"\",");
        let mut json = Vec::new();
        row.push_json(&mut json);
        let json: serde_json::Value = serde_json::from_str(&format!("{{{}}}", &String::from_utf8(json).unwrap()[1..])).unwrap();
        assert_eq!(json["card_deviation"], 0.0);
        assert_eq!(json["true_azimuth"], serde_json::Value::Null);
        assert_eq!(json["note"], "one, two \"three\"");
    }

    #[test]
    fn no_cell_of_ours_is_a_formula() {
        for text in ["=1+1", "+1", "-1", "@x"] {
            let mut out = Vec::new();
            push_csv_text(&mut out, text, b',');
            assert_eq!(out.get(..2), Some(&b"\" "[..]));
        }
    }
}
