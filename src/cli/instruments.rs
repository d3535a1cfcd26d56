//! What was read on the instruments, from the command line.

use super::when_where::option;
use clap::Args;
use shadowpin::angle::text::{read_direction, read_number};
use shadowpin::angle::{CompassBearing, GyroBearing, Reading};
use shadowpin::compass::Observation;
use shadowpin::error::{Error, Result};
use shadowpin::limits::Limits;
use std::path::{Path, PathBuf};

/// Readings of the compasses and what goes with them.
#[derive(Debug, Args)]
pub struct Instruments {
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
    /// Limits file (TOML)
    #[arg(long, value_name = "FILE")]
    limits: Option<PathBuf>,
}

impl Instruments {
    /// Fills the readings in.
    pub fn fill(&self, observation: &mut Observation) -> Result<()> {
        observation.gyro_bearing = direction("--gyro", &self.gyro)?.map(|r| r.map(GyroBearing::wrapping_deg));
        observation.compass_bearing = direction("--compass", &self.compass)?.map(|r| r.map(CompassBearing::wrapping_deg));
        observation.gyro_heading = direction("--gyro-heading", &self.gyro_heading)?.map(|r| r.map(GyroBearing::wrapping_deg));
        observation.compass_heading = direction("--compass-heading", &self.compass_heading)?.map(|r| r.map(CompassBearing::wrapping_deg));
        observation.speed_kn = number("--speed", &self.speed, 100.0, "a speed in knots, 0 to 100")?;
        observation.eye_height_m = number("--eye-height", &self.eye_height, 100.0, "a height of eye in metres, 0 to 100")?;
        Ok(())
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

/// The limits of a file, or the built-in ones.
pub fn read_limits(path: Option<&Path>) -> Result<Limits> {
    let Some(path) = path else { return Ok(Limits::default()) };
    let text = std::fs::read_to_string(path).map_err(|source| Error::File { path: path.to_owned(), source })?;
    Limits::from_toml(&text, &path.display().to_string())
}

fn direction(name: &str, text: &Option<String>) -> Result<Option<Reading<f64>>> {
    text.as_deref().map(|text| option(name, read_direction(text))).transpose()
}

fn number(name: &str, text: &Option<String>, most: f64, what: &'static str) -> Result<Option<f64>> {
    text.as_deref().map(|text| option(name, read_number(text, 0.0..=most, what))).transpose()
}
