//! Reading a log row by row.

mod cells;
mod header;
mod passed;
mod reader;
mod record;

pub use cells::{Cells, readable};
pub use header::Header;
pub use passed::Passed;
pub use reader::{Block, LogForm, LogReader, LogRow};
pub use record::{LONGEST_ROW, MOST_CELLS, Record};
