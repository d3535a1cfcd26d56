//! The moon, Venus and Mars at the instants of published worked examples, by the whole chain from UTC to the horizon.

use super::file;
use shadowpin::angle::{Position, wrap_180_deg};
use shadowpin::horizon::{RisingOrSetting, Search, Target, horizontal, nearest_event};
use shadowpin::sky::{ApparentPlace, Body, Planet, apparent_place, aries_gha_deg};
use shadowpin::time::{UtcInstant, delta_t_s};

/// Kilometres in an astronomical unit (IAU 2012), and the earth's equatorial radius, kilometres (WGS 84).
const AU_KM: f64 = 149_597_870.7;
const EARTH_RADIUS_KM: f64 = 6378.137;
const VENUS: Body = Body::Planet(Planet::Venus);

/// The row of an example is held to contain each figure that the test goes by.
fn printed(id: &str, seen: &str, figures: &[&str]) {
    let text = file("published.csv");
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let row = reader.records().map(|row| row.unwrap()).find(|row| &row[1] == id).unwrap_or_else(|| panic!("no example {id}"));
    assert_eq!(&row[3], seen, "{id}");
    for figure in figures {
        assert!([4, 5, 6].iter().any(|&i| row[i].contains(figure)), "{id} does not hold {figure}");
    }
}

fn utc(text: &str) -> UtcInstant {
    UtcInstant::from_naive(text.parse().unwrap()).unwrap()
}

/// The instant of UTC taken as UT1 at which terrestrial time shows `text`.
fn at_terrestrial(text: &str, year: f64) -> UtcInstant {
    utc(text).plus_seconds(-delta_t_s(year)).unwrap()
}

fn degrees(units: f64, minutes: f64, seconds: f64) -> f64 {
    units + minutes / 60.0 + seconds / 3600.0
}

/// Right ascension and declination against the printed ones, as arc on the sky.
fn same_place(what: &str, at: UtcInstant, place: &ApparentPlace, right_ascension_deg: f64, declination_deg: f64, arcsec: f64) {
    let ours_deg = aries_gha_deg(at) - place.gha_deg;
    let across = wrap_180_deg(ours_deg - right_ascension_deg) * declination_deg.to_radians().cos() * 3600.0;
    let along = (place.declination_deg - declination_deg) * 3600.0;
    println!("{what}: {across:.2}\" in right ascension, {along:.2}\" in declination");
    assert!(across.hypot(along) < arcsec, "{what}");
}

fn close(what: &str, ours: f64, theirs: f64, tolerance: f64) {
    println!("{what}: {ours:.5}, printed {theirs}");
    assert!((ours - theirs).abs() <= tolerance, "{what}: {ours}, printed {theirs}");
}

/// The moon's series is good for some 10"; terrestrial time is ours, 0.4 s from the example's, 0.2" of the moon.
#[test]
fn the_moon_in_april_2008() {
    printed(
        "NOVAS Moon",
        "seen",
        &["RA 17.1390774264 h dec -27.5374448869 dist 2.710296515e-3 au", "zd unrefracted 81.79563; az 219.2708891", "lat 42 N lon 70 W"],
    );
    // 10.605 h UTC, less 0.387845 s to UT1.
    let at = utc("2008-04-24T10:36:18").plus_seconds(-0.387_845).unwrap();
    let moon = apparent_place(Body::Moon, at);
    same_place("NOVAS Moon", at, &moon, 17.139_077_426_4 * 15.0, -27.537_444_886_9, 12.0);
    let distance_au = EARTH_RADIUS_KM / AU_KM / moon.horizontal_parallax_deg.to_radians().sin();
    close("distance, 1e-3 au", distance_au * 1e3, 2.710_296_515, 3e-4);
    let seen = horizontal(&moon, Position::from_deg(42.0, -70.0).unwrap()).unwrap();
    close("azimuth", seen.azimuth.deg(), 219.270_889_1, 0.004);
    close("altitude", seen.altitude_deg, 90.0 - 81.795_63, 0.004);
}

