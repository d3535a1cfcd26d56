//! Errors that scatter less than readings can.

use super::super::learn::Logbook;
use super::super::pattern::{Pattern, PatternId};
use super::super::vessel::Vessel;
use super::Answer;
use crate::limits::Limits;

/// Fewest entries that the question may rest on.
const LEAST_ROWS: usize = 20;
/// Residuals beyond this many scatters are slips, and say nothing of how regular the rest is.
const OUTLIER: f64 = 5.0;
/// Standard normal deviate below which a chance of 1 in 10,000 lies.
const ONE_IN_TEN_THOUSAND: f64 = -3.719;

/// Standard normal deviate of a sum of squares with that many degrees of freedom.
///
/// Source: Wilson and Hilferty, Proc. Nat. Acad. Sci. 17 (1931) 684.
fn chi_square_deviate(sum: f64, degrees: f64) -> f64 {
    let c = 2.0 / (9.0 * degrees);
    ((sum / degrees).cbrt() - (1.0 - c)) / c.sqrt()
}

/// Whether `residuals` of readings to `step_deg` with a reading error of `reading_deg` scatter too little: their standard deviation
/// and what it should be over.
fn too_little(residuals: &[f64], step_deg: f64, reading_deg: f64) -> Option<(f64, f64)> {
    let least = (step_deg * step_deg / 12.0 + reading_deg * reading_deg / 4.0).sqrt();
    let n = residuals.len() as f64;
    let mean = residuals.iter().sum::<f64>() / n;
    let sum: f64 = residuals.iter().map(|r| (r - mean).powi(2)).sum();
    let sd = (sum / (n - 1.0)).sqrt();
    (sd < least && chi_square_deviate(sum / (least * least), n - 1.0) < ONE_IN_TEN_THOUSAND).then_some((sd, least))
}

pub fn judge(vessel: &Vessel, book: &Logbook, limits: &Limits) -> Answer {
    let gyro_step = book.gyro_steps.step_deg();
    let compass_step = book.compass_steps.step_deg();
    // Never fewer than the built-in number, whatever is set.
    let least_rows = LEAST_ROWS.max(limits.thresholds.too_regular_entries as usize);
    let mut why = format!("fewer than {least_rows} bearings");
    let mut judged = false;
    for gyro in &vessel.runs {
        let Some(run) = gyro.run.as_ref().filter(|r| r.established()) else { continue };
        let residuals: Vec<f64> = vessel
            .facts
            .iter()
            .filter(|f| gyro.repeaters.contains(&f.gyro))
            .filter_map(|f| Some(f.gyro_error_deg()? - run.value_deg(f)))
            .filter(|r| r.abs() < OUTLIER * run.scatter_deg)
            .collect();
        if residuals.len() < least_rows {
            continue;
        }
        if gyro_step >= 1.0 {
            "bearings are read to whole degrees, which hide how they scatter".clone_into(&mut why);
            continue;
        }
        judged = true;
        if let Some((sd, least)) = too_little(&residuals, gyro_step, limits.uncertainty.reading_gyro_deg) {
            return found("gyro errors", residuals.len(), sd, least);
        }
    }
    for (at, _) in vessel.compasses.iter().enumerate() {
        let Some(curve) = vessel.curve(at as u8) else { continue };
        let residuals: Vec<f64> = vessel
            .facts
            .iter()
            .filter(|f| usize::from(f.compass()) == at && !f.has(super::super::fact::flag::LACKS_GYRO))
            .filter_map(|f| Some(f.deviation_deg()? - curve.at(f.compass_heading_deg()?, f.field()?).0))
            .filter(|r| r.abs() < OUTLIER * curve.scatter_deg)
            .collect();
        if residuals.len() < least_rows || compass_step >= 1.0 {
            continue;
        }
        judged = true;
        if let Some((sd, least)) = too_little(&residuals, compass_step, limits.uncertainty.reading_compass_deg) {
            return found("deviations", residuals.len(), sd, least);
        }
    }
    if judged { Answer::NotSo } else { Answer::CannotTell(why) }
}

fn found(what: &str, rows: usize, sd: f64, least: f64) -> Answer {
    let detail = format!(
        "Are the bearings means of several, read finer than written, or worked from the expected error? Over {rows} entries the {what} scatter by {sd:.2} degrees; single readings in this step scatter by {least:.2} at least."
    );
    Answer::Found(Pattern { id: PatternId::TooRegular, detail, since: None })
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Lower 0.0001 point of chi-square with 30 degrees of freedom: 9.26 (printed tables; from memory), to 0.1 in the deviate.
    #[test]
    fn deviate_of_chi_square() {
        assert!((chi_square_deviate(30.0, 30.0) - 0.06).abs() < 0.05);
        assert!((chi_square_deviate(9.26, 30.0) - ONE_IN_TEN_THOUSAND).abs() < 0.1);
    }
}
