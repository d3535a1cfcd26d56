//! A last line that was cut short: by a power failure, a full disk, a killed program.

/// The bytes of a last line that is not a whole entry.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Torn {
    /// Where it begins in the file.
    pub start: usize,
    /// How long it is, bytes.
    pub length: usize,
}

/// The last line of a file, and whether its line end is there.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct LastLine {
    pub start: usize,
    pub ended: bool,
    /// Whether it holds bytes 0: a disk that lost power may have kept the file's length and not its content.
    pub zeros: bool,
}

/// The last line that has anything in it; a line end within quotes ends none.
pub(super) fn last_line(bytes: &[u8]) -> LastLine {
    let (mut start, mut next) = (0, 0);
    let mut quoted = false;
    for (at, byte) in bytes.iter().enumerate() {
        match byte {
            b'"' => quoted = !quoted,
            b'\n' | b'\r' if !quoted => {
                // Empty lines are none.
                if next < at {
                    start = next;
                }
                next = at + 1;
            }
            _ => {}
        }
    }
    let ended = next == bytes.len();
    let start = if ended { start } else { next };
    LastLine { start, ended, zeros: bytes.get(start..).is_some_and(|line| line.contains(&0)) }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_last_line_and_its_end() {
        let found = |text: &str| {
            let last = last_line(text.as_bytes());
            (last.start, last.ended)
        };
        assert_eq!(found(""), (0, true));
        assert_eq!(found("a,b\n"), (0, true));
        assert_eq!(found("a,b\n1,2"), (4, false));
        assert_eq!(found("a,b\r\n1,2\r\n"), (5, true));
        assert_eq!(found("a\n\"x\ny\"\n"), (2, true));
        assert_eq!(found("a\n\"x\ny"), (2, false));
        assert!(last_line(b"a\n1\0\0\n").zeros && !last_line(b"a\0\n1\n").zeros);
    }
}