/// Against the rigorous values beside the book's, since the book's longitude leaves out 2".
#[test]
fn the_moon_in_april_1992() {
    printed("Meeus 47.a", "seen", &["1992-04-12 0h TD", "dist 368439.4; parallax 0.991910"]);
    printed("Meeus 47.a app", "from memory", &["RA 134.687915; dec 13.768449"]);
    let at = at_terrestrial("1992-04-12T00:00:00", 1992.28);
    let moon = apparent_place(Body::Moon, at);
    same_place("Meeus 47.a", at, &moon, 134.687_915, 13.768_449, 12.0);
    // The parallax belongs to the distance to 0.1 %; 0.0001 degrees are 40 km.
    close("parallax", moon.horizontal_parallax_deg, 0.991_910, 1.5e-4);
}

/// Printed to 0.001s and 0.01"; the book leaves the sight's parallax out, 0.002 degrees of altitude.
#[test]
fn venus_in_april_1987() {
    printed("Meeus 13.b", "seen", &["RA 23h09m16.641s; dec -6-43-11.61", "az(N) 248.03360; alt 15.12497", "lon 77-03-56 W"]);
    let at = utc("1987-04-10T19:21:00");
    let venus = apparent_place(VENUS, at);
    same_place("Meeus 13.b", at, &venus, degrees(23.0, 9.0, 16.641) * 15.0, -degrees(6.0, 43.0, 11.61), 1.0);
    let position = Position::from_deg(degrees(38.0, 55.0, 17.0), -degrees(77.0, 3.0, 56.0)).unwrap();
    let seen = horizontal(&venus, position).unwrap();
    close("Meeus 13.b azimuth", seen.azimuth.deg(), 248.033_60, 0.0005);
    close("Meeus 13.b altitude", seen.altitude_deg, 15.124_97, 0.003);
}

/// Printed to 0.00001 of a day, 0.9 s, with the parallax left out, another second and a half.
#[test]
fn venus_rises_and_sets_at_boston() {
    printed("Meeus 15.a", "seen", &["Boston 42-20 N 71-05 W, h0 -0.5667", "12:25:26", "02:54:40", "RA 2h46m55.51s dec 18-26-27.3"]);
    let midnight = at_terrestrial("1988-03-20T00:00:00", 1988.22);
    same_place("Meeus 15.a", midnight, &apparent_place(VENUS, midnight), degrees(2.0, 46.0, 55.51) * 15.0, degrees(18.0, 26.0, 27.3), 1.0);
    let position = Position::from_deg(degrees(42.0, 20.0, 0.0), -degrees(71.0, 5.0, 0.0)).unwrap();
    for (event, time, azimuth) in
        [(RisingOrSetting::Rising, "1988-03-20T12:25:26", 63.81), (RisingOrSetting::Setting, "1988-03-20T02:54:40", 295.98)]
    {
        let target = Target::CentreAltitude { altitude_deg: -0.5667 };
        let about = utc(time).plus_seconds(-1800.0).unwrap();
        let Search::At(found) = nearest_event(|t| apparent_place(VENUS, t), position, target, event, about) else {
            panic!("{event:?} not found");
        };
        close("Meeus 15.a, s", found.utc.seconds_since(utc(time)), 0.0, 3.0);
        close("Meeus 15.a azimuth", horizontal(&found.place, position).unwrap().azimuth.deg(), azimuth, 0.01);
    }
}

/// The instant of the example, 2003-08-28 3h17m UT, is from memory; the distance has five figures.
#[test]
fn parallax_of_mars() {
    printed("Meeus 40.a", "seen", &["dist 0.37276", "parallax 23.592"]);
    let mars = apparent_place(Body::Planet(Planet::Mars), utc("2003-08-28T03:17:00"));
    close("Meeus 40.a parallax, \"", mars.horizontal_parallax_deg * 3600.0, 23.592, 0.002);
    close("Meeus 40.a distance", EARTH_RADIUS_KM / AU_KM / mars.horizontal_parallax_deg.to_radians().sin(), 0.372_76, 2e-5);
}
