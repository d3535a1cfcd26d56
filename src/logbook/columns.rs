//! The log's columns: their only list. What is read, what is added, and what each means.

/// A column that is described to a person.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct ColumnInfo {
    /// The name in the header; case and blanks about it do not matter.
    pub name: &'static str,
    /// What it holds.
    pub meaning: &'static str,
    /// An example; empty for a column that is added.
    pub example: &'static str,
}

macro_rules! read_columns {
    ($($column:ident $name:literal: $meaning:literal, $example:literal;)*) => {
        /// A column that is read.
        #[derive(Debug, Clone, Copy, PartialEq, Eq)]
        pub enum Column { $( #[doc = $meaning] $column, )* }

        impl Column {
            /// Every column that is read, in the order that they are described in.
            pub const ALL: &[Self] = &[$( Self::$column, )*];

            /// What is said of it.
            pub fn info(self) -> ColumnInfo {
                match self { $( Self::$column => ColumnInfo { name: $name, meaning: $meaning, example: $example }, )* }
            }
        }
    };
}

read_columns! {
    Vessel "vessel": "The ship; blank means one ship", "Amber Tern";
    Gyro "gyro": "Which gyro; blank means one", "No.1";
    Repeater "repeater": "Which repeater the bearing was read on; blank means one", "port";
    MagneticCompass "magnetic_compass": "Which magnetic compass; blank means one", "standard";
    GyroType "gyro_type": "spinning (default), or other (fibre-optic, satellite): no speed error, no settling", "spinning";
    Utc "utc": "Date and time of UTC: ISO 8601 with Z, an offset, or neither; without seconds is allowed", "2026-06-14T06:12:30Z";
    ShipTime "ship_time": "Ship's date and time, with zone or utc_offset", "2026-06-14 15:12";
    Zone "zone": "Zone description, added to ship's time to get UTC: east longitudes -, west +; or a zone letter", "-9";
    UtcOffset "utc_offset": "Offset of the ship's clock from UTC: the opposite sign of the zone", "+09:00";
    Date "date": "Date, with utc_time, or with time and zone or utc_offset", "2026-06-14";
    UtcTime "utc_time": "Time of day of UTC, with date", "06:12:30";
    Time "time": "Time of day by ship's clock, with date and zone or utc_offset", "15:12";
    Lat "lat": "Latitude; a sign or a letter, never both", "36-05.8S";
    Lon "lon": "Longitude; a sign or a letter, never both", "130-33.6E";
    Position "position": "Latitude and longitude in one cell, instead of lat and lon", "36-05.8S 130-33.6E";
    Body "body": "Sun, Moon, Venus, Mars, Jupiter, Saturn or a star's name", "Sun";
    Method "method": "azimuth (default), rising, setting, transit (a charted mark), comparison (headings only), none (nothing could be had)", "azimuth";
    Horizon "horizon": "For rising and setting: celestial (default) or visible", "celestial";
    Limb "limb": "On the visible horizon: centre (default), upper, lower", "upper";
    EyeHeight "eye_height_m": "Height of eye, metres", "18";
    Heel "heel": "Heel, degrees, starboard +", "-2";
    Where "where": "sea (default), anchor, berth", "sea";
    Mark "mark": "For a transit: the mark or range", "North Rock light";
    ChartedBearing "charted_bearing": "For a transit: its true bearing by the chart", "045.5";
    GyroBearing "gyro_bearing": "Bearing read on the gyro repeater", "319.5";
    CompassBearing "compass_bearing": "Bearing read on the magnetic compass", "316";
    GyroHeading "gyro_heading": "Ship's head by gyro at that instant", "204";
    CompassHeading "compass_heading": "Ship's head by magnetic compass at that instant", "200.5";
    Speed "speed_kn": "Speed, knots, for the gyro's speed error", "14.5";
    LoggedAzimuth "logged_azimuth": "The azimuth that the officer worked out", "320.1";
    LoggedGyroError "logged_gyro_error": "The gyro error worked out: east or low +, or with a letter or word", "0.5L";
    LoggedCompassError "logged_compass_error": "The compass error worked out: east +, or with a letter", "4.0E";
    LoggedVariation "logged_variation": "The variation used: east +, or with a letter", "3.1E";
    LoggedDeviation "logged_deviation": "The deviation worked out: east +, or with a letter", "0.9E";
    Observer "observer": "Who observed", "2/O";
    Remarks "remarks": "Anything; for method none, why nothing could be had", "overcast";
}

/// The columns that are added, in their order.
pub const ADDED: [ColumnInfo; 23] = {
    const fn added(name: &'static str, meaning: &'static str) -> ColumnInfo {
        ColumnInfo { name, meaning, example: "" }
    }
    [
        added(
            "true_azimuth",
            "The direction that the errors are reckoned from: at the time; for rising or setting, with the body on that horizon; for a transit, the charted bearing",
        ),
        added("altitude", "Altitude of the centre at the time, no refraction, degrees"),
        added("azimuth_at_time", "Azimuth at the time, whatever the method"),
        added("gyro_error", "Gyro error, degrees, east (low) +"),
        added("gyro_error_u", "Its standard uncertainty, degrees"),
        added("compass_error", "Compass error by a bearing read on the magnetic compass, degrees, east +"),
        added("compass_error_u", "Its standard uncertainty, degrees"),
        added("true_heading", "Gyro heading + gyro error"),
        added("compass_error_by_comparison", "True heading - compass heading, degrees, east +"),
        added("compass_error_by_comparison_u", "Its standard uncertainty, degrees"),
        added("variation", "Variation of the field model, degrees, east +"),
        added("variation_u", "Its standard uncertainty, degrees"),
        added("deviation", "Compass error - variation, degrees, east +"),
        added("deviation_u", "Its standard uncertainty, degrees"),
        added("deviation_by_comparison", "Compass error by comparison - variation, degrees, east +"),
        added("deviation_by_comparison_u", "Its standard uncertainty, degrees"),
        added("card_deviation", "Deviation by the card in force on that heading, degrees, east +"),
        added("trust", "firm, fair or weak"),
        added("queries", "What needs an explanation, strongest first"),
        added("slip", "The slips that explain it, best first, each with the residual it leaves, degrees"),
        added("notices", "What was done less surely, or is worth a look"),
        added("note", "One sentence for a person"),
        added("problem", "Why the row, or a part of it, could not be used"),
    ]
};

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_stand_once() {
        let mut names: Vec<&str> = Column::ALL.iter().map(|c| c.info().name).chain(ADDED.iter().map(|c| c.name)).collect();
        let count = names.len();
        names.sort_unstable();
        names.dedup();
        assert_eq!(names.len(), count);
    }
}
