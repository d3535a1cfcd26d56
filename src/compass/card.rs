//! The deviation card: heading to deviation, of one magnetic compass, from a date.

use super::curve::{Curve, DeviationReading, fit};
use crate::angle::{CompassBearing, Deviation, MagneticBearing, wrap_180_deg};
use crate::notice::Notice;
use crate::time::UtcInstant;
use chrono::{Datelike, Months};

/// A figure further off the card's own curve than this, degrees, is not smooth (common practice).
const SMOOTH_DEG: f64 = 0.5;
/// A constant part larger than this, degrees, has a cause outside the compass (common practice).
const CONSTANT_DEG: f64 = 1.0;
/// A card with nothing over this, degrees, is near nil everywhere (our own reading of a common doubt).
const NEAR_NIL_DEG: f64 = 0.5;
/// Observations that it takes to say that a card's sense is reversed (our own).
const REVERSED_LEAST: usize = 8;
/// Root mean square of the card on the observed headings, degrees, under which its sense cannot be told (our own).
const REVERSED_LEAST_DEG: f64 = 1.0;

/// Which headings the card is entered with.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum EnteredBy {
    /// Ship's head by the compass itself.
    CompassHeading,
    /// Magnetic heading: compass heading + deviation.
    MagneticHeading,
}

/// Whose card it is, from when.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct CardOf {
    /// The vessel; blank: any.
    pub vessel: String,
    /// The magnetic compass; blank: any.
    pub magnetic_compass: String,
    /// In force from this instant; `None`: always was.
    pub valid_from: Option<UtcInstant>,
    /// Where it was made; may be blank.
    pub place: String,
}

/// Why a card cannot be used.
#[derive(Debug, Clone, Copy, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum BadCard {
    /// No figures.
    #[error("a card with no deviations on it")]
    Empty,
    /// Two figures for one heading.
    #[error("two different deviations ({one_deg:.1} and {other_deg:.1}) for heading {heading_deg:05.1}")]
    Twice {
        /// The heading, degrees.
        heading_deg: f64,
        /// One of them, degrees, east +.
        one_deg: f64,
        /// The other.
        other_deg: f64,
    },
}

/// A deviation card.
#[derive(Debug, Clone)]
pub struct Card {
    /// Whose it is.
    pub of: CardOf,
    /// Its figures by compass heading, in order round the compass.
    points: Vec<(CompassBearing, Deviation)>,
    /// `None` where its headings are too few for one.
    fitted: Option<Curve>,
    /// Whether all of that curve is determined.
    holds: bool,
}

impl Card {
    /// A card from its figures, in any order and spacing.
    ///
    /// Figures by magnetic heading are brought to the compass heading that each belongs to: magnetic - deviation. 0 and 360 may both be given,
    /// with the same deviation.
    ///
    /// # Errors
    /// [`BadCard`] without figures, or with two different ones for a heading.
    pub fn new(of: CardOf, by: EnteredBy, figures: &[(f64, Deviation)]) -> Result<Self, BadCard> {
        let by_compass = |&(heading_deg, deviation): &(f64, Deviation)| match by {
            EnteredBy::CompassHeading => (CompassBearing::wrapping_deg(heading_deg), deviation),
            EnteredBy::MagneticHeading => (MagneticBearing::wrapping_deg(heading_deg) - deviation, deviation),
        };
        let mut points: Vec<_> = figures.iter().map(by_compass).collect();
        points.sort_by(|a, b| a.0.deg().total_cmp(&b.0.deg()));
        points.dedup();
        for pair in points.windows(2) {
            if let [(heading, one), (next, other)] = pair
                && heading == next
            {
                return Err(BadCard::Twice { heading_deg: heading.deg(), one_deg: one.deg(), other_deg: other.deg() });
            }
        }
        if points.is_empty() {
            return Err(BadCard::Empty);
        }
        let readings: Vec<DeviationReading> =
            points.iter().map(|&(heading, deviation)| DeviationReading { heading, deviation, turn: None }).collect();
        let fitted = fit(&readings).ok();
        let holds = fitted.as_ref().is_some_and(|curve| curve.u_deg().iter().all(Option::is_some));
        Ok(Self { of, points, fitted, holds })
    }

    /// Its figures by compass heading, in order round the compass.
    pub fn points(&self) -> &[(CompassBearing, Deviation)] {
        &self.points
    }

    /// The curve through it; `None` where its headings are too few, on too narrow an arc, or its figures too rough for one.
    pub fn curve(&self) -> Option<&Curve> {
        self.fitted.as_ref().filter(|_| self.holds)
    }

    /// The deviation on a heading by compass, by the card's five-coefficient curve; where it has none, as [`Card::as_given`].
    pub fn deviation(&self, heading: CompassBearing) -> Deviation {
        match self.curve() {
            Some(curve) => Deviation::wrapping_deg(curve.deviation_deg(heading)),
            None => self.as_given(heading),
        }
    }

