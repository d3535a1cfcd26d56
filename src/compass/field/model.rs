//! Which model answers for which date.

use super::series::Series;
use super::{Field, assemble, coefficients};
use crate::angle::Position;
use crate::error::NoAnswer;

/// How long past its end a model is still answered from, years (our own).
const GRACE_YEARS: f64 = 1.0;

/// A model of the earth's field.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Model {
    /// World Magnetic Model 2025, NOAA NCEI and the British Geological Survey.
    Wmm2025,
    /// International Geomagnetic Reference Field, 14th generation, IAGA.
    Igrf14,
}

impl Model {
    /// The model that answers for the decimal year `year`.
    ///
    /// # Errors
    /// [`NoAnswer::FieldModel`] before 1900.0 and after 2031.0.
    pub fn in_force(year: f64) -> Result<Self, NoAnswer> {
        let (first, _) = Self::Igrf14.span();
        let (change, end) = Self::Wmm2025.span();
        let last = end + GRACE_YEARS;
        if (change..=last).contains(&year) {
            Ok(Self::Wmm2025)
        } else if (first..change).contains(&year) {
            Ok(Self::Igrf14)
        } else {
            Err(NoAnswer::FieldModel { year, from: first, to: last })
        }
    }

    /// Its name.
    pub fn name(self) -> &'static str {
        match self {
            Self::Wmm2025 => "WMM2025",
            Self::Igrf14 => "IGRF-14",
        }
    }

    /// Who made it, and when.
    pub fn edition(self) -> &'static str {
        match self {
            Self::Wmm2025 => "World Magnetic Model, NOAA NCEI and BGS, 13 November 2024",
            Self::Igrf14 => "International Geomagnetic Reference Field, 14th generation, IAGA, doi 10.5281/zenodo.14012302",
        }
    }

    /// First and last decimal year that its makers give it for.
    pub fn span(self) -> (f64, f64) {
        match self {
            Self::Wmm2025 => (2025.0, 2030.0),
            Self::Igrf14 => (1900.0, 2030.0),
        }
    }

    /// The field by this model, whichever model answers for that date elsewhere; for comparing models.
    ///
    /// Range: the model's [span](Self::span), and a year after its end; heights as for [`field`](super::field).
    ///
    /// # Errors
    /// [`NoAnswer::FieldModel`] and [`NoAnswer::Height`] outside it.
    pub fn field(self, position: Position, year: f64, height_km: f64) -> Result<Field, NoAnswer> {
        assemble(self, position, year, height_km)
    }

    /// The series of the span of time that `year` lies in.
    pub(super) fn series(self, year: f64) -> Result<&'static Series, NoAnswer> {
        let (from, end) = self.span();
        let to = end + GRACE_YEARS;
        let none = NoAnswer::FieldModel { year, from, to };
        if !(from..=to).contains(&year) {
            return Err(none);
        }
        match self {
            Self::Wmm2025 => Ok(coefficients::wmm2025()),
            Self::Igrf14 => coefficients::igrf14().iter().rev().find(|s| s.start_year <= year).ok_or(none),
        }
    }
}
