//! Where a command's answer goes.

use clap::{Args, ValueEnum};
use shadowpin::error::{Error, Result};
use std::io::{self, ErrorKind, Write};
use std::path::PathBuf;

/// Form of the answer.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub enum Format {
    /// For a person.
    Text,
    /// One object (for rows: one object a line).
    Json,
    /// Rows with a header.
    Csv,
}

/// The options that every command takes.
#[derive(Debug, Clone, Args)]
pub struct OutputArgs {
    /// Form of the answer
    #[arg(long, value_enum, default_value_t = Format::Text)]
    pub format: Format,
    /// Write the answer to this file instead of standard output
    #[arg(short, long, value_name = "FILE")]
    pub output: Option<PathBuf>,
    /// Say nothing on standard error but errors
    #[arg(short, long)]
    pub quiet: bool,
}

impl OutputArgs {
    /// Writes a whole answer, ended by one line end.
    pub fn write(&self, answer: &str) -> Result<()> {
        let end = if answer.ends_with('\n') { "" } else { "\n" };
        match &self.output {
            Some(path) => std::fs::write(path, format!("{answer}{end}")).map_err(|source| Error::File { path: path.clone(), source }),
            None => {
                let mut out = io::stdout().lock();
                write!(out, "{answer}{end}")
                    .and_then(|()| out.flush())
                    .map_err(|source| Error::Stream { what: "writing to standard output", source })
            }
        }
    }
}

/// Whether the reader at the other end of a pipe has gone, which is no fault of ours.
pub fn is_closed_pipe(error: &Error) -> bool {
    matches!(error, Error::Stream { source, .. } if source.kind() == ErrorKind::BrokenPipe)
}
