//! What on a row needs an explanation.

use crate::horizon::RisingOrSetting;
use crate::sky::Body;
use std::fmt;

/// Which subtraction does not come out.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Sum {
    /// Gyro error = azimuth - gyro bearing.
    GyroError,
    /// Compass error = azimuth - compass bearing, or true heading - compass heading.
    CompassError,
    /// Deviation = compass error - variation.
    Deviation,
}

/// Which limit an error is over.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Instrument {
    /// The gyrocompass.
    Gyro,
    /// The magnetic compass.
    MagneticCompass,
}

/// How a rising or setting does not fit its horizon.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum OffHorizon {
    /// At that time it stood above or below it.
    Away,
    /// At that time the body was near the horizon, but on its other side of the sky.
    OtherEvent,
    /// It does not come to that horizon there on that day.
    Never,
}

/// Something on a row that needs an explanation, with what was measured and the threshold.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Query {
    /// `below-horizon`
    BelowHorizon {
        /// The body.
        body: Body,
        /// Altitude, degrees.
        altitude_deg: f64,
        /// Threshold, degrees.
        least_deg: f64,
    },
    /// `not-dark`
    NotDark {
        /// The body.
        body: Body,
        /// Altitude of the sun, degrees.
        sun_altitude_deg: f64,
        /// Threshold, degrees.
        most_deg: f64,
    },
    /// `too-high`
    TooHigh {
        /// Altitude, degrees.
        altitude_deg: f64,
        /// Threshold, degrees.
        most_deg: f64,
    },
    /// `azimuth-differs`
    AzimuthDiffers {
        /// Logged less recomputed, degrees.
        by_deg: f64,
        /// Threshold, degrees.
        most_deg: f64,
    },
    /// `arithmetic`
    Arithmetic {
        /// Which subtraction.
        sum: Sum,
        /// Logged less what its parts give, degrees.
        by_deg: f64,
        /// Threshold, degrees.
        most_deg: f64,
    },
    /// `gyro-out-of-run`
    GyroOutOfRun {
        /// Gyro error less the run, degrees.
        by_deg: f64,
        /// Threshold, degrees.
        most_deg: f64,
    },
    /// `off-card`
    OffCard {
        /// Deviation less the card's or the curve's, degrees.
        by_deg: f64,
        /// Threshold, degrees.
        most_deg: f64,
        /// From a card; otherwise from the curve fitted to the vessel's own rows.
        card: bool,
    },
    /// `variation-differs`
    VariationDiffers {
        /// Logged less the field model's, degrees.
        by_deg: f64,
        /// Threshold, degrees.
        most_deg: f64,
    },
    /// `far-from-horizon`
    FarFromHorizon {
        /// Rising or setting.
        event: RisingOrSetting,
        /// How it does not fit.
        how: OffHorizon,
        /// Degrees above that horizon at the time written.
        off_deg: f64,
        /// Threshold, degrees.
        most_deg: f64,
    },
    /// `too-far-too-soon`
    TooFarTooSoon {
        /// Miles from the last entry.
        miles: f64,
        /// Miles that could be run in the time.
        most_miles: f64,
    },
    /// `out-of-order`
    OutOfOrder {
        /// Hours out of order.
        hours: f64,
        /// Earlier than the entry it follows; otherwise later than the one that follows it.
        early: bool,
    },
    /// `repeat`
    Repeat {
        /// Number of the row that it copies.
        of_row: u64,
    },
    /// `over-limit`
    OverLimit {
        /// Which instrument.
        instrument: Instrument,
        /// The error, degrees, east +.
        error_deg: f64,
        /// Its standard uncertainty, degrees.
        u_deg: f64,
        /// The limit, degrees.
        limit_deg: f64,
    },
    /// `card-out-of-date`
    CardOutOfDate {
        /// Age of the card, months.
        months: f64,
        /// Threshold, months.
        most_months: f64,
    },
    /// `reason-doubtful`
    ReasonDoubtful {
        /// Altitude of the sun, degrees.
        sun_altitude_deg: f64,
        /// The reason says that the sun stood too high (otherwise, that it was not up).
        said_high: bool,
    },
}

