//! Sentences that set a single observation's errors beside what is expected of them: the speed error, the limits.

use crate::angle::text::write::{east_west, low_high};
use crate::compass::gyro::limit::{Against, deviation_against, gyro_against, gyro_limit_deg};
use crate::compass::gyro::speed::{EquatorSpeed, speed_error, speed_verdict};
use crate::compass::{GyroType, Observation, Worked};
use crate::limits::Limits;

/// Every sentence that the readings allow: the speed error to expect were the corrector off, the gyro error and the deviation
/// against their limits.
pub fn sentences(observation: &Observation, worked: &Worked, limits: &Limits) -> Vec<String> {
    let mut said = Vec::new();
    said.extend(speed(observation, worked));
    said.extend(gyro(observation, worked, limits));
    said.extend(deviation(worked, limits));
    said
}

fn speed(observation: &Observation, worked: &Worked) -> Option<String> {
    let (speed_kn, place, observed) = (observation.speed_kn?, observation.place?, worked.gyro_error?);
    if observation.gyro_type == GyroType::Other {
        return None;
    }
    let course = worked.true_heading?;
    let expected = speed_error(speed_kn, course, place.position.lat, EquatorSpeed::Handbook)?;
    let verdict = speed_verdict(observation.gyro_type, observed.value, observed.u_deg(), expected);
    Some(format!("Speed error at {speed_kn} kn on that course, were the corrector off: {}; {}.", low_high(expected.deg()), verdict.words()))
}

fn gyro(observation: &Observation, worked: &Worked, limits: &Limits) -> Option<String> {
    let (latitude, error) = (observation.place?.position.lat, worked.gyro_error?);
    let against = gyro_against(error.value, error.u_deg(), latitude, limits);
    Some(format!("Gyro error {} the limit of {:.1} for that latitude.", words(against), gyro_limit_deg(latitude, limits)))
}

fn deviation(worked: &Worked, limits: &Limits) -> Option<String> {
    // A bearing read on the compass says more than a comparison of headings.
    let figure = worked.deviation.or(worked.deviation_by_comparison)?;
    let against = deviation_against(figure.value, figure.u_deg(), limits);
    Some(format!("Deviation {} {} the limit of {:.1}.", east_west(figure.value.deg()), words(against), limits.thresholds.deviation_deg))
}

fn words(against: Against) -> &'static str {
    match against {
        Against::Inside => "is inside",
        Against::MayBeOver => "may be over",
        Against::Over => "is over",
    }
}
