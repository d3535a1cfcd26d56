//! What was taken from the ship's instruments, from which sentence, how old; and what was not taken, and why.

use super::column::Column;
use crate::angle::text::write::{direction, position};
use crate::logbook::nmea::{ClockCheck, Fill, Found, FromBridge, Item};
use crate::time::text::write::date_time;

/// What a stream said and what became of it.
#[derive(Debug)]
pub struct NmeaPage<'a> {
    /// What messages call the stream.
    pub name: &'a str,
    /// What it said.
    pub found: &'a FromBridge,
    /// What became of each item wanted.
    pub filled: &'a [(Item, Fill)],
    /// Its time against this computer's clock.
    pub clock: Option<ClockCheck>,
    /// Sentences to add.
    pub remarks: &'a [String],
}

/// One item of the stream as text.
struct Shown {
    value: String,
    from: String,
    age: String,
    about: &'static str,
}

impl NmeaPage<'_> {
    /// The block of text.
    pub fn text(&self) -> String {
        let mut page = Column::default();
        page.sentence(&format!("From the ship's instruments ({})", self.name));
        for (item, fill) in self.filled {
            self.item(&mut page, *item, *fill);
        }
        let absent: Vec<&str> = self.filled.iter().filter(|(_, fill)| *fill == Fill::Absent).map(|(item, _)| item.name()).collect();
        if !absent.is_empty() {
            page.sentence(&format!("Not in it: {}.", absent.join(", ")));
        }
        self.remarks.iter().for_each(|remark| page.sentence(remark));
        self.found.doubts.iter().for_each(|doubt| page.sentence(&format!("Notice: {doubt}")));
        let refused = self.refused();
        if !refused.is_empty() {
            page.sentence("Refused:");
            refused.iter().for_each(|part| page.sentence(&format!("  {part}")));
        }
        page.finish()
    }

    fn item(&self, page: &mut Column, item: Item, fill: Fill) {
        let Some(shown) = shown(self.found, item) else { return };
        let Shown { value, from, age, about } = shown;
        let about = match fill {
            Fill::Taken if about.is_empty() => format!("{from}, {age}"),
            Fill::Taken => format!("{from}, {age}; {about}"),
            Fill::ByHand => format!("{from}, not taken: given by hand"),
            Fill::Stale => format!("{from}, not taken: {age}"),
            Fill::ClockFarOff => format!("{from}, not taken: {}", self.clock.map_or_else(String::new, |c| c.to_string())),
            Fill::Absent => return,
        };
        page.sentence(&format!("{:<20}{value:>22}   {about}", item.name()));
    }

    /// What was refused and how often.
    fn refused(&self) -> Vec<String> {
        let mut parts: Vec<String> = self
            .found
            .refused
            .iter()
            .map(|(name, why, count)| format!("{} {count} ({why})", name.map_or_else(|| "sentences".to_owned(), |n| n.to_string())))
            .collect();
        let counts = self.found.counts;
        if counts.cut_off > 0 {
            parts.push(format!("sentences {} (cut off)", counts.cut_off));
        }
        if counts.too_long > 0 {
            parts.push(format!("sentences {} (too long)", counts.too_long));
        }
        if counts.without_sentence > 0 {
            parts.push(format!("lines {} (no sentence in them)", counts.without_sentence));
        }
        parts
    }

    /// Why an item that is needed could not be had, and what to give in its place.
    pub fn why_not(&self, item: Item) -> String {
        let fill = self.filled.iter().find(|(i, _)| *i == item).map(|(_, fill)| *fill);
        let give = match item {
            Item::Time => "--utc, or --ship-time with --zone",
            Item::Position => "--lat and --lon",
            Item::GyroHeading => "--gyro-heading",
            Item::CompassHeading => "--compass-heading",
            Item::Speed => "--speed",
        };
        let reason = match (fill, shown(self.found, item)) {
            (Some(Fill::Stale), Some(Shown { from, age, .. })) => format!("the last one, {from}, is {age}"),
            (Some(Fill::ClockFarOff), Some(Shown { from, value, .. })) => {
                format!("{from} says {value}, but {}", self.clock.map_or_else(String::new, |c| c.to_string()))
            }
            _ if self.found.counts.sentences == 0 => "there is no sentence in it".to_owned(),
            _ if item == Item::Time => "ZDA and RMC alone carry a date, and no valid one is in it".to_owned(),
            _ => "no valid sentence with it".to_owned(),
        };
        let refused = self.refused();
        let refused = if refused.is_empty() { String::new() } else { format!(" (refused: {})", refused.join("; ")) };
        let remarks: String = self.remarks.iter().map(|r| format!(". {r}")).collect();
        format!("no {} could be taken: {reason}{refused}; give {give}{}", item.name(), remarks.trim_end_matches('.'))
    }
}

/// The figure of an item, its sentence and age.
fn shown(found: &FromBridge, item: Item) -> Option<Shown> {
    match item {
        Item::Time => of(found.time.as_ref(), |m| date_time(m.utc)),
        Item::Position => of(found.position.as_ref(), |p| position(p.position)),
        Item::GyroHeading => of(found.gyro_heading.as_ref(), |h| direction(h.value.deg(), 1)),
        Item::CompassHeading => of(found.compass_heading.as_ref(), |h| direction(h.value.deg(), 1)),
        Item::Speed => of(found.speed_kn.as_ref(), |v| format!("{v:.1}")),
    }
}

fn of<T>(found: Option<&Found<T>>, write: impl Fn(&T) -> String) -> Option<Shown> {
    let found = found?;
    let age = found.age_s.map_or_else(|| "of unknown age".to_owned(), |age| format!("{age:.1} s old"));
    Some(Shown { value: write(&found.value), from: found.from.to_string(), age, about: found.about })
}
