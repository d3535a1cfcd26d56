//! Files in, read as often as needed; files out, written whole.

use shadowpin::error::{Error, Result};
use std::fs::File;
use std::io::{self, BufWriter, Read, Seek, Write};
use std::path::{Path, PathBuf};

/// The name under which standard input stands on a command line and in messages.
pub const STANDARD_INPUT: &str = "-";

/// Whether standard input is meant.
pub fn is_standard_input(path: &Path) -> bool {
    path.as_os_str() == STANDARD_INPUT
}

/// A log that can be read from its start more than once.
#[derive(Debug)]
pub struct Input {
    file: File,
    /// What messages call it.
    pub name: String,
    path: Option<PathBuf>,
}

impl Input {
    /// Opens a file, or copies standard input (`-`) to a private file that has no name and is gone when the program ends.
    pub fn open(path: &Path) -> Result<Self> {
        if is_standard_input(path) {
            let spool = || -> io::Result<File> {
                let mut file = tempfile::tempfile()?;
                io::copy(&mut io::stdin().lock(), &mut file)?;
                Ok(file)
            };
            let file = spool().map_err(|source| Error::Stream { what: "copying standard input", source })?;
            return Ok(Self { file, name: "standard input".into(), path: None });
        }
        let failed = |source| Error::File { path: path.to_owned(), source };
        let file = File::open(path).map_err(failed)?;
        if file.metadata().map_err(failed)?.is_dir() {
            return Err(failed(io::Error::new(io::ErrorKind::IsADirectory, "is a folder, not a log")));
        }
        Ok(Self { file, name: path.display().to_string(), path: Some(path.to_owned()) })
    }

    /// What was gathered in a temporary file; `name` is what messages call it.
    pub fn temporary(file: File, name: String) -> Self {
        Self { file, name, path: None }
    }

    /// Bytes of the content, where it is a file.
    pub fn size(&self) -> Option<u64> {
        self.file.metadata().ok().filter(std::fs::Metadata::is_file).map(|m| m.len())
    }

    /// The first bytes of the content.
    pub fn start(&mut self) -> Result<Vec<u8>> {
        let (mut start, name) = (Vec::new(), self.name.clone());
        let read = self.rewound()?.take(8).read_to_end(&mut start);
        read.map(|_| start).map_err(|source| Error::File { path: self.path.clone().unwrap_or_else(|| name.into()), source })
    }

    /// The file itself, at its start.
    pub fn file(&mut self) -> Result<&mut File> {
        self.rewound()?;
        Ok(&mut self.file)
    }

    /// The content from its start.
    pub fn rewound(&mut self) -> Result<&mut (impl Read + use<>)> {
        self.file.rewind().map_err(|source| Error::File { path: self.path.clone().unwrap_or_else(|| self.name.clone().into()), source })?;
        Ok(&mut self.file)
    }
}

/// Refuses outputs that are one of the inputs, or each other, whatever they are called.
pub fn never_over_inputs<'i, 'o>(
    inputs: impl IntoIterator<Item = Option<&'i PathBuf>>,
    outputs: impl IntoIterator<Item = &'o Option<PathBuf>>,
) -> Result<()> {
    let same = |a: &Path, b: &Path| a == b || same_file::is_same_file(a, b).unwrap_or(false);
    let inputs: Vec<&Path> = inputs.into_iter().flatten().map(PathBuf::as_path).collect();
    let mut before: Vec<&Path> = Vec::new();
    for output in outputs.into_iter().flatten() {
        let what = if inputs.iter().any(|input| same(input, output)) {
            "the input itself: give another name, a log is never overwritten, nor anything else that is read"
        } else if before.iter().any(|other| same(other, output)) {
            "asked for twice: give two names"
        } else {
            before.push(output);
            continue;
        };
        return Err(Error::Usage(format!("{} is {what}", output.display())));
    }
    Ok(())
}

