//! The review on a terminal: what a superintendent reads in a minute, worst first.

use crate::angle::text::write::{direction, low_high};
use crate::review::{Summary, VesselSummary};
use std::fmt::Write as _;

/// Vessels whose particulars are written out; of the others only the line.
const SHOWN: usize = 12;

/// The summary in words.
pub fn text(summary: &Summary) -> String {
    let mut text = String::new();
    let queried: u64 = summary.vessels.iter().map(|v| v.rows_with_query).sum();
    let _ = writeln!(text, "{}, {} with a query, {} with a problem", counted(summary.rows, "row", "rows"), queried, summary.problems);
    let mut kinds: Vec<(&str, u64)> = summary.queries.iter().map(|(id, n)| (*id, *n)).collect();
    kinds.sort_by(|a, b| b.1.cmp(&a.1).then_with(|| a.0.cmp(b.0)));
    if !kinds.is_empty() {
        let list: Vec<String> = kinds.iter().map(|(id, n)| format!("{id} {n}")).collect();
        let _ = writeln!(text, "Queries: {}", list.join(", "));
    }
    for (place, vessel) in summary.vessels.iter().enumerate() {
        let nothing = vessel.rows_with_query == 0 && vessel.patterns.is_empty();
        if nothing {
            continue;
        }
        if place < SHOWN {
            of_vessel(&mut text, vessel);
        }
    }
    let quiet: Vec<&str> = summary.vessels.iter().filter(|v| v.rows_with_query == 0 && v.patterns.is_empty()).map(name).collect();
    if !quiet.is_empty() {
        let _ = writeln!(text, "\nNothing to explain: {}", shortened(&quiet));
    }
    let more: Vec<&str> =
        summary.vessels.iter().skip(SHOWN).filter(|v| v.rows_with_query > 0 || !v.patterns.is_empty()).map(name).collect();
    if !more.is_empty() {
        let _ = writeln!(text, "\nAlso with something to explain, see the rows: {}", shortened(&more));
    }
    text
}

fn name(vessel: &VesselSummary) -> &str {
    if vessel.vessel.is_empty() { "the vessel" } else { &vessel.vessel }
}

fn counted(n: u64, one: &str, many: &str) -> String {
    format!("{n} {}", if n == 1 { one } else { many })
}

/// A list that stays readable.
fn shortened(names: &[&str]) -> String {
    const MOST: usize = 20;
    let more = if names.len() > MOST { format!(" and {} more", names.len() - MOST) } else { String::new() };
    names.iter().take(MOST).copied().collect::<Vec<_>>().join(", ") + &more
}

fn of_vessel(text: &mut String, vessel: &VesselSummary) {
    let _ = writeln!(
        text,
        "\n{}: {}, {} with a query",
        name(vessel),
        counted(vessel.observations, "observation", "observations"),
        vessel.rows_with_query
    );
    for pattern in &vessel.patterns {
        let since = pattern.since.as_ref().map_or_else(String::new, |s| format!(" Since {s}."));
        let _ = writeln!(text, "  {}: {}{since}", pattern.id, pattern.detail);
    }
    if !vessel.slips.is_empty() {
        let list: Vec<String> = vessel.slips.iter().take(6).map(|(slip, n)| format!("{slip} {n}")).collect();
        let _ = writeln!(text, "  most probable slips: {}", list.join(", "));
    }
    for gyro in &vessel.gyros {
        let (Some(mean), Some(u)) = (gyro.mean_gyro_error, gyro.mean_gyro_error_u) else { continue };
        let which = [gyro.gyro.as_str(), gyro.repeater.as_str()].into_iter().filter(|n| !n.is_empty()).collect::<Vec<_>>().join(", ");
        let which = if which.is_empty() { String::new() } else { format!(" {which}") };
        let scatter = gyro.scatter.map_or_else(String::new, |s| format!(", single errors scatter by {s:.1}"));
        let _ = writeln!(text, "  gyro{which}: {} ({}){scatter}", low_high(mean), super::words::u(u));
    }
    for compass in &vessel.compasses {
        let which = if compass.magnetic_compass.is_empty() { "magnetic compass".to_owned() } else { compass.magnetic_compass.clone() };
        let sectors: Vec<String> =
            compass.unproven_headings.iter().map(|(from, to)| format!("{} to {}", direction(*from, 0), direction(*to, 0))).collect();
        if !sectors.is_empty() {
            let _ = writeln!(text, "  {which}: headings never observed: {}", sectors.join(", "));
        }
    }
}
