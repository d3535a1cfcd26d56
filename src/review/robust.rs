//! Fits that one bad row, or one in ten, does not move.

use nalgebra::{DMatrix, DVector};

/// The middle value; `None` of nothing. The order of `values` is lost.
pub fn median(values: &mut [f64]) -> Option<f64> {
    let middle = values.len() / 2;
    if values.is_empty() {
        return None;
    }
    let odd = values.len() % 2 == 1;
    let (below, upper, _) = values.select_nth_unstable_by(middle, f64::total_cmp);
    let upper = *upper;
    if odd {
        return Some(upper);
    }
    let lower = below.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    Some((lower + upper) / 2.0)
}

/// Makes the median absolute deviation of a normal sample its standard deviation (1 / 0.6745).
const MAD_TO_SD: f64 = 1.4826;

/// Standard deviation about 0 from the median of the sizes: half of the values may be anything.
pub fn scale_about_zero(residuals: impl Iterator<Item = f64>) -> Option<f64> {
    let mut sizes: Vec<f64> = residuals.map(f64::abs).collect();
    median(&mut sizes).map(|m| m * MAD_TO_SD)
}

/// Standard deviation from differences of neighbours in time: blind to steps, slopes and slow drift.
pub fn scale_of_neighbours(values: &[f64]) -> Option<f64> {
    scale_about_zero(values.windows(2).filter_map(|w| Some(w.get(1)? - w.first()?))).map(|s| s / std::f64::consts::SQRT_2)
}

/// A linear fit.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Fit {
    /// One coefficient a column.
    pub coefficients: Vec<f64>,
    /// Their covariance, row by row.
    pub covariance: Vec<f64>,
    /// Standard deviation of what is left, outliers aside.
    pub scale: f64,
}

impl Fit {
    /// The fitted value for the columns `x`.
    pub fn value(&self, x: &[f64]) -> f64 {
        self.coefficients.iter().zip(x).map(|(c, x)| c * x).sum()
    }

    /// Standard uncertainty of the fitted value for the columns `x`.
    pub fn value_u(&self, x: &[f64]) -> f64 {
        self.quadratic(x.iter().copied(), || x.iter().copied()).max(0.0).sqrt()
    }

    /// x' C x with the covariance C.
    pub fn quadratic<I: Iterator<Item = f64>>(&self, x: impl Iterator<Item = f64>, again: impl Fn() -> I) -> f64 {
        let n = self.coefficients.len().max(1);
        self.covariance.chunks(n).zip(x).map(|(row, xi)| xi * row.iter().zip(again()).map(|(c, xj)| c * xj).sum::<f64>()).sum()
    }

    /// Standard uncertainty of one coefficient.
    pub fn u(&self, column: usize) -> f64 {
        self.covariance.get(column * (self.coefficients.len() + 1)).copied().unwrap_or(0.0).max(0.0).sqrt()
    }
}

/// Beyond this many standard deviations a value is set aside (Beaton and Tukey's biweight, 95 % efficient: 4.685).
const BIWEIGHT: f64 = 4.685;
/// Huber's bound, 95 % efficient.
const HUBER: f64 = 1.345;

