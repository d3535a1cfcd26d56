//! Done, but less surely, or worth a look: one enum, so that every place words it the same way.

use std::fmt;

/// Something worth saying about a figure; it changes no exit code.
#[derive(Debug, Clone, Copy, PartialEq)]
#[non_exhaustive]
pub enum Notice {
    /// The body stands high: the tilt of the instrument counts (`high`).
    High {
        /// Topocentric altitude, degrees.
        altitude_deg: f64,
    },
    /// On the horizon, a small error of altitude moves the azimuth much (`horizon-weak`).
    HorizonWeak {
        /// Degrees of azimuth a degree of altitude: tan(latitude) / sin(azimuth).
        degrees_per_degree: f64,
    },
    /// No height of eye was given on the visible horizon (`eye-height-assumed`).
    EyeHeightAssumed {
        /// The height taken, metres.
        height_m: f64,
    },
    /// The gyro has not had time to settle after an alteration (`after-turn`).
    AfterTurn {
        /// Minutes since the alteration.
        minutes: f64,
    },
    /// The ship was heeled (`heeled`).
    Heeled {
        /// Heel, degrees, starboard +.
        heel_deg: f64,
    },
    /// Alongside, steel ashore pulls the compass (`at-berth`).
    AtBerth,
    /// The horizontal field is weak (`weak-field`).
    WeakField {
        /// Horizontal intensity, nanotesla.
        horizontal_nt: f64,
    },
    /// The horizontal field is so weak that a magnetic compass does not point (`no-compass`).
    NoCompass {
        /// Horizontal intensity, nanotesla.
        horizontal_nt: f64,
    },
    /// The zone does not fit the longitude (`zone-odd`).
    ZoneOdd {
        /// Zone description, hours.
        zone_h: f64,
        /// Zone that the longitude suggests, hours.
        expected_h: f64,
    },
    /// Past the last day of the field model, with growing uncertainty (`model-ended`).
    ModelEnded {
        /// The model's last decimal year.
        valid_to: f64,
        /// Decimal year asked for.
        year: f64,
    },
    /// Over a limit by less than two u (`may-be-over-limit`).
    MayBeOverLimit {
        /// The figure, degrees, signed.
        error_deg: f64,
        /// The limit, degrees.
        limit_deg: f64,
    },
    /// True heading taken from the run of the gyro, not from a bearing of this row (`gyro-error-from-run`).
    GyroErrorFromRun {
        /// Hours since that gyro's last observation.
        age_h: f64,
    },
    /// Venus by day (`venus-by-day`).
    VenusByDay {
        /// Altitude of the sun, degrees.
        sun_altitude_deg: f64,
    },
    /// Above latitude 70 a gyro is doubtful (`gyro-doubtful`).
    GyroDoubtful {
        /// Latitude, degrees, north +.
        latitude_deg: f64,
    },
    /// A body below the sea horizon was worked all the same (`below-horizon`, outside a review).
    BelowHorizon {
        /// Topocentric altitude, degrees.
        altitude_deg: f64,
    },
}

impl Notice {
    /// The id, as it stands in the column `notices`.
    pub fn id(&self) -> &'static str {
        match self {
            Self::High { .. } => "high",
            Self::HorizonWeak { .. } => "horizon-weak",
            Self::EyeHeightAssumed { .. } => "eye-height-assumed",
            Self::AfterTurn { .. } => "after-turn",
            Self::Heeled { .. } => "heeled",
            Self::AtBerth => "at-berth",
            Self::WeakField { .. } => "weak-field",
            Self::NoCompass { .. } => "no-compass",
            Self::ZoneOdd { .. } => "zone-odd",
            Self::ModelEnded { .. } => "model-ended",
            Self::MayBeOverLimit { .. } => "may-be-over-limit",
            Self::GyroErrorFromRun { .. } => "gyro-error-from-run",
            Self::VenusByDay { .. } => "venus-by-day",
            Self::GyroDoubtful { .. } => "gyro-doubtful",
            Self::BelowHorizon { .. } => "below-horizon",
        }
    }
}

impl fmt::Display for Notice {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match *self {
            Self::High { altitude_deg } => {
                write!(
                    f,
                    "the body stands {altitude_deg:.0} degrees high: a degree of tilt moves the bearing {:.1}",
                    altitude_deg.to_radians().tan()
                )
            }
            Self::HorizonWeak { degrees_per_degree } => {
                write!(f, "here each degree of altitude moves the azimuth on the horizon by {degrees_per_degree:.1}")
            }
            Self::EyeHeightAssumed { height_m } => write!(f, "no height of eye given: {height_m:.0} m taken"),
            Self::AfterTurn { minutes } => write!(f, "{minutes:.0} minutes after an alteration: the gyro may still be settling"),
            Self::Heeled { heel_deg } => {
                write!(f, "heeled {:.0} degrees to {}", heel_deg.abs(), if heel_deg < 0.0 { "port" } else { "starboard" })
            }
            Self::AtBerth => write!(f, "alongside: steel ashore may pull the magnetic compass"),
            Self::WeakField { horizontal_nt } => {
                write!(f, "the horizontal field is only {horizontal_nt:.0} nT: the magnetic compass is sluggish")
            }
            Self::NoCompass { horizontal_nt } => {
                write!(f, "the horizontal field is only {horizontal_nt:.0} nT: a magnetic compass is of no use here")
            }
            Self::ZoneOdd { zone_h, expected_h } => write!(f, "zone {zone_h:+.2} where the longitude suggests {expected_h:+.0}"),
            Self::ModelEnded { valid_to, year } => {
                write!(f, "the field model ended at {valid_to:.1}, the date is {year:.2}: variation is less sure")
            }
            Self::MayBeOverLimit { error_deg, limit_deg } => {
                write!(f, "{:.1} {} may be over the limit of {limit_deg:.1}", error_deg.abs(), if error_deg < 0.0 { "W" } else { "E" })
            }
            Self::GyroErrorFromRun { age_h } => write!(f, "gyro error taken from its run, last observed {age_h:.1} h before"),
            Self::VenusByDay { sun_altitude_deg } => write!(f, "Venus by day, the sun {sun_altitude_deg:.0} degrees high"),
            Self::GyroDoubtful { latitude_deg } => write!(f, "latitude {latitude_deg:.0}: gyro doubtful"),
            Self::BelowHorizon { altitude_deg } => write!(f, "the body is below the horizon (altitude {altitude_deg:.1})"),
        }
    }
}
