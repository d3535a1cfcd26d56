//! What the seals of a book show, and what they cannot.

use super::rows::push_csv_text;
use std::fmt::Write as _;

/// A finding: its id; the entry and the line that it names; the sentence.
pub type FindingLine = (&'static str, (Option<u64>, Option<u64>), String);

/// The answer of a check.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct CheckPage {
    /// What the book is called.
    pub name: String,
    /// How many entries stand in it.
    pub entries: usize,
    /// Number and seal of the last that has one.
    pub last_seal: Option<(u64, String)>,
    /// What the seals do not bear out, in the order of the file.
    pub findings: Vec<FindingLine>,
    /// Columns with something in them that no seal covers.
    pub unsealed: Vec<String>,
    /// The seal of a signed page, and the entry that has it; `None` where none has.
    pub signed_page: Option<(String, Option<u64>)>,
}

const NOT_IN_BOOK: &str = "no entry has the seal of that page: was the book cut short there, written anew, or is it another book?";
const CANNOT: &str =
    "Not shown by the seals: a tail cut off, and a whole file written anew. The last seal on a page that was signed shows both (--seal).";

impl CheckPage {
    /// Whether nothing needs an explanation.
    pub fn holds(&self) -> bool {
        self.findings.is_empty() && !matches!(self.signed_page, Some((_, None)))
    }

    /// For a person: the first finding first.
    pub fn text(&self) -> String {
        let mut text = String::new();
        let entries = if self.entries == 1 { "1 entry".to_owned() } else { format!("{} entries", self.entries) };
        let state = if self.findings.is_empty() { "the seals hold from the first to the last" } else { "the seals do not hold" };
        let _ = writeln!(text, "{}: {entries}, {state}", self.name);
        for (at, (_, _, sentence)) in self.findings.iter().enumerate() {
            let _ = writeln!(text, "{}{sentence}", if at == 0 && self.findings.len() > 1 { "first: " } else { "" });
        }
        if let Some((entry, seal)) = &self.last_seal {
            let _ = writeln!(text, "last seal, of entry {entry}: {seal}");
        }
        match &self.signed_page {
            Some((_, Some(entry))) => {
                let _ = writeln!(text, "the seal of that page is that of entry {entry}: up to there it is the book that was signed");
            }
            Some((_, None)) => {
                let _ = writeln!(text, "{NOT_IN_BOOK}");
            }
            None => {}
        }
        if !self.unsealed.is_empty() {
            let _ = writeln!(text, "no seal covers what stands under {}", self.unsealed.join(", "));
        }
        let _ = writeln!(text, "{CANNOT}");
        text
    }

    /// One object.
    pub fn json(&self) -> String {
        let findings: Vec<serde_json::Value> = self
            .findings
            .iter()
            .map(|(id, (entry, line), text)| serde_json::json!({ "id": id, "entry": entry, "line": line, "text": text }))
            .collect();
        let (entry, seal) = self.last_seal.as_ref().map_or((None, None), |(entry, seal)| (Some(entry), Some(seal)));
        let page = self.signed_page.as_ref().map(|(seal, entry)| serde_json::json!({ "seal": seal, "entry": entry }));
        serde_json::json!({
            "holds": self.holds(), "entries": self.entries, "last_entry": entry, "last_seal": seal, "findings": findings,
            "unsealed": self.unsealed, "signed_page": page,
        })
        .to_string()
    }

    /// A row a finding.
    pub fn csv(&self) -> String {
        let mut out = b"finding,entry,line,text\n".to_vec();
        let missing = matches!(self.signed_page, Some((_, None))).then(|| ("not-in-book", (None, None), NOT_IN_BOOK.to_owned()));
        for (id, (entry, line), text) in self.findings.iter().cloned().chain(missing) {
            let number = |n: Option<u64>| n.map(|n| n.to_string()).unwrap_or_default();
            out.extend_from_slice(format!("{id},{},{},", number(entry), number(line)).as_bytes());
            push_csv_text(&mut out, &text, b',');
            out.push(b'\n');
        }
        String::from_utf8_lossy(&out).into_owned()
    }
}
