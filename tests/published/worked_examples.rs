//! Worked examples from handbooks, examination exercises and other libraries' own tests, kept as delivered in
//! `published.csv` with the source of each.

use super::file;
use shadowpin::angle::{CompassBearing, GyroBearing, Latitude, Position, TrueBearing, Variation, wrap_180_deg};
use shadowpin::horizon::{
    AmplitudeAnswer, RisingOrSetting, amplitude_at_altitude, dip_deg, horizontal, parallactic_angle_deg, refraction_from_apparent_deg,
    refraction_from_true_deg, triangle,
};
use shadowpin::sky::earth::{Nutation, apparent_sidereal_time_deg, mean_obliquity_deg, mean_sidereal_time_deg, nutation};
use shadowpin::sky::{aries_gha_deg, sun};
use shadowpin::time::{Tt, Ut1, UtcInstant, delta_t_s};

/// The row of an example, held to contain what the test goes by: `seen` or `from memory`, and each printed figure.
fn printed(id: &str, seen: &str, figures: &[&str]) {
    let text = file("published.csv");
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let row = reader.records().map(|row| row.unwrap()).find(|row| &row[1] == id).unwrap_or_else(|| panic!("no example {id}"));
    assert_eq!(&row[3], seen, "{id}");
    for figure in figures {
        assert!([&row[2], &row[4], &row[5], &row[6]].iter().any(|cell| cell.contains(figure)), "{id} does not hold {figure}");
    }
}

fn close(what: &str, ours: f64, theirs: f64, tolerance: f64) {
    println!("{what}: {ours:.6}, printed {theirs}");
    assert!((ours - theirs).abs() <= tolerance, "{what}: {ours}, printed {theirs}");
}

fn dms(degrees: f64, minutes: f64, seconds: f64) -> f64 {
    degrees + minutes / 60.0 + seconds / 3600.0
}

fn utc(text: &str) -> UtcInstant {
    UtcInstant::from_naive(text.parse().unwrap()).unwrap()
}

fn lat(deg: f64) -> Latitude {
    Latitude::from_deg(deg).unwrap()
}

fn jd(jd: f64) -> f64 {
    jd - 2_451_545.0
}

/// UTC taken as UT1 at 1992-10-13 0h TD.
fn utc_1992() -> UtcInstant {
    utc("1992-10-13T00:00:00").plus_seconds(-delta_t_s(1992.78)).unwrap()
}

/// Tables to 0.1 degrees: half of that, and a little for their own rounding.
#[test]
fn azimuth_from_latitude_declination_hour_angle() {
    for (id, figure, latitude, declination, lha, azimuth) in [
        ("QM-229-33-19-51", "Z 129.1", 33.0, -19.0, 51.0, 360.0 - 129.1),
        ("QM-229-33-20-51", "Z 129.8", 33.0, -20.0, 51.0, 360.0 - 129.8),
        ("QM-229-33-19-52", "Z 128.4", 33.0, -19.0, 52.0, 360.0 - 128.4),
        ("QM-azimuth-sun", "Z 129.0", dms(33.0, 37.0, 0.0), -dms(19.0, 31.6, 0.0), dms(51.0, 53.4, 0.0), 360.0 - 129.0),
        ("EX34-1 Altair", "T Az 073.8", -dms(24.0, 12.0, 0.0), dms(8.0, 53.2, 0.0), dms(288.0, 49.8, 0.0), 73.8),
        ("EX34-2 Vega", "T Az 299.47", dms(48.0, 57.0, 0.0), dms(38.0, 47.6, 0.0), dms(92.0, 46.5, 0.0), 299.47),
        ("IMU Canopus", "T Az 143.6", dms(4.0, 30.0, 0.0), -dms(52.0, 42.1, 0.0), dms(282.0, 9.7, 0.0), 143.6),
    ] {
        printed(id, "seen", &[figure]);
        close(id, triangle(lat(latitude), declination, lha).unwrap().azimuth.deg(), azimuth, 0.06);
    }
}

