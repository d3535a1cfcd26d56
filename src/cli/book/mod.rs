//! `shadowpin book`: the ship's own record, one file a subcommand.

mod add;
mod ask;
mod check;
mod correct;
mod draft;
mod entry_args;
mod made;
mod print;
mod show;
mod sign;
mod working;

use super::exit::Exit;
use clap::{Args as ClapArgs, Subcommand};
use shadowpin::error::Result;

/// The ship's own record: append-only, sealed entry by entry.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Examples:\n  \
    shadowpin book add book.csv --utc now --lat 36-05.8S --lon 130-33.6E --body sun --gyro 318.5 --observer 2/O\n  \
    shadowpin book add book.csv --utc now --none overcast --observer 3/O\n  \
    shadowpin book correct book.csv 3 --why \"318 read for 319\" --gyro 319\n  \
    shadowpin book print book.csv --from 2026-06-01 --to 2026-06-30 -o june.html\n\n\
    The book is a CSV file in the log's own columns: review reads it as any log. Nothing in it is ever changed or taken out.")]
pub struct Args {
    #[command(subcommand)]
    command: BookCommand,
}

#[derive(Debug, Subcommand)]
enum BookCommand {
    Add(Box<add::Args>),
    Show(show::Args),
    Correct(Box<correct::Args>),
    Sign(sign::Args),
    Print(print::Args),
    Check(check::Args),
}

/// Runs the subcommand.
pub fn run(args: Args) -> Result<Exit> {
    match args.command {
        BookCommand::Add(args) => add::run(*args),
        BookCommand::Show(args) => show::run(args),
        BookCommand::Correct(args) => correct::run(*args),
        BookCommand::Sign(args) => sign::run(args),
        BookCommand::Print(args) => print::run(args),
        BookCommand::Check(args) => check::run(args),
    }
}
