//! The report of a gyro's run-up.

use super::{document, figure, named, shown};
use crate::angle::text::write::low_high;
use crate::compass::gyro::settle::standard;
use crate::report::chart::run_up_inline;
use crate::report::settle::SettlePage;
use crate::report::words;
use maud::{Markup, html};

/// The page; `file` is the name of the run-up as it was given.
pub fn settle(page: &SettlePage, file: &str) -> String {
    let body = html! {
        h1 { "Run-up of a gyrocompass" }
        p class="soft" { "From " (named(file)) ": " (page.opening()) "." }
        p class="lead" { strong { (shown(&page.verdict())) } }
        @for said in page.remarks().iter().chain(&page.standards()) { p { (shown(said)) } }
        (figures(page))
        h2 { "Readings over time" }
        (figure(
            &run_up_inline(page),
            &html! {
                "Circles: readings; arrowheads on the edge: readings beyond the picture; crosses: set aside. Line: the fitted swing, broken where it looks ahead. Grey band: within "
                (standard::BAND_DEG) " degrees of the settle point."
            },
            &readings(page),
        ))
        @if !page.found.to_come.is_empty() {
            h2 { "Readings to come, if it goes on as it does" }
            table {
                thead { tr { th scope="col" { "Time" } th scope="col" class="n" { "Gyro error" } th scope="col" class="n" { "u" } } }
                tbody {
                    @for r in &page.found.to_come {
                        tr { th scope="row" { (page.clock(r.minutes)) } td class="n" { (low_high(r.error_deg)) } td class="n" { (super::u(r.u_deg)) } }
                    }
                }
            }
        }
        @if !page.run_up.problems.is_empty() {
            h2 { "Rows that could not be used" }
            ul { @for problem in page.run_up.problems.iter().take(MOST) { li { (shown(problem)) } } }
            @if page.run_up.problems.len() > MOST { p { (page.run_up.problems.len() - MOST) " more, which standard error names." } }
        }
        (limits(page))
    };
    document("Run-up of a gyrocompass", &body)
}

/// Rows that are listed.
const MOST: usize = 1000;

fn figures(page: &SettlePage) -> Markup {
    let found = page.found;
    html! {
        dl class="facts" {
            @if let Some((point, u)) = found.settle_point {
                dt { "Settle point" } dd { (low_high(point)) ", " (words::u(u)) }
            }
            @if let Some(swing) = &found.swing {
                dt { "Period" } dd { (format!("{:.1} min, {}", swing.period_min, words::u(swing.period_u_min))) }
                dt { "Each half swing" } dd { (format!("{:.2} of the one before, u {:.3}", swing.half_swing_ratio, swing.half_swing_ratio_u.max(0.001))) }
                dt { "Damping" } dd { (format!("{:.0} % of each half swing, {}", 100.0 * (1.0 - swing.half_swing_ratio), words::u(100.0 * swing.half_swing_ratio_u))) }
                dt { "Readings scatter by" } dd { (format!("{:.2} degrees about the swing", swing.scatter_deg)) }
            }
            @if !found.set_aside.is_empty() {
                dt { "Set aside" }
                dd {
                    @for (i, (row, off)) in found.set_aside.iter().take(MOST).enumerate() {
                        @if i > 0 { "; " } "row " (row) ", " (format!("{:.1}", off.abs())) " degrees off"
                    }
                }
            }
        }
    }
}

fn readings(page: &SettlePage) -> Markup {
    let (run_up, found) = (page.run_up, page.found);
    let expected = |minutes: f64| found.swing.as_ref().map(|s| s.error_deg(minutes)).or(found.settle_point.map(|p| p.0));
    html! {
        table {
            caption { "Readings of the gyro, with what the fitted swing expects" }
            thead {
                tr {
                    th scope="col" class="n" { "Row" } th scope="col" { "Time" } th scope="col" class="n" { "Gyro error" }
                    th scope="col" class="n" { "Expected" } th scope="col" class="n" { "Off" } th scope="col" { "" }
                }
            }
            tbody {
                @for r in run_up.readings.iter().take(MOST) {
                    tr {
                        th scope="row" class="n" { (r.row) }
                        td { (page.clock(r.minutes)) }
                        td class="n" { (low_high(r.error_deg)) }
                        td class="n" { @if let Some(e) = expected(r.minutes) { (low_high(e)) } }
                        td class="n" { @if let Some(e) = expected(r.minutes) { (low_high(r.error_deg - e)) } }
                        td { @if found.set_aside.iter().any(|(row, _)| *row == r.row) { "set aside" } }
                    }
                }
            }
        }
        @if run_up.readings.len() > MOST { p { (run_up.readings.len() - MOST) " more; --format csv gives them all." } }
    }
}

fn limits(page: &SettlePage) -> Markup {
    html! {
        h2 { "Limits it was held to" }
        p { "Settled is within " (standard::BAND_DEG) " degrees of the settle point, shown by readings over " (standard::PROOF_MIN) " minutes, the last one among them (IMO A.424(XI), A.821(19), ISO 8728)." }
        @if page.latitude.is_none() { p { "No latitude was given: settle point and scatter were not held to their limits." } }
        (super::review::settings(page.limits, |key| ["gyro_settle", "gyro_scatter", "gyro_settles_within_h", "gyro_doubtful_latitude"].contains(&key)))
    }
}
