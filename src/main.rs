//! The command line of shadowpin: flags to meaning, meaning to the library, its answer to a writer.
#![forbid(unsafe_code)]

mod cli;
mod page;

fn main() -> std::process::ExitCode {
    cli::main()
}
