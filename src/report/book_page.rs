//! Entries of the ship's own record, for a screen and for a page that is signed.

use maud::{DOCTYPE, Markup, PreEscaped, html};
use std::fmt::Write as _;

/// What an entry is, for its place on the page.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum LineKind {
    /// An observation, or why there was none.
    Entry,
    /// An entry struck through, with nothing in its place.
    Strike,
    /// A signature.
    Signature,
}

/// One entry, as it is shown: every figure as it stands in the book.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct BookLine {
    /// What it is.
    pub kind: LineKind,
    /// Its number.
    pub entry: String,
    /// Date and time of UTC.
    pub utc: String,
    /// Ship's time and zone, where they were given.
    pub ship_time: String,
    /// When it was entered.
    pub recorded: String,
    /// The vessel.
    pub vessel: String,
    /// The position.
    pub position: String,
    /// What was observed, and how.
    pub observed: String,
    /// Heading by gyro.
    pub gyro_heading: String,
    /// Heading by magnetic compass.
    pub compass_heading: String,
    /// Bearing by gyro.
    pub gyro_bearing: String,
    /// Bearing by magnetic compass.
    pub compass_bearing: String,
    /// Azimuth.
    pub azimuth: String,
    /// Gyro error.
    pub gyro_error: String,
    /// Compass error.
    pub compass_error: String,
    /// Variation.
    pub variation: String,
    /// Deviation.
    pub deviation: String,
    /// Who observed, or who signed.
    pub observer: String,
    /// Remarks.
    pub remarks: String,
    /// What it does to an earlier entry, or whose signature it is; may be empty.
    pub says: String,
    /// By which entry it was struck through and why; `None` where it stands.
    pub struck: Option<String>,
}

/// What a page of the book shows.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct BookPage {
    /// What the book is called.
    pub name: String,
    /// From when to when, in words; empty for all.
    pub span: String,
    /// The entries, in their order.
    pub lines: Vec<BookLine>,
    /// How many stand in the whole book.
    pub entries: usize,
    /// Number of the last entry in the book, and its seal.
    pub last_seal: Option<(u64, String)>,
    /// What a check of the seals found: sentences; none where the chain holds.
    pub found: Vec<String>,
    /// Columns with something in them that no seal covers.
    pub unsealed: Vec<String>,
}

const CAUTION: &str = "A check on instruments, not a means of navigation, and not type-approved. The official almanac, the chart's own notes on variation and local disturbance, the adjuster's card, the makers' manuals, the limits of flag and company, and the master come first.";
const HOLDS: &str = "Each seal covers its entry and the seal before it. The seals hold from the first entry to the last.";

impl BookPage {
    /// For a screen.
    pub fn text(&self) -> String {
        let mut text = String::new();
        for line in &self.lines {
            line.text(&mut text);
        }
        if !self.lines.is_empty() {
            text.push('\n');
        }
        let shown = if self.lines.len() == self.entries { String::new() } else { format!(", {} shown", self.lines.len()) };
        let _ = writeln!(text, "{}: {}{shown}", self.name, counted(self.entries));
        if let Some((entry, seal)) = &self.last_seal {
            let _ = writeln!(text, "last seal, of entry {entry}: {seal}");
        }
        self.found.iter().for_each(|found| {
            let _ = writeln!(text, "The seals do not bear this out: {found}");
        });
        if !self.unsealed.is_empty() {
            let _ = writeln!(text, "No seal covers what stands under {}", self.unsealed.join(", "));
        }
        text
    }

    /// A page for A4 paper, whole in itself: no script, no picture, nothing from anywhere else.
    pub fn html(&self) -> String {
        let title = if self.span.is_empty() { "Compass error book".to_owned() } else { format!("Compass error book, {}", self.span) };
        let vessels = self.vessels();
        let page = html! {
            (DOCTYPE)
            html lang="en" {
                head {
                    meta charset="utf-8";
                    title { (title) }
                    style { (PreEscaped(STYLE)) }
                }
                body {
                    header {
                        h1 { (title) }
                        p { @if !vessels.is_empty() { "Vessel: " (vessels) ". " } "Angles in degrees; east +, a gyro that reads low L, high H. An entry that was struck through stays, and says by which entry." }
                    }
                    (self.table())
                    (self.foot())
                }
            }
        };
        page.into_string() + "\n"
    }

    fn vessels(&self) -> String {
        let mut names: Vec<&str> = self.lines.iter().map(|l| l.vessel.as_str()).filter(|v| !v.is_empty()).collect();
        names.sort_unstable();
        names.dedup();
        names.join(", ")
    }

    fn table(&self) -> Markup {
        html! {
            table {
                thead {
                    tr {
                        th scope="col" { "No." }
                        th scope="col" { "UTC" br; "ship's time" }
                        th scope="col" { "Position" }
                        th scope="col" { "Observed" }
                        th scope="col" { "Heading" br; "gyro / comp." }
                        th scope="col" { "Bearing" br; "gyro / comp." }
                        th scope="col" { "Azimuth" }
                        th scope="col" { "Gyro" br; "error" }
                        th scope="col" { "Compass" br; "error" }
                        th scope="col" { "Varia-" br; "tion" }
                        th scope="col" { "Devia-" br; "tion" }
                        th scope="col" { "Observer, remarks" }
                        th scope="col" { "Initials" }
                    }
                }
                tbody {
                    @if self.lines.is_empty() {
                        tr { td colspan="13" { "No entry in this span." } }
                    }
                    @for line in &self.lines { (line.row()) }
                }
            }
        }
    }

