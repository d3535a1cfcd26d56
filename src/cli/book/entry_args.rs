//! An entry on the command line: an option for each column that an officer fills in.

use super::super::card::CardArgs;
use super::super::instruments::read_limits;
use super::super::when_where::{DateOrderArg, date_order, now};
use clap::Args;
use shadowpin::book::EntryCells;
use shadowpin::error::Result;
use shadowpin::limits::Limits;
use shadowpin::logbook::columns::Column;
use shadowpin::logbook::entry::ReadAs;
use shadowpin::time::text::write::iso;
use std::path::PathBuf;

/// What was observed, or why nothing was.
#[derive(Debug, Args)]
pub struct EntryArgs {
    /// Date and time of UTC, such as 2026-06-14T06:12:30Z, or `now` for this computer's clock
    #[arg(long, value_name = "TIME", conflicts_with = "ship_time")]
    utc: Option<String>,
    /// Ship's date and time, such as "2026-06-14 15:12"; needs --zone or --utc-offset
    #[arg(long, value_name = "TIME")]
    ship_time: Option<String>,
    /// Zone description, added to ship's time to get UTC: east -, west +, such as -9 or +3.5, or a zone letter
    #[arg(long, value_name = "ZONE", allow_hyphen_values = true, conflicts_with = "utc_offset")]
    zone: Option<String>,
    /// Offset of the ship's clock from UTC, such as +09:00: the opposite sign of the zone description
    #[arg(long, value_name = "OFFSET", allow_hyphen_values = true)]
    utc_offset: Option<String>,
    /// Order of a date written in figures, where it is not 2026-06-14
    #[arg(long, value_enum)]
    date_order: Option<DateOrderArg>,
    /// Latitude, such as -36.096, 36-05.8S or "36 05 48 S"
    #[arg(long, value_name = "LATITUDE", allow_hyphen_values = true, conflicts_with = "position")]
    lat: Option<String>,
    /// Longitude, such as 130.56, 130-33.6E
    #[arg(long, value_name = "LONGITUDE", allow_hyphen_values = true, conflicts_with = "position")]
    lon: Option<String>,
    /// Latitude and longitude together, such as "36-05.8S 130-33.6E"
    #[arg(long, value_name = "POSITION", allow_hyphen_values = true)]
    position: Option<String>,
    /// Sun, Moon, Venus, Mars, Jupiter, Saturn or a star's name
    #[arg(long, value_name = "NAME")]
    body: Option<String>,
    /// azimuth (the usual), rising, setting, transit (a charted mark) or comparison (headings only)
    #[arg(long, value_name = "METHOD")]
    method: Option<String>,
    /// Nothing could be had, and why
    #[arg(long, value_name = "REASON", conflicts_with_all = ["body", "method", "remarks", "gyro", "compass"])]
    none: Option<String>,
    /// For rising and setting: celestial (the usual) or visible
    #[arg(long, value_name = "HORIZON")]
    horizon: Option<String>,
    /// On the visible horizon: centre (the usual), upper or lower
    #[arg(long, value_name = "LIMB")]
    limb: Option<String>,
    /// For a transit: the mark or range
    #[arg(long, value_name = "NAME")]
    mark: Option<String>,
    /// For a transit: its true bearing by the chart
    #[arg(long, value_name = "BEARING")]
    charted_bearing: Option<String>,
    /// Bearing by gyro
    #[arg(long, value_name = "BEARING")]
    gyro: Option<String>,
    /// Bearing by magnetic compass, read on that compass
    #[arg(long, value_name = "BEARING")]
    compass: Option<String>,
    /// Ship's head by gyro
    #[arg(long, value_name = "HEADING")]
    gyro_heading: Option<String>,
    /// Ship's head by magnetic compass
    #[arg(long, value_name = "HEADING")]
    compass_heading: Option<String>,
    /// Speed in knots, for the gyro's speed error
    #[arg(long, value_name = "KNOTS", allow_hyphen_values = true)]
    speed: Option<String>,
    /// Height of eye in metres
    #[arg(long, value_name = "METRES", allow_hyphen_values = true)]
    eye_height: Option<String>,
    /// Heel in degrees, starboard +
    #[arg(long, value_name = "DEGREES", allow_hyphen_values = true)]
    heel: Option<String>,
    /// sea (the usual), anchor or berth
    #[arg(long = "where", value_name = "WHERE")]
    whereabouts: Option<String>,
    /// The ship
    #[arg(long, value_name = "NAME")]
    vessel: Option<String>,
    /// Which gyro, such as No.1
    #[arg(long, value_name = "NAME")]
    gyro_name: Option<String>,
    /// Which repeater the bearing was read on, such as port
    #[arg(long, value_name = "NAME")]
    repeater: Option<String>,
    /// Which magnetic compass, such as standard
    #[arg(long, value_name = "NAME")]
    magnetic_compass: Option<String>,
    /// spinning (the usual) or other (fibre-optic, satellite)
    #[arg(long, value_name = "TYPE")]
    gyro_type: Option<String>,
    /// Who observed
    #[arg(long, value_name = "WHO")]
    observer: Option<String>,
    /// Anything worth keeping
    #[arg(long, value_name = "TEXT")]
    remarks: Option<String>,
    /// Limits file (TOML)
    #[arg(long, value_name = "FILE")]
    limits: Option<PathBuf>,
    #[command(flatten)]
    pub card: CardArgs,
    /// List every term of each uncertainty
    #[arg(long)]
    pub budget: bool,
}

