//! From an entry of the logbook to a row that can be learned from and judged.

use super::row::{CardFigure, Names, Row};
use crate::compass::card::{Card, Cards};
use crate::compass::{GyroRun, Observation, Worked, work};
use crate::limits::Limits;
use crate::logbook::entry::Entry;
use std::sync::LazyLock;

/// What every row is worked with.
#[derive(Debug, Clone, Copy)]
pub struct Desk<'a> {
    /// Limits and uncertainties.
    pub limits: &'a Limits,
    /// Deviation cards, where any are given.
    pub cards: Option<&'a Cards>,
    /// Cards are read in a straight line between their headings, not by their curves.
    pub card_as_given: bool,
}

/// An entry worked: owns what a [`Row`] borrows.
#[derive(Debug, Clone)]
pub struct WorkedEntry<'e> {
    entry: &'e Entry<'e>,
    card: Option<CardFigure>,
    /// The observation worked.
    pub worked: Worked,
}

impl Desk<'_> {
    /// Works an entry. `run` is what other rows say of the gyro at that time.
    pub fn work<'e>(&self, entry: &'e Entry<'e>, run: Option<GyroRun>) -> WorkedEntry<'e> {
        static NOTHING: LazyLock<Worked> = LazyLock::new(Worked::default);
        let worked = entry.observation.as_ref().map_or_else(|| NOTHING.clone(), |o| work(o, run, self.limits));
        let card = entry.observation.as_ref().and_then(|o| self.card_figure(entry, o, &worked));
        WorkedEntry { entry, card, worked }
    }

    fn card_figure(&self, entry: &Entry, observation: &Observation, worked: &Worked) -> Option<CardFigure> {
        let at = entry.moment?.utc;
        let card: &Card = self.cards?.in_force(&entry.vessel, &entry.magnetic_compass, at)?;
        let on = |heading| if self.card_as_given || card.curve().is_none() { card.as_given(heading) } else { card.deviation(heading) };
        let deviation = match (observation.compass_heading, worked.true_heading, worked.variation) {
            (Some(heading), _, _) => on(heading.value),
            // Only the true heading is known: the deviation is that of the compass heading it leads to.
            (None, Some(true_heading), Some(variation)) => {
                let magnetic = true_heading - variation.value;
                let first = on(magnetic - crate::angle::Deviation::wrapping_deg(0.0));
                on(magnetic - first)
            }
            _ => return None,
        };
        Some(CardFigure { deviation_deg: deviation.deg(), age_months: card.age_months(at).map(f64::from) })
    }
}

/// Whose compasses an entry speaks of.
pub fn names<'e>(entry: &'e Entry<'e>) -> Names<'e> {
    Names { vessel: &entry.vessel, gyro: &entry.gyro, repeater: &entry.repeater, magnetic_compass: &entry.magnetic_compass }
}

impl WorkedEntry<'_> {
    /// Deviation by the card in force, degrees.
    pub fn card_deviation_deg(&self) -> Option<f64> {
        self.card.map(|c| c.deviation_deg)
    }

    /// The row that the two passes take; `number` is that of the data row, from 1.
    pub fn row(&self, number: u64) -> Row<'_> {
        Row {
            number,
            names: names(self.entry),
            moment: self.entry.moment,
            place: self.entry.place,
            zone: self.entry.zone,
            observation: self.entry.observation.as_ref(),
            remarks: &self.entry.remarks,
            logged: &self.entry.logged,
            card: self.card,
            worked: &self.worked,
        }
    }
}
