//! Rows of cells out of bytes: encoding, delimiter, quotes, and nothing in a file that could use up memory.

use crate::error::{Error, Result};
use csv_core::ReadRecordResult;
use encoding_rs_io::{DecodeReaderBytes, DecodeReaderBytesBuilder};
use std::io::Read;

/// The longest row that is read, bytes; a longer one is most likely a quote that was never closed.
pub const LONGEST_ROW: usize = 1 << 20;
/// The most cells that a row may have.
pub const MOST_CELLS: usize = 1 << 12;
/// What a line `sep=` may name: bytes that stand in no figure, time or name of ours.
const SEPARATORS: &[u8] = b",;\t|^~";
/// Bytes read at a time.
const BUFFER: usize = 1 << 16;

/// One row of cells, in buffers that are used again for the next.
#[derive(Debug, Default, Clone)]
pub struct Record {
    bytes: Vec<u8>,
    ends: Vec<usize>,
    used: usize,
    /// Line of the file on which the row begins, from 1.
    pub line: u64,
    /// Whether the row was longer than [`LONGEST_ROW`], or had more than [`MOST_CELLS`]: its cells are lost.
    pub too_long: bool,
}

impl Record {
    /// The cells.
    pub fn cells(&self) -> impl Iterator<Item = &[u8]> {
        (0..self.used).map(|i| self.cell(i).unwrap_or_default())
    }

    /// One cell; `None` beyond the row's end.
    pub fn cell(&self, index: usize) -> Option<&[u8]> {
        let ends = self.ends.get(..self.used)?;
        let start = if index == 0 { 0 } else { *ends.get(index - 1)? };
        self.bytes.get(start..*ends.get(index)?)
    }

    /// Number of cells.
    pub fn width(&self) -> usize {
        self.used
    }

    /// Bytes in all cells together.
    pub fn size(&self) -> usize {
        self.used.checked_sub(1).and_then(|last| self.ends.get(last)).copied().unwrap_or(0)
    }

    /// Whether every cell is blank.
    pub fn is_blank(&self) -> bool {
        !self.too_long && self.bytes.get(..self.size()).is_none_or(|bytes| bytes.iter().all(u8::is_ascii_whitespace))
    }
}

/// Reads rows of cells.
pub(super) struct Records<R: Read> {
    source: DecodeReaderBytes<R, Vec<u8>>,
    core: csv_core::Reader,
    buffer: Vec<u8>,
    filled: usize,
    taken: usize,
    /// Line of the next byte, from 1.
    pub line: u64,
    /// The byte that lines are counted by: a line feed, or a carriage return where the first line ends in that alone.
    line_end: u8,
    /// What parts the cells.
    pub delimiter: u8,
    /// Whether the file began with a line `sep=` that names nothing that can part cells.
    pub unusable_separator: bool,
    /// Whether the file began with a line that names its separator.
    pub names_separator: bool,
}

impl<R: Read> Records<R> {
    /// Finds the encoding (UTF-8 with or without mark, UTF-16 with one) and the delimiter: by a first line `sep=`, otherwise the one of
    /// comma, semicolon and tab that stands most often in the first line with anything in it.
    pub fn new(source: R) -> Result<Self> {
        let source = DecodeReaderBytesBuilder::new()
            .bom_override(true)
            .strip_bom(true)
            .utf8_passthru(true)
            .build_with_buffer(source, vec![0; 8 << 10]);
        let mut records = Self {
            source: source.map_err(reading)?,
            core: csv_core::Reader::new(),
            buffer: vec![0; BUFFER],
            filled: 0,
            taken: 0,
            line: 1,
            line_end: b'\n',
            delimiter: b',',
            unusable_separator: false,
            names_separator: false,
        };
        records.fill()?;
        records.find_delimiter();
        Ok(records)
    }

    /// Reads on where the buffer is used up; false at the end.
    fn fill(&mut self) -> Result<bool> {
        if self.taken < self.filled {
            return Ok(true);
        }
        (self.taken, self.filled) = (0, 0);
        // A whole buffer, so that the first one holds the header whatever the size of the pieces that arrive.
        while let Some(free) = self.buffer.get_mut(self.filled..).filter(|free| !free.is_empty()) {
            match self.source.read(free) {
                Ok(0) => break,
                Ok(n) => self.filled += n,
                Err(e) if e.kind() == std::io::ErrorKind::Interrupted => {}
                Err(e) => return Err(reading(e)),
            }
        }
        Ok(self.filled > 0)
    }

    fn find_delimiter(&mut self) {
        let start = self.buffer.get(..self.filled).unwrap_or_default();
        let first_end = start.iter().position(|b| matches!(b, b'\r' | b'\n')).unwrap_or(start.len());
        if let [b'\r', not_feed, ..] = start.get(first_end..).unwrap_or_default()
            && *not_feed != b'\n'
        {
            self.line_end = b'\r';
        }
        let named = match start.get(..first_end).unwrap_or_default() {
            [b's' | b'S', b'e' | b'E', b'p' | b'P', b'=', named @ ..] if named.len() <= 1 => Some(named),
            _ => None,
        };
        if let Some(named) = named {
            let separator = named.first().copied().filter(|b| SEPARATORS.contains(b));
            (self.names_separator, self.unusable_separator, self.taken) = (true, separator.is_none(), first_end);
            self.delimiter = separator.unwrap_or(b',');
        } else {
            let mut counts = [(b',', 0), (b';', 0), (b'\t', 0)];
            let mut quoted = false;
            for byte in start.iter().skip_while(|b| matches!(b, b'\r' | b'\n' | b' ')) {
                match byte {
                    b'"' => quoted = !quoted,
                    b'\n' | b'\r' if !quoted => break,
                    _ if quoted => {}
                    _ => counts.iter_mut().filter(|(d, _)| d == byte).for_each(|(_, n)| *n += 1),
                }
            }
            // The first of those alike: comma before semicolon before tab.
            self.delimiter = counts.iter().rev().max_by_key(|(_, n)| *n).map_or(b',', |(d, _)| *d);
        }
        self.core = csv_core::ReaderBuilder::new().delimiter(self.delimiter).build();
    }