/// East and west errors, named by the exercise: the absolute test of our signs. Printed to 0.1 degrees.
#[test]
fn sun_azimuth_from_time_to_compass_error() {
    for (id, figures, time, place, observed, variation, azimuth, error, deviation) in [
        (
            "EX28-1",
            ["T Az 103.1; error 3.1 E; dev 4.9 W", "variation 8.0 E"],
            "2008-07-20T04:06:12",
            (dms(44.0, 31.0, 0.0), dms(69.0, 42.0, 0.0)),
            100.0,
            8.0,
            103.1,
            3.1,
            -4.9,
        ),
        (
            "EX28-2",
            ["T Az 259.8; error 5.2 W; dev 3.2 W", "variation 2.0 W"],
            "2008-09-22T10:09:38",
            (dms(18.0, 20.0, 0.0), dms(85.0, 40.0, 0.0)),
            265.0,
            -2.0,
            259.8,
            -5.2,
            -3.2,
        ),
    ] {
        printed(id, "seen", &figures);
        let seen = horizontal(&sun::apparent_place(utc(time)), Position::from_deg(place.0, place.1).unwrap()).unwrap();
        close(id, seen.azimuth.deg(), azimuth, 0.06);
        let compass_error = seen.azimuth - CompassBearing::wrapping_deg(observed);
        close("compass error", compass_error.deg(), error, 0.06);
        close("deviation", (compass_error - Variation::wrapping_deg(variation)).deg(), deviation, 0.06);
    }
}

/// Amplitudes printed to 0.1 degrees, the first from a table cell of whole degrees corrected by eye.
#[test]
fn amplitude_on_the_celestial_horizon() {
    let azimuth = |latitude, declination, event| match amplitude_at_altitude(lat(latitude), declination, 0.0, event) {
        AmplitudeAnswer::At(amplitude) => amplitude.azimuth(),
        other => panic!("{other:?}"),
    };
    let (rising, setting) = (RisingOrSetting::Rising, RisingOrSetting::Setting);

    printed("QM-amplitude", "seen", &["table cell (51,19) 31.2; azimuth 301.2; gyro error 1.2 E", "observed 300.0"]);
    let seen: TrueBearing = azimuth(dms(51.0, 4.6, 0.0), dms(19.0, 0.4, 0.0), setting);
    close("QM-amplitude", seen.deg(), 301.2, 0.06);
    close("gyro error", (seen - GyroBearing::wrapping_deg(300.0)).deg(), 1.2, 0.06);
    close("cell (51,19)", azimuth(51.0, 19.0, setting).deg() - 270.0, 31.2, 0.051);

    printed("BOWDITCH-amplitude-1", "from memory", &["(51,19.5) 32.0", "W 32.6 N; Zn 302.6; gyro error 0.4 W", "observed 303.0"]);
    let seen = azimuth(dms(51.0, 24.6, 0.0), dms(19.0, 40.4, 0.0), setting);
    close("BOWDITCH-amplitude-1", seen.deg(), 302.6, 0.1);
    close("gyro error", (seen - GyroBearing::wrapping_deg(303.0)).deg(), -0.4, 0.1);
    close("cell (51,19.5)", azimuth(51.0, 19.5, setting).deg() - 270.0, 32.0, 0.06);

    printed("EX29-1", "seen", &["T Az 079.7; error 10.3 W; dev 5.3 W", "observed 90; var 5.0 W"]);
    let seen = azimuth(dms(40.0, 28.0, 0.0), dms(7.0, 50.3, 0.0), rising);
    close("EX29-1", seen.deg(), 79.7, 0.06);
    let compass_error = seen - CompassBearing::wrapping_deg(90.0);
    close("compass error", compass_error.deg(), -10.3, 0.06);
    close("deviation", (compass_error - Variation::wrapping_deg(-5.0)).deg(), -5.3, 0.06);

    // Its result was not seen; the recomputed one is another program's.
    printed("EX29-2", "seen", &["az 288.002", "dec 15d30.5m; setting"]);
    close("EX29-2", azimuth(dms(30.0, 6.0, 0.0), dms(15.0, 30.5, 0.0), setting).deg(), 288.002, 0.0006);
}

