//! The damped swing that goes best through a run-up.

use super::RunUpReading;
use nalgebra::{DMatrix, DVector, Matrix5, SMatrix, Vector5};

/// Fewest readings that a swing is fitted to: five unknowns and two to spare.
pub const FEWEST: usize = 7;
/// Periods that are looked for, minutes; common practice is 80 to 90, in high latitudes longer.
const PERIODS_MIN: (f64, f64) = (45.0, 160.0);
/// Ratios of successive half swings that are looked for.
const RATIOS: (f64, f64) = (0.02, 0.97);
/// Least scatter that readings are credited with, degrees: no repeater is read finer (our own).
const LEAST_SCATTER_DEG: f64 = 0.05;
/// A reading further off than this many scatters has no weight (Tukey's biweight, 95 % efficient for a normal scatter).
const BIWEIGHT: f64 = 4.685;
/// And only where it is off by more than this is it a blunder, degrees (our own).
const BLUNDER_DEG: f64 = 0.8;

/// A damped swing: `S + exp(-k t) (a cos wt + b sin wt)`, t in minutes from the first reading.
#[derive(Debug, Clone, PartialEq)]
pub struct Swing {
    /// Settle point, S, degrees, east +.
    pub settle_point_deg: f64,
    /// Its standard uncertainty, degrees.
    pub settle_point_u_deg: f64,
    /// Period, minutes.
    pub period_min: f64,
    /// Its standard uncertainty, minutes.
    pub period_u_min: f64,
    /// Ratio of successive half swings.
    pub half_swing_ratio: f64,
    /// Its standard uncertainty.
    pub half_swing_ratio_u: f64,
    /// Standard deviation of the readings about the swing, degrees.
    pub scatter_deg: f64,
    /// Rows that were set aside, with how far they are off the swing, degrees.
    pub set_aside: Vec<(usize, f64)>,
    unknowns: Unknowns,
    covariance: Matrix5<f64>,
}

/// S, a, b, k (a minute), w (radians a minute).
type Unknowns = Vector5<f64>;

fn value(u: &Unknowns, t: f64) -> f64 {
    u[0] + off_settle_point(u, t)
}

fn off_settle_point(u: &Unknowns, t: f64) -> f64 {
    let (sin, cos) = (u[4] * t).sin_cos();
    (-u[3] * t).exp() * (u[1] * cos + u[2] * sin)
}

/// Derivatives of [`value`] by each unknown.
fn gradient(u: &Unknowns, t: f64) -> Vector5<f64> {
    let (sin, cos) = (u[4] * t).sin_cos();
    let decay = (-u[3] * t).exp();
    let swing = u[1] * cos + u[2] * sin;
    Vector5::new(1.0, decay * cos, decay * sin, -t * decay * swing, t * decay * (u[2] * cos - u[1] * sin))
}

impl Swing {
    /// The swing's distance from its settle point at `minutes`, degrees.
    pub fn off_deg(&self, minutes: f64) -> f64 {
        off_settle_point(&self.unknowns, minutes)
    }

    /// The gyro error by the swing at `minutes`, degrees.
    pub fn error_deg(&self, minutes: f64) -> f64 {
        value(&self.unknowns, minutes)
    }

    /// Standard uncertainty of [`off_deg`](Self::off_deg), degrees.
    pub fn off_u_deg(&self, minutes: f64) -> f64 {
        let mut g = gradient(&self.unknowns, minutes);
        g[0] = 0.0;
        (g.transpose() * self.covariance * g)[0].max(0.0).sqrt()
    }

    /// Largest distance from the settle point at or after `minutes`, degrees: the swing's envelope.
    pub fn envelope_deg(&self, minutes: f64) -> f64 {
        (-self.unknowns[3] * minutes).exp() * self.unknowns[1].hypot(self.unknowns[2])
    }
}

