//! What to observe, as a page that is read in half a minute.

use super::column::Column;
use super::words;
use crate::angle::text::write::{direction, position};
use crate::angle::{CompassError, GyroError, TrueBearing};
use crate::horizon::{Limb, RisingOrSetting, Twilight, watched_limb};
use crate::plan::{Ask, Candidate, HorizonInstant, Plan, TwilightInstant, Window, WindowEnd};
use crate::sky::Body;
use crate::time::text::write as time_text;
use crate::time::{UtcInstant, Zone};
use serde_json::{Value, json};

/// Star and planet windows that the page shows; the rest is counted.
const SHOWN: usize = 12;

/// A plan with what its page needs besides.
#[derive(Debug)]
pub struct PlanPage<'a> {
    /// The question.
    pub ask: &'a Ask<'a>,
    /// The answer.
    pub plan: &'a Plan,
    /// The zone that ship's time is shown in.
    pub zone: Option<Zone>,
    /// The gyro's error, for the bearings to expect.
    pub gyro_error: Option<GyroError>,
    /// The magnetic compass's error on this heading, for the bearings to expect.
    pub compass_error: Option<CompassError>,
    /// Whether every window is shown.
    pub all: bool,
}

impl PlanPage<'_> {
    /// The page as text.
    pub fn text(&self) -> String {
        let mut page = Column::default();
        self.heading(&mut page);
        self.best(&mut page);
        self.instants(&mut page);
        self.windows(&mut page);
        self.polaris(&mut page);
        page.gap();
        page.sentence("Never look at the sun without the azimuth circle's shades.");
        page.finish()
    }

    fn heading(&self, page: &mut Column) {
        let track = &self.ask.track;
        let end = track.from.plus_seconds(self.ask.hours * 3600.0).unwrap_or(track.from);
        page.sentence(&format!("What to observe from {}", words::when(track.from, self.zone)));
        page.sentence(&format!("             until {}", words::when(end, self.zone)));
        let way = track
            .course
            .map_or_else(|| "lying still".to_owned(), |c| format!("course {}, {:.1} kn", direction(c.deg(), 1), track.speed_kn));
        page.sentence(&format!("{}, {way}, height of eye {} m", position(track.position), self.ask.eye_height_m));
        page.gap();
    }

    fn best(&self, page: &mut Column) {
        match self.plan.best_window() {
            Some(best) => {
                let (from, to) = (self.clock(best.from.utc), self.clock(best.to.utc));
                page.sentence(&format!("Best: {}, {from} to {to}: {}.", best.body.name(), why(best)));
            }
            None if self.plan.horizon.is_empty() => page.sentence("Nothing can be observed in that time."),
            None => {}
        }
        page.gap();
    }

    /// `UTC` alone, or UTC and ship's time side by side.
    fn clock(&self, utc: UtcInstant) -> String {
        let hour_minute = |zone| time_text::ship_date_time(to_the_minute(utc), zone).get(11..16).unwrap_or_default().to_owned();
        match self.zone {
            Some(zone) => format!("{} / {}", hour_minute(Zone::UTC), hour_minute(zone)),
            None => hour_minute(Zone::UTC),
        }
    }

    fn clock_heading(&self) -> &'static str {
        if self.zone.is_some() { "UTC / ship's" } else { "UTC" }
    }

    fn instants(&self, page: &mut Column) {
        let mut lines: Vec<(UtcInstant, String)> = self.plan.twilight.iter().map(|t| (t.utc, twilight_words(t))).collect();
        lines.extend(self.plan.horizon.iter().map(|h| (h.utc, self.horizon_words(h))));
        lines.sort_by_key(|l| l.0);
        if lines.is_empty() {
            page.sentence("The sun and the moon neither rise nor set, and no twilight begins or ends, in that time.");
        } else {
            page.sentence(self.clock_heading());
        }
        for (utc, line) in lines {
            page.sentence(&format!("{:<14}{line}", self.clock(utc)));
        }
        page.gap();
    }

    fn horizon_words(&self, h: &HorizonInstant) -> String {
        let verb = if h.event == RisingOrSetting::Rising { "rises" } else { "sets" };
        let limb = match watched_limb(h.body) {
            Limb::Lower => "lower limb",
            Limb::Upper => "upper limb",
            Limb::Centre => "centre",
        };
        let height = format!("{:.2} sun's diameters {}", h.limb_diameters.abs(), if h.limb_diameters < -0.005 { "below" } else { "above" });
        format!(
            "{} {verb} on the celestial horizon: azimuth {}{}; {limb} {height} the visible horizon",
            h.body.name().to_lowercase(),
            direction(h.azimuth.deg(), 1),
            self.expect(h.azimuth)
        )
    }

    /// The bearings to expect on the instruments whose errors are known.
    fn expect(&self, azimuth: TrueBearing) -> String {
        let gyro = self.gyro_error.map(|e| format!(", gyro {}", direction((azimuth - e).deg(), 1)));
        let compass = self.compass_error.map(|e| format!(", compass {}", direction((azimuth - e).deg(), 1)));
        gyro.unwrap_or_default() + &compass.unwrap_or_default()
    }

    fn windows(&self, page: &mut Column) {
        let shown = self.shown();
        if shown.is_empty() {
            return;
        }
        let clock = self.clock_heading();
        let course = self.ask.track.course;
        let side_head = if course.is_some() { "  relative, wing" } else { "" };
        page.sentence(&format!(
            "{:<32}{:<16}{:<15}{:<12}{:>9}{:>5}{side_head}",
            format!("from and until, {clock}"),
            "body",
            "azimuth",
            "altitude",
            "in 10 min",
            "u"
        ));
        for w in &shown {
            let span = format!("{} - {}", self.clock(w.from.utc), self.clock(w.to.utc));
            let side = course.map_or_else(String::new, |c| format!("  {}", self.side(w, c)));
            let name = format!("{}{}", w.body.name(), if w.first_choice { "" } else { " (high)" });
            page.sentence(&format!(
                "{span:<32}{:<5}{name:<16}{:<15}{:<12}{:>9}{:>6.2}{side}",
                self.plan.rank(w),
                format!("{} - {}", direction(w.from.azimuth.deg(), 1), direction(w.to.azimuth.deg(), 1)),
                format!("{:.0} - {:.0}", w.from.altitude_deg, w.to.altitude_deg),
                format!("{:+.1}", w.rate_deg_per_10_min + 0.0),
                w.u_deg,
            ));
        }
        let left = self.plan.windows.len() - shown.len();
        if left > 0 {
            page.sentence(&format!("and {left} more of fainter stars: --all shows them"));
        }
        page.gap();
    }

    /// The windows of sun and moon, and the best of the others, in order of time.
    fn shown(&self) -> Vec<&Window> {
        if self.all {
            return self.plan.windows.iter().collect();
        }
        let (near, mut far): (Vec<&Window>, Vec<&Window>) =
            self.plan.windows.iter().partition(|w| matches!(w.body, Body::Sun | Body::Moon));
        // Bright ones first among those alike to a tenth of u.
        let brightness = |w: &Window| w.body.magnitude().unwrap_or(9.0);
        far.sort_by(|a, b| {
            b.first_choice
                .cmp(&a.first_choice)
                .then((a.u_deg * 10.0).round().total_cmp(&(b.u_deg * 10.0).round()))
                .then(brightness(a).total_cmp(&brightness(b)))
        });
        far.truncate(SHOWN);
        let mut shown: Vec<&Window> = near.into_iter().chain(far).collect();
        shown.sort_by(|a, b| a.from.utc.cmp(&b.from.utc).then(a.u_deg.total_cmp(&b.u_deg)));
        shown
    }

    fn side(&self, w: &Window, course: TrueBearing) -> String {
        let relative = |end: &WindowEnd| Window::relative_bearing_deg(end, course);
        let (from, to) = (relative(&w.from), relative(&w.to));
        let (first, last) = (wing(from), wing(to));
        let where_to = if first == last { first.to_owned() } else { format!("{first}, then {last}") };
        format!("{} - {}, {where_to}", direction(from, 0), direction(to, 0))
    }

    fn polaris(&self, page: &mut Column) {
        let Some(p) = self.plan.polaris else { return };
        let dark = if p.dark { "" } else { "; it does not get dark enough for it" };
        let (from, to) = (direction(p.azimuth_from.deg(), 1), direction(p.azimuth_to.deg(), 1));
        page.sentence(&format!("Polaris: azimuth {from} to {to}, altitude {:.0}{dark}", p.altitude_deg));
    }

    /// One object; keys are fixed.
    pub fn json(&self) -> String {
        let degrees = |x: f64| (x * 10_000.0).round() / 10_000.0 + 0.0;
        let windows: Vec<Value> = self
            .plan
            .windows
            .iter()
            .map(|w| {
                json!({"body": w.body.name(), "from": time_text::iso(w.from.utc), "to": time_text::iso(w.to.utc),
                    "azimuth_from": degrees(w.from.azimuth.deg()), "azimuth_to": degrees(w.to.azimuth.deg()),
                    "altitude_from": degrees(w.from.altitude_deg), "altitude_to": degrees(w.to.altitude_deg),
                    "u": degrees(w.u_deg), "why": why(w)})
            })
            .collect();
        let horizon: Vec<Value> = self
            .plan
            .horizon
            .iter()
            .map(|h| {
                json!({"body": h.body.name(), "event": event_word(h.event), "utc": time_text::iso(h.utc),
                    "azimuth": degrees(h.azimuth.deg()), "limb_diameters": (h.limb_diameters * 100.0).round() / 100.0 + 0.0})
            })
            .collect();
        let twilight: Vec<Value> =
            self.plan.twilight.iter().map(|t| json!({"event": twilight_words(t), "utc": time_text::iso(t.utc)})).collect();
        json!({"windows": windows, "horizon": horizon, "twilight": twilight}).to_string()
    }
}

