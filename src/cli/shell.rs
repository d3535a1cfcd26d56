//! `shadowpin completions` and `shadowpin man`: what a shell and its manual want to know, made from the commands themselves.

use super::exit::Exit;
use clap::{Args as ClapArgs, Command};
use shadowpin::error::{Error, Result};
use std::io::{self, Write};
use std::path::PathBuf;

/// Completions of the command line for a shell.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Example:\n  shadowpin completions bash > ~/.local/share/bash-completion/completions/shadowpin")]
pub struct CompletionArgs {
    /// The shell
    shell: clap_complete::Shell,
}

/// Writes the completions.
pub fn completions(args: &CompletionArgs, mut command: Command) -> Result<Exit> {
    let mut script = Vec::new();
    clap_complete::generate(args.shell, &mut command, "shadowpin", &mut script);
    io::stdout().lock().write_all(&script).map_err(|source| Error::Stream { what: "writing to standard output", source })?;
    Ok(Exit::Clean)
}

/// Pages for the manual, one for each command, into a folder.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Example:\n  shadowpin man ~/.local/share/man/man1")]
pub struct ManArgs {
    /// The folder, which must exist
    folder: PathBuf,
}

/// Writes the pages.
pub fn man(args: &ManArgs, command: Command) -> Result<Exit> {
    let pages = command.disable_help_subcommand(true);
    clap_mangen::generate_to(pages, &args.folder).map_err(|source| Error::File { path: args.folder.clone(), source })?;
    Ok(Exit::Clean)
}