/// Fits a swing; `None` for fewer readings than [`FEWEST`], or where no swing of a gyro's kind goes through them.
///
/// Starts from a grid of periods and ratios, each with its best settle point and amplitude by least squares, scored by the sum of
/// absolute residuals, which one blunder cannot lead astray; then all five unknowns together with weights that leave a blunder none.
/// u from the scatter of the readings left, at least 0.05 degrees.
pub fn fit(readings: &[RunUpReading]) -> Option<Swing> {
    if readings.len() < FEWEST {
        return None;
    }
    let mut starts: Vec<(f64, Unknowns)> = grid().filter_map(|(k, w)| start(readings, k, w)).collect();
    starts.sort_by(|a, b| a.0.total_cmp(&b.0));
    let refined = starts.into_iter().take(4).filter_map(|(_, u)| refine(readings, u));
    let (scatter, unknowns, weights) = refined.min_by(|a, b| a.0.total_cmp(&b.0))?;
    finish(readings, scatter, unknowns, &weights)
}

fn grid() -> impl Iterator<Item = (f64, f64)> {
    (0..24).flat_map(|p| {
        let period = PERIODS_MIN.0 + (PERIODS_MIN.1 - PERIODS_MIN.0) * f64::from(p) / 23.0;
        (0..12).map(move |r| {
            let ratio = 0.05 + 0.9 * f64::from(r) / 11.0;
            (-2.0 * f64::ln(ratio) / period, std::f64::consts::TAU / period)
        })
    })
}

/// The best S, a and b for a k and w: twice, the second time with large residuals counted less; and the sum of absolute residuals.
fn start(readings: &[RunUpReading], k: f64, w: f64) -> Option<(f64, Unknowns)> {
    let row = |t: f64| {
        let (sin, cos) = (w * t).sin_cos();
        let decay = (-k * t).exp();
        [1.0, decay * cos, decay * sin]
    };
    let mut weights = vec![1.0; readings.len()];
    let mut unknowns = Unknowns::zeros();
    for _ in 0..4 {
        let design = DMatrix::from_fn(readings.len(), 3, |i, j| row(readings[i].minutes)[j] * weights[i]);
        let wanted = DVector::from_fn(readings.len(), |i, _| readings[i].error_deg * weights[i]);
        let solution = design.svd(true, true).solve(&wanted, 1e-10).ok()?;
        unknowns = Unknowns::new(solution[0], solution[1], solution[2], k, w);
        for (weight, r) in weights.iter_mut().zip(readings) {
            // Towards least absolute residuals: the square root of 1 / |residual|.
            *weight = (r.error_deg - value(&unknowns, r.minutes)).abs().max(0.1).sqrt().recip();
        }
    }
    let sum = readings.iter().map(|r| (r.error_deg - value(&unknowns, r.minutes)).abs()).sum::<f64>();
    sum.is_finite().then_some((sum, unknowns))
}

/// Scatter of residuals, robust: the median of their sizes, scaled to a normal scatter.
fn scatter_of(residuals: &[f64]) -> f64 {
    let mut sizes: Vec<f64> = residuals.iter().map(|r| r.abs()).collect();
    sizes.sort_by(f64::total_cmp);
    let middle = sizes.get(sizes.len() / 2).copied().unwrap_or(0.0);
    // Five unknowns have been fitted.
    let n = residuals.len() as f64;
    (1.482_6 * middle * (n / (n - 5.0).max(1.0)).sqrt()).max(LEAST_SCATTER_DEG)
}

