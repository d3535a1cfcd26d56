//! What is kept of each row between the two passes: 28 bytes.

use super::row::Row;
use crate::angle::wrap_180_deg;
use crate::compass::{Observation, Target};
use crate::horizon::azimuth_per_altitude_on_horizon;
use std::f64::consts::PI;

const NONE: i16 = i16::MIN;
const NO_HEADING: u16 = u16::MAX;
/// 2000-01-01T00:00:00Z in milliseconds of the Unix count: the time kept is in steps of 2 s from here.
const EPOCH_MS: i64 = 946_684_800_000;
const STEP_MS: i64 = 2000;
/// Hundredths of a degree.
const CENTI: f64 = 100.0;
/// Steps of the kept horizontal intensity, nanotesla.
const FIELD_STEP_NT: f64 = 300.0;
/// Degrees of longitude for one step of the kept position: 0.33'.
const PLACE_STEP: f64 = 180.0 / 32_767.0;
/// Equatorial speed that the gyro's speed error is reckoned with, in knots a degree: 900 pi / 180.
const SPEED_ERROR_KN: f64 = 5.0 * PI;

/// Set beside the index of the magnetic compass where the row by itself raises a query.
const AFFECTED: u8 = 128;
/// Magnetic compasses of one vessel that can be told apart.
pub const MOST_COMPASSES: usize = 127;

/// Marks of a kept row.
pub mod flag {
    /// It has a time.
    pub const TIME: u8 = 1;
    /// It has a position.
    pub const PLACE: u8 = 2;
    /// Its deviation lacks the gyro's error: headings only were compared.
    pub const LACKS_GYRO: u8 = 4;
    /// The body was on the starboard side.
    pub const STARBOARD: u8 = 8;
    /// The body was on the port side.
    pub const PORT: u8 = 16;
    /// Something was observed.
    pub const OBSERVED: u8 = 32;
    /// Out of the order of time.
    pub const OUT_OF_ORDER: u8 = 64;
    /// Too far from its neighbours.
    pub const TOO_FAR: u8 = 128;
}

/// One row, as far as the runs, the curves, the track and the order of time need it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Fact {
    /// Number of the data row (the lower 32 bits: more rows than that do not fit in memory).
    pub number: u32,
    steps: i32,
    lat: i16,
    lon: i16,
    gyro_error: i16,
    deviation: i16,
    compass_heading: u16,
    speed_error: i16,
    on_horizon: i16,
    altitude: i8,
    inclination: i8,
    horizontal: u8,
    /// Index of gyro and repeater among the vessel's.
    pub gyro: u8,
    /// Index of the magnetic compass among the vessel's, and [`AFFECTED`].
    compass: u8,
    /// Marks.
    pub flags: u8,
}

fn centi(deg: Option<f64>) -> i16 {
    deg.map_or(NONE, |d| (d * CENTI).round().clamp(-32_000.0, 32_000.0) as i16)
}

fn from_centi(kept: i16) -> Option<f64> {
    (kept != NONE).then(|| f64::from(kept) / CENTI)
}

impl Fact {
    /// What is kept of `row`.
    pub fn of(row: &Row, gyro: u8, compass: u8, affected: bool) -> Self {
        let worked = row.worked;
        let mut flags = 0;
        let steps = row.moment.map_or(0, |m| {
            flags |= flag::TIME;
            // 2000 +- 136 years: every year that is answered.
            ((m.utc.unix_ms() - EPOCH_MS) / STEP_MS) as i32
        });
        let (lat, lon) = row.place.map_or((0, 0), |p| {
            flags |= flag::PLACE;
            ((p.position.lat.deg() / PLACE_STEP).round() as i16, (p.position.lon.deg() / PLACE_STEP).round() as i16)
        });
        if row.observation.is_some() {
            flags |= flag::OBSERVED;
        }
        let gyro_error = worked.gyro_error.map(|g| g.value.deg());
        // The gyro's own error is left out: a misread bearing must not turn the ship round.
        let heading = row.observation.and_then(|o| heading_deg(row, o));
        if let Some(relative) = row.observation.and_then(|o| Some(o.gyro_bearing?.value.deg() - o.gyro_heading?.value.deg())) {
            flags |= if wrap_180_deg(relative) >= 0.0 { flag::STARBOARD } else { flag::PORT };
        }
        let (deviation, lacks_gyro) = deviation(row);
        if lacks_gyro {
            flags |= flag::LACKS_GYRO;
        }
        let speed_error = row.observation.and_then(|o| speed_error_deg(o, heading?));
        let on_horizon = match (row.observation.map(|o| o.target), row.place, worked.true_azimuth) {
            (Some(Target::OnHorizon { .. }), Some(place), Some(azimuth)) if place.position.lat.deg().abs() > 15.0 => {
                azimuth_per_altitude_on_horizon(place.position.lat, azimuth).clamp(-20.0, 20.0)
            }
            _ => 0.0,
        };
        let altitude = match row.observation.map(|o| o.target) {
            Some(Target::Body(_)) => worked.at_time.map_or(0.0, |h| h.altitude_deg),
            _ => 0.0,
        };
        Self {
            number: row.number as u32,
            steps,
            lat,
            lon,
            gyro_error: centi(gyro_error),
            deviation: centi(deviation),
            compass_heading: row.observation.and_then(|o| o.compass_heading).map_or(NO_HEADING, |h| (h.value.deg() * CENTI).round() as u16),
            speed_error: centi(speed_error),
            on_horizon: centi(Some(on_horizon)),
            altitude: altitude.round() as i8,
            inclination: worked.field.map_or(0, |f| f.inclination_deg.round() as i8),
            horizontal: worked.field.map_or(0, |f| (f.horizontal_nt / FIELD_STEP_NT).round().clamp(0.0, 255.0) as u8),
            gyro,
            compass: if affected { compass | AFFECTED } else { compass },
            flags,
        }
    }

