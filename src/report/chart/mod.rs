//! Pictures as SVG: the same bytes for the same figures, legible in black and white, named for those who cannot see them.

mod dates;
pub(crate) mod deviation;
mod frame;
pub(crate) mod gyro;
mod marks;
pub(crate) mod residuals;
mod run_up;
pub(crate) mod watches;

use frame::Tick;
pub use run_up::run_up;
pub(crate) use run_up::run_up_inline;

/// A straight scale from figures to a picture's units.
#[derive(Debug, Clone, Copy)]
struct Scale {
    from: (f64, f64),
    to: (f64, f64),
}

impl Scale {
    fn at(self, x: f64) -> f64 {
        let (a, b) = self.from;
        let part = if b > a { (x - a) / (b - a) } else { 0.5 };
        self.to.0 + part * (self.to.1 - self.to.0)
    }

    /// A coordinate as it is written: one decimal, never -0.0.
    fn text(self, x: f64) -> String {
        format!("{:.1}", (self.at(x) * 10.0).round() / 10.0 + 0.0)
    }
}

/// Round steps, at most `most`, that cover a range: 1, 2 or 5 times a power of ten.
fn ticks(from: f64, to: f64, most: usize) -> Vec<f64> {
    let rough = (to - from).max(1e-9) / most.max(1) as f64;
    let power = 10_f64.powf(rough.log10().floor());
    let step = [1.0, 2.0, 5.0, 10.0].into_iter().map(|m| m * power).find(|s| *s >= rough).unwrap_or(10.0 * power);
    let first = (from / step).ceil() as i64;
    let last = (to / step).floor() as i64;
    (first..=last).map(|i| i as f64 * step + 0.0).collect()
}

/// Low and high end of a scale of errors, from each error and its u: room for all, `least` either side of the middle at the least, and `most`
/// at the most.
fn reach(errors: impl Iterator<Item = (f64, f64)>, least: f64, most: f64) -> (f64, f64) {
    let mut all: Vec<(f64, f64)> = errors.collect();
    all.sort_by(|a, b| a.0.total_cmp(&b.0));
    let middle = all.get(all.len() / 2).map_or(0.0, |e| e.0);
    let low = all.iter().map(|(e, u)| e - u).fold(middle - least, f64::min).max(middle - most);
    let high = all.iter().map(|(e, u)| e + u).fold(middle + least, f64::max).min(middle + most);
    let room = (high - low) * 0.05;
    (low - room, high + room)
}

/// Marks of a scale of errors with their names: `1 E`, `0`, `0.5 W`.
fn named_ticks(low: f64, high: f64, plus: &str, minus: &str) -> Vec<Tick> {
    let marks = ticks(low, high, 7);
    let whole = marks.iter().all(|t| t.fract().abs() < 1e-6);
    let words = |t: f64| {
        let size = if whole { format!("{:.0}", t.abs()) } else { format!("{:.1}", t.abs()) };
        match t {
            t if t > 1e-9 => format!("{size} {plus}"),
            t if t < -1e-9 => format!("{size} {minus}"),
            _ => "0".to_owned(),
        }
    };
    marks.into_iter().map(|t| Tick { at: if t.abs() < 1e-9 { 0.0 } else { t }, words: words(t) }).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_scale_has_room_for_all_but_what_is_far_off() {
        let (low, high) = reach([(0.1, 0.3), (0.3, 0.3), (-0.2, 0.3)].into_iter(), 1.5, 12.0);
        assert!(low < -1.4 && high > 1.6 && high < 2.0);
        let (low, high) = reach([(0.0, 0.3), (0.0, 0.3), (100.0, 0.3)].into_iter(), 1.5, 12.0);
        assert!(low < -1.5 && (12.0..14.0).contains(&high));
        let words: Vec<String> = named_ticks(-1.2, 2.1, "E", "W").into_iter().map(|t| t.words).collect();
        assert_eq!(words, ["1.0 W", "0.5 W", "0", "0.5 E", "1.0 E", "1.5 E", "2.0 E"]);
        assert_eq!(reach(std::iter::empty(), 1.0, 5.0), (-1.1, 1.1));
    }
}
