//! The official test values of the World Magnetic Model 2025 (NOAA NCEI and BGS): all rows, all figures.

use shadowpin::angle::{Position, wrap_180_deg};
use shadowpin::compass::field::{Model, field_in_year};

/// D and I are printed to 0.01: half of that, and a hair for a value on the edge.
const HUNDREDTH: f64 = 0.005_01;
/// Y is printed to six decimals: half of the last.
const SIXTH_DECIMAL: f64 = 0.501e-6;
/// The file's X is not good to its six decimals: it is off by 1e-8 to 4e-8 of itself, as single precision would leave it,
/// but nowhere on the equator and not in Y; H and F inherit it, Z by the tilt of the vertical (1/300). `a_second_way` below shows
/// that the difference is the file's. So: the first decimal of the printed form of these values, with room.
const X_OF_THE_FILE_NT: f64 = 1e-3;
const Z_OF_THE_FILE_NT: f64 = 3e-6;
const RATES_OF_THE_FILE: f64 = 2e-6;

fn rows() -> Vec<Vec<f64>> {
    let text = super::file("wmm2025_test_values.csv");
    let rows: Vec<Vec<f64>> = text.lines().skip(1).map(|line| line.split(',').map(|x| x.parse().unwrap()).collect()).collect();
    assert_eq!(rows.len(), 100);
    rows
}

#[test]
fn all_hundred_rows() {
    for v in rows() {
        let f = field_in_year(Position::from_deg(v[2], v[3]).unwrap(), v[0], v[1]).unwrap();
        assert_eq!(f.model, Model::Wmm2025);
        let rates = f.annual;
        for (what, computed, printed, tolerance) in [
            ("D", wrap_180_deg(f.variation.deg() - v[4]), 0.0, HUNDREDTH),
            ("I", f.inclination_deg, v[5], HUNDREDTH),
            ("H", f.horizontal_nt, v[6], X_OF_THE_FILE_NT),
            ("X", f.north_nt, v[7], X_OF_THE_FILE_NT),
            ("Y", f.east_nt, v[8], SIXTH_DECIMAL),
            ("Z", f.down_nt, v[9], Z_OF_THE_FILE_NT),
            ("F", f.total_nt, v[10], X_OF_THE_FILE_NT),
            ("dD", rates.variation_deg, v[11], SIXTH_DECIMAL),
            ("dI", rates.inclination_deg, v[12], SIXTH_DECIMAL),
            ("dH", rates.horizontal_nt, v[13], RATES_OF_THE_FILE),
            ("dX", rates.north_nt, v[14], RATES_OF_THE_FILE),
            ("dY", rates.east_nt, v[15], SIXTH_DECIMAL),
            ("dZ", rates.down_nt, v[16], SIXTH_DECIMAL),
            ("dF", rates.total_nt, v[17], RATES_OF_THE_FILE),
        ] {
            assert!((computed - printed).abs() <= tolerance, "{v:?}, {what}: computed {computed}, printed {printed}");
        }
    }
}

/// X, Y, Z by textbook formulas that share nothing with the library's recursion: each Legendre function from its closed sum, its slope from
/// P' = (n cos P(n) - sqrt(n^2 - m^2) P(n-1)) / sin, straight from the coefficient file.
fn a_second_way(year: f64, height_km: f64, lat_deg: f64, lon_deg: f64) -> [f64; 3] {
    let (sin, cos) = lat_deg.to_radians().sin_cos();
    let e2 = (2.0 - 1.0 / 298.257_223_563) / 298.257_223_563;
    let normal = 6378.137 / (1.0 - e2 * sin * sin).sqrt();
    let (out, up) = ((normal + height_km) * cos, (normal * (1.0 - e2) + height_km) * sin);
    let (r, geocentric) = (out.hypot(up), up.atan2(out));
    let (x, s) = (geocentric.sin(), geocentric.cos());
    let (mut north, mut east, mut down) = (0.0, 0.0, 0.0);
    let path = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("src/compass/field/data/WMM2025.COF");
    for line in std::fs::read_to_string(path).unwrap().lines() {
        let w: Vec<f64> = line.split_whitespace().map_while(|w| w.parse().ok()).collect();
        let &[n, m, g0, h0, dg, dh] = w.as_slice() else { continue };
        let (g, h) = (g0 + (year - 2025.0) * dg, h0 + (year - 2025.0) * dh);
        let (p, p_before) = (schmidt(n as i32, m as i32, x, s), schmidt(n as i32 - 1, m as i32, x, s));
        let slope = (n * x * p - (n * n - m * m).sqrt() * p_before) / s;
        let (sin_m, cos_m) = (m * lon_deg.to_radians()).sin_cos();
        let q = (6371.2 / r).powf(n + 2.0);
        north += q * (g * cos_m + h * sin_m) * slope;
        east += q * m * (g * sin_m - h * cos_m) * p / s;
        down -= q * (n + 1.0) * (g * cos_m + h * sin_m) * p;
    }
    let (sin_t, cos_t) = (geocentric - lat_deg.to_radians()).sin_cos();
    [north * cos_t - down * sin_t, east, north * sin_t + down * cos_t]
}

/// Schmidt's P(n,m) from the closed sum for the m-th derivative of the Legendre polynomial.
fn schmidt(n: i32, m: i32, x: f64, s: f64) -> f64 {
    let factorial = |k: i32| (1..=k).map(f64::from).product::<f64>();
    if m > n || n < 0 {
        return 0.0;
    }
    let sum: f64 = (0..=(n - m) / 2)
        .map(|k| {
            let sign = if k % 2 == 0 { 1.0 } else { -1.0 };
            sign * factorial(2 * n - 2 * k) / (factorial(k) * factorial(n - k) * factorial(n - m - 2 * k)) * x.powi(n - m - 2 * k)
        })
        .sum();
    let norm = if m == 0 { 1.0 } else { (2.0 * factorial(n - m) / factorial(n + m)).sqrt() };
    norm * s.powi(m) * sum / 2f64.powi(n)
}

#[test]
fn a_second_way_agrees_to_a_millionth_of_a_nanotesla() {
    for v in rows() {
        let f = field_in_year(Position::from_deg(v[2], v[3]).unwrap(), v[0], v[1]).unwrap();
        let second = a_second_way(v[0], v[1], v[2], v[3]);
        for (ours, theirs) in [f.north_nt, f.east_nt, f.down_nt].into_iter().zip(second) {
            assert!((ours - theirs).abs() < 1e-6, "{v:?}: {ours} {theirs}");
        }
    }
}
