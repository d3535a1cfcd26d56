//! The field model at its seams: the two models where both are valid, the years between sets, poles, 180 degrees, first and last day.

use shadowpin::angle::Position;
use shadowpin::compass::field::{Field, Model, field, field_in_year};
use shadowpin::error::NoAnswer;
use shadowpin::notice::Notice;
use shadowpin::time::UtcInstant;

fn at(lat: f64, lon: f64) -> Position {
    Position::from_deg(lat, lon).unwrap()
}

/// A net of places from pole to pole, those with a compass that points.
fn net() -> impl Iterator<Item = Position> {
    (-17..=17).flat_map(|i| (-17..=18).map(move |j| at(5.0 * f64::from(i), 10.0 * f64::from(j))))
}

fn worst(a: impl Fn(Position) -> Field, b: impl Fn(Position) -> Field, least_h: f64) -> f64 {
    let gaps = net().filter_map(|p| {
        let (a, b) = (a(p), b(p));
        (a.horizontal_nt.min(b.horizontal_nt) > least_h)
            .then(|| shadowpin::angle::wrap_180_deg(a.variation.deg() - b.variation.deg()).abs())
    });
    gaps.fold(0.0, f64::max)
}

/// No official values are published with IGRF-14. Its sums run through the code that the official WMM2025 values hold; its coefficients
/// are held by this: both models describe the same field. The bounds are
/// what was measured, with little room; all are well inside the models' own uncertainty (0.26 degrees and more).
#[test]
fn igrf14_is_near_wmm2025_where_both_are_valid() {
    for (year, all, ordinary) in [(2025.0, 0.12, 0.08), (2027.5, 0.25, 0.11), (2030.0, 0.40, 0.20)] {
        let by = |model: Model| move |p| model.field(p, year, 0.0).unwrap();
        let gap = |least_h| worst(by(Model::Igrf14), by(Model::Wmm2025), least_h);
        let (over_6000, over_15000) = (gap(6_000.0), gap(15_000.0));
        println!("IGRF-14 against WMM2025 in {year}: {over_6000:.4} degrees where H is over 6000 nT, {over_15000:.4} over 15000");
        assert!(over_6000 < all && over_15000 < ordinary, "{year}: {over_6000} {over_15000}");
        assert!(over_15000 > 1e-4, "the two models cannot be the same to {over_15000} degrees: one was read for the other");
    }
}

#[test]
fn igrf14_is_continuous_at_every_set_of_coefficients() {
    for step in 1..26 {
        let year = 1900.0 + 5.0 * f64::from(step);
        let by = |year: f64| move |p| Model::Igrf14.field(p, year, 0.0).unwrap();
        let gap = worst(by(year - 1e-7), by(year), 2_000.0);
        assert!(gap < 1e-5, "{year}: {gap}");
    }
}

/// The change in a year is the slope of the values, on both sides of a set, and at the change of model.
#[test]
fn annual_change_is_the_slope() {
    for year in [1903.0, 1957.2, 2019.9, 2026.0] {
        for p in net().filter(|p| field_in_year(*p, year, 0.0).unwrap().horizontal_nt > 3_000.0) {
            let (before, now, after) =
                (field_in_year(p, year - 0.01, 0.0), field_in_year(p, year, 0.0), field_in_year(p, year + 0.01, 0.0));
            let (before, now, after) = (before.unwrap(), now.unwrap(), after.unwrap());
            let slope = shadowpin::angle::wrap_180_deg(after.variation.deg() - before.variation.deg()) / 0.02;
            assert!((slope - now.annual.variation_deg).abs() < 1e-5, "{p:?} {year}: {slope} {:?}", now.annual);
            let slope = (after.horizontal_nt - before.horizontal_nt) / 0.02;
            assert!((slope - now.annual.horizontal_nt).abs() < 1e-3, "{p:?} {year}: {slope} {:?}", now.annual);
        }
    }
}

/// IGRF-14 is interpolated in decimal years. By days between the sets it would differ by this much at most.
#[test]
fn decimal_years_against_days_is_a_difference_nobody_can_see() {
    // 2023-12-31T24h: 1461 of the 1827 days from 2020.0 to 2025.0, or 4 of the 5 years.
    let by_days = 2020.0 + 5.0 * 1461.0 / 1827.0;
    let by = |year: f64| move |p| field_in_year(p, year, 0.0).unwrap();
    let (all, pointing) = (worst(by(2024.0), by(by_days), 0.0), worst(by(2024.0), by(by_days), 6_000.0));
    println!("decimal years against days: {all:.5} degrees at most, {pointing:.5} where H is over 6000 nT");
    assert!(all < 0.02 && pointing < 0.002, "{all} {pointing}");
    assert!(pointing > 1e-5);
}

