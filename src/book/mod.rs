//! The ship's own append-only record: a CSV file that any log reader reads, and that shows where it was tampered with.
//!
//! # The file
//! The log's own columns ([`Column::ALL`](crate::logbook::columns::Column::ALL)), then six of the book
//! ([`KEPT`](crate::logbook::columns::KEPT)). What the program worked out stands in the `logged_` columns, as an officer's figures do, so that
//! a later review checks them anew. One line is one entry; nothing in the file is ever changed:
//!
//! | row | how it is known |
//! |---|---|
//! | an observation, or `none` with its reason | `method` is written |
//! | the same, in the place of an earlier entry | besides, `corrects` and `reason` |
//! | an entry struck through with nothing in its place | `corrects` and `reason` alone |
//! | a signature: the entries so far are confirmed | `signed` |
//!
//! # The seal
//! SHA-256 (FIPS 180-4) over a tag, the seal of the entry before (32 zero bytes before the first), and the digest of the entry's cells: for each
//! cell that is not blank, by order of the columns' names, name and content, each with its length before it as eight bytes,
//! big-endian. The content counts by what it says, not by how it is spelled, so that a spreadsheet's re-saving is no alteration: blanks
//! about it fall away, a figure in a column of figures counts by its value (`045.0` is `45`, also with a decimal comma), a time of UTC by
//! its instant. Delimiter, quotes, line ends, encoding marks, blank columns and the order of columns do not count at all.
//! What does not survive is a cell that a spreadsheet takes for something else, such as `3/4` in words, which may become a date: the entry is then
//! said to be altered, which it is. Columns that the program does not know are not sealed; a check names them.
//!
//! # What a check shows, and what it cannot
//! [`check`] names the first entry that was altered, removed from the middle, inserted or moved. It cannot show a tail that was cut off
//! together with everything after it, nor a whole file written anew by somebody who knows how seals are made. The last seal, printed on
//! a page that was signed by hand, fixes both: see [`Book::entry_sealed`].
//!
//! # Writing
//! [`append`] locks the file, reads and checks it, writes the entry in one piece, and answers after the disk has it. A broken chain is said and
//! does not stop the entry: a record must never refuse what happened. A last line that was cut short by a power failure was never answered for; its bytes are
//! kept in a file beside the book (`.torn-1`), and that is said.
//!
//! The module computes nothing of the sky and reads no clock: when an entry is recorded is given.

mod append;
mod cells;
mod check;
mod entry;
mod page;
mod read;
mod seal;
mod torn;
mod write;

pub use append::{Appended, append};
pub use cells::EntryCells;
pub use check::{Check, Finding, check};
pub use entry::{Entry, Kind};
pub use page::page;
pub use read::Book;
pub use seal::Seal;
pub use torn::Torn;
pub use write::rows;
