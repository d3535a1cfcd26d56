//! The bridge's page over plain sockets: who is answered, with what headers, how much and how long one may ask.

use super::{Ran, shadowpin};
use serde_json::{Value, json};
use std::io::{BufRead, BufReader, Read, Write};
use std::net::{Shutdown, TcpStream};
use std::path::Path;
use std::process::{Child, Command, Stdio};
use std::time::{Duration, Instant};

/// The program serving its page; it ends with this.
struct Page {
    child: Child,
    host: String,
    token: String,
}

impl Drop for Page {
    fn drop(&mut self) {
        let _ = self.child.kill();
        let _ = self.child.wait();
    }
}

/// An answer.
#[derive(Debug)]
struct Answer {
    status: u16,
    head: String,
    body: String,
}

impl Answer {
    fn json(&self) -> Value {
        serde_json::from_str(&self.body).unwrap_or_else(|e| panic!("{e}: {self:?}"))
    }
}

impl Page {
    fn start(flags: &[&str]) -> Self {
        let mut child = Command::new(env!("CARGO_BIN_EXE_shadowpin"))
            .arg("page")
            .args(flags)
            .current_dir(env!("CARGO_MANIFEST_DIR"))
            .stdin(Stdio::null())
            .stdout(Stdio::piped())
            .stderr(Stdio::null())
            .spawn()
            .unwrap();
        let mut line = String::new();
        BufReader::new(child.stdout.take().unwrap()).read_line(&mut line).unwrap();
        let (host, token) = line.trim().strip_prefix("http://").unwrap().split_once('/').unwrap();
        assert!(host.starts_with("127.0.0.1:"), "{line}");
        let token = token.strip_suffix('/').unwrap().to_owned();
        assert!(token.len() == 32 && token.bytes().all(|b| b.is_ascii_hexdigit()), "{line}");
        Self { child, host: host.to_owned(), token }
    }

    /// What comes back for these bytes.
    fn send(&self, bytes: &[u8]) -> Answer {
        let mut stream = TcpStream::connect(&self.host).unwrap();
        stream.set_read_timeout(Some(Duration::from_secs(60))).unwrap();
        stream.write_all(bytes).unwrap();
        answer(stream)
    }

    fn get(&self, path: &str) -> Answer {
        self.send(format!("GET /{}/{path} HTTP/1.1\r\nHost: {}\r\n\r\n", self.token, self.host).as_bytes())
    }

    /// A write as the page makes it.
    fn post(&self, path: &str, body: &str) -> Answer {
        let origin = format!("Origin: http://{}\r\nContent-Type: application/json\r\n", self.host);
        self.send(self.request("POST", path, &origin, body).as_bytes())
    }

    fn request(&self, method: &str, path: &str, headers: &str, body: &str) -> String {
        let (token, host, length) = (&self.token, &self.host, body.len());
        format!("{method} /{token}/{path} HTTP/1.1\r\nHost: {host}\r\n{headers}Content-Length: {length}\r\n\r\n{body}")
    }
}

fn answer(mut stream: TcpStream) -> Answer {
    let mut bytes = Vec::new();
    stream.read_to_end(&mut bytes).unwrap();
    let text = String::from_utf8(bytes).unwrap();
    let (head, body) = text.split_once("\r\n\r\n").unwrap_or_else(|| panic!("no answer: {text:?}"));
    let status = head.split(' ').nth(1).unwrap().parse().unwrap();
    Answer { status, head: head.to_ascii_lowercase(), body: body.to_owned() }
}

fn typed() -> Value {
    json!({"utc": "2026-06-14T06:12:00Z", "lat": "36-05.8S", "lon": "130-33.6E", "body": "Sun", "gyro_bearing": "318.5",
        "compass_bearing": "314.5", "gyro_heading": "204", "compass_heading": "200.5"})
}

