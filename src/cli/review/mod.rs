//! `shadowpin review`: a whole log, row by row.

mod log;
mod passes;
mod problems;
mod row;

use super::exit::Exit;
use super::files::{RowsOut, never_over_inputs};
use super::in_order::threads;
use super::instruments::read_limits;
use super::interrupt;
use super::read;
use clap::{Args as ClapArgs, ValueEnum};
use log::{LogArgs, OpenLog};
use passes::Passes;
use problems::Place;
use shadowpin::error::{Error, Result};
use shadowpin::logbook::card::read_cards;
use shadowpin::logbook::log::{LogReader, Passed};
use shadowpin::report::log_rows::RowsAs;
use shadowpin::report::page::ReviewPage;
use shadowpin::report::review_text;
use shadowpin::review::{Desk, Findings, Summary};
use std::path::PathBuf;

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
enum RowForm {
    /// The input's delimiter
    Csv,
    /// One object a line
    Json,
}

/// Works every row of a log anew, and says which entries need an explanation and what probably happened.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Example:\n  shadowpin review fixtures/logs/demo.csv -o reviewed.csv --summary summary.json\n\n\
    Rows go to standard output or -o, the summary for a person to standard error. Nothing in the log is ever corrected.\n\
    Exit: 0 nothing to report, 1 queries, 3 rows that could not be used, 2 could not run.")]
pub struct Args {
    #[command(flatten)]
    log: LogArgs,
    /// Write the rows to this file, never the log itself
    #[arg(short, long, value_name = "FILE")]
    output: Option<PathBuf>,
    /// Form of the rows
    #[arg(long, value_enum, default_value_t = RowForm::Csv)]
    format: RowForm,
    /// Write the summary to this file as JSON
    #[arg(long, value_name = "FILE")]
    summary: Option<PathBuf>,
    /// Write a report for a person to this file: one HTML page that needs no script and fetches nothing
    #[arg(long, value_name = "FILE")]
    report: Option<PathBuf>,
    /// Deviation cards (CSV)
    #[arg(long, value_name = "FILE")]
    card: Option<PathBuf>,
    /// Read cards in a straight line between their headings, not by their curves
    #[arg(long, requires = "card")]
    card_as_given: bool,
    /// Limits file (TOML)
    #[arg(long, value_name = "FILE")]
    limits: Option<PathBuf>,
    /// Exit 0 also with queries or problems, for engines that take anything else for failure
    #[arg(long)]
    exit_zero: bool,
    /// No summary on standard error
    #[arg(short, long)]
    quiet: bool,
}

/// Runs the review.
pub fn run(args: Args) -> Result<Exit> {
    let inputs = args.log.files()?;
    never_over_inputs(
        inputs.iter().map(Some).chain([args.card.as_ref(), args.limits.as_ref()]),
        [&args.output, &args.summary, &args.report],
    )?;
    let OpenLog { mut input, form, places, notes } = args.log.open()?;
    let limits = read_limits(args.limits.as_deref())?;
    let cards = args.card.as_deref().map(|path| read::content(path).and_then(|(name, bytes)| read_cards(&name, &bytes))).transpose()?;
    let desk = Desk { limits: &limits, cards: cards.as_ref(), card_as_given: args.card_as_given };
    let rows_as = if args.format == RowForm::Json { RowsAs::JsonLines } else { RowsAs::Csv };
    let (name, size) = (input.name.clone(), input.size());
    let book_of = |number| places.as_ref().map_or(0, |places| places.part_of(number));
    let passed = Passed::of(LogReader::open(input.rewound()?, &name, &form)?, book_of)?;
    let passes = Passes {
        desk,
        passed: &passed,
        read_as: args.log.read_as(),
        rows_as,
        titled: form.header.is_none(),
        place: Place { log: &name, places: places.as_ref() },
        threads: threads(),
        size,
        quiet: args.quiet,
    };
    interrupt::watch();
    let log = LogReader::open(input.rewound()?, &name, &form)?;
    if !args.quiet {
        notes.iter().for_each(|note| eprintln!("{note}"));
        let line = if places.is_none() { format!(", line {}", log.titles.line) } else { String::new() };
        log.header.hints.iter().for_each(|hint| eprintln!("{name}{line}: {hint}"));
    }
    // Opened before the work, so that a place that cannot be written to is known before it.
    let report = args.report.as_deref().map(|path| RowsOut::open(Some(path))).transpose()?;
    let (fleet, doubts) = passes.learn(log)?;
    if interrupt::asked() {
        return Err(Error::Usage("stopped while the log was read the first time: nothing was written".into()));
    }
    let mut out = RowsOut::open(args.output.as_deref())?;
    let mut findings = report.is_some().then(|| Findings::new(&fleet));
    let (tally, problems) = passes.judge(LogReader::open(input.rewound()?, &name, &form)?, &fleet, &mut out, findings.as_mut())?;
    let summary = Summary::of(&fleet, &tally);
    if interrupt::asked() {
        let rows = summary.rows;
        let place = out.leave()?;
        return Err(Error::Usage(format!("stopped: {place} holds the first {rows} rows, each of them whole, and no summary was made")));
    }
    out.finish()?;
    if let Some(path) = &args.summary {
        write_summary(path, &summary)?;
    }
    if let Some((file, findings)) = report.zip(findings) {
        let (log, summary, fleet, card_doubts) = (name.as_str(), &summary, &fleet, doubts.as_slice());
        let (cards, card_as_given, limits) = (cards.as_ref(), args.card_as_given, &limits);
        file.whole(&ReviewPage { log, summary, fleet, findings, cards, card_as_given, card_doubts, limits }.html())?;
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