impl Query {
    /// The id, as it stands in the column `queries`.
    pub fn id(&self) -> &'static str {
        match self {
            Self::BelowHorizon { .. } => "below-horizon",
            Self::NotDark { .. } => "not-dark",
            Self::TooHigh { .. } => "too-high",
            Self::AzimuthDiffers { .. } => "azimuth-differs",
            Self::Arithmetic { .. } => "arithmetic",
            Self::GyroOutOfRun { .. } => "gyro-out-of-run",
            Self::OffCard { .. } => "off-card",
            Self::VariationDiffers { .. } => "variation-differs",
            Self::FarFromHorizon { .. } => "far-from-horizon",
            Self::TooFarTooSoon { .. } => "too-far-too-soon",
            Self::OutOfOrder { .. } => "out-of-order",
            Self::Repeat { .. } => "repeat",
            Self::OverLimit { .. } => "over-limit",
            Self::CardOutOfDate { .. } => "card-out-of-date",
            Self::ReasonDoubtful { .. } => "reason-doubtful",
        }
    }

    /// How much it weighs: measured over threshold, and more for what cannot be at all.
    pub fn weight(&self) -> f64 {
        match *self {
            Self::BelowHorizon { altitude_deg, least_deg, .. } => 20.0 + (least_deg - altitude_deg),
            Self::NotDark { sun_altitude_deg, most_deg, .. } => 20.0 + (sun_altitude_deg - most_deg),
            Self::FarFromHorizon { off_deg, most_deg, how, .. } => {
                if how == OffHorizon::Away {
                    off_deg.abs() / most_deg
                } else {
                    30.0
                }
            }
            Self::AzimuthDiffers { by_deg, most_deg }
            | Self::Arithmetic { by_deg, most_deg, .. }
            | Self::GyroOutOfRun { by_deg, most_deg }
            | Self::OffCard { by_deg, most_deg, .. }
            | Self::VariationDiffers { by_deg, most_deg } => by_deg.abs() / most_deg,
            Self::TooHigh { altitude_deg, most_deg } => altitude_deg / most_deg,
            Self::TooFarTooSoon { miles, most_miles } => miles / most_miles.max(1.0),
            Self::OutOfOrder { .. } => 10.0,
            Self::Repeat { .. } => 10.0,
            Self::OverLimit { error_deg, limit_deg, .. } => error_deg.abs() / limit_deg,
            Self::CardOutOfDate { months, most_months } => months / most_months,
            Self::ReasonDoubtful { .. } => 1.0,
        }
    }
}

fn east_west(deg: f64) -> &'static str {
    if deg < 0.0 { "W" } else { "E" }
}

