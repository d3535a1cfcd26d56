//! The two passes over a log.

use super::super::files::RowsOut;
use super::super::in_order::in_order;
use super::problems::Problems;
use super::row::{Judged, Judging, entry};
use shadowpin::error::Result;
use shadowpin::logbook::entry::{Faults, ReadAs};
use shadowpin::logbook::log::{Block, LogReader};
use shadowpin::report::log_rows::{LogRows, RowsAs};
use shadowpin::review::{CardWatch, Desk, Fleet, Learn, Tally};
use std::io::{Read, Write};
use std::num::NonZeroUsize;

/// How the passes are made.
#[derive(Debug, Clone, Copy)]
pub struct Passes<'a> {
    /// What every row is worked with.
    pub desk: Desk<'a>,
    /// How cells are understood.
    pub read_as: ReadAs,
    /// The form of the rows.
    pub form: RowsAs,
    /// Threads that the rows are spread over.
    pub threads: NonZeroUsize,
}

/// What is learned of one block.
#[derive(Default)]
struct Learned<'a>(Option<(Learn<'a>, CardWatch<'a>)>);

impl<'a> Passes<'a> {
    /// First pass: what each vessel's rows say together, and what they say of the cards.
    pub fn learn<R: Read + Send>(&self, mut log: LogReader<R>) -> Result<(Fleet, Vec<String>)> {
        let Desk { limits, cards, .. } = self.desk;
        let (mut learn, mut watch) = (Learn::new(limits), CardWatch::new(cards));
        let header = log.header.clone();
        in_order(
            self.threads,
            |block: &mut Block| log.fill(block),
            |block, learned: &mut Learned| {
                let (learn, watch) = learned.0.get_or_insert_with(|| (Learn::new(limits), CardWatch::new(cards)));
                let mut faults = Faults::default();
                for row in block.rows(&header) {
                    faults.clear();
                    if let Some(entry) = entry(&row, self.read_as, &mut faults) {
                        let worked = self.desk.work(&entry, None);
                        watch.feed(cards, &entry, &worked);
                        learn.feed(&worked.row(row.number));
                    }
                }
            },
            |learned| {
                if let Some((more, seen)) = learned.0.take() {
                    learn.join(more);
                    watch.join(seen);
                }
                Ok(())
            },
        )?;
        Ok((learn.finish(self.threads), watch.doubts(limits)))
    }

    /// Second pass: each row judged and written.
    pub fn judge<R: Read + Send>(&self, mut log: LogReader<R>, fleet: &Fleet, out: &mut RowsOut) -> Result<(Tally, Problems)> {
        let rows = LogRows::new(self.form, log.delimiter(), &log.titles, &log.header.replaced);
        let mut bytes = Vec::new();
        rows.push_header(&mut bytes, &log.titles, log.names_separator());
        out.write_all(&bytes).map_err(|e| out.failed(e))?;
        let header = log.header.clone();
        let with = Judging { desk: self.desk, read_as: self.read_as, fleet, rows: &rows };
        let (mut tally, mut problems) = (Tally::default(), Problems::default());
        in_order(
            self.threads,
            |block: &mut Block| log.fill(block),
            |block, judged: &mut Judged| block.rows(&header).for_each(|row| judged.push(&row, &with)),
            |judged| {
                out.write_all(&judged.bytes).map_err(|e| out.failed(e))?;
                judged.bytes.clear();
                tally.merge(std::mem::take(&mut judged.tally));
                problems.join(std::mem::take(&mut judged.problems));
                Ok(())
            },
        )?;
        Ok((tally, problems))
    }
}