#[test]
fn its_files_and_their_headers() {
    let page = Page::start(&[]);
    for (path, kind, part) in [
        ("", "text/html; charset=utf-8", "<form"),
        ("page.css", "text/css; charset=utf-8", ".night"),
        ("page.js", "text/javascript; charset=utf-8", "\"use strict\""),
        ("start", "application/json", "Aldebaran"),
        ("clock", "application/json", "this computer's clock"),
    ] {
        let answer = page.get(path);
        assert_eq!(answer.status, 200, "{path}");
        assert!(answer.body.contains(part), "{path}: {}", answer.body);
        for header in [
            &format!("content-type: {kind}"),
            "content-security-policy: default-src 'none'; script-src 'self'; style-src 'self'; connect-src 'self'; img-src 'self' data:; form-action 'none'; base-uri 'none'; frame-ancestors 'none'",
            "x-content-type-options: nosniff",
            "referrer-policy: no-referrer",
            "cache-control: no-store",
        ] {
            assert!(answer.head.contains(header), "{path}: {header} is missing in {}", answer.head);
        }
        assert!(!answer.head.contains("access-control"), "{path}");
    }
    assert!(page.get("").body.contains("class=\"day\"") && Page::start(&["--night"]).get("").body.contains("class=\"night\""));
}

/// Nothing is fetched from elsewhere, and nothing that is typed becomes markup.
#[test]
fn its_files_need_nothing_else() {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("src/page/files");
    let mut seen = 0;
    for entry in std::fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        let text = std::fs::read_to_string(&path).unwrap().replace("http://www.w3.org/2000/svg", "");
        seen += 1;
        for part in [
            "http:",
            "https:",
            "//cdn",
            "url(",
            "@import",
            "innerHTML",
            "outerHTML",
            "insertAdjacent",
            "document.write",
            "eval(",
            "style=",
            "onclick",
            "<style",
        ] {
            assert!(!text.contains(part), "{}: {part}", path.display());
        }
    }
    assert_eq!(seen, 3);
}

#[test]
fn who_is_refused() {
    let page = Page::start(&[]);
    let (host, token) = (&page.host, &page.token);
    let own = format!("Origin: http://{host}\r\nContent-Type: application/json\r\n");
    let ask = json!({"cells": typed()}).to_string();
    assert_eq!(page.send(page.request("POST", "answer", &own, &ask).as_bytes()).status, 200);
    let port = host.split_once(':').unwrap().1;
    for (status, what, request) in [
        (403, "another host", format!("GET /{token}/ HTTP/1.1\r\nHost: localhost:{port}\r\n\r\n")),
        (403, "another host", format!("GET /{token}/ HTTP/1.1\r\nHost: bridge.example\r\n\r\n")),
        (403, "no host", format!("GET /{token}/ HTTP/1.0\r\n\r\n")),
        (400, "two hosts", format!("GET /{token}/ HTTP/1.1\r\nHost: {host}\r\nHost: bridge.example\r\n\r\n")),
        (403, "no token", format!("GET / HTTP/1.1\r\nHost: {host}\r\n\r\n")),
        (403, "another token", format!("GET /{}/ HTTP/1.1\r\nHost: {host}\r\n\r\n", "0".repeat(32))),
        (403, "a file without the token", format!("GET /page.js HTTP/1.1\r\nHost: {host}\r\n\r\n")),
        (400, "a whole address", format!("GET http://{host}/{token}/ HTTP/1.1\r\nHost: {host}\r\n\r\n")),
        (404, "an unknown path", page.request("GET", "page.html", "", "")),
        (404, "a path out of the folder", page.request("GET", "../Cargo.toml", "", "")),
        (404, "an unknown write", page.request("POST", "start", &own, "{}")),
        (405, "a question by GET", page.request("GET", "add", "", "")),
        (405, "another method", page.request("DELETE", "add", &own, "")),
        (405, "another origin's question", page.request("OPTIONS", "add", &own, "")),
        (403, "a read from elsewhere", page.request("GET", "start", "Origin: https://bridge.example\r\n", "")),
        (403, "a read for another site", page.request("GET", "start", "Sec-Fetch-Site: cross-site\r\n", "")),
        (403, "no origin", page.request("POST", "answer", "Content-Type: application/json\r\n", &ask)),
        (403, "origin null", page.request("POST", "answer", "Origin: null\r\nContent-Type: application/json\r\n", &ask)),
        (403, "another origin", page.request("POST", "answer", &own.replace(host, "bridge.example"), &ask)),
        (415, "a form", page.request("POST", "answer", &own.replace("application/json", "text/plain"), &ask)),
        (415, "no type", page.request("POST", "answer", &format!("Origin: http://{host}\r\n"), &ask)),
        (409, "no book", page.request("POST", "add", &own, &ask)),
    ] {
        let answer = page.send(request.as_bytes());
        assert_eq!(answer.status, status, "{what}: {answer:?}");
        assert!(status == 400 || answer.head.contains("content-security-policy"), "{what}");
    }
}

