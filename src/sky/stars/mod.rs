//! The navigational stars.

mod table;

use super::frame::{self, Vector};
use table::{Entry, STARS};

/// One of the 57 selected stars, or Polaris.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Star(u8);

/// Radians a millisecond of arc.
const RAD_PER_MAS: f64 = std::f64::consts::PI / (180.0 * 3600.0 * 1000.0);

impl Star {
    /// Every star, in the almanac's order, Polaris last.
    pub fn all() -> impl Iterator<Item = Self> {
        (0..STARS.len() as u8).map(Self)
    }

    fn entry(self) -> &'static Entry {
        // Made only by `all`, so the index is in range; the first star stands in for the case that cannot be.
        STARS.get(usize::from(self.0)).unwrap_or(&STARS[0])
    }

    /// The common name.
    pub fn name(self) -> &'static str {
        self.entry().name
    }

    /// Bayer's name: `alpha And`.
    pub fn bayer(self) -> &'static str {
        self.entry().bayer
    }

    /// Visual magnitude; smaller is brighter.
    pub fn magnitude(self) -> f64 {
        self.entry().vmag
    }

    /// Direction from the solar system's centre of mass towards the star as seen from `earth`, astronomical units, at `years`
    /// Julian years from J2000.0: proper motion along a straight line, annual parallax. Not of unit length.
    pub(super) fn direction(self, years: f64, earth: Vector) -> Vector {
        let star = self.entry();
        let (sin_ra, cos_ra) = star.ra_deg.to_radians().sin_cos();
        let (sin_dec, cos_dec) = star.dec_deg.to_radians().sin_cos();
        let (pm_ra, pm_dec, parallax) =
            (star.pm_ra_mas * RAD_PER_MAS * years, star.pm_dec_mas * RAD_PER_MAS * years, star.parallax_mas * RAD_PER_MAS);
        let at_epoch = [cos_dec * cos_ra, cos_dec * sin_ra, sin_dec];
        let east = [-sin_ra, cos_ra, 0.0];
        let north = [-sin_dec * cos_ra, -sin_dec * sin_ra, cos_dec];
        frame::sum([(1.0, at_epoch), (pm_ra, east), (pm_dec, north), (-parallax, earth)])
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_table_is_the_file() {
        let path = concat!(env!("CARGO_MANIFEST_DIR"), "/fixtures/published/nav_stars.csv");
        let mut reader = csv::Reader::from_path(path).unwrap();
        let rows: Vec<csv::StringRecord> = reader.records().map(|r| r.unwrap()).collect();
        assert_eq!(rows.len(), STARS.len());
        for (row, star) in rows.iter().zip(STARS) {
            let number = |i: usize| row[i].parse::<f64>().unwrap();
            assert_eq!((&row[1], &row[2], &row[3]), (star.name, star.bayer, star.hip.to_string().as_str()));
            let values = [star.ra_deg, star.dec_deg, star.pm_ra_mas, star.pm_dec_mas, star.parallax_mas, star.vmag];
            assert_eq!(std::array::from_fn(|i| number(i + 4)), values, "{}", star.name);
        }
    }

    /// Two names that lists have attached to other stars.
    #[test]
    fn names_that_wander() {
        let hip = |name: &str| STARS.iter().find(|s| s.name == name).unwrap().hip;
        assert_eq!((hip("Gienah"), hip("Markab")), (59803, 113963));
    }
}