/// The option that fills a column, for messages.
pub fn flag_of(column: &str) -> String {
    let word = match column {
        "gyro" => "gyro-name",
        "gyro_bearing" => "gyro",
        "compass_bearing" => "compass",
        "speed_kn" => "speed",
        "eye_height_m" => "eye-height",
        other => other,
    };
    format!("--{}", word.replace('_', "-"))
}

impl EntryArgs {
    /// What was given, by column; `--none` is a method and its reason.
    pub fn given(&self) -> Result<Vec<(Column, String)>> {
        let mut given: Vec<(Column, String)> = [
            (Column::Utc, &self.utc),
            (Column::ShipTime, &self.ship_time),
            (Column::Zone, &self.zone),
            (Column::UtcOffset, &self.utc_offset),
            (Column::Lat, &self.lat),
            (Column::Lon, &self.lon),
            (Column::Position, &self.position),
            (Column::Body, &self.body),
            (Column::Method, &self.method),
            (Column::Horizon, &self.horizon),
            (Column::Limb, &self.limb),
            (Column::Mark, &self.mark),
            (Column::ChartedBearing, &self.charted_bearing),
            (Column::GyroBearing, &self.gyro),
            (Column::CompassBearing, &self.compass),
            (Column::GyroHeading, &self.gyro_heading),
            (Column::CompassHeading, &self.compass_heading),
            (Column::Speed, &self.speed),
            (Column::EyeHeight, &self.eye_height),
            (Column::Heel, &self.heel),
            (Column::Where, &self.whereabouts),
            (Column::Vessel, &self.vessel),
            (Column::Gyro, &self.gyro_name),
            (Column::Repeater, &self.repeater),
            (Column::MagneticCompass, &self.magnetic_compass),
            (Column::GyroType, &self.gyro_type),
            (Column::Observer, &self.observer),
            (Column::Remarks, &self.remarks),
        ]
        .into_iter()
        .filter_map(|(column, text)| Some((column, text.clone()?)))
        .collect();
        if let Some(reason) = &self.none {
            given.push((Column::Method, "none".to_owned()));
            given.push((Column::Remarks, reason.clone()));
        }
        for (_, text) in given.iter_mut().filter(|(column, text)| *column == Column::Utc && text.trim().eq_ignore_ascii_case("now")) {
            *text = iso(now()?.utc);
        }
        Ok(given)
    }

    /// The cells of a new entry.
    pub fn cells(&self) -> Result<EntryCells> {
        let mut cells = EntryCells::default();
        self.given()?.iter().for_each(|(column, text)| cells.set(*column, text));
        Ok(cells)
    }

    /// How the texts are to be understood.
    pub fn read_as(&self) -> ReadAs {
        ReadAs { date_order: date_order(self.date_order), ..ReadAs::default() }
    }

    /// The limits file, where one is given.
    pub fn limits_file(&self) -> Option<&PathBuf> {
        self.limits.as_ref()
    }

    /// The limits in force.
    pub fn limits(&self) -> Result<Limits> {
        read_limits(self.limits.as_deref())
    }
}
