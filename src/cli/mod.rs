//! One file a command; each sees only the public library.

mod amplitude;
mod azimuth;
mod book;
mod card;
mod columns;
mod exit;
mod files;
mod in_order;
mod instruments;
mod interrupt;
mod limits;
mod nmea;
mod one_row;
mod output;
mod page;
mod plan;
mod progress;
mod queries;
mod read;
mod review;
mod self_check;
mod settle;
mod sheets;
mod shell;
mod swing;
mod variation;
mod when_where;

use clap::{CommandFactory, Parser, Subcommand};
use exit::Exit;
use std::process::ExitCode;

/// Compass errors by the bearings of the sun, the moon, planets and stars.
#[derive(Parser)]
#[command(name = "shadowpin", version, max_term_width = 100, arg_required_else_help = true)]
#[command(after_help = "A check on instruments, not a means of navigation, and not type-approved. The official almanac, the chart, \
the adjuster's card, the makers' manuals, the limits of flag and company, and the master come first. \
Never look at the sun without the azimuth circle's shades.")]
struct Cli {
    #[command(subcommand)]
    command: Command,
}

#[derive(Subcommand)]
enum Command {
    Azimuth(azimuth::Args),
    Amplitude(amplitude::Args),
    Plan(plan::Args),
    Book(book::Args),
    Page(Box<page::Args>),
    Review(Box<review::Args>),
    Settle(settle::Args),
    Columns(columns::Args),
    Queries(queries::Args),
    Limits(limits::Args),
    SelfCheck(self_check::Args),
    Completions(shell::CompletionArgs),
    Man(shell::ManArgs),
    /// A deviation curve from the deviations of a swing
    Swing(swing::Args),
    /// Variation and the earth's field at a place and date
    Variation(variation::Args),
}

/// Runs the command line and answers the exit code: 0 nothing to report, 1 queries, 2 could not run, 3 problem rows.
pub fn main() -> ExitCode {
    let cli = match Cli::try_parse() {
        Ok(cli) => cli,
        Err(help) => {
            let _ = help.print();
            return if help.use_stderr() { Exit::Error.into() } else { Exit::Clean.into() };
        }
    };
    match run(cli.command) {
        Ok(exit) => exit.into(),
        Err(error) if output::is_closed_pipe(&error) => Exit::Clean.into(),
        Err(error) => {
            eprintln!("shadowpin: {error}");
            Exit::Error.into()
        }
    }
}

fn run(command: Command) -> shadowpin::error::Result<Exit> {
    match command {
        Command::Azimuth(args) => azimuth::run(args),
        Command::Amplitude(args) => amplitude::run(args),
        Command::Plan(args) => plan::run(args),
        Command::Book(args) => book::run(args),
        Command::Page(args) => page::run(*args),
        Command::Review(args) => review::run(*args),
        Command::Settle(args) => settle::run(args),
        Command::Columns(args) => columns::run(args),
        Command::Queries(args) => queries::run(args),
        Command::Completions(args) => shell::completions(&args, Cli::command()),
        Command::Man(args) => shell::man(&args, Cli::command()),
        Command::Limits(args) => limits::run(args),
        Command::SelfCheck(args) => self_check::run(args),
        Command::Swing(args) => swing::run(args),
        Command::Variation(args) => variation::run(args),
    }
}
