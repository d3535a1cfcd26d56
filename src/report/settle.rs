//! What is said of a run-up.

use super::column::Column;
use super::rows::push_csv_text;
use super::words;
use crate::angle::Latitude;
use crate::angle::text::write::low_high;
use crate::compass::gyro::settle::{Assessment, Held, NotYet, Settled, Why, standard};
use crate::limits::Limits;
use crate::logbook::runup::RunUp;
use crate::notice::Notice;
use crate::time::UtcInstant;
use crate::time::text::write::{iso, to_the_minute};
use serde_json::{Value, json};

/// A run-up with its verdict.
#[derive(Debug, Clone, Copy)]
pub struct SettlePage<'a> {
    /// The readings.
    pub run_up: &'a RunUp,
    /// What is made of them.
    pub found: &'a Assessment,
    /// Where, if it was said.
    pub latitude: Option<Latitude>,
    /// The limits it was held to.
    pub limits: &'a Limits,
}

impl SettlePage<'_> {
    fn at(&self, minutes: f64) -> Option<UtcInstant> {
        self.run_up.start?.plus_seconds(minutes * 60.0).ok()
    }

    /// `2027-03-04 08:58 UTC`.
    pub(super) fn clock(&self, minutes: f64) -> String {
        self.at(minutes).map_or_else(|| format!("minute {minutes:.0}"), |utc| format!("{} UTC", to_the_minute(utc)))
    }

    fn last_min(&self) -> f64 {
        self.run_up.readings.last().map_or(0.0, |r| r.minutes)
    }

    /// The verdict in one sentence.
    pub fn verdict(&self) -> String {
        let band = standard::BAND_DEG;
        match self.found.settled {
            Settled::Since { minutes } => {
                format!("Settled: within {band} degrees of its settle point since {}.", self.clock(minutes))
            }
            Settled::NotYet(wanting) => self.not_yet(wanting),
            Settled::CannotTell(why) => format!("It cannot be told yet: {}", why_words(why)),
        }
    }

    fn not_yet(&self, wanting: NotYet) -> String {
        let band = standard::BAND_DEG;
        let (early, late) = self.found.within_band_min.unwrap_or_default();
        let when = if early == late {
            self.clock(late)
        } else {
            format!("{}, or, as a last swing comes near that edge, {}", self.clock(early), self.clock(late))
        };
        match wanting {
            NotYet::Swinging => format!("Not yet: it is expected to stay within {band} degrees of its settle point from {when}."),
            NotYet::NotShown => format!(
                "Not yet shown: by its swing it stays within {band} degrees from {when}, and readings over an hour, half an hour apart, must show it."
            ),
            NotYet::LastReadingsOff { readings: 1 } => {
                "Not shown: the last reading is off. Was it misread, or has the gyro been disturbed? Take another.".to_owned()
            }
            NotYet::LastReadingsOff { readings } => {
                format!("Not settled: the last {readings} readings are all off what was expected. Has the gyro been disturbed since?")
            }
            NotYet::DoesNotDieAway => "Not yet: its swing does not die away within a day. Is the damping working?".to_owned(),
        }
    }

    /// The page as text.
    pub fn text(&self) -> String {
        let mut page = Column::default();
        page.sentence(&self.opening());
        for remark in self.remarks() {
            page.sentence(&remark);
        }
        page.gap();
        page.sentence(&self.verdict());
        page.gap();
        self.figures(&mut page);
        self.readings_to_come(&mut page);
        page.gap();
        for sentence in self.standards() {
            page.sentence(&sentence);
        }
        page.finish()
    }

    /// How many readings, from when, over how long.
    pub(super) fn opening(&self) -> String {
        let (n, minutes) = (self.run_up.readings.len(), self.last_min());
        match self.run_up.start {
            Some(_) => format!("{} from {} over {minutes:.0} minutes", readings(n), self.clock(0.0)),
            None => "No reading of the gyro".to_owned(),
        }
    }

    /// What there is to say of the rows themselves.
    pub(super) fn remarks(&self) -> Vec<String> {
        let mut said = Vec::new();
        if self.run_up.sorted {
            said.push("The rows stood in another order and were put in order of time.".to_owned());
        }
        if !self.run_up.copies.is_empty() {
            let rows: Vec<String> = self.run_up.copies.iter().take(SHOWN).map(ToString::to_string).collect();
            let more = if self.run_up.copies.len() > SHOWN { ", and more" } else { "" };
            said.push(format!("Rows that are copies of an earlier one were left out: {}{more}.", rows.join(", ")));
        }
        if !self.run_up.same_time.is_empty() {
            let pairs: Vec<String> = self.run_up.same_time.iter().take(SHOWN).map(|(a, b)| format!("{a} and {b}")).collect();
            let more = if self.run_up.same_time.len() > SHOWN { ", and more" } else { "" };
            said.push(format!("Rows {}{more} have the same time and different readings. Is one of the times wrong?", pairs.join(", ")));
        }
        said
    }

    fn figures(&self, page: &mut Column) {
        if let Some((point, u)) = self.found.settle_point {
            page.line("settle point", &low_high(point), &words::u(u));
        }
        if let Some(swing) = &self.found.swing {
            page.line("period", &format!("{:.1} min", swing.period_min), &words::u(swing.period_u_min));
            let ratio_u = swing.half_swing_ratio_u;
            page.line(
                "half swings go down to",
                &format!("{:.2}", swing.half_swing_ratio),
                &format!("of the one before, u {:.3}", ratio_u.max(0.001)),
            );
            page.line(
                "damping",
                &format!("{:.0} %", 100.0 * (1.0 - swing.half_swing_ratio)),
                &format!("of each half swing, {}", words::u(100.0 * ratio_u)),
            );
            page.line("readings scatter by", &format!("{:.2}", swing.scatter_deg), "degrees about the swing");
        }
        for (row, off) in self.found.set_aside.iter().take(SHOWN) {
            page.sentence(&format!("Row {row} was set aside: it is {:.1} degrees off. Was it misread?", off.abs()));
        }
        let more = self.found.set_aside.len().saturating_sub(SHOWN);
        if more > 0 {
            page.sentence(&format!("So were {more} more; --format csv names each."));
        }
    }

    fn readings_to_come(&self, page: &mut Column) {
        if self.found.to_come.is_empty() {
            return;
        }
        page.gap();
        page.sentence("Readings to come, if it goes on as it does:");
        for reading in &self.found.to_come {
            page.line(&self.clock(reading.minutes), &low_high(reading.error_deg), &words::u(reading.u_deg));
        }
    }

    /// What the performance standards say of it.
    pub(super) fn standards(&self) -> Vec<String> {
        let mut said = Vec::new();
        let verdict = |held: Held| match held.inside {
            Some(true) => "is inside",
            Some(false) => "is over",
            None => "may be over",
        };
        if let Some(held) = self.found.settle_point_held {
            said.push(format!("The settle point {} the {:.2} degrees allowed at that latitude.", verdict(held), held.limit_deg));
        }
        if let (Some(held), Some((sd, count))) = (self.found.scatter_held, self.found.scatter) {
            let limit = held.limit_deg;
            said.push(format!(
                "Once settled, {} scatter by {sd:.2} degrees, which {} the {limit:.2} allowed at that latitude{}.",
                readings(count),
                verdict(held),
                if count < STANDARD_READINGS { "; the standard takes ten, 20 minutes apart" } else { "" }
            ));
        }
        if let Some(latitude) = self.latitude.filter(|lat| lat.deg().abs() > self.limits.thresholds.gyro_doubtful_latitude_deg) {
            said.push(format!("At {}.", Notice::GyroDoubtful { latitude_deg: latitude.deg() }));
        }
        if self.found.too_slow {
            said.push(format!("It takes longer than the {} hours allowed.", self.limits.thresholds.gyro_settles_within_h));
        }
        said
    }

    /// One object; keys are fixed.
    pub fn json(&self) -> String {
        let number = |x: Option<f64>| x.map_or(Value::Null, |x| json!(rounded(x)));
        let swing = self.found.swing.as_ref();
        let instant = |minutes: f64| self.at(minutes).map_or(Value::Null, |utc| Value::from(iso(utc)));
        let settled = match self.found.settled {
            Settled::Since { .. } => "yes",
            Settled::NotYet(_) => "not-yet",
            Settled::CannotTell(_) => "cannot-tell",
        };
        let since = if let Settled::Since { minutes } = self.found.settled { instant(minutes) } else { Value::Null };
        let expected = match self.found.within_band_min {
            None => Value::Null,
            Some((early, late)) if early == late => instant(late),
            Some((early, late)) => json!([instant(early), instant(late)]),
        };
        let set_aside: Vec<Value> = self.found.set_aside.iter().map(|(row, off)| json!({"row": row, "residual": rounded(*off)})).collect();
        let mut notices = vec![self.verdict()];
        notices.extend(self.remarks());
        notices.extend(self.standards());
        notices.extend(self.run_up.problems.iter().cloned());
        json!({
            "settled": settled,
            "settled_since": since,
            "expected_settled": expected,
            "settle_point": number(self.found.settle_point.map(|p| p.0)),
            "settle_point_u": number(self.found.settle_point.map(|p| p.1)),
            "period_min": number(swing.map(|s| s.period_min)),
            "period_min_u": number(swing.map(|s| s.period_u_min)),
            "half_swing_ratio": number(swing.map(|s| s.half_swing_ratio)),
            "half_swing_ratio_u": number(swing.map(|s| s.half_swing_ratio_u)),
            "damping_percent": number(swing.map(|s| 100.0 * (1.0 - s.half_swing_ratio))),
            "scatter": number(self.found.scatter.map(|s| s.0).or(swing.map(|s| s.scatter_deg))),
            "set_aside": set_aside,
            "notices": notices,
        })
        .to_string()
    }

    /// The readings as rows, each with what is expected of it; then those to come, without a row number.
    pub fn csv(&self) -> String {
        let mut out = b"row,utc,gyro_error,expected,expected_u,off,set_aside\n".to_vec();
        let swing = self.found.swing.as_ref();
        let two = |x: Option<f64>| x.map_or_else(String::new, |x| format!("{:.2}", (x * 100.0).round() / 100.0 + 0.0));
        let mut push = |row: Option<usize>, minutes: f64, error: Option<f64>, expected: Option<(f64, f64)>, aside: bool| {
            let row = row.map_or_else(String::new, |row| row.to_string());
            out.extend_from_slice(row.as_bytes());
            out.push(b',');
            push_csv_text(&mut out, &self.at(minutes).map_or_else(String::new, iso), b',');
            let off = error.zip(expected).map(|(error, (expected, _))| error - expected);
            let figures = format!(",{},{},{},{},", two(error), two(expected.map(|e| e.0)), two(expected.map(|e| e.1)), two(off));
            out.extend_from_slice(figures.as_bytes());
            out.extend_from_slice(if aside { b"yes\n" } else { b"\n" });
        };
        for r in &self.run_up.readings {
            let by_swing = swing.map(|s| (s.error_deg(r.minutes), s.error_u_deg(r.minutes)));
            let aside = self.found.set_aside.iter().any(|(row, _)| *row == r.row);
            push(Some(r.row), r.minutes, Some(r.error_deg), by_swing.or(self.found.settle_point), aside);
        }
        for r in &self.found.to_come {
            push(None, r.minutes, None, Some((r.error_deg, r.u_deg)), false);
        }
        String::from_utf8_lossy(&out).into_owned()
    }
}

