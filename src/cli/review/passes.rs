//! The two passes over a log.

use super::super::files::RowsOut;
use super::super::in_order::in_order;
use super::super::interrupt;
use super::super::progress::Progress;
use super::problems::{Place, Problems};
use super::row::{Judged, Judging, entry};
use shadowpin::error::Result;
use shadowpin::logbook::entry::{Faults, ReadAs};
use shadowpin::logbook::log::{Block, LogReader, Passed};
use shadowpin::report::log_rows::{LogRows, RowsAs};
use shadowpin::review::{CardWatch, Desk, Findings, Fleet, Learn, Tally};
use std::io::{Read, Write};
use std::num::NonZeroUsize;

/// How the passes are made.
#[derive(Debug, Clone, Copy)]
pub struct Passes<'a> {
    /// What every row is worked with.
    pub desk: Desk<'a>,
    /// How cells are understood.
    pub read_as: ReadAs,
    /// Rows of a book that are no observations, or no longer.
    pub passed: &'a Passed,
    /// The form of the rows.
    pub rows_as: RowsAs,
    /// The rows stand under a header.
    pub titled: bool,
    /// How messages say where a row stands.
    pub place: Place<'a>,
    /// Threads that the rows are spread over.
    pub threads: NonZeroUsize,
    /// Bytes of the log, where they are known.
    pub size: Option<u64>,
    /// Nothing is shown of how far the passes are.
    pub quiet: bool,
}

/// What is learned of one block.
#[derive(Default)]
struct Learned<'a> {
    of_rows: Option<(Learn<'a>, CardWatch<'a>)>,
    done: Done,
}

/// How much of the log a block is.
#[derive(Debug, Default, Clone, Copy)]
struct Done {
    rows: u64,
    bytes: u64,
}

impl Done {
    fn of(block: &Block) -> Self {
        Self { rows: block.count() as u64, bytes: block.bytes() as u64 }
    }
}

impl<'a> Passes<'a> {
    /// First pass: what each vessel's rows say together, and what they say of the cards.
    pub fn learn<R: Read + Send>(&self, mut log: LogReader<R>) -> Result<(Fleet, Vec<String>)> {
        let Desk { limits, cards, .. } = self.desk;
        let (mut learn, mut watch) = (Learn::new(limits), CardWatch::new(cards));
        let header = log.header.clone();
        let mut progress = Progress::new("reading", self.size, self.quiet);
        in_order(
            self.threads,
            |block: &mut Block| if interrupt::asked() { Ok(false) } else { log.fill(block) },
            |block, learned: &mut Learned| {
                learned.done = Done::of(block);
                let (learn, watch) = learned.of_rows.get_or_insert_with(|| (Learn::new(limits), CardWatch::new(cards)));
                let mut faults = Faults::default();
                for row in block.rows(&header) {
                    faults.clear();
                    if let Some(entry) = entry(&row, self.read_as, self.passed, &mut faults) {
                        let worked = self.desk.work(&entry, None);
                        watch.feed(cards, &entry, &worked);
                        learn.feed(&worked.row(row.number));
                        if self.passed.is_late(&row) {
                            learn.late(row.number);
                        }
                    }
                }
            },
            |learned| {
                progress.add(learned.done.rows, learned.done.bytes);
                if let Some((more, seen)) = learned.of_rows.take() {
                    learn.join(more);
                    watch.join(seen);
                }
                Ok(())
            },
        )?;
        Ok((learn.finish(self.threads), watch.doubts(limits)))
    }

    /// Second pass: each row judged and written, and given to `findings` where a report is asked for.
    pub fn judge<R: Read + Send>(
        &self,
        mut log: LogReader<R>,
        fleet: &Fleet,
        out: &mut RowsOut,
        mut findings: Option<&mut Findings>,
    ) -> Result<(Tally, Problems)> {
        let rows = LogRows::new(self.rows_as, log.delimiter(), &log.titles, &log.header.replaced);
        let mut bytes = Vec::new();
        if self.titled {
            rows.push_header(&mut bytes, &log.titles, log.names_separator());
        }
        out.write_all(&bytes).map_err(|e| out.failed(e))?;
        let header = log.header.clone();
        let with = Judging {
            desk: self.desk,
            read_as: self.read_as,
            passed: self.passed,
            fleet,
            rows: &rows,
            place: self.place,
            report: findings.is_some(),
        };
        let mut progress = Progress::new("judging", self.size, self.quiet);
        let (mut tally, mut problems) = (Tally::default(), Problems::default());
        in_order(
            self.threads,
            |block: &mut Block| if interrupt::asked() { Ok(false) } else { log.fill(block) },
            |block, (judged, done): &mut (Judged, Done)| {
                *done = Done::of(block);
                block.rows(&header).for_each(|row| judged.push(&row, &with));
            },
            |(judged, done)| {
                progress.add(done.rows, done.bytes);
                out.write_all(&judged.bytes).map_err(|e| out.failed(e))?;
                judged.bytes.clear();
                if let Some(findings) = &mut findings {
                    judged.glimpses.feed(findings);
                }
                tally.merge(std::mem::take(&mut judged.tally));
                problems.join(std::mem::take(&mut judged.problems));
                Ok(())
            },
        )?;
        Ok((tally, problems))
    }
}
