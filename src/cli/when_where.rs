//! Time and place from the command line.

use super::nmea::NmeaArgs;
use clap::{Args, ValueEnum};
use shadowpin::angle::text::{read_latitude, read_longitude, read_position};
use shadowpin::compass::{Observation, Place};
use shadowpin::error::{BadValue, Error, Result};
use shadowpin::time::text::{self, DateOrder};
use shadowpin::time::{Moment, UtcInstant, Zone};

/// Order of a date written in figures.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub enum DateOrderArg {
    /// Day, month, year.
    Dmy,
    /// Month, day, year.
    Mdy,
}

/// The library's order of a date; ISO where none was said.
pub fn date_order(arg: Option<DateOrderArg>) -> DateOrder {
    match arg {
        None => DateOrder::Iso,
        Some(DateOrderArg::Dmy) => DateOrder::DayMonthYear,
        Some(DateOrderArg::Mdy) => DateOrder::MonthDayYear,
    }
}

/// When and where.
#[derive(Debug, Args)]
pub struct WhenWhere {
    /// Date and time of UTC, such as 2026-06-14T06:12:30Z, or `now` for this computer's clock
    #[arg(long, value_name = "TIME", conflicts_with = "ship_time", required_unless_present_any = ["ship_time", "nmea"])]
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
    #[arg(long, value_name = "LATITUDE", allow_hyphen_values = true, required_unless_present_any = ["position", "nmea"], conflicts_with = "position")]
    lat: Option<String>,
    /// Longitude, such as 130.56, 130-33.6E
    #[arg(long, value_name = "LONGITUDE", allow_hyphen_values = true, required_unless_present_any = ["position", "nmea"], conflicts_with = "position")]
    lon: Option<String>,
    /// Latitude and longitude together, such as "36-05.8S 130-33.6E"
    #[arg(long, value_name = "POSITION", allow_hyphen_values = true)]
    position: Option<String>,
    /// What fills in the rest.
    #[command(flatten)]
    pub nmea: NmeaArgs,
}

impl WhenWhere {
    /// Fills in the time and place that were given, and answers the zone that ship's time is kept in.
    pub fn fill(&self, observation: &mut Observation) -> Result<Option<Zone>> {
        let zone = self.zone()?;
        observation.moment = self.moment(zone)?;
        observation.place = self.place()?;
        Ok(zone)
    }

    fn moment(&self, zone: Option<Zone>) -> Result<Option<Moment>> {
        let order = date_order(self.date_order);
        let moment = match (&self.utc, &self.ship_time) {
            (Some(utc), _) if utc.eq_ignore_ascii_case("now") => now()?,
            (Some(utc), _) => option("--utc", text::read_utc_ordered(utc, order))?,
            (None, Some(ship)) => {
                let (date, clock) = option("--ship-time", text::read_date_time(ship, order))?;
                let zone = zone.ok_or_else(|| {
                    Error::Usage(
                        "--ship-time needs --zone (added to ship's time to get UTC, east -) or --utc-offset (opposite sign)".into(),
                    )
                })?;
                option("--ship-time", text::moment(date, clock, zone))?
            }
            (None, None) => return Ok(None),
        };
        Ok(Some(moment))
    }

    fn zone(&self) -> Result<Option<Zone>> {
        match (&self.zone, &self.utc_offset) {
            (Some(zone), _) => option("--zone", text::read_zone(zone)).map(Some),
            (None, Some(offset)) => option("--utc-offset", text::read_clock_offset(offset)).map(Some),
            (None, None) => Ok(None),
        }
    }

    fn place(&self) -> Result<Option<Place>> {
        let (lat, lon) = match (&self.position, &self.lat, &self.lon) {
            (Some(position), _, _) => option("--position", read_position(position))?,
            (None, Some(lat), Some(lon)) => (option("--lat", read_latitude(lat))?, option("--lon", read_longitude(lon))?),
            (None, None, None) => return Ok(None),
            _ => return Err(Error::Usage("give both --lat and --lon, or --position".into())),
        };
        let position = shadowpin::angle::Position { lat: lat.value, lon: lon.value };
        Ok(Some(Place { position, step_deg: lat.step_deg.max(lon.step_deg) }))
    }
}

/// This computer's clock.
pub fn now() -> Result<Moment> {
    let utc = UtcInstant::from_unix_ms(chrono::Utc::now().timestamp_millis())?;
    Ok(Moment { utc, step_s: 1.0 })
}

/// Says which option a bad value was given to.
pub fn option<T>(name: &str, read: Result<T, BadValue>) -> Result<T> {
    read.map_err(|bad| Error::Option { what: name.to_owned(), bad })
}
