//! Which readings cannot belong to the curve that the others lie on.
//!
//! For each number of rows set aside, the rows whose absence leaves the smallest sum of squares are looked for; the largest number is
//! kept for which each of them misses the curve through the others by more than chance and reading can explain, and for which no other
//! row would do nearly as well in its place. So two blunders cannot hide each other, and a row is never set aside on a toss-up.

use super::least_squares::{Solution, solve};
use super::student::both_tails;
use nalgebra::{DMatrix, DVector};

/// What is known of a reading before any is taken: standard deviation 0.5 degrees ...
pub(super) const READING_DEG: f64 = 0.5;
/// ... with the weight of this many readings (our own).
const READING_WEIGHT: f64 = 8.0;
/// The chance that a swing without blunders loses a row (our own).
const FALSE_ALARM: f64 = 3e-3;
/// Another row in its place must leave more than this many times the variance of a reading (our own: three sigma).
const TOSS_UP: f64 = 9.0;
/// Rows beyond what the unknowns need, for each blunder: with fewer, another set of as many rows explains the same residuals.
const ROWS_FOR_ONE: usize = 2;
/// This many rows to spare, after setting aside, are few (our own).
const FEW_TO_SPARE: f64 = 3.0;
/// With more rows than this the median of the residuals is trusted, and pairs are not all tried.
const MANY_ROWS: usize = 40;

/// Median of absolute values to standard deviation, for the normal distribution (1 / 0.6745).
const MEDIAN_TO_SIGMA: f64 = 1.482_6;
/// Among many rows, this many standard deviations are beyond chance.
const SIGMAS: f64 = 4.5;
/// Rounds of fitting and setting aside among many rows.
const ROUNDS: usize = 20;

/// The rows, from 0, that do not belong, in order.
pub(super) fn find(design: &[Vec<f64>], observed: &[f64]) -> Vec<usize> {
    if design.len() > MANY_ROWS {
        find_among_many(design, observed)
    } else {
        solve(design, observed).map(|all| find_among_few(&all)).unwrap_or_default()
    }
}

/// By the median of the residuals, round by round.
fn find_among_many(design: &[Vec<f64>], observed: &[f64]) -> Vec<usize> {
    let mut aside: Vec<usize> = Vec::new();
    for _ in 0..ROUNDS {
        let kept = |i: &usize| aside.binary_search(i).is_err();
        let rows: Vec<_> = design.iter().enumerate().filter(|(i, _)| kept(i)).map(|(_, r)| r.clone()).collect();
        let values: Vec<_> = observed.iter().enumerate().filter(|(i, _)| kept(i)).map(|(_, v)| *v).collect();
        let Some(fit) = solve(&rows, &values) else { break };
        let misses: Vec<f64> = design.iter().zip(observed).map(|(row, value)| (value - fit.value(row)).abs()).collect();
        let mut sorted = misses.clone();
        sorted.sort_unstable_by(f64::total_cmp);
        let median = sorted.get(sorted.len() / 2).copied().unwrap_or(0.0);
        let limit = SIGMAS * (MEDIAN_TO_SIGMA * median).max(READING_DEG);
        let now: Vec<usize> = misses.iter().enumerate().filter(|(_, miss)| **miss > limit).map(|(i, _)| i).collect();
        if now == aside {
            break;
        }
        aside = now;
    }
    aside
}

fn find_among_few(solution: &Solution) -> Vec<usize> {
    let rows = solution.residuals.len();
    let unknowns = solution.rank();
    let most = (rows.saturating_sub(unknowns) / ROWS_FOR_ONE).min((rows / 4).max(1));
    let mut best: Vec<usize> = Vec::new();
    let mut set: Vec<usize> = Vec::new();
    for count in 1..=most {
        set = match smallest_without(solution, &set, count) {
            Some(set) => set,
            None => break,
        };
        if all_stand_out(solution, &set, rows - unknowns) {
            best.clone_from(&set);
        }
    }
    best.sort_unstable();
    best
}

/// Sum of squares left when the rows `set` are taken out of the fit; `None` where the others cannot do without them.
fn sum_without(solution: &Solution, set: &[usize]) -> Option<f64> {
    let (misses, _) = misses(solution, set)?;
    let explained: f64 = set.iter().zip(misses.iter()).filter_map(|(row, miss)| Some(solution.residuals.get(*row)? * miss)).sum();
    Some((solution.sum_of_squares() - explained).max(0.0))
}

