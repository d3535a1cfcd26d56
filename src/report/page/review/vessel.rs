//! One vessel: her patterns, her gyros over time, her compasses over the headings, her entries by watch.

use super::super::{figure, named, sentence, shown, u};
use super::findings::links;
use super::{MOST_DRAWN, Sheet, has_something, vessel_name};
use crate::angle::CompassBearing;
use crate::angle::text::write::{direction, east_west, low_high};
use crate::compass::card::Card;
use crate::report::chart::deviation::{Deviations, Observed, deviations, key};
use crate::report::chart::{gyro, watches};
use crate::report::figure::signed;
use crate::report::words;
use crate::review::{CompassDrawn, CompassSummary, DeviationOnHeading, ErrorInTime, GyroDrawn, Portrait, VesselSummary};
use crate::time::UtcInstant;
use crate::time::text::write::to_the_minute;
use maud::{Markup, html};

/// Spans of time that a table of a gyro's errors has at the most.
const SPANS: i64 = 24;

pub fn vessels(sheet: &Sheet) -> Markup {
    let something = sheet.page.summary.vessels.iter().filter(|v| has_something(v)).count();
    let quiet = sheet.page.summary.vessels.len() - something;
    html! {
        @if something == 0 { p { "Nothing of any vessel needs an explanation." } }
        @for (i, vessel) in sheet.drawn() { (one(sheet, i + 1, vessel)) }
        @if something > MOST_DRAWN { p { (something - MOST_DRAWN) " more vessels with something to explain have no pictures here; review their logs alone to see them." } }
        @if quiet > 0 { p class="soft" { "Vessels with nothing to explain stand in the table at the head only: " (quiet) "." } }
    }
}

fn one(sheet: &Sheet, number: usize, vessel: &VesselSummary) -> Markup {
    let id = format!("vessel-{number}");
    let Some(portrait) = sheet.page.fleet.portrait(&vessel.vessel, sheet.findings) else { return html! {} };
    html! {
        section aria-labelledby=(id) {
            h3 id=(id) { (vessel_name(&vessel.vessel)) }
            (links(sheet, vessel))
            @for p in &vessel.patterns {
                p { code { (p.id) } ": " (sentence(&p.detail)) @if let Some(since) = &p.since { " Since " (since) "." } }
            }
            @if !vessel.slips.is_empty() {
                p {
                    "Most probable slips: "
                    @for (i, (slip, n)) in vessel.slips.iter().take(8).enumerate() { @if i > 0 { ", " } code { (slip) } " " (n) }
                    "."
                }
            }
            @for (i, of_gyro) in portrait.gyros().iter().enumerate() { (gyro_errors(&format!("{id}-gyro-{}", i + 1), vessel, of_gyro)) }
            @for (i, compass) in portrait.compasses().iter().enumerate() {
                (compass_deviations(sheet, &portrait, &format!("{id}-compass-{}", i + 1), vessel, compass))
            }
            (coverage(sheet, &portrait, &id, vessel))
        }
    }
}

/// Whose instrument: vessel and its name, as plain text.
fn whose(vessel: &VesselSummary, name: &str) -> String {
    let vessel = if vessel.vessel.is_empty() { "the vessel".to_owned() } else { shown(&vessel.vessel) };
    if name.is_empty() { vessel } else { format!("{vessel}, {}", shown(name)) }
}