/// So many rows are named in a sentence.
const SHOWN: usize = 5;

/// The standard judges the scatter by so many readings.
const STANDARD_READINGS: usize = 10;

fn rounded(x: f64) -> f64 {
    (x * 10_000.0).round() / 10_000.0 + 0.0
}

fn readings(n: usize) -> String {
    if n == 1 { "1 reading".to_owned() } else { format!("{n} readings") }
}

fn why_words(why: Why) -> String {
    match why {
        Why::TooShort { readings: 0, .. } => "there is no reading of the gyro.".to_owned(),
        Why::TooShort { readings: n, minutes } => format!(
            "{} over {minutes:.0} minutes {} too little to know the swing by; take one each ten minutes, over a whole period.",
            readings(n),
            if n == 1 { "is" } else { "are" }
        ),
        Why::NeverMoves => "every reading is the same. Does the repeater follow, and is the gyro running?".to_owned(),
        Why::MovesEvenly { deg_per_h } => {
            let to = if deg_per_h < 0.0 { "west" } else { "east" };
            format!(
                "the error moves evenly, {:.1} degrees an hour to the {to}, and does not swing. Is the gyro seeking north?",
                deg_per_h.abs()
            )
        }
        Why::OnlyScatters { scatter_deg } => {
            format!(
                "the readings only scatter, by {scatter_deg:.1} degrees, and show neither a swing nor rest. Is the repeater steady, and was the ship?"
            )
        }
        Why::NoSwing { scatter_deg: Some(scatter) } => {
            format!(
                "no damped swing goes through the readings, the best one leaves {scatter:.1} degrees. Was the ship turning, or the gyro restarted?"
            )
        }
        Why::NoSwing { scatter_deg: None } => {
            "no damped swing of a gyro goes through the readings. Was the ship turning, or the gyro restarted?".to_owned()
        }
    }
}
