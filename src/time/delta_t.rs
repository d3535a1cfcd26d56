//! Delta T = TT - UT1, from a published polynomial.

use super::scales::{Tt, Ut1};

const SECONDS_PER_DAY: f64 = 86_400.0;

/// TT - UT1 at a decimal year, seconds.
///
/// Range: 1900 to 2101; outside, the nearest piece goes on.
/// Error bound: within 0.9 s of TT - UTC in 1972-2004, and 6.5 s too large in 2026 (test `against_leap_seconds`; UTC is kept
/// within 0.9 s of UT1); later years are a forecast made in 2004. An error of 10 s moves the sun 0.4" (0.0001 degrees) and
/// the moon 5.5" (0.0015 degrees); one of 100 s, which may be so by 2100, ten times as much. Neighbouring pieces meet within
/// 0.05 s (test `pieces_meet`).
/// Source: F. Espenak and J. Meeus, Five Millennium Canon of Solar Eclipses, NASA/TP-2006-214141, section 2.8.
pub fn delta_t_s(year: f64) -> f64 {
    if year < 1920.0 {
        polynomial(year - 1900.0, &[-2.79, 1.494_119, -0.059_893_9, 0.006_196_6, -0.000_197])
    } else if year < 1941.0 {
        polynomial(year - 1920.0, &[21.20, 0.844_93, -0.076_100, 0.002_093_6])
    } else if year < 1961.0 {
        polynomial(year - 1950.0, &[29.07, 0.407, -1.0 / 233.0, 1.0 / 2547.0])
    } else if year < 1986.0 {
        polynomial(year - 1975.0, &[45.45, 1.067, -1.0 / 260.0, -1.0 / 718.0])
    } else if year < 2005.0 {
        polynomial(year - 2000.0, &[63.86, 0.334_5, -0.060_374, 0.001_727_5, 0.000_651_814, 0.000_023_735_99])
    } else if year < 2050.0 {
        polynomial(year - 2000.0, &[62.92, 0.322_17, 0.005_589])
    } else {
        let centuries = (year - 1820.0) / 100.0;
        -20.0 + 32.0 * centuries * centuries - 0.562_8 * (2150.0 - year)
    }
}

/// `c[0] + c[1] t + c[2] t^2 + ...`
fn polynomial(t: f64, coefficients: &[f64]) -> f64 {
    coefficients.iter().rev().fold(0.0, |sum, c| sum * t + c)
}

/// TT = UT1 + delta T.
impl From<Ut1> for Tt {
    fn from(ut1: Ut1) -> Self {
        let days = ut1.days_j2000();
        Self::from_days_j2000(days + delta_t_s(2000.0 + days / 365.25) / SECONDS_PER_DAY)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn pieces_meet() {
        let mut worst = 0.0_f64;
        for seam in [1920.0, 1941.0, 1961.0, 1986.0, 2005.0, 2050.0] {
            let jump = (delta_t_s(seam) - delta_t_s(seam - 1e-9)).abs();
            worst = worst.max(jump);
            assert!(jump < 0.06, "{seam}: {jump} s");
        }
        println!("worst jump {worst:.3} s");
    }

    /// TT - UTC is 32.184 s and the leap seconds (TAI - UTC); UT1 is never more than 0.9 s from UTC.
    #[test]
    fn against_leap_seconds() {
        let off = |year: i32, month: i32| {
            let leap = sofars::ts::dat(year, month, 1, 0.0).unwrap();
            delta_t_s(f64::from(year) + f64::from(month - 1) / 12.0) - (32.184 + leap)
        };
        let worst = (1972..2005).flat_map(|year| (1..=12).map(move |month| off(year, month).abs())).fold(0.0, f64::max);
        println!("1972-2004: {worst:.2} s; 2026: {:.2} s", off(2026, 12));
        assert!(worst < 0.9 && (5.0..7.5).contains(&off(2026, 12)));
    }

    #[test]
    fn tt_runs_ahead_of_ut1_by_delta_t() {
        let tt = Tt::from(Ut1::from_days_j2000(0.0));
        assert!((tt.days_j2000() * SECONDS_PER_DAY - 63.86).abs() < 1e-6);
    }
}
