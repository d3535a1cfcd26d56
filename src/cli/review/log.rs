//! Which log is reviewed, and how it is to be understood: a file, a sheet, several of them, or standard input.

use super::super::files::{Input, is_standard_input};
use super::super::sheets;
use super::super::when_where::{DateOrderArg, date_order};
use clap::{Args, ValueEnum};
use shadowpin::angle::text::ErrorSign;
use shadowpin::error::{Error, Result};
use shadowpin::logbook::entry::ReadAs;
use shadowpin::logbook::gather::{Gather, Places};
use shadowpin::logbook::log::LogForm;
use shadowpin::logbook::names::ColumnNames;
use shadowpin::logbook::sheet::{Workbook, is_workbook, sheet_as_csv};
use std::fs::File;
use std::io::{Seek, SeekFrom};
use std::path::{Path, PathBuf};

/// Files of a folder that are taken for logs, by their ending.
const ENDINGS: [&str; 4] = ["csv", "tsv", "txt", "xlsx"];

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
enum SignArg {
    /// East, or a gyro that reads low, is +
    EastPlus,
    /// A gyro that reads high is +
    HighPlus,
}

/// The log.
#[derive(Debug, Args)]
pub struct LogArgs {
    /// The log: CSV or a workbook (.xlsx); - for standard input. Several, or a folder, are read as one log
    #[arg(value_name = "LOG", required = true)]
    logs: Vec<PathBuf>,
    /// The sheet of a workbook, instead of its first
    #[arg(long, value_name = "NAME", conflicts_with = "all_sheets")]
    sheet: Option<String>,
    /// All sheets of a workbook that hold a log, as one log
    #[arg(long)]
    all_sheets: bool,
    /// Column names other than ours: a TOML file with lines such as gyro_bearing = "Brg Gyro"
    #[arg(long, value_name = "FILE")]
    columns: Option<PathBuf>,
    /// The log has no header: its columns, as a header would name them. The output has none either
    #[arg(long, value_name = "NAMES", conflicts_with_all = ["sheet", "all_sheets"])]
    header: Option<String>,
    /// Order of dates written in figures, where they are not 2026-06-14
    #[arg(long, value_enum)]
    date_order: Option<DateOrderArg>,
    /// Figures are written with a decimal comma
    #[arg(long)]
    decimal_comma: bool,
    /// What a logged gyro error without a letter means
    #[arg(long, value_enum, default_value_t = SignArg::EastPlus)]
    logged_sign: SignArg,
    /// The log is an earlier output: replace the columns that were added
    #[arg(long)]
    again: bool,
}

/// A log that is ready to be read, twice.
pub struct OpenLog {
    /// Its bytes.
    pub input: Input,
    /// Its form.
    pub form: LogForm,
    /// Where its rows came from, where it was gathered from several or from a sheet.
    pub places: Option<Places>,
    /// What a person should know of how it was read.
    pub notes: Vec<String>,
}

impl LogArgs {
    /// How cells are to be understood.
    pub fn read_as(&self) -> ReadAs {
        let logged_sign = match self.logged_sign {
            SignArg::EastPlus => ErrorSign::EastPlus,
            SignArg::HighPlus => ErrorSign::HighPlus,
        };
        ReadAs { decimal_comma: self.decimal_comma, date_order: date_order(self.date_order), logged_sign }
    }

    /// Every file that is read.
    pub fn files(&self) -> Result<Vec<PathBuf>> {
        let mut all = Vec::new();
        for path in &self.logs {
            if path.is_dir() { all.extend(logs_in(path)?) } else { all.push(path.clone()) }
        }
        all.extend(self.columns.clone());
        Ok(all)
    }

    /// Opens the log; several, and sheets of workbooks, are gathered into one.
    pub fn open(&self) -> Result<OpenLog> {
        let names = sheets::names(self.columns.as_deref())?;
        let form = LogForm { again: self.again, names, header: self.header.clone() };
        if let [one] = self.logs.as_slice()
            && !one.is_dir()
        {
            let mut input = Input::open(one)?;
            if !is_workbook(&input.start()?) {
                if self.sheet.is_some() || self.all_sheets {
                    return Err(Error::Usage(format!("{} is no workbook: --sheet and --all-sheets are for .xlsx", input.name)));
                }
                return Ok(OpenLog { input, form, places: None, notes: Vec::new() });
            }
            return self.gather(vec![input], form);
        }
        if self.logs.iter().filter(|path| is_standard_input(path)).count() > 1 {
            return Err(Error::Usage("standard input (-) is given twice".into()));
        }
        let mut inputs = Vec::new();
        for path in &self.logs {
            let files = if path.is_dir() { logs_in(path)? } else { vec![path.clone()] };
            for file in files {
                inputs.push(Input::open(&file)?);
            }
        }
        self.gather(inputs, form)
    }

