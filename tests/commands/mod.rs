//! The commands as their user runs them: the real binary, its output, its exit code, its messages.

mod answers;
mod bad_logs;
mod book;
mod delivered_log;
mod files;
mod lists;
mod page;
mod pictures;
mod readme;
mod settle;
mod workbooks;

use std::io::Write;
use std::path::{Path, PathBuf};
use std::process::{Command, Output, Stdio};

/// What a run gave.
pub struct Ran {
    pub code: Option<i32>,
    pub out: String,
    pub err: String,
}

impl From<Output> for Ran {
    fn from(output: Output) -> Self {
        // A log carries bytes that are not UTF-8 through to the output.
        let text = |bytes: Vec<u8>| String::from_utf8_lossy(&bytes).into_owned();
        Self { code: output.status.code(), out: text(output.stdout), err: text(output.stderr) }
    }
}

/// Runs the program at the project's root with `input` on its standard input.
pub fn shadowpin(args: &[&str], input: &[u8]) -> Ran {
    let mut child = Command::new(env!("CARGO_BIN_EXE_shadowpin"))
        .args(args)
        .current_dir(env!("CARGO_MANIFEST_DIR"))
        .env("NO_COLOR", "1")
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    let mut stdin = child.stdin.take().unwrap();
    let input = input.to_vec();
    // Beside the reading of its output, or a large input would block both. The program may end before it reads.
    let feeder = std::thread::spawn(move || drop(stdin.write_all(&input)));
    let output = child.wait_with_output().unwrap();
    feeder.join().unwrap();
    output.into()
}

/// An expected answer: a file of `fixtures/reports`.
pub fn expected(name: &str) -> String {
    std::fs::read_to_string(fixture("reports").join(name)).unwrap_or_else(|e| panic!("fixtures/reports/{name}: {e}"))
}

/// A path in `fixtures`.
pub fn fixture(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("fixtures").join(name)
}

/// The words of a command line, quotes kept together.
fn words(line: &str) -> Vec<String> {
    let mut words = vec![String::new()];
    let mut quoted = false;
    for c in line.chars() {
        match c {
            '"' => quoted = !quoted,
            ' ' if !quoted => words.push(String::new()),
            c => words.last_mut().unwrap().push(c),
        }
    }
    words.retain(|w| !w.is_empty());
    words
}

/// Runs a command line and compares its output with a file of `fixtures/reports`.
pub fn answers(line: &str, file: &str, code: i32) {
    let words = words(line);
    let ran = shadowpin(&words.iter().map(String::as_str).collect::<Vec<_>>(), b"");
    assert_eq!(ran.code, Some(code), "{line}\n{}", ran.err);
    assert_eq!(ran.out, expected(file), "{line}");
}
