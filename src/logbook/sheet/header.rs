//! Where in a sheet the log begins, and which rows are none of its entries.

use super::cell::SheetCell;
use crate::logbook::columns::Column;
use crate::logbook::log::Header;
use crate::logbook::names::ColumnNames;

/// Rows of a sheet among which the columns' names must stand.
pub const SEARCHED: u32 = 100;

/// The row that holds the columns' names.
#[derive(Debug, Clone)]
pub struct Titles {
    /// The names as they stand.
    pub names: Vec<String>,
    /// Each by our name, where it has one; otherwise in small letters.
    pub ours: Vec<String>,
    /// The column that each is read as.
    pub columns: Vec<Option<Column>>,
}

impl Titles {
    /// The titles, where `cells` are the names of a log's columns.
    pub fn of(cells: &[SheetCell], names: &ColumnNames) -> Option<Self> {
        let found: Vec<String> = cells.iter().map(|c| c.text(None).trim().to_owned()).collect();
        let usable = Header::read_as(found.iter().map(String::as_bytes), true, names).is_ok();
        usable.then(|| Self::under(found, names))
    }

    /// The titles of a small table: one that has any column with a name of ours.
    pub fn of_table(cells: &[SheetCell], names: &ColumnNames, wanted: &[&str]) -> Option<Self> {
        let found: Vec<String> = cells.iter().map(|c| c.text(None).trim().to_owned()).collect();
        let titles = Self::under(found, names);
        titles.ours.iter().any(|name| wanted.contains(&name.as_str())).then_some(titles)
    }

    fn under(found: Vec<String>, names: &ColumnNames) -> Self {
        let ours: Vec<String> = found.iter().map(|n| names.ours(n).map_or_else(|| n.to_ascii_lowercase(), str::to_owned)).collect();
        let columns = ours.iter().map(|name| Column::ALL.iter().copied().find(|c| c.info().name == name)).collect();
        Self { names: found, ours, columns }
    }

    /// Whether a row is no entry: a heading of a voyage or a page, which is words in a single cell, or the names once more.
    pub fn passes_over(&self, cells: &[SheetCell]) -> bool {
        let mut filled = cells.iter().filter(|c| !c.is_blank());
        let heading = matches!((filled.next(), filled.next()), (Some(SheetCell::Text(_)), None));
        let again = || {
            let named = self.names.iter().enumerate().filter(|(_, name)| !name.is_empty());
            let mut same = named.map(|(at, name)| cells.get(at).is_some_and(|c| c.text(None).trim().eq_ignore_ascii_case(name)));
            same.all(|same| same)
        };
        heading || again()
    }
}
