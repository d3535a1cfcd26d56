//! The log's columns: their only list. What is read, what is added, and what each means.

/// A column that is described to a person.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct ColumnInfo {
    /// The name in the header; case and blanks about it do not matter.
    pub name: &'static str,
    /// What it belongs to: "time", "place".
    pub group: &'static str,
    /// The unit of its figures; empty where it holds words or a time.
    pub unit: &'static str,
    /// What it holds.
    pub meaning: &'static str,
    /// An example; empty for a column that is added.
    pub example: &'static str,
    /// Decimals of its figures in CSV; `None` for words and for columns that are read.
    pub decimals: Option<u8>,
}

macro_rules! read_columns {
    ($($group:literal { $($column:ident $name:literal $unit:literal: $meaning:literal, $example:literal;)* })*) => {
        /// A column that is read.
        #[derive(Debug, Clone, Copy, PartialEq, Eq)]
        pub enum Column { $($( #[doc = $meaning] $column, )*)* }

        impl Column {
            /// Every column that is read, in the order that they are described in.
            pub const ALL: &[Self] = &[$($( Self::$column, )*)*];

            /// What is said of it.
            pub fn info(self) -> ColumnInfo {
                match self {
                    $($( Self::$column => ColumnInfo {
                        name: $name, group: $group, unit: $unit, meaning: $meaning, example: $example, decimals: None,
                    }, )*)*
                }
            }
        }
    };
}

read_columns! {
    "ship and instruments" {
        Vessel "vessel" "": "The ship; blank means one ship", "Amber Tern";
        Gyro "gyro" "": "Which gyro; blank means one", "No.1";
        Repeater "repeater" "": "Which repeater the bearing was read on; blank means one", "port";
        MagneticCompass "magnetic_compass" "": "Which magnetic compass; blank means one", "standard";
        GyroType "gyro_type" "": "spinning (default), or other (fibre-optic, satellite): no speed error, no settling", "spinning";
    }
    "time" {
        Utc "utc" "": "Date and time of UTC: ISO 8601 with Z, an offset, or neither; without seconds is allowed", "2026-06-14T06:12:30Z";
        ShipTime "ship_time" "": "Ship's date and time, with zone or utc_offset", "2026-06-14 15:12";
        Zone "zone" "hours": "Zone description, added to ship's time to get UTC: east longitudes -, west +; or a zone letter", "-9";
        UtcOffset "utc_offset" "": "Offset of the ship's clock from UTC: the opposite sign of the zone", "+09:00";
        Date "date" "": "Date, with utc_time, or with time and zone or utc_offset", "2026-06-14";
        UtcTime "utc_time" "": "Time of day of UTC, with date", "06:12:30";
        Time "time" "": "Time of day by ship's clock, with date and zone or utc_offset", "15:12";
    }
    "place" {
        Lat "lat" "degrees": "Latitude; a sign or a letter, never both", "36-05.8S";
        Lon "lon" "degrees": "Longitude; a sign or a letter, never both", "130-33.6E";
        Position "position" "": "Latitude and longitude in one cell, instead of lat and lon", "36-05.8S 130-33.6E";
    }
    "observed" {
        Body "body" "": "Sun, Moon, Venus, Mars, Jupiter, Saturn or a star's name", "Sun";
        Method "method" "": "azimuth (default), rising, setting, transit (a charted mark), comparison (headings only), none (nothing could be had)", "azimuth";
        Horizon "horizon" "": "For rising and setting: celestial (default) or visible", "celestial";
        Limb "limb" "": "On the visible horizon: centre (default), upper, lower", "upper";
        EyeHeight "eye_height_m" "metres": "Height of eye", "18";
        Heel "heel" "degrees": "Heel, starboard +", "-2";
        Where "where" "": "sea (default), anchor, berth", "sea";
        Mark "mark" "": "For a transit: the mark or range", "North Rock light";
        ChartedBearing "charted_bearing" "degrees": "For a transit: its true bearing by the chart", "045.5";
    }
    "readings" {
        GyroBearing "gyro_bearing" "degrees": "Bearing read on the gyro repeater", "319.5";
        CompassBearing "compass_bearing" "degrees": "Bearing read on the magnetic compass", "316";
        GyroHeading "gyro_heading" "degrees": "Ship's head by gyro at that instant", "204";
        CompassHeading "compass_heading" "degrees": "Ship's head by magnetic compass at that instant", "200.5";
        Speed "speed_kn" "knots": "Speed, for the gyro's speed error", "14.5";
    }
    "worked out by the officer" {
        LoggedAzimuth "logged_azimuth" "degrees": "The azimuth that the officer worked out", "320.1";
        LoggedGyroError "logged_gyro_error" "degrees": "The gyro error worked out: east or low +, or with a letter or word", "0.5L";
        LoggedCompassError "logged_compass_error" "degrees": "The compass error worked out: east +, or with a letter", "4.0E";
        LoggedVariation "logged_variation" "degrees": "The variation used: east +, or with a letter", "3.1E";
        LoggedDeviation "logged_deviation" "degrees": "The deviation worked out: east +, or with a letter", "0.9E";
    }
    "words" {
        Observer "observer" "": "Who observed", "2/O";
        Remarks "remarks" "": "Anything; for method none, why nothing could be had", "overcast";
    }
}

/// The columns that are added, in their order.
pub const ADDED: [ColumnInfo; 23] = {
    const fn words(name: &'static str, meaning: &'static str) -> ColumnInfo {
        ColumnInfo { name, group: "added", unit: "", meaning, example: "", decimals: None }
    }
    const fn degrees(name: &'static str, decimals: u8, meaning: &'static str) -> ColumnInfo {
        ColumnInfo { unit: "degrees", decimals: Some(decimals), ..words(name, meaning) }
    }
    [
        degrees(
            "true_azimuth",
            3,
            "The direction that the errors are reckoned from: at the time; for rising or setting, with the body on that horizon; for a transit, the charted bearing",
        ),
        degrees("altitude", 3, "Altitude of the centre at the time, no refraction"),
        degrees("azimuth_at_time", 3, "Azimuth at the time, whatever the method"),
        degrees("gyro_error", 2, "Gyro error, east (low) +"),
        degrees("gyro_error_u", 2, "Its standard uncertainty"),
        degrees("compass_error", 2, "Compass error by a bearing read on the magnetic compass, east +"),
        degrees("compass_error_u", 2, "Its standard uncertainty"),
        degrees("true_heading", 2, "Gyro heading + gyro error"),
        degrees("compass_error_by_comparison", 2, "True heading - compass heading, east +"),
        degrees("compass_error_by_comparison_u", 2, "Its standard uncertainty"),
        degrees("variation", 2, "Variation of the field model, east +"),
        degrees("variation_u", 2, "Its standard uncertainty"),
        degrees("deviation", 2, "Compass error - variation, east +"),
        degrees("deviation_u", 2, "Its standard uncertainty"),
        degrees("deviation_by_comparison", 2, "Compass error by comparison - variation, east +"),
        degrees("deviation_by_comparison_u", 2, "Its standard uncertainty"),
        degrees("card_deviation", 2, "Deviation by the card in force on that heading, east +"),
        words("trust", "firm, fair or weak"),
        words("queries", "What needs an explanation, strongest first"),
        words("slip", "The slips that explain it, best first, each with the degrees it leaves"),
        words("notices", "What was done less surely, or is worth a look"),
        words("note", "One sentence for a person"),
        words("problem", "Why the row, or a part of it, could not be used"),
    ]
};

/// The columns that a book has behind the log's own, in their order.
pub const KEPT: [ColumnInfo; 6] = {
    const fn kept(name: &'static str, meaning: &'static str) -> ColumnInfo {
        ColumnInfo { name, group: "kept in a book", unit: "", meaning, example: "", decimals: None }
    }
    [
        kept("entry", "Number of the entry, from 1"),
        kept("recorded_utc", "When it was entered, by the computer's clock"),
        kept("corrects", "The entry that this one strikes through"),
        kept("reason", "Why it was struck through"),
        kept("signed", "Rank of whoever confirms the entries so far"),
        kept("seal", "Seal over this entry and the seal before it"),
    ]
};

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_stand_once() {
        let mut names: Vec<&str> = Column::ALL.iter().map(|c| c.info().name).chain(ADDED.iter().chain(&KEPT).map(|c| c.name)).collect();
        let count = names.len();
        names.sort_unstable();
        names.dedup();
        assert_eq!(names.len(), count);
    }
}
