//! How far the model's variation may be from the sea's.

use super::Model;

/// Below this horizontal intensity, nanotesla, a magnetic compass is sluggish (World Magnetic Model report's "caution zone"; from memory).
pub const WEAK_FIELD_NT: f64 = 6_000.0;
/// Below this horizontal intensity, nanotesla, a magnetic compass does not point (the same report's "unreliable zone"; from memory).
pub const NO_COMPASS_NT: f64 = 2_000.0;

/// The two terms of WMM2025's error model of variation: degrees, and degrees times nanotesla of horizontal intensity
/// (WMM2025 report; from memory). They hold what no such model can know: the rocks and currents of the place.
const WMM2025_CONSTANT_DEG: f64 = 0.26;
const WMM2025_BY_INTENSITY_DEG_NT: f64 = 5_417.0;

/// What is added for IGRF-14 in each horizontal component, (decimal year, nanotesla), evenly between.
///
/// No uncertainty is published with the coefficients that holds for a ship. These are our own allowance: next to nothing
/// while satellites measured the whole field, and more as the observatories and ships' tracks behind a set get fewer. They come
/// on top of the same local part as WMM2025's.
const IGRF14_EXTRA_NT: [(f64, f64); 5] = [(1900.0, 200.0), (1945.0, 100.0), (1965.0, 60.0), (1980.0, 30.0), (2000.0, 10.0)];

/// A direction of which nothing is known: even over the circle, 180 / root 3 degrees.
const NOTHING_KNOWN_DEG: f64 = 103.923_048_454_132_64;

/// Standard uncertainty of the variation, degrees.
///
/// WMM2025: sqrt(0.26^2 + (5417/H)^2); past the model's end that grows by its own size in a year (our own allowance for
/// a change that nobody has forecast). IGRF-14: the same with an allowance that grows with age. Never over 103.9.
pub(super) fn variation_deg(model: Model, year: f64, horizontal_nt: f64) -> f64 {
    let extra_deg_nt = match model {
        Model::Wmm2025 => 0.0,
        Model::Igrf14 => extra_nt(year).to_degrees(),
    };
    let by_intensity_squared = WMM2025_BY_INTENSITY_DEG_NT * WMM2025_BY_INTENSITY_DEG_NT + extra_deg_nt * extra_deg_nt;
    // Where the field vanishes this is infinite, and the bound below answers.
    let u = (WMM2025_CONSTANT_DEG * WMM2025_CONSTANT_DEG + by_intensity_squared / (horizontal_nt * horizontal_nt)).sqrt();
    let past_end = (year - model.span().1).max(0.0);
    (u * (1.0 + past_end)).min(NOTHING_KNOWN_DEG)
}

fn extra_nt(year: f64) -> f64 {
    let mut before = (f64::MIN, 200.0);
    for (epoch, nt) in IGRF14_EXTRA_NT {
        if year <= epoch {
            let share = (year - before.0) / (epoch - before.0);
            return before.1 + share * (nt - before.1);
        }
        before = (epoch, nt);
    }
    before.1
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn u_grows_with_age_and_past_the_end_and_is_never_more_than_nothing_known() {
        let wmm = |year, h| variation_deg(Model::Wmm2025, year, h);
        assert!((wmm(2027.0, 20_000.0) - 0.3754).abs() < 1e-4);
        assert!((wmm(2030.5, 20_000.0) - 1.5 * 0.3754).abs() < 1e-4);
        assert_eq!(wmm(2027.0, 0.0), NOTHING_KNOWN_DEG);
        assert_eq!(wmm(2027.0, 1.0), NOTHING_KNOWN_DEG);
        let igrf: Vec<f64> = [1900.0, 1930.0, 1955.0, 1970.0, 1990.0, 2020.0].map(|y| variation_deg(Model::Igrf14, y, 20_000.0)).into();
        assert!(igrf.is_sorted_by(|older, newer| older > newer), "{igrf:?}");
        assert!((igrf[0] - 0.685).abs() < 1e-3, "{igrf:?}");
    }
}
