//! What the deviation card says beside what was observed.

use crate::angle::text::write::{direction, east_west};
use crate::angle::{CompassBearing, Deviation};
use crate::compass::Worked;
use crate::notice::Notice;

/// The card's deviation on a heading.
#[derive(Debug, Clone)]
pub struct OnCard {
    /// The heading by compass.
    pub heading: CompassBearing,
    /// The deviation on it by the card.
    pub deviation: Deviation,
    /// Whether it was read in a straight line between the card's headings.
    pub as_given: bool,
    /// The doubts that the card raises.
    pub notices: Vec<Notice>,
}

impl OnCard {
    /// Sentences for a person: the card, how far the observed deviation is from it, the doubts.
    pub fn sentences(&self, worked: &Worked) -> Vec<String> {
        let way = if self.as_given { "in a straight line between its headings" } else { "by its curve" };
        let mut sentences =
            vec![format!("Card: deviation {} on heading {} {way}", east_west(self.deviation.deg()), direction(self.heading.deg(), 1))];
        let found = [(worked.deviation, "by bearing"), (worked.deviation_by_comparison, "by comparison of headings")];
        for (figure, route) in found.into_iter().filter_map(|(figure, route)| Some((figure?, route))) {
            let off = figure.value.deg() - self.deviation.deg();
            sentences.push(format!("Observed {route} less card: {} (u {:.1})", east_west(off), figure.u_deg()));
        }
        sentences.extend(self.notices.iter().map(|notice| format!("Notice: {notice} ({})", notice.id())));
        sentences
    }
}
