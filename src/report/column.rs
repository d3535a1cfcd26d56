//! One column of figures under each other, each with its name before it and a word behind it.

use std::fmt::Write as _;

/// Width of the names.
const NAME: usize = 30;
/// Width of the figures.
const FIGURE: usize = 12;

/// Text written downwards.
#[derive(Debug, Default)]
pub struct Column {
    text: String,
}

impl Column {
    /// A figure with its name and, where there is one, a word about it.
    pub fn line(&mut self, name: &str, figure: &str, about: &str) {
        // Padding by characters, for the degree sign is two bytes.
        let line = format!("{name:<NAME$}{figure:>FIGURE$}   {about}");
        let _ = writeln!(self.text, "{}", line.trim_end());
    }

    /// A line of its own.
    pub fn sentence(&mut self, sentence: &str) {
        let _ = writeln!(self.text, "{}", sentence.trim_end());
    }

    /// An empty line, never two together and never the first.
    pub fn gap(&mut self) {
        if !self.text.is_empty() && !self.text.ends_with("\n\n") {
            self.text.push('\n');
        }
    }

    /// The whole, ended by one line end.
    pub fn finish(mut self) -> String {
        while self.text.ends_with('\n') {
            self.text.pop();
        }
        self.text.push('\n');
        self.text
    }
}
