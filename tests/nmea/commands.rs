//! The commands that listen: to a file, to standard input, to UDP and TCP on the loopback.

use super::{line, lines, zda_now};
use crate::commands::{Ran, answers, shadowpin};
use std::io::Write;
use std::net::{Ipv4Addr, TcpListener, UdpSocket};
use std::sync::atomic::{AtomicBool, Ordering};
use std::time::Duration;

fn run(command: &str, input: &[u8]) -> Ran {
    shadowpin(&command.split_whitespace().collect::<Vec<_>>(), input)
}

#[test]
fn recordings() {
    answers("azimuth --nmea fixtures/nmea/bridge.nmea --body sun --gyro 318.5 --compass 314.5", "azimuth_nmea.txt", 0);
    answers("azimuth --nmea fixtures/nmea/doubtful.nmea --body sun --gyro 318.5", "azimuth_nmea_doubtful.txt", 0);
    answers("plan --nmea fixtures/nmea/bridge.nmea --zone -9 --hours 1 --gyro-error 0.5L", "plan_nmea.txt", 0);
    answers("amplitude --nmea fixtures/nmea/bridge.nmea --event setting --zone -9 --gyro 297", "amplitude_nmea.txt", 0);
}

#[test]
fn standard_input_is_as_a_file_and_words_go_beside_rows() {
    let bytes = std::fs::read(concat!(env!("CARGO_MANIFEST_DIR"), "/fixtures/nmea/bridge.nmea")).unwrap();
    let piped = run("azimuth --nmea - --body sun --gyro 318.5 --format json", &bytes);
    let filed = run("azimuth --nmea fixtures/nmea/bridge.nmea --body sun --gyro 318.5 --format json", b"");
    assert_eq!((piped.code, &piped.out), (Some(0), &filed.out), "{}", piped.err);
    assert!(piped.err.contains("From the ship's instruments (standard input)\ntime  "), "{}", piped.err);
    let row: serde_json::Value = serde_json::from_str(&piped.out).unwrap();
    let figures = ["gyro_heading", "compass_heading", "speed_kn"].map(|name| row[name].as_f64().unwrap());
    assert_eq!((row["utc"].as_str(), figures), (Some("2026-06-14T06:12:00Z"), [204.0, 200.5, 12.3]));
    let quiet = run("azimuth --nmea - --body sun --gyro 318.5 --format json -q", &bytes);
    assert_eq!((quiet.out, quiet.err.as_str()), (filed.out, ""));
}

#[test]
fn what_is_given_by_hand_goes_first() {
    let ran = run(
        "azimuth --nmea fixtures/nmea/bridge.nmea --utc 2026-06-14T07:00:00Z --lat 1N --lon 2E --gyro-heading 10 --body sun --gyro 300",
        b"",
    );
    assert!(ran.out.starts_with("Sun   2026-06-14 07:00:00 UTC\n01°00.0'N 002°00.0'E\n"), "{}", ran.out);
    assert_eq!(ran.out.matches("GNRMC, not taken: given by hand").count(), 2, "{}", ran.out);
    assert!(
        ran.out.contains("HEHDT, not taken: given by hand")
            && ran.out.contains("compass heading                      200.5   HCHDG, 0.0 s old")
    );
    // The stream's time is not taken, so its distance from this computer's clock says nothing.
    assert_eq!(ran.err, "");
}

#[test]
fn a_course_by_hand_and_a_ship_without_a_gyro() {
    let by_hand = run("plan --nmea fixtures/nmea/bridge.nmea --course 100 --hours 1", b"");
    assert!(by_hand.out.contains("course 100.0, 12.3 kn") && !by_hand.out.contains("HEHDT"), "{}", by_hand.out);
    let text = lines(&["GPRMC,061200.00,A,3605.80,S,13033.60,E,12.3,203.6,140626,,,A"]);
    let still = run("plan --nmea - --hours 1", text.as_bytes());
    assert!(still.out.contains("Neither --course nor a gyro heading: the ship is taken to lie still.\n"), "{}", still.out);
    let no_speed = run(
        "plan --nmea - --course 100 --hours 1",
        (line("GPZDA,061200.00,14,06,2026,,") + &line("GPGLL,3605.80,S,13033.60,E,,A,A")).as_bytes(),
    );
    assert!(no_speed.out.contains("No speed was given or heard"), "{}", no_speed.out);
    let which = run("plan --nmea - --bearing 318", text.as_bytes());
    assert!(
        which.out.contains("\nSun ") && which.out.contains("time                   2026-06-14 06:12:00   GPRMC, 0.0 s old"),
        "{}",
        which.out
    );
    assert_eq!(run("plan --nmea - --speed 12", text.as_bytes()).code, Some(2));
}

