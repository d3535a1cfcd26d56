//! The report of a swing.

use super::{document, figure, named, shown, u};
use crate::angle::CompassBearing;
use crate::angle::text::write::{direction, east_west};
use crate::compass::curve::Coefficients;
use crate::report::chart::deviation::{Deviations, Observed, deviations, key};
use crate::report::chart::residuals::residuals;
use crate::report::figure::signed;
use crate::report::swing::{SwingReport, TITLE};
use maud::{Markup, html};

/// Readings that are listed.
const MOST: usize = 1000;

/// The page; `file` is the name of the swing as it was given.
pub fn swing(report: &SwingReport, file: &str) -> String {
    let of = picture(report);
    let (kept, set_aside) = off_the_curve(report);
    let body = html! {
        h1 { (TITLE) }
        p class="soft" { "From " (named(file)) "." }
        (particulars(report))
        (table(report))
        h2 { "The curve" }
        (figure(&deviations("curve", &of), &html! { (key(&of)) }, &curve_table(&of)))
        (coefficients(report))
        h2 { "Residuals" }
        (figure(
            &residuals("residuals", &of.of, &kept, &set_aside),
            &html! { "Points: readings used, observed less curve. Crosses: readings set aside, arrowheads where they lie beyond the picture." },
            &readings(report),
        ))
        p {
            (report.rows.len() - report.curve.set_aside.len()) " readings used, " (report.curve.set_aside.len()) " set aside; root mean square of the residuals "
            (format!("{:.2}", report.curve.rms_deg)) "; u from a scatter of " (format!("{:.2}", report.curve.scatter_deg)) " degrees."
        }
        @if !report.curve.set_aside.is_empty() {
            ul {
                @for aside in &report.curve.set_aside {
                    @if let Some(row) = report.rows.get(aside.index) {
                        li {
                            "Row " (row.number) ", heading " (direction(row.reading.heading.deg(), 1)) ", " (east_west(row.reading.deviation.deg()))
                            ": set aside, " (east_west(aside.residual_deg)) " off the curve through the others"
                            @if let Some(slip) = aside.slip { "; " (slip.to_string()) } "."
                        }
                    }
                }
            }
        }
        (unproven(report))
        (elsewhere(report))
        @if !report.bad_rows.is_empty() {
            h2 { "Rows that could not be used" }
            ul { @for bad in report.bad_rows.iter().take(MOST) { li { "Row " (bad.number) ": " (shown(&bad.why)) } } }
        }
        @let notices = report.notices();
        @if !notices.is_empty() {
            h2 { "Notices" }
            ul { @for notice in notices { li { (notice.to_string()) " (" code { (notice.id()) } ")" } } }
        }
        h2 { "How it was found" }
        p {
            "Least squares for deviation = A + B sin z + C cos z + D sin 2z + E cos 2z, z the heading by compass, east +. Readings that chance does not explain are set aside and named. "
            "Source: Handbook of Magnetic Compass Adjustment (formerly NGA Pub. 226). u is one standard uncertainty, never from a scatter under 0.5 degrees."
        }
    };
    document(TITLE, &body)
}

fn particulars(report: &SwingReport) -> Markup {
    let p = report.particulars;
    let lines = [
        ("Vessel", &p.vessel),
        ("Compass", &p.magnetic_compass),
        ("Date", &p.date),
        ("Place", &p.place),
        ("Correctors as found", &p.correctors),
    ];
    html! {
        dl class="facts" {
            @for (name, value) in lines {
                dt { (name) }
                dd { @if value.is_empty() { "not stated" } @else { (named(value)) } }
            }
        }
    }
}

fn table(report: &SwingReport) -> Markup {
    // Two halves beside each other, as a card is read.
    let half = report.card.len().div_ceil(2);
    let (left, right) = report.card.split_at(half.min(report.card.len()));
    let cells = |line: Option<&(f64, Option<crate::compass::curve::Estimate>)>| {
        html! {
            @match line {
                Some((deg, Some(e))) => { th scope="row" class="n" { (direction(*deg, 1)) } td class="n" { (east_west(e.deviation_deg)) } td class="n" { (u(e.u_deg)) } }
                Some((deg, None)) => { th scope="row" class="n" { (direction(*deg, 1)) } td class="n" { "unknown" } td class="n" {} }
                None => { td {} td {} td {} }
            }
        }
    };
    let head =
        html! { th scope="col" class="n" { "By compass" } th scope="col" class="n" { "Deviation" } th scope="col" class="n" { "u" } };
    html! {
        h2 { "Deviations by heading" }
        table {
            caption { "Heading by compass, deviation and its u, degrees; E east, W west" }
            thead { tr { (head) (head) } }
            tbody { @for (i, line) in left.iter().enumerate() { tr { (cells(Some(line))) (cells(right.get(i))) } } }
        }
        @if let Some((deg, estimate)) = &report.asked {
            p {
                "On heading " (direction(*deg, 1)) ": "
                @match estimate {
                    Some(e) => { "deviation " (east_west(e.deviation_deg)) ", u " (u(e.u_deg)) "." }
                    None => { "these readings cannot tell the deviation." }
                }
            }
        }
    }
}

