//! Pictures as SVG: the same bytes for the same figures, legible in black and white, named for those who cannot see them.

mod run_up;

pub use run_up::run_up;

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
