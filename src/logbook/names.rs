//! Column names other than ours: which of a file's names stands for which of ours.

use super::columns::Column;
use crate::error::{Error, Result};
use crate::limits::nearest;

/// Names of small tables that are no columns of a log.
const OF_TABLES: [&str; 4] = ["deviation", "magnetic_heading", "turn", "gyro_error"];

/// A file's own names for our columns.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct ColumnNames {
    /// Ours, and theirs in small letters.
    pairs: Vec<(&'static str, String)>,
}

impl ColumnNames {
    /// Reads TOML lines `ours = "theirs"`; case and blanks about theirs do not matter. `name` is what messages call the file.
    ///
    /// # Errors
    /// [`Error::Content`] for what is no TOML, a name that is not ours (with the nearest that is), and one of theirs given twice.
    ///
    /// # Example
    /// ```
    /// use shadowpin::logbook::names::ColumnNames;
    /// let names = ColumnNames::read("names.toml", "gyro_bearing = \"Brg Gyro\"\nutc = \"GMT\"")?;
    /// assert_eq!(names.ours(" brg gyro"), Some("gyro_bearing"));
    /// # Ok::<(), shadowpin::error::Error>(())
    /// ```
    pub fn read(name: &str, text: &str) -> Result<Self> {
        let content = |line: usize, message: String| Error::Content { file: name.to_owned(), line: line as u64, message };
        let line_of = |at: usize| text.get(..at).map_or(0, |before| before.matches('\n').count() + 1);
        let table: toml::Table =
            toml::from_str(text).map_err(|e| content(e.span().map_or(0, |s| line_of(s.start)), e.message().to_owned()))?;
        let mut names = Self::default();
        for (key, value) in table {
            let line = text.lines().position(|l| l.trim_start().trim_start_matches('"').starts_with(&key)).map_or(0, |at| at + 1);
            let known = || Column::ALL.iter().map(|c| c.info().name).chain(OF_TABLES);
            let Some(ours) = known().find(|ours| *ours == key) else {
                let hint =
                    nearest(&key, known()).map_or_else(|| "; `shadowpin columns` lists them".to_owned(), |n| format!("; is it {n}?"));
                return Err(content(line, format!("{key} is no column that is read: a line is ours = \"theirs\"{hint}")));
            };
            let Some(theirs) = value.as_str().map(|t| t.trim().to_ascii_lowercase()).filter(|t| !t.is_empty()) else {
                return Err(content(line, format!("{ours}: the file's own name for it was expected, in quotes")));
            };
            if let Some((other, _)) = names.pairs.iter().find(|(_, t)| *t == theirs) {
                return Err(content(line, format!("\"{theirs}\" stands for two columns: {other} and {ours}")));
            }
            names.pairs.push((ours, theirs));
        }
        Ok(names)
    }

    /// Our name for one of the file's; `None` where none was given.
    pub fn ours(&self, theirs: &str) -> Option<&'static str> {
        let theirs = theirs.trim();
        self.pairs.iter().find(|(_, t)| t.eq_ignore_ascii_case(theirs)).map(|(ours, _)| *ours)
    }

    /// One sentence for the first name given that is not among `header`, with the nearest that are.
    pub fn missing<'h>(&self, header: impl Iterator<Item = &'h str> + Clone) -> Option<String> {
        let stands = |theirs: &str| header.clone().any(|h| h.trim().eq_ignore_ascii_case(theirs));
        let (ours, theirs) = self.pairs.iter().find(|(_, theirs)| !stands(theirs))?;
        let mut near: Vec<(usize, &str)> = header.map(str::trim).filter(|h| !h.is_empty()).map(|h| (distance(theirs, h), h)).collect();
        near.sort();
        let near: Vec<&str> = near.into_iter().take(3).map(|(_, name)| name).collect();
        Some(format!("there is no column \"{theirs}\", which --columns gives for {ours}; the nearest are {}", near.join(", ")))
    }
}

/// Edits between two names, capitals and blanks aside.
fn distance(a: &str, b: &str) -> usize {
    let plain = |name: &str| name.chars().filter(char::is_ascii_alphanumeric).collect::<String>().to_ascii_lowercase();
    crate::error::edits(&plain(a), &plain(b))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_is_refused() {
        let said = |text: &str| ColumnNames::read("names.toml", text).unwrap_err().to_string();
        assert!(said("\nutcc = \"GMT\"").contains("line 2") && said("utcc = \"GMT\"").contains("is it utc?"));
        assert!(said("utc = 5").contains("in quotes"));
        assert!(said("utc = \"GMT\"\ndate = \"gmt \"").contains("stands for two columns: date and utc"));
        assert!(said("utc =").contains("line 1"));
    }

    #[test]
    fn a_name_that_is_not_there_comes_with_the_nearest() {
        let names = ColumnNames::read("names.toml", "utc = \"Time GMT\"").unwrap();
        assert_eq!(names.missing(["Date", " time gmt ", "Lat"].into_iter()), None);
        let said = names.missing(["Date", "TimeGMT+0", "Lat"].into_iter()).unwrap();
        assert!(said.contains("nearest are TimeGMT+0"), "{said}");
    }
}
