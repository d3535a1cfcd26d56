//! What a report shows of the second pass: the rows with a query, worst first, and an even sample of the errors to draw.
//!
//! Fed row by row in the order of the log; what is kept does not grow with it.

use super::fact::{Fact, flag};
use super::fleet::Fleet;
use super::judge::Verdict;
use super::query::Query;
use super::row::Row;
use crate::angle::{CompassError, Deviation, GyroError, TrueBearing, Variation};
use crate::compass::{Figure, Observation, Place};
use crate::logbook::entry::Logged;
use crate::notice::Notice;
use crate::time::{Moment, Zone};

/// Rows with a query that are kept whole, the worst; the others are counted.
pub const MOST_ROWS: usize = 2000;
/// Rows that could not be used, kept with the reason; the others are counted.
pub const MOST_PROBLEMS: usize = 100;
/// Errors kept of one gyro on one repeater, and of one magnetic compass, besides those out of the run or off the card.
pub const MOST_POINTS: usize = 1000;
/// Those out of the run, or off the card or curve, that are kept of each.
pub const MOST_OUTLIERS: usize = 200;
/// Errors kept of all gyros and compasses together, but never fewer of one than [`LEAST_POINTS`].
const ALL_POINTS: usize = 60_000;
/// Letters of a remark that are kept.
const LONGEST_REMARK: usize = 400;
/// See [`ALL_POINTS`].
const LEAST_POINTS: usize = 60;

/// The figures that a row gives, worked here.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Figures {
    /// Direction that the errors are reckoned from.
    pub azimuth: Option<TrueBearing>,
    /// Altitude at the time written, degrees.
    pub altitude_deg: Option<f64>,
    /// Gyro error.
    pub gyro_error: Option<Figure<GyroError>>,
    /// Compass error, by a bearing read on the compass.
    pub compass_error: Option<Figure<CompassError>>,
    /// Compass error by comparison of headings.
    pub compass_error_by_comparison: Option<Figure<CompassError>>,
    /// Variation.
    pub variation: Option<Figure<Variation>>,
    /// Deviation, by bearing.
    pub deviation: Option<Figure<Deviation>>,
    /// Deviation by comparison of headings.
    pub deviation_by_comparison: Option<Figure<Deviation>>,
    /// Deviation by the card in force, degrees.
    pub card_deg: Option<f64>,
}

/// A row with a query, kept whole.
#[derive(Debug, Clone, PartialEq)]
pub struct Finding {
    /// Number of the data row, from 1.
    pub number: u64,
    /// The vessel.
    pub vessel: String,
    /// The gyro.
    pub gyro: String,
    /// The repeater.
    pub repeater: String,
    /// The magnetic compass.
    pub magnetic_compass: String,
    /// When.
    pub moment: Option<Moment>,
    /// The zone written.
    pub zone: Option<Zone>,
    /// Where.
    pub place: Option<Place>,
    /// What was observed.
    pub observation: Option<Observation>,
    /// Remarks.
    pub remarks: String,
    /// What the officer worked out.
    pub logged: Logged,
    /// What it comes to here.
    pub figures: Figures,
    /// Queries, slips, patterns.
    pub verdict: Verdict,
    /// Notices of the working.
    pub notices: Vec<Notice>,
}

impl Finding {
    fn of(row: &Row, verdict: &Verdict) -> Self {
        let worked = row.worked;
        Self {
            number: row.number,
            vessel: row.names.vessel.to_owned(),
            gyro: row.names.gyro.to_owned(),
            repeater: row.names.repeater.to_owned(),
            magnetic_compass: row.names.magnetic_compass.to_owned(),
            moment: row.moment,
            zone: row.zone,
            place: row.place,
            observation: row.observation.copied(),
            remarks: row.remarks.chars().take(LONGEST_REMARK).collect(),
            logged: *row.logged,
            figures: Figures {
                azimuth: worked.true_azimuth,
                altitude_deg: worked.at_time.map(|h| h.altitude_deg),
                gyro_error: worked.gyro_error,
                compass_error: worked.compass_error,
                compass_error_by_comparison: worked.compass_error_by_comparison,
                variation: worked.variation,
                deviation: worked.deviation,
                deviation_by_comparison: worked.deviation_by_comparison,
                card_deg: row.card.map(|c| c.deviation_deg),
            },
            verdict: verdict.clone(),
            notices: worked.notices.clone(),
        }
    }

    /// How much its strongest query weighs: what was measured over its threshold.
    pub fn weight(&self) -> f64 {
        self.verdict.queries.first().map_or(0.0, Query::weight)
    }
}

/// An error with its uncertainty, of the row in place `at` of its vessel.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Point {
    pub at: u32,
    pub deg: f32,
    pub u_deg: f32,
    pub by_comparison: bool,
}

/// What a report takes of one row: small, made on any thread.
#[derive(Debug, Clone, PartialEq)]
pub struct Glimpse {
    vessel: u32,
    gyro: u8,
    compass: u8,
    gyro_error: Option<Point>,
    deviation: Option<Point>,
    out_of_run: bool,
    off_card: bool,
    finding: Option<Box<Finding>>,
}

