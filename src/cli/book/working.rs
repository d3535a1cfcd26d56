//! The working of an entry, as the commands for single bearings show it.

use super::draft::no_azimuth;
use super::entry_args::EntryArgs;
use shadowpin::compass::{Observation, Target, Worked};
use shadowpin::error::Result;
use shadowpin::horizon::{Search, by_hand, limb_diameters};
use shadowpin::limits::Limits;
use shadowpin::report::amplitude::AmplitudePage;
use shadowpin::report::azimuth::AzimuthPage;
use shadowpin::report::{against, without_body};
use shadowpin::time::{Moment, Zone};

/// The working as text. What has no azimuth is entered all the same, and says why.
pub fn text(
    observation: &Observation,
    worked: &Worked,
    (moment, zone): (Moment, Option<Zone>),
    mark: &str,
    args: &EntryArgs,
    limits: &Limits,
) -> Result<String> {
    let on_card = args.card.on(observation, moment.utc, limits)?;
    let mut remarks = against::sentences(observation, worked, limits);
    remarks.extend(on_card.iter().flat_map(|card| card.sentences(worked)));
    remarks.extend(no_azimuth(worked).map(|reason| format!("No azimuth: {reason}.")));
    let place = match (observation.target, observation.place) {
        (Target::Body(_) | Target::OnHorizon { .. }, Some(place)) => place,
        _ => return Ok(without_body::text(observation, worked, zone, mark, &remarks, args.budget)),
    };
    Ok(match observation.target {
        Target::OnHorizon { body, event, horizon } => {
            let eye_height_m = observation.eye_height_m.unwrap_or(limits.uncertainty.eye_height_assumed_m);
            let limb_diameters = match worked.on_horizon.map(|h| h.search) {
                Some(Search::At(crossing)) => Some(limb_diameters(body, crossing.utc, place.position, eye_height_m)),
                _ => None,
            };
            AmplitudePage {
                body,
                event,
                horizon,
                utc: moment.utc,
                zone,
                position: place.position,
                eye_height_m,
                observation,
                worked,
                limb_diameters,
                ladder: Vec::new(),
                gyro_error: worked.gyro_error.map(|e| e.value),
                remarks,
                with_budget: args.budget,
            }
            .text()
        }
        Target::Body(body) => AzimuthPage {
            body,
            utc: moment.utc,
            zone,
            position: place.position,
            observation,
            worked,
            hand: by_hand(body, moment.utc, place.position),
            remarks,
            with_budget: args.budget,
        }
        .text(),
        Target::Mark { .. } | Target::Headings => String::new(),
    })
}