    fn gather(&self, inputs: Vec<Input>, form: LogForm) -> Result<OpenLog> {
        let mut gather = Gather::new(form.clone(), self.read_as(), temporary()?);
        let mut notes = Vec::new();
        let (mut logs, mut name) = (0, String::new());
        for mut input in inputs {
            let file = input.name.clone();
            if is_workbook(&input.start()?) {
                logs += self.sheets(&mut gather, &mut input, &form.names, &mut notes)?;
            } else {
                gather.add_file(&file, input.rewound()?)?;
                logs += 1;
            }
            name = file;
        }
        let mut whole = temporary()?;
        let places = gather.finish(&mut whole)?;
        if logs > 1 {
            name = format!("{logs} logs");
        }
        // The names of the columns were checked; the header is the gathered one.
        let form = LogForm { header: None, ..form };
        Ok(OpenLog { input: Input::temporary(whole, name), form, places: Some(places), notes })
    }

    /// Gathers the sheets of a workbook that were asked for; answers how many.
    fn sheets(&self, gather: &mut Gather<File>, input: &mut Input, names: &ColumnNames, notes: &mut Vec<String>) -> Result<usize> {
        let file = input.name.clone();
        let mut workbook = Workbook::open(input.file()?, &file)?;
        let wanted = sheets::wanted(&workbook, &file, self.sheet.as_deref(), self.all_sheets)?;
        let count = workbook.sheets().len();
        if let ([first], true) = (wanted.as_slice(), self.sheet.is_none() && count > 1) {
            notes.push(format!("{file}: {first}, the first of {count} sheets, is read; --sheet NAME reads another, --all-sheets all"));
        }
        let (mut read, mut refused) = (0, None);
        for sheet in wanted {
            let mut csv = temporary()?;
            let said = match sheet_as_csv(&mut workbook, &sheet, names, None, &mut csv) {
                Ok(said) => said,
                // A sheet of notes among the months.
                Err(error @ Error::Content { .. }) if self.all_sheets => {
                    notes.push(format!("passed over: {error}"));
                    refused.get_or_insert(error);
                    continue;
                }
                Err(error) => return Err(error),
            };
            notes.extend(said.passed_over().map(|what| format!("{file}, sheet {sheet}: {what}")));
            csv.seek(SeekFrom::Start(0)).map_err(spooling)?;
            gather.add_sheet(&file, &sheet, said, &mut csv)?;
            read += 1;
        }
        match refused {
            Some(error) if read == 0 => Err(error),
            _ => Ok(read),
        }
    }
}

fn temporary() -> Result<File> {
    tempfile::tempfile().map_err(spooling)
}

fn spooling(source: std::io::Error) -> Error {
    Error::Stream { what: "making a temporary file", source }
}

/// The logs of a folder, by name.
fn logs_in(folder: &Path) -> Result<Vec<PathBuf>> {
    let failed = |source| Error::File { path: folder.to_owned(), source };
    let mut found = Vec::new();
    for entry in std::fs::read_dir(folder).map_err(failed)? {
        let path = entry.map_err(failed)?.path();
        // Names that begin so are locks of spreadsheets and hidden files.
        let name = path.file_name().map_or_else(String::new, |n| n.to_string_lossy().into_owned());
        let ending = path.extension().map_or_else(String::new, |e| e.to_string_lossy().to_ascii_lowercase());
        if path.is_file() && ENDINGS.contains(&ending.as_str()) && !name.starts_with(['.', '~']) {
            found.push(path);
        }
    }
    found.sort();
    if found.is_empty() {
        let endings = ENDINGS.map(|e| format!(".{e}")).join(", ");
        return Err(Error::Usage(format!("{} holds no log: none of its files ends in {endings}", folder.display())));
    }
    Ok(found)
}
