//! The paper that every picture is drawn on: its name, its axes, its scales.
//!
//! Colours stand as attributes, so that a picture holds by itself in black and white; the classes let a page's own style take
//! over, for a dark screen.

use super::Scale;
use maud::{Markup, html};

/// Width of a picture, in its own units.
pub const WIDTH: f64 = 720.0;
/// Where the figures begin and end, left and right.
pub const LEFT: f64 = 58.0;
/// See [`LEFT`].
pub const RIGHT: f64 = WIDTH - 14.0;
/// Where they begin below the words above them.
pub const TOP: f64 = 34.0;
/// Room below them for the words of the axis.
pub const BELOW: f64 = 46.0;

/// A mark on an axis.
#[derive(Debug, Clone, PartialEq)]
pub struct Tick {
    /// Where.
    pub at: f64,
    /// What it says.
    pub words: String,
}

/// A picture's frame.
#[derive(Debug)]
pub struct Frame<'a> {
    /// Begins the ids of its parts: one of a kind on a page.
    pub id: &'a str,
    /// What it shows, in a few words.
    pub title: &'a str,
    /// What can be seen in it, for those who cannot see it.
    pub desc: &'a str,
    /// Height, in its own units.
    pub height: f64,
    /// Across.
    pub x: Scale,
    /// Upwards.
    pub y: Scale,
    /// Marks across.
    pub x_ticks: &'a [Tick],
    /// Marks upwards; the one at nil is the heaviest.
    pub y_ticks: &'a [Tick],
    /// What stands across.
    pub x_words: &'a str,
    /// What stands upwards.
    pub y_words: &'a str,
}

/// A coordinate: one decimal, never -0.0.
pub fn one(x: f64) -> String {
    format!("{:.1}", (x * 10.0).round() / 10.0 + 0.0)
}

/// The scale across a picture.
pub fn across(from: f64, to: f64) -> Scale {
    Scale { from: (from, to), to: (LEFT, RIGHT) }
}

/// The scale upwards in a picture of that height.
pub fn upwards(from: f64, to: f64, height: f64) -> Scale {
    Scale { from: (from, to), to: (height - BELOW, TOP) }
}

impl Frame<'_> {
    /// The picture with `inside` drawn in it, and areas that the lines of the scale stand on.
    pub fn draw(&self, areas: &Markup, inside: &Markup) -> Markup {
        let (title, desc) = (format!("{}-title", self.id), format!("{}-desc", self.id));
        let bottom = self.height - BELOW;
        html! {
            svg viewBox=(format!("0 0 {WIDTH} {}", self.height)) role="img" aria-labelledby={ (title) " " (desc) } font-family="sans-serif" font-size="12.5" {
                title id=(title) { (self.title) }
                desc id=(desc) { (self.desc) }
                (areas)
                g class="rule" stroke="#bbb" stroke-width="0.6" fill="none" {
                    @for tick in self.y_ticks.iter().filter(|t| t.at != 0.0) {
                        path d={ "M" (one(LEFT)) "," (self.y.text(tick.at)) "H" (one(RIGHT)) } {}
                    }
                }
                g class="pen" stroke="#000" stroke-width="1" fill="none" {
                    @if self.y_ticks.iter().any(|t| t.at == 0.0) {
                        path d={ "M" (one(LEFT)) "," (self.y.text(0.0)) "H" (one(RIGHT)) } {}
                    }
                    @for tick in self.x_ticks {
                        path d={ "M" (self.x.text(tick.at)) "," (one(bottom)) "v5" } {}
                    }
                    path d={ "M" (one(LEFT)) "," (one(bottom)) "H" (one(RIGHT)) } {}
                }
                (inside)
                g class="ink" fill="#000" {
                    text x=(one(LEFT - 44.0)) y="18" { (self.y_words) }
                    @for tick in self.y_ticks {
                        text x=(one(LEFT - 8.0)) y=(one(self.y.at(tick.at) + 4.3)) text-anchor="end" { (tick.words) }
                    }
                    @for tick in self.x_ticks {
                        text x=(self.x.text(tick.at)) y=(one(bottom + 19.0)) text-anchor="middle" { (tick.words) }
                    }
                    text x=(one(f64::midpoint(LEFT, RIGHT))) y=(one(self.height - 8.0)) text-anchor="middle" { (self.x_words) }
                }
            }
        }
    }
}
