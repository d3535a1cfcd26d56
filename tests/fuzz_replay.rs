//! The inputs that the fuzz targets keep, replayed as an ordinary test; and random bytes besides.

#[path = "fuzzed.rs"]
mod fuzzed;

use proptest::prelude::*;

type Target = (&'static str, fn(&[u8]));

const TARGETS: [Target; 8] = [
    ("angle", fuzzed::angle),
    ("time", fuzzed::time),
    ("position", fuzzed::position),
    ("log", fuzzed::log),
    ("card", fuzzed::card),
    ("limits", fuzzed::limits),
    ("nmea", fuzzed::nmea),
    ("book", fuzzed::book),
];

#[test]
fn kept_inputs() {
    for (name, target) in TARGETS {
        let folder = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("fuzz/corpus").join(name);
        let mut inputs = 0;
        for entry in std::fs::read_dir(&folder).unwrap_or_else(|e| panic!("{}: {e}", folder.display())) {
            target(&std::fs::read(entry.unwrap().path()).unwrap());
            inputs += 1;
        }
        assert!(inputs > 0, "{name} keeps no inputs");
    }
}

proptest! {
    #[test]
    fn random_bytes(bytes in proptest::collection::vec(any::<u8>(), 0..200)) {
        TARGETS.iter().for_each(|(_, target)| target(&bytes));
    }

    /// A log's header with random rows: cells of every kind of mark.
    #[test]
    fn random_rows(rows in "([-+0-9NSEWO°'\"½:.,;/ TZ\n]{0,12},){0,40}") {
        let header = "utc,ship_time,zone,lat,lon,body,method,gyro_bearing,logged_gyro_error\n";
        fuzzed::log(format!("{header}{rows}").as_bytes());
    }
}
