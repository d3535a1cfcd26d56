//! One observation worked, in the pieces that a front end shows.

use super::Ship;
use super::before::{Before, Names};
use super::like;
use crate::angle::text::write::{direction, east_west, low_high, nearest_half};
use crate::compass::card::Card;
use crate::compass::{Observation, Place, Target, Worked, doubts, work};
use crate::horizon::{Search, by_hand, ladder, limb_diameters};
use crate::logbook::entry::Entry;
use crate::report::against;
use crate::report::amplitude::AmplitudePage;
use crate::report::azimuth::AzimuthPage;
use crate::report::card::OnCard;
use crate::report::rows::RowFigures;
use crate::time::{Moment, UtcInstant};
use serde_json::{Value, json};

/// Minutes of the ladder either side of a rising or setting.
const LADDER_MINUTES: u16 = 15;

/// The observation of an entry worked; null where there is none.
pub(super) fn worked(entry: &Entry<'_>, ship: &Ship<'_>, before: &[&Before]) -> Value {
    let Some(observation) = entry.observation else { return Value::Null };
    let (Some(moment), Some(place)) = (observation.moment, observation.place) else { return Value::Null };
    let mut worked = work(&observation, None, ship.limits);
    worked.notices.extend(doubts(&observation, &worked, ship.limits));
    let (on_card, no_card) = match on_card(entry, &observation, moment.utc, ship) {
        Ok(card) => (card, None),
        Err(why) => (None, Some(why)),
    };
    let limits = against::sentences(&observation, &worked, ship.limits);
    let card: Vec<String> = on_card.iter().flat_map(|card| card.sentences(&worked)).chain(no_card).collect();
    let names = Names::of(entry);
    let like = like::sentences(&worked, (Some(moment.utc), &names), observation.compass_heading.map(|h| h.value), before, ship.limits);
    let notices: Vec<Value> = worked.notices.iter().map(|n| json!({"id": n.id(), "text": n.to_string()})).collect();
    let mut remarks = if matches!(observation.target, Target::Body(_)) { limits.clone() } else { Vec::new() };
    remarks.extend(card.iter().cloned());
    json!({
        "azimuth": azimuth(&observation, &worked),
        "errors": errors(&worked),
        "trust": worked.trust.map(|t| t.word()),
        "limits": limits,
        "card": card,
        "like": like,
        "notices": notices,
        "figures": figures(&worked, on_card.as_ref()),
        "working": working(entry, &observation, &worked, (moment, place), remarks, ship),
    })
}

/// The direction that the errors are reckoned from, with what it is; or why there is none.
fn azimuth(observation: &Observation, worked: &Worked) -> Value {
    let name = match observation.target {
        Target::OnHorizon { .. } => "azimuth on the horizon",
        Target::Mark { .. } => "charted bearing",
        _ => "azimuth",
    };
    let text = worked.true_azimuth.map(|z| direction(z.deg(), 1));
    let none = match (worked.true_azimuth, worked.no_azimuth, worked.on_horizon.map(|h| h.search)) {
        (Some(_), _, _) => None,
        (None, Some(reason), _) => Some(reason.to_string()),
        (None, None, Some(Search::AlwaysAbove)) => Some("it stays above that horizon on that day".to_owned()),
        (None, None, Some(Search::AlwaysBelow)) => Some("it stays below that horizon on that day".to_owned()),
        (None, None, _) => Some("none within half a day of that time".to_owned()),
    };
    let altitude = worked.at_time.map(|seen| format!("{:.1}", seen.altitude_deg + 0.0));
    json!({"name": name, "text": text, "u": format!("{:.2}", worked.azimuth_budget.u_deg()), "altitude": altitude, "none": none})
}

/// The errors found, each with its name, its uncertainty, and what to enter in the book.
fn errors(worked: &Worked) -> Vec<Value> {
    let mut list = Vec::new();
    let mut put = |id: &str, name: &str, deg: f64, u_deg: f64, write: fn(f64) -> String| {
        list.push(json!({"id": id, "name": name, "text": write(deg), "u": format!("{u_deg:.1}"), "book": write(nearest_half(deg))}));
    };
    if let Some(e) = worked.gyro_error {
        put("gyro_error", "gyro error", e.value.deg(), e.u_deg(), low_high);
    }
    if let Some(e) = worked.compass_error {
        put("compass_error", "compass error", e.value.deg(), e.u_deg(), east_west);
    }
    if let Some(d) = worked.deviation {
        put("deviation", "deviation", d.value.deg(), d.u_deg(), east_west);
    }
    if let Some(e) = worked.compass_error_by_comparison {
        put("compass_error_by_comparison", "compass error by comparison", e.value.deg(), e.u_deg(), east_west);
    }
    if let Some(d) = worked.deviation_by_comparison {
        put("deviation_by_comparison", "deviation by comparison", d.value.deg(), d.u_deg(), east_west);
    }
    list
}

