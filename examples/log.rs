//! A log in a loop: each entry read, worked and judged against what all of them say together.
//!
//! `cargo run --example log -- fixtures/logs/demo.csv`

use shadowpin::limits::Limits;
use shadowpin::logbook::entry::{Faults, ReadAs, read_entry};
use shadowpin::logbook::log::{LogReader, Record};
use shadowpin::review::{Desk, Learn, judge};
use std::fs::File;
use std::num::NonZeroUsize;

fn main() -> Result<(), Box<dyn std::error::Error>> {
    let path = std::env::args().nth(1).unwrap_or_else(|| "fixtures/logs/demo.csv".to_owned());
    let limits = Limits::default();
    let desk = Desk { limits: &limits, cards: None, card_as_given: false };
    let (mut record, mut faults) = (Record::default(), Faults::default());

    // First what the rows say together ...
    let mut learn = Learn::new(&limits);
    let mut log = LogReader::new(File::open(&path)?, &path, false)?;
    while let Some(row) = log.next(&mut record)? {
        let entry = read_entry(&row, ReadAs::default(), &mut faults);
        learn.feed(&desk.work(&entry, None).row(row.number));
        faults.clear();
    }
    let fleet = learn.finish(NonZeroUsize::MIN);

    // ... then each of them against that.
    let mut log = LogReader::new(File::open(&path)?, &path, false)?;
    while let Some(row) = log.next(&mut record)? {
        let entry = read_entry(&row, ReadAs::default(), &mut faults);
        let worked = desk.work(&entry, None);
        let verdict = judge(&worked.row(row.number), &fleet);
        if !verdict.queries.is_empty() {
            println!("row {}, {}: {}", row.number, entry.vessel, verdict.note().unwrap_or_default());
        }
        faults.iter().for_each(|fault| println!("row {}: {fault}", row.number));
        faults.clear();
    }
    Ok(())
}
