//! What the uncertainty of a figure is made of.

/// The terms of one figure's uncertainty, each one standard uncertainty in degrees of that figure.
///
/// u is the root of the sum of their squares; a term that does not enter is 0.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Budget {
    /// Reading the instrument.
    pub reading_deg: f64,
    /// The step the reading is written in, over root 12.
    pub step_deg: f64,
    /// Tilt of the azimuth circle, times tan(altitude).
    pub tilt_deg: f64,
    /// The time, through the azimuth's rate.
    pub time_deg: f64,
    /// The position, through the azimuth's change with latitude and longitude.
    pub position_deg: f64,
    /// The error bound of the computed place.
    pub almanac_deg: f64,
    /// The altitude at the instant of rising or setting, through tan(latitude) / sin(azimuth).
    pub instant_deg: f64,
    /// Headings of two compasses never read quite together, and the steps of both.
    pub headings_deg: f64,
    /// The variation of the field model.
    pub variation_deg: f64,
    /// The gyro error that a comparison of headings stands on.
    pub gyro_deg: f64,
}

impl Budget {
    /// The terms with the words a person reads, in the order of the fields.
    pub fn terms(&self) -> [(&'static str, f64); 10] {
        [
            ("reading", self.reading_deg),
            ("step of the reading", self.step_deg),
            ("tilt of the azimuth circle", self.tilt_deg),
            ("time", self.time_deg),
            ("position", self.position_deg),
            ("computed place", self.almanac_deg),
            ("instant on the horizon", self.instant_deg),
            ("headings compared", self.headings_deg),
            ("variation", self.variation_deg),
            ("gyro error", self.gyro_deg),
        ]
    }

    /// One standard uncertainty, degrees.
    pub fn u_deg(&self) -> f64 {
        self.terms().iter().map(|(_, term)| term * term).sum::<f64>().sqrt()
    }
}

/// The standard uncertainty of a figure rounded to steps of `step_deg`: the step over root 12.
///
/// Source: JCGM 100:2008 (GUM), 4.3.7, rectangular distribution.
pub fn step_u(step: f64) -> f64 {
    step / 12_f64.sqrt()
}
