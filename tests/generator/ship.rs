//! An invented vessel: what its compasses do, and how its officers write.

use super::Rng;

/// What is wrong with a vessel, or nothing.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Kind {
    Good,
    CorrectorOff,
    CorrectorDoubled,
    LatitudeCorrectorOff,
    Step,
    RepeaterDiffers,
    /// The repeater is not written; the two wings differ.
    WingDiffers,
    CircleTilt,
    ConstantA,
    StaleVariation,
    Invented,
    VisibleHorizon,
    /// Gyro errors written east -.
    SignConvention,
    /// UTC worked with the zone applied the wrong way.
    ZoneSign,
    /// Ship's time written in the utc column.
    ShipTimeAsUtc,
    WatchesMissing,
}

impl Kind {
    pub const ALL: [Self; 16] = [
        Self::Good,
        Self::CorrectorOff,
        Self::CorrectorDoubled,
        Self::LatitudeCorrectorOff,
        Self::Step,
        Self::RepeaterDiffers,
        Self::WingDiffers,
        Self::CircleTilt,
        Self::ConstantA,
        Self::StaleVariation,
        Self::Invented,
        Self::VisibleHorizon,
        Self::SignConvention,
        Self::ZoneSign,
        Self::ShipTimeAsUtc,
        Self::WatchesMissing,
    ];

    /// The pattern that the review should name.
    pub fn pattern(self) -> Option<&'static str> {
        match self {
            Self::Good => None,
            Self::CorrectorOff | Self::CorrectorDoubled => Some("speed-corrector-off"),
            Self::LatitudeCorrectorOff => Some("latitude-corrector-off"),
            Self::Step => Some("gyro-step"),
            Self::RepeaterDiffers | Self::WingDiffers => Some("repeater-differs"),
            Self::CircleTilt => Some("azimuth-circle-tilt"),
            Self::ConstantA => Some("constant-a"),
            Self::StaleVariation => Some("variation-stale"),
            Self::Invented => Some("too-regular"),
            Self::VisibleHorizon => Some("visible-horizon"),
            Self::SignConvention | Self::ZoneSign | Self::ShipTimeAsUtc => Some("same-slip-throughout"),
            Self::WatchesMissing => Some("watches-without-entry"),
        }
    }
}

/// One vessel.
#[derive(Debug, Clone)]
pub struct Ship {
    pub name: String,
    pub kind: Kind,
    /// A to E of the standard compass, degrees.
    pub coefficients: [f64; 5],
    pub gyro_level_deg: f64,
    /// Constant part by which the variation written is off, degrees.
    pub stale_variation_deg: f64,
    /// Share of a step's size, and the share of the voyage it falls at.
    pub step_deg: f64,
    pub step_at: f64,
    /// Slow drift of the gyro, degrees a day.
    pub drift_deg_per_day: f64,
    /// Part of B that goes as the tangent of the inclination: vertical soft iron, degrees.
    pub induced_deg: f64,
    /// Part of B that goes as 25,000 nT over the horizontal field: permanent magnetism, degrees.
    pub permanent_deg: f64,
    pub eye_height_m: f64,
    pub start_unix_s: i64,
    pub start: (f64, f64),
    /// Latitudes kept to.
    pub lat_band: (f64, f64),
    /// Start of the seeds of its own voyage.
    pub seed: u64,
}

impl Ship {
    /// A vessel of that kind, drawn from `rng`.
    pub fn draw(name: &str, kind: Kind, lat_band: (f64, f64), rng: &mut Rng) -> Self {
        // What shows only in some latitudes is put there.
        let lat_band = match kind {
            Kind::VisibleHorizon => (32.0, 58.0),
            Kind::LatitudeCorrectorOff => (-50.0, 50.0),
            _ => lat_band,
        };
        let lat = rng.between(lat_band.0 + 3.0, lat_band.1 - 3.0);
        Self {
            name: name.to_owned(),
            kind,
            coefficients: [
                if kind == Kind::ConstantA { 2.6 * rng.sign() } else { rng.normal(0.25) },
                rng.normal(1.0),
                rng.normal(1.0),
                rng.between(0.3, 1.9),
                rng.normal(0.2),
            ],
            gyro_level_deg: rng.between(-0.6, 0.6),
            stale_variation_deg: if kind == Kind::StaleVariation { rng.sign() * rng.between(1.6, 2.6) } else { 0.0 },
            step_deg: rng.sign() * rng.between(2.0, 3.0),
            step_at: rng.between(0.35, 0.65),
            drift_deg_per_day: 0.0,
            induced_deg: 0.0,
            permanent_deg: 0.0,
            eye_height_m: rng.between(12.0, 30.0).round(),
            // Some day of 2025 to 2028.
            start_unix_s: 1_735_689_600 + (rng.between(0.0, 1400.0) * 86_400.0) as i64,
            start: (lat, rng.between(-179.0, 179.0)),
            lat_band,
            seed: (rng.unit() * 1e15) as u64,
        }
    }
}
