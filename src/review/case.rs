//! What would have been so, and what would have been worked, if a slip had been made.

use super::checks::sun_altitude_deg;
use super::row::Row;
use crate::angle::{Position, wrap_360_deg};
use crate::compass::{HorizonKind, Target, field};
use crate::horizon::{self, HorizonLine, RisingOrSetting, Search, triangle};
use crate::limits::Limits;
use crate::sky::{self, Body};
use crate::time::UtcInstant;
use std::cell::RefCell;

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

    /// On the horizon nearest in time.
    fn look_on_horizon(&self, body: Body, event: RisingOrSetting, line: HorizonLine) -> Option<Look> {
        let (utc, position) = (self.utc?, self.position?);
        let target = horizon::Target::Horizon(line);
        let place = |t| sky::apparent_place(body, t);
        let Search::At(crossing) = horizon::nearest_event(place, position, target, event, utc) else { return None };
        let azimuth = horizon::horizontal(&crossing.place, position).ok()?.azimuth.deg();
        let off = target.excess_deg(&place(utc), position);
        // The other side of the sky is far away, however near the horizon the body stood.
        let off = if crossing.utc.seconds_since(utc).abs() > 3.0 * 3600.0 { off.abs().max(20.0) } else { off };
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
