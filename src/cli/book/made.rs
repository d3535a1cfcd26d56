//! An entry made, and said.

use super::super::exit::Exit;
use super::super::output::{Format, OutputArgs};
use super::super::when_where::now;
use shadowpin::book::{Appended, Book, EntryCells, append};
use shadowpin::error::{Error, Result};
use shadowpin::logbook::columns::{Column, KEPT};
use shadowpin::report::rows::push_csv_text;
use std::path::Path;

/// Makes the entry that `draft` gives, then says what was made of it and what was found in the book.
pub fn enter(path: &Path, begin: bool, output: &OutputArgs, draft: impl FnOnce(&Book) -> Result<(EntryCells, String)>) -> Result<Exit> {
    let mut working = String::new();
    let made = append(path, begin, |book| {
        let (mut cells, text) = draft(book)?;
        working = text;
        // Under the lock, so that the times of two writers stand in the order of their entries.
        cells.set_recorded(now()?.utc);
        Ok(cells)
    })?;
    if !output.quiet {
        made.found.iter().for_each(|found| eprintln!("Notice: {}: {found}", path.display()));
    }
    let answer = match output.format {
        Format::Text => {
            let gap = if working.is_empty() { "" } else { "\n" };
            format!("{working}{gap}Entered as entry {}.\nSeal {}\n", made.entry, made.seal)
        }
        Format::Json => json(&made.cells, &[]).to_string(),
        Format::Csv => csv(&made),
    };
    // The entry is made by now: an answer that cannot be given must not read as if it were not.
    output.write(&answer).map(|()| Exit::Clean).map_err(|error| match error {
        Error::File { path, source } => {
            let source = std::io::Error::new(source.kind(), format!("{source}; the entry was made, as entry {}", made.entry));
            Error::File { path, source }
        }
        other => other,
    })
}

/// An entry as an object: each column, blank ones `null`, then what is said of it.
pub fn json(cells: &EntryCells, more: &[(&str, Option<String>)]) -> serde_json::Value {
    let names = Column::ALL.iter().map(|c| c.info().name).chain(KEPT.iter().map(|c| c.name));
    let cell = |name: &'static str| (name.to_owned(), Some(cells.named(name)).filter(|t| !t.is_empty()).map(str::to_owned));
    let more = more.iter().map(|(name, text)| ((*name).to_owned(), text.clone()));
    let members = names.map(cell).chain(more).map(|(name, text)| (name, text.map_or(serde_json::Value::Null, Into::into)));
    serde_json::Value::Object(members.collect())
}

fn csv(made: &Appended) -> String {
    let (mut header, mut row) = (Vec::new(), Vec::new());
    for (at, name) in Column::ALL.iter().map(|c| c.info().name).chain(KEPT.iter().map(|c| c.name)).enumerate() {
        if at > 0 {
            header.push(b',');
            row.push(b',');
        }
        push_csv_text(&mut header, name, b',');
        push_csv_text(&mut row, made.cells.named(name), b',');
    }
    header.push(b'\n');
    header.append(&mut row);
    String::from_utf8_lossy(&header).into_owned()
}
