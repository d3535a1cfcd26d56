//! What makes a single bearing doubtful before any other row is looked at: a body that could not have been seen.

use super::observation::{Observation, Target};
use super::work::Worked;
use crate::horizon::altitude_deg;
use crate::limits::Limits;
use crate::notice::Notice;
use crate::sky::{self, Body, Planet};

/// Notices for a bearing worked alone: the body below the horizon, or a star or planet by day.
///
/// In a review the same are queries, for there the neighbours can say what happened.
pub fn doubts(observation: &Observation, worked: &Worked, limits: &Limits) -> Vec<Notice> {
    let mut notices = Vec::new();
    let (Target::Body(body), Some(seen)) = (observation.target, worked.at_time) else { return notices };
    let t = &limits.thresholds;
    if seen.altitude_deg < t.below_horizon_deg {
        notices.push(Notice::BelowHorizon { altitude_deg: seen.altitude_deg });
    }
    if let (Some(magnitude), Some(moment), Some(place)) = (body.magnitude(), observation.moment, observation.place) {
        let sun_altitude_deg = altitude_deg(&sky::apparent_place(Body::Sun, moment.utc), place.position);
        let limit_deg = if magnitude <= 0.0 { t.not_dark_bright_deg } else { t.not_dark_faint_deg };
        if sun_altitude_deg > limit_deg {
            let venus = body == Body::Planet(Planet::Venus);
            notices.push(if venus { Notice::VenusByDay { sun_altitude_deg } } else { Notice::NotDark { sun_altitude_deg } });
        }
    }
    notices
}
