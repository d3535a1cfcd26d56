//! The spherical-harmonic series of the field and its yearly change, summed at one place.

use super::geocentric::Geocentric;

/// Mean radius that the coefficients are reckoned from, kilometres (both models' definition).
const REFERENCE_RADIUS_KM: f64 = 6_371.2;

/// Gauss coefficients over one span of time in which they change evenly.
#[derive(Debug)]
pub(super) struct Series {
    /// Decimal year at which the change since is nil.
    pub start_year: f64,
    orders: Vec<Order>,
}

/// All terms of one order m, degrees n = m, m + 1, ...
#[derive(Debug)]
struct Order {
    m: f64,
    /// P(m,m) = `sectoral` sin(colatitude) P(m-1,m-1).
    sectoral: f64,
    terms: Vec<Term>,
}

/// One term, with what carries the Legendre function from its degree to the next: Schmidt's semi-normalised
/// P(n+1,m) = a cos(colatitude) P(n,m) - b P(n-1,m).
#[derive(Debug)]
struct Term {
    a: f64,
    b: f64,
    n: f64,
    /// sqrt(n^2 - m^2), for the slope: P'(n,m) sin(colatitude) = n cos(colatitude) P(n,m) - c P(n-1,m).
    c: f64,
    /// g, h in nanotesla at the start, then their change in nanotesla a year.
    gauss: [f64; 4],
}

/// North, east and down parts of the field, nanotesla, and their change, nanotesla a year.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Components {
    pub north: f64,
    pub east: f64,
    pub down: f64,
    pub north_rate: f64,
    pub east_rate: f64,
    pub down_rate: f64,
}

impl Series {
    /// A series to `degree`; `gauss(n, m)` gives g, h, and their yearly change.
    pub(super) fn new(start_year: f64, degree: u16, gauss: impl Fn(u16, u16) -> [f64; 4]) -> Self {
        let term = |n: u16, m: u16| {
            let (nf, mf) = (f64::from(n), f64::from(m));
            let (c, c_next) = ((nf * nf - mf * mf).sqrt(), ((nf + 1.0).powi(2) - mf * mf).sqrt());
            // There is no magnetic pole by itself: degree 0 only starts the recursion.
            let gauss = if n == 0 { [0.0; 4] } else { gauss(n, m) };
            Term { a: (2.0 * nf + 1.0) / c_next, b: c / c_next, n: nf, c, gauss }
        };
        let order = |m: u16| Order {
            m: f64::from(m),
            sectoral: if m < 2 { 1.0 } else { ((2.0 * f64::from(m) - 1.0) / (2.0 * f64::from(m))).sqrt() },
            terms: (m..=degree).map(|n| term(n, m)).collect(),
        };
        Self { start_year, orders: (0..=degree).map(order).collect() }
    }

    /// The field in the geodetic frame of `place`, in the decimal year `year`.
    ///
    /// The series is linear in its coefficients, so field and change are summed once and joined at the end.
    pub(super) fn components(&self, place: &Geocentric, year: f64) -> Components {
        let (sin, cos) = (place.cos_latitude, place.sin_latitude); // of the colatitude
        let ratio = REFERENCE_RADIUS_KM / place.radius_km;
        let (weighted_cos, ratio_squared) = (cos * ratio, ratio * ratio);
        let mut power = ratio_squared; // (a/r)^(m+2)
        let mut sectoral = 1.0;
        let (mut sin_m, mut cos_m) = (0.0, 1.0); // of m times the longitude
        let (mut north, mut east, mut down) = ([0.0; 2], [0.0; 2], [0.0; 2]);

        for order in &self.orders {
            if order.m == 0.0 {
                (north, down) = order.zonal(sin, cos, power, ratio);
                continue;
            }
            // From order 1 the functions are carried divided by sin(colatitude), which keeps all finite at the poles.
            sectoral *= order.sectoral * if order.m == 1.0 { 1.0 } else { sin };
            (sin_m, cos_m) =
                (sin_m * place.cos_longitude + cos_m * place.sin_longitude, cos_m * place.cos_longitude - sin_m * place.sin_longitude);
            power *= ratio;

            // Each function is carried with its weight (a/r)^(n+2).
            let (mut p, mut p_before) = (power * sectoral, 0.0);
            let (mut plain, mut by_degree, mut by_c) = ([0.0; 4], [0.0; 4], [0.0; 4]);
            for term in &order.terms {
                plain = add(plain, p, &term.gauss);
                by_degree = add(by_degree, term.n * p, &term.gauss);
                by_c = add(by_c, term.c * p_before, &term.gauss);
                (p_before, p) = (p, term.a * weighted_cos * p - term.b * ratio_squared * p_before);
            }
            for (i, k) in [(0, 0), (1, 2)] {
                let (g, h) = (cos * by_degree[k] - ratio * by_c[k], cos * by_degree[k + 1] - ratio * by_c[k + 1]);
                north[i] += g * cos_m + h * sin_m;
                east[i] += order.m * (plain[k] * sin_m - plain[k + 1] * cos_m);
                down[i] -= sin * ((by_degree[k] + plain[k]) * cos_m + (by_degree[k + 1] + plain[k + 1]) * sin_m);
            }
        }

        // From the geocentric to the geodetic vertical.
        let turn = |north: f64, down: f64| (north * place.cos_tilt - down * place.sin_tilt, north * place.sin_tilt + down * place.cos_tilt);
        let (north_rate, down_rate) = turn(north[1], down[1]);
        let (north_start, down_start) = turn(north[0], down[0]);
        let since = year - self.start_year;
        Components {
            north: north_start + since * north_rate,
            east: east[0] + since * east[1],
            down: down_start + since * down_rate,
            north_rate,
            east_rate: east[1],
            down_rate,
        }
    }
}

/// `sum` + `weight` times `terms`, each for itself.
fn add(sum: [f64; 4], weight: f64, terms: &[f64; 4]) -> [f64; 4] {
    [sum[0] + weight * terms[0], sum[1] + weight * terms[1], sum[2] + weight * terms[2], sum[3] + weight * terms[3]]
}

impl Order {
    /// North and down parts of order 0, and their change. The slope comes from P'(n+1) = P'(n-1) + (2n+1) P(n), in cos(colatitude).
    fn zonal(&self, sin: f64, cos: f64, mut weight: f64, ratio: f64) -> ([f64; 2], [f64; 2]) {
        let (mut p, mut p_before) = (1.0, 0.0);
        let (mut slope, mut slope_before) = (0.0, 0.0);
        let (mut north, mut down) = ([0.0; 2], [0.0; 2]);
        for term in &self.terms {
            let [g, _, g_rate, _] = term.gauss;
            let (ws, wd) = (weight * slope * sin, weight * (term.n + 1.0) * p);
            north = [north[0] - ws * g, north[1] - ws * g_rate];
            down = [down[0] - wd * g, down[1] - wd * g_rate];
            (slope_before, slope) = (slope, slope_before + (2.0 * term.n + 1.0) * p);
            (p_before, p) = (p, term.a * cos * p - term.b * p_before);
            weight *= ratio;
        }
        (north, down)
    }
}
