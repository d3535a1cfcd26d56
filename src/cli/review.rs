//! `shadowpin review`: a whole log, row by row.

use super::exit::Exit;
use super::files::{Input, RowsOut, never_over_inputs};
use super::instruments::read_limits;
use super::read;
use super::when_where::{DateOrderArg, date_order};
use clap::{Args as ClapArgs, ValueEnum};
use shadowpin::angle::text::ErrorSign;
use shadowpin::compass::card::Cards;
use shadowpin::error::{BadValue, Error, Result};
use shadowpin::limits::Limits;
use shadowpin::logbook::card::read_cards;
use shadowpin::logbook::entry::{Entry, Faults, ReadAs, read_entry};
use shadowpin::logbook::log::{LONGEST_ROW, LogReader, LogRow, MOST_CELLS, Passed, Record};
use shadowpin::report::log_rows::{LogRows, RowsAs};
use shadowpin::report::review_text;
use shadowpin::report::rows::RowFigures;
use shadowpin::review::{CardWatch, Desk, Fleet, Learn, Summary, Tally, Verdict, judge, names};
use std::io::Write;
use std::path::PathBuf;

/// Problems that are written out on standard error; the rest is counted.
const SHOWN: usize = 10;

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
enum RowForm {
    /// The input's delimiter
    Csv,
    /// One object a line
    Json,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
enum SignArg {
    /// East, or a gyro that reads low, is +
    EastPlus,
    /// A gyro that reads high is +
    HighPlus,
}

/// Works every row of a log anew, and says which entries need an explanation and what probably happened.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Example:\n  shadowpin review fixtures/logs/demo.csv -o reviewed.csv --summary summary.json\n\n\
    Rows go to standard output or -o, the summary for a person to standard error. Nothing in the log is ever corrected.\n\
    Exit: 0 nothing to report, 1 queries, 3 rows that could not be used, 2 could not run.")]
pub struct Args {
    /// The log (CSV), or - for standard input
    #[arg(value_name = "LOG")]
    log: PathBuf,
    /// Write the rows to this file, never the log itself
    #[arg(short, long, value_name = "FILE")]
    output: Option<PathBuf>,
    /// Form of the rows
    #[arg(long, value_enum, default_value_t = RowForm::Csv)]
    format: RowForm,
    /// Write the summary to this file as JSON
    #[arg(long, value_name = "FILE")]
    summary: Option<PathBuf>,
    /// Deviation cards (CSV)
    #[arg(long, value_name = "FILE")]
    card: Option<PathBuf>,
    /// Read cards in a straight line between their headings, not by their curves
    #[arg(long, requires = "card")]
    card_as_given: bool,
    /// Limits file (TOML)
    #[arg(long, value_name = "FILE")]
    limits: Option<PathBuf>,
    /// Order of dates written in figures, where they are not 2026-06-14
    #[arg(long, value_enum)]
    date_order: Option<DateOrderArg>,
    /// Figures are written with a decimal comma
    #[arg(long)]
    decimal_comma: bool,
    /// What a logged gyro error without a letter means
    #[arg(long, value_enum, default_value_t = SignArg::EastPlus)]
    logged_sign: SignArg,
    /// The log is an earlier output: replace the columns that were added
    #[arg(long)]
    again: bool,
    /// Exit 0 also with queries or problems, for engines that take anything else for failure
    #[arg(long)]
    exit_zero: bool,
    /// No summary on standard error
    #[arg(short, long)]
    quiet: bool,
}

/// The two passes over the log.
struct Review<'a> {
    args: &'a Args,
    read_as: ReadAs,
    desk: Desk<'a>,
    /// Rows of a book that are no observations, or no longer.
    passed: Passed,
}