    /// The deviation on a heading by compass, in a straight line between the figures on either side, across north too.
    pub fn as_given(&self, heading: CompassBearing) -> Deviation {
        let after = self.points.partition_point(|(h, _)| *h <= heading);
        let (Some(last), Some(first)) = (self.points.last(), self.points.first()) else { return Deviation::wrapping_deg(0.0) };
        let before = after.checked_sub(1).and_then(|i| self.points.get(i)).unwrap_or(last);
        let after = self.points.get(after).unwrap_or(first);
        let along = |from: CompassBearing, to: CompassBearing| (to.deg() - from.deg()).rem_euclid(360.0);
        let gap = along(before.0, after.0);
        let share = if gap > 0.0 { along(before.0, heading) / gap } else { 0.0 };
        Deviation::wrapping_deg(before.1.deg() + share * (after.1.deg() - before.1.deg()))
    }

    /// The doubts that the card itself raises, and its age at the instant `at` against the `limit_months` allowed.
    pub fn notices(&self, at: Option<UtcInstant>, limit_months: u32) -> Vec<Notice> {
        let mut notices = Vec::new();
        if let Some(curve) = &self.fitted {
            let off = self.points.iter().map(|(h, d)| (h.deg(), wrap_180_deg(d.deg() - curve.deviation_deg(*h))));
            let worst = off.max_by(|a, b| a.1.abs().total_cmp(&b.1.abs()));
            if let Some((heading_deg, residual_deg)) = worst.filter(|(_, residual)| residual.abs() > SMOOTH_DEG) {
                notices.push(Notice::CardNotSmooth { residual_deg, heading_deg });
            }
            let a_deg = curve.coefficients.a;
            if self.holds && a_deg.abs() > CONSTANT_DEG {
                notices.push(Notice::CardConstant { a_deg });
            }
        }
        // Headings all round and yet no curve: the figures are too rough, which is said above.
        if !self.holds && self.fitted.as_ref().is_none_or(|curve| !curve.unproven.is_empty()) {
            notices.push(Notice::CardSparse { headings: self.points.len() });
        }
        let largest_deg = self.points.iter().map(|(_, d)| d.deg().abs()).fold(0.0, f64::max);
        if largest_deg <= NEAR_NIL_DEG {
            notices.push(Notice::CardNearNil { largest_deg });
        }
        if let Some(age_months) = at.and_then(|at| self.age_months(at)).filter(|age| *age >= limit_months) {
            notices.push(Notice::CardOld { age_months, limit_months });
        }
        notices
    }

    /// Whole months from the card's date to `at`; `None` where it has none, or is not yet in force.
    pub fn age_months(&self, at: UtcInstant) -> Option<u32> {
        let (from, to) = (self.of.valid_from?.to_chrono(), at.to_chrono());
        let months = (to.year() - from.year()) * 12 + i32::try_from(to.month()).ok()? - i32::try_from(from.month()).ok()?;
        let months = u32::try_from(months).ok()?;
        // Not yet whole where the day of the month is still to come.
        let whole = from.checked_add_months(Months::new(months)).is_some_and(|day| day <= to);
        if whole { Some(months) } else { months.checked_sub(1) }
    }

    /// Whether observed deviations say that the card's east and west were exchanged: then observed - card is twice the card.
    ///
    /// Takes eight observations, on headings where the card is a degree or more in the mean.
    pub fn reversed_by(&self, observed: &[(CompassBearing, Deviation)]) -> Option<Notice> {
        let (mut as_it_stands, mut reversed, mut card) = (0.0, 0.0, 0.0);
        for (heading, deviation) in observed {
            let on_card = self.deviation(*heading).deg();
            as_it_stands += wrap_180_deg(deviation.deg() - on_card).powi(2);
            reversed += wrap_180_deg(deviation.deg() + on_card).powi(2);
            card += on_card * on_card;
        }
        let telling = observed.len() >= REVERSED_LEAST && card >= REVERSED_LEAST_DEG.powi(2) * observed.len() as f64;
        // Reversed must explain by far more than half of what is off.
        (telling && reversed < as_it_stands / 4.0).then_some(Notice::CardReversed { observations: observed.len() })
    }
}

/// All cards of a run.
#[derive(Debug, Clone, Default)]
pub struct Cards {
    cards: Vec<Card>,
}

impl Cards {
    /// In any order.
    pub fn new(cards: Vec<Card>) -> Self {
        Self { cards }
    }

    /// Each of them.
    pub fn iter(&self) -> impl Iterator<Item = &Card> {
        self.cards.iter()
    }

    /// The card in force for a vessel's compass at an instant: the latest whose date has come.
    ///
    /// A card that names the vessel and the compass goes before one that leaves either blank; case and outer spaces do not matter.
    pub fn in_force(&self, vessel: &str, magnetic_compass: &str, at: UtcInstant) -> Option<&Card> {
        let named = |on_card: &str, wanted: &str| match on_card.trim() {
            "" => Some(0),
            name => name.eq_ignore_ascii_case(wanted.trim()).then_some(1),
        };
        let rank = |card: &&Card| {
            let from = card.of.valid_from;
            let come = from.is_none_or(|from| from <= at);
            let names = (named(&card.of.vessel, vessel)?, named(&card.of.magnetic_compass, magnetic_compass)?);
            come.then_some((names, from))
        };
        self.cards.iter().filter_map(|card| Some((rank(&card)?, card))).max_by_key(|(rank, _)| *rank).map(|(_, card)| card)
    }
}
