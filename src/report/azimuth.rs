//! One bearing worked, written downwards as an officer writes it in the book.

use super::column::Column;
use super::words::{self, north_south};
use crate::angle::text::write::{
    degrees_minutes, direction, east_west, hour_angle, longitude, low_high, named_degrees_minutes, nearest_half, position,
};
use crate::angle::{Deviation, Position};
use crate::compass::{Budget, Figure, Observation, Target, Worked};
use crate::horizon::{Abc, HandWorking};
use crate::sky::Body;
use crate::time::{UtcInstant, Zone};

/// Everything that the page of one bearing shows.
#[derive(Debug)]
pub struct AzimuthPage<'a> {
    /// The body.
    pub body: Body,
    /// When.
    pub utc: UtcInstant,
    /// The zone that ship's time is shown in.
    pub zone: Option<Zone>,
    /// Where.
    pub position: Position,
    /// What was observed.
    pub observation: &'a Observation,
    /// What it gives.
    pub worked: &'a Worked,
    /// The working by hand.
    pub hand: HandWorking,
    /// Sentences to add under the figures: the gyro's speed error, the card.
    pub remarks: Vec<String>,
    /// Whether every term of each uncertainty is listed.
    pub with_budget: bool,
}

impl AzimuthPage<'_> {
    /// The page as text.
    pub fn text(&self) -> String {
        let mut page = Column::default();
        self.heading(&mut page);
        self.hour_angle(&mut page);
        if let Some(abc) = &self.hand.abc {
            figures_of_azimuth(&mut page, abc, self.position);
        }
        self.seen(&mut page);
        errors(&mut page, self.observation, self.worked, self.with_budget);
        closing(&mut page, self.worked, &self.remarks);
        page.finish()
    }

    fn heading(&self, page: &mut Column) {
        page.sentence(&format!("{}   {}", self.body.name(), words::when(self.utc, self.zone)));
        page.sentence(&position(self.position));
        page.gap();
    }

    fn hour_angle(&self, page: &mut Column) {
        let hand = &self.hand;
        let into_s = self.utc.seconds_since(hand.hour);
        let (minutes, seconds) = ((into_s / 60.0).floor(), into_s % 60.0);
        let whose = if hand.sha_deg.is_some() { "GHA Aries" } else { "GHA" };
        page.line(&format!("{whose} at {}", hand.hour.to_chrono().format("%H h")), &hour_angle(hand.gha_at_hour_deg), "");
        page.line(&format!("increment {minutes:02.0}m {seconds:04.1}s"), &degrees_minutes(hand.increment_deg), "");
        // A star's own motion is that of Aries, and nothing is left; for the others it is the almanac's v.
        if hand.own_motion_deg.abs() * 60.0 >= 0.05 {
            let sign = if hand.own_motion_deg < 0.0 { '-' } else { '+' };
            page.line("own motion (v)", &format!("{sign}{}", degrees_minutes(hand.own_motion_deg)), "");
        }
        if let Some(sha_deg) = hand.sha_deg {
            page.line(&format!("SHA {}", self.body.name()), &hour_angle(sha_deg), "");
        }
        page.line(&format!("GHA {}", self.body.name()), &hour_angle(hand.gha_deg), "");
        let west = self.position.lon.deg() < 0.0;
        page.line("longitude", &longitude(self.position.lon), if west { "west: subtract" } else { "east: add" });
        page.line("LHA", &hour_angle(hand.lha_deg), "");
        page.line("declination", &named_degrees_minutes(hand.declination_deg, 2, 'N', 'S'), "");
        page.gap();
    }

    fn seen(&self, page: &mut Column) {
        if let Some(at_time) = self.worked.at_time {
            page.line("altitude", &format!("{:.1}", at_time.altitude_deg + 0.0), "of the centre, without refraction");
            page.line("azimuth", &direction(at_time.azimuth.deg(), 1), &words::u(self.worked.azimuth_budget.u_deg()));
        } else if let Some(reason) = self.worked.no_azimuth {
            page.sentence(&format!("No azimuth: {reason}."));
        }
        page.gap();
    }
}

fn figures_of_azimuth(page: &mut Column, abc: &Abc, position: Position) {
    let figure = |x: f64| format!("{:.3} {}", x.abs(), north_south(x));
    let with_latitude = (abc.a < 0.0) == (position.lat.deg() < 0.0);
    page.line("A", &figure(abc.a), if with_latitude { "named as the latitude" } else { "named opposite to the latitude" });
    page.line("B", &figure(abc.b), "named as the declination");
    page.line("C", &figure(abc.c), if (abc.a < 0.0) == (abc.b < 0.0) { "same names: sum" } else { "different names: difference" });
    let side = if abc.west { 'W' } else { 'E' };
    page.line("by A, B, C", &format!("{} {:.1} {side}", north_south(abc.c), abc.azimuth_angle_deg), "cotangent = C cos(latitude)");
    page.gap();
}