#[test]
fn what_cannot_be_had_is_said() {
    let no_date = lines(&["GPGGA,061200.00,3605.80,S,13033.60,E,1,11,0.8,24.1,M,,M,,"]);
    let lost = lines(&[
        "GPZDA,061200.00,14,06,2026,,",
        "GPGLL,3605.80,S,13033.60,E,061200.00,A,A",
        "GPZDA,061230.00,14,06,2026,,",
        "GPGLL,,,,,061230.00,V,N",
    ]);
    let mut noise = vec![b'$'; 1];
    noise.resize(10 << 20, b'x');
    for (input, said) in [
        (&b""[..], "standard input: no time could be taken: there is no sentence in it; give --utc, or --ship-time with --zone\n"),
        (no_date.as_bytes(), "no time could be taken: ZDA and RMC alone carry a date, and no valid one is in it; give --utc"),
        (
            lost.as_bytes(),
            "no position could be taken: the last one, GPGLL, is 30.0 s old (refused: GPGLL 1 (status not A: not valid)); give --lat and --lon\n",
        ),
        (&noise, "there is no sentence in it (refused: sentences 1 (too long))"),
        (&noise[1..], "there is no sentence in it (refused: lines 1 (no sentence in them))"),
        (
            b"$GPZDA,061200.00,14,06,2026,,*00\n$GPZDA,061200.00,14,06,2026,,\n",
            "(refused: sentences 1 (no checksum); sentences 1 (wrong checksum))",
        ),
    ] {
        let ran = run("azimuth --nmea - --nmea-wait 60 --body sun", input);
        assert_eq!((ran.code, ran.out.as_str()), (Some(2), ""), "{}", ran.err);
        assert!(ran.err.contains(said), "{said}\n{}", ran.err);
    }
    // What the stream lacks may be given by hand.
    assert_eq!(run("azimuth --nmea - --utc 2026-06-14T06:12:00Z --body sun", no_date.as_bytes()).code, Some(0));
    let folder = tempfile::tempdir().unwrap();
    for (source, said) in [
        ("udp:70000", "--nmea: \"udp:70000\": expected a file"),
        ("tcp:here", "the port is missing"),
        ("no-such.nmea", "no-such.nmea: No such file"),
        (folder.path().to_str().unwrap(), "is a folder, not a recording"),
    ] {
        let ran = shadowpin(&["azimuth", "--body", "sun", "--nmea", source], b"");
        assert_eq!((ran.code, ran.err.contains(said)), (Some(2), true), "{}", ran.err);
    }
    for (more, said) in
        [("--nmea-wait 0", "--nmea-wait: \"0\""), ("--nmea-heading HC", "that is a magnetic compass"), ("--lat 3", "give both")]
    {
        let ran = run(&format!("azimuth --body sun --nmea fixtures/nmea/bridge.nmea {more}"), b"");
        assert_eq!((ran.code, ran.err.contains(said)), (Some(2), true), "{}", ran.err);
    }
}

#[test]
fn a_recording_is_never_written_over() {
    let ran = run("azimuth --nmea fixtures/nmea/bridge.nmea --body sun -o fixtures/nmea/bridge.nmea", b"");
    assert_eq!((ran.code, ran.err.contains("is the input itself")), (Some(2), true), "{}", ran.err);
}

/// A receiver that has lost count of the weeks, by this computer's clock.
#[test]
fn clocks_that_are_weeks_off() {
    const WEEK_S: i64 = 7 * 86_400;
    let place = line("GPGLL,3605.80,S,13033.60,E,,A,A");
    let lost_count = run("azimuth --nmea - --body sun", (zda_now(-1024 * WEEK_S) + &place).as_bytes());
    assert_eq!((lost_count.code, lost_count.out.as_str()), (Some(2), ""));
    assert!(lost_count.err.contains("but its date is 1024 weeks behind this computer's clock"), "{}", lost_count.err);
    // In a recording a thousand weeks may be right; as the data come, they are not.
    let old = run("azimuth --nmea - --body sun", (zda_now(-1000 * WEEK_S) + &place).as_bytes());
    assert!(old.code == Some(0) && old.err.contains("its last time is 7000 days before this computer's clock"), "{}", old.err);
    let live = over_tcp(&(zda_now(-1000 * WEEK_S) + &place), "", "--nmea-wait 0.5");
    assert_eq!((live.code, live.err.contains("its time is 7000 days behind this computer's clock")), (Some(2), true), "{}", live.err);
}

