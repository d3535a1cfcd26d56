//! The change of B and C with magnetic latitude.

use super::swings::{Numbers, reading};
use shadowpin::angle::{CompassBearing, Position};
use shadowpin::compass::curve::latitude::{MagneticPlace, bounds, fit_by_latitude};
use shadowpin::compass::curve::{Coefficients, DeviationReading, fit};
use shadowpin::compass::field::field_in_year;

fn place(lat: f64, lon: f64) -> MagneticPlace {
    MagneticPlace::of(&field_in_year(Position::from_deg(lat, lon).unwrap(), 2026.0, 0.0).unwrap()).unwrap()
}

/// Permanent parts of B and C at `REFERENCE_NT`, induced parts where the tangent of the inclination is 1.
const PERMANENT: [f64; 2] = [4.0, -1.5];
const INDUCED: [f64; 2] = [-2.5, 0.6];
const REFERENCE_NT: f64 = 20_000.0;

fn truth(at: MagneticPlace) -> Coefficients {
    let part = |i: usize| PERMANENT[i] * REFERENCE_NT / at.horizontal_nt + INDUCED[i] * at.tan_inclination;
    Coefficients { a: 0.3, b: part(0), c: part(1), d: 1.2, e: -0.2 }
}

/// Readings on `count` headings at each place, with noise.
fn observed(places: &[MagneticPlace], count: usize, seed: u64) -> Vec<(DeviationReading, MagneticPlace)> {
    let mut n = Numbers::new(seed);
    let mut all = Vec::new();
    for at in places {
        for i in 0..count {
            let heading = 360.0 * i as f64 / count as f64 + 3.0 * n.normal();
            let deviation = truth(*at).deviation_deg(CompassBearing::wrapping_deg(heading)) + 0.4 * n.normal();
            all.push((reading(heading, deviation), *at));
        }
    }
    all
}

/// practice: +4 permanent against -4 induced at magnetic 50 N shows +2.6 at the magnetic equator and +8 at 50 S.
#[test]
fn a_compass_corrected_in_the_north_is_not_in_the_south() {
    // Of a dipole: H as cos(magnetic latitude), tan(inclination) = 2 tan(magnetic latitude).
    let at = |lat: f64| MagneticPlace { horizontal_nt: 30_000.0 * lat.to_radians().cos(), tan_inclination: 2.0 * lat.to_radians().tan() };
    let north = at(50.0);
    let [permanent, induced] = [4.0, -4.0].map(|b| {
        let rows: Vec<DeviationReading> = (0..8).map(|i| 45.0 * f64::from(i)).map(|h| reading(h, b * h.to_radians().sin())).collect();
        fit(&rows).unwrap()
    });
    let elsewhere = |to: MagneticPlace| bounds(&permanent, north, to)[0].unwrap().b + bounds(&induced, north, to)[1].unwrap().b;
    assert!((elsewhere(at(50.0))).abs() < 1e-9);
    assert!((elsewhere(at(0.0)) - 2.6).abs() < 0.05);
    assert!((elsewhere(at(-50.0)) - 8.0).abs() < 0.05);
}

#[test]
fn two_latitudes_tell_the_parts_and_predict_a_third() {
    let (north, south, there) = (place(50.0, -5.0), place(-34.0, 18.0), place(1.0, 104.0));
    let (mut inside, mut all) = (0, 0);
    for seed in 0..200 {
        let curve = fit_by_latitude(&observed(&[north, south], 8, seed)).unwrap();
        let told = curve.coefficients_at(there);
        for (part, truth) in told.iter().zip(truth(there).to_array()) {
            let part = part.expect("two latitudes far apart tell every coefficient");
            assert!(part.u_deg < 1.0, "{part:?}");
            all += 1;
            inside += usize::from((part.value_deg - truth).abs() <= 3.0 * part.u_deg);
        }
        for (part, made) in curve.permanent().into_iter().zip(PERMANENT) {
            let (part, made) = (part.unwrap(), made * REFERENCE_NT / curve.reference_nt);
            assert!((part.value_deg - made).abs() <= 4.0 * part.u_deg, "{part:?} {made}");
        }
        for (part, made) in curve.induced().into_iter().zip(INDUCED) {
            let part = part.unwrap();
            assert!((part.value_deg - made).abs() <= 4.0 * part.u_deg, "{part:?} {made}");
        }
    }
    println!("coefficients predicted at a third place: {inside} of {all} inside 3 u");
    assert!(inside * 100 >= all * 98);
}

#[test]
fn a_blunder_is_set_aside_there_too() {
    let mut rows = observed(&[place(50.0, -5.0), place(-34.0, 18.0)], 8, 4);
    rows[5].0 = reading(rows[5].0.heading.deg(), rows[5].0.deviation.deg() + 12.0);
    assert_eq!(fit_by_latitude(&rows).unwrap().set_aside, [5]);
}

#[test]
fn one_place_cannot_tell_but_predicts_itself() {
    let here = place(50.0, -5.0);
    let curve = fit_by_latitude(&observed(&[here], 16, 1)).unwrap();
    assert_eq!(curve.permanent(), [None; 2]);
    assert_eq!(curve.induced(), [None; 2]);
    let elsewhere = curve.coefficients_at(place(-34.0, 18.0));
    assert!(elsewhere[0].is_some() && elsewhere[1].is_none() && elsewhere[2].is_none() && elsewhere[3].is_some());
    let at_home = curve.coefficients_at(here);
    assert!((at_home[1].unwrap().value_deg - truth(here).b).abs() < 3.0 * at_home[1].unwrap().u_deg);
}

#[test]
fn two_places_of_one_magnetic_latitude_cannot_tell() {
    let near = [place(50.0, -5.0), place(50.3, -5.5)];
    let curve = fit_by_latitude(&observed(&near, 16, 1)).unwrap();
    assert_eq!(curve.coefficients_at(place(-34.0, 18.0))[1], None);
}
