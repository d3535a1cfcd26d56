//! The run-up of a gyro: readings, the swing through them, the settle point and its band.

use super::{Scale, ticks};
use crate::compass::gyro::settle::standard;
use crate::report::settle::SettlePage;
use maud::{Markup, html};
use std::fmt::Write as _;

const WIDTH: f64 = 760.0;
const HEIGHT: f64 = 420.0;
const CURVE_STEPS: u32 = 300;

/// The picture. Early swings are large: the scale is cut at twelve degrees either side of the settle point, and readings beyond are
/// drawn on its edge as open triangles. Readings to come are a broken line.
pub fn run_up(page: &SettlePage) -> String {
    drawn(page, Some("http://www.w3.org/2000/svg")).into_string() + "\n"
}

/// The same within a page, whose own style may take its colours over.
pub(crate) fn run_up_inline(page: &SettlePage) -> Markup {
    drawn(page, None)
}

/// `namespace` is what a file of its own needs to be known as a picture.
fn drawn(page: &SettlePage, namespace: Option<&str>) -> Markup {
    let readings = &page.run_up.readings;
    let last = readings.last().map_or(1.0, |r| r.minutes).max(1.0);
    let end = page.found.to_come.last().map_or(last, |r| r.minutes);
    let middle = page.found.settle_point.map_or(0.0, |p| p.0);
    let reach = readings.iter().map(|r| (r.error_deg - middle).abs()).fold(2.0, f64::max).min(12.0) * 1.05;
    let x = Scale { from: (0.0, end), to: (70.0, WIDTH - 20.0) };
    let y = Scale { from: (middle - reach, middle + reach), to: (HEIGHT - 60.0, 40.0) };
    let inside = |error: f64| error.clamp(middle - reach, middle + reach);
    let beyond = |error: f64| (error - middle).abs() > reach;
    let curve = |from: f64, to: f64| -> String {
        let Some(swing) = &page.found.swing else { return String::new() };
        let mut path = String::new();
        let mut pen_up = true;
        for step in 0..=CURVE_STEPS {
            let t = from + (to - from) * f64::from(step) / f64::from(CURVE_STEPS);
            let error = swing.error_deg(t);
            // Beyond the scale there is no line, rather than one along its edge.
            if beyond(error) {
                pen_up = true;
                continue;
            }
            let _ = write!(path, "{}{},{} ", if pen_up { "M" } else { "L" }, x.text(t), y.text(error));
            pen_up = false;
        }
        path.truncate(path.trim_end().len());
        path
    };
    let band =
        page.found.settle_point.map(|p| (y.at(p.0 + standard::BAND_DEG), y.at(p.0 - standard::BAND_DEG) - y.at(p.0 + standard::BAND_DEG)));
    html! {
        svg xmlns=[namespace] viewBox={ "0 0 " (WIDTH) " " (HEIGHT) } role="img" aria-labelledby="run-up-title run-up-desc" font-family="sans-serif" font-size="13" fill="currentColor" {
            title id="run-up-title" { "Run-up of a gyrocompass: gyro error by time" }
            desc id="run-up-desc" { (page.verdict()) " " (readings.len()) " readings over " (format!("{last:.0}")) " minutes." }
            @if namespace.is_some() { rect width=(WIDTH) height=(HEIGHT) fill="#fff" {} }
            g class="ink" fill="#000" stroke="none" {
                @if let Some((top, height)) = &band {
                    rect x=(x.text(0.0)) y=(format!("{top:.1}")) width=(format!("{:.1}", x.at(end) - x.at(0.0))) height=(format!("{height:.1}")) class="band" fill="#ddd" {}
                }
                @for t in ticks(middle - reach, middle + reach, 8) {
                    line x1=(x.text(0.0)) x2=(x.text(end)) y1=(y.text(t)) y2=(y.text(t)) class="rule" stroke="#bbb" stroke-width=(if t == 0.0 { "1.5" } else { "0.5" }) {}
                    text x="62" y=(format!("{:.1}", y.at(t) + 4.0)) text-anchor="end" { (degrees(t)) }
                }
                @for t in minutes(end) {
                    line x1=(x.text(t)) x2=(x.text(t)) y1=(format!("{:.1}", HEIGHT - 60.0)) y2=(format!("{:.1}", HEIGHT - 54.0)) class="pen" stroke="#000" {}
                    text x=(x.text(t)) y=(format!("{:.1}", HEIGHT - 38.0)) text-anchor="middle" { (format!("{t:.0}")) }
                }
                text x=(format!("{:.1}", f64::midpoint(x.at(0.0), x.at(end)))) y=(format!("{:.1}", HEIGHT - 14.0)) text-anchor="middle" { "minutes from the first reading" }
                @if let Some((top, _)) = &band {
                    text x=(format!("{:.1}", x.at(end) - 4.0)) y=(format!("{:.1}", top - 5.0)) text-anchor="end" font-size="11" { "within " (standard::BAND_DEG) " of the settle point" }
                }
                text x="14" y="22" { "gyro error, degrees: L low (east), H high (west)" }
                path d=(curve(0.0, last)) class="pen" fill="none" stroke="#000" stroke-width="1.5" {}
                @if end > last {
                    path d=(curve(last, end)) class="pen" fill="none" stroke="#000" stroke-width="1.5" stroke-dasharray="6 4" {}
                }
                @for r in readings {
                    @let (px, py) = (x.text(r.minutes), y.text(inside(r.error_deg)));
                    @if page.found.set_aside.iter().any(|(row, _)| *row == r.row) {
                        g class="odd" stroke="#000" stroke-width="2" fill="none" {
                            path d={ "M" (px) "," (py) " m-5,-5 l10,10 m-10,0 l10,-10" } {}
                        }
                    } @else if beyond(r.error_deg) {
                        path d={ "M" (px) "," (py) (if r.error_deg > middle { " m-5,6 l5,-9 l5,9 z" } else { " m-5,-6 l5,9 l5,-9 z" }) } class="open" fill="#fff" stroke="#000" {}
                    } @else {
                        circle cx=(px) cy=(py) r="3.5" class="open" fill="#fff" stroke="#000" stroke-width="1.5" {}
                    }
                }
            }
        }
    }
}

/// Times to be marked: tens of minutes, half hours or whole ones, at most ten of them.
fn minutes(end: f64) -> Vec<f64> {
    let step = [10.0, 30.0, 60.0, 120.0].into_iter().find(|step| end / step <= 10.0).unwrap_or((end / 600.0).ceil() * 60.0);
    (0..=(end / step) as u32).map(|i| f64::from(i) * step).collect()
}

fn degrees(t: f64) -> String {
    let size = format!("{:.0}", t.abs());
    match t {
        t if t > 0.0 => format!("{size} L"),
        t if t < 0.0 => format!("{size} H"),
        _ => "0".to_owned(),
    }
}