#[test]
fn malformed_requests_are_answered_with_400() {
    let page = Page::start(&[]);
    for bytes in [
        &b"\x16\x03\x01\x02\x00\x01\xfc\x03\x03"[..],
        b"nonsense\r\n\r\n",
        b"GET / HTTP/9.9\r\n\r\n",
        b"GET / HTTP/1.1\r\nHo st: x\r\n\r\n",
        b"GET /\xff\x00 HTTP/1.1\r\n\r\n",
    ] {
        assert_eq!(page.send(bytes).status, 400, "{bytes:?}");
    }
    for body in [
        "",
        "{",
        "nonsense",
        "[]",
        "null",
        "{}",
        "7",
        r#"{"cells": 1}"#,
        r#"{"cells": {"lat": 1}}"#,
        r#"{"cells": {"latitude": "1"}}"#,
        r#"{"cells": {}, "next": "yes"}"#,
        r#"{"cells": {}, "session": {}}"#,
        r#"{"cells": {}, "session": [1]}"#,
        &"[".repeat(5000),
    ] {
        assert_eq!(page.post("answer", body).status, 400, "{body:.40}");
    }
    assert_eq!(page.post("answer", &json!({"cells": typed()}).to_string()).status, 200, "it goes on");
}

#[test]
fn sizes_are_bounded() {
    let page = Page::start(&[]);
    let wide = format!("X-Wide: {}\r\n", "x".repeat(40_000));
    assert_eq!(page.send(page.request("GET", "", &wide, "").as_bytes()).status, 431);
    let many: String = (0..100).map(|i| format!("X-{i}: x\r\n")).collect();
    assert_eq!(page.send(page.request("GET", "", &many, "").as_bytes()).status, 431);
    assert_eq!(page.post("answer", &" ".repeat(70_000)).status, 413);
    // Without a length before it, too.
    let chunked = format!("Origin: http://{}\r\nContent-Type: application/json\r\nTransfer-Encoding: chunked\r\n", page.host);
    let head = page.request("POST", "answer", &chunked, "").replace("Content-Length: 0\r\n", "");
    assert_eq!(page.send(format!("{head}11170\r\n{}\r\n0\r\n\r\n", " ".repeat(70_000)).as_bytes()).status, 413);
    assert_eq!(page.post("answer", &json!({"cells": {"remarks": "x".repeat(1001)}}).to_string()).status, 400);
}

/// Whoever says his request slowly, or half of it, is hung up on; others are answered meanwhile.
#[test]
fn slow_requests_are_dropped() {
    let page = Page::start(&[]);
    let start = Instant::now();
    let mut head = TcpStream::connect(&page.host).unwrap();
    head.write_all(b"GET / HT").unwrap();
    let mut body = TcpStream::connect(&page.host).unwrap();
    let origin = format!("Origin: http://{}\r\nContent-Type: application/json\r\n", page.host);
    body.write_all(page.request("POST", "answer", &origin, "{\"cells\":{}}").trim_end_matches('}').as_bytes()).unwrap();
    let mut silent = TcpStream::connect(&page.host).unwrap();
    assert_eq!(page.get("").status, 200);
    for stream in [&mut head, &mut body, &mut silent] {
        stream.set_read_timeout(Some(Duration::from_secs(120))).unwrap();
        // A refusal may come before the end, which must come in any case.
        let mut rest = Vec::new();
        let _ = stream.read_to_end(&mut rest);
        assert!(!rest.starts_with(b"HTTP/1.1 2"), "{}", String::from_utf8_lossy(&rest));
    }
    // The read's own time-out would be twelve times the program's; a loaded machine may take its time.
    assert!(start.elapsed() < Duration::from_secs(100));
    assert_eq!(page.get("").status, 200);
}