fn to_the_minute(utc: UtcInstant) -> UtcInstant {
    UtcInstant::from_unix_ms((utc.unix_ms() + 30_000).div_euclid(60_000) * 60_000).unwrap_or(utc)
}

fn event_word(event: RisingOrSetting) -> &'static str {
    if event == RisingOrSetting::Rising { "rising" } else { "setting" }
}

fn twilight_words(t: &TwilightInstant) -> String {
    let name = match t.twilight {
        Twilight::Civil => "civil",
        Twilight::Nautical => "nautical",
        Twilight::Astronomical => "astronomical",
    };
    format!("{name} twilight {}", if t.event == RisingOrSetting::Rising { "begins" } else { "ends" })
}

/// Why a window is good, or less so.
fn why(w: &Window) -> String {
    let lowest = w.from.altitude_deg.min(w.to.altitude_deg);
    let height = if w.first_choice { format!("from {lowest:.0} degrees high") } else { format!("high, {lowest:.0} degrees at the lowest") };
    let pace = match w.rate_deg_per_10_min.abs() {
        r if r < 1.0 => "its azimuth nearly stands",
        r if r < 2.5 => "its azimuth moves slowly",
        _ => "its azimuth moves fast",
    };
    format!("u {:.1}, {height}, {pace}", w.u_deg)
}

