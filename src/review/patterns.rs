//! The patterns of a vessel, and why some cannot be judged.

mod gyro;
mod regular;
mod throughout;
mod variation;
mod watches;

pub use watches::ship_hours;

use super::learn::Logbook;
use super::pattern::{NotEvaluated, Pattern, PatternId};
use super::vessel::Vessel;
use crate::limits::Limits;

/// What one question about a vessel comes to.
pub enum Answer {
    /// It is so.
    Found(Pattern),
    /// It is not so.
    NotSo,
    /// It cannot be told, because.
    CannotTell(String),
}

/// Finds the patterns of `vessel`, and says of the others that could not be judged why.
pub fn find(vessel: &mut Vessel, book: &Logbook, limits: &Limits) {
    variation::find(vessel, book, limits);
    // A slip made throughout makes the run and the curve unreal: nothing more can be read from them.
    let unreal = throughout::find(vessel, book, limits);
    if let Some(why) = unreal {
        for id in PatternId::ALL {
            if !matches!(id, PatternId::SameSlipThroughout | PatternId::VariationStale | PatternId::WatchesWithoutEntry) {
                vessel.not_evaluated.push(NotEvaluated { id, why: why.clone() });
            }
        }
    } else {
        gyro::find(vessel, book, limits);
        constant_a(vessel, book, limits);
        settle(vessel, PatternId::TooRegular, |v| regular::judge(v, book, limits));
    }
    unrounded(vessel, book);
    settle(vessel, PatternId::WatchesWithoutEntry, |v| watches::judge(v, limits));
    let rank = |id: PatternId| PatternId::ALL.iter().position(|p| *p == id);
    vessel.patterns.sort_by_key(|p| rank(p.id));
    vessel.not_evaluated.sort_by_key(|p| rank(p.id));
}

fn settle(vessel: &mut Vessel, id: PatternId, judge: impl FnOnce(&Vessel) -> Answer) {
    match judge(vessel) {
        Answer::Found(pattern) => vessel.patterns.push(pattern),
        Answer::NotSo => {}
        Answer::CannotTell(why) => vessel.not_evaluated.push(NotEvaluated { id, why }),
    }
}

/// Share of observations from which errors worked from finer readings are a habit.
const HABIT: f64 = 0.1;

/// Errors worked from readings finer than those written: said once, with the regularity that it goes with where that is found.
fn unrounded(vessel: &mut Vessel, book: &Logbook) {
    if book.unrounded < 8 || (book.unrounded as f64) < HABIT * book.observations as f64 {
        return;
    }
    let words = format!(
        "Are the errors worked from bearings finer than those written? On {} of {} observations they are off their own parts by no more than half a step.",
        book.unrounded, book.observations
    );
    if let Some(regular) = vessel.patterns.iter_mut().find(|p| p.id == PatternId::TooRegular) {
        regular.detail.push(' ');
        regular.detail.push_str(&words);
        vessel.unrounded = Some(PatternId::TooRegular);
    } else {
        vessel.patterns.push(Pattern { id: PatternId::SameSlipThroughout, detail: words, since: None });
        vessel.unrounded = Some(PatternId::SameSlipThroughout);
    }
}

/// Fewest deviations against a card for a constant to be named.
const LEAST_CARD_ROWS: usize = 8;
/// Standard uncertainties that a constant must be sure by.
const SURE: f64 = 4.0;

/// What local variation along a track may add to A, degrees: the model's own u at sea.
const LOCAL_VARIATION_U_DEG: f64 = 0.3;
/// What must be left of A beyond its uncertainty, degrees.
const LEAST_SURE_DEG: f64 = 0.5;

/// Deviations off the card, or off nothing, by a constant on every heading.
fn constant_a(vessel: &mut Vessel, book: &Logbook, limits: &Limits) {
    let id = PatternId::ConstantA;
    let mut why = None;
    for (at, compass) in vessel.compasses.iter().enumerate() {
        let mut off: Vec<f64> = book.against_card.iter().filter(|c| usize::from(c.0) == at).map(|c| f64::from(c.1)).collect();
        let with_card = off.len() >= LEAST_CARD_ROWS;
        let found = if with_card {
            let n = off.len() as f64;
            let middle = super::robust::median(&mut off).unwrap_or(0.0);
            let scale = super::robust::scale_about_zero(off.iter().map(|o| o - middle)).unwrap_or(1.0);
            (middle.abs() > limits.thresholds.constant_a_card_deg && middle.abs() > SURE * 1.2533 * scale / n.sqrt()).then_some(middle)
        } else {
            match vessel.curve(at as u8).and_then(|c| c.coefficients().first().copied().flatten()) {
                Some((a, u)) => {
                    let sure = a.abs() > 3.0 * u.hypot(LOCAL_VARIATION_U_DEG) + LEAST_SURE_DEG;
                    (sure && a.abs() > limits.thresholds.constant_a_deg).then_some(a)
                }
                None => {
                    why = Some(match vessel.curve(at as u8) {
                        None => "too few bearings or headings by magnetic compass".to_owned(),
                        Some(_) => "too few different headings".to_owned(),
                    });
                    None
                }
            }
        };
        if let Some(a) = found {
            let name = if compass.is_empty() { String::new() } else { format!("{compass}: ") };
            let detail = format!(
                "{name}Is the lubber line or the azimuth circle out of line, or the variation of the chart another one? Deviations are {:.1} {} on every heading, {}.",
                a.abs(),
                if a < 0.0 { "W" } else { "E" },
                if with_card { "against the card" } else { "where a compass in adjustment has about nil" }
            );
            vessel.constant_a.push((at as u8, a));
            vessel.patterns.push(Pattern { id, detail, since: None });
            return;
        }
    }
    if let Some(why) = why {
        vessel.not_evaluated.push(NotEvaluated { id, why });
    }
}
