//! Slow series made fast: short polynomials fitted once for each stretch of time, on a grid that does not depend on who asks.

use std::sync::OnceLock;

/// Days from J2000.0 at which the grid begins: 1899-12-30, before the first instant that is answered on any scale.
const GRID_START: f64 = -36_526.0;
/// Days that the grid covers, past the end of 2100.
const GRID_DAYS: f64 = 73_424.0;

/// The coefficients of one stretch, once they are fitted.
type Stretch<const N: usize, const K: usize> = OnceLock<Box<[[f64; K]; N]>>;

/// A quantity of `N` numbers as Chebyshev polynomials of `K` coefficients over stretches of equal length.
pub(super) struct Segments<const N: usize, const K: usize> {
    stretch_days: f64,
    exact: fn(f64) -> [f64; N],
    fitted: OnceLock<Box<[Stretch<N, K>]>>,
}

impl<const N: usize, const K: usize> Segments<N, K> {
    /// Stretches of `stretch_days`, fitted to `exact`, a function of days of TT from J2000.0.
    pub const fn new(stretch_days: f64, exact: fn(f64) -> [f64; N]) -> Self {
        Self { stretch_days, exact, fitted: OnceLock::new() }
    }

    /// The quantity at `days` of TT from J2000.0: the same whatever was asked before, on whichever thread.
    pub fn at(&self, days: f64) -> [f64; N] {
        let stretches = (GRID_DAYS / self.stretch_days).ceil() as usize;
        let table = self.fitted.get_or_init(|| (0..stretches).map(|_| OnceLock::new()).collect());
        let place = (days - GRID_START) / self.stretch_days;
        let index = place.floor();
        let Some(stretch) = table.get(index as usize).filter(|_| index >= 0.0) else { return (self.exact)(days) };
        let coefficients = stretch.get_or_init(|| Box::new(self.fit(GRID_START + index * self.stretch_days)));
        let x = 2.0 * (place - index) - 1.0;
        coefficients.map(|c| clenshaw(&c, x))
    }

    /// Interpolation at the Chebyshev nodes of the stretch that begins at `start` days.
    fn fit(&self, start: f64) -> [[f64; K]; N] {
        let angle = |node: usize| std::f64::consts::PI * (node as f64 + 0.5) / K as f64;
        let values: [[f64; N]; K] = std::array::from_fn(|node| (self.exact)(start + (angle(node).cos() + 1.0) / 2.0 * self.stretch_days));
        std::array::from_fn(|n| {
            std::array::from_fn(|k| {
                let sum: f64 = values.iter().enumerate().map(|(node, v)| v[n] * (k as f64 * angle(node)).cos()).sum();
                sum * if k == 0 { 1.0 } else { 2.0 } / K as f64
            })
        })
    }
}

/// The sum of Chebyshev polynomials at `x` in -1..=1.
fn clenshaw(coefficients: &[f64], x: f64) -> f64 {
    let (mut last, mut before) = (0.0, 0.0);
    for c in coefficients.iter().skip(1).rev() {
        (last, before) = (2.0 * x * last - before + c, last);
    }
    coefficients.first().unwrap_or(&0.0) + x * last - before
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_polynomial_comes_back_exactly() {
        static CUBIC: Segments<1, 8> = Segments::new(8.0, |t| [1.0 + t * (0.5 + t * (-0.25 + t * 1e-3))]);
        for days in [-36_525.5, -8.0, -0.1, 0.0, 3.3, 36_890.0] {
            let exact = (CUBIC.exact)(days)[0];
            assert!((CUBIC.at(days)[0] - exact).abs() <= 1e-10 * exact.abs().max(1.0), "{days}");
        }
    }
}
