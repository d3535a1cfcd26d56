//! Whether a gyro has settled: since when, when it will have, or that it cannot be told.

use super::fit::{Swing, fit};
use super::{RunUpReading, standard};
use crate::angle::Latitude;

/// The verdict.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Settled {
    /// It stays within the band since so many minutes from the first reading, and readings over an hour show it.
    Since {
        /// Minutes from the first reading.
        minutes: f64,
    },
    /// Not yet, or not yet shown.
    NotYet,
    /// It cannot be told.
    CannotTell(Why),
}

/// Why it cannot be told.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Why {
    /// Fewer readings, or over less time, than a swing can be known from.
    TooShort {
        /// Readings there are.
        readings: usize,
        /// Minutes they cover.
        minutes: f64,
    },
    /// Every reading is the same.
    NeverMoves,
    /// It moves evenly one way.
    MovesEvenly {
        /// Degrees an hour, eastward +.
        deg_per_h: f64,
    },
    /// No damped swing of a gyro's kind goes through the readings.
    NoSwing {
        /// Scatter of the readings about the best one, degrees, where there is one.
        scatter_deg: Option<f64>,
    },
}

/// Everything that is said of a run-up.
#[derive(Debug, Clone, PartialEq)]
pub struct Assessment {
    /// The verdict.
    pub settled: Settled,
    /// When it stays within the band by the swing, minutes from the first reading: earliest and latest; the same instant twice where
    /// no extreme of the swing lies within 2 u of the band's edge.
    pub within_band_min: Option<(f64, f64)>,
    /// The swing, where one was fitted.
    pub swing: Option<Swing>,
    /// Settle point and its standard uncertainty, degrees, where the readings determine it.
    pub settle_point: Option<(f64, f64)>,
    /// Standard deviation of single readings about their mean once settled, degrees.
    pub scatter_deg: Option<f64>,
    /// The settle point's error allowed at the latitude, degrees, and whether it is inside, surely outside, or between.
    pub settle_point_limit: Option<(f64, Option<bool>)>,
    /// The scatter allowed at the latitude, degrees, and whether it is inside.
    pub scatter_limit: Option<(f64, bool)>,
    /// Whether it took longer than the standard's six hours.
    pub too_slow: bool,
}

/// Longest time that is looked ahead, minutes.
const AHEAD_MIN: f64 = 24.0 * 60.0;
/// A swing with a larger scatter is none, degrees: five times what a repeater is read to (our own).
const NO_SWING_DEG: f64 = 1.0;
/// Two instants nearer than this are one, minutes.
const SAME_INSTANT_MIN: f64 = 10.0;

/// Judges a run-up; the readings are in order of time, minutes from the first.
pub fn assess(readings: &[RunUpReading], latitude: Option<Latitude>) -> Assessment {
    let span_min = readings.last().map_or(0.0, |r| r.minutes);
    let mut assessment = Assessment {
        settled: Settled::CannotTell(Why::TooShort { readings: readings.len(), minutes: span_min }),
        within_band_min: None,
        swing: None,
        settle_point: None,
        scatter_deg: None,
        settle_point_limit: None,
        scatter_limit: None,
        too_slow: false,
    };
    if never_moves(readings) {
        assessment.settled = Settled::CannotTell(Why::NeverMoves);
    } else if steady(readings, span_min) {
        let (mean, sd) = mean_and_sd(readings.iter().map(|r| r.error_deg));
        assessment.settled = Settled::Since { minutes: 0.0 };
        assessment.within_band_min = Some((0.0, 0.0));
        assessment.settle_point = Some((mean, sd / (readings.len() as f64).sqrt()));
        assessment.scatter_deg = Some(sd);
    } else if let Some(swing) = fit(readings) {
        by_swing(&mut assessment, readings, swing, span_min);
    } else if readings.len() >= super::fit::FEWEST {
        assessment.settled = Settled::CannotTell(Why::NoSwing { scatter_deg: None });
    }
    against_limits(&mut assessment, latitude);
    assessment
}

fn mean_and_sd(values: impl Iterator<Item = f64> + Clone) -> (f64, f64) {
    let n = values.clone().count() as f64;
    let mean = values.clone().sum::<f64>() / n.max(1.0);
    let squares: f64 = values.map(|v| (v - mean).powi(2)).sum();
    (mean, (squares / (n - 1.0).max(1.0)).sqrt())
}

/// A repeater that follows shows at least its last figure change in an hour.
fn never_moves(readings: &[RunUpReading]) -> bool {
    readings.len() >= super::fit::FEWEST && readings.windows(2).all(|pair| pair[0].error_deg == pair[1].error_deg)
}

/// Within the band of their mean from the first to the last, over the time that the standard asks, and going nowhere.
fn steady(readings: &[RunUpReading], span_min: f64) -> bool {
    if readings.len() < super::fit::FEWEST || span_min < standard::PROOF_MIN {
        return false;
    }
    let (mean, sd) = mean_and_sd(readings.iter().map(|r| r.error_deg));
    let (slope, _) = line(readings);
    readings.iter().all(|r| (r.error_deg - mean).abs() <= standard::BAND_DEG)
        && (slope * span_min).abs() < (2.0 * sd).min(standard::BAND_DEG)
}

