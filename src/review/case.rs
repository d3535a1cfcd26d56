//! What would have been so, and what would have been worked, if a slip had been made.

use super::checks::sun_altitude_deg;
use super::row::Row;
use crate::angle::{Position, wrap_180_deg, wrap_360_deg};
use crate::compass::{HorizonKind, Target, field};
use crate::horizon::{self, HorizonLine, RisingOrSetting, triangle};
use crate::limits::Limits;
use crate::sky::{self, Body};
use crate::time::UtcInstant;
use std::cell::RefCell;

/// The sky turns a degree in this time, seconds.
const SECONDS_PER_DEG: f64 = 240.0;

/// The figures that an azimuth and the errors hang on; directions in degrees.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Sight {
    pub utc: Option<UtcInstant>,
    pub position: Option<Position>,
    pub target: Target,
    pub eye_height_m: f64,
    pub gyro: Option<f64>,
    pub compass: Option<f64>,
    pub gyro_heading: Option<f64>,
    pub compass_heading: Option<f64>,
}

/// A body as it would have stood.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Look {
    /// Degrees.
    pub azimuth: f64,
    /// Altitude at the time, degrees; `None` for a mark or headings.
    pub altitude: Option<f64>,
    /// Degrees from the horizon of its rising or setting.
    pub off_horizon: Option<f64>,
}

impl Sight {
    /// As the row is written.
    pub fn of(row: &Row, limits: &Limits) -> Option<Self> {
        let o = row.observation?;
        Some(Self {
            utc: row.moment.map(|m| m.utc),
            position: row.place.map(|p| p.position),
            target: o.target,
            eye_height_m: o.eye_height_m.unwrap_or(limits.uncertainty.eye_height_assumed_m),
            gyro: o.gyro_bearing.map(|b| b.value.deg()),
            compass: o.compass_bearing.map(|b| b.value.deg()),
            gyro_heading: o.gyro_heading.map(|b| b.value.deg()),
            compass_heading: o.compass_heading.map(|b| b.value.deg()),
        })
    }

    pub fn body(&self) -> Option<Body> {
        match self.target {
            Target::Body(body) | Target::OnHorizon { body, .. } => Some(body),
            _ => None,
        }
    }

    /// The horizon of a rising or setting.
    fn line(&self, kind: HorizonKind) -> HorizonLine {
        match kind {
            HorizonKind::Celestial => HorizonLine::Celestial,
            HorizonKind::Visible(limb) => HorizonLine::Visible { limb, eye_height_m: self.eye_height_m },
        }
    }

    /// The direction that errors are reckoned from; `None` where there is none.
    pub fn look(&self) -> Option<Look> {
        match self.target {
            Target::Mark { charted, .. } => Some(Look { azimuth: charted.deg(), altitude: None, off_horizon: None }),
            Target::Headings => None,
            Target::Body(body) => {
                let at = horizon::horizontal(&sky::apparent_place(body, self.utc?), self.position?).ok()?;
                Some(Look { azimuth: at.azimuth.deg(), altitude: Some(at.altitude_deg), off_horizon: None })
            }
            Target::OnHorizon { body, event, horizon: kind } => self.look_on_horizon(body, event, self.line(kind)),
        }
    }

