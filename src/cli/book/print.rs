//! `shadowpin book print`: a page to be signed.

use super::super::exit::Exit;
use super::super::files::{RowsOut, never_over_inputs};
use super::super::read;
use clap::Args as ClapArgs;
use shadowpin::book::{Book, Entry, page};
use shadowpin::error::{Error, Result};
use shadowpin::time::UtcInstant;
use std::io::Write;
use std::path::PathBuf;

/// A page for A4 paper (HTML): the entries, room for initials, a line for the signature, and the last seal of the book.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Example:\n  shadowpin book print book.csv --from 2026-06-01 --to 2026-06-30 -o june.html\n\n\
    Open it in a browser and print it there. The seal on a page that was signed by hand shows later whether the book was cut short or\n\
    written anew: book check --seal.")]
pub struct Args {
    /// The book (CSV)
    #[arg(value_name = "BOOK")]
    book: PathBuf,
    /// From this date or time of UTC
    #[arg(long, value_name = "DATE")]
    from: Option<String>,
    /// To this date, all of it, or time of UTC
    #[arg(long, value_name = "DATE")]
    to: Option<String>,
    /// Write the page to this file instead of standard output
    #[arg(short, long, value_name = "FILE")]
    output: Option<PathBuf>,
}

/// Writes the page.
pub fn run(args: Args) -> Result<Exit> {
    never_over_inputs([Some(&args.book)], [&args.output])?;
    let from = args.from.as_deref().map(|text| read::utc("--from", text)).transpose()?;
    let to = args.to.as_deref().map(end_of).transpose()?;
    if let (Some(from), Some(to)) = (from, to)
        && to < from
    {
        return Err(Error::Usage("--to is before --from".into()));
    }
    let book = Book::open(&args.book)?;
    // An entry whose time cannot be read is left out of no page.
    let within = |entry: &&Entry| entry.at().is_none_or(|at| from.is_none_or(|from| at >= from) && to.is_none_or(|to| at < to));
    let html = page(&book, book.entries.iter().filter(within), &span(&args)).html();
    let mut out = RowsOut::open(args.output.as_deref())?;
    out.write_all(html.as_bytes()).map_err(|e| out.failed(e))?;
    out.finish()?;
    Ok(Exit::Clean)
}

/// The instant before which entries count: the end of a date.
fn end_of(text: &str) -> Result<UtcInstant> {
    let at = read::utc("--to", text)?;
    let seconds = if text.contains(':') { 0.001 } else { 86_400.0 };
    Ok(at.plus_seconds(seconds).unwrap_or(at))
}

fn span(args: &Args) -> String {
    match (&args.from, &args.to) {
        (Some(from), Some(to)) => format!("{} to {} UTC", from.trim(), to.trim()),
        (Some(from), None) => format!("from {} UTC", from.trim()),
        (None, Some(to)) => format!("to {} UTC", to.trim()),
        (None, None) => String::new(),
    }
}