fn gyro_errors(id: &str, vessel: &VesselSummary, of: &GyroDrawn) -> Markup {
    let Some(picture) = gyro::gyro_errors(id, &whose(vessel, of.gyro), of) else { return html! {} };
    let all: u64 = of.repeaters.iter().map(|r| r.counts.0).sum();
    let drawn: usize = of.repeaters.iter().map(|r| r.errors.len() + r.out_of_run.len() + r.without_time).sum();
    let without_time: usize = of.repeaters.iter().map(|r| r.without_time).sum();
    let odd = of.repeaters.iter().any(|r| !r.out_of_run.is_empty());
    let caption = html! {
        (gyro::key(of)) "; upright strokes: one u either way; line: the run"
        @if odd { "; crosses: out of the run, arrowheads where they lie beyond the picture" }
        @if !of.steps.is_empty() { "; dotted upright: a step" }
        "."
        @for step in &of.steps {
            " A step of " (low_high(step.by_deg)) " (" (words::u(step.u_deg)) ") at " (minute(step.unix_ms)) " UTC."
        }
        @for g in vessel.gyros.iter().filter(|g| g.gyro == of.gyro) {
            @if let (Some(mean), Some(mean_u)) = (g.mean_gyro_error, g.mean_gyro_error_u) {
                " " @if !g.repeater.is_empty() { (named(&g.repeater)) ": mean " } @else { "Mean " } (low_high(mean)) " (" (words::u(mean_u)) ")"
                @if let Some(scatter) = g.scatter { ", single errors scatter by " (format!("{scatter:.1}")) }
                "."
            }
        }
        @if all > drawn as u64 { " An even sample of " (drawn) " of " (all) " errors." }
        @if without_time > 0 { " Not drawn, their time being in doubt: " (without_time) "." }
    };
    html! {
        h4 { "Gyro error over time" @if !of.gyro.is_empty() { ", " (named(of.gyro)) } }
        (figure(&picture, &caption, &spans(of)))
    }
}

fn minute(unix_ms: i64) -> String {
    UtcInstant::from_unix_ms(unix_ms).map(to_the_minute).unwrap_or_default()
}

/// The middle of some figures.
fn middle(mut figures: Vec<f64>) -> Option<f64> {
    figures.sort_by(f64::total_cmp);
    figures.get(figures.len() / 2).copied()
}

/// Equal spans of time, each with the middle of its errors.
fn spans(of: &GyroDrawn) -> Markup {
    let errors = || of.repeaters.iter().flat_map(|r| r.errors.iter().map(|e| (e, false)).chain(r.out_of_run.iter().map(|e| (e, true))));
    let from = errors().map(|e| e.0.unix_ms).min().unwrap_or(0);
    let to = errors().map(|e| e.0.unix_ms).max().unwrap_or(0);
    let each = ((to - from) / SPANS + 1).max(1);
    let rows = (0..SPANS).filter_map(|i| {
        let within = |e: &ErrorInTime| (e.unix_ms - from) / each == i;
        let all: Vec<(&ErrorInTime, bool)> = errors().filter(|(e, _)| within(e)).collect();
        let sound = || all.iter().filter(|(_, odd)| !odd).map(|(e, _)| *e);
        (!all.is_empty()).then(|| {
            html! {
                tr {
                    th scope="row" { (minute(from + i * each)) }
                    td class="n" { (all.len()) }
                    td class="n" { @if let Some(e) = middle(sound().map(|e| e.error_deg).collect()) { (low_high(e)) } }
                    td class="n" { @if let Some(e) = middle(sound().map(|e| e.u_deg).collect()) { (u(e)) } }
                    td class="n" { @if let Some(r) = middle(sound().filter_map(|e| e.run_deg.map(|r| r.0)).collect()) { (low_high(r)) } }
                    td class="n" { (all.iter().filter(|(_, odd)| *odd).count()) }
                }
            }
        })
    });
    html! {
        table {
            caption { "Gyro error by equal spans of time, all repeaters" }
            thead {
                tr {
                    th scope="col" { "From, UTC" } th scope="col" class="n" { "Errors" } th scope="col" class="n" { "Middle one" }
                    th scope="col" class="n" { "u" } th scope="col" class="n" { "Run" } th scope="col" class="n" { "Out of the run" }
                }
            }
            tbody { @for row in rows { (row) } }
        }
        (odd_rows("Errors out of the run", of.repeaters.iter().flat_map(|r| &r.out_of_run).map(|e| (e.number, minute(e.unix_ms), low_high(e.error_deg), e.u_deg)).collect()))
    }
}

