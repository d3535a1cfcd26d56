//! A log as rows, read as the command reads it, and owned, so that a test can change one thing of a row.

use shadowpin::compass::{Observation, Place, work};
use shadowpin::limits::Limits;
use shadowpin::logbook::entry::{Faults, Logged, ReadAs, read_entry};
use shadowpin::logbook::log::{LogReader, Record};
use shadowpin::review::{CardFigure, Fleet, Learn, Names, Row, Verdict, judge};
use shadowpin::time::{Moment, Zone};

/// One row as read.
#[derive(Debug, Clone, Default)]
pub struct Read {
    pub number: u64,
    pub vessel: String,
    pub gyro: String,
    pub repeater: String,
    pub compass: String,
    pub remarks: String,
    pub moment: Option<Moment>,
    pub place: Option<Place>,
    pub zone: Option<Zone>,
    pub observation: Option<Observation>,
    pub logged: Logged,
    /// Neither an observation nor an entry that nothing could be had: the command leaves such a row unjudged, as a problem.
    pub problem: bool,
}

/// Reads a whole log; a cell that cannot be read is an error of the test, one that is not there makes the row a problem.
pub fn read(text: &str) -> Vec<Read> {
    let mut log = LogReader::new(text.as_bytes(), "the test's log", false).unwrap();
    let (mut record, mut faults) = (Record::default(), Faults::default());
    let mut rows = Vec::new();
    while let Some(row) = log.next(&mut record).unwrap() {
        faults.clear();
        let entry = read_entry(&row, ReadAs::default(), &mut faults);
        assert!(faults.iter().all(|f| f.bad.value.is_empty()), "row {}: {}", row.number, faults.in_one());
        rows.push(Read {
            number: row.number,
            vessel: entry.vessel.into_owned(),
            gyro: entry.gyro.into_owned(),
            repeater: entry.repeater.into_owned(),
            compass: entry.magnetic_compass.into_owned(),
            remarks: entry.remarks.into_owned(),
            moment: entry.moment,
            place: entry.place,
            zone: entry.zone,
            observation: entry.observation,
            logged: entry.logged,
            problem: entry.observation.is_none() && !entry.nothing_had,
        });
    }
    rows
}

impl Read {
    pub fn names(&self) -> Names<'_> {
        Names { vessel: &self.vessel, gyro: &self.gyro, repeater: &self.repeater, magnetic_compass: &self.compass }
    }

    /// Gives the row, worked, to `each`; with what the fleet knows of the gyro, where it is asked.
    pub fn with<T>(&self, fleet: Option<&Fleet>, limits: &Limits, each: impl FnOnce(&Row) -> T) -> T {
        self.with_card(fleet, limits, None, each)
    }

    fn with_card<T>(&self, fleet: Option<&Fleet>, limits: &Limits, card: Option<CardFigure>, each: impl FnOnce(&Row) -> T) -> T {
        let run = fleet.and_then(|f| f.gyro_run(self.names(), self.number));
        let worked = self.observation.map(|o| work(&o, run, limits)).unwrap_or_default();
        each(&Row {
            number: self.number,
            names: self.names(),
            moment: self.moment,
            place: self.place,
            zone: self.zone,
            observation: self.observation.as_ref(),
            remarks: &self.remarks,
            logged: &self.logged,
            card,
            worked: &worked,
        })
    }
}

/// Both passes.
pub fn review(rows: &[Read], limits: &Limits) -> (Fleet, Vec<Verdict>) {
    review_in(rows, limits, |_| None)
}

/// Both passes, with what a card says of each row.
pub fn review_in(rows: &[Read], limits: &Limits, card: impl Fn(&Read) -> Option<CardFigure>) -> (Fleet, Vec<Verdict>) {
    let mut learn = Learn::new(limits);
    for row in rows.iter().filter(|r| !r.problem) {
        row.with_card(None, limits, card(row), |r| learn.feed(r));
    }
    let fleet = learn.finish(std::num::NonZeroUsize::MIN);
    let judged = |row: &Read| row.with_card(Some(&fleet), limits, card(row), |r| judge(r, &fleet));
    let verdicts = rows.iter().map(|row| if row.problem { Verdict::default() } else { judged(row) }).collect();
    (fleet, verdicts)
}
