//! The earth's field at a place, for a person and for a program.

use super::figure::{east_west, round4, signed};
use crate::angle::Position;
use crate::angle::text::write;
use crate::compass::field::Field;
use serde_json::{Value, json};
use std::fmt::Write;

/// For a person.
pub fn text(field: &Field, position: Position, height_km: f64) -> String {
    let (from, to) = field.model.span();
    let yearly = &field.annual;
    let mut out = String::new();
    // Writing to a String cannot fail.
    let _ = write!(
        out,
        "\
Variation at {}, in {:.2}{}

Variation             {:>10}   u {:.1} (one standard uncertainty, local disturbance included)
Change in a year      {:>10}
Inclination           {:>10}   {} in a year
Horizontal intensity  {:>10.0}   nT, {} in a year
Total intensity       {:>10.0}   nT, {} in a year
North, east, down     {:.0}, {:.0}, {:.0} nT

Model  {}, for {from:.1} to {to:.1}
       {}
",
        write::position(position),
        field.year,
        if height_km == 0.0 { String::new() } else { format!(", {height_km} km above the ellipsoid") },
        write::east_west(field.variation.deg()),
        field.variation_u_deg,
        east_west(yearly.variation_deg, 2),
        signed(field.inclination_deg, 1),
        signed(yearly.inclination_deg, 2),
        field.horizontal_nt,
        signed(yearly.horizontal_nt, 0),
        field.total_nt,
        signed(yearly.total_nt, 0),
        whole(field.north_nt),
        whole(field.east_nt),
        whole(field.down_nt),
        field.model.name(),
        field.model.edition(),
    );
    if position.lat.deg().abs() == 90.0 {
        out.push_str("\nAt the pole true north has no direction: variation is reckoned from the meridian of the longitude given.\n");
    }
    for notice in field.notices() {
        let _ = write!(out, "\nNotice: {notice}.\n");
    }
    out
}

/// For a program: one object.
pub fn json(field: &Field) -> Value {
    let mut object = serde_json::Map::new();
    for (name, value) in figures(field) {
        object.insert(name.to_owned(), value);
    }
    Value::Object(object)
}

/// For a program: a header and one row.
pub fn csv(field: &Field) -> String {
    let (names, values): (Vec<_>, Vec<_>) = figures(field).into_iter().unzip();
    let plain = |value: Value| value.as_str().map_or_else(|| value.to_string(), str::to_owned);
    format!("{}\n{}\n", names.join(","), values.into_iter().map(plain).collect::<Vec<_>>().join(","))
}

/// Names and values, in order.
fn figures(field: &Field) -> [(&'static str, Value); 12] {
    let (valid_from, valid_to) = field.model.span();
    let number = |x: f64| json!(round4(x));
    [
        ("variation", number(field.variation.deg())),
        ("variation_u", number(field.variation_u_deg)),
        ("annual_change", number(field.annual.variation_deg)),
        ("inclination", number(field.inclination_deg)),
        ("horizontal_nt", number(field.horizontal_nt)),
        ("north_nt", number(field.north_nt)),
        ("east_nt", number(field.east_nt)),
        ("down_nt", number(field.down_nt)),
        ("total_nt", number(field.total_nt)),
        ("model", json!(field.model.name())),
        ("valid_from", number(valid_from)),
        ("valid_to", number(valid_to)),
    ]
}

/// To the whole nanotesla, never -0.
fn whole(nt: f64) -> f64 {
    nt.round() + 0.0
}
