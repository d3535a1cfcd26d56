//! The sun against JPL DE421, by the library skyfield 1.55 (MIT): apparent place, WGS 84, no refraction, UTC taken as UT1.

use super::file;
use shadowpin::angle::{Position, wrap_180_deg};
use shadowpin::horizon::horizontal;
use shadowpin::sky::sun;
use shadowpin::time::UtcInstant;

/// Worst differences of one group of rows, degrees.
#[derive(Default, Clone, Copy)]
struct Worst {
    rows: usize,
    azimuth: f64,
    altitude: f64,
    hour_angle: f64,
    declination: f64,
}

impl Worst {
    fn print(&self, name: &str) {
        println!(
            "{name:28} {:5} rows: azimuth {:.5}, altitude {:.5}, hour angle {:.5}, declination {:.5}",
            self.rows, self.azimuth, self.altitude, self.hour_angle, self.declination
        );
    }
}

fn compare(name: &str, in_group: impl Fn(f64, f64, f64) -> bool) -> Worst {
    let mut worst = Worst::default();
    for row in csv::Reader::from_reader(file(name).as_bytes()).records() {
        let row = row.unwrap();
        let number = |i: usize| row[i].parse::<f64>().unwrap();
        let (lat, lon, azimuth, altitude) = (number(1), number(2), number(4), number(5));
        if !in_group(lat, altitude, azimuth) {
            continue;
        }
        let utc = UtcInstant::from_naive(row[0].trim_end_matches('Z').parse().unwrap()).unwrap();
        let place = sun::apparent_place(utc);
        let seen = horizontal(&place, Position::from_deg(lat, lon).unwrap()).unwrap();
        worst.rows += 1;
        worst.azimuth = worst.azimuth.max(wrap_180_deg(seen.azimuth.deg() - azimuth).abs());
        worst.altitude = worst.altitude.max((seen.altitude_deg - altitude).abs());
        worst.hour_angle = worst.hour_angle.max(wrap_180_deg(place.gha_deg - number(6)).abs());
        worst.declination = worst.declination.max((place.declination_deg - number(7)).abs());
    }
    worst
}

/// The bound stated in the program: 0.01 degrees of azimuth below 60 of altitude.
#[test]
fn azimuth_within_a_hundredth() {
    for name in ["jpl_de421/sun_1990_2050.csv", "jpl_de421/sun_1902_2050.csv"] {
        let worst = compare(name, |_, altitude, _| altitude <= 60.0);
        worst.print(name);
        assert!(worst.rows > 500 && worst.azimuth < 0.01, "{name}");
        // What remains of the azimuth comes from the place: 10" of it.
        assert!(worst.hour_angle < 0.0028 && worst.declination < 0.0014, "{name}");
    }
}

/// Where sums go wrong: low, high, near north and south, far north and south. Above 60 the azimuth grows with 1/cos(altitude).
#[test]
fn by_strata() {
    type Group = (&'static str, fn(f64, f64, f64) -> bool, f64);
    let groups: [Group; 7] = [
        ("altitude under 5", |_, altitude, _| altitude < 5.0, 0.01),
        ("altitude over 60", |_, altitude, _| altitude > 60.0, 0.05),
        ("within 5 of north", |_, altitude, azimuth| altitude <= 60.0 && wrap_180_deg(azimuth).abs() < 5.0, 0.01),
        ("within 5 of south", |_, altitude, azimuth| altitude <= 60.0 && wrap_180_deg(azimuth - 180.0).abs() < 5.0, 0.01),
        ("tropics", |lat, altitude, _| lat.abs() < 23.5 && altitude <= 60.0, 0.01),
        ("beyond latitude 60 north", |lat, altitude, _| lat > 60.0 && altitude <= 60.0, 0.01),
        ("beyond latitude 60 south", |lat, altitude, _| lat < -60.0 && altitude <= 60.0, 0.01),
    ];
    for (name, group, bound) in groups {
        let worst = [compare("jpl_de421/sun_1990_2050.csv", group), compare("jpl_de421/sun_1902_2050.csv", group)];
        worst[0].print(name);
        worst[1].print(name);
        assert!(worst[0].rows + worst[1].rows > 10, "{name} has no rows to judge by");
        assert!(worst.iter().all(|w| w.azimuth < bound), "{name}");
    }
}
