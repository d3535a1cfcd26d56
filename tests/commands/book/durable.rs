//! Killed at any moment, two at once, a full disk, a file that cannot be written: nothing recorded is lost.

use super::{Place, SUN, entered, seal};
use crate::generator::Rng;
use shadowpin::book::{Book, Finding, check};
use std::process::{Command, Stdio};
use std::time::Duration;

fn adding(place: &Place) -> Command {
    let mut command = Command::new(env!("CARGO_BIN_EXE_shadowpin"));
    command.args(["book", "add", place.name()]).args(SUN).args(["--gyro", "318.5"]);
    command.stdin(Stdio::null()).stdout(Stdio::piped()).stderr(Stdio::piped());
    command
}

/// Whatever the moment, every entry that was answered for stands there with its seal, and the chain holds up to a torn line.
#[test]
fn killed_at_random() {
    let place = Place::new();
    let mut answered = vec![(1, seal(&place.add("318.5")))];
    let mut rng = Rng::new(20_260_614);
    for _ in 0..80 {
        let mut child = adding(&place).spawn().unwrap();
        std::thread::sleep(Duration::from_micros(rng.between(0.0, 15_000.0) as u64));
        child.kill().unwrap();
        let ran: super::Ran = child.wait_with_output().unwrap().into();
        if let Some(entry) = entered(&ran).filter(|_| ran.out.contains("\nSeal ") && ran.out.ends_with('\n')) {
            answered.push((entry, seal(&ran)));
        }
        assert!(place.findings().iter().all(|f| matches!(f, Finding::Torn { .. })), "{:?}", place.findings());
    }
    let last = place.add("319");
    answered.push((entered(&last).unwrap(), seal(&last)));
    let book = Book::open(&place.path).unwrap();
    assert_eq!(check(&book).findings, []);
    for (entry, seal) in answered {
        assert_eq!(book.entry(entry).and_then(|e| e.seal).map(|s| s.to_string()), Some(seal), "entry {entry}");
    }
}

#[test]
fn several_writers_at_once() {
    const WRITERS: usize = 4;
    const EACH: usize = 20;
    let place = Place::new();
    let mut numbers: Vec<u64> = std::thread::scope(|scope| {
        let writers: Vec<_> = (0..WRITERS)
            .map(|_| {
                scope.spawn(|| {
                    let one = || {
                        let ran: super::Ran = adding(&place).output().unwrap().into();
                        entered(&ran).unwrap_or_else(|| panic!("{}", ran.err))
                    };
                    (0..EACH).map(|_| one()).collect::<Vec<_>>()
                })
            })
            .collect();
        writers.into_iter().flat_map(|writer| writer.join().unwrap()).collect()
    });
    numbers.sort_unstable();
    assert_eq!(numbers, (1..=(WRITERS * EACH) as u64).collect::<Vec<_>>());
    let book = Book::open(&place.path).unwrap();
    assert_eq!((book.entries.len(), check(&book).findings), (WRITERS * EACH, vec![]));
}

/// The system allows the file so many blocks and no more, which is how a full disk looks to a writer.
#[cfg(unix)]
#[test]
fn a_full_disk() {
    let place = Place::new();
    let line = "trap '' XFSZ; ulimit -f 4; exec \"$@\"";
    let limited = || -> super::Ran {
        let mut command = Command::new("sh");
        command.args(["-c", line, "sh", env!("CARGO_BIN_EXE_shadowpin"), "book", "add", place.name()]).args(SUN).args(["--gyro", "318"]);
        command.output().unwrap().into()
    };
    let mut before = Vec::new();
    let full = (0..60)
        .find_map(|_| {
            before = std::fs::read(&place.path).unwrap_or_default();
            let ran = limited();
            (ran.code != Some(0)).then_some(ran)
        })
        .expect("the disk is never full");
    assert_eq!(full.code, Some(2), "{}", full.err);
    assert!(full.err.contains("nothing was entered; the book is as it was"), "{}", full.err);
    assert!(!before.is_empty() && std::fs::read(&place.path).unwrap() == before);
    assert_eq!(place.findings(), []);
    place.add("319");
    assert_eq!(place.findings(), []);
}

#[test]
fn a_line_cut_short_is_kept_and_said() {
    let place = Place::new();
    place.add("318");
    let whole = place.text();
    let torn = whole.lines().last().unwrap().get(..90).unwrap();
    std::fs::write(&place.path, format!("{whole}{torn}")).unwrap();
    let ran = place.run("check", &[]);
    assert!(ran.code == Some(1) && ran.out.contains("the last line was cut short (90 bytes)"), "{}", ran.out);
    assert!(place.run("show", &[]).code == Some(0) && place.run("print", &[]).code == Some(0));
    let ran = place.add("319");
    assert!(entered(&ran) == Some(2) && ran.err.contains("its bytes are kept in") && ran.err.contains(".torn-1"), "{}", ran.err);
    assert_eq!(std::fs::read_to_string(place.folder.path().join("book.csv.torn-1")).unwrap(), torn);
    assert!(place.text().starts_with(&whole));
    assert_eq!(place.findings(), []);
}

/// A book on a medium that cannot be written to is read all the same.
#[test]
fn read_only() {
    let place = Place::new();
    place.add("318");
    let before = place.text();
    let mut rights = std::fs::metadata(&place.path).unwrap().permissions();
    rights.set_readonly(true);
    std::fs::set_permissions(&place.path, rights).unwrap();
    for subcommand in ["show", "print", "check"] {
        assert_eq!(place.run(subcommand, &[]).code, Some(0));
    }
    // An administrator may write whatever the rights say.
    let everything_allowed = std::fs::OpenOptions::new().append(true).open(&place.path).is_ok();
    let ran = place.run("add", &[&SUN[..], &["--gyro", "319"]].concat());
    if everything_allowed {
        assert_eq!(entered(&ran), Some(2), "{}", ran.err);
    } else {
        assert!(ran.code == Some(2) && ran.err.contains("it can be read, but not written to"), "{}", ran.err);
        assert_eq!(place.text(), before);
    }
}

/// Another program holds the file for a while: the entry waits, and is made.
#[test]
fn a_locked_book_is_waited_for() {
    let place = Place::new();
    place.add("318");
    let held = std::fs::OpenOptions::new().write(true).open(&place.path).unwrap();
    held.lock().unwrap();
    let child = adding(&place).spawn().unwrap();
    std::thread::sleep(Duration::from_millis(150));
    drop(held);
    let ran: super::Ran = child.wait_with_output().unwrap().into();
    assert_eq!(entered(&ran), Some(2), "{}", ran.err);
}

#[test]
fn a_file_that_is_no_book_is_left_alone() {
    let place = Place::new();
    for text in ["my notes", "utc,lat,lon,body\n2026-06-14T06:12Z,1,2,Sun\n"] {
        std::fs::write(&place.path, text).unwrap();
        for (subcommand, args) in [("add", &["--utc", "now", "--none", "fog"][..]), ("show", &[]), ("sign", &["--rank", "Master"])] {
            assert_eq!(place.run(subcommand, args).code, Some(2), "{subcommand}");
            assert_eq!(place.text(), text);
        }
    }
    let folder = Place::new();
    assert_eq!(crate::commands::shadowpin(&["book", "show", folder.folder.path().to_str().unwrap()], b"").code, Some(2));
}
