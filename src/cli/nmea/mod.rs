//! Time, position, heading and speed from the ship's instruments (NMEA 0183). Nothing is ever sent.

mod listen;
mod live;
mod source;

use super::output::{Format, OutputArgs};
use super::when_where::{now, option};
use clap::Args;
use listen::listen;
pub use live::Live;
use shadowpin::angle::text::read_number;
use shadowpin::compass::{Observation, Place};
use shadowpin::error::{BadValue, Error, Result};
use shadowpin::limits::Limits;
use shadowpin::logbook::nmea::{Bridge, ClockCheck, Fill, FromBridge, Item, Talker};
use shadowpin::report::nmea::NmeaPage;
use shadowpin::time::Moment;
use source::Source;
use std::path::PathBuf;
use std::time::Duration;

/// Seconds to listen where none are given.
const WAIT_S: f64 = 5.0;

/// Where the ship's instruments are heard.
#[derive(Debug, Args)]
pub struct NmeaArgs {
    /// Fill in what is not given from the ship's instruments (NMEA 0183): a file, - for standard input, udp:PORT, tcp:HOST:PORT
    #[arg(long, value_name = "SOURCE")]
    nmea: Option<PathBuf>,
    /// How long to listen where the data do not end, seconds (5)
    #[arg(long, value_name = "SECONDS", requires = "nmea", allow_hyphen_values = true)]
    nmea_wait: Option<String>,
    /// Talker whose true heading is the gyro's, such as GP or II, in place of HE
    #[arg(long, value_name = "TALKER", requires = "nmea")]
    nmea_heading: Option<String>,
}

/// What was heard and what became of it.
pub struct Heard {
    name: String,
    found: FromBridge,
    filled: Vec<(Item, Fill)>,
    clock: Option<ClockCheck>,
    /// Sentences to add.
    pub remarks: Vec<String>,
}

impl NmeaArgs {
    /// Whether a source was given.
    pub fn is_given(&self) -> bool {
        self.nmea.is_some()
    }

    /// The file that is read, where it is one.
    pub fn file(&self) -> Option<&PathBuf> {
        self.nmea.as_ref().filter(|path| matches!(Source::of(path), Ok(Source::File(_))))
    }

    /// Listens, and fills what `observation` lacks of the items wanted; `None` where no source was given.
    pub fn fill(&self, observation: &mut Observation, wanted: &[Item], limits: &Limits) -> Result<Option<Heard>> {
        let Some(path) = &self.nmea else { return Ok(None) };
        let source = option("--nmea", Source::of(path))?;
        let wait_s = self.nmea_wait.as_deref().map(|w| option("--nmea-wait", read_number(w, 0.1..=600.0, "seconds, 0.1 to 600")));
        let wait = Duration::from_secs_f64(wait_s.transpose()?.unwrap_or(WAIT_S));
        let talker = self.nmea_heading.as_deref().map(|t| option("--nmea-heading", gyro_talker(t))).transpose()?;
        let lacking: Vec<Item> = wanted.iter().copied().filter(|item| lacks(observation, *item)).collect();

        let mut bridge = Bridge::new(talker);
        let enough = |found: &FromBridge| lacking.iter().all(|item| found.has_fresh(*item));
        let heard = listen(&source, wait, &mut bridge, limits, &enough)?;
        let found = bridge.found(heard.ages, limits);
        let clock = found.clock(now()?, heard.recorded);
        let filled = found.fill(observation, wanted, clock);
        let whole = format!("Listened for the whole {} seconds of --nmea-wait.", wait.as_secs_f64());
        let remarks: Vec<String> = heard.whole_wait.then_some(whole).into_iter().collect();
        Ok(Some(Heard { name: source.to_string(), found, filled, clock, remarks }))
    }
}

impl Heard {
    fn page(&self) -> NmeaPage<'_> {
        NmeaPage { name: &self.name, found: &self.found, filled: &self.filled, clock: self.clock, remarks: &self.remarks }
    }
}

/// Time and place, which no azimuth does without; where they are lacking, why.
pub fn time_and_place(observation: &Observation, heard: Option<&Heard>) -> Result<(Moment, Place)> {
    let lacking = |item: Item| match heard {
        Some(heard) => Error::Content { file: heard.name.clone(), line: 0, message: heard.page().why_not(item) },
        None if item == Item::Time => Error::Usage("give --utc, or --ship-time with --zone".into()),
        None => Error::Usage("give --lat and --lon, or --position".into()),
    };
    let moment = observation.moment.ok_or_else(|| lacking(Item::Time))?;
    Ok((moment, observation.place.ok_or_else(|| lacking(Item::Position))?))
}

/// A text with what was heard under it; with rows and objects, that goes to standard error. What hangs on this computer's
/// clock always goes there, so that a file gives the same answer every day.
pub fn with_its_words(answer: String, heard: Option<&Heard>, output: &OutputArgs) -> String {
    let Some(heard) = heard else { return answer };
    let words = heard.page().text();
    if !output.quiet {
        if output.format != Format::Text {
            eprint!("{words}");
        }
        if let Some(clock @ ClockCheck::Apart { .. }) = heard.clock.filter(|_| heard.filled.contains(&(Item::Time, Fill::Taken))) {
            eprintln!("Notice: {}: {clock}", heard.name);
        }
    }
    if output.format == Format::Text { format!("{}\n\n{words}", answer.trim_end()) } else { answer }
}

fn gyro_talker(text: &str) -> Result<Talker, BadValue> {
    let expected = "the two letters of a talker, such as HE, GP or II";
    let talker = Talker::from_text(text).ok_or_else(|| BadValue::new(text, expected))?;
    if talker.is_magnetic() {
        return Err(BadValue::new(text, expected).hint("that is a magnetic compass, and its true heading is no gyro's"));
    }
    Ok(talker)
}

fn lacks(observation: &Observation, item: Item) -> bool {
    match item {
        Item::Time => observation.moment.is_none(),
        Item::Position => observation.place.is_none(),
        Item::GyroHeading => observation.gyro_heading.is_none(),
        Item::CompassHeading => observation.compass_heading.is_none(),
        Item::Speed => observation.speed_kn.is_none(),
    }
}