/// Runs the review.
pub fn run(args: Args) -> Result<Exit> {
    never_over_inputs([Some(&args.log), args.card.as_ref(), args.limits.as_ref()], [&args.output, &args.summary])?;
    let mut input = Input::open(&args.log)?;
    let limits = read_limits(args.limits.as_deref())?;
    let cards = args.card.as_deref().map(|path| read::content(path).and_then(|(name, bytes)| read_cards(&name, &bytes))).transpose()?;
    let name = input.name.clone();
    let passed = Passed::of(LogReader::new(input.rewound()?, &name, args.again)?)?;
    let review = Review { passed, ..Review::new(&args, &limits, cards.as_ref()) };
    let log = LogReader::new(input.rewound()?, &name, args.again)?;
    if !args.quiet {
        log.header.hints.iter().for_each(|hint| eprintln!("{name}, line {}: {hint}", log.titles.line));
    }
    let (fleet, doubts) = review.learn(log)?;
    let mut out = RowsOut::open(args.output.as_deref())?;
    let (tally, problems) = review.judge(LogReader::new(input.rewound()?, &name, args.again)?, &fleet, &mut out)?;
    out.finish()?;
    let summary = Summary::of(&fleet, &tally);
    if let Some(path) = &args.summary {
        write_summary(path, &summary)?;
    }
    if !args.quiet {
        problems.print(&name);
        doubts.iter().for_each(|doubt| eprintln!("Notice: {doubt}"));
        eprint!("{}", review_text::text(&summary));
    }
    let patterns = summary.vessels.iter().any(|v| !v.patterns.is_empty());
    Ok(match (args.exit_zero, problems.count > 0, patterns || !summary.queries.is_empty()) {
        (true, _, _) | (false, false, false) => Exit::Clean,
        (false, true, _) => Exit::Problems,
        (false, false, true) => Exit::Queries,
    })
}

fn write_summary(path: &std::path::Path, summary: &Summary) -> Result<()> {
    let json = serde_json::to_string_pretty(summary).map_err(|e| Error::Usage(e.to_string()))?;
    std::fs::write(path, json + "\n").map_err(|source| Error::File { path: path.to_owned(), source })
}

/// Rows with a problem: the first few in words, all counted.
#[derive(Default)]
struct Problems {
    count: u64,
    first: Vec<String>,
}

impl Problems {
    fn add(&mut self, row: &LogRow, problem: &str) {
        self.count += 1;
        if self.first.len() < SHOWN {
            self.first.push(format!("line {} (row {}): {problem}", row.record.line, row.number));
        }
    }

    fn print(&self, name: &str) {
        for problem in &self.first {
            eprintln!("{name}, {problem}");
        }
        if self.count > self.first.len() as u64 {
            eprintln!("{name}: {} more rows with a problem; each says why in the column problem", self.count - self.first.len() as u64);
        }
    }
}

impl<'a> Review<'a> {
    fn new(args: &'a Args, limits: &'a Limits, cards: Option<&'a Cards>) -> Self {
        let logged_sign = match args.logged_sign {
            SignArg::EastPlus => ErrorSign::EastPlus,
            SignArg::HighPlus => ErrorSign::HighPlus,
        };
        let read_as = ReadAs { decimal_comma: args.decimal_comma, date_order: date_order(args.date_order), logged_sign };
        Self { args, read_as, desk: Desk { limits, cards, card_as_given: args.card_as_given }, passed: Passed::default() }
    }

    /// First pass: what each vessel's rows say together, and what they say of the cards.
    fn learn<R: std::io::Read>(&self, mut log: LogReader<R>) -> Result<(Fleet, Vec<String>)> {
        let mut learn = Learn::new(self.desk.limits.clone());
        let mut cards = CardWatch::new(self.desk.cards);
        let (mut record, mut faults) = (Record::default(), Faults::default());
        while let Some(row) = log.next(&mut record)? {
            faults.clear();
            if let Some(entry) = self.entry(&row, &mut faults) {
                let worked = self.desk.work(&entry, None);
                cards.feed(self.desk.cards, &entry, &worked);
                learn.feed(&worked.row(row.number));
                if self.passed.is_late(&row) {
                    learn.late(row.number);
                }
            }
        }
        Ok((learn.finish(), cards.doubts(self.desk.limits)))
    }

