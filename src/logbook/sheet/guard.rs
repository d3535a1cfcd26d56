//! What a workbook says of its own size, looked at before room is made for it.

use std::io::{Read, Seek, SeekFrom};

/// All parts unpacked, bytes: over a hundred times the largest log that was seen (our own).
const MOST_UNPACKED: u64 = 4 << 30;
/// Bytes of a part that are searched for its count of strings.
const START: u64 = 4096;

/// Refuses what would unpack to more than could be held, or promises more strings than it has room for.
pub fn check<R: Read + Seek>(source: &mut R) -> Result<(), String> {
    let no_workbook = |e: zip::result::ZipError| format!("it is no workbook that can be read: {e}");
    let mut archive = zip::ZipArchive::new(&mut *source).map_err(no_workbook)?;
    let mut unpacked = 0_u64;
    for at in 0..archive.len() {
        let mut part = archive.by_index(at).map_err(no_workbook)?;
        unpacked = unpacked.saturating_add(part.size());
        if part.name().map_err(no_workbook)?.to_ascii_lowercase().ends_with("sharedstrings.xml") {
            let size = part.size();
            let mut start = Vec::new();
            part.by_ref().take(START).read_to_end(&mut start).map_err(|e| e.to_string())?;
            // Each string takes some bytes of its part.
            if count(&String::from_utf8_lossy(&start)).is_some_and(|n| n > size) {
                return Err("it says that it holds more words than its size allows: it is damaged".to_owned());
            }
        }
    }
    if unpacked > MOST_UNPACKED {
        return Err(format!("it would unpack to {} MB: is it a log?", unpacked >> 20));
    }
    source.seek(SeekFrom::Start(0)).map(|_| ()).map_err(|e| e.to_string())
}

/// The number behind `uniqueCount=`; one with too many figures is the largest there is.
fn count(text: &str) -> Option<u64> {
    let behind = text.split_once("uniqueCount")?.1.trim_start().strip_prefix('=')?.trim_start();
    let figures: String = behind.trim_start_matches(['"', '\'']).chars().take_while(char::is_ascii_digit).collect();
    (!figures.is_empty()).then(|| figures.parse().unwrap_or(u64::MAX))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn counts() {
        assert_eq!(count("<sst count=\"9\" uniqueCount=\"12\">"), Some(12));
        assert_eq!(count("<sst uniqueCount = '99999999999999999999999'>"), Some(u64::MAX));
        assert_eq!(count("<sst>"), None);
    }
}
