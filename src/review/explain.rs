//! The slips that explain a row, best first.

use super::candidates::{Candidate, candidates};
use super::case::{Case, Sight};
use super::evidence::{Context, Left, left};
use super::row::Row;
use super::slip::{Explanation, Place, Slip};
use crate::angle::wrap_180_deg;
use crate::limits::Limits;
use crate::sky::Body;

/// Explanations that are listed at most.
const MOST: usize = 6;
/// An explanation is dropped when it fits worse than the best by this (sum of squares): odds of one to ten thousand.
const DROP: f64 = 18.0;
/// A slip must explain this much more than none (sum of squares), for a slip is seldom.
pub const GAIN: f64 = 9.0;
/// Singles that are tried with every other for a pair.
const PAIR_FROM: usize = 10;
/// What a pair pays for being two of many.
const PAIR_PRICE: f64 = 12.0;

/// A hypothesis with what it leaves.
struct Tried {
    candidate: Candidate,
    case: Case,
    raw: f64,
    count: usize,
    price: f64,
}

impl Tried {
    fn total(&self) -> f64 {
        self.raw + self.price
    }
}

/// A good explanation leaves about one for each piece of evidence; six standard deviations of that sum more is still good, since
/// real readings have their bad days.
fn serves(raw: f64, count: usize) -> bool {
    let n = count as f64;
    raw <= n + 6.0 * (2.0 * n).sqrt()
}

/// All slips are alike at first; one that has several forms on this row (ten degrees more or less, on this compass or that; one
/// of sixty bodies) pays 2 ln(forms), since the more forms there are the likelier one fits by chance.
fn price(candidate: &Candidate) -> f64 {
    2.0 * (candidate.forms.max(1) as f64).ln()
}

/// The slips that explain `row` better by `gain` than none does, best first; none where nothing does.
pub fn explain(row: &Row, context: &Context, bodies: &[Body], gain: f64) -> Vec<Explanation> {
    let Some(sight) = Sight::of(row, context.limits) else { return Vec::new() };
    let plain = Case::plain(sight);
    // Where the record has no azimuth at all (it never rises there), everything else is better than it.
    let (none, weight) = match left(row, &plain, context) {
        Some(Left { sum, weight, .. }) => (sum, weight),
        None => (f64::INFINITY, 100.0),
    };
    let list = candidates(row, &sight, context, bodies);
    let mut tried: Vec<Tried> = list.iter().filter_map(|c| attempt(row, &plain, c, context)).collect();
    tried.sort_by(|a, b| a.total().total_cmp(&b.total()));
    let singles: Vec<&Tried> = tried.iter().filter(|t| serves(t.raw, t.count) && t.total() + gain < none).collect();
    let left_deg = |total: f64| (total / weight.max(1.0)).sqrt();
    let mut found: Vec<Explanation> = Vec::new();
    let Some(best) = singles.first().map(|t| t.total()) else {
        return pairs(row, &tried, &list, context, none)
            .map(|(a, b, total)| Explanation { slip: a.slip, place: a.place, with: Some((b.slip, b.place)), left_deg: left_deg(total) })
            .into_iter()
            .collect();
    };
    for t in singles {
        if t.total() > best + DROP || found.len() == MOST {
            break;
        }
        if found.iter().all(|f| f.slip != t.candidate.slip) {
            found.push(Explanation { slip: t.candidate.slip, place: t.candidate.place, with: None, left_deg: left_deg(t.total()) });
        }
    }
    found
}

fn attempt(row: &Row, from: &Case, candidate: &Candidate, context: &Context) -> Option<Tried> {
    let case = candidate.made(from)?;
    let Left { sum, count, .. } = left(row, &case, context)?;
    Some(Tried { candidate: *candidate, case, raw: sum, count, price: price(candidate) })
}

/// The best two together.
fn pairs(row: &Row, tried: &[Tried], list: &[Candidate], context: &Context, none: f64) -> Option<(Candidate, Candidate, f64)> {
    let mut best: Option<(Candidate, Candidate, f64)> = None;
    for first in tried.iter().take(PAIR_FROM) {
        for second in list.iter().filter(|c| c.slip != first.candidate.slip) {
            let Some(both) = attempt(row, &first.case, second, context) else { continue };
            let total = both.total() + first.price + PAIR_PRICE;
            if serves(both.raw, both.count) && total + GAIN < none && best.as_ref().is_none_or(|b| total < b.2) {
                best = Some((first.candidate, *second, total));
            }
        }
    }
    best
}

/// The gyro error of `row` with that slip undone, degrees.
pub fn gyro_error_without(row: &Row, slip: Slip, place: Place, limits: &Limits) -> Option<f64> {
    let sight = Sight::of(row, limits)?;
    let context =
        Context { gyro: (0.0, 2.0), curve: None, variation_off_deg: 0.0, before: None, after: None, earlier: &[], speed_kn: None, limits };
    let candidate = candidates(row, &sight, &context, &[]).into_iter().find(|c| c.slip == slip && c.place == place)?;
    let so = candidate.made(&Case::plain(sight))?.so;
    Some(wrap_180_deg(so.look()?.azimuth - so.gyro?))
}
