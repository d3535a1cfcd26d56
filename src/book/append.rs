//! Adding an entry: locked, written in one piece, answered for when the disk has it.

use super::cells::EntryCells;
use super::check::check;
use super::entry::Entry;
use super::read::{Book, PAUSE, TRIES, content, header};
use super::seal::Seal;
use super::torn::Torn;
use super::write::line;
use crate::error::{Error, Result};
use std::fs::{File, OpenOptions, TryLockError};
use std::io::{self, Seek, SeekFrom, Write};
use std::path::{Path, PathBuf};

/// An entry that the disk has.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Appended {
    /// Its number.
    pub entry: u64,
    /// Its cells, number and seal among them.
    pub cells: EntryCells,
    /// Its seal.
    pub seal: Seal,
    /// What was found in the book before it: sentences.
    pub found: Vec<String>,
}

/// Adds an entry to a book; `begin` says that the file may be new.
///
/// `draft` gives the entry's cells, `recorded_utc` among them, and sees the book as it stands while nobody else can write to it.
///
/// # Errors
/// Whatever `draft` answers; [`Error::File`] and [`Error::Content`] where the file is no book or cannot be locked or written. Then the book is as it was,
/// and the message says so where it could be in doubt.
pub fn append(path: &Path, begin: bool, draft: impl FnOnce(&Book) -> Result<EntryCells>) -> Result<Appended> {
    let name = path.display().to_string();
    let failed = |source| Error::File { path: path.to_owned(), source };
    let mut file = locked(path, begin)?;
    let bytes = content(&mut file).map_err(failed)?;
    let book = Book::parse(&name, &bytes)?;
    let refuse = |message: String| Error::Content { file: name.clone(), line: 0, message };
    if !book.layout.plain {
        return Err(refuse("it was saved as UTF-16, which a line cannot be added to: save it as CSV in UTF-8".to_owned()));
    }
    let mut cells = draft(&book)?;
    let number = book.next_number();
    cells.put("entry", &number.to_string());
    if let Some((column, _)) = cells.iter().find(|(column, _)| !book.layout.columns.contains(&Some(column))) {
        return Err(refuse(format!(
            "it has no column {column}, which this entry needs: begin a new book, or add the column to its header"
        )));
    }
    let before = book.last_seal().map_or(Seal::BEFORE_FIRST, |(_, seal)| seal);
    let seal = Entry::of(0, cells.clone()).sealed_after(&before);
    cells.put("seal", &seal.to_string());

    let mut found: Vec<String> = check(&Book { torn: None, ..book.clone() }).findings.iter().map(ToString::to_string).collect();
    let mut length = bytes.len();
    if let Some(torn) = book.torn {
        found.push(set_aside(path, &mut file, &bytes, torn).map_err(failed)?);
        length = torn.start;
    }
    let mut piece = Vec::new();
    if length == 0 {
        piece.extend_from_slice(header().as_bytes());
    } else if !book.ended {
        piece.extend_from_slice(book.layout.line_end.as_bytes());
        found.push("the last line had no line end, and was whole; it has one now".to_owned());
    }
    piece.append(&mut line(&book.layout, &cells));
    if let Err(source) = write_whole(&mut file, length as u64, &piece) {
        // What did arrive is no entry; where even this fails, the next run finds a line that was cut short.
        let undone = file.set_len(length as u64).and_then(|()| file.sync_all());
        let state = if undone.is_ok() { "the book is as it was" } else { "its last line may be cut short; the next entry sets that aside" };
        return Err(refuse(format!("{source}: nothing was entered; {state}")));
    }
    if bytes.is_empty() {
        sync_folder(path);
    }
    Ok(Appended { entry: number, cells, seal, found })
}

fn write_whole(file: &mut File, at: u64, piece: &[u8]) -> io::Result<()> {
    file.seek(SeekFrom::Start(at))?;
    file.write_all(piece)?;
    file.sync_all()
}

