//! Human mistakes that would answer a query.

use crate::sky::Body;
use std::fmt;

/// A slip by its kind.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Slip {
    /// The time is an hour ahead.
    HourAhead,
    /// The time is an hour behind.
    HourBehind,
    /// The clock was altered by 20, 30 or 40 minutes, and one figure was not.
    ClockChange,
    /// Twelve hours out: the first half of the day for the second.
    HalfDay,
    /// The zone was applied the wrong way.
    ZoneSign,
    /// Ship's time stands where UTC should.
    ShipTimeAsUtc,
    /// The date is a day ahead.
    DayAhead,
    /// The date is a day behind.
    DayBehind,
    /// Another year's almanac, or the wrong year written.
    Year,
    /// Day and month exchanged.
    DateSwapped,
    /// Latitude named the other way.
    LatitudeName,
    /// Longitude named the other way.
    LongitudeName,
    /// The position of an earlier entry.
    StalePosition,
    /// Another body.
    Body(Body),
    /// Declination named the other way.
    DeclinationName,
    /// The azimuth reckoned from the other pole: 180 - Z.
    FromOtherPole,
    /// The azimuth named the other side of the meridian: 360 - Z.
    OtherSide,
    /// The opposite direction.
    Reciprocal,
    /// Read against the sense of the card: 247 for 253.
    ReadBackwards,
    /// A bearing from the ship's head instead of from north.
    RelativeBearing,
    /// Ten degrees out.
    TenDegrees,
    /// A hundred degrees out.
    HundredDegrees,
    /// Two neighbouring figures exchanged.
    DigitsSwapped,
    /// Two columns exchanged.
    ColumnsSwapped,
    /// An error named the wrong way.
    ErrorName,
    /// Variation named or applied the wrong way.
    VariationName,
    /// The deviation card entered with the bearing instead of the heading.
    CardByBearing,
    /// A subtraction gone wrong.
    Arithmetic,
    /// Worked for the other horizon, or for the other of rising and setting.
    Horizon,
}

impl Slip {
    /// Every kind of slip, in the order that they are described in; another body stands for all of them.
    pub const ALL: [Self; 29] = [
        Self::HourAhead,
        Self::HourBehind,
        Self::ClockChange,
        Self::HalfDay,
        Self::ZoneSign,
        Self::ShipTimeAsUtc,
        Self::DayAhead,
        Self::DayBehind,
        Self::Year,
        Self::DateSwapped,
        Self::LatitudeName,
        Self::LongitudeName,
        Self::StalePosition,
        Self::Body(Body::Sun),
        Self::DeclinationName,
        Self::FromOtherPole,
        Self::OtherSide,
        Self::Reciprocal,
        Self::ReadBackwards,
        Self::RelativeBearing,
        Self::TenDegrees,
        Self::HundredDegrees,
        Self::DigitsSwapped,
        Self::ColumnsSwapped,
        Self::ErrorName,
        Self::VariationName,
        Self::CardByBearing,
        Self::Arithmetic,
        Self::Horizon,
    ];

