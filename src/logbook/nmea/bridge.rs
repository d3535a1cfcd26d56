//! What the stream has said so far.

use super::clock::{ClockCheck, Recorded};
use super::doubt::{Doubt, doubts};
use super::fields::DAY_MS;
use super::fix::{self, Fix};
use super::head::{self, Heading};
use super::latest::{Found, Instants, Latest, Word};
use super::lines::{LineCounts, Lines};
use super::pace::Pace;
use super::refused::{Refusal, Refused};
use super::sentence::{Kind, Sentence, SentenceName, Talker};
use crate::angle::{CompassBearing, GyroBearing, Reading};
use crate::compass::Place;
use crate::limits::Limits;
use crate::time::{Moment, UtcInstant};
use std::time::Duration;

/// What ages are counted to.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Ages {
    /// The last time said in the stream: a recording's data are as old as its last word.
    ByStream,
    /// This moment of the listener, from the same start as the arrivals.
    ByArrival {
        /// The moment.
        now: Duration,
    },
}

/// A listener: fed with the bytes of a stream, it keeps what each talker said last.
///
/// # Example
/// ```
/// use shadowpin::limits::Limits;
/// use shadowpin::logbook::nmea::{Ages, Bridge};
/// use std::time::Duration;
/// let mut bridge = Bridge::new(None);
/// bridge.push(b"$GPZDA,201530.00,04,07,2002,00,00*60\r\n", Duration::ZERO);
/// let found = bridge.found(Ages::ByStream, &Limits::default());
/// assert_eq!(found.time.unwrap().from.to_string(), "GPZDA");
/// assert!(found.position.is_none() && found.refused.is_empty());
/// ```
#[derive(Debug)]
pub struct Bridge {
    lines: Lines,
    heard: Heard,
}

/// Everything but the cutter of lines, which calls into it.
#[derive(Debug, Default)]
struct Heard {
    gyro_talker: Option<Talker>,
    pace: Pace,
    arrived_ms: i64,
    words: u64,
    time: Latest<Moment>,
    position: Latest<Place>,
    gyro_heading: Latest<Reading<GyroBearing>>,
    compass_heading: Latest<Reading<CompassBearing>>,
    speed_kn: Latest<f64>,
    refused: Refused,
}

/// What can be taken from the stream: of each kind the last word of the best talker.
///
/// A stale figure is here too, marked, where there is no fresh one.
#[derive(Debug, Clone, PartialEq)]
pub struct FromBridge {
    /// Time of UTC.
    pub time: Option<Found<Moment>>,
    /// Position.
    pub position: Option<Found<Place>>,
    /// Ship's head by gyro.
    pub gyro_heading: Option<Found<Reading<GyroBearing>>>,
    /// Ship's head by the sensor of a magnetic compass, before its deviation.
    pub compass_heading: Option<Found<Reading<CompassBearing>>>,
    /// Speed over the ground, knots.
    pub speed_kn: Option<Found<f64>>,
    /// What does not agree.
    pub doubts: Vec<Doubt>,
    /// What was refused.
    pub refused: Refused,
    /// What else the stream held.
    pub counts: LineCounts,
}

impl Bridge {
    /// A listener that has heard nothing; `gyro_talker` is whose true heading is the gyro's, HE where none is named.
    pub fn new(gyro_talker: Option<Talker>) -> Self {
        Self { lines: Lines::new(), heard: Heard { gyro_talker, ..Heard::default() } }
    }

    /// Hears `bytes` that arrived at `arrived`, counted from any one start. Sentences may be cut anywhere.
    pub fn push(&mut self, bytes: &[u8], arrived: Duration) {
        self.heard.arrived_ms = i64::try_from(arrived.as_millis()).unwrap_or(i64::MAX);
        let heard = &mut self.heard;
        self.lines.push(bytes, |sentence| heard.hear(sentence));
    }

