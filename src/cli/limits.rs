//! `shadowpin limits`: every threshold and uncertainty in force, with its origin.

use super::exit::Exit;
use super::files;
use super::instruments::read_limits;
use super::output::{Format, OutputArgs};
use clap::Args as ClapArgs;
use shadowpin::error::Result;
use shadowpin::report::limits;
use std::path::PathBuf;

/// Every limit and uncertainty in force, with its unit and origin.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Example:\n  shadowpin limits --limits fixtures/limits/canal.toml")]
pub struct Args {
    /// Limits file (TOML)
    #[arg(long, value_name = "FILE")]
    limits: Option<PathBuf>,
    #[command(flatten)]
    output: OutputArgs,
}

/// Writes the list.
pub fn run(args: Args) -> Result<Exit> {
    files::never_over_inputs([args.limits.as_ref()], [&args.output.output])?;
    let in_force = read_limits(args.limits.as_deref())?;
    let answer = match args.output.format {
        Format::Text => limits::text(&in_force),
        Format::Json => limits::json(&in_force),
        Format::Csv => limits::csv(&in_force),
    };
    args.output.write(&answer)?;
    Ok(Exit::Clean)
}
