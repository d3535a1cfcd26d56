//! The earth's magnetic field: variation, inclination and intensities at a place and date.
//!
//! Two models are compiled in, and exactly one answers for each date:
//!
//! | decimal year | model | why |
//! |---|---|---|
//! | 1900.0 up to 2025.0 | IGRF-14 | the reference for the past: each five years a set made from the data of that time |
//! | 2025.0 to 2030.0 | WMM2025 | the model that charts and receivers use now, with a published uncertainty |
//! | 2030.0 to 2031.0 | WMM2025 carried on | with a notice and a growing u; refused after |
//!
//! IGRF-14 is interpolated evenly in decimal years, as its authors define it, a year being its own 365 or 366 days.

mod coefficients;
mod geocentric;
mod model;
mod series;
mod uncertainty;

pub use model::Model;
pub use uncertainty::{NO_COMPASS_NT, WEAK_FIELD_NT};

use crate::angle::{Position, Variation};
use crate::error::NoAnswer;
use crate::notice::Notice;
use crate::time::UtcInstant;
use geocentric::Geocentric;

/// Heights that are answered, kilometres above the ellipsoid: from the deepest dry land to the top of the official test values.
const HEIGHTS_KM: std::ops::RangeInclusive<f64> = -1.0..=850.0;

/// The earth's field at one place and date.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Field {
    /// Variation, east +; at a geographic pole reckoned from the meridian of the longitude given.
    pub variation: Variation,
    /// Standard uncertainty of the variation, degrees, local disturbance of the sea bed included.
    pub variation_u_deg: f64,
    /// Inclination (dip), degrees, down +.
    pub inclination_deg: f64,
    /// Horizontal intensity, nanotesla.
    pub horizontal_nt: f64,
    /// Part towards true north, nanotesla.
    pub north_nt: f64,
    /// Part towards true east, nanotesla.
    pub east_nt: f64,
    /// Part downwards, nanotesla.
    pub down_nt: f64,
    /// Total intensity, nanotesla.
    pub total_nt: f64,
    /// Change in a year.
    pub annual: AnnualChange,
    /// Decimal year.
    pub year: f64,
    /// The model that answered.
    pub model: Model,
}

/// The change of the field in a year, at the date asked for.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct AnnualChange {
    /// Of the variation, degrees a year, eastward +.
    pub variation_deg: f64,
    /// Of the inclination, degrees a year.
    pub inclination_deg: f64,
    /// Of the horizontal intensity, nanotesla a year.
    pub horizontal_nt: f64,
    /// Of the part towards true north, nanotesla a year.
    pub north_nt: f64,
    /// Of the part towards true east, nanotesla a year.
    pub east_nt: f64,
    /// Of the part downwards, nanotesla a year.
    pub down_nt: f64,
    /// Of the total intensity, nanotesla a year.
    pub total_nt: f64,
}

impl Field {
    /// What should be said with these figures: a weak field, and a date past the model's end.
    pub fn notices(&self) -> impl Iterator<Item = Notice> {
        let horizontal_nt = self.horizontal_nt;
        let weak = match horizontal_nt {
            h if h < NO_COMPASS_NT => Some(Notice::NoCompass { horizontal_nt }),
            h if h < WEAK_FIELD_NT => Some(Notice::WeakField { horizontal_nt }),
            _ => None,
        };
        let (_, valid_to) = self.model.span();
        let ended = (self.year > valid_to).then_some(Notice::ModelEnded { valid_to, year: self.year });
        weak.into_iter().chain(ended)
    }
}

/// The field at `position` at the instant `utc`, `height_km` above the WGS 84 ellipsoid (0 at sea).
///
/// Units and signs: as in [`Field`].
///
/// Range: 1900.0 to 2031.0, heights of -1 to 850 km.
///
/// Error bound: the official test values of WMM2025 (`tests/published/wmm2025.rs`). IGRF-14 has no official values: where both
/// models are valid it is within 0.11 degrees of WMM2025's variation in 2025.0 and 0.37 in 2030.0 where the horizontal field is over
/// 6000 nT (0.07 and 0.18 over 15000 nT; `tests/magnetic/field_model.rs`). How far a model is from the sea is
/// [`Field::variation_u_deg`].
///
/// Undefined: where the horizontal field vanishes (the dip poles) variation is 0 with the u of a direction not known at all.
///
/// # Errors
/// [`NoAnswer::FieldModel`] and [`NoAnswer::Height`] outside the range.
///
/// Source: the World Magnetic Model's technical report, for the series and its change; the data's own files.
///
/// # Example
/// ```
/// use shadowpin::{angle::Position, compass::field::field_in_year};
/// let field = field_in_year(Position::from_deg(50.0, -5.0).unwrap(), 2025.5, 0.0)?;
/// assert_eq!(format!("{:.1}", field.variation.deg()), "-0.5");
/// # Ok::<(), shadowpin::error::NoAnswer>(())
/// ```
pub fn field(position: Position, utc: UtcInstant, height_km: f64) -> Result<Field, NoAnswer> {
    field_in_year(position, utc.decimal_year(), height_km)
}

/// As [`field`], for a decimal year.
///
/// # Errors
/// As [`field`].
pub fn field_in_year(position: Position, year: f64, height_km: f64) -> Result<Field, NoAnswer> {
    Model::in_force(year)?.field(position, year, height_km)
}

/// The figures of the field from its three components.
fn assemble(model: Model, position: Position, year: f64, height_km: f64) -> Result<Field, NoAnswer> {
    if !HEIGHTS_KM.contains(&height_km) {
        return Err(NoAnswer::Height { height_km, from: *HEIGHTS_KM.start(), to: *HEIGHTS_KM.end() });
    }
    let c = model.series(year)?.components(&Geocentric::of(position, height_km), year);
    // Plain roots: these lengths are nowhere near what would need hypot.
    let horizontal = (c.north * c.north + c.east * c.east).sqrt();
    let total = (horizontal * horizontal + c.down * c.down).sqrt();
    // At a dip pole the rates of what is undefined there are left at nil.
    let over = |sum: f64, length: f64| if length > 0.0 { sum / length } else { 0.0 };
    let horizontal_rate = over(c.north * c.north_rate + c.east * c.east_rate, horizontal);
    Ok(Field {
        variation: Variation::wrapping_deg(c.east.atan2(c.north).to_degrees()),
        variation_u_deg: uncertainty::variation_deg(model, year, horizontal),
        inclination_deg: c.down.atan2(horizontal).to_degrees(),
        horizontal_nt: horizontal,
        north_nt: c.north,
        east_nt: c.east,
        down_nt: c.down,
        total_nt: total,
        annual: AnnualChange {
            variation_deg: over(c.north * c.east_rate - c.east * c.north_rate, horizontal * horizontal).to_degrees(),
            inclination_deg: over(horizontal * c.down_rate - c.down * horizontal_rate, total * total).to_degrees(),
            horizontal_nt: horizontal_rate,
            north_nt: c.north_rate,
            east_nt: c.east_rate,
            down_nt: c.down_rate,
            total_nt: over(horizontal * horizontal_rate + c.down * c.down_rate, total),
        },
        year,
        model,
    })
}