    /// The id, as it stands in the column `slip`; a body's name follows `body:`.
    pub fn id(self) -> &'static str {
        match self {
            Self::HourAhead => "hour+1",
            Self::HourBehind => "hour-1",
            Self::ClockChange => "clock-change",
            Self::HalfDay => "half-day",
            Self::ZoneSign => "zone-sign",
            Self::ShipTimeAsUtc => "ship-time-as-utc",
            Self::DayAhead => "day+1",
            Self::DayBehind => "day-1",
            Self::Year => "year",
            Self::DateSwapped => "date-swapped",
            Self::LatitudeName => "latitude-name",
            Self::LongitudeName => "longitude-name",
            Self::StalePosition => "stale-position",
            Self::Body(_) => "body",
            Self::DeclinationName => "declination-name",
            Self::FromOtherPole => "180-z",
            Self::OtherSide => "360-z",
            Self::Reciprocal => "reciprocal",
            Self::ReadBackwards => "read-backwards",
            Self::RelativeBearing => "relative-bearing",
            Self::TenDegrees => "ten-degrees",
            Self::HundredDegrees => "hundred-degrees",
            Self::DigitsSwapped => "digits-swapped",
            Self::ColumnsSwapped => "columns-swapped",
            Self::ErrorName => "error-name",
            Self::VariationName => "variation-name",
            Self::CardByBearing => "card-by-bearing",
            Self::Arithmetic => "arithmetic",
            Self::Horizon => "horizon",
        }
    }

    /// Whether it moves the time.
    pub fn is_in_time(self) -> bool {
        matches!(
            self,
            Self::HourAhead
                | Self::HourBehind
                | Self::ClockChange
                | Self::HalfDay
                | Self::ZoneSign
                | Self::ShipTimeAsUtc
                | Self::DayAhead
                | Self::DayBehind
                | Self::Year
                | Self::DateSwapped
        )
    }

    /// What it would mean, in a few words that follow "could".
    pub fn words(self) -> &'static str {
        match self {
            Self::HourAhead => "the time be an hour ahead",
            Self::HourBehind => "the time be an hour behind",
            Self::ClockChange => "a change of the clock have been missed",
            Self::HalfDay => "the time be twelve hours out",
            Self::ZoneSign => "the zone have been applied the wrong way",
            Self::ShipTimeAsUtc => "ship's time have been taken for UTC",
            Self::DayAhead => "the date be a day ahead",
            Self::DayBehind => "the date be a day behind",
            Self::Year => "the year be another one",
            Self::DateSwapped => "day and month have changed places",
            Self::LatitudeName => "the latitude be named the other way",
            Self::LongitudeName => "the longitude be named the other way",
            Self::StalePosition => "the position be that of an earlier entry",
            Self::Body(_) => "another body have been meant",
            Self::DeclinationName => "the declination have been named the other way",
            Self::FromOtherPole => "the azimuth have been reckoned from the other pole",
            Self::OtherSide => "the azimuth have been named the other side of the meridian",
            Self::Reciprocal => "the opposite direction have been taken",
            Self::ReadBackwards => "the card have been read against its sense",
            Self::RelativeBearing => "the bearing be one from the ship's head",
            Self::TenDegrees => "ten degrees have been lost or gained",
            Self::HundredDegrees => "a hundred degrees have been lost or gained",
            Self::DigitsSwapped => "two figures have changed places",
            Self::ColumnsSwapped => "two columns have changed places",
            Self::ErrorName => "an error be named the wrong way",
            Self::VariationName => "the variation have been applied the wrong way",
            Self::CardByBearing => "the card have been entered with the bearing instead of the heading",
            Self::Arithmetic => "a subtraction have gone wrong",
            Self::Horizon => "the other horizon have been meant",
        }
    }
}

impl fmt::Display for Slip {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Body(body) => write!(f, "body:{}", body.name()),
            other => f.write_str(other.id()),
        }
    }
}

/// Where a slip sits.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Place {
    /// Time, place, body or reading is written wrongly; the results are right.
    Record,
    /// The record is right; the results are wrong.
    Working,
    /// The record is wrong, and the results follow it.
    RecordFollowed,
}

impl Place {
    /// Whether what is written is wrong.
    pub fn is_in_record(self) -> bool {
        self != Self::Working
    }

    /// In words that follow "looks to be".
    pub fn words(self) -> &'static str {
        match self {
            Self::Record => "in what is written, with the results right",
            Self::Working => "in the working, with the record right",
            Self::RecordFollowed => "in the reading or the record, with the results worked from it",
        }
    }
}

/// A slip that explains a row, or two together where no single one serves.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Explanation {
    /// The slip.
    pub slip: Slip,
    /// Where it sits.
    pub place: Place,
    /// The second slip of a pair.
    pub with: Option<(Slip, Place)>,
    /// What it leaves, degrees: the root of the mean square of everything left over, the surest figures counting most.
    pub left_deg: f64,
}

/// As in the column `slip`: `hour+1(0.2)`; a pair `hour+1&reciprocal(0.2)`.
impl fmt::Display for Explanation {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}", self.slip)?;
        if let Some((second, _)) = self.with {
            write!(f, "&{second}")?;
        }
        write!(f, "({:.1})", self.left_deg)
    }
}
