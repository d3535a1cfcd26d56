//! `shadowpin book sign`: the entries so far confirmed.

use super::super::exit::Exit;
use super::super::files::never_over_inputs;
use super::super::output::OutputArgs;
use super::made;
use clap::Args as ClapArgs;
use shadowpin::book::EntryCells;
use shadowpin::error::{Error, Result};
use shadowpin::logbook::columns::Column;
use std::path::PathBuf;

/// Confirms the entries so far by an entry of its own. Its seal covers them all; a page printed and signed by hand fixes it.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Example:\n  shadowpin book sign book.csv --rank Master")]
pub struct Args {
    /// The book (CSV)
    #[arg(value_name = "BOOK")]
    book: PathBuf,
    /// Rank of whoever confirms
    #[arg(long, value_name = "RANK")]
    rank: String,
    /// Name or initials
    #[arg(long, value_name = "NAME")]
    name: Option<String>,
    #[command(flatten)]
    output: OutputArgs,
}

/// Makes the entry.
pub fn run(args: Args) -> Result<Exit> {
    never_over_inputs([Some(&args.book)], [&args.output.output])?;
    if args.rank.trim().is_empty() {
        return Err(Error::Usage("--rank: say in what rank the entries are confirmed".into()));
    }
    made::enter(&args.book, false, &args.output, |book| {
        if book.entries.is_empty() {
            return Err(Error::Usage(format!("{}: there is no entry to confirm", args.book.display())));
        }
        let mut cells = EntryCells::default();
        cells.set_signed(&args.rank);
        cells.set(Column::Observer, args.name.as_deref().unwrap_or_default());
        let last = book.next_number() - 1;
        Ok((cells, format!("Signed, {}: entries 1 to {last} confirmed\n", args.rank.trim())))
    })
}
