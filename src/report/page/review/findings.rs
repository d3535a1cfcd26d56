//! What needs an explanation: the patterns of the vessels, then the rows, worst first.

use super::super::{counted, named, sentence, u};
use super::{Sheet, vessel_name};
use crate::angle::text::write::{direction, east_west, low_high, position};
use crate::compass::{HorizonKind, Observation, Target};
use crate::horizon::{Limb, RisingOrSetting};
use crate::report::words;
use crate::review::{Explanation, Finding, VesselSummary};
use maud::{Markup, html};

/// Patterns that are listed in one place; each vessel's stand with her as well.
const MOST_PATTERNS: usize = 200;

pub fn patterns(sheet: &Sheet) -> Markup {
    let all = || sheet.page.summary.vessels.iter().flat_map(|v| v.patterns.iter().map(move |p| (v, p)));
    let count = all().count();
    html! {
        @if count > 0 {
            h3 { "In many entries of a vessel together" }
            ul {
                @for (vessel, pattern) in all().take(MOST_PATTERNS) {
                    li {
                        strong { (vessel_name(&vessel.vessel)) } ", " code { (pattern.id) } ": " (sentence(&pattern.detail))
                        @if let Some(since) = &pattern.since { " Since " (since) "." }
                    }
                }
            }
            @if count > MOST_PATTERNS { p { (count - MOST_PATTERNS) " more stand in the summary." } }
        }
    }
}

pub fn rows(sheet: &Sheet) -> Markup {
    let (queried, listed) = (sheet.findings.queried, sheet.worst.len() as u64);
    html! {
        h3 { "Single entries, worst first" }
        @if listed == 0 {
            p { "No row has a query." }
        } @else {
            p class="soft" {
                (counted(queried, "row has a query", "rows have a query")) ". They are in order of how far what was measured is over its threshold, then of the row."
                @if queried > listed { " The worst " (listed) " are given here; " (queried - listed) " more stand in the rows' output." }
            }
            @for finding in sheet.worst { (entry(sheet, finding)) }
        }
    }
}

/// The rows of one vessel that are listed, as links.
pub fn links(sheet: &Sheet, vessel: &VesselSummary) -> Markup {
    /// Links that are given.
    const MOST: usize = 60;
    let mut rows: Vec<u64> = sheet.worst.iter().filter(|f| f.vessel == vessel.vessel).map(|f| f.number).collect();
    rows.sort_unstable();
    html! {
        p {
            (counted(vessel.observations, "observation", "observations")) ", " (vessel.rows_with_query) " with a query"
            @if !rows.is_empty() {
                ": row "
                @for (i, number) in rows.iter().take(MOST).enumerate() { @if i > 0 { ", " } a href={ "#row-" (number) } { (number) } }
            }
            @if vessel.rows_with_query > rows.len().min(MOST) as u64 { " and more" }
            "."
        }
    }
}

/// What was observed, in a few words.
fn target(o: &Observation) -> String {
    match o.target {
        Target::Body(body) => body.name().to_owned(),
        Target::OnHorizon { body, event, horizon } => {
            let event = if event == RisingOrSetting::Rising { "rising" } else { "setting" };
            let on = match horizon {
                HorizonKind::Celestial => "celestial horizon",
                HorizonKind::Visible(Limb::Centre) => "visible horizon, centre",
                HorizonKind::Visible(Limb::Upper) => "visible horizon, upper limb",
                HorizonKind::Visible(Limb::Lower) => "visible horizon, lower limb",
            };
            format!("{} {event} on the {on}", body.name())
        }
        Target::Mark { charted, .. } => format!("charted mark on {}", direction(charted.deg(), 1)),
        Target::Headings => "headings compared".to_owned(),
    }
}

fn entry(sheet: &Sheet, f: &Finding) -> Markup {
    let verdict = &f.verdict;
    html! {
        article id={ "row-" (f.number) } aria-labelledby={ "row-" (f.number) "-name" } {
            h4 id={ "row-" (f.number) "-name" } { "Row " (f.number) ", " (vessel_name(&f.vessel)) }
            div class="soft small" {
                @if let Some(moment) = f.moment { (words::when(moment.utc, f.zone)) "; " }
                @if let Some(place) = f.place { (position(place.position)) "; " }
                @match &f.observation { Some(o) => { (target(o)) } None => { "no observation" } }
                @for (name, value) in [("gyro", &f.gyro), ("repeater", &f.repeater), ("compass", &f.magnetic_compass)] {
                    @if !value.is_empty() { "; " (name) " " (named(value)) }
                }
                @if !f.remarks.is_empty() { "; remarks: " q { (named(&f.remarks)) } }
            }
            ul { @for query in &verdict.queries { li class="query" { code { (query.id()) } " " (sentence(&query.to_string())) } } }
            (slips(f))
            (readings(f))
            div class="wide" { (figures(sheet, f)) }
            @if !f.notices.is_empty() || !verdict.notices.is_empty() || !verdict.patterns.is_empty() {
                p class="soft small" {
                    @for notice in f.notices.iter().chain(&verdict.notices) { "Notice: " (notice.to_string()) " (" code { (notice.id()) } "). " }
                    @for pattern in &verdict.patterns { "Also as on other entries of this vessel: " code { (pattern.id()) } ". " }
                }
            }
        }
    }
}

