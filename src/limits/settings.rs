//! The table.

use std::fmt;

/// A table of the limits file.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Table {
    /// `[limits]`.
    Limits,
    /// `[uncertainty]`.
    Uncertainty,
}

impl Table {
    /// The name between the brackets.
    pub fn name(self) -> &'static str {
        match self {
            Self::Limits => "limits",
            Self::Uncertainty => "uncertainty",
        }
    }
}

/// One number that can be set.
#[derive(Debug, Clone, Copy)]
pub struct Setting {
    /// The table it stands in.
    pub table: Table,
    /// Its key there.
    pub key: &'static str,
    /// The built-in value.
    pub default: f64,
    /// Unit; empty for a bare number.
    pub unit: &'static str,
    /// Least value that makes sense.
    pub least: f64,
    /// Greatest value that makes sense.
    pub most: f64,
    /// What it does.
    pub what: &'static str,
    /// Where the built-in value comes from.
    pub origin: &'static str,
    /// Reads it.
    pub get: fn(&Limits) -> f64,
    /// Sets it.
    pub set: fn(&mut Limits, f64),
}

/// All settings of a run; the default is the built-in profile.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Limits {
    /// Thresholds of trust, notices, queries and patterns.
    pub thresholds: Thresholds,
    /// What the uncertainty of a figure is made of.
    pub uncertainty: Uncertainty,
    /// The ship herself.
    pub ship: Ship,
    /// How the watches are kept.
    pub watches: Watches,
}

/// What is known of the ship.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Ship {
    /// Arcs of relative bearing that cannot be seen from the repeaters: from and to, clockwise, degrees `0 <= x < 360`.
    pub blind_arcs: Vec<(f64, f64)>,
}

/// How the watches are kept.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum Watches {
    /// Four hours on, eight off: six watches a day.
    #[default]
    FourOnEightOff,
    /// Six on, six off: four watches a day.
    SixOnSixOff,
}

impl Watches {
    /// Length of a watch, hours.
    pub fn hours(self) -> u8 {
        match self {
            Self::FourOnEightOff => 4,
            Self::SixOnSixOff => 6,
        }
    }

    /// The word in the limits file.
    pub fn word(self) -> &'static str {
        match self {
            Self::FourOnEightOff => "4on8off",
            Self::SixOnSixOff => "6on6off",
        }
    }
}

impl fmt::Display for Watches {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.word())
    }
}

