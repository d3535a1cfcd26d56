//! A log as rows, read with the library's readers of text.

use shadowpin::angle::text as angle;
use shadowpin::angle::{CompassBearing, GyroBearing, Position, Reading, TrueBearing};
use shadowpin::compass::{HorizonKind, Observation, Place, Target, work};
use shadowpin::horizon::{Limb, RisingOrSetting};
use shadowpin::limits::Limits;
use shadowpin::review::{CardFigure, Fleet, Learn, Logged, Names, Row, Verdict, Written, judge};
use shadowpin::sky::Body;
use shadowpin::time::{self, Moment, Zone};
use std::collections::HashMap;

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
}

/// Reads a whole log; a cell that cannot be read is an error of the test.
pub fn read(text: &str) -> Vec<Read> {
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let header: Vec<String> = reader.headers().unwrap().iter().map(str::to_owned).collect();
    reader
        .records()
        .enumerate()
        .map(|(at, record)| {
            let record = record.unwrap();
            let cells: HashMap<&str, &str> =
                header.iter().map(String::as_str).zip(record.iter()).filter(|(_, cell)| !cell.is_empty()).collect();
            row(at as u64 + 1, &cells)
        })
        .collect()
}

fn row(number: u64, cells: &HashMap<&str, &str>) -> Read {
    let cell = |name: &str| cells.get(name).copied().unwrap_or("");
    let number_of = |name: &str| cells.get(name).map(|c| c.parse::<f64>().unwrap());
    let direction = |name: &str| cells.get(name).map(|c| angle::read_direction(c).unwrap());
    let written = |name: &str| {
        cells.get(name).map(|c| {
            let decimals = c.split_once('.').map_or(0, |(_, d)| d.len() as i32);
            Written { deg: c.parse::<f64>().unwrap(), step_deg: 10_f64.powi(-decimals) }
        })
    };
    let zone = cells.get("zone").map(|z| time::text::read_zone(z).unwrap());
    let moment = cells.get("utc").map(|t| time::text::read_utc(t).unwrap()).or_else(|| {
        let (date, clock) = time::text::read_date_time(cells.get("ship_time")?, time::text::DateOrder::Iso).unwrap();
        Some(time::text::moment(date, clock, zone?).unwrap())
    });
    let place =
        number_of("lat").zip(number_of("lon")).map(|(lat, lon)| Place { position: Position::from_deg(lat, lon).unwrap(), step_deg: 0.001 });
    let body = cells.get("body").map(|b| Body::from_name(b).unwrap());
    let target = match (cell("method"), body) {
        ("none", _) => None,
        ("comparison", _) => Some(Target::Headings),
        ("transit", _) => {
            direction("charted_bearing").map(|b| Target::Mark { charted: TrueBearing::wrapping_deg(b.value), step_deg: b.step_deg })
        }
        ("rising" | "setting", Some(body)) => Some(Target::OnHorizon {
            body,
            event: if cell("method") == "rising" { RisingOrSetting::Rising } else { RisingOrSetting::Setting },
            horizon: if cell("horizon") == "visible" { HorizonKind::Visible(Limb::Centre) } else { HorizonKind::Celestial },
        }),
        (_, body) => body.map(Target::Body),
    };
    let gyro = |name: &str| direction(name).map(|r: Reading<f64>| r.map(GyroBearing::wrapping_deg));
    let compass = |name: &str| direction(name).map(|r: Reading<f64>| r.map(CompassBearing::wrapping_deg));
    let observation = target.map(|target| Observation {
        moment,
        place,
        gyro_bearing: gyro("gyro_bearing"),
        compass_bearing: compass("compass_bearing"),
        gyro_heading: gyro("gyro_heading"),
        compass_heading: compass("compass_heading"),
        speed_kn: number_of("speed_kn"),
        eye_height_m: number_of("eye_height_m"),
        ..Observation::of(target)
    });
    Read {
        number,
        vessel: cell("vessel").to_owned(),
        gyro: cell("gyro").to_owned(),
        repeater: cell("repeater").to_owned(),
        compass: cell("magnetic_compass").to_owned(),
        remarks: cell("remarks").to_owned(),
        moment,
        place,
        zone,
        observation,
        logged: Logged {
            azimuth: written("logged_azimuth"),
            gyro_error: written("logged_gyro_error"),
            compass_error: written("logged_compass_error"),
            variation: written("logged_variation"),
            deviation: written("logged_deviation"),
        },
    }
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
    let mut learn = Learn::new(limits.clone());
    for row in rows {
        row.with_card(None, limits, card(row), |r| learn.feed(r));
    }
    let fleet = learn.finish();
    let verdicts = rows.iter().map(|row| row.with_card(Some(&fleet), limits, card(row), |r| judge(r, &fleet))).collect();
    (fleet, verdicts)
}