/// Rows that are drawn as crosses.
fn odd_rows(caption: &str, rows: Vec<(u64, String, String, f64)>) -> Markup {
    html! {
        @if !rows.is_empty() {
            table {
                caption { (caption) }
                thead { tr { th scope="col" class="n" { "Row" } th scope="col" { "At" } th scope="col" class="n" { "Error" } th scope="col" class="n" { "u" } } }
                tbody { @for (number, at, error, u_deg) in rows { tr { th scope="row" class="n" { (number) } td { (at) } td class="n" { (error) } td class="n" { (u(u_deg)) } } } }
            }
        }
    }
}

fn compass_deviations(sheet: &Sheet, portrait: &Portrait, id: &str, vessel: &VesselSummary, compass: &CompassDrawn) -> Markup {
    let observed = |d: &DeviationOnHeading| Observed { heading_deg: d.heading_deg, deviation_deg: d.deviation_deg, u_deg: d.u_deg };
    let card = card(sheet, portrait, vessel, compass);
    let on = |heading: f64| {
        card.map(|c| {
            if sheet.page.card_as_given {
                c.as_given(CompassBearing::wrapping_deg(heading))
            } else {
                c.deviation(CompassBearing::wrapping_deg(heading))
            }
            .deg()
        })
    };
    let of = Deviations {
        swing: false,
        of: whose(vessel, compass.compass),
        by_bearing: compass.deviations.iter().filter(|d| !d.by_comparison).map(observed).collect(),
        by_comparison: compass.deviations.iter().filter(|d| d.by_comparison).map(observed).collect(),
        off: compass.off_curve.iter().map(observed).collect(),
        curve: compass
            .curve
            .iter()
            .map(|(heading_deg, deviation_deg, u_deg)| Observed { heading_deg: *heading_deg, deviation_deg: *deviation_deg, u_deg: *u_deg })
            .collect(),
        card: card.map(|c| c.points().iter().map(|(h, d)| (h.deg(), d.deg())).collect()).unwrap_or_default(),
        card_line: (0..=72).filter_map(|i| Some((f64::from(i) * 5.0, on(f64::from(i) * 5.0)?))).collect(),
        unproven: compass.unproven.clone(),
    };
    let drawn = of.by_bearing.len() + of.by_comparison.len() + of.off.len();
    let caption = html! {
        (key(&of))
        @if !of.curve.is_empty() { " The curve is that of the middle of the magnetic latitudes of this log." }
        @if compass.counts.0 > drawn as u64 { " Drawn are " (drawn) " of " (compass.counts.0) ", an even sample of those with a heading by compass." }
        @if let Some(s) = vessel.compasses.iter().find(|c| c.magnetic_compass == compass.compass) { (coefficients(s)) }
    };
    html! {
        h4 { "Deviation against compass heading" @if !compass.compass.is_empty() { ", " (named(compass.compass)) } }
        (figure(&deviations(id, &of), &caption, &sectors(compass, &of)))
    }
}

/// The card in force for a compass at the end of the log.
fn card<'c>(sheet: &'c Sheet, portrait: &Portrait, vessel: &VesselSummary, compass: &CompassDrawn) -> Option<&'c Card> {
    let (_, last) = portrait.span_ms()?;
    sheet.page.cards?.in_force(&vessel.vessel, compass.compass, UtcInstant::from_unix_ms(last).ok()?)
}

fn coefficients(summary: &CompassSummary) -> Markup {
    let known = ["A", "B", "C", "D", "E"].into_iter().zip(["A_u", "B_u", "C_u", "D_u", "E_u"]).filter_map(|(name, name_u)| {
        let get = |n: &str| summary.coefficients.get(n).copied().flatten();
        Some(format!("{name} {} (u {:.2})", signed(get(name)?, 2), get(name_u)?))
    });
    let known: Vec<String> = known.collect();
    html! { @if !known.is_empty() { " Coefficients, east +: " (known.join(", ")) "." } }
}

