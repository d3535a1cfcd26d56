//! The deviation card on the command line.

use super::read;
use clap::Args;
use shadowpin::compass::Observation;
use shadowpin::compass::card::{Card, Cards};
use shadowpin::error::{Error, Result};
use shadowpin::limits::Limits;
use shadowpin::logbook::card::read_cards;
use shadowpin::report::card::OnCard;
use shadowpin::time::UtcInstant;
use std::path::{Path, PathBuf};

/// The card to compare with.
#[derive(Debug, Args)]
pub struct CardArgs {
    /// Deviation card (CSV), to compare with on the heading of --compass-heading
    #[arg(long, value_name = "FILE", requires = "compass_heading")]
    card: Option<PathBuf>,
    /// Read the card in a straight line between its headings, not by its five-coefficient curve
    #[arg(long, requires = "card")]
    card_as_given: bool,
}

impl CardArgs {
    /// The file, where one is given.
    pub fn file(&self) -> Option<&PathBuf> {
        self.card.as_ref()
    }

    /// The card's deviation on the heading observed; `None` where no card was given.
    pub fn on(&self, observation: &Observation, utc: UtcInstant, limits: &Limits) -> Result<Option<OnCard>> {
        let (Some(path), Some(heading)) = (&self.card, observation.compass_heading) else { return Ok(None) };
        let (name, cards) = read_cards_of(path)?;
        let card = only_one_in_force(&cards, utc).map_err(|message| Error::Content { file: name, line: 0, message })?;
        let as_given = self.card_as_given || card.curve().is_none();
        let deviation = if as_given { card.as_given(heading.value) } else { card.deviation(heading.value) };
        Ok(Some(OnCard {
            heading: heading.value,
            deviation,
            as_given,
            notices: card.notices(Some(utc), limits.thresholds.card_months.round() as u32),
        }))
    }
}

/// The cards of a file, with the name that messages give it.
pub fn read_cards_of(path: &Path) -> Result<(String, Cards)> {
    let (name, bytes) = read::content(path)?;
    let cards = read_cards(&name, &bytes)?;
    Ok((name, cards))
}

/// The card of the one compass that the file is about: a single observation does not say which it means.
fn only_one_in_force(cards: &Cards, utc: UtcInstant) -> std::result::Result<&Card, String> {
    let mut all = cards.iter().map(|card| &card.of);
    let first = all.next().ok_or("there is no card in it")?;
    if all.any(|other| (&other.vessel, &other.magnetic_compass) != (&first.vessel, &first.magnetic_compass)) {
        return Err("it holds the cards of several compasses; give a file with those of the compass observed".to_owned());
    }
    cards.in_force(&first.vessel, &first.magnetic_compass, utc).ok_or_else(|| "no card in it was in force at that time".to_owned())
}
