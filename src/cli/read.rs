//! Options that several commands read in the same way.

use shadowpin::angle::{Latitude, Longitude, Position};
use shadowpin::error::{BadValue, Error, Result};
use shadowpin::time::UtcInstant;
use std::fs::File;
use std::io::{self, Read};
use std::path::Path;

/// A position from `--lat` and `--lon`, or options named alike.
pub fn position((lat_option, lat): (&str, &str), (lon_option, lon): (&str, &str)) -> Result<Position> {
    let bad = |what: &str, bad| Error::Option { what: what.to_owned(), bad };
    let lat_deg = degrees(lat, 'N', 'S').and_then(Latitude::from_deg);
    let lon_deg = degrees(lon, 'E', 'W').and_then(Longitude::from_deg);
    Ok(Position {
        lat: lat_deg.ok_or_else(|| bad(lat_option, BadValue::new(lat, "a latitude, 90 S to 90 N")))?,
        lon: lon_deg.ok_or_else(|| bad(lon_option, BadValue::new(lon, "a longitude, 180 W to 180 E")))?,
    })
}

fn degrees(text: &str, plus: char, minus: char) -> Option<f64> {
    let text = text.trim();
    let letter = text.chars().next_back()?.to_ascii_uppercase();
    if letter == plus || letter == minus {
        let value: f64 = text.get(..text.len() - 1)?.trim().parse().ok()?;
        return (value >= 0.0).then_some(if letter == minus { -value } else { value });
    }
    text.parse().ok()
}

/// An instant from `--utc`.
pub fn utc(option: &str, text: &str) -> Result<UtcInstant> {
    let bad =
        |hint: String| Error::Option { what: option.to_owned(), bad: BadValue::new(text, "a time of UTC as 2026-03-01T12:00Z").hint(hint) };
    let plain = text.trim().trim_end_matches(['Z', 'z']);
    let forms = ["%Y-%m-%dT%H:%M:%S%.f", "%Y-%m-%d %H:%M:%S%.f", "%Y-%m-%dT%H:%M", "%Y-%m-%d %H:%M"];
    let naive = forms.iter().find_map(|form| chrono::NaiveDateTime::parse_from_str(plain, form).ok());
    let naive = naive.or_else(|| chrono::NaiveDate::parse_from_str(plain, "%Y-%m-%d").ok().map(|day| day.and_time(chrono::NaiveTime::MIN)));
    UtcInstant::from_naive(naive.ok_or_else(|| bad(String::new()))?).map_err(|outside| bad(outside.to_string()))
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
