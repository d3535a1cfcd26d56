//! Reading a log row by row.

mod cells;
mod header;
mod reader;
mod record;

pub use cells::{Cells, readable};
pub use header::Header;
pub use reader::{Block, LogForm, LogReader, LogRow};
pub use record::{LONGEST_ROW, MOST_CELLS, Record};