impl Glimpse {
    /// Of a row as it was judged.
    pub fn of(row: &Row, verdict: &Verdict, fleet: &Fleet) -> Option<Self> {
        let index = fleet.index(row.names.vessel)?;
        let vessel = fleet.vessels().get(index)?;
        let at = vessel.place_of(row.number)?;
        let fact: &Fact = vessel.facts.get(at)?;
        let (at, worked) = (at as u32, row.worked);
        let gyro_error = worked.gyro_error.filter(|_| fact.has(flag::OBSERVED));
        let by_bearing = worked.deviation.map(|d| (d, false));
        let deviation = by_bearing.or(worked.deviation_by_comparison.map(|d| (d, true)));
        Some(Self {
            vessel: index as u32,
            gyro: fact.gyro,
            compass: fact.compass(),
            gyro_error: gyro_error.map(|e| Point { at, deg: e.value.deg() as f32, u_deg: e.u_deg() as f32, by_comparison: false }),
            deviation: deviation.map(|(d, by_comparison)| Point { at, deg: d.value.deg() as f32, u_deg: d.u_deg() as f32, by_comparison }),
            out_of_run: verdict.queries.iter().any(|q| matches!(q, Query::GyroOutOfRun { .. })),
            off_card: verdict.queries.iter().any(|q| matches!(q, Query::OffCard { .. })),
            finding: (!verdict.queries.is_empty()).then(|| Box::new(Finding::of(row, verdict))),
        })
    }
}

/// The errors of one gyro on one repeater, or of one compass.
#[derive(Debug, Clone, Default)]
pub(super) struct Series {
    /// Every so many-th is kept.
    stride: u64,
    most: usize,
    pub seen: u64,
    pub points: Vec<Point>,
    pub outliers: Vec<Point>,
    pub outliers_seen: u64,
}

impl Series {
    fn add(&mut self, point: Point, outlier: bool) {
        if outlier {
            self.outliers_seen += 1;
            if self.outliers.len() < MOST_OUTLIERS {
                self.outliers.push(point);
            }
            return;
        }
        if self.seen.is_multiple_of(self.stride.max(1)) && self.points.len() < self.most {
            self.points.push(point);
        }
        self.seen += 1;
    }
}

/// The series of one vessel: by gyro and repeater, and by compass.
#[derive(Debug, Clone, Default)]
pub(super) struct Sampled {
    pub gyros: Vec<Series>,
    pub compasses: Vec<Series>,
}

/// What the report shows of single rows.
#[derive(Debug, Clone)]
pub struct Findings {
    rows: Vec<Finding>,
    pub(super) sampled: Vec<Sampled>,
    /// Rows with a query, listed or not.
    pub queried: u64,
    /// The first rows that could not be used, or not wholly: number and why.
    pub problems: Vec<(u64, String)>,
    /// All of them.
    pub problem_count: u64,
}

impl Findings {
    /// Nothing seen yet; how much of each gyro and compass is kept follows from how many rows they have.
    pub fn new(fleet: &Fleet) -> Self {
        let count: usize = fleet.vessels().iter().map(|v| v.gyros.len() + v.compasses.len()).sum();
        let most = (ALL_POINTS / count.max(1)).clamp(LEAST_POINTS, MOST_POINTS);
        let sampled = fleet.vessels().iter().map(|vessel| {
            let (mut gyros, mut compasses) = (vec![0_u64; vessel.gyros.len()], vec![0_u64; vessel.compasses.len()]);
            for fact in &vessel.facts {
                let is_there = |there: Option<f64>, counts: &mut Vec<u64>, index: u8| {
                    if let (Some(_), Some(n)) = (there, counts.get_mut(usize::from(index))) {
                        *n += 1;
                    }
                };
                is_there(fact.gyro_error_deg(), &mut gyros, fact.gyro);
                is_there(fact.deviation_deg(), &mut compasses, fact.compass());
            }
            let series = |counts: Vec<u64>| -> Vec<Series> {
                counts.into_iter().map(|n| Series { stride: n.div_ceil(most as u64).max(1), most, ..Series::default() }).collect()
            };
            Sampled { gyros: series(gyros), compasses: series(compasses) }
        });
        Self { rows: Vec::new(), sampled: sampled.collect(), queried: 0, problems: Vec::new(), problem_count: 0 }
    }

    /// Takes the next row's glimpse, in the order of the log.
    pub fn feed(&mut self, glimpse: Glimpse) {
        if let Some(of_vessel) = self.sampled.get_mut(glimpse.vessel as usize) {
            if let (Some(point), Some(series)) = (glimpse.gyro_error, of_vessel.gyros.get_mut(usize::from(glimpse.gyro))) {
                series.add(point, glimpse.out_of_run);
            }
            if let (Some(point), Some(series)) = (glimpse.deviation, of_vessel.compasses.get_mut(usize::from(glimpse.compass))) {
                series.add(point, glimpse.off_card);
            }
        }
        let Some(finding) = glimpse.finding else { return };
        self.queried += 1;
        self.rows.push(*finding);
        if self.rows.len() >= 2 * MOST_ROWS {
            self.keep_the_worst();
        }
    }

    /// Takes a row that could not be used, or not wholly, in the order of the log.
    pub fn feed_problem(&mut self, number: u64, why: String) {
        self.problem_count += 1;
        if self.problems.len() < MOST_PROBLEMS {
            self.problems.push((number, why));
        }
    }

    fn keep_the_worst(&mut self) {
        self.rows.sort_by(|a, b| b.weight().total_cmp(&a.weight()).then(a.number.cmp(&b.number)));
        self.rows.truncate(MOST_ROWS);
    }

    /// The rows that are shown, the worst first: by what was measured over its threshold, then by row.
    pub fn worst_first(mut self) -> (Vec<Finding>, Self) {
        self.keep_the_worst();
        (std::mem::take(&mut self.rows), self)
    }
}