/// One sentence, a question, the innocent causes first.
impl fmt::Display for Query {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match *self {
            Self::BelowHorizon { body, altitude_deg, least_deg } => write!(
                f,
                "Is the time, the zone or the name of the latitude or longitude another one? {} was {:.1} degrees below the horizon then and there (asked from {:.1}).",
                capital(body),
                -altitude_deg,
                -least_deg
            ),
            Self::NotDark { body, sun_altitude_deg, most_deg } => write!(
                f,
                "Is the time or the zone another one? {} is not seen with the sun at {sun_altitude_deg:.1} (asked over {most_deg:.1}).",
                capital(body)
            ),
            Self::TooHigh { altitude_deg, most_deg } => write!(
                f,
                "Was a lower body not to be had, or is the time another one? At {altitude_deg:.0} degrees a bearing is hardly possible (asked over {most_deg:.0})."
            ),
            Self::AzimuthDiffers { by_deg, most_deg } => write!(
                f,
                "Was a figure copied or looked up wrongly? The logged azimuth is {:.1} degrees {} than it comes out here (asked over {most_deg:.1}).",
                by_deg.abs(),
                if by_deg < 0.0 { "less" } else { "more" }
            ),
            Self::Arithmetic { sum, by_deg, most_deg } => write!(
                f,
                "Was a name or a figure slipped in the subtraction? The logged {} is {:.1} {} what its own parts give (asked over {most_deg:.2}).",
                match sum {
                    Sum::GyroError => "gyro error",
                    Sum::CompassError => "compass error",
                    Sum::Deviation => "deviation",
                },
                by_deg.abs(),
                if by_deg < 0.0 { "W of" } else { "E of" }
            ),
            Self::GyroOutOfRun { by_deg, most_deg } => write!(
                f,
                "Was the gyro disturbed, the repeater out of step, or the bearing misread? The gyro error is {:.1} {} of this gyro's run (asked over {most_deg:.1}).",
                by_deg.abs(),
                east_west(by_deg)
            ),
            Self::OffCard { by_deg, most_deg, card } => write!(
                f,
                "Was there cargo, a crane, dry dock, lightning, or a crossing of the magnetic equator? The deviation is {:.1} {} of the {} for this heading (asked over {most_deg:.1}).",
                by_deg.abs(),
                east_west(by_deg),
                if card { "card" } else { "vessel's own curve" }
            ),
            Self::VariationDiffers { by_deg, most_deg } => write!(
                f,
                "Was it taken from an older chart, another place, or a note of local disturbance? The logged variation is {:.1} {} of the field model (asked over {most_deg:.1}).",
                by_deg.abs(),
                east_west(by_deg)
            ),
            Self::FarFromHorizon { event, how, off_deg, most_deg } => {
                let event = if event == RisingOrSetting::Rising { "rising" } else { "setting" };
                match how {
                    OffHorizon::Away => write!(
                        f,
                        "Is the time another one, or was it an azimuth? At the time written the body stood {:.1} degrees {} the horizon of its {event} (asked over {most_deg:.1}).",
                        off_deg.abs(),
                        if off_deg < 0.0 { "below" } else { "above" }
                    ),
                    OffHorizon::OtherEvent => {
                        write!(f, "Is it the time or the word? At the time written the body was on the horizon, but not at its {event}.")
                    }
                    OffHorizon::Never => {
                        write!(
                            f,
                            "Is the date or the latitude another one? There and then the body does not come to that horizon: no {event}."
                        )
                    }
                }
            }
            Self::TooFarTooSoon { miles, most_miles } => write!(
                f,
                "Is the name or a figure of the position another one? It lies {miles:.0} miles from the entry before, and {most_miles:.0} could be run in the time; the entries on either side agree."
            ),
            Self::OutOfOrder { hours, early } => write!(
                f,
                "Is the date, the zone or the hour another one? The entry is {hours:.1} hours {}; the entries on either side are in order.",
                if early { "before the one that it follows" } else { "after the one that follows it" }
            ),
            Self::Repeat { of_row } => write!(f, "Was a line carried over? Time and readings are those of row {of_row}."),
            Self::OverLimit { instrument, error_deg, u_deg, limit_deg } => write!(
                f,
                "{} {:.1} {} is over the limit of {limit_deg:.1} even allowing for twice its uncertainty of {u_deg:.1}.",
                match instrument {
                    Instrument::Gyro => "Is a correction set wrongly, or the gyro due for service? A gyro error of",
                    Instrument::MagneticCompass =>
                        "Has there been cargo, dry dock, lightning or a change of magnetic latitude since the compass was adjusted? A deviation of",
                },
                error_deg.abs(),
                east_west(error_deg)
            ),
            Self::CardOutOfDate { months, most_months } => {
                write!(f, "Is there a newer card? The one in force is {months:.0} months old (asked over {most_months:.0}).")
            }
            Self::ReasonDoubtful { sun_altitude_deg, said_high } => write!(
                f,
                "Is the time or the reason from another entry? It says that the sun was {}, and the sun's altitude was {sun_altitude_deg:.0}.",
                if said_high { "too high" } else { "not up" }
            ),
        }
    }
}

/// The body's name at the start of a sentence or inside it.
fn capital(body: Body) -> String {
    match body {
        Body::Sun => "The sun".to_owned(),
        Body::Moon => "The moon".to_owned(),
        other => other.name().to_owned(),
    }
}
