//! What there is to draw of a vessel: her gyros over time, her compasses over the headings, her entries by watch.

use super::curve::{Curve, SECTOR_DEG, unproven};
use super::fact::{Fact, flag};
use super::findings::{Findings, Point, Series};
use super::fleet::Fleet;
use super::pattern::{NotEvaluated, Pattern};
use super::patterns::ship_hours;
use super::run::Term;
use super::vessel::{Gyro, Vessel};
use crate::limits::Limits;
use crate::time::UtcInstant;
use std::collections::BTreeMap;

/// A gap over this between two entries is a voyage not logged here, days.
const MOST_GAP_DAYS: i64 = 4;

/// One vessel, as a report draws her.
#[derive(Debug, Clone, Copy)]
pub struct Portrait<'a> {
    vessel: &'a Vessel,
    sampled: Option<&'a super::findings::Sampled>,
}

/// A gyro error with its uncertainty and what the run leads to expect, degrees.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ErrorInTime {
    /// Number of the data row.
    pub number: u64,
    /// Milliseconds of the Unix count, to 2 s.
    pub unix_ms: i64,
    /// The error, east +.
    pub error_deg: f64,
    /// Its standard uncertainty.
    pub u_deg: f64,
    /// The run there, and what single errors scatter about it; `None` where no run is established.
    pub run_deg: Option<(f64, f64)>,
}

/// A gyro on one repeater.
#[derive(Debug, Clone, PartialEq)]
pub struct RepeaterDrawn<'a> {
    /// The repeater.
    pub repeater: &'a str,
    /// Errors in the order of time, an even sample where there are many.
    pub errors: Vec<ErrorInTime>,
    /// Errors out of the run, in the order of time.
    pub out_of_run: Vec<ErrorInTime>,
    /// Errors in all, and those out of the run.
    pub counts: (u64, u64),
    /// Errors without a sound time among those above, which cannot be drawn.
    pub without_time: usize,
}

/// A step in a gyro's run.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct StepInRun {
    /// When, milliseconds of the Unix count.
    pub unix_ms: i64,
    /// By how much, degrees, east +.
    pub by_deg: f64,
    /// Standard uncertainty of that, degrees.
    pub u_deg: f64,
}

/// One gyro.
#[derive(Debug, Clone, PartialEq)]
pub struct GyroDrawn<'a> {
    /// The gyro.
    pub gyro: &'a str,
    /// Its repeaters.
    pub repeaters: Vec<RepeaterDrawn<'a>>,
    /// Its steps.
    pub steps: Vec<StepInRun>,
}

/// A deviation on a heading.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct DeviationOnHeading {
    /// Number of the data row.
    pub number: u64,
    /// Heading by compass, degrees.
    pub heading_deg: f64,
    /// Deviation, degrees, east +.
    pub deviation_deg: f64,
    /// Its standard uncertainty, degrees.
    pub u_deg: f64,
    /// By comparison of headings; otherwise by a bearing.
    pub by_comparison: bool,
}

/// One magnetic compass.
#[derive(Debug, Clone, PartialEq)]
pub struct CompassDrawn<'a> {
    /// The compass.
    pub compass: &'a str,
    /// Deviations in the order of headings, an even sample where there are many.
    pub deviations: Vec<DeviationOnHeading>,
    /// Those off the card or the curve.
    pub off_curve: Vec<DeviationOnHeading>,
    /// Deviations in all, and those off the card or curve.
    pub counts: (u64, u64),
    /// The fitted curve: heading, deviation and its standard uncertainty, degrees; in the middle of the magnetic latitudes of the log.
    pub curve: Vec<(f64, f64, f64)>,
    /// Sectors without an observation, from and to, degrees.
    pub unproven: Vec<(f64, f64)>,
}

/// Entries by watch, in ship's time by the zone of the longitude.
#[derive(Debug, Clone, PartialEq)]
pub struct Coverage {
    /// The first day, days since 1970-01-01 in ship's time.
    pub first_day: i64,
    /// Days that one column stands for.
    pub days_each: i64,
    /// Days of each column that are counted: those in a gap of more than four days are not.
    pub days: Vec<u32>,
    /// The watches, from midnight.
    pub watches: Vec<WatchRow>,
}

/// One watch of the day.
#[derive(Debug, Clone, PartialEq)]
pub struct WatchRow {
    /// Hours of ship's time, from and to.
    pub hours: (u8, u8),
    /// Days with an observation, by column.
    pub observed: Vec<u32>,
    /// Days with nothing but the reason why none could be had, by column.
    pub reasoned: Vec<u32>,
}

impl Fleet {
    /// What there is to draw of a vessel.
    pub fn portrait<'a>(&'a self, vessel: &str, findings: &'a Findings) -> Option<Portrait<'a>> {
        let index = self.index(vessel)?;
        Some(Portrait { vessel: self.vessels().get(index)?, sampled: findings.sampled.get(index) })
    }

