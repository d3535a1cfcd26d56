//! `shadowpin book show`: the last entries.

use super::super::exit::Exit;
use super::super::files::never_over_inputs;
use super::super::output::{Format, OutputArgs};
use super::made;
use clap::Args as ClapArgs;
use shadowpin::book::{Book, Entry, page, rows};
use shadowpin::error::Result;
use std::path::PathBuf;

/// The last entries; one that was struck through is marked ~, and says by which entry and why.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Example:\n  shadowpin book show book.csv --last 6")]
pub struct Args {
    /// The book (CSV)
    #[arg(value_name = "BOOK")]
    book: PathBuf,
    /// How many
    #[arg(long, value_name = "N", default_value_t = 12)]
    last: usize,
    #[command(flatten)]
    output: OutputArgs,
}

/// Shows them.
pub fn run(args: Args) -> Result<Exit> {
    never_over_inputs([Some(&args.book)], [&args.output.output])?;
    let book = Book::open(&args.book)?;
    let shown: &[Entry] = book.entries.get(book.entries.len().saturating_sub(args.last)..).unwrap_or_default();
    args.output.write(&match args.output.format {
        Format::Text => page(&book, shown.iter(), "").text(),
        Format::Json => shown.iter().map(|entry| object(&book, entry) + "\n").collect(),
        Format::Csv => rows(shown.iter()),
    })?;
    Ok(Exit::Clean)
}

/// An entry as an object, with the entry that strikes it through.
fn object(book: &Book, entry: &Entry) -> String {
    let struck_by = entry.number.and_then(|number| book.struck_by(number)).and_then(|by| by.number);
    made::json(&entry.cells, &[("struck_by", struck_by.map(|n| n.to_string()))]).to_string()
}