fn picture(report: &SwingReport) -> Deviations {
    let p = report.particulars;
    let who: Vec<String> = [&p.vessel, &p.magnetic_compass].into_iter().filter(|n| !n.is_empty()).map(|n| shown(n)).collect();
    let observed = |set_aside: bool| {
        let is_aside = |i: usize| report.curve.set_aside.iter().any(|s| s.index == i);
        let rows = report.rows.iter().enumerate().filter(move |(i, _)| is_aside(*i) == set_aside);
        rows.map(|(_, row)| Observed { heading_deg: row.reading.heading.deg(), deviation_deg: row.reading.deviation.deg(), u_deg: 0.0 })
            .collect()
    };
    let on_curve = |i: i32| {
        let heading_deg = f64::from(i) * 5.0;
        let e = report.curve.on(CompassBearing::wrapping_deg(heading_deg))?;
        Some(Observed { heading_deg, deviation_deg: e.deviation_deg, u_deg: e.u_deg })
    };
    Deviations {
        of: if who.is_empty() { "the compass swung".to_owned() } else { who.join(", ") },
        swing: true,
        by_bearing: observed(false),
        off: observed(true),
        curve: (0..=72).filter_map(on_curve).collect(),
        unproven: report.curve.unproven.iter().map(|(a, b)| (a.deg(), b.deg())).collect(),
        ..Deviations::default()
    }
}

fn curve_table(of: &Deviations) -> Markup {
    html! {
        table {
            caption { "The fitted curve every 15 degrees" }
            thead { tr { th scope="col" class="n" { "By compass" } th scope="col" class="n" { "Curve" } th scope="col" class="n" { "u" } } }
            tbody {
                @for p in of.curve.iter().filter(|p| p.heading_deg % 15.0 == 0.0 && p.heading_deg < 360.0) {
                    tr { th scope="row" class="n" { (direction(p.heading_deg, 0)) } td class="n" { (east_west(p.deviation_deg)) } td class="n" { (u(p.u_deg)) } }
                }
            }
        }
    }
}

fn coefficients(report: &SwingReport) -> Markup {
    let curve = report.curve;
    let rule = curve.handbook.map(Coefficients::to_array);
    html! {
        h3 { "Coefficients" }
        table {
            caption { "Degrees, east +" }
            thead {
                tr {
                    th scope="col" { "Coefficient" } th scope="col" class="n" { "Least squares" } th scope="col" class="n" { "u" }
                    @if rule.is_some() { th scope="col" class="n" { "Rule for eight headings" } }
                }
            }
            tbody {
                @for (i, ((value, known), name)) in curve.coefficients.to_array().into_iter().zip(curve.u_deg()).zip(Coefficients::NAMES).enumerate() {
                    tr {
                        th scope="row" { (name) }
                        @match known {
                            Some(known) => { td class="n" { (signed(value, 2)) } td class="n" { (format!("{known:.2}")) } }
                            None => { td class="n" { "undetermined" } td {} }
                        }
                        @if let Some(rule) = &rule { td class="n" { @if let Some(value) = rule.get(i) { (signed(*value, 2)) } } }
                    }
                }
            }
        }
        @if let Some(exact) = curve.exact {
            p {
                "Exact form (numbers): "
                @for (i, (value, name)) in exact.to_array().into_iter().zip(Coefficients::NAMES).enumerate() { @if i > 0 { ", " } (name) " " (signed(value, 4)) }
                "; the table is by this form."
            }
        }
        @if let Some((half, half_u)) = curve.half_turn_difference_deg {
            p { "Clockwise less anticlockwise " (east_west(2.0 * half)) ", u " (u(2.0 * half_u)) ": the curve lies midway." }
        }
    }
}

/// Residuals of the readings used, and of those set aside.
fn off_the_curve(report: &SwingReport) -> (Vec<Observed>, Vec<Observed>) {
    let (mut kept, mut aside) = (Vec::new(), Vec::new());
    for (i, (row, residual)) in report.rows.iter().zip(&report.curve.residuals_deg).enumerate() {
        let point = Observed { heading_deg: row.reading.heading.deg(), deviation_deg: *residual, u_deg: 0.0 };
        if report.curve.set_aside.iter().any(|s| s.index == i) { aside.push(point) } else { kept.push(point) }
    }
    (kept, aside)
}

fn readings(report: &SwingReport) -> Markup {
    html! {
        table {
            caption { "Every reading, and what it is off the curve by; degrees, E east, W west" }
            thead {
                tr {
                    th scope="col" class="n" { "Row" } th scope="col" class="n" { "By compass" } th scope="col" class="n" { "Deviation" }
                    th scope="col" class="n" { "Off the curve" } th scope="col" { "" }
                }
            }
            tbody {
                @for (i, (row, residual)) in report.rows.iter().zip(&report.curve.residuals_deg).enumerate().take(MOST) {
                    tr {
                        th scope="row" class="n" { (row.number) }
                        td class="n" { (direction(row.reading.heading.deg(), 1)) }
                        td class="n" { (east_west(row.reading.deviation.deg())) }
                        td class="n" { (east_west(*residual)) }
                        td { @if report.curve.set_aside.iter().any(|s| s.index == i) { "set aside" } }
                    }
                }
            }
        }
        @if report.rows.len() > MOST { p { (report.rows.len() - MOST) " more readings." } }
    }
}

fn unproven(report: &SwingReport) -> Markup {
    html! {
        h2 { "Unproven sectors" }
        @if report.curve.unproven.is_empty() {
            p { "None: the readings go round the compass." }
        } @else {
            p { "Nothing was observed on these headings; what the table says there rests on the curve alone:" }
            ul { @for (from, to) in &report.curve.unproven { li { (direction(from.deg(), 0)) " to " (direction(to.deg(), 0)) } } }
        }
    }
}

fn elsewhere(report: &SwingReport) -> Markup {
    html! {
        @if let Some(text) = report.elsewhere_words() {
            h2 { "The curve to expect elsewhere" }
            pre { (text.trim()) }
        }
    }
}
