//! The demonstration log: three invented vessels, a few slips, one habit of a gyro.

use super::{Columns, Kind, Log, Rng, Ship, Style, csv};

const FILE: &str = "fixtures/logs/demo.csv";

/// The demonstration log as it is committed.
pub fn demo() -> String {
    let mut rng = Rng::new(20_260_301);
    let mut ship = |name: &str, kind: Kind, start: (f64, f64), lat_band: (f64, f64), start_unix_s: i64| {
        let mut ship = Ship::draw(name, kind, lat_band, &mut rng);
        (ship.start, ship.lat_band, ship.start_unix_s, ship.step_deg) = (start, lat_band, start_unix_s, 2.4);
        ship
    };
    let ships = [
        // 2026-03-02, 2026-04-11, 2026-05-20.
        ship("Pilgrim Reach", Kind::Good, (43.2, -31.5), (25.0, 55.0), 1_772_409_600),
        ship("Corran Light", Kind::CorrectorOff, (-31.4, 88.2), (-48.0, -5.0), 1_775_865_600),
        ship("Saltmarsh", Kind::Good, (6.1, 131.7), (-35.0, 30.0), 1_779_235_200),
    ];
    let style = Style { entries: 80, slips: 0.09, ..Style::default() };
    csv(&Log::of(&ships, style, false), Columns { by_hand: true, ..Columns::default() })
}

#[test]
fn the_committed_demonstration_log_is_what_is_written_here() {
    let path = format!("{}/{FILE}", env!("CARGO_MANIFEST_DIR"));
    let text = demo();
    // To write it anew after a change here.
    if std::env::var_os("SHADOWPIN_WRITE_DEMO").is_some() {
        std::fs::write(&path, &text).unwrap();
    }
    assert_eq!(std::fs::read_to_string(&path).unwrap(), text);
    assert!(text.lines().count() > 200);
}