/// Where rows go: standard output, or a file that appears whole when the run ends.
pub enum RowsOut {
    /// Standard output.
    Standard(BufWriter<io::Stdout>),
    /// A new file beside the target, renamed over it at the end.
    Whole(BufWriter<tempfile::NamedTempFile>, PathBuf),
    /// A device or pipe, written as it comes.
    Stream(BufWriter<File>, PathBuf),
}

impl RowsOut {
    /// Opens the output.
    pub fn open(output: Option<&Path>) -> Result<Self> {
        const BUFFER: usize = 1 << 16;
        let Some(path) = output else { return Ok(Self::Standard(BufWriter::with_capacity(BUFFER, io::stdout()))) };
        let failed = |source| Error::File { path: path.to_owned(), source };
        if path.metadata().is_ok_and(|m| !m.is_file()) {
            return Ok(Self::Stream(BufWriter::with_capacity(BUFFER, File::create(path).map_err(failed)?), path.to_owned()));
        }
        let folder = path.parent().filter(|p| !p.as_os_str().is_empty()).unwrap_or(Path::new("."));
        // Asked first, so that the message names what the user wrote and not our file beside it.
        folder.metadata().map_err(failed)?;
        let file = tempfile::Builder::new().prefix(".rows-").tempfile_in(folder).map_err(failed)?;
        Ok(Self::Whole(BufWriter::with_capacity(BUFFER, file), path.to_owned()))
    }

    /// Writes out what is left of a run that was broken off, and answers where its rows stand: a file of that name is not touched.
    pub fn leave(self) -> Result<String> {
        match self {
            Self::Whole(out, path) => {
                let mut beside = path.into_os_string();
                beside.push(".partial");
                let beside = PathBuf::from(beside);
                let name = beside.display().to_string();
                Self::Whole(out, beside).finish().map(|()| name)
            }
            Self::Stream(out, path) => {
                let name = path.display().to_string();
                Self::Stream(out, path).finish().map(|()| name)
            }
            Self::Standard(out) => Self::Standard(out).finish().map(|()| "the output".to_owned()),
        }
    }

    /// Writes out what is left and puts the file in its place.
    pub fn finish(self) -> Result<()> {
        match self {
            Self::Standard(mut out) => out.flush().map_err(|source| Error::Stream { what: "writing to standard output", source }),
            Self::Stream(mut out, path) => out.flush().map_err(|source| Error::File { path, source }),
            Self::Whole(out, path) => {
                let failed = |source| Error::File { path: path.clone(), source };
                let file = out.into_inner().map_err(|e| failed(e.into_error()))?;
                set_usual_mode(file.as_file()).map_err(failed)?;
                file.persist(&path).map_err(|e| failed(e.error))?;
                Ok(())
            }
        }
    }

    /// Writes a whole text and puts the file in its place.
    pub fn whole(mut self, text: &str) -> Result<()> {
        self.write_all(text.as_bytes()).map_err(|e| self.failed(e))?;
        self.finish()
    }

    /// The error of a write, with the place it was going to.
    pub fn failed(&self, source: io::Error) -> Error {
        match self {
            Self::Standard(_) => Error::Stream { what: "writing to standard output", source },
            Self::Whole(_, path) | Self::Stream(_, path) => Error::File { path: path.clone(), source },
        }
    }
}

impl Write for RowsOut {
    fn write(&mut self, bytes: &[u8]) -> io::Result<usize> {
        match self {
            Self::Standard(out) => out.write(bytes),
            Self::Whole(out, _) => out.write(bytes),
            Self::Stream(out, _) => out.write(bytes),
        }
    }

    fn flush(&mut self) -> io::Result<()> {
        match self {
            Self::Standard(out) => out.flush(),
            Self::Whole(out, _) => out.flush(),
            Self::Stream(out, _) => out.flush(),
        }
    }
}

/// A temporary file is private to its owner; a result is as readable as any other new file.
#[cfg(unix)]
fn set_usual_mode(file: &File) -> io::Result<()> {
    use std::os::unix::fs::PermissionsExt;
    file.set_permissions(std::fs::Permissions::from_mode(0o644))
}

#[cfg(not(unix))]
fn set_usual_mode(_: &File) -> io::Result<()> {
    Ok(())
}