    /// First and last sound time in the log, milliseconds of the Unix count.
    pub fn span_ms(&self) -> Option<(i64, i64)> {
        let spans = || self.vessels().iter().filter_map(span_ms);
        Some((spans().map(|s| s.0).min()?, spans().map(|s| s.1).max()?))
    }

    /// What is expected of the row `number` of a vessel: gyro error by the run, deviation by the fitted curve, degrees.
    pub fn expected(&self, vessel: &str, number: u64) -> (Option<f64>, Option<f64>) {
        let found = self.vessel(vessel).and_then(|v| Some((v, v.place_of(number)?)));
        let Some((vessel, at)) = found else { return (None, None) };
        let Some(fact) = vessel.facts.get(at) else { return (None, None) };
        let curve = vessel.curve(fact.compass()).zip(fact.compass_heading_deg()).zip(fact.field());
        (vessel.expected(at, fact.gyro).map(|e| e.0), curve.map(|((c, h), f)| c.at(h, f).0))
    }
}

fn sound(fact: &Fact) -> bool {
    !fact.has(flag::OUT_OF_ORDER)
}

fn span_ms(vessel: &Vessel) -> Option<(i64, i64)> {
    let times = || vessel.facts.iter().filter(|f| sound(f)).filter_map(Fact::unix_ms);
    Some((times().min()?, times().max()?))
}

impl<'a> Portrait<'a> {
    /// Her patterns, the weightiest first.
    pub fn patterns(&self) -> &'a [Pattern] {
        &self.vessel.patterns
    }

    /// What could not be judged.
    pub fn not_evaluated(&self) -> &'a [NotEvaluated] {
        &self.vessel.not_evaluated
    }

    /// First and last sound time, milliseconds of the Unix count.
    pub fn span_ms(&self) -> Option<(i64, i64)> {
        span_ms(self.vessel)
    }

    /// Her gyros that errors are known of.
    pub fn gyros(&self) -> Vec<GyroDrawn<'a>> {
        let drawn = self.vessel.runs.iter().map(|gyro| GyroDrawn {
            gyro: &gyro.name,
            repeaters: gyro.repeaters.iter().filter_map(|&index| self.repeater(index)).collect(),
            steps: steps(gyro),
        });
        drawn.filter(|gyro| !gyro.repeaters.is_empty()).collect()
    }

    fn repeater(&self, index: u8) -> Option<RepeaterDrawn<'a>> {
        let series = self.sampled?.gyros.get(usize::from(index))?;
        if series.seen + series.outliers_seen == 0 {
            return None;
        }
        let mut without_time = 0;
        let mut in_time = |points: &[Point]| {
            let mut errors: Vec<ErrorInTime> = points.iter().filter_map(|p| self.in_time(p, index)).collect();
            without_time += points.len() - errors.len();
            errors.sort_by_key(|e| (e.unix_ms, e.number));
            errors
        };
        let (errors, out_of_run) = (in_time(&series.points), in_time(&series.outliers));
        let repeater = self.vessel.gyros.get(usize::from(index)).map_or("", |g| g.1.as_str());
        Some(RepeaterDrawn { repeater, errors, out_of_run, counts: counts(series), without_time })
    }

    fn in_time(&self, point: &Point, gyro: u8) -> Option<ErrorInTime> {
        let at = point.at as usize;
        let fact = self.vessel.facts.get(at).filter(|f| sound(f))?;
        Some(ErrorInTime {
            number: u64::from(fact.number),
            unix_ms: fact.unix_ms()?,
            error_deg: f64::from(point.deg),
            u_deg: f64::from(point.u_deg),
            run_deg: self.vessel.expected(at, gyro),
        })
    }

    /// Her magnetic compasses that deviations are known of.
    pub fn compasses(&self) -> Vec<CompassDrawn<'a>> {
        (0..self.vessel.compasses.len()).filter_map(|index| self.compass(index)).collect()
    }

    fn compass(&self, index: usize) -> Option<CompassDrawn<'a>> {
        let series = self.sampled?.compasses.get(index)?;
        if series.seen + series.outliers_seen == 0 {
            return None;
        }
        let on_headings = |points: &[Point]| {
            let mut list: Vec<DeviationOnHeading> = points.iter().filter_map(|p| self.on_heading(p)).collect();
            list.sort_by(|a, b| a.heading_deg.total_cmp(&b.heading_deg).then(a.number.cmp(&b.number)));
            list
        };
        let curve = self.vessel.curve(index as u8);
        let seen = || {
            let mut seen = [false; 360 / SECTOR_DEG];
            for point in series.points.iter().chain(&series.outliers) {
                let heading = self.on_heading(point).map(|d| d.heading_deg);
                if let Some(slot) = heading.and_then(|h| seen.get_mut(h as usize / SECTOR_DEG)) {
                    *slot = true;
                }
            }
            unproven(&seen)
        };
        Some(CompassDrawn {
            compass: self.vessel.compasses.get(index)?,
            deviations: on_headings(&series.points),
            off_curve: on_headings(&series.outliers),
            counts: counts(series),
            curve: curve.zip(self.middle_field(index as u8)).map(|(c, field)| drawn(c, field)).unwrap_or_default(),
            unproven: curve.map_or_else(seen, Curve::unproven),
        })
    }

    fn on_heading(&self, point: &Point) -> Option<DeviationOnHeading> {
        let fact = self.vessel.facts.get(point.at as usize)?;
        Some(DeviationOnHeading {
            number: u64::from(fact.number),
            heading_deg: fact.compass_heading_deg()?,
            deviation_deg: f64::from(point.deg),
            u_deg: f64::from(point.u_deg),
            by_comparison: point.by_comparison,
        })
    }

    /// The mean of horizontal intensity and inclination over the rows of a compass.
    fn middle_field(&self, compass: u8) -> Option<(f64, f64)> {
        let fields = self.vessel.facts.iter().filter(|f| f.compass() == compass && f.deviation_deg().is_some()).filter_map(Fact::field);
        let (n, h, i) = fields.fold((0.0, 0.0, 0.0), |(n, h, i), f| (n + 1.0, h + f.0, i + f.1));
        (n > 0.0).then(|| (h / n, i / n))
    }

    /// Her entries by watch, in at most `most_columns` columns; `None` without a time and place.
    pub fn coverage(&self, limits: &Limits, most_columns: i64) -> Option<Coverage> {
        // What a day's watches have: nothing, a reason, an observation.
        let watch_h = i64::from(limits.watches.hours());
        let count = (24 / watch_h) as usize;
        let mut days: BTreeMap<i64, Vec<u8>> = BTreeMap::new();
        for fact in self.vessel.facts.iter().filter(|f| sound(f) && !f.has(flag::TOO_FAR)) {
            let Some(hours) = ship_hours(fact) else { continue };
            let (day, hour) = (hours.div_euclid(24.0) as i64, hours.rem_euclid(24.0) as i64);
            let day = days.entry(day).or_insert_with(|| vec![0; count]);
            if let Some(slot) = day.get_mut((hour / watch_h) as usize) {
                *slot = (*slot).max(if fact.has(flag::OBSERVED) { 2 } else { 1 });
            }
        }
        let (first, last) = (*days.keys().next()?, *days.keys().next_back()?);
        let days_each =
            (last - first + 1).div_euclid(most_columns.max(1)) + i64::from((last - first + 1).rem_euclid(most_columns.max(1)) > 0);
        let columns = ((last - first) / days_each + 1) as usize;
        let mut coverage = Coverage {
            // The facts count from 2000.
            first_day: first + EPOCH_DAYS,
            days_each,
            days: vec![0; columns],
            watches: (0..count as i64)
                .map(|w| WatchRow {
                    hours: ((w * watch_h) as u8, ((w + 1) * watch_h) as u8),
                    observed: vec![0; columns],
                    reasoned: vec![0; columns],
                })
                .collect(),
        };
        let mut before = first;
        for (day, marks) in &days {
            let column = |d: i64| ((d - first) / days_each) as usize;
            let from = if day - before > MOST_GAP_DAYS { *day } else { (before + 1).min(*day) };
            for d in from..=*day {
                add(&mut coverage.days, column(d));
            }
            before = *day;
            for (row, mark) in coverage.watches.iter_mut().zip(marks) {
                match mark {
                    2 => add(&mut row.observed, column(*day)),
                    1 => add(&mut row.reasoned, column(*day)),
                    _ => {}
                }
            }
        }
        Some(coverage)
    }
}

