//! Deviation against the heading by compass: what was observed, the curve, the card, and what is off them.

use super::frame::{Frame, Tick, across, one, upwards};
use super::marks::{Mark, band, line, strokes};
use super::{named_ticks, reach};
use crate::angle::text::write::{direction, east_west};
use maud::{Markup, html};
use std::fmt::Write as _;

const HEIGHT: f64 = 330.0;
/// Places of a curve further apart than this are not joined, degrees.
const MOST_GAP_DEG: f64 = 10.0;

/// A deviation on a heading, degrees, with its standard uncertainty where it has one.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Observed {
    /// Heading by compass.
    pub heading_deg: f64,
    /// Deviation, east +.
    pub deviation_deg: f64,
    /// Its standard uncertainty; nil where none is known.
    pub u_deg: f64,
}

/// What is drawn of one compass.
#[derive(Debug, Clone, Default, PartialEq)]
pub struct Deviations {
    /// Whose compass.
    pub of: String,
    /// These are the readings of a swing, and what is off was set aside.
    pub swing: bool,
    /// Observed by a bearing, or read of a swing.
    pub by_bearing: Vec<Observed>,
    /// Observed by comparison of headings.
    pub by_comparison: Vec<Observed>,
    /// Off the curve or the card.
    pub off: Vec<Observed>,
    /// The fitted curve, round from 000 to 360.
    pub curve: Vec<Observed>,
    /// The card's figures, in the order of headings.
    pub card: Vec<(f64, f64)>,
    /// The card between its figures, round from 000 to 360.
    pub card_line: Vec<(f64, f64)>,
    /// Sectors without an observation, from and to.
    pub unproven: Vec<(f64, f64)>,
}

/// The marks of the headings.
pub fn heading_ticks() -> Vec<Tick> {
    (0..=8)
        .map(|i| Tick { at: f64::from(i) * 45.0, words: if i == 8 { "360".to_owned() } else { direction(f64::from(i) * 45.0, 0) } })
        .collect()
}

/// A sector from and to, cut at north into what lies on the axis.
fn pieces((from, to): (f64, f64)) -> Vec<(f64, f64)> {
    if from < to { vec![(from, to)] } else { vec![(from, 360.0), (0.0, to)] }
}

/// The picture; `id` is one of a kind on the page.
pub fn deviations(id: &str, of: &Deviations) -> Markup {
    let x = across(0.0, 360.0);
    let observed = || of.by_bearing.iter().chain(&of.by_comparison);
    let lines = of.curve.iter().map(|p| (p.deviation_deg, p.u_deg)).chain(of.card.iter().map(|c| (c.1, 0.0)));
    let (low, high) = reach(observed().map(|p| (p.deviation_deg, p.u_deg)).chain(lines), 2.0, 60.0);
    let y = upwards(low, high, HEIGHT);
    let up = |deg: f64| y.at(deg.clamp(low, high));
    let marked = |mark: Mark, points: &[Observed]| {
        let mut path = String::new();
        for p in points {
            mark.push(&mut path, x.at(p.heading_deg), up(p.deviation_deg));
        }
        path
    };
    let (mut crosses, mut beyond) = (String::new(), String::new());
    for p in &of.off {
        let (px, py) = (x.at(p.heading_deg), up(p.deviation_deg));
        match p.deviation_deg {
            d if d > high => Mark::Above.push(&mut beyond, px, py),
            d if d < low => Mark::Below.push(&mut beyond, px, py),
            _ => Mark::Cross.push(&mut crosses, px, py),
        }
    }
    let (mut curve, mut bands) = (String::new(), String::new());
    // In pieces, where the curve is not known on every heading.
    for piece in of.curve.chunk_by(|a, b| b.heading_deg - a.heading_deg < MOST_GAP_DEG) {
        let two_u = |p: &Observed| (x.at(p.heading_deg), up(p.deviation_deg + 2.0 * p.u_deg), up(p.deviation_deg - 2.0 * p.u_deg));
        bands.push_str(&band(&piece.iter().map(two_u).collect::<Vec<_>>()));
        curve.push_str(&line(piece.iter().map(|p| (x.at(p.heading_deg), up(p.deviation_deg)))));
    }
    let mut cards = String::new();
    for (heading, deviation) in &of.card {
        Mark::Diamond.push(&mut cards, x.at(*heading), up(*deviation));
    }
    let bottom = HEIGHT - 46.0;
    let mut hatch = String::new();
    for (from, to) in of.unproven.iter().copied().flat_map(pieces) {
        let mut at = x.at(from);
        while at < x.at(to) {
            let _ = write!(hatch, "M{},{}l5-7", one(at), one(bottom));
            at += 5.0;
        }
    }
    let inside = html! {
        path class="faint" d=(hatch) stroke="#777" stroke-width="1" fill="none" {}
        path class="faint" d=(strokes(observed().map(|p| (x.at(p.heading_deg), up(p.deviation_deg - p.u_deg), up(p.deviation_deg + p.u_deg)))))
            stroke="#999" stroke-width="0.8" fill="none" {}
        path class="pen" d=(curve) stroke="#000" stroke-width="1.8" fill="none" {}
        path class="pen" d=(line(of.card_line.iter().map(|p| (x.at(p.0), up(p.1))))) stroke="#000" stroke-width="1.4" stroke-dasharray="7 4" fill="none" {}
        path class="open" d=(cards) fill="#fff" stroke="#000" stroke-width="1.2" {}
        path class="open" d=(marked(Mark::Square, &of.by_comparison)) fill="#fff" stroke="#000" stroke-width="1" {}
        path class="dot" d=(marked(Mark::Point, &of.by_bearing)) fill="#000" {}
        path class="odd" d=(crosses) stroke="#000" stroke-width="2" fill="none" {}
        path class="odd-open" d=(beyond) stroke="#000" stroke-width="1.4" fill="#fff" {}
    };
    let frame = Frame {
        id,
        title: &format!("Deviation against compass heading, {}", of.of),
        desc: &desc(of),
        height: HEIGHT,
        x,
        y,
        x_ticks: &heading_ticks(),
        y_ticks: &named_ticks(low, high, "E", "W"),
        x_words: "heading by compass",
        y_words: "deviation, degrees: E east, W west",
    };
    frame.draw(&html! { path class="band" d=(bands) fill="#ddd" {} }, &inside)
}

