//! Whether a gyro has settled: since when, when it will have, or that it cannot be told.

use super::fit::{FEWEST, Swing, fit};
use super::still::{Still, line, mean_and_sd, still};
use super::{RunUpReading, standard};
use crate::angle::Latitude;
use crate::limits::Limits;

/// The verdict.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Settled {
    /// It stays within the band since so many minutes from the first reading, and readings over an hour show it.
    Since {
        /// Minutes from the first reading.
        minutes: f64,
    },
    /// Not yet, or not yet shown.
    NotYet(NotYet),
    /// It cannot be told.
    CannotTell(Why),
}

/// What is wanting.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum NotYet {
    /// The swing is still larger than the band.
    Swinging,
    /// By its swing it is within the band, but readings over an hour do not show it yet.
    NotShown,
    /// It was within the band, but the last readings are off the swing: misread, or it was disturbed.
    LastReadingsOff {
        /// How many, up to the last.
        readings: usize,
    },
    /// The swing does not die away within a day.
    DoesNotDieAway,
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
    /// It neither swings nor rests nor goes anywhere: the readings only scatter.
    OnlyScatters {
        /// Their standard deviation, degrees.
        scatter_deg: f64,
    },
    /// No damped swing of a gyro's kind goes through the readings.
    NoSwing {
        /// Root mean square of all readings off the best one, degrees, where there is one.
        scatter_deg: Option<f64>,
    },
}

/// A figure against a limit.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Held {
    /// The limit at the latitude, degrees.
    pub limit_deg: f64,
    /// Whether the figure is inside; `None` where it is over by less than two u.
    pub inside: Option<bool>,
}

/// A reading to be expected.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ToCome {
    /// Minutes from the first reading.
    pub minutes: f64,
    /// Gyro error, degrees, east +.
    pub error_deg: f64,
    /// Standard uncertainty of such a reading, degrees: of the swing and of reading it.
    pub u_deg: f64,
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
    /// Rows that were set aside, with how far they are off, degrees.
    pub set_aside: Vec<(usize, f64)>,
    /// Readings to be expected, while it has not settled.
    pub to_come: Vec<ToCome>,
    /// Standard deviation of single readings about their mean once settled, degrees, and how many they are.
    pub scatter: Option<(f64, usize)>,
    /// The settle point against what the latitude allows.
    pub settle_point_held: Option<Held>,
    /// The scatter against what the latitude allows.
    pub scatter_held: Option<Held>,
    /// Whether it took longer than the hours allowed.
    pub too_slow: bool,
}

/// Longest time that is looked ahead, minutes.
const AHEAD_MIN: f64 = 24.0 * 60.0;
/// A swing with a larger scatter is none, degrees: five times what a repeater is read to (our own).
const NO_SWING_DEG: f64 = 1.0;
/// Nor is one from which more than this part of the readings must be set aside (our own).
const MOST_ASIDE: f64 = 0.2;
/// Two instants nearer than this are one, minutes.
const SAME_INSTANT_MIN: f64 = 10.0;
/// How many readings to come are told.
const TO_COME: u32 = 6;

/// Judges a run-up; the readings are in order of time, minutes from the first.
///
/// Settled: the swing stays within 0.7 degrees of its settle point from that instant on, also where an extreme is within two u of 0.7, and
/// readings over the hour that the standard asks (three, half an hour apart) are within 0.7 of it, the last one among them.
///
/// Error bound: none of 1200 made run-ups, nor of 1800 beginnings of others, is called settled that is not (`tests/gyro/made.rs`).
///
/// Source: IMO A.424(XI), A.821(19), ISO 8728 for the band, the hour, the settle point and the scatter.
pub fn assess(readings: &[RunUpReading], latitude: Option<Latitude>, limits: &Limits) -> Assessment {
    let span_min = readings.last().map_or(0.0, |r| r.minutes);
    let too_short = Settled::CannotTell(Why::TooShort { readings: readings.len(), minutes: span_min });
    let mut found = Assessment {
        settled: too_short,
        within_band_min: None,
        swing: None,
        settle_point: None,
        set_aside: Vec::new(),
        to_come: Vec::new(),
        scatter: None,
        settle_point_held: None,
        scatter_held: None,
        too_slow: false,
    };
    // In less than an hour an extreme looks like rest and a crossing like a straight line.
    if span_min >= standard::PROOF_MIN {
        match still(readings) {
            Some(Still::NeverMoves) => found.settled = Settled::CannotTell(Why::NeverMoves),
            Some(Still::Steady { mean_deg, u_deg, sd_deg, set_aside }) => {
                found.settled = match trailing(readings, &set_aside) {
                    0 => Settled::Since { minutes: 0.0 },
                    readings => Settled::NotYet(NotYet::LastReadingsOff { readings }),
                };
                found.within_band_min = Some((0.0, 0.0));
                found.settle_point = Some((mean_deg, u_deg));
                found.scatter = Some((sd_deg, readings.len() - set_aside.len()));
                found.set_aside = set_aside;
            }
            None => match fit(readings) {
                Some(swing) => by_swing(&mut found, readings, swing, span_min, limits),
                None if readings.len() >= FEWEST => found.settled = Settled::CannotTell(Why::NoSwing { scatter_deg: None }),
                None => {}
            },
        }
    }
    hold_to_limits(&mut found, latitude, limits);
    found
}

