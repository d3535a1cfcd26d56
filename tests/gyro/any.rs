//! Whatever the readings, an answer, and every figure in it a number.

use proptest::prelude::*;
use shadowpin::angle::Latitude;
use shadowpin::compass::gyro::settle::assess;
use shadowpin::limits::Limits;
use shadowpin::logbook::runup::read_run_up;
use shadowpin::report::chart;
use shadowpin::report::settle::SettlePage;

proptest! {
    #![proptest_config(ProptestConfig::with_cases(150))]

    #[test]
    fn every_figure_is_a_number(
        rows in prop::collection::vec((0_u32..600, prop_oneof![Just(0_i32), -1800..1800_i32, -8..8_i32]), 0..40),
        lat in -90.0..=90.0_f64,
    ) {
        let mut text = "utc,gyro_error\n".to_owned();
        for (minutes, tenths) in &rows {
            text.push_str(&format!("2027-03-04T{:02}:{:02}Z,{:.1}\n", minutes / 60, minutes % 60, f64::from(*tenths) / 10.0));
        }
        let limits = Limits::default();
        let latitude = Latitude::from_deg(lat).unwrap();
        let run_up = read_run_up("made", text.as_bytes(), None, &limits).unwrap();
        prop_assert_eq!(run_up.readings.len() + run_up.copies.len(), rows.len());
        let found = assess(&run_up.readings, Some(latitude), &limits);
        let page = SettlePage { run_up: &run_up, found: &found, latitude: Some(latitude), limits: &limits };
        for answer in [page.text(), page.json(), page.csv(), chart::run_up(&page)] {
            prop_assert!(!answer.contains("NaN") && !answer.contains("inf ") && !answer.contains("-0.0 ") && !answer.contains("-0.00,"), "{}", answer);
        }
        let json: serde_json::Value = serde_json::from_str(&page.json()).unwrap();
        prop_assert!(["yes", "not-yet", "cannot-tell"].contains(&json["settled"].as_str().unwrap()));
        prop_assert_eq!(json["settled"] == "yes", json["settled_since"].is_string());
        prop_assert_eq!(json["settle_point"].is_number(), json["settle_point_u"].is_number());
    }
}