#[test]
fn a_hundred_at_once() {
    let page = Page::start(&[]);
    let ask = json!({"cells": typed(), "next": true}).to_string();
    let answers: Vec<Answer> = std::thread::scope(|scope| {
        let asked: Vec<_> = (0..100).map(|_| scope.spawn(|| page.post("answer", &ask))).collect();
        asked.into_iter().map(|a| a.join().unwrap()).collect()
    });
    assert!(answers.iter().all(|a| a.status == 200 && a.body == answers[0].body));
    // Some that go away at once, or in the middle, hurt nobody.
    for _ in 0..50 {
        let mut stream = TcpStream::connect(&page.host).unwrap();
        let _ = stream.write_all(page.request("POST", "answer", "", &ask).as_bytes());
        let _ = stream.shutdown(Shutdown::Both);
    }
    assert_eq!(page.get("").status, 200);
}

/// One function computes for both: word for word what the command line answers.
#[test]
fn it_answers_as_the_command_line_does() {
    let page = Page::start(&[]);
    let answer = page.post("answer", &json!({"cells": typed(), "next": true}).to_string()).json();
    let line = "azimuth --utc 2026-06-14T06:12:00Z --lat 36-05.8S --lon 130-33.6E --body sun --gyro 318.5 --compass 314.5 --gyro-heading 204 --compass-heading 200.5";
    let run = |line: &str| -> Ran { shadowpin(&line.split(' ').collect::<Vec<_>>(), b"") };
    assert_eq!(answer["worked"]["working"], run(line).out.as_str());
    let row: Value = serde_json::from_str(&run(&format!("{line} --format json")).out).unwrap();
    for name in
        ["true_azimuth", "gyro_error", "gyro_error_u", "compass_error", "deviation", "deviation_by_comparison", "variation", "trust"]
    {
        assert_eq!(answer["worked"]["figures"][name], row[name], "{name}");
    }
    assert_eq!(
        answer["worked"]["errors"][0],
        json!({"id": "gyro_error", "name": "gyro error", "text": "0.1 H", "u": "0.3", "book": "0.0"})
    );
    let plan = run("plan --utc 2026-06-14T06:12:00Z --lat 36-05.8S --lon 130-33.6E --course 203.9 --speed 0 --gyro-error 0.1H");
    let listed = |text: &str| {
        text.lines().filter(|l| l.contains("rises") || l.contains("sets") || l.starts_with("Best")).map(str::to_owned).collect::<Vec<_>>()
    };
    assert!(listed(&plan.out).len() > 2);
    assert_eq!(listed(answer["next"]["text"].as_str().unwrap()), listed(&plan.out));

    let sunrise = json!({"ship_time": "2026-06-14 07:30", "zone": "-9", "lat": "36-05.8S", "lon": "130-33.6E", "body": "Sun", "method": "rising",
        "eye_height_m": "18", "gyro_bearing": "060.5"});
    let answer = page.post("answer", &json!({"cells": sunrise}).to_string()).json();
    let ran = shadowpin(
        &[
            "amplitude",
            "--ship-time",
            "2026-06-14 07:30",
            "--zone",
            "-9",
            "--lat",
            "36-05.8S",
            "--lon",
            "130-33.6E",
            "--event",
            "rising",
            "--eye-height",
            "18",
            "--gyro",
            "060.5",
            "--ladder",
        ],
        b"",
    );
    assert_eq!(answer["worked"]["working"], ran.out.as_str());
}

#[test]
fn faults_stand_at_their_fields() {
    let page = Page::start(&[]);
    let answer =
        page.post("answer", &json!({"cells": {"utc": "yesterday", "lat": "95", "lon": "1E", "body": "capela"}}).to_string()).json();
    let faults = answer["faults"].as_array().unwrap();
    assert_eq!(faults.iter().map(|f| f["field"].as_str().unwrap()).collect::<Vec<_>>(), ["utc", "lat", "body"]);
    assert_eq!(faults[1]["value"], "95");
    assert_eq!(faults[2]["hint"], "is it Capella?");
    assert_eq!(answer["worked"], Value::Null);
}

