//! What the officer of the watch asks at the bridge, answered in one piece: JSON in, JSON out.
//!
//! A front end sends what was typed, cell by cell, under the log's own names, and shows what comes back: errors with their uncertainty, the
//! card, the limits in words, whether it is like the last ones, the working, what to take next, the record. It computes nothing itself, so
//! that any front end gives the figures of the command line. Nothing here reads a file or a clock.

mod before;
mod cells;
mod heard;
mod like;
mod next;
mod record;
mod worked;

pub use before::{Before, Kept};
pub use cells::Typed;
pub use heard::heard;

use crate::compass::card::Cards;
use crate::error::BadValue;
use crate::limits::Limits;
use crate::logbook::entry::{Faults, ReadAs, read_entry};
use crate::sky::Body;
use serde_json::{Value, json};

/// What is known of the ship besides what the officer types.
#[derive(Debug, Clone, Copy)]
pub struct Ship<'a> {
    /// The limits in force.
    pub limits: &'a Limits,
    /// The deviation cards, where there are any.
    pub cards: Option<&'a Cards>,
    /// Whether a card is read in a straight line between its headings.
    pub card_as_given: bool,
    /// The entries before this one, oldest first.
    pub before: &'a [Before],
}

/// Entries of the session that are taken from a request; more are an error.
const SESSION_MOST: usize = 100;

/// Answers one request.
///
/// | in | |
/// |---|---|
/// | `cells` | object: column of the log -> text as typed |
/// | `session` | optional, list of such objects: entries kept since the page was opened, oldest first |
/// | `next` | optional, true: what to take next |
///
/// | out | |
/// |---|---|
/// | `faults` | each `field`, `value`, `expected`, `hint`, `text` |
/// | `worked` | null, or `heading`, `azimuth`, `errors`, `limits`, `card`, `like`, `notices`, `figures` (a row's columns), `working` |
/// | `next` | null, or `list` and `text` |
/// | `record` | `entries`, `strip` |
///
/// # Errors
/// [`BadValue`] for a request that is not of that form. A cell that cannot be read is an answer.
pub fn answer(asked: &Value, ship: &Ship<'_>) -> Result<Value, BadValue> {
    let typed = Typed::of(asked.get("cells").unwrap_or(&Value::Null))?;
    let session = session(asked.get("session"), ship.limits)?;
    let before: Vec<&Before> = ship.before.iter().chain(&session).collect();
    let mut faults = Faults::default();
    let entry = read_entry(&typed, ReadAs::default(), &mut faults);
    let worked = worked::worked(&entry, ship, &before);
    let next = match asked.get("next") {
        Some(Value::Bool(true)) => next::next(&entry, ship.limits, &before),
        None | Some(Value::Null | Value::Bool(false)) => Value::Null,
        Some(other) => return Err(BadValue::new(&other.to_string(), "next: true or false")),
    };
    let list: Vec<Value> = faults
        .iter()
        .map(
            |f| json!({"field": f.column, "value": f.bad.value, "expected": f.bad.expected, "hint": f.bad.hint, "text": f.bad.to_string()}),
        )
        .collect();
    let latitude = entry.place.map(|p| p.position.lat);
    Ok(json!({"faults": list, "worked": worked, "next": next, "record": record::record(&before, latitude, ship.limits)}))
}

/// The names of every body that can be observed, sun, moon and planets first.
pub fn bodies() -> Vec<&'static str> {
    let mut stars: Vec<&str> = Body::stars().map(Body::name).collect();
    stars.sort_unstable();
    let near = Body::all().map(Body::name).filter(|name| !stars.contains(name));
    near.chain(stars.iter().copied()).collect()
}

fn session(asked: Option<&Value>, limits: &Limits) -> Result<Vec<Before>, BadValue> {
    let entries = match asked {
        None | Some(Value::Null) => return Ok(Vec::new()),
        Some(Value::Array(entries)) if entries.len() <= SESSION_MOST => entries,
        Some(other) => return Err(BadValue::new(&other.to_string(), "session: a list of at most 100 entries")),
    };
    let mut before = Vec::new();
    for entry in entries {
        before.extend(Before::of(&Typed::of(entry)?, Kept::Here, limits));
    }
    Ok(before)
}
