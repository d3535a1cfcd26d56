//! The columns of several logs as those of one.

use crate::logbook::log::{Record, readable};
use crate::logbook::names::ColumnNames;

/// The name of the column that says where a row came from.
const ORIGIN: &str = "read_from";

/// The columns of all logs so far, in the order that they were met in.
#[derive(Debug, Default)]
pub struct Union {
    /// Their names, as first written.
    pub titles: Vec<String>,
    /// What makes two names one: ours, or theirs in small letters; and which of several alike.
    keys: Vec<(String, usize)>,
}

/// Where each cell of one log stands in all of them.
#[derive(Debug)]
pub struct Layout(Vec<usize>);

impl Union {
    /// Adds a log's columns.
    pub fn add(&mut self, titles: &Record, names: &ColumnNames) -> Layout {
        let mut own: Vec<String> = Vec::new();
        let mut places = Vec::new();
        for title in titles.cells() {
            let title = readable(title);
            let title = title.trim();
            let name = names.ours(title).map_or_else(|| title.to_ascii_lowercase(), str::to_owned);
            let key = (name.clone(), own.iter().filter(|n| **n == name).count());
            own.push(name);
            places.push(self.keys.iter().position(|k| *k == key).unwrap_or_else(|| {
                self.keys.push(key);
                self.titles.push(title.to_owned());
                self.titles.len() - 1
            }));
        }
        Layout(places)
    }

    /// The name of the column of origins: one that no log has.
    pub fn origin(&self) -> String {
        let taken = |name: &str| self.keys.iter().any(|(key, _)| key == name);
        (1..).map(|n| if n == 1 { ORIGIN.to_owned() } else { format!("{ORIGIN}_{n}") }).find(|name| !taken(name)).unwrap_or_default()
    }
}

impl Layout {
    /// Puts `cells` where they belong in a row of `width`, then the origin, then what was left over behind the header.
    pub fn lay(&self, cells: &mut [Vec<u8>], row: &mut Vec<Vec<u8>>, width: usize, origin: Vec<u8>) {
        row.clear();
        row.resize(width, Vec::new());
        let mut over = Vec::new();
        for (at, cell) in cells.iter_mut().enumerate() {
            match self.0.get(at).and_then(|&place| row.get_mut(place)) {
                Some(slot) => *slot = std::mem::take(cell),
                None => over.push(std::mem::take(cell)),
            }
        }
        row.push(origin);
        row.append(&mut over);
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::logbook::log::LogReader;

    #[test]
    fn names_alike_are_one_column() {
        let titles = |header: &str| {
            let text = format!("{header}\n");
            LogReader::new(text.as_bytes(), "made", true).unwrap().titles
        };
        let mut union = Union::default();
        let names = ColumnNames::read("names", "utc = \"GMT\"").unwrap();
        union.add(&titles("utc,Lat,lon,body,tide,tide"), &names);
        let second = union.add(&titles("body,utc,lat,lon,tide,read_from"), &names);
        assert_eq!(union.titles, ["utc", "Lat", "lon", "body", "tide", "tide", "read_from"]);
        assert_eq!(union.origin(), "read_from_2");
        let (mut row, mut cells) = (Vec::new(), ["Sun", "t", "1", "2", "high", "x", "over"].map(|c| c.as_bytes().to_vec()));
        second.lay(&mut cells, &mut row, 7, b"here".to_vec());
        assert_eq!(row.join(&b','), b"t,1,2,Sun,high,,x,here,over");
    }
}
