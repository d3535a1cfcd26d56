//! A bearing at rising or setting, written downwards.

use super::azimuth::{closing, errors};
use super::column::Column;
use super::words;
use crate::angle::text::write::{direction, east_west, named_degrees_minutes, position};
use crate::angle::{GyroError, Position};
use crate::compass::{HorizonKind, Observation, Worked};
use crate::horizon::{Amplitude, HorizonEvent, Limb, RisingOrSetting, Rung, Search, watched_limb};
use crate::sky::Body;
use crate::time::text::write as time_text;
use crate::time::{UtcInstant, Zone};

/// Everything that the page of an amplitude shows.
#[derive(Debug)]
pub struct AmplitudePage<'a> {
    /// The body.
    pub body: Body,
    /// Rising or setting.
    pub event: RisingOrSetting,
    /// On which horizon.
    pub horizon: HorizonKind,
    /// The time given.
    pub utc: UtcInstant,
    /// The zone that ship's time is shown in.
    pub zone: Option<Zone>,
    /// Where.
    pub position: Position,
    /// Height of eye, metres, given or taken.
    pub eye_height_m: f64,
    /// What was observed.
    pub observation: &'a Observation,
    /// What it gives.
    pub worked: &'a Worked,
    /// Height of the watched limb above the visible horizon at that instant, sun's diameters.
    pub limb_diameters: Option<f64>,
    /// Minutes about the instant; empty where not asked for.
    pub ladder: Vec<Rung>,
    /// The gyro's error, for the bearings to expect.
    pub gyro_error: Option<GyroError>,
    /// Sentences to add under the figures: the card.
    pub remarks: Vec<String>,
    /// Whether every term of each uncertainty is listed.
    pub with_budget: bool,
}

impl AmplitudePage<'_> {
    /// The page as text.
    pub fn text(&self) -> String {
        let mut page = Column::default();
        let what = if self.event == RisingOrSetting::Rising { "rising" } else { "setting" };
        page.sentence(&format!("{} {what} on the {}   {}", self.body.name(), self.horizon_name(), words::when(self.utc, self.zone)));
        page.sentence(&position(self.position));
        page.gap();
        match self.worked.on_horizon.map(|h| h.search) {
            Some(Search::At(crossing)) => self.crossing(&mut page, &crossing),
            Some(Search::AlwaysAbove) => {
                page.sentence(&format!("{} does not set there on that day: it stays above that horizon.", self.name()))
            }
            Some(Search::AlwaysBelow) => {
                page.sentence(&format!("{} does not rise there on that day: it stays below that horizon.", self.name()))
            }
            Some(Search::NotInSpan) => page.sentence(&format!("{} has no {what} within half a day of that time.", self.name())),
            None => {}
        }
        errors(&mut page, self.observation, self.worked, self.with_budget);
        closing(&mut page, self.worked, &self.remarks);
        if !self.ladder.is_empty() {
            page.gap();
            self.ladder(&mut page);
        }
        page.finish()
    }

    fn name(&self) -> String {
        match self.body {
            Body::Sun => "The sun".to_owned(),
            Body::Moon => "The moon".to_owned(),
            other => other.name().to_owned(),
        }
    }

    fn horizon_name(&self) -> &'static str {
        match self.horizon {
            HorizonKind::Celestial => "celestial horizon",
            HorizonKind::Visible(Limb::Centre) => "visible horizon, centre",
            HorizonKind::Visible(Limb::Upper) => "visible horizon, upper limb",
            HorizonKind::Visible(Limb::Lower) => "visible horizon, lower limb",
        }
    }

    fn crossing(&self, page: &mut Column, crossing: &HorizonEvent) {
        let late_s = crossing.utc.seconds_since(self.utc);
        page.line("on that horizon at", &self.clock(crossing.utc), &format!("UTC{}; {}", self.ship_clock(crossing.utc), apart(late_s)));
        page.line("declination", &named_degrees_minutes(crossing.place.declination_deg, 2, 'N', 'S'), "at that instant");
        if let Some(azimuth) = self.worked.true_azimuth {
            page.line(
                "amplitude",
                &Amplitude::from_azimuth(self.event, azimuth).to_string(),
                "sine = sin(declination) / cos(latitude), on the celestial horizon",
            );
            page.line("azimuth", &direction(azimuth.deg(), 1), &words::u(self.worked.azimuth_budget.u_deg()));
        }
        if let Some(diameters) = self.limb_diameters {
            let (eye, limb) = (self.eye_height_m, limb_name(watched_limb(self.body)));
            page.line(limb, &format!("{diameters:.2}"), &format!("sun's diameters above the visible horizon then, from {eye} m"));
        }
        page.gap();
    }

    fn clock(&self, utc: UtcInstant) -> String {
        time_text::date_time(utc).split_off(11)
    }

    fn ship_clock(&self, utc: UtcInstant) -> String {
        self.zone.map_or_else(String::new, |zone| format!(" ({} ship's time)", time_text::ship_date_time(utc, zone).split_off(11)))
    }

    fn ladder(&self, page: &mut Column) {
        let clock_name = if self.zone.is_some() { "ship's time" } else { "UTC" };
        let gyro_head = if self.gyro_error.is_some() { "   gyro to expect" } else { "" };
        page.sentence(&format!("{clock_name:<12}{:>8}{gyro_head}   {:>10}   error if read then", "azimuth", "limb, dia."));
        for rung in &self.ladder {
            let clock = time_text::ship_date_time(rung.utc, self.zone.unwrap_or(Zone::UTC)).get(11..16).unwrap_or_default().to_owned();
            let gyro = self.gyro_error.map_or_else(String::new, |e| format!("   {:>14}", direction((rung.seen.azimuth - e).deg(), 1)));
            page.sentence(&format!(
                "{clock:<12}{:>8}{gyro}   {:>10}   {}",
                direction(rung.seen.azimuth.deg(), 1),
                format!("{:.2}", rung.limb_diameters + 0.0),
                east_west(rung.error_deg)
            ));
        }
    }
}

fn limb_name(limb: Limb) -> &'static str {
    match limb {
        Limb::Lower => "lower limb",
        Limb::Upper => "upper limb",
        Limb::Centre => "the body",
    }
}

/// How far the instant is from the time given.
fn apart(late_s: f64) -> String {
    let (minutes, seconds) = ((late_s.abs().round() / 60.0).floor(), late_s.abs().round() % 60.0);
    let side = if late_s < 0.0 { "before" } else { "after" };
    format!("{minutes:.0}m {seconds:02.0}s {side} the time given")
}
