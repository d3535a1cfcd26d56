//! One row of a log read: who, when, where, what was observed, what the officer made of it, and every fault in it.

mod fault;
mod figures;
mod place;
mod target;
mod when;

pub use fault::{Fault, Faults};

use super::columns::Column;
use super::log::Cells;
use crate::angle::Reading;
use crate::angle::text::ErrorSign;
use crate::compass::{HorizonKind, Observation, Place, Target};
use crate::error::BadValue;
use crate::time::text::DateOrder;
use crate::time::{Moment, Zone};
use std::borrow::Cow;

/// How cells are to be understood.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub struct ReadAs {
    /// Whether figures are written with a decimal comma.
    pub decimal_comma: bool,
    /// Order of dates in figures.
    pub date_order: DateOrder,
    /// What an unlettered logged gyro error means.
    pub logged_sign: ErrorSign,
}

/// What the officer worked out, east +.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Logged {
    /// Azimuth, degrees.
    pub azimuth: Option<Reading<f64>>,
    /// Gyro error, degrees.
    pub gyro_error: Option<Reading<f64>>,
    /// Compass error, degrees.
    pub compass_error: Option<Reading<f64>>,
    /// Variation, degrees.
    pub variation: Option<Reading<f64>>,
    /// Deviation, degrees.
    pub deviation: Option<Reading<f64>>,
}

/// One row, read.
#[derive(Debug, Clone, PartialEq)]
pub struct Entry<'r> {
    /// The vessel; blank is one vessel.
    pub vessel: Cow<'r, str>,
    /// The gyro.
    pub gyro: Cow<'r, str>,
    /// The repeater.
    pub repeater: Cow<'r, str>,
    /// The magnetic compass.
    pub magnetic_compass: Cow<'r, str>,
    /// When.
    pub moment: Option<Moment>,
    /// The zone that was written, with a ship's time or beside UTC.
    pub zone: Option<Zone>,
    /// Where.
    pub place: Option<Place>,
    /// What was observed; `None` where the row says that nothing could be had, or where a fault stands in the way.
    pub observation: Option<Observation>,
    /// Whether the row says that nothing could be had (method `none`).
    pub nothing_had: bool,
    /// What the officer worked out.
    pub logged: Logged,
    /// Remarks.
    pub remarks: Cow<'r, str>,
}

/// Reads one row. Every fault is put into `faults`; what can be read in spite of them is read.
///
/// A fault in what the direction is reckoned from (time, place, body, method, horizon and limb, the height of eye on the visible horizon,
/// charted bearing), or in what would change its meaning if a default stood there (kind of gyro, where the ship was), leaves the row
/// without an observation; one in a reading or a logged figure leaves that figure blank. Either stands in the column `problem`. A row
/// that says nothing could be had is never at fault.
pub fn read_entry<'r>(cells: &'r impl Cells, read_as: ReadAs, faults: &mut Faults) -> Entry<'r> {
    let mut reader = Reader { cells, read_as, faults };
    let mut entry = Entry {
        vessel: cells.text(Column::Vessel),
        gyro: cells.text(Column::Gyro),
        repeater: cells.text(Column::Repeater),
        magnetic_compass: cells.text(Column::MagneticCompass),
        moment: None,
        zone: None,
        place: None,
        observation: None,
        nothing_had: false,
        logged: Logged::default(),
        remarks: cells.text(Column::Remarks),
    };
    let method = reader.method();
    entry.nothing_had = method == Some(target::Method::None);
    let needed = !matches!(method, Some(target::Method::None | target::Method::Transit | target::Method::Comparison));
    (entry.moment, entry.zone) = reader.moment(needed);
    entry.place = reader.place(needed);
    if entry.nothing_had {
        faults.clear();
        return entry;
    }
    let target = method.and_then(|m| reader.target(m));
    entry.logged = reader.logged();
    let observation = reader.readings();
    if matches!(target, Some(Target::OnHorizon { horizon: HorizonKind::Visible(_), .. })) {
        reader.faults.need(Column::EyeHeight);
    }
    entry.observation = target.filter(|_| !reader.faults.essential()).map(|target| Observation {
        target,
        moment: entry.moment,
        place: entry.place,
        ..observation
    });
    entry
}

