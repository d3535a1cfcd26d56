//! Altitude and azimuth, amplitude, rising and setting.

use proptest::prelude::*;
use shadowpin::angle::{Latitude, Position, wrap_180_deg};
use shadowpin::error::NoAnswer;
use shadowpin::horizon::{
    AmplitudeAnswer, HorizonLine, Horizontal, Limb, Motion, RisingOrSetting, Search, Target, altitude_deg, amplitude_at_altitude,
    geocentric_altitude_deg, height_above_visible_horizon_deg, horizontal, nearest_event, sensitivity, triangle,
};
use shadowpin::sky::{ApparentPlace, sun};
use shadowpin::time::UtcInstant;

fn place(gha_deg: f64, declination_deg: f64, horizontal_parallax_deg: f64) -> ApparentPlace {
    ApparentPlace { gha_deg, declination_deg, horizontal_parallax_deg, semidiameter_deg: 0.27 }
}

fn at(lat: f64, lon: f64) -> Position {
    Position::from_deg(lat, lon).unwrap()
}

/// Latitudes with the poles, their neighbourhood and the equator among them.
fn latitude() -> impl Strategy<Value = f64> {
    prop_oneof![8 => -90.0..=90.0_f64, 1 => Just(90.0), 1 => Just(-90.0), 1 => Just(0.0), 1 => 89.99..90.0_f64, 1 => -1e-9..1e-9_f64]
}

/// Longitudes with the date line and Greenwich among them.
fn longitude() -> impl Strategy<Value = f64> {
    prop_oneof![8 => -180.0..=180.0_f64, 1 => Just(180.0), 1 => Just(-180.0), 1 => Just(0.0), 1 => 179.999..180.0_f64]
}

fn parallax() -> impl Strategy<Value = f64> {
    prop_oneof![Just(0.0), Just(0.0024), 0.9..1.03_f64]
}

