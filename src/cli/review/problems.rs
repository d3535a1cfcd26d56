//! What is said on standard error of rows that could not be used.

use shadowpin::logbook::entry::Faults;
use shadowpin::logbook::gather::Places;
use shadowpin::logbook::log::LogRow;

/// Problems that are written out; the rest is counted.
const SHOWN: usize = 10;

/// How messages say where a row stands.
#[derive(Debug, Clone, Copy)]
pub struct Place<'a> {
    /// Name of the log.
    pub log: &'a str,
    /// Where its rows came from, where they were gathered.
    pub places: Option<&'a Places>,
}

impl Place<'_> {
    fn words(&self, row: &LogRow, faults: &Faults) -> String {
        let columns: Vec<&str> = faults.iter().map(|fault| fault.column).collect();
        let gathered = self.places.and_then(|places| places.words(row.number, &columns));
        gathered.unwrap_or_else(|| format!("{}, line {}", self.log, row.record.line))
    }
}

/// Rows with a problem: the first few in words, all counted.
#[derive(Debug, Default)]
pub struct Problems {
    /// All of them.
    pub count: u64,
    first: Vec<String>,
}

impl Problems {
    /// Adds a row's problem.
    pub fn add(&mut self, place: Place, row: &LogRow, faults: &Faults) {
        self.count += 1;
        if self.first.len() < SHOWN {
            self.first.push(format!("{} (row {}): {}", place.words(row, faults), row.number, faults.in_one()));
        }
    }

    /// Adds those of the rows that follow.
    pub fn join(&mut self, later: Self) {
        self.count += later.count;
        let free = SHOWN - self.first.len();
        self.first.extend(later.first.into_iter().take(free));
    }

    /// Says them; `name` is that of the log.
    pub fn print(&self, name: &str) {
        for problem in &self.first {
            eprintln!("{problem}");
        }
        if self.count > self.first.len() as u64 {
            eprintln!("{name}: {} more rows with a problem; each says why in the column problem", self.count - self.first.len() as u64);
        }
    }
}
