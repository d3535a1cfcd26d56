//! The report of a review: what needs an explanation, worst first; the vessels with their pictures; what was not evaluated; limits and
//! models.

mod findings;
mod glance;
mod terms;
mod vessel;

pub use terms::settings;

use super::{document, named};
use crate::compass::card::Cards;
use crate::limits::Limits;
use crate::review::{Finding, Findings, Fleet, Summary, VesselSummary};
use maud::{Markup, html};

/// Vessels that have pictures; the others stand in the table.
const MOST_DRAWN: usize = 60;
/// Vessels that stand in the table; the others are counted.
const MOST_LISTED: usize = 1000;

/// All that is reported of a review.
#[derive(Debug)]
pub struct ReviewPage<'a> {
    /// Name of the log, as it was given.
    pub log: &'a str,
    /// What a superintendent reads.
    pub summary: &'a Summary,
    /// What the first pass learned.
    pub fleet: &'a Fleet,
    /// What the second pass saw.
    pub findings: Findings,
    /// Deviation cards, where any were given.
    pub cards: Option<&'a Cards>,
    /// Cards are read in a straight line between their headings.
    pub card_as_given: bool,
    /// What the log says of the cards, one sentence each.
    pub card_doubts: &'a [String],
    /// Limits and uncertainties in force.
    pub limits: &'a Limits,
}

/// What the parts of the page share.
struct Sheet<'a> {
    page: &'a ReviewPage<'a>,
    findings: &'a Findings,
    worst: &'a [Finding],
}

impl ReviewPage<'_> {
    /// The page.
    pub fn html(mut self) -> String {
        let (worst, findings) = std::mem::replace(&mut self.findings, Findings::new(self.fleet)).worst_first();
        let sheet = Sheet { page: &self, findings: &findings, worst: &worst };
        document(&format!("Review of {}", self.log), &sheet.body())
    }
}

/// Whether something of a vessel needs an explanation.
fn has_something(vessel: &VesselSummary) -> bool {
    vessel.rows_with_query > 0 || !vessel.patterns.is_empty()
}

/// A vessel's name, also where the log has only one and does not name it.
fn vessel_name(name: &str) -> Markup {
    if name.is_empty() {
        html! { "the vessel" }
    } else {
        named(name)
    }
}

impl Sheet<'_> {
    /// The vessels with pictures, the worst first.
    fn drawn(&self) -> impl Iterator<Item = (usize, &VesselSummary)> {
        self.page.summary.vessels.iter().enumerate().filter(|(_, v)| has_something(v)).take(MOST_DRAWN)
    }

    /// Id of a vessel's section, where she has one.
    fn section(&self, vessel: &str) -> Option<String> {
        self.drawn().find(|(_, v)| v.vessel == vessel).map(|(i, _)| format!("vessel-{}", i + 1))
    }

    fn body(&self) -> Markup {
        html! {
            h1 { "Review of a compass log" }
            (glance::glance(self))
            h2 id="explain" { "What needs an explanation" }
            (findings::patterns(self))
            (findings::rows(self))
            h2 id="vessels" { "The vessels" }
            (vessel::vessels(self))
            h2 id="not-evaluated" { "What was not evaluated" }
            (terms::not_evaluated(self))
            h2 id="limits" { "Limits and models used" }
            (terms::models(self))
            (terms::cards(self))
            h3 { "Limits and uncertainties in force" }
            (settings(self.page.limits, |_| true))
        }
    }
}
