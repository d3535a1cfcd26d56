//! One row of a log, read, judged and written.

use super::problems::{Place, Problems};
use shadowpin::compass::Target;
use shadowpin::error::BadValue;
use shadowpin::logbook::entry::{Entry, Faults, ReadAs, read_entry};
use shadowpin::logbook::log::{LONGEST_ROW, LogRow, MOST_CELLS, Passed};
use shadowpin::notice::Notice;
use shadowpin::report::log_rows::LogRows;
use shadowpin::report::rows::RowFigures;
use shadowpin::review::{Desk, Findings, Fleet, Glimpse, Tally, Verdict, judge, names};
use std::fmt::Write as _;

/// The entry of a row that can be judged: neither blank nor without anything to reckon from.
pub fn entry<'r>(row: &'r LogRow<'r>, read_as: ReadAs, passed: &Passed, faults: &mut Faults) -> Option<Entry<'r>> {
    if row.record.is_blank() || passed.is(row) {
        return None;
    }
    if row.record.too_long {
        let bad = BadValue::new("longer", format!("a row of at most {LONGEST_ROW} bytes and {MOST_CELLS} cells"));
        let bad = bad.hint("is a quote never closed?");
        faults.add_row("row", bad);
        return None;
    }
    let entry = read_entry(row, read_as, faults);
    let (width, cells) = (row.header.width, row.record.width());
    if (width..cells).any(|i| row.record.cell(i).is_some_and(|c| !c.is_empty())) {
        // A delimiter too many: from there on no cell is sure to stand under its column.
        let bad = BadValue::new(&format!("{cells} cells"), format!("{width}, as in the header"));
        faults.add_row("row", bad.hint("a delimiter within a cell needs quotes; the cells left over stand behind ours"));
        return None;
    }
    (entry.nothing_had || entry.observation.is_some()).then_some(entry)
}

/// What the second pass makes of some rows that follow each other.
#[derive(Debug, Default)]
pub struct Judged {
    /// The rows as they are written.
    pub bytes: Vec<u8>,
    /// What is counted.
    pub tally: Tally,
    /// Rows that could not be used.
    pub problems: Problems,
    /// What a report takes of them, where one is asked for.
    pub glimpses: Glimpses,
    faults: Faults,
    joined: Joined,
}

/// What every row is judged with.
#[derive(Debug)]
pub struct Judging<'a> {
    /// What it is worked with.
    pub desk: Desk<'a>,
    /// How cells are understood.
    pub read_as: ReadAs,
    /// Rows of a book that are no observations, or no longer.
    pub passed: &'a Passed,
    /// What all rows say together.
    pub fleet: &'a Fleet,
    /// The form of the rows.
    pub rows: &'a LogRows,
    /// How messages say where a row stands.
    pub place: Place<'a>,
    /// A report is asked for.
    pub report: bool,
}

/// What a report takes of rows that follow each other.
#[derive(Debug, Default)]
pub struct Glimpses {
    judged: Vec<Glimpse>,
    problems: Vec<(u64, String)>,
}

impl Glimpses {
    /// Gives them to the report, in the order of rows.
    pub fn feed(&mut self, findings: &mut Findings) {
        self.judged.drain(..).for_each(|glimpse| findings.feed(glimpse));
        self.problems.drain(..).for_each(|(number, why)| findings.feed_problem(number, why));
    }
}

impl Judged {
    /// Judges one row and appends it.
    pub fn push(&mut self, row: &LogRow, with: &Judging) {
        self.faults.clear();
        let entry = entry(row, with.read_as, with.passed, &mut self.faults);
        let problem = self.faults.in_one();
        if !self.faults.is_empty() {
            self.problems.add(with.place, row, &self.faults);
            if with.report {
                self.glimpses.problems.push((row.number, problem.clone()));
            }
        }
        match &entry {
            Some(entry) => self.judge(row, entry, &problem, with),
            None => {
                if !self.faults.is_empty() {
                    self.tally.add_problem();
                }
                with.rows.push(&mut self.bytes, row.record, &RowFigures { problem: &problem, ..RowFigures::default() });
            }
        }
    }

    fn judge(&mut self, row: &LogRow, entry: &Entry, problem: &str, with: &Judging) {
        let headings_only = entry.observation.is_some_and(|o| o.target == Target::Headings);
        let run = if headings_only { with.fleet.gyro_run(names(entry), row.number) } else { None };
        let worked = with.desk.work(entry, run);
        let verdict = judge(&worked.row(row.number), with.fleet);
        self.tally.add(&entry.vessel, &verdict);
        if with.report {
            self.glimpses.judged.extend(Glimpse::of(&worked.row(row.number), &verdict, with.fleet));
        }
        if !problem.is_empty() {
            self.tally.add_fault();
        }
        self.joined.set(&verdict, &worked.worked.notices);
        let figures = RowFigures {
            worked: entry.observation.is_some().then_some(&worked.worked),
            card_deviation_deg: worked.card_deviation_deg(),
            queries: &self.joined.queries,
            slip: &self.joined.slips,
            notices: &self.joined.notices,
            note: &self.joined.note,
            problem,
        };
        with.rows.push(&mut self.bytes, row.record, &figures);
    }
}

/// The lists of a verdict as they stand in cells.
#[derive(Debug, Default)]
struct Joined {
    queries: String,
    slips: String,
    notices: String,
    note: String,
}

impl Joined {
    fn set(&mut self, verdict: &Verdict, notices: &[Notice]) {
        fn list(cell: &mut String, ids: impl Iterator<Item = impl std::fmt::Display>) {
            cell.clear();
            for id in ids {
                // Writing to a string does not fail.
                let _ = write!(cell, "{}{id}", if cell.is_empty() { "" } else { ";" });
            }
        }
        list(&mut self.queries, verdict.queries.iter().map(|q| q.id()));
        list(&mut self.slips, verdict.slips.iter());
        let said = notices.iter().chain(&verdict.notices);
        list(&mut self.notices, said.map(Notice::id).chain(verdict.patterns.iter().map(|p| p.id())));
        self.note = verdict.note().unwrap_or_default();
    }
}
