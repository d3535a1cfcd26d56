//! The first pass: every row fed once, little of it kept.

use super::checks::{Route, comes_out, row_queries, unrounded};
use super::fact::{Fact, MOST_COMPASSES};
use super::fleet::Fleet;
use super::prints::Prints;
use super::query::Query;
use super::row::{CardFigure, Names, Row};
use super::vessel::Vessel;
use crate::angle::Reading;
use crate::compass::{GyroType, Observation, Worked, work};
use crate::limits::Limits;
use crate::logbook::entry::Logged;
use crate::time::{Moment, Zone};
use std::collections::{BTreeSet, HashMap};
use std::num::NonZeroUsize;
use std::sync::atomic::{AtomicUsize, Ordering};
use std::sync::{Mutex, PoisonError};

/// Affected rows of a vessel that are kept whole.
const SAMPLE: usize = 24;
/// Figures of a vessel's logged variation, and of its deviation against a card, that are kept.
const FIGURES: usize = 512;
/// Rows that room is made for at the least.
const LEAST_ROOM: usize = 64;
/// A gyro error over this is an affected row before any run is known, degrees.
const WILD_DEG: f64 = 6.0;

/// Feeds on rows, in the order of the file. Parts of a log can be learned apart, on threads of their own, and joined in order: the
/// outcome is that of feeding every row to one.
#[derive(Debug, Clone)]
pub struct Learn<'a> {
    limits: &'a Limits,
    vessels: Vec<Logbook>,
    by_name: HashMap<String, usize>,
    queries: Vec<Query>,
    /// Rows entered after their time, in the place of an earlier one.
    late: BTreeSet<u64>,
}

/// What is kept of one vessel between the passes.
#[derive(Debug, Clone, Default)]
pub struct Logbook {
    pub name: String,
    /// Gyro and repeater.
    pub gyros: Vec<(String, String)>,
    pub compasses: Vec<String>,
    pub facts: Vec<Fact>,
    /// Rows with what they copy.
    pub repeats: Vec<(u64, u64)>,
    prints: Prints,
    pub observations: u64,
    pub affected: u64,
    /// Rows whose logged errors are off their parts by no more than the readings' own rounding.
    pub unrounded: u64,
    /// Rows whose logged compass error comes out by the bearing, and by the headings alone.
    pub by_bearing: u64,
    pub by_headings_only: u64,
    pub sample: Vec<Kept>,
    /// Of the gyro bearings and of the compass bearings.
    pub gyro_steps: Steps,
    pub compass_steps: Steps,
    pub other_gyro: bool,
    pub has_speed: bool,
    /// Logged variation less the model's, and the yearly change there, degrees.
    pub variations: Vec<(f32, f32)>,
    /// Compass index, deviation less the card's, degrees, and the day.
    pub against_card: Vec<(u8, f32, i32)>,
}

/// How finely readings are written.
#[derive(Debug, Clone, Copy, Default)]
pub struct Steps {
    readings: u64,
    halves: u64,
    wholes: u64,
}

impl Steps {
    fn add<T>(&mut self, reading: Option<Reading<T>>, deg: impl Fn(&T) -> f64) {
        let Some(reading) = reading else { return };
        let deg = deg(&reading.value);
        let on = |step: f64| ((deg / step).round() * step - deg).abs() < 1e-6;
        self.readings += 1;
        self.halves += u64::from(on(0.5));
        self.wholes += u64::from(on(1.0));
    }

    fn join(&mut self, later: Self) {
        self.readings += later.readings;
        self.halves += later.halves;
        self.wholes += later.wholes;
    }

    /// The step that nearly all readings are written in, degrees.
    pub fn step_deg(self) -> f64 {
        let nearly = |n: u64| n * 50 >= self.readings * 49;
        if nearly(self.wholes) {
            1.0
        } else if nearly(self.halves) {
            0.5
        } else {
            0.1
        }
    }
}

/// A row kept whole, as it was written: it is worked again when it is looked at.
#[derive(Debug, Clone)]
pub struct Kept {
    order: u64,
    number: u64,
    zone: Option<Zone>,
    observation: Observation,
    logged: Logged,
    card: Option<CardFigure>,
    /// Index of gyro and repeater among the vessel's.
    pub gyro: u8,
}

impl Kept {
    /// The row worked.
    pub fn work(&self, limits: &Limits) -> Worked {
        work(&self.observation, None, limits)
    }

    /// The row again, without names.
    pub fn row<'a>(&'a self, worked: &'a Worked) -> Row<'a> {
        Row {
            number: self.number,
            names: Names { vessel: "", gyro: "", repeater: "", magnetic_compass: "" },
            moment: self.observation.moment,
            place: self.observation.place,
            zone: self.zone,
            observation: Some(&self.observation),
            remarks: "",
            logged: &self.logged,
            card: self.card,
            worked,
        }
    }
}

