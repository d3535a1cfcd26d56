//! The order of time and the track: which rows do not fit between their neighbours.

use super::fact::{Fact, flag};
use crate::limits::Limits;
use std::collections::BTreeSet;

/// Rows ahead that are asked whether the track goes on without the row in doubt.
const AHEAD: usize = 3;

/// Great-circle distance in nautical miles between two positions in degrees (haversine).
pub fn miles(from: (f64, f64), to: (f64, f64)) -> f64 {
    let (lat0, lat1) = (from.0.to_radians(), to.0.to_radians());
    let (dlat, dlon) = (lat1 - lat0, (to.1 - from.1).to_radians());
    let h = (dlat / 2.0).sin().powi(2) + lat0.cos() * lat1.cos() * (dlon / 2.0).sin().powi(2);
    2.0 * h.clamp(0.0, 1.0).sqrt().asin().to_degrees() * 60.0
}

/// Marks the rows whose removal restores the order of time, and those whose removal lets the track go on. Rows numbered in `late` were
/// entered after their time for a reason that is written down: they are asked neither.
pub fn mark(facts: &mut [Fact], late: &BTreeSet<u64>, limits: &Limits) {
    mark_order(facts, late);
    mark_track(facts, late, limits);
}

fn in_turn(fact: &Fact, late: &BTreeSet<u64>) -> bool {
    late.is_empty() || !late.contains(&u64::from(fact.number))
}

/// All rows outside a longest run that never goes back in time. Where that would be most of them, the log has another order
/// and none is marked.
fn mark_order(facts: &mut [Fact], late: &BTreeSet<u64>) {
    let timed: Vec<(usize, i64)> =
        facts.iter().enumerate().filter(|(_, f)| in_turn(f, late)).filter_map(|(i, f)| Some((i, f.seconds()?))).collect();
    if timed.windows(2).all(|w| matches!(w, [a, b] if a.1 <= b.1)) {
        return;
    }
    // Patience: the last place of the best run of each length, and who came before.
    let mut ends: Vec<usize> = Vec::new();
    let mut before: Vec<Option<usize>> = vec![None; timed.len()];
    for (at, (_, time)) in timed.iter().enumerate() {
        let length = ends.partition_point(|&e| timed.get(e).is_some_and(|t| t.1 <= *time));
        if let Some(slot) = before.get_mut(at) {
            *slot = length.checked_sub(1).and_then(|l| ends.get(l).copied());
        }
        match ends.get_mut(length) {
            Some(end) => *end = at,
            None => ends.push(at),
        }
    }
    if ends.len() * 2 < timed.len() {
        return;
    }
    let mut kept = vec![false; timed.len()];
    let mut at = ends.last().copied();
    while let Some(place) = at {
        if let Some(slot) = kept.get_mut(place) {
            *slot = true;
        }
        at = before.get(place).copied().flatten();
    }
    prefer_sound(facts, &timed, &mut kept);
    for ((row, _), kept) in timed.iter().zip(kept) {
        if !kept && let Some(fact) = facts.get_mut(*row) {
            fact.flags |= flag::OUT_OF_ORDER;
        }
    }
}

/// Where either of two neighbours could go, the one that raises a query by itself goes; of two alike, the one that lies further
/// from the rows on either side.
fn prefer_sound(facts: &[Fact], timed: &[(usize, i64)], kept: &mut [bool]) {
    let affected = |at: usize| timed.get(at).and_then(|t| facts.get(t.0)).is_some_and(Fact::affected);
    let time = |at: usize| timed.get(at).map(|t| t.1);
    for out in 0..timed.len() {
        if kept.get(out).copied().unwrap_or(true) {
            continue;
        }
        for other in [out.checked_sub(1), Some(out + 1)].into_iter().flatten() {
            if !kept.get(other).copied().unwrap_or(false) {
                continue;
            }
            let (first, last) = (out.min(other), out.max(other));
            let before = (0..first).rev().find(|&i| kept.get(i).copied().unwrap_or(false)).and_then(time);
            let after = (last + 1..timed.len()).find(|&i| kept.get(i).copied().unwrap_or(false)).and_then(time);
            let (Some(now), Some(then)) = (time(out), time(other)) else { continue };
            if before.is_some_and(|b| b > now) || after.is_some_and(|a| a < now) {
                continue;
            }
            let away = |t: i64| before.map_or(0, |b| t - b).max(after.map_or(0, |a| a - t));
            let better = match (affected(out), affected(other)) {
                (false, true) => true,
                (true, false) => false,
                _ => away(now) * 2 < away(then),
            };
            if better {
                if let Some(k) = kept.get_mut(out) {
                    *k = true;
                }
                if let Some(k) = kept.get_mut(other) {
                    *k = false;
                }
                break;
            }
        }
    }
}

/// Over the miles that could be run in the time between.
fn too_far(a: &Fact, b: &Fact, limits: &Limits) -> Option<bool> {
    let (miles, most) = apart(a, b, limits)?;
    Some(miles > most)
}

/// Miles between two rows, and the most that could be run.
pub fn apart(a: &Fact, b: &Fact, limits: &Limits) -> Option<(f64, f64)> {
    let hours = (b.seconds()? - a.seconds()?).abs() as f64 / 3600.0;
    Some((miles(a.place()?, b.place()?), hours * limits.thresholds.max_speed_kn + limits.thresholds.too_far_margin_nm))
}

fn mark_track(facts: &mut [Fact], late: &BTreeSet<u64>, limits: &Limits) {
    let track: Vec<usize> = facts
        .iter()
        .enumerate()
        .filter(|(_, f)| f.has(flag::TIME) && f.has(flag::PLACE) && !f.has(flag::OUT_OF_ORDER) && in_turn(f, late))
        .map(|(i, _)| i)
        .collect();
    let far = |facts: &[Fact], a: usize, b: usize| -> bool {
        facts.get(a).zip(facts.get(b)).and_then(|(a, b)| too_far(a, b, limits)).unwrap_or(false)
    };
    let mut previous: Option<usize> = None;
    for (at, &row) in track.iter().enumerate() {
        let next = track.get(at + 1..).unwrap_or_default();
        let bad = match previous {
            Some(previous) => {
                far(facts, previous, row) && next.iter().take(AHEAD).any(|&n| !far(facts, previous, n) && far(facts, row, n))
                    // The last row has no other side: its neighbours alone agree.
                    || (next.is_empty() && far(facts, previous, row))
            }
            None => matches!(next, [one, two, ..] if far(facts, row, *one) && far(facts, row, *two) && !far(facts, *one, *two)),
        };
        if bad {
            if let Some(fact) = facts.get_mut(row) {
                fact.flags |= flag::TOO_FAR;
            }
        } else {
            previous = Some(row);
        }
    }
}
