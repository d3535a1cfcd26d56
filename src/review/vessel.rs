//! What all rows of a vessel say together.

use super::checks::Route;
use super::curve::Curve;
use super::evidence::{Context, UNKNOWN_GYRO};
use super::fact::{Fact, flag};
use super::learn::Logbook;
use super::order;
use super::pattern::{NotEvaluated, Pattern, PatternId};
use super::patterns;
use super::robust::median;
use super::row::Row;
use super::run::Run;
use super::slip::{Place, Slip};
use crate::angle::wrap_180_deg;
use crate::limits::Limits;
use std::collections::BTreeSet;

/// Neighbours in time on each side that a gyro's slow drift is taken from.
const DRIFT_SIDE: usize = 8;
/// Rows searched for them on each side.
const DRIFT_REACH: usize = 64;
/// Neighbours that a drift is worth half of.
const DRIFT_HALF: f64 = 6.0;
/// Rows before a row that its position may be left over from.
const EARLIER: usize = 6;
/// What the drift can be read to, as a share of the scatter: the median of sixteen, 1.25 / 4.
const DRIFT_U: f64 = 0.3;

/// One gyro of a vessel with all its repeaters.
#[derive(Debug, Clone, PartialEq)]
pub struct Gyro {
    pub name: String,
    /// Its repeaters among [`Vessel::gyros`], the most used first.
    pub repeaters: Vec<u8>,
    pub run: Option<Run>,
}

/// One vessel.
#[derive(Debug, Clone)]
pub struct Vessel {
    pub name: String,
    pub observations: u64,
    /// Gyro and repeater.
    pub gyros: Vec<(String, String)>,
    pub runs: Vec<Gyro>,
    pub compasses: Vec<String>,
    pub curves: Vec<Option<Curve>>,
    pub facts: Vec<Fact>,
    pub repeats: Vec<(u64, u64)>,
    pub patterns: Vec<Pattern>,
    pub not_evaluated: Vec<NotEvaluated>,
    /// By how much the variation written is off on this vessel: a constant, degrees, and years of its yearly change.
    pub variation_off: (f64, f64),
    /// The slip made on nearly all affected rows.
    pub throughout: Option<(Slip, Place)>,
    /// How it works its compass errors.
    pub route: Route,
    /// Compasses whose deviation is off by a constant, degrees; against the card where one is given.
    pub constant_a: Vec<(u8, f64)>,
    /// The pattern that errors worked from finer readings belong to, where that is the habit.
    pub unrounded: Option<PatternId>,
    /// Compasses whose deviation was off a given card on three separate days.
    pub off_card_days: Vec<u8>,
}

impl Vessel {
    /// What the rows in `book` say together; those numbered in `late` are not asked for their order.
    pub fn of(mut book: Logbook, late: &BTreeSet<u64>, limits: &Limits) -> Self {
        order::mark(&mut book.facts, late, limits);
        book.facts.shrink_to_fit();
        let runs = runs(&book);
        let curves = curves(&book, &runs);
        let mut vessel = Self {
            name: std::mem::take(&mut book.name),
            observations: book.observations,
            gyros: std::mem::take(&mut book.gyros),
            runs,
            compasses: std::mem::take(&mut book.compasses),
            curves,
            facts: std::mem::take(&mut book.facts),
            repeats: std::mem::take(&mut book.repeats),
            patterns: Vec::new(),
            not_evaluated: Vec::new(),
            variation_off: (0.0, 0.0),
            throughout: None,
            route: book.route(),
            constant_a: Vec::new(),
            unrounded: None,
            off_card_days: off_card_days(&book, limits),
        };
        patterns::find(&mut vessel, &book, limits);
        vessel
    }

    /// Place of the row with this number among the facts.
    pub fn place_of(&self, number: u64) -> Option<usize> {
        self.facts.binary_search_by_key(&(number as u32), |f| f.number).ok()
    }

    /// The gyro that gyro and repeater `index` belong to.
    pub fn gyro_of(&self, index: u8) -> Option<&Gyro> {
        let (name, _) = self.gyros.get(usize::from(index))?;
        self.runs.iter().find(|g| g.name == *name)
    }

    /// The gyro error to expect at the row in place `at` read on gyro `index`, what a single reading scatters, and the part from
    /// slow drift, degrees; `None` where no run is established.
    pub fn expected(&self, at: usize, index: u8) -> Option<(f64, f64)> {
        let gyro = self.gyro_of(index)?;
        let run = gyro.run.as_ref().filter(|r| r.established())?;
        let fact = self.facts.get(at)?;
        let drift = self.drift_deg(at, gyro, run);
        let u = run.value_u_deg(fact).min(1.0).hypot(DRIFT_U * run.scatter_deg);
        Some((run.value_deg(fact) + drift, run.scatter_deg.hypot(u)))
    }

    /// The middle of what the neighbours in time leave, drawn towards nothing where they are few.
    fn drift_deg(&self, at: usize, gyro: &Gyro, run: &Run) -> f64 {
        let mut left = [0.0; 2 * DRIFT_SIDE];
        let mut count = 0;
        let mut collect = |facts: &mut dyn Iterator<Item = &Fact>| {
            let near = facts.filter(|f| gyro.repeaters.contains(&f.gyro)).filter_map(|f| Some(f.gyro_error_deg()? - run.value_deg(f)));
            for residual in near.take(DRIFT_SIDE) {
                if let Some(slot) = left.get_mut(count) {
                    *slot = residual;
                    count += 1;
                }
            }
        };
        let before = self.facts.get(at.saturating_sub(DRIFT_REACH)..at).unwrap_or_default();
        let after = self.facts.get(at + 1..(at + 1 + DRIFT_REACH).min(self.facts.len())).unwrap_or_default();
        collect(&mut before.iter().rev());
        collect(&mut after.iter());
        let n = count as f64;
        left.get_mut(..count).and_then(median).unwrap_or(0.0).clamp(-2.0, 2.0) * n / (n + DRIFT_HALF)
    }