#[test]
fn at_the_poles_variation_follows_the_meridian_given() {
    for lat in [90.0, -90.0] {
        let here = field_in_year(at(lat, 0.0), 2026.0, 0.0).unwrap();
        for lon in [-150.0, 30.0, 90.0, 180.0] {
            let there = field_in_year(at(lat, lon), 2026.0, 0.0).unwrap();
            assert!((there.horizontal_nt - here.horizontal_nt).abs() < 1e-6);
            assert!((there.down_nt - here.down_nt).abs() < 1e-6);
            // A meridian further east turns true north: at the north pole by as much westward, at the south pole eastward.
            let turned = shadowpin::angle::wrap_180_deg(there.variation.deg() - here.variation.deg() - lon * lat.signum());
            assert!(turned.abs() < 1e-9, "{lat} {lon}: {turned}");
            // The limit along that meridian.
            let near = field_in_year(at(lat - 1e-7 * lat.signum(), lon), 2026.0, 0.0).unwrap();
            assert!(shadowpin::angle::wrap_180_deg(near.variation.deg() - there.variation.deg()).abs() < 1e-4);
        }
    }
}

#[test]
fn the_180th_meridian_is_one() {
    for lat in [-60.0, 0.0, 52.0] {
        assert_eq!(field_in_year(at(lat, 180.0), 2026.0, 0.0), field_in_year(at(lat, -180.0), 2026.0, 0.0));
        let west = field_in_year(at(lat, -179.999_999), 2026.0, 0.0).unwrap();
        let east = field_in_year(at(lat, 179.999_999), 2026.0, 0.0).unwrap();
        assert!((west.variation.deg() - east.variation.deg()).abs() < 1e-5);
    }
}

#[test]
fn first_and_last_day() {
    let p = at(50.0, -5.0);
    let day =
        |y: i32, m, d, h| UtcInstant::from_naive(chrono::NaiveDate::from_ymd_opt(y, m, d).unwrap().and_hms_opt(h, 0, 0).unwrap()).unwrap();
    assert_eq!(field(p, day(1900, 1, 1, 0), 0.0).unwrap().model, Model::Igrf14);
    assert_eq!(field(p, day(2024, 12, 31, 23), 0.0).unwrap().model, Model::Igrf14);
    let first = field(p, day(2025, 1, 1, 0), 0.0).unwrap();
    assert_eq!((first.model, first.year), (Model::Wmm2025, 2025.0));
    let last = field(p, day(2029, 12, 31, 23), 0.0).unwrap();
    assert_eq!(last.notices().count(), 0);
    // At the end exactly: still inside. An hour later: said, with a larger u. A year and an hour later: refused.
    let end = field(p, day(2030, 1, 1, 0), 0.0).unwrap();
    assert_eq!(end.notices().count(), 0);
    let past = field(p, day(2030, 7, 2, 12), 0.0).unwrap();
    assert_eq!(past.notices().collect::<Vec<_>>(), [Notice::ModelEnded { valid_to: 2030.0, year: 2030.5 }]);
    assert!((past.variation_u_deg / end.variation_u_deg - 1.5).abs() < 0.01);
    assert!(field(p, day(2031, 1, 1, 0), 0.0).is_ok());
    let refused = field(p, day(2031, 1, 1, 1), 0.0).unwrap_err();
    assert!(matches!(refused, NoAnswer::FieldModel { from: 1900.0, to: 2031.0, .. }));
    assert_eq!(refused.to_string(), "no field model for 2031.00: the models span 1900.0 to 2031.0");
    for year in [1899.999, f64::NAN, f64::INFINITY, -f64::INFINITY] {
        assert!(field_in_year(p, year, 0.0).is_err());
    }
}

#[test]
fn a_weak_field_is_said() {
    let notices = |lat, lon| field_in_year(at(lat, lon), 2026.0, 0.0).unwrap().notices().map(|n| n.id()).collect::<Vec<_>>();
    assert!(notices(50.0, -5.0).is_empty());
    assert_eq!(notices(72.0, -80.0), ["weak-field"]);
    assert_eq!(notices(86.0, 140.0), ["no-compass"]);
}

#[test]
fn heights_outside_are_refused() {
    for height in [-1.1, 851.0, f64::NAN, f64::INFINITY] {
        assert!(matches!(field_in_year(at(10.0, 20.0), 2026.0, height), Err(NoAnswer::Height { .. })));
    }
    let refused = field_in_year(at(10.0, 20.0), 2026.0, 900.0).unwrap_err();
    assert_eq!(refused.to_string(), "no field for a height of 900 km: -1 to 850 km above the ellipsoid are answered");
}

#[test]
fn never_not_a_number() {
    for year in [1900.0, 1962.5, 2024.999, 2025.0, 2031.0] {
        for lat in [-90.0, -89.999_999_9, -64.0, 0.0, 1e-300, 86.5, 90.0] {
            for lon in [-180.0, -0.0, 139.0, 180.0] {
                for height in [0.0, 850.0] {
                    let f = field_in_year(at(lat, lon), year, height).unwrap();
                    let a = f.annual;
                    for x in [f.variation.deg(), f.variation_u_deg, f.inclination_deg, a.variation_deg, a.inclination_deg, a.total_nt] {
                        assert!(x.is_finite(), "{lat} {lon} {year}: {f:?}");
                    }
                }
            }
        }
    }
}
