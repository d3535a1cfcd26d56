//! `shadowpin book check`: the chain of seals.

use super::super::exit::Exit;
use super::super::files::never_over_inputs;
use super::super::output::{Format, OutputArgs};
use clap::Args as ClapArgs;
use shadowpin::book::{Book, check};
use shadowpin::error::{Error, Result};
use shadowpin::report::book_check::CheckPage;
use std::path::PathBuf;

/// Checks every seal, and names the first entry that was altered, removed from the middle, inserted or moved.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Examples:\n  shadowpin book check book.csv\n  shadowpin book check book.csv --seal 5e0b1a4c-93d2f7a8\n\n\
    Exit: 0 the seals hold, 1 something needs an explanation, 2 could not run.\n\
    They cannot show a tail that was cut off, nor a file written anew: --seal, with the last seal of a page that was signed, can.")]
pub struct Args {
    /// The book (CSV)
    #[arg(value_name = "BOOK")]
    book: PathBuf,
    /// The last seal on a signed page, or the first sixteen figures of it or more
    #[arg(long, value_name = "SEAL")]
    seal: Option<String>,
    #[command(flatten)]
    output: OutputArgs,
}

/// Checks the book.
pub fn run(args: Args) -> Result<Exit> {
    never_over_inputs([Some(&args.book)], [&args.output.output])?;
    let figures = args.seal.iter().flat_map(|s| s.chars()).filter(char::is_ascii_hexdigit).count();
    let other = args.seal.iter().flat_map(|s| s.chars()).any(|c| !c.is_ascii_hexdigit() && c != '-' && !c.is_whitespace());
    if args.seal.is_some() && (other || !(16..=64).contains(&figures)) {
        return Err(Error::Usage("--seal: expected 16 to 64 figures 0 to 9 and a to f, such as 5e0b1a4c-93d2f7a8".into()));
    }
    let book = Book::open(&args.book)?;
    let checked = check(&book);
    let page = CheckPage {
        name: book.name.clone(),
        entries: checked.entries,
        last_seal: checked.last.map(|(entry, seal)| (entry, seal.to_string())),
        findings: checked.findings.iter().map(|f| (f.id(), f.place(), f.to_string())).collect(),
        unsealed: checked.unsealed,
        signed_page: args.seal.map(|seal| {
            let entry = book.entry_sealed(&seal).and_then(|e| e.number);
            (seal, entry)
        }),
    };
    args.output.write(&match args.output.format {
        Format::Text => page.text(),
        Format::Json => page.json(),
        Format::Csv => page.csv(),
    })?;
    Ok(if page.holds() { Exit::Clean } else { Exit::Queries })
}