fn sane(seen: &Result<Horizontal, NoAnswer>) -> bool {
    match seen {
        Ok(seen) => (0.0..360.0).contains(&seen.azimuth.deg()) && (-90.0..=90.0).contains(&seen.altitude_deg),
        Err(NoAnswer::Zenith { altitude_deg }) => altitude_deg.abs() > 89.98,
        Err(NoAnswer::Pole { latitude_deg }) => latitude_deg.abs() > 89.99,
        Err(_) => false,
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(3000))]

    #[test]
    fn every_answer_is_a_number_in_its_circle(lat in latitude(), lon in longitude(), gha in 0.0..360.0_f64, dec in -90.0..=90.0_f64, hp in parallax(), eye in 0.0..100.0_f64) {
        let (body, here) = (place(gha, dec, hp), at(lat, lon));
        prop_assert!(sane(&horizontal(&body, here)));
        prop_assert!(sane(&triangle(here.lat, dec, gha + lon)));
        prop_assert!((-90.0..=90.0).contains(&altitude_deg(&body, here)) && (-90.0..=90.0).contains(&geocentric_altitude_deg(&body, here)));
        if let Ok(s) = sensitivity(&body, here, Motion::SUN) {
            prop_assert!([s.azimuth_deg_per_s, s.altitude_deg_per_s, s.azimuth_per_latitude, s.azimuth_per_longitude].iter().all(|x| x.is_finite()));
        }
        for limb in [Limb::Centre, Limb::Upper, Limb::Lower] {
            prop_assert!(height_above_visible_horizon_deg(dec, 0.27, limb, eye).is_finite());
            let altitude = HorizonLine::Visible { limb, eye_height_m: eye }.centre_altitude_deg(0.27);
            prop_assert!((-1.5..0.5).contains(&altitude));
            if let AmplitudeAnswer::At(a) = amplitude_at_altitude(here.lat, dec, altitude, RisingOrSetting::Rising) {
                prop_assert!((-90.0..=90.0).contains(&a.northward_deg) && (0.0..360.0).contains(&a.azimuth().deg()));
            }
        }
    }

    /// The northern sky is the southern one in a mirror: latitude and declination change sign, Z becomes 180 - Z.
    #[test]
    fn north_and_south_are_mirrored(lat in -89.9..89.9_f64, lon in longitude(), gha in 0.0..360.0_f64, dec in -89.0..89.0_f64, hp in parallax()) {
        if let (Ok(one), Ok(two)) = (horizontal(&place(gha, dec, hp), at(lat, lon)), horizontal(&place(gha, -dec, hp), at(-lat, lon))) {
            let sky = one.altitude_deg.to_radians().cos();
            prop_assert!((wrap_180_deg(one.azimuth.deg() + two.azimuth.deg() - 180.0) * sky).abs() < 1e-10);
            prop_assert!((one.altitude_deg - two.altitude_deg).abs() < 1e-10);
        }
    }

    /// Morning is the evening in a mirror: the hour angle changes sign, Z becomes 360 - Z.
    #[test]
    fn east_and_west_are_mirrored(lat in -89.9..89.9_f64, lha in -180.0..180.0_f64, dec in -89.0..89.0_f64, hp in parallax()) {
        if let (Ok(one), Ok(two)) = (horizontal(&place(lha, dec, hp), at(lat, 0.0)), horizontal(&place(-lha, dec, hp), at(lat, 0.0))) {
            let sky = one.altitude_deg.to_radians().cos();
            prop_assert!((wrap_180_deg(one.azimuth.deg() + two.azimuth.deg()) * sky).abs() < 1e-10);
            prop_assert!((one.altitude_deg - two.altitude_deg).abs() < 1e-10);
        }
    }

    /// 180 east is 180 west, and a step over it, over Greenwich, over GHA 0 or over the equator is a step like any other.
    #[test]
    fn no_seam(gha in 0.0..360.0_f64, dec in -60.0..60.0_f64, lat in -60.0..60.0_f64, hp in parallax()) {
        let body = place(gha, dec, hp);
        prop_assert_eq!(horizontal(&body, at(lat, 180.0)), horizontal(&body, at(lat, -180.0)));
        let step = 1e-7;
        let pairs = [
            ((body, at(lat, 180.0 - step)), (body, at(lat, -180.0 + step))),
            ((body, at(lat, -step)), (body, at(lat, step))),
            ((body, at(-step, 10.0)), (body, at(step, 10.0))),
            ((place(360.0 - step, dec, hp), at(lat, gha - 180.0)), (place(step, dec, hp), at(lat, gha - 180.0))),
        ];
        for ((one, here), (two, there)) in pairs {
            if let (Ok(one), Ok(two)) = (horizontal(&one, here), horizontal(&two, there)) {
                let sky = one.altitude_deg.to_radians().cos();
                prop_assert!((wrap_180_deg(one.azimuth.deg() - two.azimuth.deg()) * sky).abs() < 2e-6, "{one:?} {two:?}");
            }
        }
    }

    /// A body due north is 000, never 360, a hair west of it just under 360.
    #[test]
    fn north_is_nought(lat in 10.0..80.0_f64, dec in -9.0..80.0_f64, hair in 0.0..1e-9_f64) {
        for lha in [180.0, 180.0 - hair, 180.0 + hair] {
            let seen = horizontal(&place(lha, dec, 0.0), at(lat, 0.0)).unwrap().azimuth.deg();
            prop_assert!((0.0..360.0).contains(&seen) && wrap_180_deg(seen).abs() < 1e-6, "{seen}");
        }
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(300))]

    /// The amplitude from latitude and declination is the azimuth found by going to the instant.
    #[test]
    fn amplitude_and_instant_agree(lat in -64.0..64.0_f64, lon in longitude(), hours in 0.0..8760.0_f64, rising: bool, eye in 0.0..50.0_f64, visible: bool) {
        let event = if rising { RisingOrSetting::Rising } else { RisingOrSetting::Setting };
        let line = if visible { HorizonLine::Visible { limb: Limb::Upper, eye_height_m: eye } } else { HorizonLine::Celestial };
        let about = UtcInstant::from_unix_ms(1_767_225_600_000).unwrap().plus_seconds(hours * 3600.0).unwrap();
        let Search::At(found) = nearest_event(sun::apparent_place, at(lat, lon), Target::Horizon(line), event, about) else { panic!() };
        let seen = horizontal(&found.place, at(lat, lon)).unwrap().azimuth;
        let altitude = geocentric_altitude_deg(&found.place, at(lat, lon));
        let AmplitudeAnswer::At(amplitude) =
            amplitude_at_altitude(Latitude::from_deg(lat).unwrap(), found.place.declination_deg, altitude, event) else { panic!() };
        // They differ by the sun's parallax on the ellipsoid, 8.8" at most.
        prop_assert!(amplitude.azimuth().turn_from_deg(seen).abs() < 0.003, "{amplitude} {seen:?}");
    }

    /// Any place, any day, any target: an answer of one kind or another, at the poles too.
    #[test]
    fn every_search_ends(lat in latitude(), lon in longitude(), unix_s in -2_208_988_800_i64..4_133_980_800, altitude in -90.0..=90.0_f64, rising: bool) {
        let event = if rising { RisingOrSetting::Rising } else { RisingOrSetting::Setting };
        let about = UtcInstant::from_unix_ms(unix_s * 1000).unwrap();
        let target = Target::CentreAltitude { altitude_deg: altitude };
        match nearest_event(sun::apparent_place, at(lat, lon), target, event, about) {
            Search::At(found) => prop_assert!(found.event == event && target.excess_deg(&found.place, at(lat, lon)).abs() < 1e-5),
            Search::AlwaysAbove => prop_assert!(target.excess_deg(&sun::apparent_place(about), at(lat, lon)) >= 0.0),
            Search::AlwaysBelow => prop_assert!(target.excess_deg(&sun::apparent_place(about), at(lat, lon)) < 0.0),
            Search::NotInSpan => {}
        }
    }
}
