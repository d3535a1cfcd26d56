//! What an officer observed: one body or mark, one moment.

use crate::angle::{CompassBearing, GyroBearing, Position, Reading, TrueBearing};
use crate::horizon::{Limb, RisingOrSetting};
use crate::sky::Body;
use crate::time::Moment;

/// A place as written.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Place {
    /// The position.
    pub position: Position,
    /// The step latitude and longitude are written in, degrees.
    pub step_deg: f64,
}

/// The horizon that a rising or setting was observed on.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum HorizonKind {
    /// The body's centre at geocentric altitude 0.
    Celestial,
    /// The part named of the body's disc on the line of sea and sky.
    Visible(Limb),
}

/// What the bearing was taken of.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Target {
    /// A body at the time written.
    Body(Body),
    /// A body as it rose or set.
    OnHorizon {
        /// The body.
        body: Body,
        /// Rising or setting.
        event: RisingOrSetting,
        /// On which horizon.
        horizon: HorizonKind,
    },
    /// A charted mark or range.
    Mark {
        /// Its charted bearing.
        charted: TrueBearing,
        /// The step of that figure, degrees.
        step_deg: f64,
    },
    /// Nothing: headings of gyro and magnetic compass were compared.
    Headings,
}

/// Where the ship was.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum Whereabouts {
    /// Under way at sea.
    #[default]
    Sea,
    /// At anchor.
    Anchor,
    /// Alongside.
    Berth,
}

/// The kind of gyrocompass.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum GyroType {
    /// A spinning gyro: it has a speed error and settles.
    #[default]
    Spinning,
    /// Fibre-optic, satellite: neither.
    Other,
}

/// One observation, as far as it was written down.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Observation {
    /// What was observed.
    pub target: Target,
    /// When; not needed for a charted mark's errors.
    pub moment: Option<Moment>,
    /// Where; not needed for a charted mark's errors.
    pub place: Option<Place>,
    /// Bearing by gyro.
    pub gyro_bearing: Option<Reading<GyroBearing>>,
    /// Bearing by magnetic compass.
    pub compass_bearing: Option<Reading<CompassBearing>>,
    /// Ship's head by gyro at that instant.
    pub gyro_heading: Option<Reading<GyroBearing>>,
    /// Ship's head by magnetic compass at that instant.
    pub compass_heading: Option<Reading<CompassBearing>>,
    /// Speed, knots.
    pub speed_kn: Option<f64>,
    /// Height of eye, metres.
    pub eye_height_m: Option<f64>,
    /// Heel, degrees, starboard +.
    pub heel_deg: Option<f64>,
    /// At sea, at anchor, alongside.
    pub whereabouts: Whereabouts,
    /// Kind of gyro.
    pub gyro_type: GyroType,
}

impl Observation {
    /// An observation of `target` with everything else not yet written.
    pub fn of(target: Target) -> Self {
        Self {
            target,
            moment: None,
            place: None,
            gyro_bearing: None,
            compass_bearing: None,
            gyro_heading: None,
            compass_heading: None,
            speed_kn: None,
            eye_height_m: None,
            heel_deg: None,
            whereabouts: Whereabouts::default(),
            gyro_type: GyroType::default(),
        }
    }

    /// The body observed, where there was one.
    pub fn body(&self) -> Option<Body> {
        match self.target {
            Target::Body(body) | Target::OnHorizon { body, .. } => Some(body),
            Target::Mark { .. } | Target::Headings => None,
        }
    }
}
