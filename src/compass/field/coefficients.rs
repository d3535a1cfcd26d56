//! The coefficient files, read once.

use super::series::Series;
use std::collections::HashMap;
use std::sync::OnceLock;

const WMM2025: &str = include_str!("data/WMM2025.COF");
const IGRF14: &str = include_str!("data/IGRF14.shc");

/// By degree and order (negative for h): the values of all epochs.
type IgrfTerms = HashMap<(u16, i32), Vec<f64>>;

/// Years between two sets of IGRF coefficients.
const IGRF_STEP_YEARS: f64 = 5.0;

/// WMM2025: one epoch, 2025.0, with its yearly change.
pub(super) fn wmm2025() -> &'static Series {
    static SERIES: OnceLock<Series> = OnceLock::new();
    SERIES.get_or_init(|| {
        let terms = wmm_terms(WMM2025);
        Series::new(2025.0, 12, |n, m| terms.get(&(n, m)).copied().unwrap_or_default())
    })
}

/// IGRF-14: one series for each five years, in order, the first from 1900.0.
pub(super) fn igrf14() -> &'static [Series] {
    static SERIES: OnceLock<Vec<Series>> = OnceLock::new();
    SERIES.get_or_init(|| {
        let (years, terms) = igrf_terms(IGRF14);
        let at = |n: u16, m: i32, epoch: usize| terms.get(&(n, m)).and_then(|row| row.get(epoch)).copied().unwrap_or_default();
        let span = |(epoch, &year): (usize, &f64)| {
            Series::new(year, 13, |n, m| {
                let m = i32::from(m);
                let (g, h) = (at(n, m, epoch), if m == 0 { 0.0 } else { at(n, -m, epoch) });
                let (g_next, h_next) = (at(n, m, epoch + 1), if m == 0 { 0.0 } else { at(n, -m, epoch + 1) });
                [g, h, (g_next - g) / IGRF_STEP_YEARS, (h_next - h) / IGRF_STEP_YEARS]
            })
        };
        // The last epoch only ends the span before it.
        years.iter().enumerate().take(years.len().saturating_sub(1)).map(span).collect()
    })
}

/// Lines of "n m g h dg dh"; the header and the closing nines have no six numbers.
fn wmm_terms(text: &str) -> HashMap<(u16, u16), [f64; 4]> {
    let line = |line: &str| {
        let mut words = line.split_whitespace();
        let key = (words.next()?.parse().ok()?, words.next()?.parse().ok()?);
        let gauss: Vec<f64> = words.map_while(|w| w.parse().ok()).collect();
        Some((key, gauss.try_into().ok()?))
    };
    text.lines().filter_map(line).collect()
}

/// The epochs, and lines of "n m value..." with m negative for h, one value an epoch.
fn igrf_terms(text: &str) -> (Vec<f64>, IgrfTerms) {
    let mut lines = text.lines().filter(|l| !l.starts_with('#')).skip(1);
    let numbers = |line: &str| line.split_whitespace().filter_map(|w| w.parse().ok()).collect::<Vec<f64>>();
    let years = lines.next().map(numbers).unwrap_or_default();
    let line = |line: &str| {
        let mut words = line.split_whitespace();
        let key = (words.next()?.parse().ok()?, words.next()?.parse().ok()?);
        Some((key, words.filter_map(|w| w.parse().ok()).collect()))
    };
    (years, lines.filter_map(line).collect())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_term_of_wmm2025_is_read() {
        let terms = wmm_terms(WMM2025);
        assert_eq!(terms.len(), 90); // degree and order 12: 12 x 15 / 2
        assert_eq!(terms[&(1, 0)], [-29351.8, 0.0, 12.0, 0.0]);
        assert_eq!(terms[&(12, 12)], [-0.7, 0.2, -0.1, -0.1]);
    }

    #[test]
    fn every_term_of_igrf14_is_read() {
        let (years, terms) = igrf_terms(IGRF14);
        assert_eq!(years, (0..27).map(|i| 1900.0 + 5.0 * f64::from(i)).collect::<Vec<_>>());
        assert_eq!(terms.len(), 195); // degree 13: 13 x 15
        assert!(terms.values().all(|row| row.len() == 27));
        assert_eq!(terms[&(1, 0)][..2], [-31543.0, -31464.0]);
        assert_eq!(terms[&(13, -13)][26], -0.5);
    }
}