fn desc(of: &Deviations) -> String {
    let (bearings, headings, off) = (of.by_bearing.len(), of.by_comparison.len(), of.off.len());
    let mut said = if of.swing {
        format!("{bearings} readings used, {off} set aside.")
    } else {
        let from = if of.card.is_empty() { "curve" } else { "card" };
        format!("{bearings} deviations by bearing, {headings} by comparison of headings, {off} off the {from}.")
    };
    let extremes = of.curve.iter().fold(None, |found: Option<(Observed, Observed)>, p| {
        Some(found.map_or((*p, *p), |(low, high)| {
            (if p.deviation_deg < low.deviation_deg { *p } else { low }, if p.deviation_deg > high.deviation_deg { *p } else { high })
        }))
    });
    match extremes {
        Some((low, high)) => {
            let at = |p: Observed| format!("{} on {}", east_west(p.deviation_deg), direction(p.heading_deg, 0));
            let _ = write!(said, " The fitted curve runs from {} to {}.", at(low), at(high));
        }
        None => said.push_str(" No curve is fitted."),
    }
    said
}

/// What the marks and lines of a picture stand for, as far as they are in it.
pub fn key(of: &Deviations) -> String {
    let parts = [
        (!of.by_bearing.is_empty(), if of.swing { "points: readings used" } else { "points: by bearing" }),
        (!of.by_comparison.is_empty(), "squares: by comparison of headings"),
        (observed_with_u(of), "upright strokes: one u either way"),
        (!of.off.is_empty(), if of.swing { "crosses: readings set aside" } else { "crosses: off the card or curve" }),
        (!of.off.is_empty(), "arrowheads: such beyond the picture"),
        (!of.curve.is_empty(), "line: fitted curve"),
        (of.curve.iter().any(|p| p.u_deg > 0.0), "grey band: two u of the curve"),
        (!of.card.is_empty(), "broken line and diamonds: card"),
        (!of.unproven.is_empty(), "hatching below: headings never observed"),
    ];
    let list: Vec<&str> = parts.into_iter().filter(|p| p.0).map(|p| p.1).collect();
    let said = list.join("; ");
    let mut letters = said.chars();
    letters.next().map_or_else(String::new, |first| first.to_uppercase().chain(letters).collect::<String>() + ".")
}

fn observed_with_u(of: &Deviations) -> bool {
    of.by_bearing.iter().chain(&of.by_comparison).any(|p| p.u_deg > 0.0)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_sector_across_north_is_hatched_on_both_sides() {
        assert_eq!(pieces((345.0, 15.0)), [(345.0, 360.0), (0.0, 15.0)]);
        assert_eq!(pieces((0.0, 360.0)), [(0.0, 360.0)]);
        let svg = deviations("d", &Deviations { unproven: vec![(345.0, 15.0)], ..Deviations::default() }).into_string();
        assert!(svg.contains("M58.0,284.0l5-7") && svg.contains("No curve is fitted") && !svg.contains("NaN"));
    }
}
