//! Watches under way that have no entry.

use super::super::fact::Fact;
use super::super::order::miles;
use super::super::pattern::{Pattern, PatternId};
use super::super::vessel::Vessel;
use super::Answer;
use crate::limits::Limits;

/// An entry made this long before or after a watch counts for it: it is made up at the relief.
const RELIEF_H: f64 = 1.0;
/// A ship is under way where she made this between two entries, knots.
const UNDER_WAY_KN: f64 = 3.0;
/// A gap over this is a voyage not logged here, hours.
const MOST_GAP_H: f64 = 96.0;
/// Fewest watches to judge by.
const LEAST_WATCHES: f64 = 30.0;

/// Hours of ship's time since the start of 2000, by the zone of the longitude.
pub fn ship_hours(fact: &Fact) -> Option<f64> {
    let (_, lon) = fact.place()?;
    Some(fact.seconds()? as f64 / 3600.0 + (lon / 15.0).round())
}

pub fn judge(vessel: &Vessel, limits: &Limits) -> Answer {
    let mut facts: Vec<&Fact> = vessel.facts.iter().filter(|f| ship_hours(f).is_some()).collect();
    facts.sort_by_key(|f| f.seconds());
    let watch_h = f64::from(limits.watches.hours());
    let (mut watches, mut missed) = (0.0, 0.0);
    for pair in facts.windows(2) {
        let [a, b] = pair else { continue };
        let (Some(from), Some(to), Some(pa), Some(pb)) = (ship_hours(a), ship_hours(b), a.place(), b.place()) else { continue };
        let hours = to - from;
        if !(0.0..MOST_GAP_H).contains(&hours) || miles(pa, pb) < UNDER_WAY_KN * hours {
            continue;
        }
        watches += hours / watch_h;
        // Whole watches between, the hour of relief at either end given to the entries.
        let first = ((from + RELIEF_H) / watch_h).ceil();
        let last = ((to - RELIEF_H) / watch_h).floor();
        missed += (last - first).max(0.0);
    }
    if watches < LEAST_WATCHES {
        return Answer::CannotTell(format!("only {watches:.0} watches under way, of {LEAST_WATCHES:.0} needed"));
    }
    let share = missed / watches;
    if share <= limits.thresholds.watches_missing_share {
        return Answer::NotSo;
    }
    Answer::Found(Pattern {
        id: PatternId::WatchesWithoutEntry,
        detail: format!(
            "Are some entries kept elsewhere, or is a reason not written down? {missed:.0} of about {watches:.0} watches under way have no entry, not even one that says why."
        ),
        since: None,
    })
}