/// Sidereal time: its polynomial to the printed digits, its equation of the equinoxes to our nutation (0.3" is 0.02 s).
#[test]
fn sidereal_time() {
    const SECOND_DEG: f64 = 15.0 / 3600.0;
    printed("Meeus 12.a", "seen", &["GMST 13h10m46.3668s; GAST 13h10m46.1351s", "JD 2446895.5"]);
    let ut = Ut1::from_days_j2000(jd(2_446_895.5));
    close("Meeus 12.a mean, s", mean_sidereal_time_deg(ut) / SECOND_DEG, dms(13.0, 10.0, 46.3668) * 3600.0, 0.0002);
    close("Meeus 12.a apparent, s", aries_gha_deg(utc("1987-04-10T00:00:00")) / SECOND_DEG, dms(13.0, 10.0, 46.1351) * 3600.0, 0.02);
    printed("Meeus 12.b", "seen", &["GMST 8h34m57.0896s"]);
    let ut = utc("1987-04-10T19:21:00").ut1();
    close("Meeus 12.b, s", mean_sidereal_time_deg(ut) / SECOND_DEG, dms(8.0, 34.0, 57.0896) * 3600.0, 0.0002);
    printed("NOVAS GAST", "seen", &["GAST 0.79362134148 h", "UT1-UTC -0.387845", "JD UTC 2454580.941875"]);
    let utc = UtcInstant::from_unix_ms(((2_454_580.941_875 - 2_440_587.5) * 86_400_000.0_f64).round() as i64 - 388).unwrap();
    close("NOVAS GAST, s", aries_gha_deg(utc) / SECOND_DEG, 0.793_621_341_48 * 3600.0, 0.03);
    printed("ERFA gmst82", "seen", &["1.754174981860675096"]);
    // MJD 53736.0, as in that library's own test of the routine.
    let ut = Ut1::from_days_j2000(jd(2_400_000.5 + 53_736.0));
    close("ERFA gmst82", mean_sidereal_time_deg(ut).to_radians(), 1.754_174_981_860_675, 1e-9);
    printed("ERFA gst94", "seen", &["1.754166136020645203"]);
    let tt = Tt::from_days_j2000(ut.days_j2000());
    let wobble = nutation(tt);
    let apparent = apparent_sidereal_time_deg(ut, wobble, mean_obliquity_deg(tt) + wobble.obliquity_deg);
    close("ERFA gst94", apparent.to_radians(), 1.754_166_136_020_645, 1.5e-6); // 0.3"
}

/// Nutation by four terms: 0.3" and 0.1" of the whole series.
#[test]
fn nutation_and_obliquity() {
    printed("Meeus 22.a", "seen", &["dpsi -3.788; deps +9.443; eps0 23-26-27.407"]);
    let tt = Tt::from_days_j2000(jd(2_446_895.5));
    let Nutation { longitude_deg, obliquity_deg } = nutation(tt);
    close("Meeus 22.a in longitude, \"", longitude_deg * 3600.0, -3.788, 0.3);
    close("Meeus 22.a in obliquity, \"", obliquity_deg * 3600.0, 9.443, 0.1);
    close("Meeus 22.a mean obliquity, \"", mean_obliquity_deg(tt) * 3600.0, dms(23.0, 26.0, 27.407) * 3600.0, 0.0006);
    printed("ERFA nut80", "seen", &["-0.9643658353226563966e-5, 0.4060051006879713322e-4"]);
    let wobble = nutation(Tt::from_days_j2000(jd(2_400_000.5 + 53_736.0)));
    close("ERFA nut80 in longitude", wobble.longitude_deg.to_radians(), -0.964_365_835_322_656e-5, 1.5e-6);
    close("ERFA nut80 in obliquity", wobble.obliquity_deg.to_radians(), 0.406_005_100_687_971e-4, 0.5e-6);
    printed("ERFA obl80", "seen", &["0.4090751347643816218", "MJD 54388.0"]);
    let mean = mean_obliquity_deg(Tt::from_days_j2000(jd(2_400_000.5 + 54_388.0)));
    close("ERFA obl80", mean.to_radians(), 0.409_075_134_764_381_6, 1e-13);
}

/// The sun's place, our bound 10".
#[test]
fn the_sun_in_october_1992() {
    printed("Meeus 25.b", "seen", &["RA 13h13m30.749s; dec -7-47-01.74"]);
    let utc = utc_1992();
    let place = sun::apparent_place(utc);
    let right_ascension = wrap_180_deg(aries_gha_deg(utc) - place.gha_deg + 180.0) + 180.0;
    close("Meeus 25.b right ascension, \"", right_ascension * 3600.0, dms(13.0, 13.0, 30.749) * 15.0 * 3600.0, 10.0);
    close("Meeus 25.b declination, \"", place.declination_deg * 3600.0, -dms(7.0, 47.0, 1.74) * 3600.0, 5.0);
    printed("Meeus 25.a", "seen", &["R 0.99766", "R 0.99760852"]);
    close("distance", 959.63 / 3600.0 / place.semidiameter_deg, 0.997_608_52, 1e-4);
    // Equation of time: hour angle of the true sun less that of the mean one.
    printed("Meeus 28.a", "seen", &["+13m42.6s"]);
    let mean_sun_gha = utc.ut1().days_j2000().rem_euclid(1.0) * 360.0;
    close("Meeus 28.a, s", wrap_180_deg(place.gha_deg - mean_sun_gha) * 240.0, 13.0 * 60.0 + 42.6, 0.7);
}