/// Least squares with a prior of standard deviation `prior_sd` about 0 on each column, first with Huber's weights, then with
/// Tukey's biweight. `columns` holds the rows one after another; what is left is never taken as smaller than `least_scale`.
///
/// Source: Huber, Robust Statistics (1981), ch. 7; Beaton and Tukey, Technometrics 16 (1974) 147.
pub fn fit(columns: &[f64], y: &[f64], prior_sd: &[f64], least_scale: f64) -> Option<Fit> {
    let p = prior_sd.len();
    if y.is_empty() || p == 0 || columns.len() != y.len() * p {
        return None;
    }
    // The first guess is the median, in the first column, which is the constant one.
    let mut result = Fit { coefficients: vec![0.0; p], ..Fit::default() };
    if let (Some(first), Some(middle)) = (result.coefficients.first_mut(), median(&mut y.to_vec())) {
        *first = middle;
    }
    let mut residuals = vec![0.0; y.len()];
    let mut sums = Sums::new(p);
    // Huber's rounds only lead to the place that the biweight starts from.
    let (mut by_huber, mut rounds) = (true, 0);
    while rounds < 24 {
        rounds += 1;
        for ((x, y), residual) in columns.chunks_exact(p).zip(y).zip(&mut residuals) {
            *residual = y - result.value(x);
        }
        result.scale = scale_about_zero(residuals.iter().copied())?.max(least_scale);
        sums.clear();
        for ((x, y), residual) in columns.chunks_exact(p).zip(y).zip(&residuals) {
            let z = (residual / result.scale).abs();
            let weight = if by_huber {
                (HUBER / z).min(1.0)
            } else if z < BIWEIGHT {
                (1.0 - (z / BIWEIGHT).powi(2)).powi(2)
            } else {
                continue;
            };
            sums.add(x, *y, weight);
        }
        let (normal, right) = sums.with_prior(prior_sd, result.scale);
        let inverse = normal.cholesky()?.inverse();
        let next = &inverse * right;
        let change = next.iter().zip(&result.coefficients).map(|(a, b)| (a - b).abs()).fold(0.0, f64::max);
        result.coefficients = next.iter().copied().collect();
        result.covariance = inverse.iter().copied().collect();
        if by_huber {
            by_huber = change >= 1e-2 && rounds < 12;
        } else if change < 1e-4 {
            break;
        }
    }
    Some(result)
}

/// The sums of a weighted fit; of the symmetric ones only the half below the diagonal.
struct Sums {
    p: usize,
    normal: Vec<f64>,
    right: Vec<f64>,
}

impl Sums {
    fn new(p: usize) -> Self {
        Self { p, normal: vec![0.0; p * p], right: vec![0.0; p] }
    }

    fn clear(&mut self) {
        self.normal.fill(0.0);
        self.right.fill(0.0);
    }

    fn add(&mut self, x: &[f64], y: f64, weight: f64) {
        let rows = self.normal.chunks_exact_mut(self.p).zip(&mut self.right).zip(x).enumerate();
        for (i, ((row, right), xi)) in rows {
            let wx = weight * xi;
            *right += wx * y;
            for (sum, xj) in row.iter_mut().zip(x).take(i + 1) {
                *sum += wx * xj;
            }
        }
    }

    /// The normal equations, every row counted by `scale`, and a prior about 0 with those standard deviations.
    fn with_prior(&self, prior_sd: &[f64], scale: f64) -> (DMatrix<f64>, DVector<f64>) {
        let unit = scale.powi(-2);
        let sum = |i: usize, j: usize| self.normal.get(i.max(j) * self.p + i.min(j)).copied().unwrap_or(0.0) * unit;
        let prior = |i: usize| prior_sd.get(i).map_or(0.0, |sd| sd.powi(-2));
        let normal = DMatrix::from_fn(self.p, self.p, |i, j| sum(i, j) + if i == j { prior(i) } else { 0.0 });
        (normal, DVector::from_iterator(self.p, self.right.iter().map(|r| r * unit)))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn median_of_even_odd_and_none() {
        assert_eq!(median(&mut []), None);
        assert_eq!(median(&mut [3.0, 1.0, 2.0]), Some(2.0));
        assert_eq!(median(&mut [4.0, 1.0, 2.0, 3.0]), Some(2.5));
    }

    #[test]
    fn one_bad_row_in_ten_moves_nothing() {
        let x: Vec<f64> = (0..100).map(|i| f64::from(i) / 10.0).collect();
        let clean: Vec<f64> = x.iter().enumerate().map(|(i, x)| 1.0 + 0.3 * x + if i % 2 == 0 { 0.1 } else { -0.1 }).collect();
        let bad: Vec<f64> = clean.iter().enumerate().map(|(i, y)| if i % 10 == 3 { y + 40.0 } else { *y }).collect();
        let columns: Vec<f64> = x.iter().flat_map(|x| [1.0, *x]).collect();
        let (a, b) = (fit(&columns, &clean, &[10.0, 10.0], 0.05).unwrap(), fit(&columns, &bad, &[10.0, 10.0], 0.05).unwrap());
        for (a, b) in a.coefficients.iter().zip(&b.coefficients) {
            assert!((a - b).abs() < 0.02, "{a} {b}");
        }
        assert!((b.value(&[1.0, 5.0]) - 2.5).abs() < 0.05);
    }
}
