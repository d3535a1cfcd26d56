//! What was not evaluated and why; the models, the cards and the limits that were used.

use super::super::{named, sentence, shown};
use super::{Sheet, vessel_name};
use crate::compass::field::Model;
use crate::limits::{Limits, SETTINGS, Table};
use crate::review::MOST_PROBLEMS;
use crate::time::UtcInstant;
use maud::{Markup, html};
use std::collections::BTreeMap;

/// Reasons that are listed.
const MOST_REASONS: usize = 300;
/// Vessels that are named with a reason.
const MOST_NAMED: usize = 12;
/// Cards that are listed.
const MOST_CARDS: usize = 200;

pub fn not_evaluated(sheet: &Sheet) -> Markup {
    let mut reasons: BTreeMap<(&str, &str), Vec<&str>> = BTreeMap::new();
    for vessel in &sheet.page.summary.vessels {
        for not in &vessel.not_evaluated {
            reasons.entry((not.id, not.why.as_str())).or_default().push(&vessel.vessel);
        }
    }
    let problems = &sheet.findings.problems;
    html! {
        @if reasons.is_empty() {
            p { "Every pattern could be judged on every vessel." }
        } @else {
            p { "These patterns could not be judged from what stands in the log; that is no sign for or against them." }
            div class="wide" {
                table {
                    thead { tr { th scope="col" { "Pattern" } th scope="col" { "Because" } th scope="col" { "Vessels" } } }
                    tbody {
                        @for ((id, why), vessels) in reasons.iter().take(MOST_REASONS) {
                            tr {
                                th scope="row" { code { (id) } }
                                td { (sentence(why)) }
                                td {
                                    @for (i, name) in vessels.iter().take(MOST_NAMED).enumerate() { @if i > 0 { ", " } (vessel_name(name)) }
                                    @if vessels.len() > MOST_NAMED { " and " (vessels.len() - MOST_NAMED) " more" }
                                }
                            }
                        }
                    }
                }
            }
            @if reasons.len() > MOST_REASONS { p { (reasons.len() - MOST_REASONS) " more stand in the summary." } }
        }
        h3 { "Rows with a problem" }
        @if sheet.findings.problem_count == 0 {
            p { "None." }
        } @else {
            p {
                "A row that could not be used, or a cell of it that could not, with the reason."
                @if sheet.findings.problem_count > MOST_PROBLEMS as u64 {
                    " The first " (MOST_PROBLEMS) " of " (sheet.findings.problem_count) "; the others stand in the rows' output, column " code { "problem" } "."
                }
            }
            ul { @for (number, why) in problems { li { "Row " (number) ": " bdi { (shown(why)) } } } }
        }
    }
}

/// A decimal year of an instant in milliseconds of the Unix count.
fn year(unix_ms: i64) -> Option<f64> {
    UtcInstant::from_unix_ms(unix_ms).ok().map(UtcInstant::decimal_year)
}

pub fn models(sheet: &Sheet) -> Markup {
    let span = sheet.page.fleet.span_ms().and_then(|(from, to)| Some((year(from)?, year(to)?)));
    let change = Model::Wmm2025.span().0;
    let used = span.map_or_else(Vec::new, |(from, to)| {
        let mut used = Vec::new();
        if from < change {
            used.push(Model::Igrf14);
        }
        if to >= change {
            used.push(Model::Wmm2025);
        }
        used
    });
    html! {
        dl class="facts" {
            dt { "Azimuths" }
            dd { "Sun by the almanac's formulas, to 0.01 degrees; moon, planets and stars to 0.02; against JPL DE421, 1900 to 2100, altitudes to 60. UTC is taken as UT1. Altitudes are of the body's centre, without refraction." }
            dt { "Variation" }
            dd {
                @if used.is_empty() { "No row has a time: no field model was used." }
                @for (i, model) in used.iter().enumerate() {
                    @if i > 0 { "; " }
                    (model.name()) " (" (model.edition()) "), " (format!("{:.1} to {:.1}", model.span().0, model.span().1))
                    @if *model == Model::Igrf14 { ", here before " (format!("{change:.1}")) }
                }
                "."
            }
            dt { "Runs and curves" }
            dd { "A gyro's run and a compass's curve are robust fits to the vessel's own rows, in which one bad row in ten moves nothing; a curve holds on to what compasses in general do where no heading was observed, and changes with magnetic latitude." }
            dt { "Slips" }
            dd { "Each known slip is undone on the row, and what is then left of every figure, against what that figure is good for, ranks it." }
        }
    }
}

pub fn cards(sheet: &Sheet) -> Markup {
    let Some(cards) = sheet.page.cards else {
        return html! { p { "No deviation card was given: deviations were held against each compass's own curve." } };
    };
    let way = if sheet.page.card_as_given { "in a straight line between their headings" } else { "by their curves" };
    html! {
        h3 { "Deviation cards" }
        p { "Read " (way) "." }
        ul {
            @for card in cards.iter().take(MOST_CARDS) {
                li {
                    @if card.of.vessel.trim().is_empty() { "Any vessel" } @else { (named(&card.of.vessel)) }
                    ", " @if card.of.magnetic_compass.trim().is_empty() { "any compass" } @else { (named(&card.of.magnetic_compass)) }
                    @if let Some(from) = card.of.valid_from { ", from " (from.to_chrono().format("%Y-%m-%d").to_string()) }
                    @if !card.of.place.trim().is_empty() { ", " (named(&card.of.place)) }
                    ": " (card.points().len()) " headings."
                }
            }
        }
        @if !sheet.page.card_doubts.is_empty() {
            p { "What may be doubted of them:" }
            ul { @for doubt in sheet.page.card_doubts { li { bdi { (shown(doubt)) } } } }
        }
    }
}

/// The settings that `wanted` takes by their keys, those that differ from the built-in values marked.
pub fn settings(limits: &Limits, wanted: impl Fn(&str) -> bool) -> Markup {
    html! {
        @for table in [Table::Limits, Table::Uncertainty] {
            @let rows: Vec<_> = SETTINGS.iter().filter(|s| s.table == table && wanted(s.key)).collect();
            @if !rows.is_empty() {
                div class="wide" {
                    table {
                        caption { @if table == Table::Limits { "Limits" } @else { "Uncertainties, one standard uncertainty each" } }
                        thead { tr { th scope="col" { "Key" } th scope="col" class="n" { "Value" } th scope="col" { "What it does" } th scope="col" { "Origin" } } }
                        tbody {
                            @for s in rows {
                                @let value = (s.get)(limits);
                                tr {
                                    th scope="row" { code { (s.key) } }
                                    td class="n" { (value) " " (s.unit) @if value != s.default { br; "built in: " (s.default) } }
                                    td { (s.what) }
                                    td { (s.origin) }
                                }
                            }
                        }
                    }
                }
            }
        }
        @if wanted("watches") { p { "Watches: " code { (limits.watches.word()) } "." } }
    }
}
