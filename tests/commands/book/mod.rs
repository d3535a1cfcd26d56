//! The ship's own record through the real program.

mod durable;
mod made;
mod subcommands;
mod tampered;

use super::{Ran, shadowpin};
use shadowpin::book::{Book, Finding, check};
use std::path::{Path, PathBuf};

/// A place for a book that is thrown away.
pub struct Place {
    pub folder: tempfile::TempDir,
    pub path: PathBuf,
}

impl Place {
    pub fn new() -> Self {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("book.csv");
        Self { folder, path }
    }

    pub fn name(&self) -> &str {
        self.path.to_str().unwrap()
    }

    /// Runs a subcommand on the book.
    pub fn run(&self, subcommand: &str, args: &[&str]) -> Ran {
        shadowpin(&[&["book", subcommand, self.name()], args].concat(), b"")
    }

    /// Enters the sun, taken by gyro.
    pub fn add(&self, gyro: &str) -> Ran {
        let ran = self.run("add", &[&SUN[..], &["--gyro", gyro]].concat());
        assert_eq!(ran.code, Some(0), "{}", ran.err);
        ran
    }

    pub fn text(&self) -> String {
        std::fs::read_to_string(&self.path).unwrap()
    }

    pub fn findings(&self) -> Vec<Finding> {
        check(&Book::open(&self.path).unwrap()).findings
    }
}

pub const SUN: [&str; 8] = ["--utc", "2026-06-14T06:12:00Z", "--lat", "36-05.8S", "--lon", "130-33.6E", "--body", "sun"];

/// The number that an answer says the entry was made as.
pub fn entered(ran: &Ran) -> Option<u64> {
    ran.out.split_once("Entered as entry ")?.1.split_once('.')?.0.parse().ok()
}

/// The seal in an answer.
pub fn seal(ran: &Ran) -> String {
    ran.out.split_once("\nSeal ").unwrap().1.trim().to_owned()
}

/// The same file through another writer's hands.
pub fn rewrite(path: &Path, change: impl FnOnce(Vec<String>) -> Vec<String>) {
    let lines = std::fs::read_to_string(path).unwrap().lines().map(str::to_owned).collect();
    std::fs::write(path, change(lines).join("\n") + "\n").unwrap();
}