    /// What can be taken now. What is older than the limits' `nmea_stale_s`, or a heading than `nmea_heading_stale_s`, is marked.
    pub fn found(&self, ages: Ages, limits: &Limits) -> FromBridge {
        let heard = &self.heard;
        let age_s = |at: Instants| match ages {
            Ages::ByStream => heard.pace.is_known().then(|| seconds(heard.pace.gone_ms() - at.stream_ms)),
            Ages::ByArrival { now } => Some(seconds(i64::try_from(now.as_millis()).unwrap_or(i64::MAX).saturating_sub(at.arrived_ms))),
        };
        let (stale_s, heading_stale_s) = (limits.thresholds.nmea_stale_s, limits.thresholds.nmea_heading_stale_s);
        let times = heard.time.in_order(Talker::satellite_rank, stale_s, age_s);
        let positions = heard.position.in_order(Talker::satellite_rank, stale_s, age_s);
        let magnetic_first = |talker: Talker| u8::from(!talker.is_magnetic());
        FromBridge {
            doubts: doubts(&times, &positions, limits.uncertainty.position_nm),
            time: times.first().copied(),
            position: positions.first().copied(),
            gyro_heading: heard.gyro_heading.in_order(|_| 0, heading_stale_s, age_s).first().copied(),
            compass_heading: heard.compass_heading.in_order(magnetic_first, heading_stale_s, age_s).first().copied(),
            speed_kn: heard.speed_kn.in_order(Talker::satellite_rank, stale_s, age_s).first().copied(),
            refused: heard.refused.clone(),
            counts: self.lines.counts_at_end(),
        }
    }
}

impl FromBridge {
    /// The stream's time against this computer's clock, where it said one.
    pub fn clock(&self, computer: UtcInstant, recorded: Recorded) -> Option<ClockCheck> {
        self.time.map(|time| ClockCheck::of(time.value.utc, computer, recorded))
    }
}

impl Heard {
    fn hear(&mut self, bytes: &[u8]) {
        let sentence = match Sentence::read(bytes) {
            Ok(Some(sentence)) => sentence,
            Ok(None) => return,
            Err(why) => return self.refused.count(None, why),
        };
        self.words += 1;
        let name = sentence.name;
        let refused = match name.kind {
            Kind::Zda => self.fix(name, Some((&sentence, 1)), fix::zda(&sentence)),
            Kind::Rmc => self.fix(name, Some((&sentence, 1)), fix::rmc(&sentence)),
            Kind::Gga => self.fix(name, Some((&sentence, 1)), fix::gga(&sentence)),
            Kind::Gll => self.fix(name, Some((&sentence, 5)), fix::gll(&sentence)),
            Kind::Vtg => self.fix(name, None, fix::vtg(&sentence)),
            Kind::Hdt => self.head(name, head::hdt(&sentence, self.gyro_talker)),
            Kind::Ths => self.head(name, head::ths(&sentence, self.gyro_talker)),
            Kind::Hdg => self.head(name, head::hdg(&sentence)),
        };
        if let Err(why) = refused {
            self.refused.count(Some(name), why);
        }
    }

    /// Keeps a time, a position, a speed; `clock` is the sentence and the field of its time of day.
    fn fix(&mut self, name: SentenceName, clock: Option<(&Sentence, usize)>, fix: Result<Fix, Refusal>) -> Result<(), Refusal> {
        let dated = fix.as_ref().ok().and_then(|f| f.time).map(|t| t.utc);
        // Time goes on in a sentence that is not valid, too: that is how a lost fix becomes old.
        let clock = clock.and_then(|(sentence, at)| fix::clock(sentence, at));
        let lag_ms = clock.map_or(0, |time| self.pace.hear(name.talker, i64::from(time.ms).rem_euclid(DAY_MS), dated));
        let fix = fix?;
        let mut at = self.now();
        at.stream_ms -= lag_ms;
        at.arrived_ms -= lag_ms;
        if let Some(value) = fix.time {
            let about = if fix.short_year { "its year has two figures: 1980 to 2079" } else { "" };
            self.time.put(Word { value, from: name, at, count: self.words, about });
        }
        if let Some(value) = fix.place {
            self.position.put(Word { value, from: name, at, count: self.words, about: "" });
        }
        if let Some(value) = fix.speed_kn {
            self.speed_kn.put(Word { value, from: name, at, count: self.words, about: "knots over the ground" });
        }
        Ok(())
    }

    fn head(&mut self, from: SentenceName, heading: Result<Heading, Refusal>) -> Result<(), Refusal> {
        let (at, count) = (self.now(), self.words);
        match heading? {
            Heading::Gyro { heading: value, estimated } => {
                let about = if estimated { "estimated, by its mode" } else { "" };
                self.gyro_heading.put(Word { value, from, at, count, about });
            }
            Heading::Compass(value) => {
                self.compass_heading.put(Word { value, from, at, count, about: "its sensor, before deviation" });
            }
        }
        Ok(())
    }

    fn now(&self) -> Instants {
        Instants { stream_ms: self.pace.gone_ms(), arrived_ms: self.arrived_ms }
    }
}

fn seconds(ms: i64) -> f64 {
    ms.max(0) as f64 / 1000.0
}
