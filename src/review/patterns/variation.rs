//! Logged variation that is of an older year, or off by a constant.

use super::super::learn::Logbook;
use super::super::pattern::{NotEvaluated, Pattern, PatternId};
use super::super::robust::{self, median, scale_about_zero};
use super::super::vessel::Vessel;
use crate::limits::Limits;

/// Fewest logged variations.
const LEAST_ROWS: usize = 8;
/// A constant is one where the figures scatter about it by less than this, degrees.
const MOST_SCATTER_DEG: f64 = 0.8;
/// Years that an older chart must be old to be named.
const LEAST_YEARS: f64 = 3.0;

pub fn find(vessel: &mut Vessel, book: &Logbook, limits: &Limits) {
    let id = PatternId::VariationStale;
    let mut off: Vec<f64> = book.variations.iter().map(|v| f64::from(v.0)).collect();
    if off.len() < LEAST_ROWS {
        vessel.not_evaluated.push(NotEvaluated { id, why: format!("only {} logged variations, of {LEAST_ROWS} needed", off.len()) });
        return;
    }
    let middle = median(&mut off).unwrap_or(0.0);
    let about_middle = scale_about_zero(off.iter().map(|o| o - middle)).unwrap_or(0.0);
    let rates: Vec<f64> = book.variations.iter().map(|v| f64::from(v.1)).collect();
    let y: Vec<f64> = book.variations.iter().map(|v| f64::from(v.0)).collect();
    // Off by rate x years: one column, no constant.
    let older = robust::fit(&rates, &y, &[100.0], 0.02).and_then(|f| Some((-f.coefficients.first()?, f.scale, f.u(0))));
    if let Some((years, scatter, u)) = older
        && years > LEAST_YEARS
        && years > 8.0 * u
        && scatter < 0.7 * about_middle
        && rates.iter().map(|r| (r * years).abs()).fold(0.0, f64::max) > limits.thresholds.variation_stale_deg
    {
        vessel.variation_off = (0.0, years);
        let detail = format!(
            "Is the variation taken from a chart without its yearly change? The logged figures are those of about {years:.0} years before."
        );
        vessel.patterns.push(Pattern { id, detail, since: None });
        return;
    }
    if middle.abs() > limits.thresholds.variation_stale_deg && about_middle < MOST_SCATTER_DEG {
        vessel.variation_off = (middle, 0.0);
        let detail = format!(
            "Is the variation taken from an older chart, or with a correction that is no longer due? The logged figures are {:.1} {} of the field model throughout.",
            middle.abs(),
            if middle < 0.0 { "W" } else { "E" }
        );
        vessel.patterns.push(Pattern { id, detail, since: None });
    }
}
