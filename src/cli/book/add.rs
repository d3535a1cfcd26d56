//! `shadowpin book add`: an observation worked and entered.

use super::super::exit::Exit;
use super::super::files::never_over_inputs;
use super::super::output::OutputArgs;
use super::entry_args::EntryArgs;
use super::{ask, draft, made};
use clap::Args as ClapArgs;
use shadowpin::error::Result;
use std::io::{self, IsTerminal};
use std::path::PathBuf;

/// Works an observation, or takes the reason why there is none, and enters it. At a terminal it asks for what is missing.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Examples:\n  \
    shadowpin book add book.csv --utc now --lat 36-05.8S --lon 130-33.6E --body sun --gyro 318.5 --compass 314.5 \\\n    \
    --gyro-heading 204 --compass-heading 200.5 --observer 2/O\n  \
    shadowpin book add book.csv --ship-time \"2026-06-14 07:30\" --zone -9 --position \"36-05.8S 130-33.6E\" --body sun \\\n    \
    --method rising --gyro 060.5\n  \
    shadowpin book add book.csv --utc now --none overcast --observer 3/O\n\n\
    A book that is not there yet is begun. The command answers when the disk has the entry.")]
pub struct Args {
    /// The book (CSV)
    #[arg(value_name = "BOOK")]
    book: PathBuf,
    #[command(flatten)]
    entry: EntryArgs,
    #[command(flatten)]
    output: OutputArgs,
}

/// Enters the observation.
pub fn run(args: Args) -> Result<Exit> {
    never_over_inputs([Some(&args.book), args.entry.card.file(), args.entry.limits_file()], [&args.output.output])?;
    let mut cells = args.entry.cells()?;
    if draft::lacks(&cells) && io::stdin().is_terminal() && io::stderr().is_terminal() {
        ask::missing(&mut cells, args.entry.read_as(), &mut io::stdin().lock(), &mut io::stderr())?;
    }
    let ready = draft::ready(cells, &args.entry)?;
    made::enter(&args.book, true, &args.output, |_| Ok((ready.cells, ready.working)))
}
