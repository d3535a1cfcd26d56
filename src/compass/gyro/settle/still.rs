//! A gyro that does not swing: at rest, or not running.

use super::fit::{BLUNDER, LEAST_SCATTER_DEG};
use super::{RunUpReading, standard};

/// Fewest readings that rest is judged by: each ten minutes over the hour that the standard asks (our own).
const FEWEST: usize = 7;

/// What does not swing.
pub(super) enum Still {
    /// Every reading is the same.
    NeverMoves,
    /// It scatters about one figure.
    Steady {
        /// That figure, degrees, east +.
        mean_deg: f64,
        /// Its standard uncertainty, degrees.
        u_deg: f64,
        /// Standard deviation of single readings, degrees.
        sd_deg: f64,
        /// Rows that were set aside, with how far they are off, degrees.
        set_aside: Vec<(usize, f64)>,
    },
}

/// Whether the readings, over an hour at least, stand still.
///
/// They do where all but a blunder are within the band of their mean and go nowhere: an hour within half the band, where no swing larger than
/// the band goes by in an hour (periods to two hours), or twice that time within the band without one reading following another as on a swing.
pub(super) fn still(readings: &[RunUpReading]) -> Option<Still> {
    if readings.len() < FEWEST {
        return None;
    }
    // A repeater that follows shows at least its last figure change in an hour.
    if readings.windows(2).all(|pair| matches!(pair, [a, b] if a.error_deg == b.error_deg)) {
        return Some(Still::NeverMoves);
    }
    let middle = median(readings.iter().map(|r| r.error_deg).collect());
    let scatter = 1.482_6 * median(readings.iter().map(|r| (r.error_deg - middle).abs()).collect());
    let far = BLUNDER.0.max(BLUNDER.1 * scatter.max(LEAST_SCATTER_DEG));
    let (kept, aside): (Vec<RunUpReading>, Vec<RunUpReading>) = readings.iter().partition(|r| (r.error_deg - middle).abs() <= far);
    // One blunder, in long rows one in ten.
    if aside.len() > (readings.len() / 10).max(1) || kept.len() < FEWEST {
        return None;
    }
    let errors: Vec<f64> = kept.iter().map(|r| r.error_deg).collect();
    let (mean_deg, sd_deg) = mean_and_sd(&errors);
    let reach = reach(&errors, mean_deg);
    let span_min = readings.last().map_or(0.0, |r| r.minutes);
    let drift = line(&kept).0 * span_min;
    let at_rest = drift.abs() < (2.0 * sd_deg).min(standard::BAND_DEG)
        && (reach <= standard::BAND_DEG / 2.0
            || (reach <= standard::BAND_DEG && span_min >= 2.0 * standard::PROOF_MIN && jumps(&errors, sd_deg)));
    at_rest.then(|| Still::Steady {
        mean_deg,
        u_deg: sd_deg.max(LEAST_SCATTER_DEG) / (errors.len() as f64).sqrt(),
        sd_deg,
        set_aside: aside.iter().map(|r| (r.row, r.error_deg - mean_deg)).collect(),
    })
}

/// How far off the mean the readings are, but for the few of very many that stray by reading alone.
fn reach(errors: &[f64], mean: f64) -> f64 {
    let mut off: Vec<f64> = errors.iter().map(|e| (e - mean).abs()).collect();
    off.sort_by(f64::total_cmp);
    let stray = (standard::STRAY * off.len() as f64) as usize;
    off.get(off.len().saturating_sub(1 + stray)).copied().unwrap_or(0.0)
}

/// Whether neighbours differ as they do where each reading scatters by itself: their mean square is twice the variance, with a relative
/// standard deviation of 1 / sqrt(n) (von Neumann's ratio); two of these short of it they follow one another.
fn jumps(errors: &[f64], sd: f64) -> bool {
    let n = errors.len() as f64;
    let squares: f64 = errors.iter().zip(errors.iter().skip(1)).map(|(a, b)| (b - a).powi(2)).sum();
    squares / (n - 1.0) > 2.0 * sd.powi(2) * (1.0 - 2.0 / n.sqrt())
}

fn median(mut values: Vec<f64>) -> f64 {
    values.sort_by(f64::total_cmp);
    let at = |i: usize| values.get(i).copied().unwrap_or(0.0);
    f64::midpoint(at(values.len().saturating_sub(1) / 2), at(values.len() / 2))
}

/// Mean and standard deviation; the latter 0 for a single value.
pub(super) fn mean_and_sd(values: &[f64]) -> (f64, f64) {
    let n = values.len() as f64;
    let mean = values.iter().sum::<f64>() / n.max(1.0);
    let squares: f64 = values.iter().map(|v| (v - mean).powi(2)).sum();
    (mean, (squares / (n - 1.0).max(1.0)).sqrt())
}

/// Slope, degrees a minute, and scatter about it, of the straight line through the readings.
pub(super) fn line(readings: &[RunUpReading]) -> (f64, f64) {
    let n = readings.len() as f64;
    let (t0, e0) = (readings.iter().map(|r| r.minutes).sum::<f64>() / n, readings.iter().map(|r| r.error_deg).sum::<f64>() / n);
    let squares: f64 = readings.iter().map(|r| (r.minutes - t0).powi(2)).sum();
    let slope = if squares > 0.0 { readings.iter().map(|r| (r.minutes - t0) * (r.error_deg - e0)).sum::<f64>() / squares } else { 0.0 };
    let left: f64 = readings.iter().map(|r| (r.error_deg - e0 - slope * (r.minutes - t0)).powi(2)).sum();
    (slope, (left / (n - 2.0).max(1.0)).sqrt())
}