/// How far each row of `set` is from the curve through all other rows, and the variance of that in units of a reading's.
fn misses(solution: &Solution, set: &[usize]) -> Option<(DVector<f64>, Vec<f64>)> {
    let size = set.len();
    let left = DMatrix::from_fn(size, size, |i, j| match (set.get(i), set.get(j)) {
        (Some(i), Some(j)) => solution.residual_from(*i, *j),
        _ => 0.0,
    });
    let residuals = DVector::from_iterator(size, set.iter().map(|row| solution.residuals.get(*row).copied().unwrap_or(0.0)));
    // Where the matrix is singular, the row alone holds some unknown and has no other rows to be compared with.
    let inverse = left.cholesky().filter(|c| c.l_dirty().diagonal().min() > 1e-4)?.inverse();
    let variances = inverse.diagonal().iter().copied().collect();
    Some((inverse * residuals, variances))
}

/// The `count` rows whose absence leaves the smallest sum of squares: pairs all tried; more, by adding to the last set and exchanging.
fn smallest_without(solution: &Solution, last: &[usize], count: usize) -> Option<Vec<usize>> {
    let rows = solution.residuals.len();
    let smaller = |best: Option<(Vec<usize>, f64)>, set: Vec<usize>| match (sum_without(solution, &set), best) {
        (Some(sum), Some((_, least))) if sum < least => Some((set, sum)),
        (Some(sum), None) => Some((set, sum)),
        (_, best) => best,
    };
    if count == 2 {
        return pairs(rows).fold(None, smaller).map(|(set, _)| set);
    }
    let with = |set: &[usize], row: usize| set.iter().copied().chain([row]).collect::<Vec<_>>();
    let mut best = (0..rows).filter(|r| !last.contains(r)).map(|r| with(last, r)).fold(None, smaller)?;
    loop {
        let exchanged = exchanges(&best.0, rows).into_iter().fold(Some(best.clone()), smaller)?;
        if exchanged.1 >= best.1 {
            return Some(best.0);
        }
        best = exchanged;
    }
}

/// Every two rows.
fn pairs(rows: usize) -> impl Iterator<Item = Vec<usize>> {
    (0..rows).flat_map(move |i| (i + 1..rows).map(move |j| vec![i, j]))
}

/// Every set that differs from `set` in one row.
fn exchanges(set: &[usize], rows: usize) -> Vec<Vec<usize>> {
    let mut all = Vec::new();
    for out in set {
        for into in (0..rows).filter(|r| !set.contains(r)) {
            all.push(set.iter().map(|r| if r == out { into } else { *r }).collect());
        }
    }
    all
}

/// Whether each row of `set` misses by more than chance allows, and no other row could stand in its place.
fn all_stand_out(solution: &Solution, set: &[usize], freedom: usize) -> bool {
    let (Some((misses, variances)), Some(sum)) = (misses(solution, set), sum_without(solution, set)) else { return false };
    let rows = solution.residuals.len();
    let left = freedom.saturating_sub(set.len()) as f64;
    let variance = ((sum + READING_WEIGHT * READING_DEG.powi(2)) / (left + READING_WEIGHT)).max(READING_DEG.powi(2));
    // With few rows to spare, several blunders can look like one elsewhere: then what is left must lie well.
    if left <= FEW_TO_SPARE && sum > left * (2.0 * READING_DEG).powi(2) {
        return false;
    }
    let beyond_chance = misses.iter().zip(&variances).all(|(miss, v)| {
        let t = miss / (variance * v).sqrt();
        both_tails(t, (left + READING_WEIGHT) as u32) * (rows as f64) < FALSE_ALARM
    });
    let clear = |other: Vec<usize>| sum_without(solution, &other).is_none_or(|s| s - sum > TOSS_UP * variance);
    let same = |other: &Vec<usize>| other.iter().all(|row| set.contains(row));
    beyond_chance && exchanges(set, rows).into_iter().all(clear) && (set.len() != 2 || pairs(rows).filter(|other| !same(other)).all(clear))
}