/// The subtractions, each with its name.
pub(super) fn errors(page: &mut Column, observation: &Observation, worked: &Worked, with_budget: bool) {
    let Some(azimuth) = worked.true_azimuth else { return };
    let source = match observation.target {
        Target::Mark { .. } => "charted bearing",
        Target::OnHorizon { .. } => "azimuth on the horizon",
        _ => "azimuth",
    };
    if let (Some(gyro), Some(error)) = (observation.gyro_bearing, worked.gyro_error) {
        page.line(source, &direction(azimuth.deg(), 1), "");
        page.line("gyro bearing", &direction(gyro.value.deg(), 1), "subtract");
        page.line("gyro error", &low_high(error.value.deg()), &for_the_book(low_high(nearest_half(error.value.deg())), error.u_deg()));
        terms(page, with_budget, &error.budget);
        page.gap();
    }
    if let (Some(compass), Some(error)) = (observation.compass_bearing, worked.compass_error) {
        page.line(source, &direction(azimuth.deg(), 1), "");
        page.line("compass bearing", &direction(compass.value.deg(), 1), "subtract");
        page.line("compass error", &east_west(error.value.deg()), &words::u(error.u_deg()));
        terms(page, with_budget, &error.budget);
        deviation_lines(page, worked, worked.deviation, with_budget);
    }
    by_comparison(page, observation, worked, with_budget);
}

fn by_comparison(page: &mut Column, observation: &Observation, worked: &Worked, with_budget: bool) {
    let (Some(gyro), Some(true_heading)) = (observation.gyro_heading, worked.true_heading) else { return };
    let (Some(compass), Some(error)) = (observation.compass_heading, worked.compass_error_by_comparison) else {
        page.line("gyro heading", &direction(gyro.value.deg(), 1), "");
        page.line("true heading", &direction(true_heading.deg(), 1), "gyro heading + gyro error");
        page.gap();
        return;
    };
    let sighted = observation.compass_bearing.is_some();
    page.sentence(if sighted { "By comparison of headings" } else { "By comparison of headings (the magnetic compass was not sighted)" });
    page.line("gyro heading", &direction(gyro.value.deg(), 1), "");
    page.line("true heading", &direction(true_heading.deg(), 1), "gyro heading + gyro error");
    page.line("compass heading", &direction(compass.value.deg(), 1), "subtract");
    page.line("compass error", &east_west(error.value.deg()), &words::u(error.u_deg()));
    terms(page, with_budget, &error.budget);
    deviation_lines(page, worked, worked.deviation_by_comparison, with_budget);
}

fn deviation_lines(page: &mut Column, worked: &Worked, figure: Option<Figure<Deviation>>, with_budget: bool) {
    if let (Some(field), Some(variation), Some(figure)) = (worked.field, worked.variation, figure) {
        page.line(
            &format!("variation {}", field.model.name()),
            &east_west(variation.value.deg()),
            &format!("subtract; {}", words::u(variation.u_deg())),
        );
        page.line("deviation", &east_west(figure.value.deg()), &for_the_book(east_west(nearest_half(figure.value.deg())), figure.u_deg()));
        terms(page, with_budget, &figure.budget);
    } else {
        page.sentence("no deviation: no variation for that place and date");
    }
    page.gap();
}

fn terms(page: &mut Column, wanted: bool, budget: &Budget) {
    if !wanted {
        return;
    }
    for (name, term) in budget.terms().into_iter().filter(|(_, term)| *term > 0.0) {
        page.line(&format!("  {name}"), &format!("{term:.3}"), "");
    }
    page.line("  together", &format!("{:.3}", budget.u_deg()), "root of the sum of squares");
}

fn for_the_book(half: String, u_deg: f64) -> String {
    format!("{}; for the book {half}", words::u(u_deg))
}

/// Trust, remarks, notices.
pub(super) fn closing(page: &mut Column, worked: &Worked, remarks: &[String]) {
    if let Some(trust) = worked.trust {
        page.sentence(&format!("Trust: {trust}"));
    }
    for remark in remarks {
        page.sentence(remark);
    }
    for notice in &worked.notices {
        page.sentence(&format!("Notice: {notice} ({})", notice.id()));
    }
}
