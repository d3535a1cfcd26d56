//! How well the review finds what is known to be there.

use shadowpin::review::Verdict;
use std::collections::BTreeMap;
use std::fmt;

/// What is known of a row.
#[derive(Debug, Clone)]
pub struct Known {
    pub slip: Option<String>,
    pub place: String,
    pub shift_deg: f64,
    /// The vessel has a pattern of its own.
    pub pattern: bool,
}

/// One slip's line of the table.
#[derive(Debug, Clone, Copy, Default)]
pub struct Line {
    pub rows: usize,
    pub found: usize,
    pub first: usize,
    pub first_three: usize,
    pub unexplained: usize,
}

/// The whole table.
#[derive(Debug, Clone, Default)]
pub struct Table {
    pub lines: BTreeMap<String, Line>,
    pub all: Line,
    /// Rows without a slip on vessels without a pattern, and those of them with a query.
    pub clean: usize,
    pub cried_wolf: usize,
    /// The same on vessels with a pattern: there the pattern is said once, the rows not one by one.
    pub patterned: usize,
    pub one_by_one: usize,
    /// Of the queries on clean rows.
    pub wolves: BTreeMap<&'static str, usize>,
}

/// The least shift that must be seen, degrees.
const SEEN_FROM_DEG: f64 = 2.0;

/// Slips whose residuals differ by less than this have the same effect, degrees: the column shows tenths.
const ALIKE_DEG: f64 = 0.05;

fn is(explained: &str, slip: &str) -> bool {
    match slip {
        "hour" => explained.starts_with("hour"),
        "day" => explained.starts_with("day"),
        "body" => explained.starts_with("body:"),
        _ => explained == slip,
    }
}

impl Table {
    pub fn add(&mut self, known: &Known, verdict: &Verdict) {
        let Some(slip) = &known.slip else {
            if known.pattern {
                self.patterned += 1;
                self.one_by_one += usize::from(!verdict.queries.is_empty());
            } else {
                self.clean += 1;
                if !verdict.queries.is_empty() {
                    self.cried_wolf += 1;
                    for q in &verdict.queries {
                        *self.wolves.entry(q.id()).or_default() += 1;
                    }
                }
            }
            return;
        };
        if known.shift_deg < SEEN_FROM_DEG {
            return;
        }
        let line = self.lines.entry(format!("{slip} ({})", known.place)).or_default();
        for line in [line, &mut self.all] {
            line.rows += 1;
            if verdict.queries.is_empty() {
                continue;
            }
            line.found += 1;
            let rank = verdict.slips.iter().position(|e| e.with.is_none() && is(&e.slip.to_string(), slip));
            let alike = |rank: usize| verdict.slips[rank].left_deg - verdict.slips[0].left_deg < ALIKE_DEG;
            match rank {
                Some(0) => line.first += 1,
                Some(rank @ (1 | 2)) if alike(rank) => line.first += 1,
                _ => {}
            }
            line.first_three += usize::from(rank.is_some_and(|r| r < 3));
            line.unexplained += usize::from(verdict.slips.is_empty());
        }
    }

    pub fn merge(&mut self, other: Self) {
        for (slip, line) in other.lines {
            let mine = self.lines.entry(slip).or_default();
            mine.add(line);
        }
        self.all.add(other.all);
        self.clean += other.clean;
        self.cried_wolf += other.cried_wolf;
        self.patterned += other.patterned;
        self.one_by_one += other.one_by_one;
        for (id, n) in other.wolves {
            *self.wolves.entry(id).or_default() += n;
        }
    }

    pub fn found_share(&self) -> f64 {
        self.all.found as f64 / self.all.rows.max(1) as f64
    }

    pub fn first_share(&self) -> f64 {
        self.all.first as f64 / self.all.found.max(1) as f64
    }

    pub fn first_three_share(&self) -> f64 {
        self.all.first_three as f64 / self.all.found.max(1) as f64
    }

    pub fn one_by_one_share(&self) -> f64 {
        self.one_by_one as f64 / self.patterned.max(1) as f64
    }

    pub fn cried_wolf_share(&self) -> f64 {
        self.cried_wolf as f64 / self.clean.max(1) as f64
    }
}

impl Line {
    fn add(&mut self, other: Self) {
        self.rows += other.rows;
        self.found += other.found;
        self.first += other.first;
        self.first_three += other.first_three;
        self.unexplained += other.unexplained;
    }
}

impl fmt::Display for Table {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        writeln!(f, "{:34} {:>5} {:>6} {:>6} {:>6} {:>6}", "slip (place), 2 degrees or more", "rows", "found", "first", "three", "none")?;
        let all = ("all".to_owned(), self.all);
        for (slip, l) in self.lines.iter().map(|(s, l)| (s.clone(), *l)).chain([all]) {
            writeln!(f, "{slip:34} {:>5} {:>6} {:>6} {:>6} {:>6}", l.rows, l.found, l.first, l.first_three, l.unexplained)?;
        }
        writeln!(
            f,
            "found {:.1} %, first {:.1} %, first three {:.1} %; clean rows queried {} of {} ({:.2} %) {:?}; on vessels with a pattern {} of {}",
            100.0 * self.found_share(),
            100.0 * self.first_share(),
            100.0 * self.first_three_share(),
            self.cried_wolf,
            self.clean,
            100.0 * self.cried_wolf_share(),
            self.wolves,
            self.one_by_one,
            self.patterned
        )
    }
}
