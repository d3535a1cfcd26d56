//! What a log says of the deviation cards themselves: the doubts a card raises as it stands, and whether its east and west were
//! exchanged.

use super::desk::WorkedEntry;
use crate::angle::{CompassBearing, Deviation};
use crate::compass::card::{Card, Cards};
use crate::limits::Limits;
use crate::logbook::entry::Entry;

/// Observations of each card that are kept: enough to tell, and little.
const KEPT: usize = 64;

/// Watches the cards while the first pass goes by.
#[derive(Debug)]
pub struct CardWatch<'c> {
    seen: Vec<(&'c Card, Vec<(CompassBearing, Deviation)>)>,
}

impl<'c> CardWatch<'c> {
    /// Watches these cards.
    pub fn new(cards: Option<&'c Cards>) -> Self {
        Self { seen: cards.into_iter().flat_map(Cards::iter).map(|card| (card, Vec::new())).collect() }
    }

    /// Takes what a row says of the card that was in force for it.
    pub fn feed(&mut self, cards: Option<&'c Cards>, entry: &Entry, worked: &WorkedEntry) {
        let (Some(cards), Some(moment), Some(observation)) = (cards, entry.moment, entry.observation) else { return };
        let Some(heading) = observation.compass_heading else { return };
        let Some(deviation) = worked.worked.deviation.or(worked.worked.deviation_by_comparison) else { return };
        let Some(in_force) = cards.in_force(&entry.vessel, &entry.magnetic_compass, moment.utc) else { return };
        if let Some((_, kept)) = self.seen.iter_mut().find(|(card, kept)| std::ptr::eq(*card, in_force) && kept.len() < KEPT) {
            kept.push((heading.value, deviation.value));
        }
    }

    /// Adds what the rows that follow say of the same cards.
    pub fn join(&mut self, later: Self) {
        for ((_, kept), (_, more)) in self.seen.iter_mut().zip(later.seen) {
            let free = KEPT.saturating_sub(kept.len());
            kept.extend(more.into_iter().take(free));
        }
    }

    /// One sentence for each doubt: whose card, and what.
    pub fn doubts(&self, limits: &Limits) -> Vec<String> {
        let months = limits.thresholds.card_months.round() as u32;
        let mut said = Vec::new();
        for (card, observed) in &self.seen {
            let whose = [card.of.vessel.as_str(), card.of.magnetic_compass.as_str()].into_iter().filter(|n| !n.trim().is_empty());
            let whose = whose.collect::<Vec<_>>().join(", ");
            let whose = if whose.is_empty() { "the card".to_owned() } else { format!("the card of {whose}") };
            // Its age is a matter of each row, and a query there.
            for notice in card.notices(None, months).into_iter().chain(card.reversed_by(observed)) {
                said.push(format!("{whose}: {notice} ({})", notice.id()));
            }
        }
        said
    }
}
