//! `shadowpin columns`: the log's columns, read and added.

use super::exit::Exit;
use super::output::{Format, OutputArgs};
use clap::Args as ClapArgs;
use shadowpin::error::Result;
use shadowpin::report::columns;

/// The log's columns: those that are read, and those that are added.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Example:\n  shadowpin columns --format csv")]
pub struct Args {
    #[command(flatten)]
    output: OutputArgs,
}

/// Writes the list.
pub fn run(args: Args) -> Result<Exit> {
    let answer = match args.output.format {
        Format::Text => columns::text(),
        Format::Json => columns::json(),
        Format::Csv => columns::csv(),
    };
    args.output.write(&answer)?;
    Ok(Exit::Clean)
}
