//! Student's t.

/// From here on the distribution is the normal one to more digits than are needed.
const NEARLY_NORMAL: u32 = 400;

/// The chance of a value at least as far from nil as `t`, both sides, with `freedom` degrees of freedom (1 or more).
///
/// Source: Abramowitz and Stegun, Handbook of Mathematical Functions, 26.7.3 and 26.7.4 (finite sums).
pub(super) fn both_tails(t: f64, freedom: u32) -> f64 {
    let freedom = freedom.clamp(1, NEARLY_NORMAL);
    let theta = (t.abs() / f64::from(freedom).sqrt()).atan();
    let (sin, cos) = theta.sin_cos();
    let mut sum = 0.0;
    if freedom % 2 == 1 {
        let mut term = cos;
        for k in (3..=freedom).step_by(2) {
            sum += term;
            term *= cos * cos * f64::from(k - 1) / f64::from(k);
        }
        (1.0 - 2.0 / std::f64::consts::PI * (theta + sin * sum)).max(0.0)
    } else {
        let mut term = 1.0;
        for k in (2..=freedom).step_by(2) {
            sum += term;
            term *= cos * cos * f64::from(k - 1) / f64::from(k);
        }
        (1.0 - sin * sum).max(0.0)
    }
}

#[cfg(test)]
mod tests {
    use super::both_tails;

    #[test]
    fn known_quantiles() {
        // Two-sided 5 % and 1 % points of the printed t table (from memory, three decimals).
        for (freedom, t05, t01) in [(1, 12.706, 63.657), (2, 4.303, 9.925), (5, 2.571, 4.032), (10, 2.228, 3.169), (30, 2.042, 2.750)] {
            assert!((both_tails(t05, freedom) - 0.05).abs() < 1e-4, "{freedom}");
            assert!((both_tails(t01, freedom) - 0.01).abs() < 1e-4, "{freedom}");
        }
        // The normal distribution: 1.96 leaves 5 %.
        assert!((both_tails(1.96, 100_000) - 0.05).abs() < 1e-3);
        assert_eq!(both_tails(0.0, 7), 1.0);
    }
}
