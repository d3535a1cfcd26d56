//! What each reading of a swing is off its curve by.

use super::deviation::{Observed, heading_ticks};
use super::frame::{Frame, across, upwards};
use super::marks::{Mark, strokes};
use super::{named_ticks, reach};
use maud::{Markup, html};

const HEIGHT: f64 = 210.0;

/// The picture: `kept` and `set_aside` hold residuals, east +, in place of deviations. `id` is one of a kind on the page.
pub fn residuals(id: &str, of: &str, kept: &[Observed], set_aside: &[Observed]) -> Markup {
    let x = across(0.0, 360.0);
    let (low, high) = reach(kept.iter().map(|p| (p.deviation_deg, 0.2)).chain([(0.0, 0.0)]), 1.0, 60.0);
    let y = upwards(low, high, HEIGHT);
    let up = |deg: f64| y.at(deg.clamp(low, high));
    let (mut points, mut crosses, mut beyond) = (String::new(), String::new(), String::new());
    for p in kept {
        Mark::Point.push(&mut points, x.at(p.heading_deg), up(p.deviation_deg));
    }
    for p in set_aside {
        let (px, py) = (x.at(p.heading_deg), up(p.deviation_deg));
        match p.deviation_deg {
            d if d > high => Mark::Above.push(&mut beyond, px, py),
            d if d < low => Mark::Below.push(&mut beyond, px, py),
            _ => Mark::Cross.push(&mut crosses, px, py),
        }
    }
    let inside = html! {
        path class="pen" d=(strokes(kept.iter().map(|p| (x.at(p.heading_deg), up(0.0), up(p.deviation_deg))))) stroke="#000" stroke-width="1.2" fill="none" {}
        path class="dot" d=(points) fill="#000" {}
        path class="odd" d=(crosses) stroke="#000" stroke-width="2" fill="none" {}
        path class="odd-open" d=(beyond) stroke="#000" stroke-width="1.4" fill="#fff" {}
    };
    let largest = kept.iter().map(|p| p.deviation_deg.abs()).fold(0.0, f64::max);
    let frame = Frame {
        id,
        title: &format!("Residuals, observed less curve, {of}"),
        desc: &format!("{} readings, the largest {largest:.1} degrees off the curve; {} set aside.", kept.len(), set_aside.len()),
        height: HEIGHT,
        x,
        y,
        x_ticks: &heading_ticks(),
        y_ticks: &named_ticks(low, high, "E", "W"),
        x_words: "heading by compass",
        y_words: "observed less curve, degrees",
    };
    frame.draw(&html! {}, &inside)
}