/// The columns of a row, as the command line gives them.
fn figures(worked: &Worked, on_card: Option<&OnCard>) -> Value {
    let card_deviation_deg = on_card.map(|card| card.deviation.deg());
    let mut members = Vec::new();
    RowFigures { worked: Some(worked), card_deviation_deg, ..RowFigures::default() }.push_json(&mut members);
    if let Some(first) = members.first_mut() {
        *first = b'{';
    }
    members.push(b'}');
    serde_json::from_slice(&members).unwrap_or(Value::Null)
}

/// The card of the compass observed, on its heading; or why there is none.
fn on_card(entry: &Entry<'_>, observation: &Observation, utc: UtcInstant, ship: &Ship<'_>) -> Result<Option<OnCard>, String> {
    let Some(cards) = ship.cards else { return Ok(None) };
    if observation.compass_bearing.is_none() && observation.compass_heading.is_none() {
        return Ok(None);
    }
    let heading = observation.compass_heading.ok_or("Card: it is entered with the heading by magnetic compass, which is blank.")?.value;
    let card = in_force(cards, entry, utc).ok_or("Card: none for that vessel and magnetic compass was in force at that time.")?;
    let as_given = ship.card_as_given || card.curve().is_none();
    let deviation = if as_given { card.as_given(heading) } else { card.deviation(heading) };
    let notices = card.notices(Some(utc), ship.limits.thresholds.card_months.round() as u32);
    Ok(Some(OnCard { heading, deviation, as_given, notices }))
}

/// A blank name means the only one there is.
fn in_force<'c>(cards: &'c crate::compass::card::Cards, entry: &Entry<'_>, utc: UtcInstant) -> Option<&'c Card> {
    let only = |name: fn(&Card) -> &str| {
        let mut names = cards.iter().map(name);
        let first = names.next()?;
        names.all(|other| other == first).then(|| first.to_owned())
    };
    let named = |typed: &str, only: Option<String>| if typed.trim().is_empty() { only.unwrap_or_default() } else { typed.to_owned() };
    let vessel = named(&entry.vessel, only(|card| &card.of.vessel));
    let compass = named(&entry.magnetic_compass, only(|card| &card.of.magnetic_compass));
    cards.in_force(&vessel, &compass, utc)
}

/// The working as the command line writes it: for a rising or setting with the minutes about it.
fn working(
    entry: &Entry<'_>,
    observation: &Observation,
    worked: &Worked,
    (moment, place): (Moment, Place),
    remarks: Vec<String>,
    ship: &Ship<'_>,
) -> Option<String> {
    let (utc, position, zone) = (moment.utc, place.position, entry.zone);
    match observation.target {
        Target::Body(body) => {
            let hand = by_hand(body, utc, position);
            Some(AzimuthPage { body, utc, zone, position, observation, worked, hand, remarks, with_budget: false }.text())
        }
        Target::OnHorizon { body, event, horizon } => {
            let eye_height_m = observation.eye_height_m.unwrap_or(ship.limits.uncertainty.eye_height_assumed_m);
            let crossing = match worked.on_horizon.map(|h| h.search) {
                Some(Search::At(crossing)) => Some(crossing),
                _ => None,
            };
            let rungs =
                crossing.zip(worked.true_azimuth).map(|(c, z)| ladder(body, position, c.utc, z.deg(), eye_height_m, LADDER_MINUTES));
            let page = AmplitudePage {
                body,
                event,
                horizon,
                utc,
                zone,
                position,
                eye_height_m,
                observation,
                worked,
                limb_diameters: crossing.map(|c| limb_diameters(body, c.utc, position, eye_height_m)),
                ladder: rungs.and_then(Result::ok).unwrap_or_default(),
                gyro_error: worked.gyro_error.map(|e| e.value),
                remarks,
                with_budget: false,
            };
            Some(page.text())
        }
        Target::Mark { .. } | Target::Headings => None,
    }
}
