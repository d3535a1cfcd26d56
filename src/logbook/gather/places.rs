//! Where each row of several logs came from.

use crate::logbook::sheet::SheetText;

/// One log among several.
#[derive(Debug, Clone)]
pub struct Part {
    /// The file's name, as it was given.
    pub file: String,
    /// What it is.
    pub kind: PartKind,
}

/// What a part is.
#[derive(Debug, Clone)]
pub enum PartKind {
    /// Separated text.
    Text,
    /// A sheet of a workbook.
    Sheet {
        /// Its name.
        name: String,
        /// What was read of it.
        text: SheetText,
    },
}

impl Part {
    /// The line of the file, or the row of the sheet, from 1, of the data row `number`; `line` is that of the text it was read from.
    pub(super) fn line_of(&self, number: u64, line: u64) -> u64 {
        match &self.kind {
            PartKind::Text => line,
            PartKind::Sheet { text, .. } => text.row_of(number).map_or(line, u64::from),
        }
    }

    /// The origin of a row as a cell has it: `march.csv:17`, `log.xlsx:March!17`; never begun so that a spreadsheet takes it for a
    /// formula.
    pub(super) fn cell_of(&self, line: u64) -> String {
        let file = self.file.rsplit(['/', '\\']).next().unwrap_or(&self.file);
        let safe = if file.starts_with(['=', '+', '-', '@']) { "./" } else { "" };
        match &self.kind {
            PartKind::Text => format!("{safe}{file}:{line}"),
            PartKind::Sheet { name, .. } => format!("{safe}{file}:{name}!{line}"),
        }
    }
}

/// Where the rows of several logs came from, in runs of rows that follow each other.
#[derive(Debug, Clone, Default)]
pub struct Places {
    /// The logs.
    pub parts: Vec<Part>,
    runs: Vec<Run>,
    rows: u64,
}

#[derive(Debug, Clone, Copy)]
struct Run {
    first: u64,
    line: u64,
    part: u32,
}

impl Places {
    pub(super) fn add(&mut self, part: u32, line: u64) {
        self.rows += 1;
        let follows = self.runs.last().is_some_and(|run| run.part == part && run.line + (self.rows - run.first) == line);
        if !follows {
            self.runs.push(Run { first: self.rows, line, part });
        }
    }

    /// Which of the logs the data row `number`, from 1, came from; 0 where it is none of theirs.
    pub fn part_of(&self, number: u64) -> usize {
        let at = self.runs.partition_point(|run| run.first <= number).checked_sub(1);
        at.and_then(|at| self.runs.get(at)).map_or(0, |run| run.part as usize)
    }

    /// Where the data row `number`, from 1, came from: the log, and its line or row there.
    pub fn of(&self, number: u64) -> Option<(&Part, u64)> {
        let at = self.runs.partition_point(|run| run.first <= number).checked_sub(1)?;
        let run = self.runs.get(at)?;
        Some((self.parts.get(run.part as usize)?, run.line + (number - run.first)))
    }

    /// The same in words, as a message begins: `march.csv, line 17`; for a sheet the cells under those columns, `log.xlsx, sheet March,
    /// cell C17`, or its row.
    pub fn words(&self, number: u64, columns: &[&str]) -> Option<String> {
        let (part, line) = self.of(number)?;
        Some(match &part.kind {
            PartKind::Text => format!("{}, line {line}", part.file),
            PartKind::Sheet { name, text } => {
                let cells: Vec<String> = columns.iter().filter_map(|c| Some(format!("{}{line}", text.letters_of(c)?))).collect();
                let place = match cells.as_slice() {
                    [] => format!("row {line}"),
                    [one] => format!("cell {one}"),
                    several => format!("cells {}", several.join(", ")),
                };
                format!("{}, sheet {name}, {place}", part.file)
            }
        })
    }
}
