//! Work on several threads whose results come out in the order of the input.

use shadowpin::error::Result;
use std::num::NonZeroUsize;
use std::sync::{Condvar, Mutex, MutexGuard, PoisonError};

/// Threads that a long run is spread over: as many as the machine runs at once.
pub fn threads() -> NonZeroUsize {
    std::thread::available_parallelism().unwrap_or(NonZeroUsize::MIN)
}

/// Takes pieces from `source` until it answers false, works each, and hands the results to `sink` in the order of the pieces.
///
/// Each thread has one piece and one result, used again for the next, so that what is held does not grow with the input. A few more
/// threads than run at once: one that waits for its turn leaves its place to another.
pub fn in_order<I: Default, O: Default>(
    threads: NonZeroUsize,
    source: impl FnMut(&mut I) -> Result<bool> + Send,
    work: impl Fn(&I, &mut O) + Sync,
    sink: impl FnMut(&mut O) -> Result<()> + Send,
) -> Result<()> {
    let line = Line {
        source: Mutex::new(Source { next: source, pieces: 0, ended: false }),
        sink: Mutex::new(Sink { take: sink, turn: 0, outcome: Ok(()), closed: false }),
        turned: Condvar::new(),
    };
    let run = || {
        let _closes = Closes(&line);
        let (mut piece, mut result) = (I::default(), O::default());
        while let Some(number) = line.take(&mut piece) {
            work(&piece, &mut result);
            if !line.give(number, &mut result) {
                break;
            }
        }
    };
    if threads.get() == 1 {
        run();
    } else {
        std::thread::scope(|scope| {
            (0..threads.get() + 1).for_each(|_| drop(scope.spawn(run)));
        });
    }
    line.sink.into_inner().unwrap_or_else(PoisonError::into_inner).outcome
}

struct Source<F> {
    next: F,
    pieces: u64,
    ended: bool,
}

struct Sink<G> {
    take: G,
    /// Number of the piece whose result comes next.
    turn: u64,
    outcome: Result<()>,
    /// Nothing more is taken: a fault, or a thread that broke off.
    closed: bool,
}

struct Line<F, G> {
    source: Mutex<Source<F>>,
    sink: Mutex<Sink<G>>,
    turned: Condvar,
}

impl<F, G> Line<F, G> {
    fn sink(&self) -> MutexGuard<'_, Sink<G>> {
        self.sink.lock().unwrap_or_else(PoisonError::into_inner)
    }

    /// Waits until the results of all pieces before `number` are out; `None` where nothing more is taken.
    fn turn(&self, number: u64) -> Option<MutexGuard<'_, Sink<G>>> {
        let waiting = |sink: &mut Sink<G>| sink.turn != number && !sink.closed;
        let sink = self.turned.wait_while(self.sink(), waiting).unwrap_or_else(PoisonError::into_inner);
        (!sink.closed).then_some(sink)
    }

    fn close(&self, sink: &mut Sink<G>, outcome: Result<()>) {
        sink.closed = true;
        if sink.outcome.is_ok() {
            sink.outcome = outcome;
        }
        self.turned.notify_all();
    }
}

impl<F, G> Line<F, G> {
    /// The next piece and its number.
    fn take<I>(&self, piece: &mut I) -> Option<u64>
    where
        F: FnMut(&mut I) -> Result<bool>,
    {
        let mut source = self.source.lock().unwrap_or_else(PoisonError::into_inner);
        if source.ended {
            return None;
        }
        let number = source.pieces;
        match (source.next)(piece) {
            Ok(true) => {
                source.pieces += 1;
                Some(number)
            }
            Ok(false) => {
                source.ended = true;
                None
            }
            Err(error) => {
                source.ended = true;
                drop(source);
                // What was read before the fault comes out first.
                if let Some(mut sink) = self.turn(number) {
                    self.close(&mut sink, Err(error));
                }
                None
            }
        }
    }

    /// Hands out a result in its turn; false where nothing more is taken.
    fn give<O>(&self, number: u64, result: &mut O) -> bool
    where
        G: FnMut(&mut O) -> Result<()>,
    {
        let Some(mut sink) = self.turn(number) else { return false };
        if let Err(error) = (sink.take)(result) {
            self.close(&mut sink, Err(error));
            return false;
        }
        sink.turn += 1;
        self.turned.notify_all();
        true
    }
}

/// Wakes the others where a thread breaks off in its work.
struct Closes<'l, F, G>(&'l Line<F, G>);

impl<F, G> Drop for Closes<'_, F, G> {
    fn drop(&mut self) {
        if std::thread::panicking() {
            let mut sink = self.0.sink();
            self.0.close(&mut sink, Ok(()));
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use shadowpin::error::Error;

    fn run(threads: usize, last: u32, fail_source: Option<u32>, fail_sink: Option<u32>) -> (Result<()>, Vec<u32>) {
        let (mut next, mut out) = (0, Vec::new());
        let outcome = in_order(
            NonZeroUsize::new(threads).unwrap(),
            |piece: &mut u32| {
                *piece = next;
                next += 1;
                if fail_source == Some(*piece) { Err(Error::Usage("source".into())) } else { Ok(*piece < last) }
            },
            |piece, result: &mut u32| {
                // Pieces of uneven work: later ones are ready before earlier ones.
                if piece % 3 == 0 {
                    std::thread::yield_now();
                }
                *result = piece * 2;
            },
            |result| {
                if fail_sink == Some(*result) {
                    return Err(Error::Usage("sink".into()));
                }
                out.push(*result);
                Ok(())
            },
        );
        (outcome, out)
    }

    #[test]
    fn results_come_in_order() {
        for threads in [1, 2, 7] {
            let (outcome, out) = run(threads, 500, None, None);
            assert!(outcome.is_ok() && out == (0..500).map(|i| i * 2).collect::<Vec<_>>());
        }
    }

    #[test]
    fn all_before_a_fault_comes_out() {
        for threads in [1, 2, 7] {
            let (outcome, out) = run(threads, 500, Some(40), None);
            assert!(outcome.is_err() && out == (0..40).map(|i| i * 2).collect::<Vec<_>>());
            let (outcome, out) = run(threads, 500, None, Some(40));
            assert!(outcome.is_err() && out == (0..20).map(|i| i * 2).collect::<Vec<_>>());
        }
        assert!(run(2, 0, None, None).1.is_empty());
    }
}
