//! What is said of a run-up.

use super::column::Column;
use super::words;
use crate::angle::text::write::low_high;
use crate::compass::gyro::settle::{Assessment, Settled, Why, standard};
use crate::logbook::runup::RunUp;
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
}

impl SettlePage<'_> {
    fn at(&self, minutes: f64) -> UtcInstant {
        self.run_up.start.plus_seconds(minutes * 60.0).unwrap_or(self.run_up.start)
    }

    fn last_min(&self) -> f64 {
        self.run_up.readings.last().map_or(0.0, |r| r.minutes)
    }

    /// The verdict in one sentence.
    pub fn verdict(&self) -> String {
        let band = standard::BAND_DEG;
        match self.found.settled {
            Settled::Since { minutes } => {
                format!("Settled: within {band} degrees of its settle point since {} UTC.", to_the_minute(self.at(minutes)))
            }
            Settled::NotYet => match self.found.within_band_min {
                Some((early, late)) if early == late && late <= self.last_min() => {
                    format!(
                        "Not yet shown: by its swing within {band} degrees since {} UTC, but readings over an hour, half an hour apart, must show it.",
                        to_the_minute(self.at(late))
                    )
                }
                Some((early, late)) if early == late => {
                    format!("Not yet: it is expected within {band} degrees from {} UTC.", to_the_minute(self.at(late)))
                }
                Some((early, late)) => format!(
                    "Not yet: it is expected within {band} degrees from {} UTC, or, as a last swing comes near that edge, from {} UTC.",
                    to_the_minute(self.at(early)),
                    to_the_minute(self.at(late))
                ),
                None => "Not yet.".to_owned(),
            },
            Settled::CannotTell(why) => format!("It cannot be told yet: {}.", why_words(why)),
        }
    }

    /// The page as text.
    pub fn text(&self) -> String {
        let mut page = Column::default();
        let n = self.run_up.readings.len();
        page.sentence(&format!("{n} readings from {} UTC over {:.0} minutes", to_the_minute(self.run_up.start), self.last_min()));
        if self.run_up.sorted {
            page.sentence("The rows stood in another order and were put in order of time.");
        }
        page.gap();
        page.sentence(&self.verdict());
        page.gap();
        self.figures(&mut page);
        for sentence in self.standards() {
            page.sentence(&sentence);
        }
        page.finish()
    }

    fn figures(&self, page: &mut Column) {
        if let Some((point, u)) = self.found.settle_point {
            page.line("settle point", &low_high(point), &words::u(u));
        }
        if let Some(swing) = &self.found.swing {
            page.line("period", &format!("{:.1} min", swing.period_min), &format!("u {:.1}", swing.period_u_min));
            page.line(
                "half swings go down to",
                &format!("{:.2}", swing.half_swing_ratio),
                &format!("of the one before, u {:.3}", swing.half_swing_ratio_u),
            );
            page.line("damping", &format!("{:.0} %", 100.0 * (1.0 - swing.half_swing_ratio)), "of each half swing");
            page.line("readings scatter by", &format!("{:.2}", swing.scatter_deg), "degrees about the swing");
            for (row, off) in &swing.set_aside {
                page.sentence(&format!("Row {row} was set aside: it is {:.1} degrees off the swing. Was it misread?", off.abs()));
            }
        }
        page.gap();
    }

    /// What the performance standards say of it.
    fn standards(&self) -> Vec<String> {
        let mut said = Vec::new();
        if let Some((limit, inside)) = self.found.settle_point_limit {
            said.push(match inside {
                Some(true) => format!("The settle point is inside the standard's {limit:.2} degrees for that latitude."),
                Some(false) => format!("The settle point is over the standard's {limit:.2} degrees for that latitude."),
                None => format!("The settle point may be over the standard's {limit:.2} degrees for that latitude."),
            });
        }
        if let Some((limit, inside)) = self.found.scatter_limit {
            let verdict = if inside { "inside" } else { "over" };
            said.push(format!(
                "Once settled the readings scatter by {:.2}, {verdict} the standard's {limit:.2} for that latitude.",
                self.found.scatter_deg.unwrap_or(0.0)
            ));
        }
        if self.found.too_slow {
            said.push(format!("It takes longer than the {} hours of the standard.", standard::WITHIN_H));
        }
        said
    }

    /// One object; keys are fixed.
    pub fn json(&self) -> String {
        let rounded = |x: f64| (x * 10_000.0).round() / 10_000.0 + 0.0;
        let number = |x: Option<f64>| x.map_or(Value::Null, |x| json!(rounded(x)));
        let swing = self.found.swing.as_ref();
        let instant = |minutes: f64| Value::from(iso(self.at(minutes)));
        let settled = match self.found.settled {
            Settled::Since { .. } => "yes",
            Settled::NotYet => "not-yet",
            Settled::CannotTell(_) => "cannot-tell",
        };
        let since = if let Settled::Since { minutes } = self.found.settled { instant(minutes) } else { Value::Null };
        let expected = match self.found.within_band_min {
            None => Value::Null,
            Some((early, late)) if early == late => instant(late),
            Some((early, late)) => json!([instant(early), instant(late)]),
        };
        let set_aside: Vec<Value> =
            swing.map_or_else(Vec::new, |s| s.set_aside.iter().map(|(row, off)| json!({"row": row, "residual": rounded(*off)})).collect());
        let mut notices = vec![self.verdict()];
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
            "scatter": number(self.found.scatter_deg.or(swing.map(|s| s.scatter_deg))),
            "set_aside": set_aside,
            "notices": notices,
        })
        .to_string()
    }
}

fn why_words(why: Why) -> String {
    match why {
        Why::TooShort { readings, minutes } => {
            format!(
                "{readings} readings over {minutes:.0} minutes are too few to know the swing by; take more, ten minutes apart, over a whole period"
            )
        }
        Why::NeverMoves => "every reading is the same; does the repeater follow, and is the gyro running?".to_owned(),
        Why::MovesEvenly { deg_per_h } => {
            format!(
                "it moves evenly, {:.1} degrees an hour to the {}, and does not swing",
                deg_per_h.abs(),
                if deg_per_h < 0.0 { "west" } else { "east" }
            )
        }
        Why::NoSwing { scatter_deg: Some(scatter) } => {
            format!("no damped swing goes through the readings, the best one leaves {scatter:.1} degrees; was the ship turning?")
        }
        Why::NoSwing { scatter_deg: None } => "no damped swing of a gyro goes through the readings; was the ship turning?".to_owned(),
    }
}