/// The wing to stand on for a relative bearing; within ten degrees of ahead or astern, either.
fn wing(relative_deg: f64) -> &'static str {
    match relative_deg {
        r if !(10.0..=350.0).contains(&r) => "ahead",
        r if (170.0..=190.0).contains(&r) => "astern",
        r if r < 180.0 => "starboard wing",
        _ => "port wing",
    }
}

/// The answer to "which body is that?", as text.
pub fn candidates_text(utc: UtcInstant, bearing: TrueBearing, tolerance_deg: f64, candidates: &[Candidate]) -> String {
    let mut page = Column::default();
    page.sentence(&format!("Bodies within {tolerance_deg} degrees of {} true, {}", direction(bearing.deg(), 1), words::when(utc, None)));
    if candidates.is_empty() {
        page.sentence("None of the sun, moon, navigational planets and stars stands there.");
        return page.finish();
    }
    page.sentence(&format!(
        "{:<18}{:>8}{:>10}{:>13}{:>14}{:>11}",
        "body", "azimuth", "altitude", "azimuth off", "altitude off", "magnitude"
    ));
    for c in candidates {
        let altitude_off = c.altitude_off_deg.map_or_else(String::new, |a| format!("{:+.1}", a + 0.0));
        let magnitude = c.body.magnitude().map_or_else(String::new, |m| format!("{m:.1}"));
        page.sentence(&format!(
            "{:<18}{:>8}{:>10.1}{:>13}{altitude_off:>14}{magnitude:>11}",
            c.body.name(),
            direction(c.azimuth.deg(), 1),
            c.altitude_deg + 0.0,
            format!("{:+.1}", c.azimuth_off_deg + 0.0)
        ));
    }
    page.finish()
}

/// The same as JSON.
pub fn candidates_json(candidates: &[Candidate]) -> String {
    let degrees = |x: f64| (x * 10_000.0).round() / 10_000.0 + 0.0;
    let list: Vec<Value> = candidates
        .iter()
        .map(|c| {
            json!({"body": c.body.name(), "azimuth": degrees(c.azimuth.deg()), "altitude": degrees(c.altitude_deg),
                "azimuth_off": degrees(c.azimuth_off_deg), "altitude_off": c.altitude_off_deg.map(degrees), "off": degrees(c.off_deg())})
        })
        .collect();
    json!({ "candidates": list }).to_string()
}
