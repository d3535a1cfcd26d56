//! Marks told apart by their shape: each is a path of its own, so that a thousand of them are one element.

use super::frame::one;
use std::fmt::Write as _;

/// The shape of a mark.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Mark {
    /// A full point.
    Point,
    /// An open square.
    Square,
    /// An open triangle.
    Triangle,
    /// An open diamond.
    Diamond,
    /// A cross: what is out of the ordinary.
    Cross,
    /// An open triangle that points up: beyond the picture, above.
    Above,
    /// The same, below.
    Below,
}

impl Mark {
    /// The shapes that several of a kind are told apart by, in order.
    pub const KINDS: [Self; 4] = [Self::Point, Self::Square, Self::Triangle, Self::Diamond];

    /// The mark around a place, appended to a path.
    pub fn push(self, path: &mut String, x: f64, y: f64) {
        let shape = match self {
            Self::Point => "m-2.2,0a2.2,2.2 0 1 1 4.4,0a2.2,2.2 0 1 1-4.4,0z",
            Self::Square => "m-2.6-2.6h5.2v5.2h-5.2z",
            Self::Triangle => "m0-3.4l3.2,5.6h-6.4z",
            Self::Diamond => "m0-3.6l3.2,3.6l-3.2,3.6l-3.2-3.6z",
            Self::Cross => "m-4-4l8,8m-8,0l8-8",
            Self::Above => "m-5,5l5-9l5,9z",
            Self::Below => "m-5-5l5,9l5-9z",
        };
        // Writing to a string does not fail.
        let _ = write!(path, "M{},{}{shape}", one(x), one(y));
    }

    /// Whether it is filled with ink.
    pub fn is_full(self) -> bool {
        self == Self::Point
    }

    /// Its name in a key.
    pub fn words(self) -> &'static str {
        match self {
            Self::Point => "points",
            Self::Square => "squares",
            Self::Triangle => "triangles",
            Self::Diamond => "diamonds",
            Self::Cross => "crosses",
            Self::Above | Self::Below => "open arrowheads on the edge",
        }
    }
}

/// A line through places.
pub fn line(places: impl Iterator<Item = (f64, f64)>) -> String {
    let mut path = String::new();
    for (x, y) in places {
        let _ = write!(path, "{}{},{}", if path.is_empty() { 'M' } else { 'L' }, one(x), one(y));
    }
    path
}

/// A band between two lines over the same places across: `(x, upper, lower)`.
pub fn band(places: &[(f64, f64, f64)]) -> String {
    let back = places.iter().rev().map(|p| (p.0, p.2));
    let mut path = line(places.iter().map(|p| (p.0, p.1)).chain(back));
    if !path.is_empty() {
        path.push('z');
    }
    path
}

/// Upright strokes: `(x, from, to)`.
pub fn strokes(places: impl Iterator<Item = (f64, f64, f64)>) -> String {
    let mut path = String::new();
    for (x, from, to) in places {
        let _ = write!(path, "M{},{}V{}", one(x), one(from), one(to));
    }
    path
}