    /// On the horizon nearest in time. The hour angle there leads to the instant, and the declination at that instant to the hour
    /// angle: two rounds bring the sun's azimuth to 0.01 degrees, four the moon's to 0.05, a hundred times faster than a search along
    /// the day; where a body only grazes the horizon it may be missed.
    fn look_on_horizon(&self, body: Body, event: RisingOrSetting, line: HorizonLine) -> Option<Look> {
        let (utc, position) = (self.utc?, self.position?);
        let target = horizon::Target::Horizon(line);
        let mut place = sky::apparent_place(body, utc);
        let off = target.excess_deg(&place, position);
        let (sin_lat, cos_lat) = position.lat.deg().to_radians().sin_cos();
        let mut at = utc;
        let rounds = if body == Body::Moon { 4 } else { 2 };
        for round in 0..=rounds {
            // The centre's geocentric altitude there: the parallax of a body on the horizon is all of it.
            let altitude = match line {
                HorizonLine::Celestial => 0.0,
                HorizonLine::Visible { .. } => line.centre_altitude_deg(place.semidiameter_deg) + place.horizontal_parallax_deg,
            };
            let (sin_dec, cos_dec) = place.declination_deg.to_radians().sin_cos();
            let cos_hour_angle = (altitude.to_radians().sin() - sin_lat * sin_dec) / (cos_lat * cos_dec);
            if !(-1.0..=1.0).contains(&cos_hour_angle) {
                return None;
            }
            let hour_angle = cos_hour_angle.acos().to_degrees();
            let there = if event == RisingOrSetting::Rising { -hour_angle } else { hour_angle };
            let turn = wrap_180_deg(there - place.gha_deg - position.lon.deg());
            if round == rounds {
                break;
            }
            // Only the first turn may be a long one; later ones are corrections of a minute or two.
            at = at.plus_seconds(turn * SECONDS_PER_DEG).ok()?;
            place = sky::apparent_place(body, at);
        }
        let azimuth = horizon::horizontal(&place, position).ok()?.azimuth.deg();
        // The other side of the sky is far away, however near the horizon the body stood.
        let off = if at.seconds_since(utc).abs() > 3.0 * 3600.0 { off.abs().max(20.0) } else { off };
        Some(Look { azimuth, altitude: None, off_horizon: Some(off) })
    }

    /// The azimuth with the declination named the other way.
    fn other_declination(&self) -> Option<f64> {
        let (body, utc, position) = (self.body()?, self.utc?, self.position?);
        if let Target::OnHorizon { .. } = self.target {
            // On the horizon: sin amplitude = sin declination / cos latitude, named the other way.
            return Some(180.0 - self.look()?.azimuth);
        }
        let place = sky::apparent_place(body, utc);
        let seen = triangle(position.lat, -place.declination_deg, place.gha_deg + position.lon.deg()).ok()?;
        Some(seen.azimuth.deg())
    }
}

/// A slip in the azimuth once worked.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Turn {
    Declination,
    FromOtherPole,
    OtherSide,
    Reciprocal,
}

/// What is done to the results; as a careful officer has them where nothing is.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Results {
    /// The gyro error's name: 1, or -1 the other way.
    pub gyro_sign: f64,
    /// A subtraction gone wrong by this, degrees.
    pub gyro_by: f64,
    pub compass_sign: f64,
    pub compass_by: f64,
    pub deviation_sign: f64,
    pub deviation_by: f64,
    /// The variation's name as written.
    pub variation_sign: f64,
    /// The variation as applied to the deviation.
    pub applied_sign: f64,
    /// The deviation is what the curve says for the bearing.
    pub card_by_bearing: bool,
}

impl Default for Results {
    fn default() -> Self {
        Self {
            gyro_sign: 1.0,
            gyro_by: 0.0,
            compass_sign: 1.0,
            compass_by: 0.0,
            deviation_sign: 1.0,
            deviation_by: 0.0,
            variation_sign: 1.0,
            applied_sign: 1.0,
            card_by_bearing: false,
        }
    }
}

impl Results {
    /// Both at once.
    #[must_use]
    pub fn and(self, other: Self) -> Self {
        Self {
            gyro_sign: self.gyro_sign * other.gyro_sign,
            gyro_by: self.gyro_by + other.gyro_by,
            compass_sign: self.compass_sign * other.compass_sign,
            compass_by: self.compass_by + other.compass_by,
            deviation_sign: self.deviation_sign * other.deviation_sign,
            deviation_by: self.deviation_by + other.deviation_by,
            variation_sign: self.variation_sign * other.variation_sign,
            applied_sign: self.applied_sign * other.applied_sign,
            card_by_bearing: self.card_by_bearing || other.card_by_bearing,
        }
    }
}

/// What would have been so, and what would have been worked.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Case {
    /// As it was.
    pub so: Sight,
    /// As it was worked.
    pub used: Sight,
    pub turn: Option<Turn>,
    pub results: Results,
    /// Degrees by which an azimuth may be off because the position is only known from the track.
    pub loose_deg: f64,
}

impl Case {
    /// No slip: everything was as written.
    pub fn plain(sight: Sight) -> Self {
        Self { so: sight, used: sight, turn: None, results: Results::default(), loose_deg: 0.0 }
    }