/// Days from 1970-01-01 to 2000-01-01, which the facts count from.
const EPOCH_DAYS: i64 = 10_957;

fn add(counts: &mut [u32], at: usize) {
    if let Some(n) = counts.get_mut(at) {
        *n += 1;
    }
}

fn counts(series: &Series) -> (u64, u64) {
    (series.seen + series.outliers_seen, series.outliers_seen)
}

/// A curve every five degrees, from 000 round to 360.
fn drawn(curve: &Curve, field: (f64, f64)) -> Vec<(f64, f64, f64)> {
    (0..=72)
        .map(|i| {
            let heading = f64::from(i) * 5.0;
            let (value, u) = curve.at(heading, field);
            (heading, value, u)
        })
        .collect()
}

fn steps(gyro: &Gyro) -> Vec<StepInRun> {
    let Some(run) = gyro.run.as_ref().filter(|r| r.established()) else { return Vec::new() };
    let mut steps: Vec<StepInRun> = run
        .terms
        .iter()
        .enumerate()
        .filter_map(|(at, term)| {
            let Term::Step(seconds) = term else { return None };
            let (by_deg, u_deg) = run.coefficient(at);
            let unix_ms = seconds * 1000 + EPOCH_DAYS * 86_400_000;
            UtcInstant::from_unix_ms(unix_ms).ok()?;
            Some(StepInRun { unix_ms, by_deg, u_deg })
        })
        .collect();
    steps.sort_by_key(|s| s.unix_ms);
    steps
}
