//! How far a long run has come: on a terminal only, and only once it has taken a second.

use indicatif::{ProgressBar, ProgressStyle};
use std::io::{IsTerminal, stderr};
use std::time::{Duration, Instant};

/// Runs shorter than this show nothing.
const PATIENCE: Duration = Duration::from_secs(1);

/// Counts the rows of one pass over a log.
pub struct Progress {
    what: &'static str,
    /// Bytes of the log, where they are known.
    size: Option<u64>,
    shown: bool,
    began: Instant,
    bar: Option<ProgressBar>,
    rows: u64,
    bytes: u64,
}

impl Progress {
    /// `what` is done over `size` bytes; nothing is shown where standard error is no terminal.
    pub fn new(what: &'static str, size: Option<u64>, quiet: bool) -> Self {
        let shown = !quiet && stderr().is_terminal();
        Self { what, size, shown, began: Instant::now(), bar: None, rows: 0, bytes: 0 }
    }

    /// So many rows and bytes more are done.
    pub fn add(&mut self, rows: u64, bytes: u64) {
        self.rows += rows;
        self.bytes += bytes;
        if !self.shown || self.began.elapsed() < PATIENCE {
            return;
        }
        let rate = self.rows as f64 / self.began.elapsed().as_secs_f64();
        let bar = self.bar.get_or_insert_with(|| bar(self.size, self.began));
        bar.set_position(self.bytes);
        bar.set_message(format!("{}: {} rows, {rate:.0} a second", self.what, self.rows));
    }
}

fn bar(size: Option<u64>, began: Instant) -> ProgressBar {
    let (bar, form) = match size {
        Some(size) => (ProgressBar::new(size), "{msg}, {percent} %, {eta} left"),
        None => (ProgressBar::no_length(), "{msg}"),
    };
    // A form that is not understood would show the bar of its own making.
    bar.set_style(ProgressStyle::with_template(form).unwrap_or_else(|_| ProgressStyle::default_spinner()));
    bar.with_elapsed(began.elapsed())
}

impl Drop for Progress {
    fn drop(&mut self) {
        if let Some(bar) = &self.bar {
            bar.finish_and_clear();
        }
    }
}