/// A place and time of another laboratory's algorithm; its refraction and 1830 m of height do not touch these figures by
/// more than 0.0002 degrees.
#[test]
fn the_sun_in_october_2003() {
    printed("NREL SPA", "seen", &["azimuth 194.340241; e0 39.872046", "lat 39.742476; lon -105.1786"]);
    let place = sun::apparent_place(utc("2003-10-17T19:30:30"));
    let seen = horizontal(&place, Position::from_deg(39.742_476, -105.178_6).unwrap()).unwrap();
    close("azimuth", seen.azimuth.deg(), 194.340_241, 0.003);
    close("altitude", seen.altitude_deg, 39.872_046, 0.003);
}

/// The triangle by itself, no parallax; printed to 0.0001 degrees.
#[test]
fn the_triangle() {
    printed("Meeus 13.b", "seen", &["from north 248.0337", "altitude 15.1249", "RA 23h09m16.641s; dec -6-43-11.61"]);
    let lha = aries_gha_deg(utc("1987-04-10T19:21:00")) - dms(77.0, 3.0, 56.0) - dms(23.0, 9.0, 16.641) * 15.0;
    let seen = triangle(lat(dms(38.0, 55.0, 17.0)), -dms(6.0, 43.0, 11.61), lha).unwrap();
    close("Meeus 13.b azimuth", seen.azimuth.deg(), 248.0337, 0.0002);
    close("Meeus 13.b altitude", seen.altitude_deg, 15.1249, 0.0002);
    printed("ERFA hd2ae", "seen", &["hd2ae (1.1,1.2,0.3)", "az 5.916889243730066194 el 0.4472186304990486228"]);
    let degrees = f64::to_degrees;
    let seen = triangle(lat(degrees(0.3)), degrees(1.2), degrees(1.1)).unwrap();
    close("ERFA hd2ae azimuth", seen.azimuth.deg().to_radians(), 5.916_889_243_730_066, 1e-13);
    close("ERFA hd2ae altitude", seen.altitude_deg.to_radians(), 0.447_218_630_499_048_6, 1e-13);
    printed("ERFA hd2pa", "seen", &["1.906227428001995580"]);
    close("ERFA hd2pa", parallactic_angle_deg(lat(degrees(0.3)), degrees(1.2), degrees(1.1)).to_radians(), 1.906_227_428_001_995_6, 1e-13);
}

/// Printed, or worked from the printed formula, to 0.01' or 0.001'.
#[test]
fn refraction_dip_semidiameter() {
    printed("Meeus 16.a", "seen", &["R 28.754'; R 24.618'", "true altitude 33.246'"]);
    close("Meeus 16.a", refraction_from_apparent_deg(0.5) * 60.0, 28.754, 0.0006);
    // The second figure is another author's formula, which agrees with Bennett's to 0.1'.
    close("Meeus 16.a turned round", refraction_from_true_deg(33.246 / 60.0) * 60.0, 24.618, 0.1);
    // The formula as the almanac prints it, 0.0167 degrees, is 0.07' more at the horizon; the figures are of Bennett's own 1'.
    printed("NA refraction <2004", "seen", &["34.48 28.75 24.33 9.88 5.39'"]);
    for (apparent, minutes) in [(0.0, 34.48), (0.5, 28.75), (1.0, 24.33), (5.0, 9.88), (10.0, 5.39)] {
        close("refraction, '", refraction_from_apparent_deg(apparent) * 60.0, minutes, 0.0051);
    }
    printed("NA dip", "seen", &["1.76: 2.49 3.94 5.57 6.22 7.87 9.64'"]);
    for (height, minutes) in [(2.0, 2.49), (5.0, 3.94), (10.0, 5.57), (12.5, 6.22), (20.0, 7.87), (30.0, 9.64)] {
        close("dip, '", dip_deg(height) * 60.0, minutes, 0.0051);
    }
    printed("Sun SD", "from memory", &["16.27', 15.73'", "16.265', 15.732'"]);
    close("semidiameter in January, '", sun::apparent_place(utc("2026-01-03T00:00:00")).semidiameter_deg * 60.0, 16.265, 0.002);
    close("semidiameter in July, '", sun::apparent_place(utc("2026-07-06T00:00:00")).semidiameter_deg * 60.0, 15.732, 0.002);
}