/// Reads cells and gathers faults.
struct Reader<'a, C> {
    cells: &'a C,
    read_as: ReadAs,
    faults: &'a mut Faults,
}

impl<'a, C: Cells> Reader<'a, C> {
    /// The cell where it is not blank.
    fn cell(&self, column: Column) -> Option<Cow<'a, str>> {
        let text = self.cells.text(column);
        if text.is_empty() {
            return None;
        }
        Some(text)
    }

    /// The cell, a decimal comma as a point where the log has them.
    fn figure(&self, column: Column) -> Option<Cow<'a, str>> {
        let text = self.cell(column)?;
        if !self.read_as.decimal_comma || !text.contains(',') {
            return Some(text);
        }
        Some(Cow::Owned(if column == Column::Position { commas_within_figures(&text) } else { text.replace(',', ".") }))
    }

    /// The value of a cell that is not blank; a fault where it cannot be read.
    fn read<T>(&mut self, column: Column, read: impl FnOnce(&str) -> Result<T, BadValue>) -> Option<T> {
        let text = self.figure(column)?;
        match read(&text) {
            Ok(value) => Some(value),
            Err(mut bad) => {
                if self.read_as.decimal_comma {
                    // As it stands in the log, not as it was read.
                    bad.value = BadValue::new(&self.cell(column).unwrap_or_default(), "").value;
                }
                self.faults.add(column, bad);
                None
            }
        }
    }
}

/// In a position a comma may also part latitude and longitude: only one between two figures is a decimal one.
fn commas_within_figures(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    let mut rest = text;
    while let Some((before, behind)) = rest.split_once(',') {
        out.push_str(before);
        let within = before.ends_with(|c: char| c.is_ascii_digit()) && behind.starts_with(|c: char| c.is_ascii_digit());
        out.push(if within { '.' } else { ',' });
        rest = behind;
    }
    out.push_str(rest);
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    /// A row that holds every column's example.
    struct Examples;

    impl Cells for Examples {
        fn has(&self, _: Column) -> bool {
            true
        }

        fn bytes(&self, column: Column) -> &[u8] {
            column.info().example.as_bytes()
        }
    }

    #[test]
    fn the_examples_can_be_read_and_agree() {
        let mut faults = Faults::default();
        let entry = read_entry(&Examples, ReadAs::default(), &mut faults);
        assert!(faults.is_empty(), "{}", faults.in_one());
        assert!(entry.observation.is_some_and(|o| o.gyro_bearing.is_some() && o.speed_kn.is_some() && o.heel_deg == Some(-2.0)));
        assert!(entry.logged.gyro_error.is_some_and(|e| e.value == 0.5));
    }

    #[test]
    fn a_height_of_eye_is_needed_on_the_visible_horizon_only() {
        struct Row(&'static str);
        impl Cells for Row {
            fn has(&self, _: Column) -> bool {
                true
            }

            fn bytes(&self, column: Column) -> &[u8] {
                let text = match column {
                    Column::Utc => "2026-06-13T22:16Z",
                    Column::Position => "36-05.8S 130-33.6E",
                    Column::Body => "Sun",
                    Column::Method => "rising",
                    Column::Horizon => self.0,
                    Column::EyeHeight => "18 m",
                    _ => "",
                };
                text.as_bytes()
            }
        }
        let worked = |row: &Row| {
            let mut faults = Faults::default();
            let entry = read_entry(row, ReadAs::default(), &mut faults);
            assert_eq!(faults.iter().count(), 1);
            entry.observation.is_some()
        };
        assert!(worked(&Row("celestial")));
        assert!(!worked(&Row("visible")));
    }

    #[test]
    fn a_comma_in_a_position() {
        assert_eq!(commas_within_figures("36-05,8S, 130-33,6E"), "36-05.8S, 130-33.6E");
        assert_eq!(commas_within_figures("-36,096 130,56"), "-36.096 130.56");
        assert_eq!(commas_within_figures(",36,"), ",36,");
    }
}
