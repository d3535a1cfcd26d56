//! `shadowpin book correct`: an entry struck through by a new one.

use super::super::exit::Exit;
use super::super::files::never_over_inputs;
use super::super::output::OutputArgs;
use super::entry_args::EntryArgs;
use super::{draft, made};
use clap::Args as ClapArgs;
use shadowpin::book::{Book, EntryCells};
use shadowpin::error::{Error, Result};
use shadowpin::logbook::columns::Column;
use std::path::{Path, PathBuf};

/// Strikes an entry through by a new one, which says why; the old one stays as it was.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Examples:\n  \
    shadowpin book correct book.csv 3 --why \"318 read for 319\" --gyro 319\n  \
    shadowpin book correct book.csv 4 --why \"entered twice\"\n\n\
    With options for the observation, the new entry stands in the place of the old one: what is not given is as it was there, an\n\
    option given as \"\" leaves its cell blank, and the observation is worked anew. Without any, the old one is struck through and nothing\n\
    stands in its place.")]
pub struct Args {
    /// The book (CSV)
    #[arg(value_name = "BOOK")]
    book: PathBuf,
    /// Number of the entry
    #[arg(value_name = "ENTRY")]
    number: u64,
    /// Why it is struck through
    #[arg(long, value_name = "TEXT")]
    why: String,
    #[command(flatten)]
    entry: EntryArgs,
    #[command(flatten)]
    output: OutputArgs,
}

/// Strikes the entry through.
pub fn run(args: Args) -> Result<Exit> {
    never_over_inputs([Some(&args.book), args.entry.card.file(), args.entry.limits_file()], [&args.output.output])?;
    if args.why.trim().is_empty() {
        return Err(Error::Usage("--why: say why the entry is struck through".into()));
    }
    let given = args.entry.given()?;
    made::enter(&args.book, false, &args.output, |book| {
        let old = struck(book, args.number, &args.book)?;
        let (mut cells, working) = if given.is_empty() {
            (EntryCells::default(), String::new())
        } else {
            let ready = draft::ready(over(old, &given), &args.entry)?;
            (ready.cells, ready.working)
        };
        cells.set_corrects(args.number, &args.why);
        Ok((cells, working))
    })
}

/// The cells of the entry to be struck through.
fn struck<'b>(book: &'b Book, number: u64, path: &Path) -> Result<&'b EntryCells> {
    let cannot = book.cannot_be_struck(number);
    book.entry(number)
        .filter(|_| cannot.is_none())
        .map(|entry| &entry.cells)
        .ok_or_else(|| Error::Usage(format!("{}: {}", path.display(), cannot.unwrap_or_default())))
}

/// The old observation with what was given in its place.
fn over(old: &EntryCells, given: &[(Column, String)]) -> EntryCells {
    let gives = |column: Column| given.iter().any(|(c, _)| *c == column);
    let none_now = given.iter().any(|(c, text)| *c == Column::Method && text == "none");
    let mut cells = EntryCells::default();
    for column in Column::ALL.iter().copied().filter(|c| !is_worked(*c) && !(none_now && is_observed(*c))) {
        cells.set(column, old.get(column));
    }
    // What says the same in another way must not stand beside what is given.
    let instead: [(&[Column], &[Column]); 4] = [
        (&[Column::ShipTime], &[Column::Utc]),
        (&[Column::UtcOffset], &[Column::Zone]),
        (&[Column::Lat, Column::Lon], &[Column::Position]),
        (&[Column::Position], &[Column::Lat, Column::Lon]),
    ];
    for (by, out) in instead {
        if by.iter().any(|c| gives(*c)) {
            out.iter().for_each(|c| cells.set(*c, ""));
        }
    }
    if draft::is_none(old) && gives(Column::Body) {
        [Column::Method, Column::Remarks].into_iter().for_each(|c| cells.set(c, ""));
    }
    given.iter().for_each(|(column, text)| cells.set(*column, text));
    cells
}

/// What the program works out itself.
fn is_worked(column: Column) -> bool {
    use Column as C;
    matches!(column, C::LoggedAzimuth | C::LoggedGyroError | C::LoggedCompassError | C::LoggedVariation | C::LoggedDeviation)
}

/// What an entry without an observation has none of.
fn is_observed(column: Column) -> bool {
    use Column as C;
    matches!(
        column,
        C::Body
            | C::Horizon
            | C::Limb
            | C::Mark
            | C::ChartedBearing
            | C::GyroBearing
            | C::CompassBearing
            | C::GyroHeading
            | C::CompassHeading
    )
}
