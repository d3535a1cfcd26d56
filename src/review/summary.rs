//! The review as a whole: what a superintendent reads.

use super::curve::SECTOR_DEG;
use super::fleet::Fleet;
use super::judge::Verdict;
use super::vessel::Vessel;
use serde::Serialize;
use std::collections::BTreeMap;

/// Counts what the second pass finds, row by row; those of several threads add up.
#[derive(Debug, Clone, Default, PartialEq)]
pub struct Tally {
    rows: u64,
    problems: u64,
    queries: BTreeMap<&'static str, u64>,
    /// Rows with a query, and the slips that stand first, by vessel.
    vessels: BTreeMap<String, VesselTally>,
}

#[derive(Debug, Clone, Default, PartialEq)]
struct VesselTally {
    queried: u64,
    slips: BTreeMap<String, u64>,
}

impl Tally {
    /// Counts a row that was judged.
    pub fn add(&mut self, vessel: &str, verdict: &Verdict) {
        self.rows += 1;
        if verdict.queries.is_empty() {
            return;
        }
        for query in &verdict.queries {
            *self.queries.entry(query.id()).or_default() += 1;
        }
        if !self.vessels.contains_key(vessel) {
            self.vessels.insert(vessel.to_owned(), VesselTally::default());
        }
        let Some(of_vessel) = self.vessels.get_mut(vessel) else { return };
        of_vessel.queried += 1;
        if let Some(first) = verdict.slips.first() {
            *of_vessel.slips.entry(first.slip.to_string()).or_default() += 1;
        }
    }

    /// Counts a row that was judged though a part of it could not be used.
    pub fn add_fault(&mut self) {
        self.problems += 1;
    }

    /// Counts a row that could not be used.
    pub fn add_problem(&mut self) {
        self.rows += 1;
        self.problems += 1;
    }

    /// Adds the counts of another part of the log.
    pub fn merge(&mut self, other: Self) {
        self.rows += other.rows;
        self.problems += other.problems;
        for (id, n) in other.queries {
            *self.queries.entry(id).or_default() += n;
        }
        for (name, tally) in other.vessels {
            let mine = self.vessels.entry(name).or_default();
            mine.queried += tally.queried;
            for (slip, n) in tally.slips {
                *mine.slips.entry(slip).or_default() += n;
            }
        }
    }
}

/// The summary, as the file of `--summary` has it.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Summary {
    /// Data rows.
    pub rows: u64,
    /// Rows that could not be used.
    pub problems: u64,
    /// Queries by id.
    pub queries: BTreeMap<&'static str, u64>,
    /// The vessels, worst first.
    pub vessels: Vec<VesselSummary>,
}

/// One vessel.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct VesselSummary {
    /// Its name.
    pub vessel: String,
    /// Rows on which something was observed.
    pub observations: u64,
    /// Rows with a query.
    pub rows_with_query: u64,
    /// The slips that stand first in the lists, with their number, the most frequent first.
    pub slips: Vec<(String, u64)>,
    /// Its gyros, by repeater.
    pub gyros: Vec<GyroSummary>,
    /// Its magnetic compasses.
    pub compasses: Vec<CompassSummary>,
    /// Its patterns, the weightiest first.
    pub patterns: Vec<PatternSummary>,
    /// Patterns that could not be judged.
    pub not_evaluated: Vec<NotEvaluatedSummary>,
}

/// One gyro on one repeater.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct GyroSummary {
    /// The gyro.
    pub gyro: String,
    /// The repeater.
    pub repeater: String,
    /// Mean gyro error, degrees, east +; `null` where no run is established.
    pub mean_gyro_error: Option<f64>,
    /// Its standard uncertainty, degrees.
    pub mean_gyro_error_u: Option<f64>,
    /// Standard deviation of single errors about the run, degrees.
    pub scatter: Option<f64>,
}

/// One magnetic compass.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct CompassSummary {
    /// The compass.
    pub magnetic_compass: String,
    /// A to E with their standard uncertainties, degrees; `null` where the headings cannot tell.
    pub coefficients: BTreeMap<&'static str, Option<f64>>,
    /// Sectors of the card without an observation, compass degrees from and to.
    pub unproven_headings: Vec<(f64, f64)>,
}

/// One pattern.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct PatternSummary {
    /// Its id.
    pub id: &'static str,
    /// One sentence.
    pub detail: String,
    /// Since when, UTC.
    pub since: Option<String>,
}

/// One pattern that could not be judged.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct NotEvaluatedSummary {
    /// Its id.
    pub id: &'static str,
    /// Because.
    pub why: String,
}

/// Degrees with 4 decimals, never -0.
fn rounded(deg: f64) -> f64 {
    (deg * 1e4).round() / 1e4 + 0.0
}