/// The file, open and locked for this writer alone.
fn locked(path: &Path, begin: bool) -> Result<File> {
    let failed = |source: io::Error| match source.kind() {
        io::ErrorKind::PermissionDenied | io::ErrorKind::ReadOnlyFilesystem => Error::Content {
            file: path.display().to_string(),
            line: 0,
            message: format!("{source}: nothing was entered; it can be read, but not written to"),
        },
        _ => Error::File { path: path.to_owned(), source },
    };
    // Another program may have put a new file in the place of the one that was waited for.
    for _ in 0..TRIES {
        let file = OpenOptions::new().read(true).write(true).create(begin).truncate(false).open(path).map_err(failed)?;
        if !file.metadata().map_err(failed)?.is_file() {
            return Err(failed(io::Error::other("it is no ordinary file")));
        }
        wait_for(&file, path)?;
        let ours = file.try_clone().and_then(same_file::Handle::from_file).map_err(failed)?;
        if same_file::Handle::from_path(path).is_ok_and(|now| now == ours) {
            return Ok(file);
        }
    }
    Err(failed(io::Error::other("it is replaced again and again by another program")))
}

fn wait_for(file: &File, path: &Path) -> Result<()> {
    let refuse = |message: String| Error::Content { file: path.display().to_string(), line: 0, message };
    for _ in 0..TRIES {
        match file.try_lock() {
            Ok(()) => return Ok(()),
            Err(TryLockError::WouldBlock) => std::thread::sleep(PAUSE),
            Err(TryLockError::Error(source)) => {
                return Err(refuse(format!("{source}: it cannot be locked there, and two at once could spoil it; nothing was entered")));
            }
        }
    }
    Err(refuse("another program has been writing to it for ten seconds; nothing was entered: try again".to_owned()))
}

/// Keeps the bytes of a line that was cut short in a file beside the book, and only then takes them out.
fn set_aside(path: &Path, file: &mut File, bytes: &[u8], torn: Torn) -> io::Result<String> {
    let mut number = 1_u32;
    let (mut side, name) = loop {
        let mut name = path.as_os_str().to_owned();
        name.push(format!(".torn-{number}"));
        let name = PathBuf::from(name);
        match OpenOptions::new().write(true).create_new(true).open(&name) {
            Ok(side) => break (side, name),
            Err(e) if e.kind() == io::ErrorKind::AlreadyExists && number < u32::MAX => number += 1,
            Err(e) => return Err(e),
        }
    };
    side.write_all(bytes.get(torn.start..).unwrap_or_default())?;
    side.sync_all()?;
    sync_folder(&name);
    file.set_len(torn.start as u64)?;
    file.sync_all()?;
    Ok(format!(
        "the last line was cut short ({} bytes): an entry that was never confirmed; its bytes are kept in {}",
        torn.length,
        name.display()
    ))
}