/// What is entered is a row of the book, compared with later ones, and struck entries are not.
#[test]
fn entries_go_to_the_book() {
    let folder = tempfile::tempdir().unwrap();
    let (book, card) = (folder.path().join("book.csv"), folder.path().join("card.csv"));
    std::fs::write(&card, "compass_heading,deviation\n0,1E\n90,1E\n180,1W\n270,1W\n").unwrap();
    let (book_name, card_name) = (book.to_str().unwrap(), card.to_str().unwrap());
    let page = Page::start(&["--book", book_name, "--card", card_name, "--vessel", "Amber Tern"]);
    assert_eq!(page.get("start").json()["given"], json!({"vessel": "Amber Tern"}));
    let mut cells = typed();
    for (at, (utc, bearing)) in [("06:12", "318.5"), ("06:20", "317"), ("06:28", "315.5"), ("06:36", "331")].into_iter().enumerate() {
        cells["utc"] = format!("2026-06-14T{utc}:00Z").into();
        cells["gyro_bearing"] = bearing.into();
        let added = page.post("add", &json!({ "cells": cells }).to_string());
        assert_eq!((added.status, &added.json()["entry"]), (200, &json!(at + 1)), "{added:?}");
    }
    assert_eq!(shadowpin(&["book", "check", book_name], b"").code, Some(0));
    assert_eq!(std::fs::read_to_string(&book).unwrap().lines().count(), 5);

    cells["utc"] = "2026-06-14T06:44:00Z".into();
    cells["gyro_bearing"] = "312".into();
    let record = |page: &Page, cells: &Value| page.post("answer", &json!({ "cells": cells }).to_string()).json();
    let answer = record(&page, &cells);
    assert_eq!(answer["record"]["entries"].as_array().unwrap().len(), 4);
    assert!(
        answer["worked"]["like"][0].as_str().unwrap().starts_with("Gyro error is like the last 4 of this gyro and repeater"),
        "{answer}"
    );
    assert!(answer["worked"]["card"][0].as_str().unwrap().starts_with("Card: deviation"), "{answer}");
    // Struck through by another program meanwhile.
    let struck = shadowpin(&["book", "correct", book_name, "4", "--why", "misread"], b"");
    assert_eq!(struck.code, Some(0), "{}", struck.err);
    assert_eq!(record(&page, &cells)["record"]["entries"].as_array().unwrap().len(), 3);

    // Nothing half done goes in.
    for (change, field) in [
        (json!({"gyro_bearing": "400"}), "gyro_bearing"),
        (json!({"gyro_bearing": "", "compass_bearing": ""}), "gyro_bearing"),
        (json!({"method": "none", "body": ""}), "remarks"),
    ] {
        let mut cells = cells.clone();
        cells.as_object_mut().unwrap().extend(change.as_object().unwrap().clone());
        let refused = page.post("add", &json!({ "cells": cells }).to_string());
        assert_eq!((refused.status, &refused.json()["faults"][0]["field"]), (422, &json!(field)), "{refused:?}");
    }
    assert_eq!(page.post("add", "{}").status, 400);
    assert_eq!(std::fs::read_to_string(&book).unwrap().lines().count(), 6);
    let none = json!({"cells": {"utc": "2026-06-14T08:00:00Z", "method": "none", "remarks": "overcast"}});
    assert_eq!(page.post("add", &none.to_string()).status, 200);
}

#[test]
fn what_cannot_be_served() {
    for (flags, message) in [
        (&["page", "--book", "README.md"][..], "README.md"),
        (&["page", "--card", "no-such.csv"], "shadowpin: no-such.csv: No such file or directory (os error 2)\n"),
        (&["page", "--card", "fixtures/bad_logs/empty.csv", "--book", "fixtures/bad_logs/empty.csv"], "is the input itself"),
        (&["page", "--zone", "nine"], "--zone: \"nine\""),
        (&["page", "--nmea", "udp:0"], "a port is a number from 1 to 65535"),
    ] {
        let ran = shadowpin(flags, b"");
        assert_eq!((ran.code, ran.out.as_str()), (Some(2), ""), "{flags:?}");
        assert!(ran.err.contains(message), "{flags:?}: {}", ran.err);
    }
    // A port that is taken.
    let page = Page::start(&[]);
    let port = page.host.split_once(':').unwrap().1;
    let ran = shadowpin(&["page", "--port", port], b"");
    assert!(ran.code == Some(2) && ran.err.contains("127.0.0.1"), "{}", ran.err);
}