fn by_swing(found: &mut Assessment, readings: &[RunUpReading], swing: Swing, span_min: f64, limits: &Limits) {
    let kept: Vec<RunUpReading> = readings.iter().filter(|r| !is_aside(&swing.set_aside, r)).copied().collect();
    let (slope, line_scatter) = line(&kept);
    if line_scatter <= 1.5 * swing.scatter_deg.max(0.2) {
        let goes = (slope * span_min).abs() > 2.0 * line_scatter;
        found.settled = Settled::CannotTell(if goes {
            Why::MovesEvenly { deg_per_h: slope * 60.0 }
        } else {
            Why::OnlyScatters { scatter_deg: line_scatter }
        });
        return;
    }
    if swing.scatter_deg > NO_SWING_DEG || swing.set_aside.len() as f64 > MOST_ASIDE * readings.len() as f64 {
        let squares: f64 = readings.iter().map(|r| (r.error_deg - swing.error_deg(r.minutes)).powi(2)).sum();
        found.settled = Settled::CannotTell(Why::NoSwing { scatter_deg: Some((squares / readings.len() as f64).sqrt()) });
        return;
    }
    found.settle_point = Some((swing.settle_point_deg, swing.settle_point_u_deg));
    found.set_aside.clone_from(&swing.set_aside);
    // Less than a period does not tell a slow swing from a fast one; a settle point unsure by half the band settles nothing.
    if span_min < swing.period_min || 2.0 * swing.settle_point_u_deg > standard::BAND_DEG {
        found.swing = Some(swing);
        return;
    }
    found.within_band_min = within_band(&swing);
    found.settled = match found.within_band_min {
        None => Settled::NotYet(NotYet::DoesNotDieAway),
        Some((_, latest)) => shown(readings, &swing, latest, span_min),
    };
    if let Settled::Since { minutes } = found.settled {
        let after: Vec<f64> = kept.iter().filter(|r| r.minutes >= minutes).map(|r| r.error_deg).collect();
        found.scatter = Some((mean_and_sd(&after).1, after.len()));
    } else if !matches!(found.settled, Settled::NotYet(NotYet::LastReadingsOff { readings: 2.. })) {
        found.to_come = to_come(readings, &swing, span_min);
    }
    found.too_slow = found.within_band_min.is_none_or(|(early, _)| early > limits.thresholds.gyro_settles_within_h * 60.0);
    found.swing = Some(swing);
}

/// The instant from which the swing stays within the band; two where an extreme within 2 u of its edge leaves it open; none within a day.
fn within_band(swing: &Swing) -> Option<(f64, f64)> {
    // Half minutes from the end backwards, then halving.
    let last_outside = |outside: &dyn Fn(f64) -> bool| -> Option<f64> {
        let last = (AHEAD_MIN * 2.0) as u32;
        let Some(step) = (0..=last).rev().find(|step| outside(f64::from(*step) / 2.0)) else { return Some(0.0) };
        if step == last {
            return None;
        }
        let (mut out, mut inside) = (f64::from(step) / 2.0, f64::from(step + 1) / 2.0);
        for _ in 0..20 {
            let middle = f64::midpoint(out, inside);
            if outside(middle) { out = middle } else { inside = middle }
        }
        Some(inside)
    };
    let (off, u) = (|t: f64| swing.off_deg(t).abs(), |t: f64| swing.off_u_deg(t));
    let plain = last_outside(&|t| off(t) > standard::BAND_DEG)?;
    let early = last_outside(&|t| off(t) - 2.0 * u(t) > standard::BAND_DEG)?;
    let late = last_outside(&|t| off(t) + 2.0 * u(t) > standard::BAND_DEG)?;
    if late - early <= SAME_INSTANT_MIN {
        return Some((plain, plain));
    }
    // Only what an extreme decides is open: the crossing on either side of it, each as the swing itself has it.
    let as_swing = |t: f64| if (t - plain).abs() <= SAME_INSTANT_MIN { plain } else { t };
    Some((as_swing(early), as_swing(late)))
}

