//! Where a smooth daily curve crosses zero: grazes included, and never without end.

use std::ops::ControlFlow;

/// The curve is looked at this often, milliseconds: its highs and lows are 12 hours apart, so no half hour holds two.
const STEP_MS: i64 = 30 * 60_000;
/// The curve rises and falls by at most this much from one look to the next: 15 degrees an hour, and the moon's own motion.
const MOST_PER_STEP_DEG: f64 = 8.0;
/// Near enough to zero, degrees: 0.03 ms of the sun's climb.
const ZERO_DEG: f64 = 1e-7;

/// One crossing of zero.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Crossing {
    /// Milliseconds of the Unix count.
    pub at_ms: i64,
    /// From below to above as time goes on.
    pub upward: bool,
}

/// A look at the curve: when, and how high.
type Look = (i64, f64);

/// Calls `each` with the crossings met between `from` and `from + span`, milliseconds, in that order: a negative span is walked
/// back in time. The curve answers `None` where it ends.
pub fn walk(curve: &impl Fn(i64) -> Option<f64>, from: i64, span: i64, mut each: impl FnMut(Crossing) -> ControlFlow<()>) {
    let (way, steps) = (span.signum(), span.abs() / STEP_MS + 2);
    let look = |i: i64| {
        let at = from.checked_add(i.checked_mul(way * STEP_MS)?)?;
        Some((at, curve(at)?))
    };
    let mut report = |(a, b): (Look, Look)| {
        let at_ms = root(curve, a, b);
        let within = (0..=span.abs()).contains(&((at_ms - from) * way));
        if within { each(Crossing { at_ms, upward: (b.1 >= 0.0) == (way > 0) }) } else { ControlFlow::Continue(()) }
    };
    // One look before the span and one after it, so that a graze at either end has a look on both its sides.
    let (mut before, mut last): (Option<Look>, Option<Look>) = (None, look(-1));
    for i in 0..=steps {
        let Some(now) = look(i) else { return };
        let mut met = [None, None];
        if let Some(last) = last {
            if differs(last, now) {
                met[0] = Some((last, now));
            } else if let Some(graze) = before.and_then(|before| graze(curve, before, last, now)) {
                met = [before.map(|before| (before, graze)), Some((graze, now))];
            }
        }
        for pair in met.into_iter().flatten() {
            if report(pair).is_break() {
                return;
            }
        }
        (before, last) = (last, Some(now));
    }
}

fn differs(a: Look, b: Look) -> bool {
    (a.1 >= 0.0) != (b.1 >= 0.0)
}

/// The high or low between three looks on the same side of zero, where it reaches across.
fn graze(curve: &impl Fn(i64) -> Option<f64>, a: Look, b: Look, c: Look) -> Option<Look> {
    let nearest = b.1.abs() <= a.1.abs() && b.1.abs() <= c.1.abs();
    if !nearest || b.1.abs() > MOST_PER_STEP_DEG || differs(a, b) {
        return None;
    }
    let height = |t: f64| curve(t.round() as i64).map(|y| if b.1 >= 0.0 { -y } else { y });
    // Golden section: 30 cuts bring an hour to two milliseconds, where the height no longer changes.
    const GOLDEN: f64 = 0.618_033_988_749_895;
    let (mut low, mut high) = (a.0.min(c.0) as f64, a.0.max(c.0) as f64);
    let (mut x1, mut x2) = (high - GOLDEN * (high - low), low + GOLDEN * (high - low));
    let (mut y1, mut y2) = (height(x1)?, height(x2)?);
    for _ in 0..30 {
        if y1.max(y2) >= ZERO_DEG {
            break;
        }
        if y1 > y2 {
            (high, x2, y2) = (x2, x1, y1);
            x1 = high - GOLDEN * (high - low);
            y1 = height(x1)?;
        } else {
            (low, x1, y1) = (x1, x2, y2);
            x2 = low + GOLDEN * (high - low);
            y2 = height(x2)?;
        }
    }
    let at = if y1 > y2 { x1 } else { x2 }.round() as i64;
    let top = (at, curve(at)?);
    differs(top, b).then_some(top)
}

/// The zero between two looks on either side of it: false position, with a halving every third time so that it always ends.
fn root(curve: &impl Fn(i64) -> Option<f64>, mut a: Look, mut b: Look) -> i64 {
    for round in 0..100 {
        if (b.0 - a.0).abs() <= 1 {
            break;
        }
        let part = if round % 3 == 2 { 0.5 } else { a.1 / (a.1 - b.1) };
        let inside = ((b.0 - a.0) as f64 * part).round() as i64;
        let (least, most) = if b.0 > a.0 { (1, b.0 - a.0 - 1) } else { (b.0 - a.0 + 1, -1) };
        let at = a.0 + inside.clamp(least, most);
        let Some(y) = curve(at) else { break };
        if y.abs() < ZERO_DEG {
            return at;
        }
        if differs(a, (at, y)) { b = (at, y) } else { a = (at, y) }
    }
    if a.1.abs() < b.1.abs() { a.0 } else { b.0 }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn all(curve: impl Fn(i64) -> Option<f64>, from: i64, span: i64) -> Vec<Crossing> {
        let mut found = Vec::new();
        walk(&curve, from, span, |c| {
            found.push(c);
            ControlFlow::Continue(())
        });
        found
    }

    const DAY: f64 = 86_400_000.0;

    fn daily(centre: f64, swing: f64) -> impl Fn(i64) -> Option<f64> {
        move |ms| Some(centre + swing * (ms as f64 / DAY * std::f64::consts::TAU).sin())
    }

    #[test]
    fn a_graze_of_seconds_is_found_from_both_sides() {
        for (depth, wanted) in [(1e-3, 2), (1e-6, 2), (-1e-6, 0), (-1e-3, 0)] {
            for offset in 0..48 {
                let from = offset * 1_000_003;
                let forward = all(daily(-30.0 + depth, 30.0), from, 86_400_000);
                assert_eq!(forward.len(), wanted, "{depth} {offset}");
                let mut back = all(daily(-30.0 + depth, 30.0), from + 86_400_000, -86_400_000);
                back.reverse();
                assert_eq!(back.len(), wanted);
                for (f, b) in forward.iter().zip(&back) {
                    assert!(f.upward == b.upward && (f.at_ms - b.at_ms).abs() < 10_000);
                }
            }
        }
    }

    #[test]
    fn a_curve_without_crossings_ends() {
        assert!(all(|_| Some(1.0), 0, 86_400_000).is_empty());
        assert!(all(|_| None, 0, 86_400_000).is_empty());
        assert!(all(|_| Some(f64::NAN), 0, 86_400_000).is_empty());
        assert!(all(daily(0.0, 1.0), 1, 0).is_empty());
    }
}
