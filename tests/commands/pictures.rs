//! The README's pictures are those of the demo log's report, each a file of its own.

use super::{fixture, shadowpin};

/// Which picture of the report is which file: Pilgrim Reach, her gyro and her compass.
const PICTURES: [(usize, &str); 2] = [(3, "gyro_error.svg"), (4, "deviation.svg")];

/// `SHADOWPIN_WRITE_PICTURES=1 cargo test --test suite pictures` writes them anew.
#[test]
fn the_pictures_are_those_of_the_report() {
    let folder = tempfile::tempdir().unwrap();
    let report = folder.path().join("report.html");
    let ran = shadowpin(&["review", "fixtures/logs/demo.csv", "-q", "-o", "/dev/null", "--report", report.to_str().unwrap()], b"");
    assert_eq!(ran.code, Some(1), "{}", ran.err);
    let page = std::fs::read_to_string(&report).unwrap();
    let pictures: Vec<&str> = page.split("<svg ").skip(1).map(|rest| rest.split("</svg>").next().unwrap()).collect();
    let readme = std::fs::read_to_string(concat!(env!("CARGO_MANIFEST_DIR"), "/README.md")).unwrap();
    for (at, name) in PICTURES {
        // In a file of its own a picture names its language, and has a ground that it can be seen on.
        let ground = "<rect width=\"100%\" height=\"100%\" fill=\"#ffffff\"/>";
        let (head, rest) = pictures[at].split_once('>').unwrap();
        let picture = format!("<svg xmlns=\"http://www.w3.org/2000/svg\" {head}>{ground}{rest}</svg>\n");
        let path = fixture("pictures").join(name);
        if std::env::var_os("SHADOWPIN_WRITE_PICTURES").is_some() {
            std::fs::write(&path, &picture).unwrap();
        }
        assert!(std::fs::read_to_string(&path).is_ok_and(|kept| kept == picture), "{name} is not that of the report");
        assert!(readme.contains(&format!("(fixtures/pictures/{name})")));
    }
}
