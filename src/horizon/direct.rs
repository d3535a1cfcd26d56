//! A crossing by its hour angle: a few looks at the body instead of a search along the day.

use super::amplitude::{HorizonLine, RisingOrSetting};
use super::events::{HorizonEvent, Target};
use crate::angle::{Position, wrap_180_deg};
use crate::sky::ApparentPlace;
use crate::time::UtcInstant;

/// The sky turns a degree in this time, seconds.
const SECONDS_PER_DEG: f64 = 240.0;
/// Where the hour angle's cosine is beyond this the body grazes the altitude, and the search along the day is safer.
const GRAZING: f64 = 0.97;
/// Further than this from the time asked about, hours, another crossing may be as near.
const NEAREST_H: f64 = 11.4;
/// So near the hour angle is good enough, and the altitude itself is followed, seconds.
const NEAR_S: f64 = 5.0;
/// Instants are kept in milliseconds.
const THERE_S: f64 = 0.001;
/// Rounds of each kind; the moon, slower by 3.5 % than the sky, needs four.
const MOST_ROUNDS: usize = 8;
/// Left of the altitude at the end, degrees: the search along the day leaves as little.
const LEFT_DEG: f64 = 1e-5;

/// The crossing nearest to `about`; `None` where this way is not sure of it.
pub fn nearest(
    place: impl Fn(UtcInstant) -> ApparentPlace,
    position: Position,
    target: Target,
    event: RisingOrSetting,
    about: UtcInstant,
) -> Option<HorizonEvent> {
    let (sin_lat, cos_lat) = position.lat.deg().to_radians().sin_cos();
    let rising = event == RisingOrSetting::Rising;
    let (mut utc, mut seen) = (about, place(about));
    let mut by_hour_angle = true;
    for _ in 0..2 * MOST_ROUNDS {
        let altitude = geocentric_altitude_deg(target, &seen).to_radians();
        let (sin_dec, cos_dec) = seen.declination_deg.to_radians().sin_cos();
        let cos_hour_angle = (altitude.sin() - sin_lat * sin_dec) / (cos_lat * cos_dec);
        // Not-a-number, at a pole, is refused as well.
        if !(-GRAZING..GRAZING).contains(&cos_hour_angle) {
            return None;
        }
        let hour_angle = cos_hour_angle.acos();
        let seconds = if by_hour_angle {
            let there = if rising { -hour_angle.to_degrees() } else { hour_angle.to_degrees() };
            wrap_180_deg(there - seen.gha_deg - position.lon.deg()) * SECONDS_PER_DEG
        } else {
            // d(altitude) = cos lat cos dec sin(hour angle) / cos(altitude) x d(hour angle), up in the east.
            let rate = cos_lat * cos_dec * hour_angle.sin() / altitude.cos() / SECONDS_PER_DEG;
            -target.excess_deg(&seen, position) / if rising { rate } else { -rate }
        };
        utc = utc.plus_seconds(seconds).ok()?;
        if utc.seconds_since(about).abs() > NEAREST_H * 3600.0 {
            return None;
        }
        seen = place(utc);
        if !by_hour_angle && seconds.abs() < THERE_S {
            return (target.excess_deg(&seen, position).abs() < LEFT_DEG).then_some(HorizonEvent { utc, event, place: seen });
        }
        by_hour_angle &= seconds.abs() > NEAR_S;
    }
    None
}

/// The centre's altitude as from the earth's centre, to a hundredth of the parallax.
fn geocentric_altitude_deg(target: Target, place: &ApparentPlace) -> f64 {
    match target {
        Target::Horizon(HorizonLine::Celestial) => 0.0,
        Target::Horizon(line) => line.centre_altitude_deg(place.semidiameter_deg) + place.horizontal_parallax_deg,
        Target::CentreAltitude { altitude_deg } => altitude_deg + place.horizontal_parallax_deg * altitude_deg.to_radians().cos(),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::horizon::Limb;
    use crate::horizon::events::{Search, nearest_along};
    use crate::sky::{self, Body};

    /// Against the search along the day, over a year, in both hemispheres, on both horizons.
    #[test]
    fn as_by_the_search_along_the_day() {
        let (mut direct, mut all) = (0, 0);
        for day in 0..73_i64 {
            for lat in [-66.0, -41.0, -8.0, 0.0, 17.0, 35.0, 58.0] {
                for (event, line) in [
                    (RisingOrSetting::Rising, HorizonLine::Celestial),
                    (RisingOrSetting::Setting, HorizonLine::Visible { limb: Limb::Upper, eye_height_m: 18.0 }),
                ] {
                    for body in [Body::Sun, Body::Moon] {
                        let utc = UtcInstant::from_unix_ms(1_767_225_600_000 + day * 432_123_457).unwrap();
                        let position = Position::from_deg(lat, wrap_180_deg(130.0 - 7.0 * day as f64)).unwrap();
                        let place = |t| sky::apparent_place(body, t);
                        let target = Target::Horizon(line);
                        all += 1;
                        let Some(found) = nearest(place, position, target, event, utc) else { continue };
                        let Search::At(along) = nearest_along(place, position, target, event, utc) else {
                            panic!("{body:?} {lat} {day}: none along the day");
                        };
                        direct += 1;
                        assert!(found.utc.seconds_since(along.utc).abs() < 0.02, "{body:?} {lat} {day}");
                    }
                }
            }
        }
        assert!(direct * 10 > all * 8, "{direct} of {all}");
    }
}