    /// The next row that has any bytes in it; false at the end.
    pub fn next(&mut self, record: &mut Record) -> Result<bool> {
        (record.used, record.too_long) = (0, false);
        let (mut bytes_used, mut ends_used) = (0, 0);
        if !self.skip_empty_lines()? {
            return Ok(false);
        }
        record.line = self.line;
        loop {
            let more = self.fill()?;
            let input = if more { self.buffer.get(self.taken..self.filled).unwrap_or_default() } else { &[] };
            if bytes_used == record.bytes.len() && bytes_used < LONGEST_ROW {
                record.bytes.resize((bytes_used * 2).clamp(1024, LONGEST_ROW), 0);
            }
            if ends_used == record.ends.len() && ends_used < MOST_CELLS {
                record.ends.resize((ends_used * 2).clamp(64, MOST_CELLS), 0);
            }
            let bytes = record.bytes.get_mut(bytes_used..).unwrap_or_default();
            let ends = record.ends.get_mut(ends_used..).unwrap_or_default();
            let (result, taken, written, ended) = self.core.read_record(input, bytes, ends);
            self.line += input.get(..taken).unwrap_or_default().iter().filter(|b| **b == self.line_end).count() as u64;
            self.taken += taken;
            bytes_used += written;
            ends_used += ended;
            match result {
                ReadRecordResult::Record => break,
                ReadRecordResult::End => return Ok(false),
                ReadRecordResult::InputEmpty => {}
                ReadRecordResult::OutputFull | ReadRecordResult::OutputEndsFull => {
                    if bytes_used >= LONGEST_ROW || ends_used >= MOST_CELLS {
                        // Read on to the row's end, keeping nothing.
                        record.too_long = true;
                        (bytes_used, ends_used) = (0, 0);
                    }
                }
            }
        }
        record.used = if record.too_long { 0 } else { ends_used };
        Ok(true)
    }

    /// Passes over line ends before a row; false at the end.
    fn skip_empty_lines(&mut self) -> Result<bool> {
        while self.fill()? {
            match self.buffer.get(self.taken) {
                Some(end @ (b'\n' | b'\r')) => self.line += u64::from(*end == self.line_end),
                _ => return Ok(true),
            }
            self.taken += 1;
        }
        Ok(false)
    }
}

fn reading(source: std::io::Error) -> Error {
    Error::Stream { what: "reading the log", source }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn rows(text: &[u8]) -> (Vec<(u64, Vec<String>)>, u8) {
        let mut records = Records::new(text).unwrap();
        let mut record = Record::default();
        let mut rows = Vec::new();
        while records.next(&mut record).unwrap() {
            rows.push((record.line, record.cells().map(|c| String::from_utf8_lossy(c).into_owned()).collect()));
        }
        (rows, records.delimiter)
    }

    #[test]
    fn lines_and_cells() {
        let (rows, delimiter) = rows(b"\r\na;b;\"c\nd\"\r\n\r\n1;2;\"3 \"\"x\"\"\"\r\n;;");
        assert_eq!(delimiter, b';');
        let cells = |cells: [&str; 3]| cells.map(str::to_owned).to_vec();
        assert_eq!(rows, [(2, cells(["a", "b", "c\nd"])), (5, cells(["1", "2", "3 \"x\""])), (6, cells(["", "", ""]))]);
    }

    #[test]
    fn encodings_and_separators() {
        assert_eq!(rows(b"\xEF\xBB\xBFa,b\n1,2\n").0[0].1, ["a", "b"]);
        let utf16: Vec<u8> = "\u{feff}a\tb\n1\t2\n".encode_utf16().flat_map(u16::to_le_bytes).collect();
        assert_eq!(rows(&utf16), (vec![(1, vec!["a".into(), "b".into()]), (2, vec!["1".into(), "2".into()])], b'\t'));
        assert_eq!(rows(b"sep=;\r\na,x;b\r\n").0[0].1, ["a,x", "b"]);
        assert_eq!(rows(b""), (vec![], b','));
        assert!(["sep=\r\na", "sep=\"\na", "sep=.\na", "SEP=5"].iter().all(|t| Records::new(t.as_bytes()).unwrap().unusable_separator));
        assert_eq!(rows(b"sep=ab,x\n1,2\n").0[0].1, ["sep=ab", "x"]);
    }

    #[test]
    fn lines_that_end_in_a_carriage_return_are_counted() {
        let lines = |text: &[u8]| rows(text).0.iter().map(|(line, _)| *line).collect::<Vec<_>>();
        assert_eq!(lines(b"a,b\r1,2\r\r3,4\r"), [1, 2, 4]);
        assert_eq!(lines(b"a,b\r\n1,2\r\n\r\n3,4"), [1, 2, 4]);
    }

    #[test]
    fn a_quote_never_closed_does_not_fill_the_memory() {
        let mut text = b"a,b\n1,\"open\n".to_vec();
        text.resize(3 * LONGEST_ROW, b'x');
        let mut records = Records::new(&text[..]).unwrap();
        let mut record = Record::default();
        assert!(records.next(&mut record).unwrap() && !record.too_long);
        assert!(records.next(&mut record).unwrap() && record.too_long && record.line == 2);
        assert!(!records.next(&mut record).unwrap());
        assert!(record.bytes.capacity() <= 2 * LONGEST_ROW);
    }
}
