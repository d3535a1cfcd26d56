//! What the shell is told.

use std::process::ExitCode;

/// The outcome of a run, from best to worst: a worse one takes the place of a better one.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Exit {
    /// Nothing to report: 0.
    Clean,
    /// Something needs an explanation: 1.
    Queries,
    /// Some rows could not be used: 3.
    Problems,
    /// Could not run: 2.
    Error,
}

impl From<Exit> for ExitCode {
    fn from(exit: Exit) -> Self {
        ExitCode::from(match exit {
            Exit::Clean => 0,
            Exit::Queries => 1,
            Exit::Problems => 3,
            Exit::Error => 2,
        })
    }
}