    /// The azimuth that would have been worked, degrees; `look` is that of [`Case::used`].
    pub fn worked_azimuth(&self, look: Option<Look>) -> Option<f64> {
        Some(match self.turn {
            None => look?.azimuth,
            Some(Turn::Declination) => wrap_360_deg(self.used.other_declination()?),
            Some(Turn::FromOtherPole) => wrap_360_deg(180.0 - look?.azimuth),
            Some(Turn::OtherSide) => wrap_360_deg(360.0 - look?.azimuth),
            Some(Turn::Reciprocal) => wrap_360_deg(180.0 + look?.azimuth),
        })
    }
}

/// What has been computed already for one row: most slips share a few times and places.
#[derive(Debug, Default)]
pub struct Memo {
    looks: Known<Option<Look>>,
    fields: Known<Option<(f64, f64)>>,
    suns: Known<f64>,
}

type Key = (Option<UtcInstant>, Option<Position>, Option<Target>);
type Known<T> = RefCell<Vec<(Key, T)>>;

/// The value kept under `key`, the latest first; otherwise made and kept.
fn kept<T: Copy>(list: &Known<T>, key: Key, make: impl FnOnce() -> T) -> T {
    if let Some((_, value)) = list.borrow().iter().rev().find(|(k, _)| *k == key) {
        return *value;
    }
    let value = make();
    list.borrow_mut().push((key, value));
    value
}

impl Memo {
    /// As [`Sight::look`].
    pub fn look(&self, sight: &Sight) -> Option<Look> {
        kept(&self.looks, (sight.utc, sight.position, Some(sight.target)), || sight.look())
    }

    /// Variation and its standard uncertainty, degrees.
    pub fn variation(&self, utc: UtcInstant, position: Position) -> Option<(f64, f64)> {
        kept(&self.fields, (Some(utc), Some(position), None), || {
            field::field(position, utc, 0.0).ok().map(|f| (f.variation.deg(), f.variation_u_deg))
        })
    }

    /// Altitude of the sun, degrees.
    pub fn sun_altitude_deg(&self, utc: UtcInstant, position: Position) -> f64 {
        kept(&self.suns, (Some(utc), Some(position), None), || sun_altitude_deg(utc, position))
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::compass::HorizonKind;
    use crate::horizon::{Limb, Search, nearest_event};

    /// Against the search along the day, over the year, in both hemispheres, on both horizons.
    #[test]
    fn on_the_horizon_as_by_the_search() {
        let mut seen = 0;
        for day in 0..36 {
            for lat in [-62.0, -41.0, -8.0, 0.0, 17.0, 35.0, 55.0] {
                for (event, kind) in
                    [(RisingOrSetting::Rising, HorizonKind::Celestial), (RisingOrSetting::Setting, HorizonKind::Visible(Limb::Upper))]
                {
                    for body in [Body::Sun, Body::Moon] {
                        let utc = UtcInstant::from_unix_ms(1_767_225_600_000 + day * 876_543_210).unwrap();
                        let position = Position::from_deg(lat, 130.0 - 7.0 * day as f64).unwrap();
                        let sight = Sight {
                            utc: Some(utc),
                            position: Some(position),
                            target: Target::OnHorizon { body, event, horizon: kind },
                            eye_height_m: 18.0,
                            gyro: None,
                            compass: None,
                            gyro_heading: None,
                            compass_heading: None,
                        };
                        let target = horizon::Target::Horizon(sight.line(kind));
                        let Search::At(found) = nearest_event(|t| sky::apparent_place(body, t), position, target, event, utc) else {
                            continue;
                        };
                        let long = horizon::horizontal(&found.place, position).unwrap().azimuth.deg();
                        let Some(look) = sight.look() else { continue };
                        // Half a day away either of two is the nearest.
                        if found.utc.seconds_since(utc).abs() < 11.0 * 3600.0 {
                            let bound = if body == Body::Sun { 0.01 } else { 0.05 };
                            // Where it grazes, due north or south, a little time is much azimuth.
                            let bound = bound / long.to_radians().sin().abs();
                            assert!(wrap_180_deg(look.azimuth - long).abs() < bound, "{body:?} {lat} {day}: {} {long}", look.azimuth);
                            seen += 1;
                        }
                    }
                }
            }
        }
        assert!(seen > 700, "{seen}");
    }
}
