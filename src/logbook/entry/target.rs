//! What a row's bearing was taken of.

use super::Reader;
use crate::angle::TrueBearing;
use crate::angle::text::read_direction;
use crate::compass::{HorizonKind, Target};
use crate::error::BadValue;
use crate::horizon::{Limb, RisingOrSetting};
use crate::limits::nearest;
use crate::logbook::columns::Column;
use crate::logbook::log::Cells;
use crate::sky::Body;

/// The column `method`.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Method {
    Azimuth,
    Rising,
    Setting,
    Transit,
    Comparison,
    None,
}

/// The value of a cell that holds one of a few words, in any case. `meant` are parts of other words for the same, each with the right
/// one for the hint.
pub(super) fn one_of<T: Copy>(
    text: &str,
    words: &[(&'static str, T)],
    meant: &[(&str, &'static str)],
    expected: &'static str,
) -> Result<T, BadValue> {
    words.iter().find(|(word, _)| text.eq_ignore_ascii_case(word)).map(|(_, value)| *value).ok_or_else(|| {
        let lower = text.to_lowercase();
        let near = nearest(text, words.iter().map(|(word, _)| *word))
            .or_else(|| meant.iter().find(|(part, _)| lower.contains(part)).map(|(_, word)| *word));
        BadValue::new(text, expected).hint(near.map(|word| format!("is it {word}?")).unwrap_or_default())
    })
}

impl<C: Cells> Reader<'_, C> {
    pub(super) fn method(&mut self) -> Option<Method> {
        const WORDS: [(&str, Method); 6] = [
            ("azimuth", Method::Azimuth),
            ("rising", Method::Rising),
            ("setting", Method::Setting),
            ("transit", Method::Transit),
            ("comparison", Method::Comparison),
            ("none", Method::None),
        ];
        const MEANT: [(&str, &str); 7] = [
            ("ris", "rising"),
            ("set", "setting"),
            ("ampl", "rising, or setting"),
            ("range", "transit"),
            ("mark", "transit"),
            ("leading", "transit"),
            ("compar", "comparison"),
        ];
        if self.cell(Column::Method).is_none() {
            return Some(Method::Azimuth);
        }
        self.read(Column::Method, |text| one_of(text, &WORDS, &MEANT, "azimuth, rising, setting, transit, comparison or none"))
    }

    pub(super) fn target(&mut self, method: Method) -> Option<Target> {
        match method {
            Method::Azimuth => self.body().map(Target::Body),
            Method::Rising => self.on_horizon(RisingOrSetting::Rising),
            Method::Setting => self.on_horizon(RisingOrSetting::Setting),
            Method::Transit => self.mark(),
            Method::Comparison => self.headings(),
            Method::None => None,
        }
    }

    fn body(&mut self) -> Option<Body> {
        if self.cell(Column::Body).is_none() {
            let bad = BadValue::new("", "the body observed").hint("for an entry without an observation write none in the column method");
            self.faults.add(Column::Body, bad);
            return None;
        }
        self.read(Column::Body, Body::from_name)
    }

    fn on_horizon(&mut self, event: RisingOrSetting) -> Option<Target> {
        const HORIZONS: [(&str, bool); 2] = [("celestial", false), ("visible", true)];
        const LIMBS: [(&str, Limb); 3] = [("centre", Limb::Centre), ("upper", Limb::Upper), ("lower", Limb::Lower)];
        const MEANT: [(&str, &str); 5] = [("top", "upper"), ("bottom", "lower"), ("mid", "centre"), ("ul", "upper"), ("ll", "lower")];
        let body = self.body();
        let visible = self.cell(Column::Horizon).is_some()
            && self
                .read(Column::Horizon, |text| one_of(text, &HORIZONS, &[("vis", "visible"), ("sea", "visible")], "celestial or visible"))?;
        let limb = match self.cell(Column::Limb) {
            None => Limb::Centre,
            Some(_) => self.read(Column::Limb, |text| one_of(text, &LIMBS, &MEANT, "centre, upper or lower"))?,
        };
        if !visible && limb != Limb::Centre {
            let text = self.cell(Column::Limb).unwrap_or_default();
            let bad = BadValue::new(&text, "no limb on the celestial horizon");
            self.faults.add(Column::Limb, bad.hint("a limb is seen on the visible horizon: write visible in the column horizon"));
            return None;
        }
        let horizon = if visible { HorizonKind::Visible(limb) } else { HorizonKind::Celestial };
        Some(Target::OnHorizon { body: body?, event, horizon })
    }

    fn mark(&mut self) -> Option<Target> {
        if self.cell(Column::ChartedBearing).is_none() {
            self.faults.add(Column::ChartedBearing, BadValue::new("", "the true bearing of the mark by the chart"));
            return None;
        }
        let charted = self.read(Column::ChartedBearing, read_direction)?;
        Some(Target::Mark { charted: TrueBearing::wrapping_deg(charted.value), step_deg: charted.step_deg })
    }

    fn headings(&mut self) -> Option<Target> {
        let mut both = true;
        for column in [Column::GyroHeading, Column::CompassHeading] {
            if self.cell(column).is_none() {
                self.faults
                    .add(column, BadValue::new("", "a heading").hint("a comparison needs the headings by gyro and by magnetic compass"));
                both = false;
            }
        }
        both.then_some(Target::Headings)
    }
}
