//! A magnetic compass's deviation on every heading, from the vessel's own rows.
//!
//! A to E, and what magnetic latitude may change: the part of permanent magnetism goes as 1/H, that induced in vertical iron as
//! tan(inclination). Each coefficient starts from nothing with the spread that compasses have, so that a few headings give a
//! cautious curve with its uncertainty instead of a wild one.

use super::fact::Fact;
use super::robust::{self, Fit};

/// A, B, C, D, E, and the changes of B and C with 1/H and with tan(inclination).
const COLUMNS: usize = 9;
/// Standard deviations of the coefficients before the rows are looked at, degrees: common practice calls over 5 large, and A over 1.
const PRIOR_SD: [f64; COLUMNS] = [1.2, 4.0, 4.0, 1.5, 0.8, 2.0, 2.0, 1.0, 1.0];
/// Horizontal field that 1/H is reckoned from, nanotesla.
const FIELD_NT: f64 = 25_000.0;
/// Fewest rows for a curve.
const LEAST_ROWS: usize = 6;
/// Rows a fit is made from; of more, every second, third, ...
const MOST_ROWS: usize = 3000;
/// What rows are never taken to scatter less than, degrees.
const LEAST_SCALE_DEG: f64 = 0.3;
/// Width of the sectors that count as observed or not, degrees.
pub const SECTOR_DEG: usize = 15;

/// The curve of one magnetic compass.
#[derive(Debug, Clone, PartialEq)]
pub struct Curve {
    fit: Fit,
    /// The mean of 1/H and of tan(inclination) over the rows.
    centre: (f64, f64),
    /// Rows it rests on.
    pub rows: usize,
    /// Standard deviation of what is left, degrees.
    pub scatter_deg: f64,
    /// Which sectors of the card have a row.
    pub seen: [bool; 360 / SECTOR_DEG],
}

fn state((horizontal_nt, inclination): (f64, f64)) -> (f64, f64) {
    ((FIELD_NT / horizontal_nt.max(2000.0)).clamp(0.0, 6.0), inclination.clamp(-83.0, 83.0).to_radians().tan())
}

fn columns(heading_deg: f64, change: (f64, f64)) -> [f64; COLUMNS] {
    let (s, c) = heading_deg.to_radians().sin_cos();
    let (s2, c2) = (2.0 * heading_deg).to_radians().sin_cos();
    [1.0, s, c, s2, c2, s * change.0, c * change.0, s * change.1, c * change.1]
}

impl Curve {
    /// The curve through `points`: a row with its deviation, degrees.
    pub fn of(points: &[(&Fact, f64)]) -> Option<Self> {
        let step = points.len().div_ceil(MOST_ROWS).max(1);
        let used: Vec<(f64, (f64, f64), f64)> = points
            .iter()
            .step_by(step)
            .filter_map(|(f, deviation)| Some((f.compass_heading_deg()?, state(f.field()?), *deviation)))
            .collect();
        if used.len() < LEAST_ROWS {
            return None;
        }
        let n = used.len() as f64;
        let centre = used.iter().fold((0.0, 0.0), |(a, b), (_, s, _)| (a + s.0 / n, b + s.1 / n));
        let x: Vec<f64> = used.iter().flat_map(|(h, s, _)| columns(*h, (s.0 - centre.0, s.1 - centre.1))).collect();
        let y: Vec<f64> = used.iter().map(|u| u.2).collect();
        let fit = robust::fit(&x, &y, &PRIOR_SD, LEAST_SCALE_DEG)?;
        let mut seen = [false; 360 / SECTOR_DEG];
        for (fact, _) in points {
            if let Some(slot) = fact.compass_heading_deg().and_then(|h| seen.get_mut(h as usize / SECTOR_DEG)) {
                *slot = true;
            }
        }
        Some(Self { scatter_deg: fit.scale, fit, centre, rows: points.len(), seen })
    }

    /// Deviation and its standard uncertainty on a compass heading in that field, degrees.
    pub fn at(&self, heading_deg: f64, field: (f64, f64)) -> (f64, f64) {
        let state = state(field);
        let x = columns(heading_deg, (state.0 - self.centre.0, state.1 - self.centre.1));
        (self.fit.value(&x), self.fit.value_u(&x))
    }

    /// A to E with their standard uncertainties, degrees; `None` where the headings cannot tell.
    pub fn coefficients(&self) -> [Option<(f64, f64)>; 5] {
        std::array::from_fn(|i| {
            let (value, u) = (self.fit.coefficients.get(i).copied()?, self.fit.u(i));
            (u < 0.5 * PRIOR_SD.get(i).copied()?).then_some((value, u))
        })
    }

    /// Sectors of the card without a row, from and to, degrees; neighbours joined.
    pub fn unproven(&self) -> Vec<(f64, f64)> {
        unproven(&self.seen)
    }
}

/// Sectors not seen, from and to, degrees; neighbours joined, across north too.
pub fn unproven(seen: &[bool]) -> Vec<(f64, f64)> {
    let count = seen.len();
    let is_seen = |i: usize| seen.get(i % count.max(1)).copied().unwrap_or(false);
    // Start behind a proven sector, so that one across north is not cut in two.
    let Some(start) = (0..count).find(|&i| is_seen(i)) else { return vec![(0.0, 360.0)] };
    let mut sectors: Vec<(f64, f64)> = Vec::new();
    for at in start + 1..start + count {
        if is_seen(at) {
            continue;
        }
        let (from, to) = ((at * SECTOR_DEG) as f64, ((at + 1) * SECTOR_DEG) as f64);
        match sectors.last_mut() {
            Some(last) if last.1 == from => last.1 = to,
            _ => sectors.push((from, to)),
        }
    }
    sectors.iter().map(|(a, b)| (a % 360.0, if *b > 360.0 { b - 360.0 } else { *b })).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_sector_across_north_is_one() {
        let mut seen = [true; 360 / SECTOR_DEG];
        seen[0] = false;
        seen[23] = false;
        seen[4] = false;
        assert_eq!(unproven(&seen), [(60.0, 75.0), (345.0, 15.0)]);
        assert_eq!(unproven(&[false; 24]), [(0.0, 360.0)]);
        assert!(unproven(&[true; 24]).is_empty());
    }
}
