//! The list of limits.

use super::rows::push_csv_text;
use crate::limits::{Limits, SETTINGS, Table};
use std::fmt::Write as _;

const WATCHES: (&str, &str, &str) = ("watches", "How the watches are kept, for the entries that each should have", "common practice");
const BLIND_ARCS: (&str, &str, &str) =
    ("blind_arcs", "Relative bearings that cannot be seen from the repeaters, clockwise from and to", "the ship");

fn blind_arcs(limits: &Limits) -> String {
    let arcs: Vec<String> = limits.ship.blind_arcs.iter().map(|(from, to)| format!("[{from}, {to}]")).collect();
    format!("[{}]", arcs.join(", "))
}

/// As text: each table, each key with its value, what differs from the built-in value marked.
pub fn text(limits: &Limits) -> String {
    let mut text = String::new();
    for table in [Table::Limits, Table::Uncertainty] {
        let _ = writeln!(text, "[{}]", table.name());
        for setting in SETTINGS.iter().filter(|s| s.table == table) {
            let value = (setting.get)(limits);
            let changed = if value == setting.default { String::new() } else { format!(" (built in: {})", setting.default) };
            let _ = writeln!(text, "{:<24}{:>7} {:<17}{}{changed}", setting.key, value.to_string(), setting.unit, setting.what);
            let _ = writeln!(text, "{:<49}{}", "", setting.origin);
        }
        if table == Table::Limits {
            let _ = writeln!(text, "{:<24}{:>7} {:<17}{}\n{:<49}{}", WATCHES.0, limits.watches.word(), "", WATCHES.1, "", WATCHES.2);
        }
        text.push('\n');
    }
    let _ = writeln!(text, "[ship]\n{:<24}{}\n{:<49}{}\n{:<49}{}", BLIND_ARCS.0, blind_arcs(limits), "", BLIND_ARCS.1, "", BLIND_ARCS.2);
    text
}

/// As a list of objects.
pub fn json(limits: &Limits) -> String {
    let mut list: Vec<serde_json::Value> = SETTINGS
        .iter()
        .map(|s| {
            serde_json::json!({"table": s.table.name(), "key": s.key, "value": (s.get)(limits), "built_in": s.default, "unit": s.unit,
                "least": s.least, "most": s.most, "what": s.what, "origin": s.origin})
        })
        .collect();
    list.push(
        serde_json::json!({"table": "limits", "key": WATCHES.0, "value": limits.watches.word(), "what": WATCHES.1, "origin": WATCHES.2}),
    );
    list.push(serde_json::json!({"table": "ship", "key": BLIND_ARCS.0, "value": limits.ship.blind_arcs, "what": BLIND_ARCS.1, "origin": BLIND_ARCS.2}));
    serde_json::Value::Array(list).to_string()
}

/// As rows.
pub fn csv(limits: &Limits) -> String {
    let mut out = b"table,key,value,built_in,unit,least,most,what,origin\n".to_vec();
    for s in SETTINGS {
        out.extend_from_slice(format!("{},{},{},{},", s.table.name(), s.key, (s.get)(limits), s.default).as_bytes());
        push_csv_text(&mut out, s.unit, b',');
        out.extend_from_slice(format!(",{},{},", s.least, s.most).as_bytes());
        push_csv_text(&mut out, s.what, b',');
        out.push(b',');
        push_csv_text(&mut out, s.origin, b',');
        out.push(b'\n');
    }
    for (table, (key, what, origin), value) in
        [("limits", WATCHES, limits.watches.word().to_owned()), ("ship", BLIND_ARCS, blind_arcs(limits))]
    {
        out.extend_from_slice(format!("{table},{key},").as_bytes());
        push_csv_text(&mut out, &value, b',');
        out.extend_from_slice(b",,,,,");
        push_csv_text(&mut out, what, b',');
        out.push(b',');
        push_csv_text(&mut out, origin, b',');
        out.push(b'\n');
    }
    String::from_utf8_lossy(&out).into_owned()
}
