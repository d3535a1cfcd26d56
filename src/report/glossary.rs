//! Every id that a reviewed row or a vessel can carry, with what it means: the list that the command and the README show.

use super::rows::push_csv_text;
use crate::limits::{Limits, SETTINGS, Setting};
use crate::review::{PatternId, Slip};
use std::fmt::Write as _;

/// One id.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Word {
    /// Where it stands: the column, or the summary's list.
    pub list: List,
    /// The id.
    pub id: String,
    /// When it is said.
    pub when: String,
    /// Keys of the limits file that set its threshold.
    pub keys: &'static [&'static str],
}

/// Where an id stands.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum List {
    /// The column `queries`.
    Query,
    /// The column `notices`.
    Notice,
    /// The summary's patterns of a vessel; in the column `notices` of the rows that they explain.
    Pattern,
    /// The column `slip`.
    Slip,
}

impl List {
    const ALL: [Self; 4] = [Self::Query, Self::Notice, Self::Pattern, Self::Slip];

    /// In one word.
    pub fn word(self) -> &'static str {
        match self {
            Self::Query => "query",
            Self::Notice => "notice",
            Self::Pattern => "pattern",
            Self::Slip => "slip",
        }
    }

    fn heading(self) -> &'static str {
        match self {
            Self::Query => "Queries on a row: it needs an explanation",
            Self::Notice => "Notices on a row: done, but less surely, or worth a look",
            Self::Pattern => "Patterns of a vessel, in the summary and as a notice on the rows that they explain",
            Self::Slip => "Slips: could ...",
        }
    }
}

type Told = (&'static str, &'static str, &'static [&'static str]);

const QUERIES: [Told; 15] = [
    ("below-horizon", "the body is under the horizon at the time written", &["below_horizon"]),
    ("not-dark", "a star or planet by day", &["not_dark_bright", "not_dark_faint"]),
    ("too-high", "the body stands too high for a bearing", &["too_high"]),
    ("azimuth-differs", "the logged azimuth is not the recomputed one, by more than its step and 3 u", &["azimuth_differs"]),
    ("arithmetic", "a logged error is not what its own parts give, by more than their steps", &["arithmetic"]),
    ("gyro-out-of-run", "the gyro error is off this gyro's run", &["gyro_out_of_run", "out_of_run_sigma"]),
    ("off-card", "the deviation is off the card, or else off the fitted curve", &["off_card", "off_card_once", "out_of_run_sigma"]),
    ("variation-differs", "the logged variation is not the field model's, by more than 2 u", &["variation_differs"]),
    (
        "far-from-horizon",
        "at the time written the body was far from the horizon stated, or rising and setting are exchanged, or it never gets there",
        &["far_from_horizon"],
    ),
    ("too-far-too-soon", "the position cannot have been reached from the entries on either side", &["max_speed_kn", "too_far_margin_nm"]),
    ("out-of-order", "the row whose removal restores the order of time", &[]),
    ("repeat", "a copy of one of the vessel's last 64 rows", &[]),
    ("over-limit", "the error is over its limit by more than 2 u", &["gyro_settle", "gyro_margin", "deviation"]),
    ("card-out-of-date", "the deviation card in force is too old", &["card_months"]),
    ("reason-doubtful", "the sky contradicts the reason given for no observation; cloud is never contradicted", &[]),
];

const NOTICES: [Told; 14] = [
    ("high", "the body stands high: tilt of the instrument counts", &["altitude_weak"]),
    ("horizon-weak", "on the horizon, a small error of altitude moves the azimuth much", &["horizon_weak"]),
    ("eye-height-assumed", "no height of eye was given on the visible horizon", &["eye_height_assumed"]),
    ("after-turn", "soon after an alteration the gyro may be settling", &["alteration", "after_turn_h"]),
    ("heeled", "the ship was heeled", &["heeled"]),
    ("at-berth", "alongside, steel ashore pulls the compass", &[]),
    ("weak-field", "the horizontal field is weak", &["weak_field_nt"]),
    ("no-compass", "the horizontal field is so weak that a magnetic compass does not point", &[]),
    ("zone-odd", "the zone does not fit the longitude", &["zone_odd_h"]),
    ("model-ended", "past the last day of the field model, with growing uncertainty", &[]),
    ("may-be-over-limit", "over a limit, by less than 2 u", &["gyro_settle", "gyro_margin", "deviation"]),
    ("gyro-error-from-run", "the true heading is from the run of the gyro, not from a bearing of this row", &[]),
    ("venus-by-day", "Venus by day: keen eyes find her", &[]),
    ("gyro-doubtful", "so near a pole a gyro is doubtful", &["gyro_doubtful_latitude"]),
];

