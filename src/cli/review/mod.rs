//! `shadowpin review`: a whole log, row by row.

mod passes;
mod problems;
mod row;

use super::exit::Exit;
use super::files::{Input, RowsOut, never_over_inputs};
use super::in_order::threads;
use super::instruments::read_limits;
use super::read;
use super::when_where::{DateOrderArg, date_order};
use clap::{Args as ClapArgs, ValueEnum};
use passes::Passes;
use shadowpin::angle::text::ErrorSign;
use shadowpin::error::{Error, Result};
use shadowpin::logbook::card::read_cards;
use shadowpin::logbook::entry::ReadAs;
use shadowpin::logbook::log::LogReader;
use shadowpin::report::log_rows::RowsAs;
use shadowpin::report::review_text;
use shadowpin::review::{Desk, Summary};
use std::path::PathBuf;

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

impl Args {
    fn read_as(&self) -> ReadAs {
        let logged_sign = match self.logged_sign {
            SignArg::EastPlus => ErrorSign::EastPlus,
            SignArg::HighPlus => ErrorSign::HighPlus,
        };
        ReadAs { decimal_comma: self.decimal_comma, date_order: date_order(self.date_order), logged_sign }
    }
}

/// Runs the review.
pub fn run(args: Args) -> Result<Exit> {
    never_over_inputs([Some(&args.log), args.card.as_ref(), args.limits.as_ref()], [&args.output, &args.summary])?;
    let mut input = Input::open(&args.log)?;
    let limits = read_limits(args.limits.as_deref())?;
    let cards = args.card.as_deref().map(|path| read::content(path).and_then(|(name, bytes)| read_cards(&name, &bytes))).transpose()?;
    let desk = Desk { limits: &limits, cards: cards.as_ref(), card_as_given: args.card_as_given };
    let form = if args.format == RowForm::Json { RowsAs::JsonLines } else { RowsAs::Csv };
    let passes = Passes { desk, read_as: args.read_as(), form, threads: threads() };
    let name = input.name.clone();
    let log = LogReader::new(input.rewound()?, &name, args.again)?;
    if !args.quiet {
        log.header.hints.iter().for_each(|hint| eprintln!("{name}, line {}: {hint}", log.titles.line));
    }
    let (fleet, doubts) = passes.learn(log)?;
    let mut out = RowsOut::open(args.output.as_deref())?;
    let (tally, problems) = passes.judge(LogReader::new(input.rewound()?, &name, args.again)?, &fleet, &mut out)?;
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
