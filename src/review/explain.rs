//! The slips that explain a row, best first.

use super::candidates::{Candidate, slips_at_hand, slips_of_the_sky};
use super::case::{Case, Sight};
use super::checks::Route;
use super::evidence::{Context, Ground, Left, left_of_sums};
use super::row::Row;
use super::slip::{Explanation, Place, Slip};
use crate::angle::wrap_180_deg;
use crate::limits::Limits;

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

/// More pieces of evidence than any row has.
const EVIDENCE: usize = 16;

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
    raw <= most_left(count)
}

/// The most that a good explanation leaves.
fn most_left(count: usize) -> f64 {
    let n = count as f64;
    n + 6.0 * (2.0 * n).sqrt()
}

/// All slips are alike at first; one that has several forms on this row (ten degrees more or less, on this compass or that; one
/// of sixty bodies) pays 2 ln(forms), since the more forms there are the likelier one fits by chance.
fn price(candidate: &Candidate) -> f64 {
    2.0 * (candidate.forms.max(1) as f64).ln()
}

/// The slips that explain `row` better by `gain` than none does, best first; none where nothing does.
pub fn explain(row: &Row, context: &Context, gain: f64) -> Vec<Explanation> {
    let Some(sight) = Sight::of(row, context.limits) else { return Vec::new() };
    let search = Search { ground: Ground::new(row, context, sight), plain: Case::plain(sight) };
    // Where the record has no azimuth at all (it never rises there), everything else is better than it.
    let (none, weight) = match search.ground.left(&search.plain, f64::INFINITY) {
        Some(Left { sum, weight, .. }) => (sum, weight),
        None => (f64::INFINITY, 100.0),
    };
    let left_deg = |total: f64| (total / weight.max(1.0)).sqrt();
    let most = most_left(EVIDENCE);
    let good = |t: &&Tried| serves(t.raw, t.count) && t.total() + gain < none;
    let mut list = slips_at_hand(row, &sight, context);
    let mut tried = Vec::new();
    // The best good one's total, and what drops out beside it.
    let mut bound = f64::INFINITY;
    search.within(&list, most, &mut bound, good, &mut tried);
    // No slip in time, place or body mends a subtraction.
    if left_of_sums(row, context.route) <= most {
        let more = slips_of_the_sky(row, &sight, context);
        search.within(&more, most, &mut bound, good, &mut tried);
        list.extend(more);
    }
    if !tried.iter().any(|t| good(&t)) {
        // Two together: now whatever a single one leaves counts.
        if left_of_sums(row, context.route) > most {
            list.extend(slips_of_the_sky(row, &sight, context));
        }
        tried = search.each(&list, f64::INFINITY);
        tried.sort_by(|a, b| a.total().total_cmp(&b.total()));
        let pair = search.pairs(&tried, &list, none);
        return pair.into_iter().map(|(a, b, total)| explanation(&a, Some(&b), left_deg(total))).collect();
    }
    tried.sort_by(|a, b| a.total().total_cmp(&b.total()));
    let mut found: Vec<Explanation> = Vec::new();
    let mut best = None;
    for t in tried.iter().filter(good) {
        if t.total() > *best.get_or_insert(t.total()) + DROP || found.len() == MOST {
            break;
        }
        if found.iter().all(|f| f.slip != t.candidate.slip) {
            found.push(explanation(&t.candidate, None, left_deg(t.total())));
        }
    }
    found
}

fn explanation(first: &Candidate, second: Option<&Candidate>, left_deg: f64) -> Explanation {
    Explanation { slip: first.slip, place: first.place, with: second.map(|s| (s.slip, s.place)), left_deg }
}

/// One row under search.
struct Search<'a> {
    ground: Ground<'a>,
    plain: Case,
}

impl Search<'_> {
    /// Adds what each slip leaves, those aside that leave more than `most`, or drop out beside a good one already found.
    fn within(&self, list: &[Candidate], most: f64, bound: &mut f64, good: impl Fn(&&Tried) -> bool, tried: &mut Vec<Tried>) {
        for candidate in list {
            let Some(one) = self.attempt(&self.plain, candidate, most.min(*bound - price(candidate))) else { continue };
            if good(&&one) {
                *bound = bound.min(one.total() + DROP);
            }
            tried.push(one);
        }
    }

    /// What each slip leaves, those aside that leave more than `most`.
    fn each(&self, list: &[Candidate], most: f64) -> Vec<Tried> {
        list.iter().filter_map(|c| self.attempt(&self.plain, c, most)).collect()
    }

    fn attempt(&self, from: &Case, candidate: &Candidate, most: f64) -> Option<Tried> {
        let case = candidate.made(from)?;
        let Left { sum, count, .. } = self.ground.left(&case, most)?;
        Some(Tried { candidate: *candidate, case, raw: sum, count, price: price(candidate) })
    }

    /// The best two together; `tried` is sorted.
    fn pairs(&self, tried: &[Tried], list: &[Candidate], none: f64) -> Option<(Candidate, Candidate, f64)> {
        let mut best: Option<(Candidate, Candidate, f64)> = None;
        for first in tried.iter().take(PAIR_FROM) {
            for second in list.iter().filter(|c| c.slip != first.candidate.slip) {
                let beaten = best.as_ref().map_or(f64::INFINITY, |b| b.2 - first.price - PAIR_PRICE);
                let Some(both) = self.attempt(&first.case, second, most_left(EVIDENCE).min(beaten)) else { continue };
                let total = both.total() + first.price + PAIR_PRICE;
                if serves(both.raw, both.count) && total + GAIN < none && best.as_ref().is_none_or(|b| total < b.2) {
                    best = Some((first.candidate, *second, total));
                }
            }
        }
        best
    }
}

/// The gyro error of `row` with that slip undone, degrees.
pub fn gyro_error_without(row: &Row, slip: Slip, place: Place, limits: &Limits) -> Option<f64> {
    let sight = Sight::of(row, limits)?;
    let context = Context {
        gyro: (0.0, 2.0),
        curve: None,
        variation_off_deg: 0.0,
        before: None,
        after: None,
        earlier: &[],
        route: Route::Either,
        speed_kn: None,
        limits,
    };
    let mut list = slips_at_hand(row, &sight, &context);
    list.extend(slips_of_the_sky(row, &sight, &context));
    let candidate = list.into_iter().find(|c| c.slip == slip && c.place == place)?;
    let so = candidate.made(&Case::plain(sight))?.so;
    Some(wrap_180_deg(so.look()?.azimuth - so.gyro?))
}
