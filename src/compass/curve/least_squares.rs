//! Least squares by singular values, which tell what the data cannot determine. Never by normal equations: they lose half the digits,
//! and all of them on a narrow arc of headings.

use nalgebra::{DMatrix, DVector};

/// Singular values below this share of the largest are taken for nil.
const RANK_TOLERANCE: f64 = 1e-9;
/// A direction that touches an undetermined one by more than this is undetermined itself.
const TOUCH: f64 = 1e-6;

/// The solution of `design` x = `observed`.
#[derive(Debug, Clone)]
pub(crate) struct Solution {
    /// Smallest where it is not determined.
    pub values: Vec<f64>,
    /// observed - computed, row by row.
    pub residuals: Vec<f64>,
    /// An orthonormal base of what the design can describe, one row a row of it; columns beyond its rank are nil.
    base: DMatrix<f64>,
    /// Rows: orthogonal combinations of the unknowns; with the singular value of each.
    combinations: DMatrix<f64>,
    singular: Vec<f64>,
    largest: f64,
}

/// Solves; `rows` all have the same length. `None` without rows, or where a value is not finite.
pub(crate) fn solve(rows: &[Vec<f64>], observed: &[f64]) -> Option<Solution> {
    let columns = rows.first()?.len();
    if columns == 0 || rows.iter().flatten().chain(observed).any(|x| !x.is_finite()) {
        return None;
    }
    // Fewer rows than unknowns: rows of nil leave the problem as it is and give every unknown its singular value.
    let height = rows.len().max(columns);
    let at = |i: usize, j: usize| rows.get(i).and_then(|row| row.get(j)).copied().unwrap_or(0.0);
    let design = DMatrix::from_fn(height, columns, at);
    let y = DVector::from_fn(height, |i, _| observed.get(i).copied().unwrap_or(0.0));
    let svd = design.clone().svd(true, true);
    let (mut base, combinations) = (svd.u?, svd.v_t?);
    let largest = svd.singular_values.max();
    for (mut column, singular) in base.column_iter_mut().zip(svd.singular_values.iter()) {
        if *singular <= RANK_TOLERANCE * largest {
            column.fill(0.0);
        }
    }
    let along = base.transpose() * &y;
    let scaled = DVector::from_iterator(
        columns,
        along.iter().zip(svd.singular_values.iter()).map(|(a, s)| if *s > RANK_TOLERANCE * largest { a / s } else { 0.0 }),
    );
    let values = combinations.transpose() * scaled;
    let residuals = &y - design * &values;
    Some(Solution {
        values: values.iter().copied().collect(),
        residuals: residuals.iter().take(rows.len()).copied().collect(),
        base,
        combinations,
        singular: svd.singular_values.iter().copied().collect(),
        largest,
    })
}

impl Solution {
    fn determined(&self, singular: f64) -> bool {
        singular > RANK_TOLERANCE * self.largest
    }

    /// How many unknowns the design determines.
    pub(crate) fn rank(&self) -> usize {
        self.singular.iter().filter(|s| self.determined(**s)).count()
    }

    /// Sum of the squares of the residuals.
    pub(crate) fn sum_of_squares(&self) -> f64 {
        self.residuals.iter().map(|r| r * r).sum()
    }

    /// Covariance of two sums of the unknowns, for observations of variance 1. Infinite where they share what is not determined.
    pub(crate) fn covariance(&self, one: &[f64], other: &[f64]) -> f64 {
        let mut sum = 0.0;
        for (combination, singular) in self.combinations.row_iter().zip(&self.singular) {
            let along = |weights: &[f64]| combination.iter().zip(weights).map(|(c, w)| c * w).sum::<f64>();
            let (a, b) = (along(one), along(other));
            if self.determined(*singular) {
                sum += a * b / (singular * singular);
            } else if a.abs() > TOUCH && b.abs() > TOUCH {
                return f64::INFINITY;
            }
        }
        sum
    }

    /// Variance of a sum of the unknowns, for observations of variance 1.
    pub(crate) fn variance(&self, weights: &[f64]) -> f64 {
        self.covariance(weights, weights)
    }

    /// Element of the matrix that turns observations into residuals: what a blunder in row `j` does to the residual of row `i`.
    pub(crate) fn residual_from(&self, i: usize, j: usize) -> f64 {
        let rows = self.residuals.len();
        let hat = if i < rows && j < rows { self.base.row(i).dot(&self.base.row(j)) } else { 0.0 };
        f64::from(u8::from(i == j)) - hat
    }

    /// What the solution gives for a row of the design.
    pub(crate) fn value(&self, row: &[f64]) -> f64 {
        row.iter().zip(&self.values).map(|(x, v)| x * v).sum()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_line_and_its_covariance() {
        // y = 1 + 2x at x = 0, 1, 2, 3: variance of the intercept 0.7, of the slope 0.2, covariance -0.3 (by hand).
        let rows: Vec<Vec<f64>> = (0..4).map(|x| vec![1.0, f64::from(x)]).collect();
        let s = solve(&rows, &[1.0, 3.0, 5.0, 7.0]).unwrap();
        assert!((s.values[0] - 1.0).abs() < 1e-12 && (s.values[1] - 2.0).abs() < 1e-12);
        assert!((s.variance(&[1.0, 0.0]) - 0.7).abs() < 1e-12);
        assert!((s.variance(&[0.0, 1.0]) - 0.2).abs() < 1e-12);
        assert!((s.covariance(&[1.0, 0.0], &[0.0, 1.0]) + 0.3).abs() < 1e-12);
        assert!((s.residual_from(0, 0) - 0.3).abs() < 1e-12);
    }

    #[test]
    fn what_is_not_determined_has_no_end_of_variance() {
        let rows = vec![vec![1.0, 1.0, 0.0]; 4];
        let s = solve(&rows, &[2.0; 4]).unwrap();
        assert_eq!(s.rank(), 1);
        assert_eq!(s.variance(&[1.0, 0.0, 0.0]), f64::INFINITY);
        assert!((s.variance(&[1.0, 1.0, 0.0]) - 0.25).abs() < 1e-12);
        assert_eq!(s.variance(&[0.0, 0.0, 1.0]), f64::INFINITY);
        // One row, three unknowns.
        assert_eq!(solve(&rows[..1], &[2.0]).unwrap().rank(), 1);
        assert!(solve(&[], &[]).is_none());
        assert!(solve(&rows, &[f64::NAN; 4]).is_none());
    }
}