    pub fn has(&self, flag: u8) -> bool {
        self.flags & flag != 0
    }

    /// The same row where the vessel's gyros and compasses have other indices.
    #[must_use]
    pub fn renamed(&self, gyro: u8, compass: u8) -> Self {
        Self { gyro, compass: compass | (self.compass & AFFECTED), ..*self }
    }

    /// Index of the magnetic compass among the vessel's.
    pub fn compass(&self) -> u8 {
        self.compass & !AFFECTED
    }

    /// The row by itself raises a query.
    pub fn affected(&self) -> bool {
        self.compass & AFFECTED != 0
    }

    /// Seconds from the start of 2000, to 2 s.
    pub fn seconds(&self) -> Option<i64> {
        self.has(flag::TIME).then_some(i64::from(self.steps) * 2)
    }

    /// Milliseconds of the Unix count, to 2 s.
    pub fn unix_ms(&self) -> Option<i64> {
        self.seconds().map(|s| s * 1000 + EPOCH_MS)
    }

    /// Latitude and longitude, degrees, to 0.2'.
    pub fn place(&self) -> Option<(f64, f64)> {
        self.has(flag::PLACE).then(|| (f64::from(self.lat) * PLACE_STEP, f64::from(self.lon) * PLACE_STEP))
    }

    pub fn gyro_error_deg(&self) -> Option<f64> {
        from_centi(self.gyro_error)
    }

    /// Deviation; without the gyro's error where [`flag::LACKS_GYRO`] is set.
    pub fn deviation_deg(&self) -> Option<f64> {
        from_centi(self.deviation)
    }

    pub fn compass_heading_deg(&self) -> Option<f64> {
        (self.compass_heading != NO_HEADING).then(|| f64::from(self.compass_heading) / CENTI)
    }

    /// V cos C / (5 pi cos lat), degrees.
    pub fn speed_error_deg(&self) -> Option<f64> {
        from_centi(self.speed_error)
    }

    pub fn tan_lat(&self) -> f64 {
        (f64::from(self.lat) * PLACE_STEP).clamp(-85.0, 85.0).to_radians().tan()
    }

    pub fn tan_altitude(&self) -> f64 {
        f64::from(self.altitude.clamp(0, 80)).to_radians().tan()
    }

    /// Degrees of azimuth a degree of altitude, for a rising or setting above latitude 15; else 0.
    pub fn on_horizon(&self) -> f64 {
        from_centi(self.on_horizon).unwrap_or(0.0)
    }

    /// Horizontal intensity, nanotesla, and inclination, degrees.
    pub fn field(&self) -> Option<(f64, f64)> {
        (self.horizontal != 0).then(|| (f64::from(self.horizontal) * FIELD_STEP_NT, f64::from(self.inclination)))
    }
}

/// Ship's head from north, to a few degrees.
fn heading_deg(row: &Row, o: &Observation) -> Option<f64> {
    let by_compass = || Some(o.compass_heading?.value.deg() + row.worked.variation?.value.deg());
    o.gyro_heading.map(|h| h.value.deg()).or_else(by_compass)
}

/// V cos C / (5 pi cos lat): what a spinning gyro without a speed corrector is off by, west on northerly courses.
fn speed_error_deg(observation: &Observation, heading: f64) -> Option<f64> {
    if observation.gyro_type != crate::compass::GyroType::Spinning {
        return None;
    }
    let cos_lat = observation.place?.position.lat.deg().to_radians().cos().max(0.05);
    Some(observation.speed_kn? * heading.to_radians().cos() / (SPEED_ERROR_KN * cos_lat))
}

/// Deviation by bearing or by comparison, and whether the gyro's error is still missing in it.
fn deviation(row: &Row) -> (Option<f64>, bool) {
    if let Some(deviation) = row.worked.deviation.or(row.worked.deviation_by_comparison) {
        return (Some(deviation.value.deg()), false);
    }
    let by_headings = row.observation.and_then(|o| {
        let (gyro, compass) = (o.gyro_heading?, o.compass_heading?);
        Some(wrap_180_deg(gyro.value.deg() - compass.value.deg() - row.worked.variation?.value.deg()))
    });
    (by_headings, by_headings.is_some())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_kept_row_is_small() {
        assert_eq!(size_of::<Fact>(), 28);
    }
}
