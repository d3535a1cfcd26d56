//! Whole answers, compared with files that were read by a person.

use super::{answers, shadowpin, words};

#[test]
fn azimuth_shows_the_working() {
    answers(
        "azimuth --utc 2008-07-20T04:06:12Z --lat 44-31N --lon 69-42E --body sun --gyro 103 --compass 100 --gyro-heading 045 --compass-heading 040",
        "azimuth_sun.txt",
        0,
    );
    answers("azimuth --utc 2008-12-01T07:39:22Z --position \"48-57N 173-18W\" --body vega --compass 296 --budget", "azimuth_vega.txt", 0);
    answers("azimuth --utc 2026-06-13T22:30:00Z --lat -36.1 --lon 130.56 --body moon --gyro 045½ --format json", "azimuth_moon.json", 0);
    answers(
        "azimuth --ship-time \"2026-06-14 18:30\" --zone -9 --lat -36.1 --lon 130.56 --body jupiter --gyro 315.5 --format csv",
        "azimuth_jupiter.csv",
        0,
    );
}

#[test]
fn amplitude_with_its_ladder() {
    answers(
        "amplitude --ship-time \"2026-06-14 07:05\" --zone -9 --lat 36-05.8S --lon 130-33.6E --event rising --eye-height 18 --gyro 061.5 --ladder",
        "amplitude_sunrise.txt",
        0,
    );
    // An answer, not an error: at midsummer the sun does not set there.
    answers("amplitude --utc 2026-06-21T22:00:00Z --lat 70N --lon 20E --event setting", "amplitude_midnight_sun.txt", 0);
}

#[test]
fn plan_at_dusk_and_who_is_that() {
    answers(
        "plan --utc 2026-06-14T06:00:00Z --zone -9 --lat 36-05.8S --lon 130-33.6E --course 204 --speed 12 --gyro-error 0.5L",
        "plan_dusk.txt",
        0,
    );
    answers("plan --utc 2026-06-14T10:00:00Z --lat 36-05.8S --lon 130-33.6E --bearing 100 --altitude 35", "plan_which_body.txt", 0);
}

#[test]
fn limits_with_a_profile() {
    answers("limits --limits fixtures/limits/canal.toml", "limits_canal.txt", 0);
}

/// No figure of the self-check differs, and every source is named.
#[test]
fn self_check_agrees() {
    let ran = shadowpin(&["self-check"], b"");
    assert_eq!(ran.code, Some(0), "{}", ran.out);
    for source in ["JPL DE421", "World Magnetic Model 2025", "time-azimuth table", "NAVEDTRA"] {
        assert!(ran.out.contains(source), "{source}");
    }
    assert!(ran.out.trim_end().ends_with("values agree.") && !ran.out.contains("DIFFERS"));
}

/// Each message names the option, the value, what was expected, and a hint; exit 2.
#[test]
fn options_that_cannot_be_read() {
    for (line, message) in [
        (
            "azimuth --utc 2026-06-14 --lat 1 --lon 2 --body sun",
            "shadowpin: --utc: \"2026-06-14\": expected a date and time such as 2026-06-14T06:12:30Z; the time of day is missing\n",
        ),
        (
            "azimuth --utc 2026-06-14T06:12 --lat 95 --lon 2 --body sun",
            "shadowpin: --lat: \"95\": expected a latitude from 90 S to 90 N; are latitude and longitude exchanged?\n",
        ),
        (
            "azimuth --utc 2026-06-14T06:12 --lat 1 --lon 2O --body sun",
            "shadowpin: --lon: \"2O\": expected a longitude such as -130.56, 130.56W, 130-33.6W, 130°33.6'W or 130 33 36 W; the letter O is west in some languages and east in others: write W or E\n",
        ),
        (
            "azimuth --utc 2026-06-14T06:12 --lat 1 --lon 2 --body capela",
            "shadowpin: --body: \"capela\": expected the Sun, the Moon, Venus, Mars, Jupiter, Saturn or a navigational star; is it Capella?\n",
        ),
        (
            "azimuth --ship-time \"2026-06-14 06:12\" --lat 1 --lon 2 --body sun",
            "shadowpin: --ship-time needs --zone (added to ship's time to get UTC, east -) or --utc-offset (opposite sign)\n",
        ),
        (
            "azimuth --utc 2026-06-14T06:12 --lat 90 --lon 2 --body sun",
            "shadowpin: at the pole (latitude 90.00000) there is no azimuth: every direction is the same\n",
        ),
        (
            "azimuth --utc 1899-12-31T06:12 --lat 9 --lon 2 --body sun",
            "shadowpin: --utc: \"1899-12-31T06:12\": expected a date in the years 1900 to 2100; the year 1899 is outside 1900-2100, for which the formulas were checked\n",
        ),
        ("limits --limits no-such.toml", "shadowpin: no-such.toml: No such file or directory (os error 2)\n"),
    ] {
        let words = words(line);
        let ran = shadowpin(&words.iter().map(String::as_str).collect::<Vec<_>>(), b"");
        assert_eq!((ran.code, ran.err.as_str(), ran.out.as_str()), (Some(2), message, ""), "{line}");
    }
}
