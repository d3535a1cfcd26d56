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
    /// A star or planet by day was worked all the same (`not-dark`, outside a review).
    NotDark {
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
    /// Readings of a swing that cannot belong to its curve were left out (`readings-set-aside`).
    ReadingsSetAside {
        /// How many.
        count: usize,
    },
    /// The readings of a swing scatter more than readings do (`large-scatter`).
    LargeScatter {
        /// Their standard deviation about the curve, degrees.
        scatter_deg: f64,
    },
    /// A swing has hardly more readings than a curve has coefficients (`hardly-checked`).
    HardlyChecked {
        /// Readings used.
        readings: usize,
    },
    /// Coefficients that the headings cannot tell (`undetermined`).
    Undetermined {
        /// Which of A to E are determined.
        determined: [bool; 5],
    },
    /// A sector without an observation (`unproven-headings`).
    UnprovenHeadings {
        /// Last observed heading before it, degrees.
        from_deg: f64,
        /// First observed heading after it, clockwise, degrees.
        to_deg: f64,
    },
    /// A deviation so large that the approximate form of the curve no longer holds (`large-deviation`).
    LargeDeviation {
        /// The largest, degrees.
        deviation_deg: f64,
        /// Whether the exact form was taken: it fits better.
        exact: bool,
    },
    /// Turning clockwise and anticlockwise gives different deviations (`turns-differ`).
    TurnsDiffer {
        /// Clockwise - anticlockwise, degrees.
        difference_deg: f64,
        /// Its standard uncertainty, degrees.
        u_deg: f64,
    },
    /// The readings cannot tell what of B and C is permanent and what is induced (`latitude-untold`).
    LatitudeUntold,
    /// Readings of one curve were taken at different magnetic latitudes (`latitudes-mixed`).
    LatitudesMixed,
    /// The figures of a deviation card do not lie on a curve (`card-not-smooth`).
    CardNotSmooth {
        /// Largest residual, degrees.
        residual_deg: f64,
        /// The heading of it, degrees.
        heading_deg: f64,
    },
    /// A deviation card with a large constant part (`card-constant`).
    CardConstant {
        /// Coefficient A, degrees, east +.
        a_deg: f64,
    },
    /// A deviation card that is near nil on every heading (`card-near-nil`).
    CardNearNil {
        /// Largest deviation on it, degrees.
        largest_deg: f64,
    },
    /// Observed deviations are the opposite of the card's (`card-reversed`).
    CardReversed {
        /// Observations that say so.
        observations: usize,
    },
    /// A deviation card with too few headings for a curve: it is read linearly between them (`card-sparse`).
    CardSparse {
        /// Headings on it.
        headings: usize,
    },
    /// A deviation card older than it should be (`card-old`).
    CardOld {
        /// Its age, months.
        age_months: u32,
        /// The age allowed, months.
        limit_months: u32,
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
            Self::NotDark { .. } => "not-dark",
            Self::GyroDoubtful { .. } => "gyro-doubtful",
            Self::BelowHorizon { .. } => "below-horizon",
            Self::ReadingsSetAside { .. } => "readings-set-aside",
            Self::LargeScatter { .. } => "large-scatter",
            Self::HardlyChecked { .. } => "hardly-checked",
            Self::Undetermined { .. } => "undetermined",
            Self::UnprovenHeadings { .. } => "unproven-headings",
            Self::LargeDeviation { .. } => "large-deviation",
            Self::TurnsDiffer { .. } => "turns-differ",
            Self::LatitudeUntold => "latitude-untold",
            Self::LatitudesMixed => "latitudes-mixed",
            Self::CardNotSmooth { .. } => "card-not-smooth",
            Self::CardConstant { .. } => "card-constant",
            Self::CardNearNil { .. } => "card-near-nil",
            Self::CardReversed { .. } => "card-reversed",
            Self::CardSparse { .. } => "card-sparse",
            Self::CardOld { .. } => "card-old",
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
            Self::NotDark { sun_altitude_deg } => write!(f, "the sun is {sun_altitude_deg:.0} degrees high: was the body seen at all?"),
            Self::GyroDoubtful { latitude_deg } => write!(f, "latitude {latitude_deg:.0}: gyro doubtful"),
            Self::BelowHorizon { altitude_deg } => write!(f, "the body is below the horizon (altitude {altitude_deg:.1})"),
            Self::ReadingsSetAside { count: 1 } => write!(f, "one reading cannot belong to the curve and was left out"),
            Self::ReadingsSetAside { count } => write!(f, "{count} readings cannot belong to the curve and were left out"),
            Self::LargeScatter { scatter_deg } => write!(
                f,
                "the readings scatter by {scatter_deg:.1} degrees about the curve: some are wrong, and these data cannot tell which"
            ),
            Self::HardlyChecked { readings } => {
                write!(f, "{readings} readings are hardly more than the coefficients: a wrong one would not be seen")
            }
            Self::Undetermined { determined } => {
                let names: Vec<&str> = ["A", "B", "C", "D", "E"].into_iter().zip(determined).filter(|(_, d)| !d).map(|(n, _)| n).collect();
                write!(f, "these headings cannot tell {}", listed(&names))
            }
            Self::UnprovenHeadings { from_deg, to_deg } => {
                write!(f, "nothing was observed between headings {} and {}", three_figures(from_deg), three_figures(to_deg))
            }
            Self::LargeDeviation { deviation_deg, exact } => write!(
                f,
                "deviation reaches {deviation_deg:.1} degrees, where the five-coefficient curve is only approximate: {}",
                if exact { "the exact form is used" } else { "the exact form fits no better here" }
            ),
            Self::TurnsDiffer { difference_deg, u_deg } => write!(
                f,
                "turning clockwise gives deviations {:.1} {} of turning anticlockwise (u {u_deg:.1}): the curve lies midway",
                difference_deg.abs(),
                if difference_deg < 0.0 { "west" } else { "east" }
            ),
            Self::LatitudeUntold => {
                write!(f, "the readings cannot tell permanent from induced magnetism: they need places of different magnetic latitude")
            }
            Self::LatitudesMixed => {
                write!(f, "the readings come from different magnetic latitudes, where B and C differ: the curve is a mean of them")
            }
            Self::CardNotSmooth { residual_deg, heading_deg } => {
                write!(f, "the card is not smooth: {:.1} off its own curve at {}", residual_deg.abs(), three_figures(heading_deg))
            }
            Self::CardConstant { a_deg } => write!(
                f,
                "the card has a constant part of {:.1} {}: a lubber line out of true, or a wrong variation when it was made",
                a_deg.abs(),
                if a_deg < 0.0 { "W" } else { "E" }
            ),
            Self::CardNearNil { largest_deg } => {
                write!(f, "the card is near nil on every heading (largest {largest_deg:.1}): few ships' compasses are")
            }
            Self::CardReversed { observations } => {
                write!(f, "{observations} observations give the card's deviations with the opposite sign: were east and west exchanged?")
            }
            Self::CardSparse { headings } => write!(
                f,
                "the card's {headings} headings are too few, or too close together, for a curve: it is read in a straight line between them"
            ),
            Self::CardOld { age_months, limit_months } => write!(f, "the card is {age_months} months old, {limit_months} are allowed"),
        }
    }
}

/// A heading in three whole figures.
fn three_figures(deg: f64) -> String {
    format!("{:03}", (deg.round() as i64).rem_euclid(360))
}

/// "A", "A and E", "A, D and E".
fn listed(names: &[&str]) -> String {
    match names {
        [] => String::new(),
        [one] => (*one).to_owned(),
        [first @ .., last] => format!("{} and {last}", first.join(", ")),
    }
}
