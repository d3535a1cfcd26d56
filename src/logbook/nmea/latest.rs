//! The last word of each talker about one thing, and which of them to take.

use super::sentence::{SentenceName, Talker};
use std::collections::BTreeMap;

/// A figure that the stream said last, with where it comes from.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Found<T> {
    /// The figure.
    pub value: T,
    /// The sentence.
    pub from: SentenceName,
    /// How old it is, seconds; `None` where no time was said in a recording.
    pub age_s: Option<f64>,
    /// Whether that is too old.
    pub stale: bool,
    /// A word about it; may be empty.
    pub about: &'static str,
}

/// A figure as it was said.
#[derive(Debug, Clone, Copy)]
pub(super) struct Word<T> {
    pub value: T,
    pub from: SentenceName,
    /// When, on the scale that ages are counted on, milliseconds.
    pub at: Instants,
    /// Its place among all words.
    pub count: u64,
    pub about: &'static str,
}

/// When a word was said.
#[derive(Debug, Clone, Copy, Default)]
pub(super) struct Instants {
    /// On the stream's own clock, milliseconds since its first word.
    pub stream_ms: i64,
    /// On the clock of the one who listens, milliseconds.
    pub arrived_ms: i64,
}

/// The last word of each talker.
#[derive(Debug)]
pub(super) struct Latest<T>(BTreeMap<Talker, Word<T>>);

impl<T> Default for Latest<T> {
    fn default() -> Self {
        Self(BTreeMap::new())
    }
}

impl<T: Copy> Latest<T> {
    pub fn put(&mut self, word: Word<T>) {
        self.0.insert(word.from.talker, word);
    }

    /// The fresh words, best talker first, the newest first of two alike; then the stale ones, the newest first.
    pub fn in_order(&self, rank: impl Fn(Talker) -> u8, limit_s: f64, age_s: impl Fn(Instants) -> Option<f64>) -> Vec<Found<T>> {
        let mut words: Vec<(Found<T>, u64)> = self
            .0
            .values()
            .map(|w| {
                let age_s = age_s(w.at);
                (Found { value: w.value, from: w.from, age_s, stale: age_s.is_some_and(|age| age > limit_s), about: w.about }, w.count)
            })
            .collect();
        let rank = |found: &Found<T>| if found.stale { 0 } else { rank(found.from.talker) };
        words.sort_by(|(a, a_count), (b, b_count)| a.stale.cmp(&b.stale).then(rank(a).cmp(&rank(b))).then(b_count.cmp(a_count)));
        words.into_iter().map(|(found, _)| found).collect()
    }
}
