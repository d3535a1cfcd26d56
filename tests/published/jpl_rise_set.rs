//! Rising, setting and twilight instants against JPL DE421, by the library skyfield 1.55 (MIT): the centre's topocentric
//! altitude crosses the value in the file, no refraction, UTC taken as UT1, instants to the second.

use super::file;
use shadowpin::angle::{Position, wrap_180_deg};
use shadowpin::horizon::{RisingOrSetting, Search, Target, horizontal, nearest_event};
use shadowpin::sky::sun;
use shadowpin::time::UtcInstant;

/// Half a second is the file's own rounding; the rest is the sun's place, 7" or 0.5 s, over the slant of its path. The file's rows end at
/// latitude 60; what the same place is worth beyond is measured in `horizon::events`, `the_place_is_worth_seconds`.
#[test]
fn sun_within_seconds() {
    let (mut rows, mut seconds, mut degrees) = (0, 0.0_f64, 0.0_f64);
    for row in csv::Reader::from_reader(file("jpl_de421/rise_set.csv").as_bytes()).records() {
        let row = row.unwrap();
        let number = |i: usize| row[i].parse::<f64>().unwrap();
        if &row[0] != "Sun" {
            continue;
        }
        let position = Position::from_deg(number(2), number(3)).unwrap();
        let event = if row[1].ends_with("rising") { RisingOrSetting::Rising } else { RisingOrSetting::Setting };
        let theirs = UtcInstant::from_naive(row[5].trim_end_matches('Z').parse().unwrap()).unwrap();
        // Begun from an hour beside the answer: the search must find its own way there.
        let about = theirs.plus_seconds(3600.0).unwrap();
        let target = Target::CentreAltitude { altitude_deg: number(4) };
        let Search::At(found) = nearest_event(sun::apparent_place, position, target, event, about) else {
            panic!("{row:?}: not found");
        };
        rows += 1;
        seconds = seconds.max(found.utc.seconds_since(theirs).abs());
        let azimuth = horizontal(&found.place, position).unwrap().azimuth.deg();
        degrees = degrees.max(wrap_180_deg(azimuth - number(6)).abs());
    }
    println!("sun: {rows} instants, worst {seconds:.2} s, azimuth {degrees:.4}");
    assert!(rows == 480 && seconds < 5.0 && degrees < 0.01);
}