    /// By how much the variation written is expected to be off on a row, degrees.
    pub fn variation_off_deg(&self, row: &Row) -> f64 {
        let (constant, years) = self.variation_off;
        constant - row.worked.field.map_or(0.0, |f| f.annual.variation_deg * years)
    }

    /// The constant that a magnetic compass's deviation is off by, degrees; 0 where none is named.
    pub fn constant_a_deg(&self, compass: u8) -> f64 {
        self.constant_a.iter().find(|c| c.0 == compass).map_or(0.0, |c| c.1)
    }

    /// The curve of a magnetic compass.
    pub fn curve(&self, compass: u8) -> Option<&Curve> {
        self.curves.get(usize::from(compass))?.as_ref()
    }

    /// What is known besides the row in place `at`.
    pub fn context<'a>(&'a self, at: usize, gyro: u8, compass: u8, limits: &'a Limits) -> Context<'a> {
        let sound = |f: &&Fact| !f.has(flag::OUT_OF_ORDER) && !f.has(flag::TOO_FAR) && f.has(flag::TIME) && f.has(flag::PLACE);
        let earlier_rows = self.facts.get(..at).unwrap_or_default();
        Context {
            gyro: self.expected(at, gyro).unwrap_or(UNKNOWN_GYRO),
            curve: self.curve(compass),
            variation_off_deg: self.variation_off.0,
            before: earlier_rows.iter().rev().find(sound),
            after: self.facts.get(at + 1..).unwrap_or_default().iter().find(sound),
            earlier: earlier_rows.get(at.saturating_sub(EARLIER)..).unwrap_or_default(),
            route: self.route,
            speed_kn: None,
            limits,
        }
    }
}

/// Gyros by name, each with its run over all its repeaters.
fn runs(book: &Logbook) -> Vec<Gyro> {
    let mut uses = vec![0_usize; book.gyros.len()];
    for fact in book.facts.iter().filter(|f| f.gyro_error_deg().is_some()) {
        if let Some(n) = uses.get_mut(usize::from(fact.gyro)) {
            *n += 1;
        }
    }
    let mut gyros: Vec<Gyro> = Vec::new();
    for (at, (name, _)) in book.gyros.iter().enumerate() {
        match gyros.iter_mut().find(|g| g.name == *name) {
            Some(gyro) => gyro.repeaters.push(at as u8),
            None => gyros.push(Gyro { name: name.clone(), repeaters: vec![at as u8], run: None }),
        }
    }
    let sound = |f: &&Fact| f.gyro_error_deg().is_some() && !f.has(flag::OUT_OF_ORDER);
    for gyro in &mut gyros {
        gyro.repeaters.sort_by_key(|r| std::cmp::Reverse(uses.get(usize::from(*r)).copied().unwrap_or(0)));
        gyro.repeaters.retain(|r| uses.get(usize::from(*r)).copied().unwrap_or(0) > 0 || book.gyros.len() == 1);
        let mut facts: Vec<&Fact> = book.facts.iter().filter(|f| gyro.repeaters.contains(&f.gyro)).filter(sound).collect();
        facts.sort_by_key(|f| f.seconds());
        // With the repeater written, the side of the ship says nothing more.
        let sides = gyro.repeaters.len() == 1 && book.gyros.iter().all(|(_, repeater)| repeater.is_empty());
        gyro.run = Run::of(&facts, &gyro.repeaters, sides);
    }
    gyros
}

/// Curves of the magnetic compasses; where only headings were compared, with the gyro's run.
fn curves(book: &Logbook, runs: &[Gyro]) -> Vec<Option<Curve>> {
    (0..book.compasses.len())
        .map(|compass| {
            let points: Vec<(&Fact, f64)> = book
                .facts
                .iter()
                .filter(|f| usize::from(f.compass()) == compass && !f.has(flag::OUT_OF_ORDER) && !f.has(flag::TOO_FAR))
                .filter_map(|f| {
                    let deviation = f.deviation_deg()?;
                    if !f.has(flag::LACKS_GYRO) {
                        return Some((f, deviation));
                    }
                    let gyro = runs.iter().find(|g| g.repeaters.contains(&f.gyro)).or(runs.first())?;
                    let run = gyro.run.as_ref().filter(|r| r.established())?;
                    Some((f, wrap_180_deg(deviation + run.value_deg(f))))
                })
                .collect();
            Curve::of(&points)
        })
        .collect()
}

/// Compasses whose deviation was off the card on three separate days.
fn off_card_days(book: &Logbook, limits: &Limits) -> Vec<u8> {
    (0..book.compasses.len() as u8)
        .filter(|&compass| {
            let mut days: Vec<i32> = book
                .against_card
                .iter()
                .filter(|(c, off, _)| *c == compass && f64::from(off.abs()) > limits.thresholds.off_card_deg)
                .map(|(_, _, day)| *day)
                .collect();
            days.sort_unstable();
            days.dedup();
            days.len() >= 3
        })
        .collect()
}
