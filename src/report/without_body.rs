//! A bearing of a charted mark, or headings compared, worked and written downwards.

use super::azimuth::{closing, errors};
use super::column::Column;
use super::words;
use crate::angle::text::write::{direction, position};
use crate::compass::{Observation, Target, Worked};
use crate::time::Zone;

/// The working of an observation that no body was needed for; `mark` is the mark's name.
pub fn text(observation: &Observation, worked: &Worked, zone: Option<Zone>, mark: &str, remarks: &[String], with_budget: bool) -> String {
    let mut page = Column::default();
    let what = match observation.target {
        Target::Headings => "Headings compared",
        _ if mark.is_empty() => "Charted mark",
        _ => mark,
    };
    let when = observation.moment.map(|moment| words::when(moment.utc, zone)).unwrap_or_default();
    page.sentence(&format!("{what}   {when}"));
    if let Some(place) = observation.place {
        page.sentence(&position(place.position));
    }
    page.gap();
    errors(&mut page, observation, worked, with_budget);
    if observation.target == Target::Headings {
        let headings = [
            ("gyro heading", observation.gyro_heading.map(|h| h.value.deg())),
            ("compass heading", observation.compass_heading.map(|h| h.value.deg())),
        ];
        for (name, deg) in headings.into_iter().filter_map(|(name, deg)| Some((name, deg?))) {
            page.line(name, &direction(deg, 1), "");
        }
        page.sentence("The gyro's error was not observed: a review takes it from the gyro's other entries.");
        page.gap();
    }
    closing(&mut page, worked, remarks);
    page.finish()
}