    fn foot(&self) -> Markup {
        html! {
            footer {
                p { (counted(self.lines.len())) " on this page, " (self.entries) " in the book (" (self.name) ")." }
                @if let Some((entry, seal)) = &self.last_seal {
                    p { "Last seal, of entry " (entry) ": " span.seal { (seal) } }
                }
                @if self.found.is_empty() {
                    p { (HOLDS) " A tail cut off, or a file written anew, shows only against the seal on a page that was signed." }
                } @else {
                    p { strong { "The seals do not bear this out:" } }
                    ul { @for found in &self.found { li { (found) } } }
                }
                @if !self.unsealed.is_empty() {
                    p { "No seal covers what stands under " (self.unsealed.join(", ")) "." }
                }
                p.sign { "Signed " span.rule {} " Rank " span.rule {} " Date " span.rule {} }
                p.caution { (CAUTION) }
            }
        }
    }
}

fn counted(entries: usize) -> String {
    if entries == 1 { "1 entry".to_owned() } else { format!("{entries} entries") }
}

const STYLE: &str = "
@page { size: A4 landscape; margin: 12mm; }
body { font: 9pt/1.3 sans-serif; color: #000; background: #fff; margin: 0; }
h1 { font-size: 13pt; margin: 0 0 1mm; }
p { margin: 0 0 2mm; }
table { border-collapse: collapse; width: 100%; }
thead { display: table-header-group; }
tr { break-inside: avoid; }
th, td { border: 0.3mm solid #000; padding: 0.8mm 1.2mm; text-align: left; vertical-align: top; }
th { font-weight: bold; }
td.initials { width: 14mm; }
tr.struck td.entered { text-decoration: line-through; }
.seal { font-family: monospace; font-size: 10pt; }
footer { margin-top: 3mm; break-inside: avoid; }
.sign { margin: 9mm 0 4mm; }
.rule { display: inline-block; width: 55mm; border-bottom: 0.3mm solid #000; }
.caution { font-size: 8pt; }
";

impl BookLine {
    /// Two lines of figures, and one for what was done to the entry.
    fn text(&self, out: &mut String) {
        let mark = if self.struck.is_some() { '~' } else { ' ' };
        let mut first = format!("{mark}{:>5}  ", self.entry);
        match self.kind {
            LineKind::Entry => {
                let when = if self.utc.is_empty() { "no time" } else { &self.utc };
                first.push_str(&joined("   ", &[when, &self.ship_time, &self.position, &self.observed]));
            }
            LineKind::Strike | LineKind::Signature => {
                first.push_str(&joined("   ", &[&self.says, &named("entered ", &self.recorded)]));
            }
        }
        let _ = writeln!(out, "{}", first.trim_end());
        let heading = joined(" / ", &[&named("gyro ", &self.gyro_heading), &named("compass ", &self.compass_heading)]);
        let gyro = joined(" ", &[&named("gyro ", &self.gyro_bearing), &named("error ", &self.gyro_error)]);
        let compass = joined(" ", &[&named("compass ", &self.compass_bearing), &named("error ", &self.compass_error)]);
        let figures = [
            &named("heading ", &heading),
            &named("azimuth ", &self.azimuth),
            &gyro,
            &compass,
            &named("variation ", &self.variation),
            &named("deviation ", &self.deviation),
        ];
        let says = if self.kind == LineKind::Entry { self.says.as_str() } else { "" };
        let words = joined("   ", &[&joined(": ", &[&self.observer, &self.remarks]), says]);
        let below = [joined("   ", &figures.map(String::as_str)), words];
        for line in below.iter().filter(|l| !l.is_empty()) {
            let _ = writeln!(out, "        {line}");
        }
        if let Some(struck) = &self.struck {
            let _ = writeln!(out, "        struck through by {struck}");
        }
    }

    fn row(&self) -> Markup {
        let class = self.struck.as_ref().map(|_| "struck");
        let words = joined(". ", &[&joined(": ", &[&self.observer, &self.remarks]), &self.says]);
        html! {
            tr class=[class] {
                td { (self.entry) }
                @if self.kind == LineKind::Entry {
                    td.entered { (self.utc) @if !self.ship_time.is_empty() { br; (self.ship_time) } }
                    td.entered { (self.position) }
                    td.entered { (self.observed) }
                    td.entered { (joined(" / ", &[&self.gyro_heading, &self.compass_heading])) }
                    td.entered { (joined(" / ", &[&self.gyro_bearing, &self.compass_bearing])) }
                    td.entered { (self.azimuth) }
                    td.entered { (self.gyro_error) }
                    td.entered { (self.compass_error) }
                    td.entered { (self.variation) }
                    td.entered { (self.deviation) }
                    td { span.entered { (words) } @if let Some(struck) = &self.struck { strong { " Struck through by " (struck) } } }
                } @else {
                    td colspan="11" { (joined(". ", &[&self.says, &joined(": ", &[&self.observer, &self.remarks]), &named("Entered ", &self.recorded)])) }
                }
                td.initials {}
            }
        }
    }
}

/// A word before a figure, and nothing where there is none.
fn named(word: &str, figure: &str) -> String {
    if figure.is_empty() { String::new() } else { format!("{word}{figure}") }
}

/// What is not empty, with `between` between.
fn joined(between: &str, parts: &[&str]) -> String {
    parts.iter().filter(|p| !p.is_empty()).copied().collect::<Vec<_>>().join(between)
}
