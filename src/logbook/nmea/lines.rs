//! Sentences cut out of a stream of bytes.

/// The longest sentence that is looked at, bytes: the standard has 82, and some instruments send a little more.
pub const LONGEST_SENTENCE: usize = 200;

/// What the stream held besides whole sentences.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub struct LineCounts {
    /// Sentences that ended.
    pub sentences: u64,
    /// Sentences that another one began in, or that the stream ended in.
    pub cut_off: u64,
    /// Sentences that did not end within [`LONGEST_SENTENCE`] bytes.
    pub too_long: u64,
    /// Lines with something in them but no sentence.
    pub without_sentence: u64,
}

/// The cutter: fed with bytes as they come, it gives each sentence from its `$` to its checksum, or to the end of its line.
///
/// A sentence may stand behind anything: the time that a recorder wrote before it, or a tag block (`\...\`). It remembers
/// nothing but the sentence begun, so a stream without a line end takes no memory, and the edges of chunks change nothing.
#[derive(Debug)]
pub(super) struct Lines {
    begun: Vec<u8>,
    state: State,
    pub counts: LineCounts,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum State {
    /// Before any sentence of this line; whether anything stands there.
    Before { anything: bool },
    /// In a sentence.
    In,
    /// Behind a sentence or in one that is too long, up to the line's end.
    Behind,
}

impl Lines {
    pub fn new() -> Self {
        Self { begun: Vec::with_capacity(LONGEST_SENTENCE), state: State::Before { anything: false }, counts: LineCounts::default() }
    }

    /// Takes `bytes` and calls `sentence` for each one that ends in them.
    pub fn push(&mut self, bytes: &[u8], mut sentence: impl FnMut(&[u8])) {
        for &byte in bytes {
            match (byte, self.state) {
                // Neither mark may stand within a sentence; `!` begins those of other kinds.
                (b'$' | b'!', state) => {
                    self.counts.cut_off += u64::from(state == State::In);
                    self.begun.clear();
                    self.begun.push(byte);
                    self.state = State::In;
                }
                (b'\r' | b'\n', State::In) => self.ended(&mut sentence, State::Before { anything: false }),
                (b'\r' | b'\n', State::Before { anything }) => {
                    self.counts.without_sentence += u64::from(anything);
                    self.state = State::Before { anything: false };
                }
                (b'\r' | b'\n', State::Behind) => self.state = State::Before { anything: false },
                (_, State::In) if self.begun.len() >= LONGEST_SENTENCE => {
                    self.counts.too_long += 1;
                    self.state = State::Behind;
                }
                (_, State::In) => {
                    self.begun.push(byte);
                    // Star and two figures end it: no need to wait for a line end that a datagram may lack.
                    if self.begun.len() >= 3 && self.begun.get(self.begun.len() - 3) == Some(&b'*') {
                        self.ended(&mut sentence, State::Behind);
                    }
                }
                (_, State::Before { anything }) => self.state = State::Before { anything: anything || !byte.is_ascii_whitespace() },
                (_, State::Behind) => {}
            }
        }
    }

    fn ended(&mut self, sentence: &mut impl FnMut(&[u8]), state: State) {
        self.counts.sentences += 1;
        self.state = state;
        sentence(&self.begun);
    }

    /// Counts of a stream that ends here: what was begun is cut off.
    pub fn counts_at_end(&self) -> LineCounts {
        let mut counts = self.counts;
        counts.cut_off += u64::from(self.state == State::In);
        counts.without_sentence += u64::from(self.state == State::Before { anything: true });
        counts
    }

    #[cfg(test)]
    pub fn capacity(&self) -> usize {
        self.begun.capacity()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    fn cut(chunks: &[&[u8]]) -> (Vec<String>, LineCounts) {
        let (mut lines, mut found) = (Lines::new(), Vec::new());
        chunks.iter().for_each(|chunk| lines.push(chunk, |s| found.push(String::from_utf8_lossy(s).into_owned())));
        assert_eq!(lines.capacity(), LONGEST_SENTENCE);
        (found, lines.counts_at_end())
    }

    #[test]
    fn sentences_behind_anything() {
        let (found, counts) = cut(&[b"\\s:GP0001,n:12*36\\$A*00\r\n10:15:00 $B*11\n\n  \nnoise\n$half$C*22$D\r!E*33\n$F"]);
        assert_eq!(found, ["$A*00", "$B*11", "$C*22", "$D", "!E*33"]);
        assert_eq!(counts, LineCounts { sentences: 5, cut_off: 2, too_long: 0, without_sentence: 1 });
    }

    #[test]
    fn ten_megabytes_without_a_line_end() {
        let mut lines = Lines::new();
        let mut found = 0;
        for begin in [b"x", b"$"] {
            lines.push(begin, |_| found += 1);
            let chunk = vec![b'x'; 1 << 16];
            (0..160).for_each(|_| lines.push(&chunk, |_| found += 1));
            assert_eq!(lines.capacity(), LONGEST_SENTENCE);
        }
        assert_eq!((found, lines.counts.too_long), (0, 1));
        // And the next sentence is found all the same.
        lines.push(b"$G*00", |s| found += s.len());
        assert_eq!(found, 5);
    }

    proptest! {
        #[test]
        fn chunk_edges_change_nothing(bytes in "[$!*\\\\A-Z0-9,\r\n]{0,300}", edges in proptest::collection::vec(0_usize..300, 0..6)) {
            let bytes = bytes.as_bytes();
            let mut edges: Vec<usize> = edges.into_iter().map(|e| e.min(bytes.len())).collect();
            edges.extend([0, bytes.len()]);
            edges.sort_unstable();
            let chunks: Vec<&[u8]> = edges.windows(2).map(|w| &bytes[w[0]..w[1]]).collect();
            prop_assert_eq!(cut(&chunks), cut(&[bytes]));
        }
    }
}
