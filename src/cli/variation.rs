//! `shadowpin variation`

use super::exit::Exit;
use super::output::{Format, OutputArgs};
use super::read;
use shadowpin::compass::field;
use shadowpin::error::{BadValue, Error, Result};
use shadowpin::report::variation;

/// Variation by WMM2025 from 2025.0, by IGRF-14 from 1900 to then: its change, its uncertainty, and the field it comes from.
#[derive(Debug, clap::Args)]
#[command(after_help = "Example:\n  shadowpin variation --lat 36.096S --lon 174.335E --utc 2026-03-01T12:00Z")]
pub struct Args {
    /// Latitude, such as -36.096, 36-05.8S
    #[arg(long, value_name = "LATITUDE", allow_hyphen_values = true)]
    lat: String,
    /// Longitude, such as 174.335, 174-20.1E
    #[arg(long, value_name = "LONGITUDE", allow_hyphen_values = true)]
    lon: String,
    /// Date, or date and time, UTC
    #[arg(long, value_name = "TIME", required_unless_present = "year", conflicts_with = "year")]
    utc: Option<String>,
    /// Decimal year, as 2026.5
    #[arg(long, value_name = "YEAR")]
    year: Option<String>,
    /// Height above the ellipsoid, kilometres
    #[arg(long, value_name = "KILOMETRES", default_value_t = 0.0, allow_hyphen_values = true)]
    height_km: f64,
    #[command(flatten)]
    output: OutputArgs,
}

pub fn run(args: Args) -> Result<Exit> {
    let position = read::position(("--lat", &args.lat), ("--lon", &args.lon))?;
    let field = match (&args.year, &args.utc) {
        (Some(year), _) => {
            let bad = || Error::Option { what: "--year".to_owned(), bad: BadValue::new(year, "a decimal year as 2026.5") };
            let year = year.trim().parse::<f64>().ok().filter(|y| y.is_finite()).ok_or_else(bad)?;
            field::field_in_year(position, year, args.height_km)?
        }
        (None, Some(utc)) => field::field(position, read::utc("--utc", utc)?, args.height_km)?,
        (None, None) => return Err(Error::Usage("--utc or --year is needed: variation changes from year to year".to_owned())),
    };
    args.output.write(&match args.output.format {
        Format::Text => variation::text(&field, position, args.height_km),
        Format::Json => variation::json(&field).to_string(),
        Format::Csv => variation::csv(&field),
    })?;
    Ok(Exit::Clean)
}