/// By sectors of 15 degrees, what was observed and what the curve and the card say.
fn sectors(compass: &CompassDrawn, of: &Deviations) -> Markup {
    let on = |line: &[(f64, f64)], heading: f64| line.iter().find(|p| p.0 == heading).map(|p| p.1);
    let curve: Vec<(f64, f64)> = of.curve.iter().map(|p| (p.heading_deg, p.deviation_deg)).collect();
    html! {
        table {
            caption { "Deviation by sectors of the heading by compass; E east, W west" }
            thead {
                tr {
                    th scope="col" class="n" { "Headings" } th scope="col" class="n" { "Observed" } th scope="col" class="n" { "Middle one" }
                    th scope="col" class="n" { "Curve at its start" } @if !of.card_line.is_empty() { th scope="col" class="n" { "Card at its start" } }
                    th scope="col" class="n" { "Off card or curve" }
                }
            }
            tbody {
                @for i in 0..24 {
                    @let (from, to) = (f64::from(i) * 15.0, f64::from(i + 1) * 15.0);
                    @let within = |d: &&DeviationOnHeading| (from..to).contains(&d.heading_deg);
                    @let sound: Vec<f64> = compass.deviations.iter().filter(within).map(|d| d.deviation_deg).collect();
                    tr {
                        th scope="row" class="n" { (direction(from, 0)) " to " (if i == 23 { "360".to_owned() } else { direction(to, 0) }) }
                        td class="n" { (sound.len()) }
                        td class="n" { @if let Some(d) = middle(sound) { (east_west(d)) } }
                        td class="n" { @if let Some(d) = on(&curve, from) { (east_west(d)) } }
                        @if !of.card_line.is_empty() { td class="n" { @if let Some(d) = on(&of.card_line, from) { (east_west(d)) } } }
                        td class="n" { (compass.off_curve.iter().filter(within).count()) }
                    }
                }
            }
        }
        (odd_rows("Deviations off the card or curve", compass.off_curve.iter().map(|d| (d.number, direction(d.heading_deg, 1), east_west(d.deviation_deg), d.u_deg)).collect()))
    }
}

fn coverage(sheet: &Sheet, portrait: &Portrait, id: &str, vessel: &VesselSummary) -> Markup {
    let Some(coverage) = portrait.coverage(sheet.page.limits, watches::MOST_COLUMNS) else { return html! {} };
    let picture = watches::watches(&format!("{id}-watches"), &whose(vessel, ""), &coverage);
    let caption = html! {
        "Full: an observation; open: only the reason why none could be had; a line: no entry"
        @if coverage.days_each > 1 { "; the height is the share of the days that a column stands for" }
        ". Watches by ship's time, of the zone of the longitude. Days of which the log says nothing for more than four days together are left out. A ship alongside needs no entry."
    };
    let table = html! {
        table {
            caption { "Days with an entry, by watch" }
            thead {
                tr {
                    th scope="col" { "Watch" } th scope="col" class="n" { "Days" } th scope="col" class="n" { "Observation" }
                    th scope="col" class="n" { "Reason only" } th scope="col" class="n" { "No entry" }
                }
            }
            tbody {
                @for (i, watch) in coverage.watches.iter().enumerate() {
                    @let (seen, why, days) = watches::totals(&coverage, i);
                    tr {
                        th scope="row" { (format!("{:02}-{:02}", watch.hours.0, watch.hours.1)) }
                        td class="n" { (days) } td class="n" { (seen) } td class="n" { (why) } td class="n" { (days.saturating_sub(seen + why)) }
                    }
                }
            }
        }
    };
    html! {
        h4 { "Entries by watch" }
        (figure(&picture, &caption, &table))
    }
}
