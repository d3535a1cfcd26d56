//! `shadowpin queries`: every id that a reviewed row can carry, and what it means.

use super::exit::Exit;
use super::files;
use super::instruments::read_limits;
use super::output::{Format, OutputArgs};
use clap::Args as ClapArgs;
use shadowpin::error::Result;
use shadowpin::report::glossary;
use std::path::PathBuf;

/// Every query, notice, pattern and slip, with what it means and the limits in force.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Example:\n  shadowpin queries --limits fixtures/limits/company.toml")]
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
        Format::Text => glossary::text(&in_force),
        Format::Json => glossary::json(&in_force),
        Format::Csv => glossary::csv(&in_force),
    };
    args.output.write(&answer)?;
    Ok(Exit::Clean)
}
