//! Row in, row out: whatever bytes a log holds, its cells stand unchanged in the output, in their order.

use proptest::prelude::*;
use shadowpin::logbook::columns::ADDED;
use shadowpin::logbook::log::{LogReader, Record};
use shadowpin::report::log_rows::{LogRows, RowsAs};
use shadowpin::report::rows::RowFigures;

/// Figures with each of the marks that need quotes.
const FIGURES: RowFigures = RowFigures {
    worked: None,
    card_deviation_deg: Some(-0.5),
    queries: "a;b",
    slip: "c,d",
    notices: "e\tf|g^h~i",
    note: "\"one\"\r\ntwo",
    problem: "=three",
};

/// Every row's cells, and the log written anew.
fn read_and_write(log: &[u8], form: RowsAs) -> (usize, Vec<Vec<Vec<u8>>>, Vec<u8>) {
    let mut log = LogReader::new(log, "made", true).unwrap();
    let rows = LogRows::new(form, log.delimiter(), &log.titles, &log.header.replaced);
    let (mut out, mut cells, mut record) = (Vec::new(), Vec::new(), Record::default());
    rows.push_header(&mut out, &log.titles, log.names_separator());
    let width = log.titles.width();
    while let Some(row) = log.next(&mut record).unwrap() {
        cells.push(row.record.cells().map(<[u8]>::to_vec).collect());
        rows.push(&mut out, row.record, &FIGURES);
    }
    (width, cells, out)
}

/// Bytes that mean something to a reader of rows, bytes that are no UTF-8, and a few others.
fn bytes() -> impl Strategy<Value = Vec<u8>> {
    let byte = prop::sample::select(b"\",;\t|\n\r \0\xB0\xBD\xFF\xEF\xBB=+-@sepNaN19.".to_vec());
    prop::collection::vec(byte, 0..120)
}

/// A header that can be used, with two titles of its own, under each way of parting cells.
fn log() -> impl Strategy<Value = Vec<u8>> {
    let parted = prop::sample::select(vec![("", ','), ("", ';'), ("", '\t'), ("sep=;\r\n", ';'), ("sep=|\n", '|'), ("\u{feff}", ',')]);
    (parted, "[ab ]{0,2}", "[ab ]{0,2}", bytes()).prop_map(|((start, d), one, two, rest)| {
        let mut log = format!("{start}utc{d}{one}{d}lat{d}lon{d}body{d}{two}\n").into_bytes();
        log.extend(rest);
        log
    })
}

proptest! {
    #[test]
    fn csv(log in log()) {
        let (width, before, written) = read_and_write(&log, RowsAs::Csv);
        let (width_after, after, again) = read_and_write(&written, RowsAs::Csv);
        prop_assert_eq!(width_after, width + ADDED.len());
        prop_assert_eq!(before.len(), after.len());
        for (before, after) in before.iter().zip(&after) {
            for at in 0..width.max(before.len()) {
                // Cells beyond the header's stand behind ours.
                let now = if at < width { at } else { at + ADDED.len() };
                prop_assert_eq!(before.get(at).map_or(&b""[..], Vec::as_slice), &after[now][..]);
            }
        }
        // Written once more with our columns replaced, nothing moves.
        if before.iter().all(|row| row.len() <= width) {
            prop_assert_eq!(again, written);
        }
    }

    #[test]
    fn json_lines(log in log()) {
        let (width, before, written) = read_and_write(&log, RowsAs::JsonLines);
        let lines: Vec<&[u8]> = written.split(|b| *b == b'\n').filter(|l| !l.is_empty()).collect();
        prop_assert_eq!(lines.len(), before.len());
        for (line, row) in lines.iter().zip(&before) {
            let object: serde_json::Map<String, serde_json::Value> = serde_json::from_slice(line).unwrap();
            // A member less than there are cells is a name that stands twice.
            prop_assert_eq!(object.len(), width.max(row.len()) + ADDED.len());
        }
    }
}