/// What the instruments say is there as they say it, marked where it must not be taken, and old when they fall silent.
#[test]
fn instruments_are_heard_live() {
    // Free a moment ago; where another program was quicker, the page says so and the test fails.
    let port = std::net::UdpSocket::bind("127.0.0.1:0").unwrap().local_addr().unwrap().port();
    let page = Page::start(&["--nmea", &format!("udp:{port}")]);
    assert_eq!(page.get("nmea").json()["items"], json!([]));
    let sender = std::net::UdpSocket::bind("127.0.0.1:0").unwrap();
    let sentence = |body: &str| format!("${body}*{:02X}\r\n", body.bytes().fold(0, |sum, byte| sum ^ byte));
    let said =
        sentence("HEHDT,204.0,T") + &sentence("GPZDA,201530.00,04,07,2002,00,00") + &sentence("GPGLL,3605.812,S,13033.600,E,061204,A,A");
    let until = |done: &dyn Fn(&Value) -> bool, send: bool| -> Value {
        let start = Instant::now();
        loop {
            if send {
                sender.send_to(said.as_bytes(), ("127.0.0.1", port)).unwrap();
            }
            let heard = page.get("nmea").json();
            if done(&heard) {
                return heard;
            }
            assert!(start.elapsed() < Duration::from_secs(60), "{heard}");
            std::thread::sleep(Duration::from_millis(50));
        }
    };
    let heard = until(&|heard| heard["items"].as_array().unwrap().len() == 4, true);
    let item = |heard: &Value, field: &str| heard["items"].as_array().unwrap().iter().find(|i| i["field"] == field).unwrap().clone();
    assert_eq!((&item(&heard, "gyro_heading")["text"], &item(&heard, "gyro_heading")["why_not"]), (&json!("204.0"), &Value::Null));
    assert_eq!((&item(&heard, "lat")["text"], &item(&heard, "lon")["text"]), (&json!("36-05.812S"), &json!("130-33.600E")));
    assert!(item(&heard, "utc")["why_not"].as_str().unwrap().contains("give the time by hand"), "{heard}");
    // Nothing more is said, and after three seconds a heading is of no use.
    until(&|heard| item(heard, "gyro_heading")["why_not"].as_str().is_some_and(|why| why.starts_with("too old")), false);
}

/// What fuzzing has kept, sent for real: each is answered or let go, and the page goes on.
#[test]
fn kept_inputs() {
    let page = Page::start(&[]);
    let kept = Path::new(env!("CARGO_MANIFEST_DIR")).join("fuzz/corpus/request");
    let mut seen = 0;
    for entry in std::fs::read_dir(kept).unwrap() {
        let bytes = std::fs::read(entry.unwrap().path()).unwrap();
        // Under the name and the token of this page.
        let text = String::from_utf8_lossy(&bytes).replace("127.0.0.1:8080", &page.host).replace(&"0".repeat(32), &page.token);
        let mut stream = TcpStream::connect(&page.host).unwrap();
        let _ = stream.write_all(text.as_bytes());
        let _ = stream.shutdown(Shutdown::Write);
        let mut answer = Vec::new();
        let _ = stream.read_to_end(&mut answer);
        assert!(answer.is_empty() || answer.starts_with(b"HTTP/1.1 "), "{text}");
        assert!(!answer.starts_with(b"HTTP/1.1 5"), "{text}");
        seen += 1;
    }
    assert!(seen >= 4);
    let mut stream = TcpStream::connect(&page.host).unwrap();
    write!(stream, "GET /{}/ HTTP/1.1\r\nHost: {}\r\n\r\n", page.token, page.host).unwrap();
    let mut answer = String::new();
    stream.read_to_string(&mut answer).unwrap();
    assert!(answer.starts_with("HTTP/1.1 200 "));
}
