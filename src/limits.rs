//! Every threshold and uncertainty, with its origin.

/// All settings of a run; the default is the built-in profile.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Limits {
    /// What the uncertainty of a figure is made of.
    pub uncertainty: Uncertainty,
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
        }
    }
}