/// Serves `once`, then `again` and `again` until the program hangs up.
fn over_tcp(once: &str, again: &str, more: &str) -> Ran {
    let listener = TcpListener::bind((Ipv4Addr::LOCALHOST, 0)).unwrap();
    let port = listener.local_addr().unwrap().port();
    let (once, again) = (once.to_owned(), again.to_owned());
    let server = std::thread::spawn(move || {
        let (mut stream, _) = listener.accept().unwrap();
        stream.write_all(once.as_bytes()).unwrap();
        loop {
            std::thread::sleep(Duration::from_millis(200));
            // An empty word would never find out that nobody listens.
            let word = if again.is_empty() { "\r\n" } else { &again };
            if stream.write_all(word.as_bytes()).is_err() {
                return;
            }
        }
    });
    let ran = run(&format!("azimuth --body sun --gyro 318.5 --nmea tcp:127.0.0.1:{port} {more}"), b"");
    server.join().unwrap();
    ran
}

#[test]
fn tcp_on_the_loopback() {
    let again = zda_now(0) + &lines(&["GPGLL,3605.80,S,13033.60,E,,A,A", "HETHS,204.0,A", "HCHDG,200.5,,,,", "GPVTG,,T,,M,12.3,N,,K,A"]);
    // All is there before the time is over.
    let all = over_tcp("", &again, "--nmea-wait 600");
    assert_eq!(all.code, Some(0), "{}", all.err);
    assert!(all.out.contains("gyro heading                         204.0   HETHS, ") && !all.out.contains("Listened for the whole"));
    // A gyro that spoke once and no more.
    let folder = tempfile::tempdir().unwrap();
    let limits = folder.path().join("limits.toml");
    std::fs::write(&limits, "[limits]\nnmea_heading_stale_s = 0.1\n").unwrap();
    let again = zda_now(0) + &line("GPGLL,3605.80,S,13033.60,E,,A,A");
    let silent = over_tcp(&line("HEHDT,204.0,T"), &again, &format!("--nmea-wait 2 --limits {}", limits.display()));
    assert_eq!(silent.code, Some(0), "{}", silent.err);
    assert!(silent.out.contains("HEHDT, not taken: ") && silent.out.contains("Listened for the whole 2 seconds"), "{}", silent.out);
    // Nobody is there.
    let closed = TcpListener::bind((Ipv4Addr::LOCALHOST, 0)).unwrap().local_addr().unwrap().port();
    let nobody = run(&format!("azimuth --body sun --nmea tcp:127.0.0.1:{closed}"), b"");
    assert_eq!((nobody.code, nobody.err.contains("cannot connect: ")), (Some(2), true), "{}", nobody.err);
}

#[test]
fn udp_on_the_loopback() {
    // A port that is free now.
    let port = UdpSocket::bind((Ipv4Addr::UNSPECIFIED, 0)).unwrap().local_addr().unwrap().port();
    let sender = UdpSocket::bind((Ipv4Addr::LOCALHOST, 0)).unwrap();
    let (text, done) = (zda_now(0), AtomicBool::new(false));
    // One sentence in two datagrams, one without its line end, a tag block, and one that says nothing.
    let whole = line("HEHDT,204.0,T");
    let tagged = format!("UdPbC\0\\s:GP0001*14\\{}", line("GPGLL,3605.80,S,13033.60,E,,A,A"));
    let datagrams = [text.trim_end(), &whole[..8], &whole[8..], &tagged, ""];
    std::thread::scope(|scope| {
        scope.spawn(|| {
            while !done.load(Ordering::Relaxed) {
                for datagram in datagrams {
                    // Refused until the program has opened its port.
                    let _ = sender.send_to(datagram.as_bytes(), (Ipv4Addr::LOCALHOST, port));
                }
                std::thread::sleep(Duration::from_millis(50));
            }
        });
        let ran = run(&format!("azimuth --body sun --compass-heading 200 --speed 12 --nmea-wait 600 --nmea udp:{port}"), b"");
        done.store(true, Ordering::Relaxed);
        assert_eq!(ran.code, Some(0), "{}", ran.err);
        for said in ["time                   20", "GPZDA, ", "position              36°05.8'S 130°33.6'E   GPGLL, ", "204.0   HEHDT, "] {
            assert!(ran.out.contains(said), "{said}\n{}", ran.out);
        }
        assert!(!ran.out.contains("Refused"), "{}", ran.out);
    });
    let taken = UdpSocket::bind((Ipv4Addr::UNSPECIFIED, 0)).unwrap();
    let port = taken.local_addr().unwrap().port();
    let busy = run(&format!("azimuth --body sun --nmea udp:{port}"), b"");
    assert_eq!((busy.code, busy.err.contains("does another program listen there?")), (Some(2), true), "{}", busy.err);
}
