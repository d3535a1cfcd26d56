//! The head of the report: what was reviewed, what was found, how to read on.

use super::super::{counted, named};
use super::{MOST_LISTED, Sheet, has_something, vessel_name};
use crate::angle::text::write::low_high;
use crate::report::words;
use crate::review::VesselSummary;
use maud::{Markup, html};

/// A day of the Unix count in words.
pub fn day(unix_ms: i64) -> String {
    chrono::DateTime::from_timestamp_millis(unix_ms).unwrap_or_default().format("%Y-%m-%d").to_string()
}

pub fn glance(sheet: &Sheet) -> Markup {
    let summary = sheet.page.summary;
    let span = sheet.page.fleet.span_ms();
    let mut kinds: Vec<(&str, u64)> = summary.queries.iter().map(|(id, n)| (*id, *n)).collect();
    kinds.sort_by(|a, b| b.1.cmp(&a.1).then_with(|| a.0.cmp(b.0)));
    let patterns: usize = summary.vessels.iter().map(|v| v.patterns.len()).sum();
    html! {
        dl class="facts" {
            dt { "Log" } dd { (named(sheet.page.log)) }
            @if let Some((from, to)) = span { dt { "Period" } dd { (day(from)) " to " (day(to)) ", UTC" } }
            dt { "Rows" } dd { (summary.rows) }
            dt { "With a query" } dd { (sheet.findings.queried) }
            dt { "With a problem" } dd { (summary.problems) }
            dt { "Vessels" } dd { (summary.vessels.len()) ", " (counted(patterns as u64, "pattern", "patterns")) " in all" }
        }
        p {
            "A query is a question: the log is evidence, and nothing in it was corrected. Errors are azimuth less bearing, east +: a gyro that reads low (L) has an easterly error, one that reads high (H) a westerly. "
            "u is one standard uncertainty, degrees."
        }
        nav aria-label="Parts of this report" {
            ul {
                li { a href="#explain" { "What needs an explanation" } }
                li { a href="#vessels" { "The vessels" } }
                li { a href="#not-evaluated" { "What was not evaluated" } }
                li { a href="#limits" { "Limits and models used" } }
                li { a href="#cautions" { "Cautions" } }
            }
        }
        @if !kinds.is_empty() {
            table {
                caption { "Queries by kind, the most frequent first" }
                thead { tr { th scope="col" { "Query" } th scope="col" class="n" { "Rows" } } }
                tbody { @for (id, n) in kinds { tr { th scope="row" { code { (id) } } td class="n" { (n) } } } }
            }
        }
        @if !summary.vessels.is_empty() { (vessels(sheet)) }
    }
}

fn vessels(sheet: &Sheet) -> Markup {
    let all = &sheet.page.summary.vessels;
    html! {
        div class="wide" {
            table {
                caption { "The vessels, those with more to explain first" }
                thead {
                    tr {
                        th scope="col" { "Vessel" } th scope="col" class="n" { "Observations" } th scope="col" class="n" { "Rows with a query" }
                        th scope="col" { "Patterns" } th scope="col" { "Gyro error, mean" }
                    }
                }
                tbody { @for v in all.iter().take(MOST_LISTED) { (line(sheet, v)) } }
            }
        }
        @if all.len() > MOST_LISTED { p { (all.len() - MOST_LISTED) " more vessels stand in the summary." } }
    }
}

fn line(sheet: &Sheet, v: &VesselSummary) -> Markup {
    let known = v.gyros.iter().filter_map(|g| Some((g, g.mean_gyro_error?, g.mean_gyro_error_u?)));
    html! {
        tr {
            th scope="row" {
                @match sheet.section(&v.vessel).filter(|_| has_something(v)) {
                    Some(id) => a href={ "#" (id) } { (vessel_name(&v.vessel)) },
                    None => (vessel_name(&v.vessel)),
                }
            }
            td class="n" { (v.observations) }
            td class="n" { (v.rows_with_query) }
            td { @for (i, p) in v.patterns.iter().enumerate() { @if i > 0 { ", " } code { (p.id) } } }
            td {
                @for (i, (gyro, mean, u)) in known.take(4).enumerate() {
                    @if i > 0 { "; " }
                    @for name in [&gyro.gyro, &gyro.repeater].into_iter().filter(|n| !n.is_empty()) { (named(name)) " " }
                    (low_high(mean)) " (" (words::u(u)) ")"
                }
            }
        }
    }
}