/// Whether readings over the time that the standard asks, up to the last, are within the band of the settle point, and enough of them.
fn shown(readings: &[RunUpReading], swing: &Swing, since_min: f64, span_min: f64) -> Settled {
    if since_min > span_min {
        return Settled::NotYet(NotYet::Swinging);
    }
    let off = trailing(readings, &swing.set_aside);
    if off > 0 {
        return Settled::NotYet(NotYet::LastReadingsOff { readings: off });
    }
    let last_hour = readings.iter().filter(|r| r.minutes >= (span_min - standard::PROOF_MIN).max(since_min));
    let (aside, kept): (Vec<&RunUpReading>, Vec<&RunUpReading>) = last_hour.partition(|r| is_aside(&swing.set_aside, r));
    let outside = kept.iter().filter(|r| (r.error_deg - swing.settle_point_deg).abs() > standard::BAND_DEG).count();
    let covers = kept.first().map_or(0.0, |first| span_min - first.minutes);
    // One may be misread; of very many, a few scatter beyond the band by reading alone.
    let few = |count: usize| count as f64 <= standard::STRAY * kept.len() as f64;
    let proven = span_min - since_min >= standard::PROOF_MIN
        && kept.len() >= 3
        && covers >= standard::PROOF_MIN * 0.75
        && ((aside.len() <= 1 && outside == 0) || few(aside.len() + outside));
    if proven { Settled::Since { minutes: since_min } } else { Settled::NotYet(NotYet::NotShown) }
}

fn is_aside(set_aside: &[(usize, f64)], reading: &RunUpReading) -> bool {
    set_aside.iter().any(|(row, _)| *row == reading.row)
}

/// How many of the last readings, without a sound one between, were set aside.
fn trailing(readings: &[RunUpReading], set_aside: &[(usize, f64)]) -> usize {
    readings.iter().rev().take_while(|r| is_aside(set_aside, r)).count()
}

/// The next readings, as far apart as they were taken, ten minutes at least.
fn to_come(readings: &[RunUpReading], swing: &Swing, span_min: f64) -> Vec<ToCome> {
    let mut gaps: Vec<f64> = readings.windows(2).filter_map(|pair| Some(pair.get(1)?.minutes - pair.first()?.minutes)).collect();
    gaps.sort_by(f64::total_cmp);
    let spacing = gaps.get(gaps.len() / 2).map_or(10.0, |gap| gap.round().clamp(10.0, 60.0));
    let at = |i: u32| {
        let minutes = span_min + spacing * f64::from(i);
        ToCome { minutes, error_deg: swing.error_deg(minutes), u_deg: swing.error_u_deg(minutes).hypot(swing.scatter_deg) }
    };
    (1..=TO_COME).map(at).collect()
}

fn hold_to_limits(found: &mut Assessment, latitude: Option<Latitude>, limits: &Limits) {
    let Some(latitude) = latitude else { return };
    // From 89 on the secant is held, as for the limit of a gyro error.
    let secant = latitude.deg().abs().min(89.0).to_radians().cos().recip();
    let hold = |figure: f64, u: f64, limit_deg: f64| {
        let inside = if figure <= limit_deg { Some(true) } else { (figure - 2.0 * u > limit_deg).then_some(false) };
        Held { limit_deg, inside }
    };
    found.settle_point_held = found.settle_point.map(|(point, u)| hold(point.abs(), u, limits.thresholds.gyro_settle_deg * secant));
    found.scatter_held = found.scatter.map(|(sd, count)| {
        // The standard uncertainty of a standard deviation from so many readings.
        let u = sd / (2.0 * (count as f64 - 1.0).max(1.0)).sqrt();
        hold(sd, u, limits.thresholds.gyro_scatter_deg * secant)
    });
}
