//! Question by question, for what an entry lacks: each answer is read at once, as it will be read in the log.

use super::super::when_where::now;
use super::draft::{fault, is_none};
use shadowpin::book::EntryCells;
use shadowpin::error::{Error, Result};
use shadowpin::logbook::columns::Column;
use shadowpin::logbook::entry::ReadAs;
use shadowpin::time::text::write::iso;
use std::io::{BufRead, Write};

/// Someone to ask.
struct Desk<'a> {
    cells: &'a mut EntryCells,
    read_as: ReadAs,
    answers: &'a mut dyn BufRead,
    questions: &'a mut dyn Write,
}

/// Asks for every cell that is blank and could be filled. An empty answer leaves it blank where that is allowed; the end of the input
/// (Ctrl-D) gives up, and nothing is entered.
pub fn missing(cells: &mut EntryCells, read_as: ReadAs, answers: &mut dyn BufRead, questions: &mut dyn Write) -> Result<()> {
    let mut desk = Desk { cells, read_as, answers, questions };
    desk.body()?;
    desk.time()?;
    if is_none(desk.cells) {
        desk.ask(Column::Remarks, "Why nothing could be had", true)?;
        return desk.ask(Column::Observer, "Observer", false);
    }
    desk.place()?;
    desk.readings()?;
    desk.ask(Column::Observer, "Observer", false)?;
    desk.ask(Column::Remarks, "Remarks", false)
}

impl Desk<'_> {
    fn blank(&self, column: Column) -> bool {
        self.cells.get(column).is_empty()
    }

    fn method(&self) -> String {
        self.cells.get(Column::Method).to_ascii_lowercase()
    }

    fn body(&mut self) -> Result<()> {
        if !self.blank(Column::Body) || matches!(self.method().as_str(), "none" | "transit" | "comparison") {
            return Ok(());
        }
        loop {
            let answer = self.answer("Body observed, or none", true)?;
            if answer.eq_ignore_ascii_case("none") {
                self.cells.set(Column::Method, "none");
                return Ok(());
            }
            if self.take(Column::Body, &answer)? {
                return Ok(());
            }
        }
    }

    fn time(&mut self) -> Result<()> {
        if !self.blank(Column::Utc) || !self.blank(Column::ShipTime) {
            return Ok(());
        }
        loop {
            let answer = self.answer("UTC, such as 2026-06-14T06:12:30Z, or now", true)?;
            let text = if answer.eq_ignore_ascii_case("now") { iso(now()?.utc) } else { answer };
            if self.take(Column::Utc, &text)? {
                return Ok(());
            }
        }
    }

    fn place(&mut self) -> Result<()> {
        if !self.blank(Column::Position) {
            return Ok(());
        }
        let needed = !matches!(self.method().as_str(), "transit" | "comparison");
        self.ask(Column::Lat, "Latitude, such as 36-05.8S", needed)?;
        self.ask(Column::Lon, "Longitude, such as 130-33.6E", needed)
    }

    fn readings(&mut self) -> Result<()> {
        let method = self.method();
        if method == "transit" {
            self.ask(Column::Mark, "Mark or range", false)?;
            self.ask(Column::ChartedBearing, "Its true bearing by the chart", true)?;
        }
        let compared = method == "comparison";
        if !compared {
            self.ask(Column::GyroBearing, "Bearing by gyro", false)?;
            let only_compass = self.blank(Column::GyroBearing);
            self.ask(Column::CompassBearing, "Bearing by magnetic compass", only_compass)?;
        }
        self.ask(Column::GyroHeading, "Heading by gyro", compared)?;
        self.ask(Column::CompassHeading, "Heading by magnetic compass", compared)
    }

    /// Asks until the answer can be read.
    fn ask(&mut self, column: Column, question: &str, needed: bool) -> Result<()> {
        if !self.blank(column) {
            return Ok(());
        }
        loop {
            let answer = self.answer(question, needed)?;
            if answer.is_empty() || self.take(column, &answer)? {
                return Ok(());
            }
        }
    }

    /// Whether the answer was taken; what is wrong with it is said.
    fn take(&mut self, column: Column, answer: &str) -> Result<bool> {
        match fault(column, answer, self.read_as) {
            Some(bad) => self.say(&format!("  {bad}\n")).map(|()| false),
            None => {
                self.cells.set(column, answer);
                Ok(true)
            }
        }
    }

    /// One answer, not blank where one is needed.
    fn answer(&mut self, question: &str, needed: bool) -> Result<String> {
        loop {
            self.say(&format!("{question}{}: ", if needed { "" } else { " (or nothing)" }))?;
            let mut line = String::new();
            let read = self.answers.read_line(&mut line).map_err(|source| Error::Stream { what: "reading the answer", source })?;
            if read == 0 {
                self.say("\n")?;
                return Err(Error::Usage("given up: nothing was entered".into()));
            }
            let line = line.trim();
            if !line.is_empty() || !needed {
                return Ok(line.to_owned());
            }
        }
    }

    fn say(&mut self, text: &str) -> Result<()> {
        let said = self.questions.write_all(text.as_bytes()).and_then(|()| self.questions.flush());
        said.map_err(|source| Error::Stream { what: "asking", source })
    }
}

#[cfg(test)]
#[allow(clippy::unwrap_used, reason = "a test that fails should stop")]
mod tests {
    use super::*;

    fn asked(cells: &mut EntryCells, answers: &str) -> (Result<()>, String) {
        let mut questions = Vec::new();
        let done = missing(cells, ReadAs::default(), &mut answers.as_bytes(), &mut questions);
        (done, String::from_utf8(questions).unwrap())
    }

    #[test]
    fn each_answer_is_read_at_once() {
        let mut cells = EntryCells::default();
        cells.set(Column::Lon, "130-33.6E");
        let (done, said) = asked(&mut cells, "sunn\nsun\n\n2026-06-14T06:12Z\n95S\n36-05.8S\n\n\n400\n314.5\n\n\n2/O\n\n");
        done.unwrap();
        assert_eq!(cells.get(Column::Body), "sun");
        assert_eq!((cells.get(Column::Lat), cells.get(Column::Lon)), ("36-05.8S", "130-33.6E"));
        assert_eq!((cells.get(Column::GyroBearing), cells.get(Column::CompassBearing)), ("", "314.5"));
        assert_eq!(cells.get(Column::Observer), "2/O");
        for wrong in ["\"sunn\"", "\"95S\"", "\"400\""] {
            assert!(said.contains(wrong), "{said}");
        }
        assert!(!said.contains("Longitude"), "{said}");
    }

    #[test]
    fn none_asks_for_the_reason_and_the_end_gives_up() {
        let mut cells = EntryCells::default();
        asked(&mut cells, "none\n2026-06-14T06:12Z\n\novercast\n\n").0.unwrap();
        assert_eq!((cells.get(Column::Method), cells.get(Column::Remarks)), ("none", "overcast"));
        let (given_up, _) = asked(&mut EntryCells::default(), "sun\n");
        assert!(given_up.unwrap_err().to_string().contains("nothing was entered"));
    }
}