/// Slope, degrees a minute, and scatter about it, of the straight line through the readings.
fn line(readings: &[RunUpReading]) -> (f64, f64) {
    let n = readings.len() as f64;
    let (t0, e0) = (readings.iter().map(|r| r.minutes).sum::<f64>() / n, readings.iter().map(|r| r.error_deg).sum::<f64>() / n);
    let squares: f64 = readings.iter().map(|r| (r.minutes - t0).powi(2)).sum();
    let slope = if squares > 0.0 { readings.iter().map(|r| (r.minutes - t0) * (r.error_deg - e0)).sum::<f64>() / squares } else { 0.0 };
    let left: f64 = readings.iter().map(|r| (r.error_deg - e0 - slope * (r.minutes - t0)).powi(2)).sum();
    (slope, (left / (n - 2.0).max(1.0)).sqrt())
}

fn by_swing(assessment: &mut Assessment, readings: &[RunUpReading], swing: Swing, span_min: f64) {
    let (slope, line_scatter) = line(readings);
    if line_scatter <= 1.5 * swing.scatter_deg.max(0.2) {
        assessment.settled = Settled::CannotTell(Why::MovesEvenly { deg_per_h: slope * 60.0 });
        return;
    }
    if swing.scatter_deg > NO_SWING_DEG {
        assessment.settled = Settled::CannotTell(Why::NoSwing { scatter_deg: Some(swing.scatter_deg) });
        return;
    }
    assessment.settle_point = Some((swing.settle_point_deg, swing.settle_point_u_deg));
    // Less than a period does not tell a slow swing from a fast one; a settle point unsure by half the band settles nothing.
    if span_min < swing.period_min || 2.0 * swing.settle_point_u_deg > standard::BAND_DEG {
        assessment.settled = Settled::CannotTell(Why::TooShort { readings: readings.len(), minutes: span_min });
        assessment.swing = Some(swing);
        return;
    }
    let (early, latest) = within_band(&swing);
    assessment.within_band_min = Some((early, latest));
    assessment.settled = if proven(readings, &swing, latest, span_min) { Settled::Since { minutes: latest } } else { Settled::NotYet };
    if let Settled::Since { minutes } = assessment.settled {
        let aside = |row: usize| swing.set_aside.iter().any(|(r, _)| *r == row);
        let after = readings.iter().filter(|r| r.minutes >= minutes && !aside(r.row)).map(|r| r.error_deg);
        assessment.scatter_deg = Some(mean_and_sd(after).1);
    }
    assessment.too_slow = early > standard::WITHIN_H * 60.0;
    assessment.swing = Some(swing);
}

/// The instant from which the swing stays within the band; two where an extreme within 2 u of its edge leaves it open.
fn within_band(swing: &Swing) -> (f64, f64) {
    let last_outside = |outside: &dyn Fn(f64) -> bool| -> f64 {
        // Half minutes from the end backwards, then halving.
        let mut step = (AHEAD_MIN * 2.0) as u32;
        while step > 0 && !outside(f64::from(step) / 2.0) {
            step -= 1;
        }
        let (mut out, mut inside) = (f64::from(step) / 2.0, f64::from(step + 1) / 2.0);
        if step == 0 && !outside(0.0) {
            return 0.0;
        }
        for _ in 0..20 {
            let middle = f64::midpoint(out, inside);
            if outside(middle) { out = middle } else { inside = middle }
        }
        inside
    };
    let (off, u) = (|t: f64| swing.off_deg(t).abs(), |t: f64| swing.off_u_deg(t));
    let plain = last_outside(&|t| off(t) > standard::BAND_DEG);
    let early = last_outside(&|t| off(t) - 2.0 * u(t) > standard::BAND_DEG);
    let late = last_outside(&|t| off(t) + 2.0 * u(t) > standard::BAND_DEG);
    if late - early <= SAME_INSTANT_MIN {
        return (plain, plain);
    }
    // Only what an extreme decides is open: the crossing on either side of it, each as the swing itself has it.
    let as_swing = |t: f64| if (t - plain).abs() <= SAME_INSTANT_MIN { plain } else { t };
    (as_swing(early), as_swing(late))
}

/// Readings over the time that the standard asks, all within the band of the settle point, and enough of them.
fn proven(readings: &[RunUpReading], swing: &Swing, since_min: f64, span_min: f64) -> bool {
    let aside = |row: usize| swing.set_aside.iter().any(|(r, _)| *r == row);
    let last_hour: Vec<&RunUpReading> =
        readings.iter().filter(|r| r.minutes >= (span_min - standard::PROOF_MIN).max(since_min) && !aside(r.row)).collect();
    let covers = last_hour.first().zip(last_hour.last()).map_or(0.0, |(a, b)| b.minutes - a.minutes);
    span_min - since_min >= standard::PROOF_MIN
        && last_hour.len() >= 3
        && covers >= standard::PROOF_MIN * 0.75
        && last_hour.iter().all(|r| (r.error_deg - swing.settle_point_deg).abs() <= standard::BAND_DEG)
}

fn against_limits(assessment: &mut Assessment, latitude: Option<Latitude>) {
    let Some(latitude) = latitude else { return };
    let secant = latitude.deg().abs().min(89.0).to_radians().cos().recip();
    if let Some((point, u)) = assessment.settle_point {
        let limit = standard::SETTLE_POINT_DEG * secant;
        let inside = if point.abs() <= limit {
            Some(true)
        } else if point.abs() - 2.0 * u > limit {
            Some(false)
        } else {
            None
        };
        assessment.settle_point_limit = Some((limit, inside));
    }
    if let Some(scatter) = assessment.scatter_deg {
        let limit = standard::SCATTER_DEG * secant;
        assessment.scatter_limit = Some((limit, scatter <= limit));
    }
}
