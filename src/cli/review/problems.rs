//! What is said on standard error of rows that could not be used.

/// Problems that are written out; the rest is counted.
const SHOWN: usize = 10;

/// Rows with a problem: the first few in words, all counted.
#[derive(Debug, Default)]
pub struct Problems {
    /// All of them.
    pub count: u64,
    first: Vec<String>,
}

impl Problems {
    /// Adds a row's problem.
    pub fn add(&mut self, line: u64, number: u64, problem: &str) {
        self.count += 1;
        if self.first.len() < SHOWN {
            self.first.push(format!("line {line} (row {number}): {problem}"));
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
            eprintln!("{name}, {problem}");
        }
        if self.count > self.first.len() as u64 {
            eprintln!("{name}: {} more rows with a problem; each says why in the column problem", self.count - self.first.len() as u64);
        }
    }
}