fn slips(f: &Finding) -> Markup {
    let one = |e: &Explanation| {
        html! {
            li {
                "Could " (e.slip.words())
                @if let Some((second, _)) = e.with { ", and " (second.words()) }
                "? " span class="soft" { code { (e.to_string()) } "; " (e.place.words()) "." }
            }
        }
    };
    html! {
        @if !f.verdict.slips.is_empty() {
            div class="small" { "Slips that would explain it, best first, with the degrees that each leaves:" }
            ul class="slips" { @for e in &f.verdict.slips { (one(e)) } }
        } @else if f.verdict.searched {
            p class="small" { "No slip known here explains it." }
        }
    }
}

fn readings(f: &Finding) -> Markup {
    let Some(o) = &f.observation else { return html! {} };
    let read = [
        ("gyro bearing", o.gyro_bearing.map(|r| r.value.deg())),
        ("compass bearing", o.compass_bearing.map(|r| r.value.deg())),
        ("gyro heading", o.gyro_heading.map(|r| r.value.deg())),
        ("compass heading", o.compass_heading.map(|r| r.value.deg())),
    ];
    let read: Vec<String> = read.iter().filter_map(|(name, deg)| Some(format!("{name} {}", direction((*deg)?, 1)))).collect();
    html! { @if !read.is_empty() { div class="small" { "Read: " (read.join(", ")) "." } } }
}

/// A cell of a figure with its u.
fn with_u(figure: Option<(String, f64)>) -> Markup {
    html! { td class="n" { @if let Some((figure, u_deg)) = figure { (figure) " " span class="soft" { "u " (u(u_deg)) } } } }
}

fn figures(sheet: &Sheet, f: &Finding) -> Markup {
    let (g, l) = (&f.figures, &f.logged);
    let compass_error = |c: Option<crate::compass::Figure<crate::angle::CompassError>>| c.map(|e| (east_west(e.value.deg()), e.u_deg()));
    let deviation = |d: Option<crate::compass::Figure<crate::angle::Deviation>>| d.map(|d| (east_west(d.value.deg()), d.u_deg()));
    let (run, curve) = sheet.page.fleet.expected(&f.vessel, f.number);
    let run = run.filter(|_| g.gyro_error.is_some());
    let curve = curve.filter(|_| g.deviation.is_some() || g.deviation_by_comparison.is_some());
    let text = |t: Option<String>| html! { td class="n" { @if let Some(t) = t { (t) } } };
    let logged_any =
        l.azimuth.is_some() || l.gyro_error.is_some() || l.compass_error.is_some() || l.variation.is_some() || l.deviation.is_some();
    if g.azimuth.is_none() && !logged_any && g.deviation_by_comparison.is_none() {
        return html! {};
    }
    html! {
        table {
            thead {
                tr {
                    th scope="col" { "" } th scope="col" class="n" { "Azimuth" } th scope="col" class="n" { "Altitude" } th scope="col" class="n" { "Gyro error" }
                    th scope="col" class="n" { "Compass error" } th scope="col" class="n" { "Variation" } th scope="col" class="n" { "Deviation" }
                }
            }
            tbody {
                tr {
                    th scope="row" { "worked here" }
                    (text(g.azimuth.map(|z| direction(z.deg(), 1))))
                    (text(g.altitude_deg.map(|h| format!("{:.1}", (h * 10.0).round() / 10.0 + 0.0))))
                    (with_u(g.gyro_error.map(|e| (low_high(e.value.deg()), e.u_deg()))))
                    (with_u(compass_error(g.compass_error)))
                    (with_u(g.variation.map(|v| (east_west(v.value.deg()), v.u_deg()))))
                    (with_u(deviation(g.deviation)))
                }
                @if g.deviation_by_comparison.is_some() {
                    tr {
                        th scope="row" { "by comparison" }
                        td {} td {} td {}
                        (with_u(compass_error(g.compass_error_by_comparison)))
                        td {}
                        (with_u(deviation(g.deviation_by_comparison)))
                    }
                }
                @if logged_any {
                    tr {
                        th scope="row" { "in the log" }
                        (text(l.azimuth.map(|z| direction(z.value, 1))))
                        td {}
                        (text(l.gyro_error.map(|e| low_high(e.value))))
                        (text(l.compass_error.map(|e| east_west(e.value))))
                        (text(l.variation.map(|e| east_west(e.value))))
                        (text(l.deviation.map(|e| east_west(e.value))))
                    }
                }
                @if run.is_some() || curve.is_some() || g.card_deg.is_some() {
                    tr {
                        th scope="row" { "expected" }
                        td {} td {}
                        (text(run.map(|r| format!("{} run", low_high(r)))))
                        td {} td {}
                        td class="n" {
                            @match (g.card_deg, curve) {
                                (Some(card), _) => { (east_west(card)) " card" }
                                (None, Some(curve)) => { (east_west(curve)) " curve" }
                                (None, None) => {}
                            }
                        }
                    }
                }
            }
        }
    }
}
