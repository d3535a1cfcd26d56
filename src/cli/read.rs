//! Options that several commands read in the same way.

use shadowpin::angle::Position;
use shadowpin::angle::text::{read_latitude, read_longitude};
use shadowpin::error::{Error, Result};
use shadowpin::logbook::read_day;
use shadowpin::time::UtcInstant;
use std::fs::File;
use std::io::{self, Read};
use std::path::Path;

/// A position from `--lat` and `--lon`, or options named alike.
pub fn position((lat_option, lat): (&str, &str), (lon_option, lon): (&str, &str)) -> Result<Position> {
    let bad = |what: &str, bad| Error::Option { what: what.to_owned(), bad };
    Ok(Position {
        lat: read_latitude(lat).map_err(|b| bad(lat_option, b))?.value,
        lon: read_longitude(lon).map_err(|b| bad(lon_option, b))?.value,
    })
}

/// An instant of UTC, or the start of a date.
pub fn utc(option: &str, text: &str) -> Result<UtcInstant> {
    read_day(text).map_err(|bad| Error::Option { what: option.to_owned(), bad })
}

/// The whole content of a file, or of standard input for `-`, with the name that messages give it.
pub fn content(path: &Path) -> Result<(String, Vec<u8>)> {
    let mut bytes = Vec::new();
    if path == Path::new("-") {
        io::stdin().lock().read_to_end(&mut bytes).map_err(|source| Error::Stream { what: "reading standard input", source })?;
        return Ok(("standard input".to_owned(), bytes));
    }
    let file = |source| Error::File { path: path.to_owned(), source };
    File::open(path).and_then(|mut f| f.read_to_end(&mut bytes)).map_err(file)?;
    Ok((path.display().to_string(), bytes))
}
