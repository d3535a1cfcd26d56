//! `shadowpin book show`: the last watches.

use super::super::exit::Exit;
use super::super::files::never_over_inputs;
use super::super::output::{Format, OutputArgs};
use super::made;
use clap::Args as ClapArgs;
use shadowpin::book::{Book, Entry, Kind, page, rows};
use shadowpin::error::Result;
use shadowpin::logbook::columns::Column;
use shadowpin::time::Zone;
use shadowpin::time::text::read_zone;
use std::collections::BTreeSet;
use std::path::PathBuf;

/// The entries of the last watches; one that was struck through is marked ~, and says by which entry and why.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Example:\n  shadowpin book show book.csv --watches 12")]
pub struct Args {
    /// The book (CSV)
    #[arg(value_name = "BOOK")]
    book: PathBuf,
    /// How many watches of four hours, of those that have an entry
    #[arg(long, value_name = "N", default_value_t = 6, value_parser = clap::value_parser!(u32).range(1..))]
    watches: u32,
    /// So many entries instead
    #[arg(long, value_name = "N", conflicts_with = "watches")]
    last: Option<usize>,
    #[command(flatten)]
    output: OutputArgs,
}

/// Shows them.
pub fn run(args: Args) -> Result<Exit> {
    never_over_inputs([Some(&args.book)], [&args.output.output])?;
    let book = Book::open(&args.book)?;
    let from = args.last.map_or_else(|| first_of(&book, args.watches), |last| book.entries.len().saturating_sub(last));
    let shown: &[Entry] = book.entries.get(from..).unwrap_or_default();
    args.output.write(&match args.output.format {
        Format::Text => page(&book, shown.iter(), "").text(),
        Format::Json => shown.iter().map(|entry| object(&book, entry) + "\n").collect(),
        Format::Csv => rows(shown.iter()),
    })?;
    Ok(Exit::Clean)
}

/// Milliseconds of a watch.
const WATCH_MS: i64 = 4 * 3_600_000;

/// Place of the first entry of the last so many watches with an entry, in ship's time by the zone of the last entry that has one, else
/// in UTC.
fn first_of(book: &Book, watches: u32) -> usize {
    let zone = book.entries.iter().rev().find_map(|entry| read_zone(entry.cells.get(Column::Zone)).ok()).unwrap_or(Zone::UTC);
    let watch = |entry: &Entry| {
        let at = entry.at().filter(|_| matches!(entry.kind(), Kind::Observation | Kind::Nothing))?;
        Some((at.unix_ms() - i64::from(zone.description_minutes()) * 60_000).div_euclid(WATCH_MS))
    };
    let kept: BTreeSet<i64> = book.entries.iter().filter_map(watch).collect();
    let skipped = kept.len().saturating_sub(watches as usize);
    let Some(first) = kept.iter().nth(skipped) else { return 0 };
    // A correction of an older entry stands among the last, and is shown with them.
    book.entries.iter().position(|entry| watch(entry).is_some_and(|w| w >= *first)).unwrap_or(0)
}

/// An entry as an object, with the entry that strikes it through.
fn object(book: &Book, entry: &Entry) -> String {
    let struck_by = entry.number.and_then(|number| book.struck_by(number)).and_then(|by| by.number);
    made::json(&entry.cells, &[("struck_by", struck_by.map(|n| n.to_string()))]).to_string()
}