fn pattern(id: PatternId) -> (&'static str, &'static [&'static str]) {
    match id {
        PatternId::SameSlipThroughout => ("one slip explains nearly all affected rows", &[]),
        PatternId::GyroStep => ("the gyro error jumps at an instant", &[]),
        PatternId::SpeedCorrectorOff => ("the gyro error follows V cos C / cos latitude", &[]),
        PatternId::LatitudeCorrectorOff => ("the gyro error follows tan latitude", &[]),
        PatternId::RepeaterDiffers => ("repeaters disagree, or the sides of the ship", &["repeater_differs"]),
        PatternId::AzimuthCircleTilt => ("the error grows with tan altitude", &[]),
        PatternId::ConstantA => ("the deviation is off by a constant on every heading", &["constant_a_card", "constant_a"]),
        PatternId::VariationStale => ("the logged variation is of an older year, or off by a constant", &["variation_stale"]),
        PatternId::VisibleHorizon => ("risings and settings were taken on the visible horizon", &[]),
        PatternId::TooRegular => ("the recomputed errors scatter less than readings can", &["too_regular_entries"]),
        PatternId::WatchesWithoutEntry => ("watches under way have no entry", &["watches_missing"]),
    }
}

/// Every id, list by list.
pub fn words() -> Vec<Word> {
    let told = |list, words: &[Told]| -> Vec<Word> {
        words.iter().map(|(id, when, keys)| Word { list, id: (*id).to_owned(), when: (*when).to_owned(), keys }).collect()
    };
    let mut all = told(List::Query, &QUERIES);
    all.extend(told(List::Notice, &NOTICES));
    all.extend(PatternId::ALL.map(|id| {
        let (when, keys) = pattern(id);
        Word { list: List::Pattern, id: id.id().to_owned(), when: when.to_owned(), keys }
    }));
    all.extend(Slip::ALL.map(|slip| {
        let id = if slip.id() == "body" { "body:NAME".to_owned() } else { slip.id().to_owned() };
        Word { list: List::Slip, id, when: slip.words().to_owned(), keys: &[] }
    }));
    all
}

/// What sets the threshold of a word, with the values in force: `over 0.5 degrees (azimuth_differs)` without the first word.
fn set_by(word: &Word, limits: &Limits) -> String {
    let setting = |key: &&str| SETTINGS.iter().find(|s: &&Setting| s.key == *key);
    let value = |s: &Setting| format!("{} = {} {}", s.key, (s.get)(limits), s.unit).trim_end().to_owned();
    word.keys.iter().filter_map(setting).map(value).collect::<Vec<_>>().join("; ")
}

/// As text.
pub fn text(limits: &Limits) -> String {
    let mut text = String::new();
    for list in List::ALL {
        let _ = writeln!(text, "{}{}", if text.is_empty() { "" } else { "\n" }, list.heading());
        for word in words().iter().filter(|w| w.list == list) {
            let _ = writeln!(text, "  {:<24}{}", word.id, word.when);
            let set_by = set_by(word, limits);
            if !set_by.is_empty() {
                let _ = writeln!(text, "  {:<24}{set_by}", "");
            }
        }
    }
    text
}

/// As a list of objects.
pub fn json(limits: &Limits) -> String {
    let object = |word: Word| {
        let setting = |key: &&str| SETTINGS.iter().find(|s: &&Setting| s.key == *key);
        let values = word.keys.iter().filter_map(setting).map(|s| (s.key.to_owned(), serde_json::json!((s.get)(limits))));
        let values: serde_json::Map<String, serde_json::Value> = values.collect();
        serde_json::json!({"list": word.list.word(), "id": word.id, "when": word.when, "limits": values})
    };
    serde_json::Value::Array(words().into_iter().map(object).collect()).to_string()
}

/// As rows.
pub fn csv(limits: &Limits) -> String {
    let mut out = b"list,id,when,limits\n".to_vec();
    for word in words() {
        for (at, text) in [word.list.word(), &word.id, &word.when, &set_by(&word, limits)].into_iter().enumerate() {
            if at > 0 {
                out.push(b',');
            }
            push_csv_text(&mut out, text, b',');
        }
        out.push(b'\n');
    }
    String::from_utf8_lossy(&out).into_owned()
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The ids that a source file gives in its function `id`.
    fn ids(source: &str) -> Vec<&str> {
        let body = source.split("pub fn id(").nth(1).and_then(|rest| rest.split("\n    }\n").next()).unwrap();
        body.lines().filter_map(|line| line.split("=> \"").nth(1)?.split('"').next()).collect()
    }

    #[test]
    fn every_id_is_told() {
        let told = |list| words().into_iter().filter(|w| w.list == list).map(|w| w.id.replace("body:NAME", "body")).collect::<Vec<_>>();
        assert_eq!(told(List::Query), ids(include_str!("../review/query.rs")));
        assert_eq!(told(List::Slip), ids(include_str!("../review/slip.rs")));
        assert_eq!(told(List::Pattern), ids(include_str!("../review/pattern.rs")));
        let notices = ids(include_str!("../notice.rs"));
        assert!(told(List::Notice).iter().all(|id| notices.contains(&id.as_str())));
        let keys: Vec<&str> = words().iter().flat_map(|w| w.keys).copied().collect();
        assert!(keys.iter().all(|key| SETTINGS.iter().any(|s| s.key == *key)) && keys.len() > 20);
    }
}