/// All five unknowns by damped steps of least squares with biweights; the robust scatter, the unknowns, the weights.
fn refine(readings: &[RunUpReading], mut unknowns: Unknowns) -> Option<(f64, Unknowns, Vec<f64>)> {
    let residuals = |u: &Unknowns| -> Vec<f64> { readings.iter().map(|r| r.error_deg - value(u, r.minutes)).collect() };
    let weights_of = |residuals: &[f64], scatter: f64| -> Vec<f64> {
        residuals.iter().map(|r| (1.0 - (r / (BIWEIGHT * scatter)).powi(2)).max(0.0).powi(2)).collect()
    };
    for _ in 0..12 {
        let scatter = scatter_of(&residuals(&unknowns));
        let weights = weights_of(&residuals(&unknowns), scatter);
        let cost = |u: &Unknowns| -> f64 { residuals(u).iter().zip(&weights).map(|(r, w)| w * r * r).sum() };
        let mut damping = 1e-3;
        for _ in 0..25 {
            let (normal, toward) = normal_equations(readings, &unknowns, &weights);
            let mut damped = normal;
            for i in 0..5 {
                damped[(i, i)] *= 1.0 + damping;
            }
            let Some(step) = damped.lu().solve(&toward) else { break };
            let next = unknowns + step;
            if within_reach(&next) && cost(&next) <= cost(&unknowns) {
                let done = step.norm() < 1e-9;
                unknowns = next;
                damping = (damping / 5.0_f64).max(1e-12);
                if done {
                    break;
                }
            } else {
                damping *= 8.0;
                if damping > 1e9 {
                    break;
                }
            }
        }
    }
    let all = residuals(&unknowns);
    let scatter = scatter_of(&all);
    unknowns.iter().all(|x| x.is_finite()).then(|| (scatter, unknowns, weights_of(&all, scatter)))
}

fn normal_equations(readings: &[RunUpReading], u: &Unknowns, weights: &[f64]) -> (Matrix5<f64>, Vector5<f64>) {
    let (mut normal, mut toward) = (Matrix5::zeros(), Vector5::zeros());
    for (r, w) in readings.iter().zip(weights) {
        let g: SMatrix<f64, 5, 1> = gradient(u, r.minutes);
        normal += g * g.transpose() * *w;
        toward += g * ((r.error_deg - value(u, r.minutes)) * *w);
    }
    (normal, toward)
}

/// Whether period and ratio are a gyro's.
fn within_reach(u: &Unknowns) -> bool {
    let period = std::f64::consts::TAU / u[4];
    let ratio = (-u[3] * period / 2.0).exp();
    (PERIODS_MIN.0..=PERIODS_MIN.1).contains(&period) && (RATIOS.0..=RATIOS.1).contains(&ratio)
}

fn finish(readings: &[RunUpReading], scatter: f64, u: Unknowns, weights: &[f64]) -> Option<Swing> {
    let used: Vec<(f64, f64)> = readings.iter().zip(weights).filter(|(_, w)| **w > 0.0).map(|(r, _)| (r.minutes, r.error_deg)).collect();
    if used.len() < FEWEST {
        return None;
    }
    let squares: f64 = used.iter().map(|(t, e)| (e - value(&u, *t)).powi(2)).sum();
    let scatter_deg = (squares / (used.len() as f64 - 5.0)).sqrt().max(LEAST_SCATTER_DEG);
    let ones: Vec<f64> = weights.iter().map(|w| f64::from(*w > 0.0)).collect();
    let (normal, _) = normal_equations(readings, &u, &ones);
    let covariance = normal.try_inverse()? * scatter_deg.powi(2);
    let variance = |g: Vector5<f64>| (g.transpose() * covariance * g)[0].max(0.0).sqrt();
    let period_min = std::f64::consts::TAU / u[4];
    let ratio = (-u[3] * period_min / 2.0).exp();
    let half = std::f64::consts::PI;
    let set_aside = readings
        .iter()
        .zip(weights)
        .map(|(r, w)| (r.row, r.error_deg - value(&u, r.minutes), *w))
        .filter(|(_, off, w)| *w <= 0.0 && off.abs() > BLUNDER_DEG.max(BIWEIGHT * scatter * 0.999))
        .map(|(row, off, _)| (row, off))
        .collect();
    Some(Swing {
        settle_point_deg: u[0],
        settle_point_u_deg: variance(Vector5::new(1.0, 0.0, 0.0, 0.0, 0.0)),
        period_min,
        period_u_min: variance(Vector5::new(0.0, 0.0, 0.0, 0.0, std::f64::consts::TAU / u[4].powi(2))),
        half_swing_ratio: ratio,
        // ratio = exp(-pi k / w).
        half_swing_ratio_u: variance(Vector5::new(0.0, 0.0, 0.0, -ratio * half / u[4], ratio * half * u[3] / u[4].powi(2))),
        scatter_deg,
        set_aside,
        unknowns: u,
        covariance,
    })
}