/// Makes the structs, their defaults and the table from one list.
macro_rules! settings {
    ($( $(#[$doc:meta])* $name:ident in $table:ident as $place:ident { $( $field:ident $key:literal = $default:literal $unit:literal, $least:literal to $most:literal: $what:literal; $origin:literal. )* } )*) => {
        $(
            $(#[$doc])*
            #[derive(Debug, Clone, PartialEq)]
            pub struct $name { $( #[doc = $what] #[doc = concat!("\n\nUnit: ", $unit, "; `", $key, "`.")] pub $field: f64, )* }

            impl Default for $name {
                fn default() -> Self {
                    Self { $( $field: $default, )* }
                }
            }
        )*

        /// Every number that can be set, in the order of the list of limits.
        pub const SETTINGS: &[Setting] = &[ $( $( Setting {
            table: Table::$table, key: $key, default: $default, unit: $unit, least: $least, most: $most, what: $what, origin: $origin,
            get: |limits| limits.$place.$field, set: |limits, value| limits.$place.$field = value,
        }, )* )* ];
    };
}

settings! {
    /// Thresholds of trust, notices, queries and patterns.
    Thresholds in Limits as thresholds {
        gyro_settle_deg "gyro_settle" = 0.75 "degrees", 0.0 to 10.0: "Error allowed at the gyro's settle point, times sec(latitude)"; "IMO A.424(XI), A.821(19), ISO 8728".
        gyro_scatter_deg "gyro_scatter" = 0.25 "degrees", 0.0 to 10.0: "Scatter allowed of a settled gyro's single readings about their mean, times sec(latitude)"; "IMO A.424(XI), A.821(19), ISO 8728".
        gyro_settles_within_h "gyro_settles_within_h" = 6.0 "hours", 0.5 to 48.0: "Time from its start within which a gyro must have settled"; "IMO A.424(XI), A.821(19), ISO 8728".
        gyro_margin_deg "gyro_margin" = 0.5 "degrees", 0.0 to 10.0: "Added to that for what a repeater and its reading may add"; "IMO A.424(XI): repeater against master 0.5".
        gyro_doubtful_latitude_deg "gyro_doubtful_latitude" = 70.0 "degrees", 30.0 to 90.0: "Latitude from which a gyro is doubtful"; "common practice".
        deviation_deg "deviation" = 5.0 "degrees", 0.0 to 45.0: "Deviation over which the compass is to be adjusted"; "AMSA; Marshall Islands MN 2-011-32".
        altitude_fair_deg "altitude_fair" = 30.0 "degrees", 0.0 to 90.0: "Altitude to which a bearing is firm"; "common practice".
        altitude_weak_deg "altitude_weak" = 60.0 "degrees", 0.0 to 90.0: "Altitude from which a bearing is weak"; "common practice".
        too_high_deg "too_high" = 75.0 "degrees", 0.0 to 90.0: "Altitude over which a bearing needs an explanation"; "our own: a degree of tilt is 3.7 there".
        horizon_weak "horizon_weak" = 1.5 "degrees a degree", 0.0 to 100.0: "tan(latitude) / sin(azimuth) from which an amplitude is weak"; "our own band".
        heeled_deg "heeled" = 3.0 "degrees", 0.0 to 90.0: "Heel from which it is said"; "our own".
        weak_field_nt "weak_field_nt" = 6000.0 "nT", 0.0 to 60000.0: "Horizontal field under which a magnetic compass is sluggish"; "World Magnetic Model report (from memory)".
        alteration_deg "alteration" = 15.0 "degrees", 1.0 to 180.0: "Change of heading that counts as a large alteration"; "common practice: house rules run from 5 to 20".
        after_turn_h "after_turn_h" = 2.0 "hours", 0.0 to 10.0: "Time after a large alteration in which the gyro may be settling"; "common practice: 1.5 to 2 hours".
        zone_odd_h "zone_odd_h" = 2.0 "hours", 0.0 to 24.0: "Difference of the zone from longitude / 15 from which it is said"; "our own".
        below_horizon_deg "below_horizon" = -1.0 "degrees", -90.0 to 10.0: "Altitude under which a body is below the horizon"; "our own: refraction and dip take 0.9 at most from 30 m".
        not_dark_bright_deg "not_dark_bright" = -3.0 "degrees", -90.0 to 90.0: "Sun's altitude over which no star or planet of magnitude 0 or brighter is seen"; "our own".
        not_dark_faint_deg "not_dark_faint" = -4.5 "degrees", -90.0 to 90.0: "The same for fainter ones"; "our own".
        azimuth_differs_deg "azimuth_differs" = 0.5 "degrees", 0.0 to 180.0: "Logged azimuth against the recomputed one"; "common practice: a reviewer asks over 0.5".
        arithmetic_deg "arithmetic" = 0.15 "degrees", 0.0 to 180.0: "A logged result against its own parts"; "our own: two figures rounded to 0.1".
        gyro_out_of_run_deg "gyro_out_of_run" = 1.5 "degrees", 0.0 to 180.0: "Gyro error off this gyro's run"; "our own".
        out_of_run_sigma "out_of_run_sigma" = 4.0 "", 1.0 to 20.0: "The same in scatters of the run, and of the deviation about its curve"; "our own".
        off_card_deg "off_card" = 3.0 "degrees", 0.0 to 180.0: "Deviation off the card or the curve"; "common practice: 2 to 3 on three independent days".
        off_card_once_deg "off_card_once" = 5.0 "degrees", 0.0 to 180.0: "Deviation off the card on a single day"; "common practice".
        variation_differs_deg "variation_differs" = 1.0 "degrees", 0.0 to 180.0: "Logged variation against the field model"; "our own".
        variation_stale_deg "variation_stale" = 0.7 "degrees", 0.0 to 180.0: "The same throughout a vessel, from which its variation is old"; "our own".
        far_from_horizon_deg "far_from_horizon" = 1.5 "degrees", 0.0 to 90.0: "Altitude from the horizon stated, at rising or setting"; "our own: ten minutes of a low sun in middle latitudes".
        max_speed_kn "max_speed_kn" = 25.0 "knots", 1.0 to 100.0: "Speed over which two positions are too far apart"; "our own".
        too_far_margin_nm "too_far_margin_nm" = 10.0 "miles", 0.0 to 1000.0: "Added to speed times time between positions"; "our own".
        constant_a_card_deg "constant_a_card" = 1.0 "degrees", 0.0 to 45.0: "Constant off the card from which a lubber line is suspected"; "common practice: A over 1 is doubtful".
        constant_a_deg "constant_a" = 1.5 "degrees", 0.0 to 45.0: "The same for coefficient A where no card is given"; "our own".
        repeater_differs_deg "repeater_differs" = 0.5 "degrees", 0.0 to 45.0: "Difference between repeaters"; "IMO A.424(XI): repeater against master 0.5".
        card_months "card_months" = 24.0 "months", 1.0 to 600.0: "Age from which a deviation card is out of date"; "ISO 25862: adjustment every 2 years".
        too_regular_entries "too_regular_entries" = 20.0 "entries", 20.0 to 100000.0: "Fewest entries that too regular figures are judged by"; "our own; never under 20".
        watches_missing_share "watches_missing" = 0.33 "", 0.0 to 1.0: "Share of the watches under way without an entry from which it is said"; "our own".
        nmea_stale_s "nmea_stale_s" = 10.0 "seconds", 0.1 to 3600.0: "Age over which time, position and speed from the ship's instruments are not taken"; "our own: 0.1 mile at 25 knots, ten words missed of one a second".
        nmea_heading_stale_s "nmea_heading_stale_s" = 3.0 "seconds", 0.1 to 3600.0: "Age over which a heading from the ship's instruments is not taken"; "our own: a ship that turns swings half a degree a second".
    }

    /// Standard uncertainties (one sigma) of what goes into a figure.
    Uncertainty in Uncertainty as uncertainty {
        reading_gyro_deg "reading_gyro" = 0.3 "degrees", 0.01 to 10.0: "Reading a bearing on a gyro repeater"; "common practice: to 0.5, 0.25 by eye".
        reading_compass_deg "reading_compass" = 0.7 "degrees", 0.01 to 10.0: "Reading a bearing on a magnetic compass at sea"; "common practice: 0.5 to 1".
        tilt_deg "tilt" = 0.3 "degrees", 0.0 to 10.0: "Tilt of the azimuth circle; counts times tan(altitude)"; "our own".
        time_s "time_s" = 2.0 "seconds", 0.0 to 3600.0: "The clock; the step that the time is written in counts where it is larger"; "our own".
        position_nm "position_nm" = 1.0 "miles", 0.0 to 600.0: "The position in each direction; the step it is written in counts where it is larger"; "our own".
        heading_comparison_deg "heading_comparison" = 0.7 "degrees", 0.0 to 10.0: "Two headings read on a yawing ship, never quite together"; "our own".
        horizon_instant_deg "horizon_instant" = 0.2 "degrees", 0.0 to 5.0: "Altitude at the instant of rising or setting; counts times tan(latitude) / sin(azimuth)"; "our own".
        eye_height_assumed_m "eye_height_assumed" = 15.0 "metres", 0.0 to 100.0: "Height of eye taken where none is given"; "our own".
        eye_height_assumed_u_m "eye_height_assumed_u" = 5.0 "metres", 0.0 to 100.0: "Its uncertainty"; "our own".
    }
}