    /// The entry of a row that can be judged: neither blank nor without anything to reckon from.
    fn entry<'r>(&self, row: &'r LogRow<'r>, faults: &mut Faults) -> Option<Entry<'r>> {
        if row.record.is_blank() || self.passed.is(row) {
            return None;
        }
        if row.record.too_long {
            let bad = BadValue::new("longer", format!("a row of at most {LONGEST_ROW} bytes and {MOST_CELLS} cells"));
            let bad = bad.hint("is a quote never closed?");
            faults.add_row("row", bad);
            return None;
        }
        let entry = read_entry(row, self.read_as, faults);
        let (width, cells) = (row.header.width, row.record.width());
        if (width..cells).any(|i| row.record.cell(i).is_some_and(|c| !c.is_empty())) {
            // A delimiter too many: from there on no cell is sure to stand under its column.
            let bad = BadValue::new(&format!("{cells} cells"), format!("{width}, as in the header"));
            faults.add_row("row", bad.hint("a delimiter within a cell needs quotes; the cells left over stand behind ours"));
            return None;
        }
        (entry.nothing_had || entry.observation.is_some()).then_some(entry)
    }

    /// Second pass: each row judged and written.
    fn judge<R: std::io::Read>(&self, mut log: LogReader<R>, fleet: &Fleet, out: &mut RowsOut) -> Result<(Tally, Problems)> {
        let form = if self.args.format == RowForm::Json { RowsAs::JsonLines } else { RowsAs::Csv };
        let rows = LogRows::new(form, log.delimiter(), &log.titles, &log.header.replaced);
        let mut bytes = Vec::new();
        rows.push_header(&mut bytes, &log.titles, log.names_separator());
        let (mut tally, mut problems) = (Tally::default(), Problems::default());
        let (mut record, mut faults) = (Record::default(), Faults::default());
        while let Some(row) = log.next(&mut record)? {
            faults.clear();
            let entry = self.entry(&row, &mut faults);
            let problem = faults.in_one();
            if !faults.is_empty() {
                problems.add(&row, &problem);
            }
            match &entry {
                Some(entry) => self.judged(&row, entry, fleet, &problem, &rows, &mut tally, &mut bytes),
                None => {
                    if !faults.is_empty() {
                        tally.add_problem();
                    }
                    rows.push(&mut bytes, row.record, &RowFigures { problem: &problem, ..RowFigures::default() });
                }
            }
            out.write_all(&bytes).map_err(|e| out.failed(e))?;
            bytes.clear();
        }
        out.write_all(&bytes).map_err(|e| out.failed(e))?;
        Ok((tally, problems))
    }

    #[allow(clippy::too_many_arguments, reason = "one call, and the buffers are reused from row to row")]
    fn judged(&self, row: &LogRow, entry: &Entry, fleet: &Fleet, problem: &str, rows: &LogRows, tally: &mut Tally, bytes: &mut Vec<u8>) {
        let headings_only = entry.observation.is_some_and(|o| o.target == shadowpin::compass::Target::Headings);
        let run = if headings_only { fleet.gyro_run(names(entry), row.number) } else { None };
        let desk = self.desk.work(entry, run);
        let verdict = judge(&desk.row(row.number), fleet);
        tally.add(&entry.vessel, &verdict);
        if !problem.is_empty() {
            tally.add_fault();
        }
        let joined = Joined::of(&verdict, &desk.worked.notices);
        let figures = RowFigures {
            worked: entry.observation.is_some().then_some(&desk.worked),
            card_deviation_deg: desk.card_deviation_deg(),
            queries: &joined.queries,
            slip: &joined.slips,
            notices: &joined.notices,
            note: &joined.note,
            problem,
        };
        rows.push(bytes, row.record, &figures);
    }
}

/// The lists of a verdict as they stand in cells.
struct Joined {
    queries: String,
    slips: String,
    notices: String,
    note: String,
}

impl Joined {
    fn of(verdict: &Verdict, notices: &[shadowpin::notice::Notice]) -> Self {
        let list = |ids: &mut dyn Iterator<Item = String>| ids.collect::<Vec<_>>().join(";");
        let said = notices.iter().chain(&verdict.notices);
        Self {
            queries: list(&mut verdict.queries.iter().map(|q| q.id().to_owned())),
            slips: list(&mut verdict.slips.iter().map(ToString::to_string)),
            notices: list(&mut said.map(|n| n.id().to_owned()).chain(verdict.patterns.iter().map(|p| p.id().to_owned()))),
            note: verdict.note().unwrap_or_default(),
        }
    }
}