/// Makes a new name in a folder last. Not every system can do that to a folder, and the content itself is safe by then.
fn sync_folder(path: &Path) {
    let folder = path.parent().filter(|p| !p.as_os_str().is_empty()).unwrap_or(Path::new("."));
    let _ = File::open(folder).and_then(|folder| folder.sync_all());
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::logbook::columns::Column;
    use crate::time::UtcInstant;

    fn add(path: &Path, body: &str) -> Result<Appended> {
        append(path, true, |_| {
            let mut cells = EntryCells::default();
            cells.set(Column::Body, body);
            cells.set(Column::Lat, "-36.5");
            cells.set(Column::Remarks, "=1+1; \"so\", he said");
            cells.set_recorded(UtcInstant::from_unix_ms(1_781_417_520_000).unwrap());
            Ok(cells)
        })
    }

    fn sound(path: &Path) -> usize {
        let checked = check(&Book::open(path).unwrap());
        assert_eq!(checked.findings, []);
        checked.entries
    }

    #[test]
    fn entries_read_back_and_are_never_formulas() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("book.csv");
        for (at, body) in ["Sun", "Moon", "Vega"].into_iter().enumerate() {
            let added = add(&path, body).unwrap();
            assert_eq!((added.entry, added.found), (at as u64 + 1, vec![]));
        }
        let book = Book::open(&path).unwrap();
        assert_eq!(sound(&path), 3);
        assert_eq!(book.entries[2].cells.get(Column::Remarks), "=1+1; \"so\", he said");
        let text = std::fs::read_to_string(&path).unwrap();
        assert!(text.contains(",\" =1+1; \"\"so\"\", he said\",") && text.contains(",-36.5,"));
        assert_eq!(rows_of(&book), text);
    }

    fn rows_of(book: &Book) -> String {
        super::super::write::rows(book.entries.iter())
    }

    /// At every length that a killed writer can leave, the entries before are there and the next one is sound.
    #[test]
    fn a_line_cut_at_any_byte() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("book.csv");
        (0..2).for_each(|_| drop(add(&path, "Sun").unwrap()));
        let two = std::fs::read(&path).unwrap();
        add(&path, "Moon").unwrap();
        let three = std::fs::read(&path).unwrap();
        for length in (two.len() + 1..three.len()).step_by(7).chain([three.len() - 1]).chain((1..two.len() / 2).step_by(97)) {
            std::fs::write(&path, &three[..length]).unwrap();
            let whole = three[..length].iter().filter(|b| **b == b'\n').count().saturating_sub(1) + usize::from(length == three.len() - 1);
            let added = add(&path, "Vega").unwrap();
            assert_eq!(added.entry, whole as u64 + 1, "{length}");
            assert_eq!(sound(&path), whole + 1);
            assert_eq!(added.found.len(), 1, "{:?}", added.found);
            // The bytes are all still there, in one file or the other.
            let kept = std::fs::read(folder.path().join("book.csv.torn-1")).unwrap_or_default();
            assert!(three[..length].ends_with(&kept) && (whole == 3 || !kept.is_empty()), "{length}");
            let _ = std::fs::remove_file(folder.path().join("book.csv.torn-1"));
        }
    }

    #[test]
    fn zeros_after_a_loss_of_power() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("book.csv");
        std::fs::write(&path, [0; 40]).unwrap();
        assert_eq!(add(&path, "Sun").unwrap().entry, 1);
        let mut bytes = std::fs::read(&path).unwrap();
        bytes.extend_from_slice(b"\0\0\0\0,,,x\n");
        std::fs::write(&path, bytes).unwrap();
        assert_eq!(add(&path, "Moon").unwrap().entry, 2);
        assert_eq!(sound(&path), 2);
        assert!(folder.path().join("book.csv.torn-2").exists());
    }

    #[test]
    fn a_file_that_is_no_book_is_not_touched() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("notes.txt");
        for text in ["my notes", "utc,lat,lon,body\n2026-06-14T06:12Z,1,2,Sun\n"] {
            std::fs::write(&path, text).unwrap();
            assert!(add(&path, "Sun").is_err());
            assert_eq!(std::fs::read_to_string(&path).unwrap(), text);
        }
        assert!(append(&folder.path().join("none.csv"), false, |_| Ok(EntryCells::default())).is_err());
        assert!(!folder.path().join("none.csv").exists());
    }

    #[test]
    fn a_broken_chain_is_said_and_the_entry_made() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("book.csv");
        (0..3).for_each(|_| drop(add(&path, "Sun").unwrap()));
        let text = std::fs::read_to_string(&path).unwrap().replacen(",Sun,", ",Moon,", 1);
        std::fs::write(&path, text).unwrap();
        let added = add(&path, "Vega").unwrap();
        assert!(added.entry == 4 && added.found.len() == 1 && added.found[0].starts_with("entry 1 (line 2)"), "{:?}", added.found);
        assert_eq!(check(&Book::open(&path).unwrap()).findings.len(), 1);
    }

    /// Re-saved by a spreadsheet with semicolons, other line ends, a mark, quotes, the columns in another order and blank ones left out, and
    /// carried on in that form.
    #[test]
    fn saved_again_in_another_form() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("book.csv");
        (0..3).for_each(|_| drop(add(&path, "Sun").unwrap()));
        let mut reader = csv::Reader::from_path(&path).unwrap();
        let rows: Vec<csv::StringRecord> =
            std::iter::once(reader.headers().unwrap().clone()).chain(reader.records().map(Result::unwrap)).collect();
        let mut text = String::from("\u{feff}");
        for row in &rows {
            let cells: Vec<String> =
                row.iter().rev().map(|c| format!("\"{}\"", c.trim().replace("-36.5", "-36,50").replace('"', "\"\""))).collect();
            text.push_str(&(cells.join(";") + ";\r\n"));
        }
        std::fs::write(&path, text).unwrap();
        assert_eq!(sound(&path), 3);
        let added = add(&path, "Moon").unwrap();
        assert_eq!((added.entry, added.found), (4, vec![]));
        assert_eq!(sound(&path), 4);
        assert!(std::fs::read_to_string(&path).unwrap().ends_with("\r\n"));
    }
}
