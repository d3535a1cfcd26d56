//! The direction that errors are reckoned from, and how sure it is.

use super::budget::{Budget, step_u};
use super::observation::{HorizonKind, Observation, Place, Target};
use super::work::{OnHorizon, Worked};
use crate::angle::Position;
use crate::horizon::{self, HorizonLine, Horizontal, Motion, RisingOrSetting, Search};
use crate::limits::Limits;
use crate::notice::Notice;
use crate::sky::{self, Body};
use crate::time::Moment;

/// Nautical miles in a degree of latitude.
const NM_PER_DEG: f64 = 60.0;

/// The uncertainty of a computed azimuth from the computed place, degrees: half the bound that the JPL checks hold.
///
/// The bounds are 0.01 for the sun and 0.02 for the others (design of the program; tests `published::jpl_*`).
pub fn almanac_u_deg(body: Body) -> f64 {
    match body {
        Body::Sun => 0.005,
        Body::Moon | Body::Planet(_) | Body::Star(_) => 0.01,
    }
}

/// Fills in the true azimuth, its budget, the body at the time written, and how it stood to its horizon.
pub(super) fn reckon(observation: &Observation, limits: &Limits, worked: &mut Worked) {
    if let Target::Mark { charted, step_deg } = observation.target {
        worked.true_azimuth = Some(charted);
        worked.azimuth_budget.almanac_deg = step_u(step_deg);
        return;
    }
    let (Some(body), Some(moment), Some(place)) = (observation.body(), observation.moment, observation.place) else { return };
    let apparent = sky::apparent_place(body, moment.utc);
    match horizon::horizontal(&apparent, place.position) {
        Ok(at_time) => worked.at_time = Some(at_time),
        Err(reason) => worked.no_azimuth = Some(reason),
    }
    match observation.target {
        Target::OnHorizon { event, horizon, .. } => on_horizon(body, event, horizon, observation, limits, worked),
        _ => {
            let Some(at_time) = worked.at_time else { return };
            worked.true_azimuth = Some(at_time.azimuth);
            worked.sighted_altitude_deg = Some(at_time.altitude_deg);
            worked.azimuth_budget = at_time_budget(body, &apparent, moment, place, limits);
        }
    }
}

/// The larger of what the clock is good for and the step it is written in.
fn time_u_s(moment: Moment, limits: &Limits) -> f64 {
    limits.uncertainty.time_s.max(step_u(moment.step_s))
}

/// Uncertainty of latitude and of longitude, degrees: the larger of the set one and the step written.
fn position_u_deg(place: Place, limits: &Limits) -> (f64, f64) {
    let (set_deg, written_deg) = (limits.uncertainty.position_nm / NM_PER_DEG, step_u(place.step_deg));
    let cos_lat = place.position.lat.deg().to_radians().cos().max(1e-6);
    (set_deg.max(written_deg), (set_deg / cos_lat).max(written_deg))
}

fn at_time_budget(body: Body, apparent: &sky::ApparentPlace, moment: Moment, place: Place, limits: &Limits) -> Budget {
    let motion = match body {
        Body::Sun => Motion::SUN,
        Body::Moon => Motion::MOON,
        Body::Planet(_) | Body::Star(_) => Motion::STAR,
    };
    let (lat_u, lon_u) = position_u_deg(place, limits);
    // There is an azimuth, so there are derivatives.
    let Ok(rate) = horizon::sensitivity(apparent, place.position, motion) else { return Budget::default() };
    Budget {
        time_deg: rate.azimuth_deg_per_s.abs() * time_u_s(moment, limits),
        position_deg: (rate.azimuth_per_latitude * lat_u).hypot(rate.azimuth_per_longitude * lon_u),
        almanac_deg: almanac_u_deg(body),
        ..Budget::default()
    }
}

fn on_horizon(body: Body, event: RisingOrSetting, kind: HorizonKind, observation: &Observation, limits: &Limits, worked: &mut Worked) {
    let (Some(moment), Some(place)) = (observation.moment, observation.place) else { return };
    let line = match kind {
        HorizonKind::Celestial => HorizonLine::Celestial,
        HorizonKind::Visible(limb) => HorizonLine::Visible { limb, eye_height_m: eye_height_m(observation, limits, worked) },
    };
    let target = horizon::Target::Horizon(line);
    let place_of = |utc| sky::apparent_place(body, utc);
    let off_deg = target.excess_deg(&place_of(moment.utc), place.position);
    let search = horizon::nearest_event(place_of, place.position, target, event, moment.utc);
    worked.on_horizon = Some(OnHorizon { search, off_deg });
    let Search::At(crossing) = search else { return };
    match horizon::horizontal(&crossing.place, place.position) {
        Ok(Horizontal { azimuth, .. }) => {
            worked.true_azimuth = Some(azimuth);
            worked.sighted_altitude_deg = Some(0.0);
            worked.azimuth_budget = horizon_budget(body, azimuth.deg(), kind, observation, place, limits);
            let per_degree = horizon::azimuth_per_altitude_on_horizon(place.position.lat, azimuth);
            if per_degree.abs() > limits.thresholds.horizon_weak {
                worked.notices.push(Notice::HorizonWeak { degrees_per_degree: per_degree.abs() });
            }
        }
        Err(reason) => worked.no_azimuth = Some(reason),
    }
}

fn eye_height_m(observation: &Observation, limits: &Limits, worked: &mut Worked) -> f64 {
    observation.eye_height_m.unwrap_or_else(|| {
        let height_m = limits.uncertainty.eye_height_assumed_m;
        worked.notices.push(Notice::EyeHeightAssumed { height_m });
        height_m
    })
}

/// On the horizon the azimuth hangs on latitude and altitude, hardly on time.
fn horizon_budget(body: Body, azimuth_deg: f64, kind: HorizonKind, observation: &Observation, place: Place, limits: &Limits) -> Budget {
    let Position { lat, .. } = place.position;
    let (lat_u, _) = position_u_deg(place, limits);
    let tan_lat = lat.deg().to_radians().tan();
    let (sin_z, cos_z) = azimuth_deg.to_radians().sin_cos();
    // Due north or south the body grazes the horizon; a hundredth stands in for the division by nothing.
    let sin_z = sin_z.abs().max(0.01);
    let dip_u_deg = match (kind, observation.eye_height_m) {
        (HorizonKind::Visible(_), None) => {
            let (height, u) = (limits.uncertainty.eye_height_assumed_m, limits.uncertainty.eye_height_assumed_u_m);
            (horizon::dip_deg(height + u) - horizon::dip_deg((height - u).max(0.0))) / 2.0
        }
        _ => 0.0,
    };
    let instant_u_deg = limits.uncertainty.horizon_instant_deg.hypot(dip_u_deg);
    Budget {
        position_deg: (tan_lat * cos_z / sin_z).abs() * lat_u,
        instant_deg: (tan_lat / sin_z).abs() * instant_u_deg,
        almanac_deg: almanac_u_deg(body),
        ..Budget::default()
    }
}
