//! `shadowpin settle`: a gyro's run-up.

use super::exit::Exit;
use super::files::{self, RowsOut};
use super::instruments::read_limits;
use super::output::{Format, OutputArgs};
use super::read;
use super::when_where::option;
use clap::Args as ClapArgs;
use shadowpin::angle::TrueBearing;
use shadowpin::angle::text::{read_direction, read_latitude};
use shadowpin::compass::gyro::settle::{Settled, assess};
use shadowpin::error::{Error, Result};
use shadowpin::logbook::runup::read_run_up;
use shadowpin::report::settle::SettlePage;
use shadowpin::report::{chart, page};
use std::path::PathBuf;

/// A gyro's run-up: where it settles, and whether it has.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Example:\n  shadowpin settle fixtures/runups/runup_00.csv --lat 51-30N\n\n\
    Rows: utc and gyro_error; or utc and gyro_heading with --true-heading; or a log's columns for a bearing, such as utc, lat, lon, body and gyro_bearing.\n\
    Exit 0 when it has settled and is inside the limits; 1 when not yet, over them, or it cannot be told; 3 when rows could not be used.\n\
    --format csv gives the readings, each with what the swing expects of it, and those to come.")]
pub struct Args {
    /// The run-up (CSV), or - for standard input
    #[arg(value_name = "RUNUP")]
    run_up: PathBuf,
    /// Latitude, for the limits of the standards
    #[arg(long, value_name = "LATITUDE", allow_hyphen_values = true)]
    lat: Option<String>,
    /// The ship's true heading, for rows of gyro headings: alongside, the berth's
    #[arg(long, value_name = "HEADING")]
    true_heading: Option<String>,
    /// Limits file (TOML)
    #[arg(long, value_name = "FILE")]
    limits: Option<PathBuf>,
    /// Draw the run-up into this file (SVG)
    #[arg(long, value_name = "FILE")]
    chart: Option<PathBuf>,
    /// Write a report for a person to this file: one HTML page that needs no script and fetches nothing
    #[arg(long, value_name = "FILE")]
    report: Option<PathBuf>,
    #[command(flatten)]
    output: OutputArgs,
}

/// Judges the run-up and writes the answer.
pub fn run(args: Args) -> Result<Exit> {
    files::never_over_inputs([Some(&args.run_up), args.limits.as_ref()], [&args.output.output, &args.chart, &args.report])?;
    let limits = read_limits(args.limits.as_deref())?;
    let true_heading = args.true_heading.as_deref().map(|h| option("--true-heading", read_direction(h))).transpose()?;
    let latitude = args.lat.as_deref().map(|l| option("--lat", read_latitude(l))).transpose()?.map(|l| l.value);
    let (name, bytes) = read::content(&args.run_up)?;
    let run_up = read_run_up(&name, &bytes, true_heading.map(|h| TrueBearing::wrapping_deg(h.value)), &limits)?;
    let found = assess(&run_up.readings, latitude, &limits);
    let page = SettlePage { run_up: &run_up, found: &found, latitude, limits: &limits };
    if let Some(path) = &args.chart {
        std::fs::write(path, chart::run_up(&page)).map_err(|source| Error::File { path: path.clone(), source })?;
    }
    if let Some(path) = &args.report {
        RowsOut::open(Some(path))?.whole(&page::settle(&page, &name))?;
    }
    args.output.write(&match args.output.format {
        Format::Text => page.text(),
        Format::Json => page.json(),
        Format::Csv => page.csv(),
    })?;
    if !args.output.quiet {
        run_up.problems.iter().for_each(|problem| eprintln!("{problem}"));
    }
    let over = [found.settle_point_held, found.scatter_held].into_iter().flatten().any(|held| held.inside == Some(false));
    let settled = matches!(found.settled, Settled::Since { .. });
    Ok(match (run_up.problems.is_empty(), settled && !over && !found.too_slow) {
        (false, _) => Exit::Problems,
        (true, true) => Exit::Clean,
        (true, false) => Exit::Queries,
    })
}
