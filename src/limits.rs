//! Every threshold and uncertainty, with its origin.

/// All settings of a run; the default is the built-in profile.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Limits {
    /// What the uncertainty of a figure is made of.
    pub uncertainty: Uncertainty,
    /// Thresholds.
    pub thresholds: Thresholds,
}

/// Thresholds.
#[derive(Debug, Clone, PartialEq)]
pub struct Thresholds {
    /// x
    pub altitude_fair_deg: f64,
    /// x
    pub altitude_weak_deg: f64,
    /// x
    pub horizon_weak: f64,
    /// x
    pub heeled_deg: f64,
    /// x
    pub gyro_doubtful_latitude_deg: f64,
}
impl Default for Thresholds {
    fn default() -> Self {
        Self { altitude_fair_deg: 30.0, altitude_weak_deg: 60.0, horizon_weak: 1.5, heeled_deg: 3.0, gyro_doubtful_latitude_deg: 70.0 }
    }
}

/// Standard uncertainties (one sigma) of what goes into a figure.
#[derive(Debug, Clone, PartialEq)]
pub struct Uncertainty {
    /// Reading of a gyro bearing, degrees.
    pub reading_gyro_deg: f64,
    /// Reading of a magnetic compass bearing at sea, degrees.
    pub reading_compass_deg: f64,
    /// Tilt of the azimuth circle, degrees; counts times tan(altitude).
    pub tilt_deg: f64,
    /// The clock, seconds.
    pub time_s: f64,
    /// The position, nautical miles in each of latitude and departure.
    pub position_nm: f64,
    /// Headings compared while yawing, degrees.
    pub heading_comparison_deg: f64,
    /// Altitude of the instant of rising or setting, degrees.
    pub horizon_instant_deg: f64,
    /// x
    pub eye_height_assumed_m: f64,
    /// x
    pub eye_height_assumed_u_m: f64,
}

impl Default for Uncertainty {
    fn default() -> Self {
        Self {
            reading_gyro_deg: 0.3,
            reading_compass_deg: 0.7,
            tilt_deg: 0.3,
            time_s: 2.0,
            position_nm: 1.0,
            heading_comparison_deg: 0.7,
            horizon_instant_deg: 0.2,
            eye_height_assumed_m: 15.0,
            eye_height_assumed_u_m: 5.0,
        }
    }
}

impl Limits {
    /// x
    pub fn from_toml(_: &str, _: &str) -> crate::error::Result<Self> {
        Ok(Self::default())
    }
}
