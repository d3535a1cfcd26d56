//! Which watches have an entry: the watches of the day upwards, the days across.

use super::Scale;
use super::frame::{BELOW, Frame, LEFT, RIGHT, TOP, Tick, across, one};
use crate::review::Coverage;
use maud::{Markup, html};
use std::fmt::Write as _;

const ROW: f64 = 20.0;

/// Most columns of the picture.
pub const MOST_COLUMNS: i64 = 62;

/// A day, counted from 1970-01-01, as a date.
pub fn date(day: i64) -> String {
    chrono::DateTime::from_timestamp(day.saturating_mul(86_400), 0).unwrap_or_default().format("%Y-%m-%d").to_string()
}

/// Days of a watch in all columns: with an observation, with a reason only, counted.
pub fn totals(coverage: &Coverage, watch: usize) -> (u32, u32, u32) {
    let row = coverage.watches.get(watch);
    let sum = |counts: Option<&Vec<u32>>| counts.map_or(0, |c| c.iter().sum());
    (sum(row.map(|r| &r.observed)), sum(row.map(|r| &r.reasoned)), coverage.days.iter().sum())
}

/// The picture; `id` is one of a kind on the page, `of` says whose watches.
pub fn watches(id: &str, of: &str, coverage: &Coverage) -> Markup {
    let rows = coverage.watches.len() as f64;
    let height = TOP + rows * ROW + BELOW;
    let columns = coverage.days.len() as f64;
    let x = across(0.0, columns.max(1.0));
    // The first watch of the day uppermost.
    let y = Scale { from: (0.0, rows), to: (TOP, height - BELOW) };
    let width = (RIGHT - LEFT) / columns.max(1.0);
    let gap = (width * 0.12).min(2.0);
    let (mut full, mut reasoned, mut none) = (String::new(), String::new(), String::new());
    for (at, watch) in coverage.watches.iter().enumerate() {
        let base = y.at(at as f64 + 1.0) - 2.5;
        for (column, ((days, seen), why)) in coverage.days.iter().zip(&watch.observed).zip(&watch.reasoned).enumerate() {
            if *days == 0 {
                continue;
            }
            let (left, wide) = (x.at(column as f64) + gap, (width - 2.0 * gap).min(40.0));
            let tall = |n: u32| (ROW - 5.0) * f64::from(n.min(*days)) / f64::from(*days);
            let bar = |path: &mut String, from: f64, tall: f64| {
                let _ = write!(path, "M{},{}h{}v{}h-{}z", one(left), one(from), one(wide), one(-tall), one(wide));
            };
            if *seen > 0 {
                bar(&mut full, base, tall(*seen));
            }
            if *why > 0 {
                bar(&mut reasoned, base - tall(*seen), tall(*why));
            }
            if seen + why == 0 {
                let _ = write!(none, "M{},{}h{}", one(left), one(base), one(wide));
            }
        }
    }
    let inside = html! {
        path class="faint" d=(none) stroke="#999" stroke-width="1" fill="none" {}
        path class="dot" d=(full) fill="#000" {}
        path class="open" d=(reasoned) fill="#fff" stroke="#000" stroke-width="1" {}
    };
    let y_ticks: Vec<Tick> = coverage
        .watches
        .iter()
        .enumerate()
        .map(|(at, w)| Tick { at: at as f64 + 0.55, words: format!("{:02}-{:02}", w.hours.0, w.hours.1) })
        .collect();
    let step = (coverage.days.len().div_ceil(6)).max(1);
    let x_ticks: Vec<Tick> = (0..coverage.days.len())
        .step_by(step)
        .filter(|at| *at + step / 2 < coverage.days.len() || *at == 0)
        .map(|at| Tick { at: at as f64 + 0.5, words: date(coverage.first_day + at as i64 * coverage.days_each) })
        .collect();
    let (mut seen, mut why, mut all) = (0, 0, 0);
    for at in 0..coverage.watches.len() {
        let (s, w, a) = totals(coverage, at);
        (seen, why, all) = (seen + s, why + w, all + a);
    }
    let frame = Frame {
        id,
        title: &format!("Entries by watch, {of}"),
        desc: &format!(
            "Of {all} watches {seen} have an observation, {why} only the reason why none could be had, {} nothing.",
            all - seen - why
        ),
        height,
        x,
        y,
        x_ticks: &x_ticks,
        y_ticks: &y_ticks,
        x_words: &if coverage.days_each == 1 {
            "days of ship's time".to_owned()
        } else {
            format!("ship's time, {} days a column", coverage.days_each)
        },
        y_words: "watch, hours of ship's time",
    };
    frame.draw(&html! {}, &inside)
}