/// A number that scatters rows evenly and is the same on every machine (the finalizer of SplitMix64).
fn scattered(mut z: u64) -> u64 {
    z = (z ^ (z >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
    z = (z ^ (z >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
    z ^ (z >> 31)
}

impl<'a> Learn<'a> {
    /// Nothing learned yet.
    pub fn new(limits: &'a Limits) -> Self {
        Self { limits, vessels: Vec::new(), by_name: HashMap::new(), queries: Vec::new(), late: BTreeSet::new() }
    }

    /// Says that a row was entered after its time, as a correction is: its place in the file says nothing of order and track.
    pub fn late(&mut self, number: u64) {
        self.late.insert(number);
    }

    /// Place of a vessel, made where it is new.
    fn place_of(&mut self, vessel: &str) -> usize {
        if let Some(at) = self.by_name.get(vessel) {
            return *at;
        }
        self.vessels.push(Logbook { name: vessel.to_owned(), ..Logbook::default() });
        self.by_name.insert(vessel.to_owned(), self.vessels.len() - 1);
        self.vessels.len() - 1
    }

    /// Learns one row.
    pub fn feed(&mut self, row: &Row) {
        let at = self.place_of(row.names.vessel);
        self.queries.clear();
        row_queries(row, Route::Either, self.limits, &mut self.queries, &mut Vec::new());
        let unrounded = unrounded(row, &self.queries);
        let wild = row.worked.gyro_error.is_some_and(|g| g.value.deg().abs() > WILD_DEG);
        let affected =
            !unrounded && (wild || self.queries.iter().any(|q| !matches!(q, Query::TooHigh { .. } | Query::ReasonDoubtful { .. })));
        if let Some(vessel) = self.vessels.get_mut(at) {
            vessel.unrounded += u64::from(unrounded);
            if let Some((by_bearing, either)) = comes_out(row, self.limits) {
                vessel.by_bearing += u64::from(by_bearing);
                vessel.by_headings_only += u64::from(either && !by_bearing);
            }
            vessel.feed(row, affected);
        }
    }

    /// Adds what was learned of the rows that follow.
    pub fn join(&mut self, mut later: Learn) {
        self.late.append(&mut later.late);
        for book in later.vessels {
            let at = self.place_of(&book.name);
            if let Some(vessel) = self.vessels.get_mut(at) {
                vessel.join(book);
            }
        }
    }

    /// What the rows say together, worked out on that many threads; the same on any number.
    pub fn finish(self, threads: NonZeroUsize) -> Fleet {
        let mut books: Vec<Mutex<Option<Logbook>>> = self.vessels.into_iter().map(|b| Mutex::new(Some(b))).collect();
        let (limits, late) = (self.limits, &self.late);
        let next = AtomicUsize::new(0);
        // The longest first, lest the last thread sits over it alone.
        let mut order: Vec<usize> = (0..books.len()).collect();
        order.sort_by_key(|&i| std::cmp::Reverse(books.get_mut(i).and_then(|b| Some(b.get_mut().ok()?.as_ref()?.facts.len()))));
        let work = || {
            let mut done = Vec::new();
            while let Some(&at) = order.get(next.fetch_add(1, Ordering::Relaxed)) {
                let book = books.get(at).and_then(|b| b.lock().unwrap_or_else(PoisonError::into_inner).take());
                done.extend(book.map(|b| (at, Vessel::of(b, late, limits))));
            }
            done
        };
        let mut vessels = std::thread::scope(|scope| {
            let others: Vec<_> = (1..threads.get().min(order.len())).map(|_| scope.spawn(work)).collect();
            let mut all = work();
            for other in others {
                match other.join() {
                    Ok(done) => all.extend(done),
                    Err(cause) => std::panic::resume_unwind(cause),
                }
            }
            all
        });
        vessels.sort_by_key(|(at, _)| *at);
        Fleet::new(vessels.into_iter().map(|(_, v)| v).collect(), self.by_name, limits.clone())
    }
}

/// Index of a name among `names`, added where it is new; the last one where there are more than can be told apart.
fn index<T>(names: &mut Vec<T>, same: impl Fn(&T) -> bool, make: impl FnOnce() -> T) -> u8 {
    let at = names.iter().position(same).unwrap_or_else(|| {
        if names.len() < MOST_COMPASSES {
            names.push(make());
        }
        names.len() - 1
    });
    at as u8
}

impl Logbook {
    /// How the vessel works its compass errors.
    pub fn route(&self) -> Route {
        if self.by_bearing >= 8 && self.by_headings_only * 5 < self.by_bearing { Route::Bearing } else { Route::Either }
    }

    fn feed(&mut self, row: &Row, affected: bool) {
        let names = row.names;
        // An entry without an observation names no compass of its own.
        let (gyro, compass) = if row.observation.is_some() {
            let make = || (names.gyro.to_owned(), names.repeater.to_owned());
            let gyro = index(&mut self.gyros, |(g, r)| g == names.gyro && r == names.repeater, make);
            (gyro, index(&mut self.compasses, |c| c == names.magnetic_compass, || names.magnetic_compass.to_owned()))
        } else {
            (0, 0)
        };
        if self.facts.len() == self.facts.capacity() {
            // By an eighth, not by doubling: of ten million rows hardly more than they need is held.
            self.facts.reserve_exact((self.facts.len() / 8).max(LEAST_ROOM));
        }
        self.facts.push(Fact::of(row, gyro, compass, affected));
        // Without a time, rows of the same readings are nothing odd; and neither is a second "overcast".
        if let (Some(moment), Some(observation)) = (row.moment, row.observation) {
            self.repeats.extend(self.prints.push(fingerprint(moment, observation), row.number));
        }
        let Some(observation) = row.observation else { return };
        self.observations += 1;
        self.other_gyro |= observation.gyro_type == GyroType::Other;
        self.has_speed |= observation.speed_kn.is_some();
        self.gyro_steps.add(observation.gyro_bearing, |b| b.deg());
        self.compass_steps.add(observation.compass_bearing, |b| b.deg());
        if let (Some(written), Some(field)) = (row.logged.variation, row.worked.field)
            && self.variations.len() < FIGURES
        {
            let off = crate::angle::wrap_180_deg(written.value - field.variation.deg());
            self.variations.push((off as f32, field.annual.variation_deg as f32));
        }
        if let (Some(card), Some(deviation)) = (row.card, row.worked.deviation.or(row.worked.deviation_by_comparison))
            && self.against_card.len() < FIGURES
        {
            let off = crate::angle::wrap_180_deg(deviation.value.deg() - card.deviation_deg);
            let day = row.moment.map_or(0, |m| m.utc.unix_ms().div_euclid(86_400_000) as i32);
            self.against_card.push((compass, off as f32, day));
        }
        if affected {
            self.affected += 1;
            self.keep(row, observation, gyro);
        }
    }

    /// Keeps an even sample of the affected rows, the same whatever their order.
    fn keep(&mut self, row: &Row, observation: &Observation, gyro: u8) {
        let order = scattered(row.number);
        self.keep_as(order, || Kept {
            order,
            number: row.number,
            zone: row.zone,
            observation: *observation,
            logged: *row.logged,
            card: row.card,
            gyro,
        });
    }

    fn keep_as(&mut self, order: u64, kept: impl FnOnce() -> Kept) {
        if self.sample.len() >= SAMPLE {
            match self.sample.last() {
                Some(last) if last.order > order => self.sample.pop(),
                _ => return,
            };
        }
        let at = self.sample.partition_point(|k| k.order < order);
        self.sample.insert(at, kept());
    }

    /// Adds what was learned of the vessel's rows that follow.
    fn join(&mut self, mut later: Self) {
        if self.facts.is_empty() {
            // The first of a vessel's rows.
            *self = later;
            return;
        }
        let gyros: Vec<u8> = later.gyros.drain(..).map(|name| index(&mut self.gyros, |have| *have == name, || name.clone())).collect();
        let compasses: Vec<u8> =
            later.compasses.drain(..).map(|name| index(&mut self.compasses, |have| *have == name, || name.clone())).collect();
        let renamed = |names: &[u8], at: u8| names.get(usize::from(at)).copied().unwrap_or(0);
        let room = self.facts.capacity() - self.facts.len();
        if room < later.facts.len() {
            // By an eighth, not by doubling: of ten million rows hardly more than they need is held.
            self.facts.reserve_exact(later.facts.len().max(self.facts.len() / 8));
        }
        self.facts.extend(later.facts.iter().map(|fact| fact.renamed(renamed(&gyros, fact.gyro), renamed(&compasses, fact.compass()))));
        self.repeats.append(&mut later.repeats);
        self.prints.join(later.prints, &mut self.repeats);
        self.observations += later.observations;
        self.affected += later.affected;
        self.unrounded += later.unrounded;
        self.by_bearing += later.by_bearing;
        self.by_headings_only += later.by_headings_only;
        self.gyro_steps.join(later.gyro_steps);
        self.compass_steps.join(later.compass_steps);
        self.other_gyro |= later.other_gyro;
        self.has_speed |= later.has_speed;
        let free = FIGURES.saturating_sub(self.variations.len());
        self.variations.extend(later.variations.iter().take(free));
        let free = FIGURES.saturating_sub(self.against_card.len());
        self.against_card.extend(later.against_card.iter().take(free).map(|&(c, off, day)| (renamed(&compasses, c), off, day)));
        for kept in later.sample {
            self.keep_as(kept.order, || Kept { gyro: renamed(&gyros, kept.gyro), ..kept });
        }
    }
}

/// Time and readings, scattered.
fn fingerprint(moment: Moment, o: &Observation) -> u64 {
    let mut hash = scattered(moment.utc.unix_ms() as u64);
    let mut add = |v: Option<f64>| hash = scattered(hash ^ v.map_or(u64::MAX, f64::to_bits));
    add(o.gyro_bearing.map(|b| b.value.deg()));
    add(o.compass_bearing.map(|b| b.value.deg()));
    add(o.gyro_heading.map(|b| b.value.deg()));
    add(o.compass_heading.map(|b| b.value.deg()));
    add(o.place.map(|p| p.position.lat.deg()));
    add(o.place.map(|p| p.position.lon.deg()));
    hash
}