impl Summary {
    /// What was learned, and what the second pass counted.
    pub fn of(fleet: &Fleet, tally: &Tally) -> Self {
        let mut vessels: Vec<VesselSummary> = fleet.vessels().iter().map(|v| vessel(v, tally.vessels.get(&v.name))).collect();
        // Worst first: the more patterns, then the larger the share of rows in doubt.
        let share = |v: &VesselSummary| v.rows_with_query as f64 / v.observations.max(1) as f64;
        vessels.sort_by(|a, b| {
            b.patterns.len().cmp(&a.patterns.len()).then(share(b).total_cmp(&share(a))).then_with(|| a.vessel.cmp(&b.vessel))
        });
        Self { rows: tally.rows, problems: tally.problems, queries: tally.queries.clone(), vessels }
    }
}

fn vessel(v: &Vessel, tally: Option<&VesselTally>) -> VesselSummary {
    let mut slips: Vec<(String, u64)> = tally.map(|t| t.slips.iter().map(|(s, n)| (s.clone(), *n)).collect()).unwrap_or_default();
    slips.sort_by(|a, b| b.1.cmp(&a.1).then_with(|| a.0.cmp(&b.0)));
    VesselSummary {
        vessel: v.name.clone(),
        observations: v.observations,
        rows_with_query: tally.map_or(0, |t| t.queried),
        slips,
        gyros: gyros(v),
        compasses: v.compasses.iter().enumerate().filter_map(|(at, name)| compass(v, at, name)).collect(),
        patterns: v
            .patterns
            .iter()
            .map(|p| PatternSummary {
                id: p.id.id(),
                detail: p.detail.clone(),
                since: p.since.map(|t| t.to_chrono().format("%Y-%m-%dT%H:%M:%SZ").to_string()),
            })
            .collect(),
        not_evaluated: v.not_evaluated.iter().map(|n| NotEvaluatedSummary { id: n.id.id(), why: n.why.clone() }).collect(),
    }
}

fn gyros(v: &Vessel) -> Vec<GyroSummary> {
    let mut all = Vec::new();
    for gyro in &v.runs {
        for &index in &gyro.repeaters {
            let errors = || v.facts.iter().filter(move |f| f.gyro == index).filter(|f| f.gyro_error_deg().is_some());
            if errors().next().is_none() {
                continue;
            }
            let run = gyro.run.as_ref().filter(|r| r.established());
            let mean = run.and_then(|run| {
                // The mean of what the run says on its rows: a bad row does not move it.
                let (n, sum) = errors().fold((0_u64, 0.0), |(n, s), f| (n + 1, s + run.value_deg(f)));
                (n > 0).then(|| (sum / n as f64, run.scatter_deg / (n as f64).sqrt()))
            });
            all.push(GyroSummary {
                gyro: gyro.name.clone(),
                repeater: v.gyros.get(usize::from(index)).map(|g| g.1.clone()).unwrap_or_default(),
                mean_gyro_error: mean.map(|m| rounded(m.0)),
                mean_gyro_error_u: mean.map(|m| rounded(m.1)),
                scatter: run.map(|r| rounded(r.scatter_deg)),
            });
        }
    }
    all
}

fn compass(v: &Vessel, at: usize, name: &str) -> Option<CompassSummary> {
    let headings = v.facts.iter().filter(|f| usize::from(f.compass()) == at).any(|f| f.compass_heading_deg().is_some());
    if !headings {
        return None;
    }
    let curve = v.curve(at as u8);
    let fitted = curve.map(|c| c.coefficients()).unwrap_or_default();
    let mut coefficients = BTreeMap::new();
    for (names, value) in [("A", "A_u"), ("B", "B_u"), ("C", "C_u"), ("D", "D_u"), ("E", "E_u")].into_iter().zip(fitted) {
        coefficients.insert(names.0, value.map(|v| rounded(v.0)));
        coefficients.insert(names.1, value.map(|v| rounded(v.1)));
    }
    Some(CompassSummary {
        magnetic_compass: name.to_owned(),
        coefficients,
        unproven_headings: curve.map_or_else(|| seen_sectors(v, at), super::curve::Curve::unproven),
    })
}

/// Without a curve, the sectors without a heading all the same.
fn seen_sectors(v: &Vessel, at: usize) -> Vec<(f64, f64)> {
    let mut seen = [false; 360 / SECTOR_DEG];
    for fact in v.facts.iter().filter(|f| usize::from(f.compass()) == at && f.deviation_deg().is_some()) {
        if let Some(slot) = fact.compass_heading_deg().and_then(|h| seen.get_mut(h as usize / SECTOR_DEG)) {
            *slot = true;
        }
    }
    super::curve::unproven(&seen)
}
