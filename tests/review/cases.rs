//! One thing at a time put into a clean log, and what the review says of it.

use super::read::{Read, read, review, review_in};
use crate::generator::{Columns, Kind, Log, Rng, Ship, Style, csv};
use shadowpin::limits::Limits;
use shadowpin::review::{CardFigure, Fleet, Place, Summary, Tally, Verdict};
use shadowpin::sky::{Body, Planet};
use shadowpin::time::UtcInstant;

/// A clean log of one vessel.
fn clean(seed: u64, style: Style) -> Vec<Read> {
    let ship = Ship::draw("Saltmarsh", Kind::Good, (-50.0, 50.0), &mut Rng::new(seed));
    read(&csv(&Log::of(&[ship], Style { slips: 0.0, ..style }, false), Columns::default()))
}

fn usual() -> Vec<Read> {
    clean(7, Style::default())
}

fn ids(verdict: &Verdict) -> Vec<&'static str> {
    verdict.queries.iter().map(|q| q.id()).collect()
}

/// Rows with a query.
fn queried(verdicts: &[Verdict]) -> Vec<usize> {
    verdicts.iter().enumerate().filter(|(_, v)| !v.queries.is_empty()).map(|(i, _)| i).collect()
}

/// The first row from `from` on for which `what` holds.
fn find(rows: &[Read], from: usize, what: impl Fn(&Read) -> bool) -> usize {
    (from..rows.len()).find(|&i| what(&rows[i])).unwrap()
}

fn of_the_sun(row: &Read) -> bool {
    row.observation.is_some_and(|o| o.target == shadowpin::compass::Target::Body(Body::Sun))
}

fn later(row: &mut Read, seconds: f64) {
    let moment = row.moment.as_mut().unwrap();
    moment.utc = moment.utc.plus_seconds(seconds).unwrap();
    if let Some(observation) = &mut row.observation {
        observation.moment = row.moment;
    }
}

fn summary(fleet: &Fleet) -> Summary {
    Summary::of(fleet, &Tally::default())
}

#[test]
fn a_clean_log_raises_nothing_and_shows_what_was_not_judged() {
    let rows = usual();
    let (fleet, verdicts) = review(&rows, &Limits::default());
    assert_eq!(queried(&verdicts), [0_usize; 0]);
    let summary = summary(&fleet);
    assert!(summary.vessels[0].patterns.is_empty());
    let few = &rows[..20];
    let (fleet, _) = review(few, &Limits::default());
    let not: Vec<&str> = self::summary(&fleet).vessels[0].not_evaluated.iter().map(|n| n.id).collect();
    assert!(not.contains(&"too-regular") && not.contains(&"watches-without-entry"), "{not:?}");
}

#[test]
fn a_copied_row_is_a_repeat_and_the_first_is_not() {
    let mut rows = usual();
    let at = find(&rows, 100, of_the_sun);
    let mut copy = rows[at].clone();
    copy.number = 0;
    rows.insert(at + 3, copy);
    for (i, row) in rows.iter_mut().enumerate() {
        row.number = i as u64 + 1;
    }
    let (_, verdicts) = review(&rows, &Limits::default());
    assert_eq!(queried(&verdicts), [at + 3]);
    assert!(ids(&verdicts[at + 3]).contains(&"repeat"));
}

#[test]
fn a_wrong_date_is_out_of_order_and_only_that_row() {
    for seconds in [-86_400.0, 86_400.0, 40.0 * 86_400.0] {
        let mut rows = usual();
        let at = find(&rows, 120, of_the_sun);
        later(&mut rows[at], seconds);
        let (_, verdicts) = review(&rows, &Limits::default());
        assert_eq!(queried(&verdicts), [at], "{seconds}");
        assert!(ids(&verdicts[at]).contains(&"out-of-order"), "{seconds}");
        // A day out cannot be seen in the sun's azimuth; the order says it.
        if seconds == 86_400.0 {
            assert_eq!(verdicts[at].slips[0].slip.id(), "day+1");
            assert_eq!(verdicts[at].slips[0].place, Place::Record);
        }
    }
}

#[test]
fn a_reason_is_doubted_only_where_the_sky_contradicts_it() {
    let mut rows = usual();
    let night = find(&rows, 50, |r| r.observation.is_some_and(|o| matches!(o.target, shadowpin::compass::Target::Body(Body::Star(_)))));
    for (remarks, doubted) in [("sun too high", true), ("overcast", false), ("Sun below horizon", false), ("", false)] {
        rows[night].observation = None;
        rows[night].logged = Default::default();
        rows[night].remarks = remarks.to_owned();
        let (_, verdicts) = review(&rows, &Limits::default());
        assert_eq!(!verdicts[night].queries.is_empty(), doubted, "{remarks}");
    }
    let day = find(&rows, 50, of_the_sun);
    rows[day].observation = None;
    rows[day].remarks = "sun not up".to_owned();
    let (_, verdicts) = review(&rows, &Limits::default());
    assert_eq!(ids(&verdicts[day]), ["reason-doubtful"]);
}

#[test]
fn a_star_by_day_is_asked_about_and_venus_only_noticed() {
    let mut rows = usual();
    let at = find(&rows, 50, of_the_sun);
    for (body, asked) in [(Body::from_name("Spica").unwrap(), true), (Body::Planet(Planet::Venus), false)] {
        rows[at].observation.as_mut().unwrap().target = shadowpin::compass::Target::Body(body);
        let (_, verdicts) = review(&rows, &Limits::default());
        assert_eq!(ids(&verdicts[at]).contains(&"not-dark"), asked, "{}", body.name());
        assert_eq!(verdicts[at].notices.iter().any(|n| n.id() == "venus-by-day"), !asked);
        assert!(verdicts[at].slips.iter().any(|s| s.slip.to_string() == "body:Sun"), "{:?}", verdicts[at].slips);
    }
}

#[test]
fn one_row_in_ten_moves_neither_run_nor_curve() {
    let rows = usual();
    let mut spoilt = rows.clone();
    for row in spoilt.iter_mut().filter(|r| r.number % 10 == 3) {
        if let Some(observation) = &mut row.observation {
            for bearing in observation.gyro_bearing.iter_mut() {
                *bearing = bearing.map(|b| b.reciprocal());
            }
            for bearing in observation.compass_bearing.iter_mut() {
                *bearing = bearing.map(|b| shadowpin::angle::CompassBearing::wrapping_deg(b.deg() + 40.0));
            }
        }
    }
    let limits = Limits::default();
    let (a, b) = (summary(&review(&rows, &limits).0), summary(&review(&spoilt, &limits).0));
    let gyro = |s: &Summary| s.vessels[0].gyros[0].mean_gyro_error.unwrap();
    assert!((gyro(&a) - gyro(&b)).abs() < 0.05, "{} {}", gyro(&a), gyro(&b));
    for (name, value) in &a.vessels[0].compasses[0].coefficients {
        let other = b.vessels[0].compasses[0].coefficients[name];
        if let (Some(value), Some(other)) = (value, other) {
            assert!((value - other).abs() < 0.25, "{name} {value} {other}");
        }
    }
}

#[test]
fn rows_may_be_judged_in_any_order() {
    let ship = Ship::draw("Saltmarsh", Kind::Step, (-50.0, 50.0), &mut Rng::new(3));
    let rows = read(&csv(&Log::of(&[ship], Style { slips: 0.1, ..Style::default() }, false), Columns::default()));
    let limits = Limits::default();
    let (fleet, verdicts) = review(&rows, &limits);
    for row in rows.iter().rev() {
        let again = row.with(Some(&fleet), &limits, |r| shadowpin::review::judge(r, &fleet));
        assert_eq!(again, verdicts[row.number as usize - 1]);
    }
}

#[test]
fn a_card_is_held_against_its_own_rules() {
    let limits = Limits::default();
    let rows = usual();
    let (fleet, _) = review(&rows, &limits);
    let a = summary(&fleet).vessels[0].compasses[0].coefficients["A"].unwrap();
    // A card that is right to a degree, made 30 months before: out of date, and nothing else.
    let card = |off: f64, age: f64| move |row: &Read| row.observation.map(|_| CardFigure { deviation_deg: a + off, age_months: Some(age) });
    let (_, verdicts) = review_in(&rows, &limits, card(0.0, 30.0));
    let with: Vec<usize> = queried(&verdicts);
    assert!(!with.is_empty());
    assert!(with.iter().all(|&i| ids(&verdicts[i]).contains(&"card-out-of-date")));
    // Off by 2.5 on every heading: one pattern, not a query a row.
    let (fleet, verdicts) = review_in(&rows, &limits, card(-2.5, 3.0));
    assert!(fleet.patterns("Saltmarsh").any(|p| p.id() == "constant-a"));
    let off = verdicts.iter().filter(|v| ids(v).contains(&"off-card")).count();
    assert!(off * 20 < rows.len(), "{off}");
}

#[test]
fn headings_compared_are_judged_by_the_gyros_run() {
    let mut rows = usual();
    let at = find(&rows, 60, |r| r.observation.is_some_and(|o| o.target == shadowpin::compass::Target::Headings));
    let heading = rows[at].observation.as_mut().unwrap().compass_heading.as_mut().unwrap();
    *heading = heading.map(|h| h.reciprocal());
    let (_, verdicts) = review(&rows, &Limits::default());
    assert_eq!(queried(&verdicts), [at]);
    assert_eq!(ids(&verdicts[at]), ["off-card"]);
    assert_eq!(verdicts[at].slips[0].slip.id(), "reciprocal");
}

/// From 50 N to 50 S and back, with iron that shows it: B runs from +6 to -2.
#[test]
fn a_change_with_magnetic_latitude_is_physics() {
    for seed in 1..5 {
        let mut ship = Ship::draw("Saltmarsh", Kind::Good, (-50.0, 50.0), &mut Rng::new(seed));
        (ship.induced_deg, ship.permanent_deg) = (-1.5, 1.5);
        ship.coefficients[1] = 0.0;
        let rows = read(&csv(&Log::of(&[ship], Style { slips: 0.0, entries: 400, ..Style::default() }, false), Columns::default()));
        let (fleet, verdicts) = review(&rows, &Limits::default());
        let off: usize = verdicts.iter().filter(|v| ids(v).contains(&"off-card")).count();
        assert_eq!(off, 0, "seed {seed}");
        assert_eq!(fleet.patterns("Saltmarsh").count(), 0, "seed {seed}");
    }
}

/// A degree and a half in a month: the run goes with it, and nothing else is seen in it.
#[test]
fn slow_drift_is_neither_a_query_nor_a_step() {
    for (seed, drift) in [(1, 0.05), (2, -0.05), (3, 0.05), (4, -0.03)] {
        let mut ship = Ship::draw("Saltmarsh", Kind::Good, (-50.0, 50.0), &mut Rng::new(seed));
        (ship.drift_deg_per_day, ship.gyro_level_deg) = (drift, -15.0 * drift);
        let rows = read(&csv(&Log::of(&[ship], Style { slips: 0.0, ..Style::default() }, false), Columns::default()));
        let (fleet, verdicts) = review(&rows, &Limits::default());
        let asked: Vec<_> = verdicts.iter().flat_map(|v| &v.queries).filter(|q| q.id() != "over-limit").collect();
        assert!(asked.is_empty(), "seed {seed}: {asked:?}");
        let found: Vec<&str> = fleet.patterns("Saltmarsh").map(|p| p.id()).collect();
        assert!(found.is_empty(), "seed {seed}: {found:?}");
    }
}

#[test]
fn readings_to_whole_degrees_are_never_too_regular() {
    let ship = Ship::draw("Saltmarsh", Kind::Invented, (-50.0, 50.0), &mut Rng::new(5));
    let rows = read(&csv(&Log::of(&[ship], Style { resolution_deg: 1.0, slips: 0.0, ..Style::default() }, false), Columns::default()));
    let (fleet, _) = review(&rows, &Limits::default());
    let vessel = &summary(&fleet).vessels[0];
    assert!(vessel.patterns.iter().all(|p| p.id != "too-regular"));
    assert!(vessel.not_evaluated.iter().any(|n| n.id == "too-regular" && n.why.contains("whole degrees")), "{:?}", vessel.not_evaluated);
}

#[test]
fn a_step_has_its_time_and_explains_what_follows() {
    let ship = Ship::draw("Saltmarsh", Kind::Step, (-50.0, 50.0), &mut Rng::new(11));
    let step_at = ship.step_at;
    let rows = read(&csv(&Log::of(&[ship], Style { slips: 0.0, ..Style::default() }, false), Columns::default()));
    let (fleet, verdicts) = review(&rows, &Limits::default());
    let summary = summary(&fleet);
    let since = summary.vessels[0].patterns[0].since.clone().unwrap();
    let expected = rows[(rows.len() as f64 * step_at) as usize].moment.unwrap().utc;
    let since = UtcInstant::from_naive(chrono::NaiveDateTime::parse_from_str(&since, "%Y-%m-%dT%H:%M:%SZ").unwrap()).unwrap();
    assert!(since.seconds_since(expected).abs() < 2.0 * 86_400.0);
    assert_eq!(queried(&verdicts), [0_usize; 0], "what the pattern explains is no query of its own");
    assert!(verdicts.iter().any(|v| v.patterns.iter().any(|p| p.id() == "gyro-step")));
}

#[test]
fn questions_have_innocent_causes_and_accuse_nobody() {
    let kinds = Kind::ALL;
    let mut rng = Rng::new(99);
    let ships: Vec<Ship> = kinds.iter().enumerate().map(|(i, k)| Ship::draw(&format!("Vessel {i}"), *k, (-55.0, 55.0), &mut rng)).collect();
    let rows = read(&csv(&Log::of(&ships, Style { slips: 0.2, ..Style::default() }, true), Columns::default()));
    let (fleet, verdicts) = review(&rows, &Limits::default());
    let mut sentences: Vec<String> = verdicts.iter().flat_map(|v| v.queries.iter().map(|q| q.to_string()).chain(v.note())).collect();
    sentences.extend(summary(&fleet).vessels.iter().flat_map(|v| v.patterns.iter().map(|p| p.detail.clone())));
    assert!(sentences.len() > 500);
    for sentence in &sentences {
        let lower = sentence.to_lowercase();
        for word in ["invent", "fake", "forge", "false", "fabricat", "dishonest", "cheat", "lie ", "nan", "inf", "-0.0"] {
            assert!(!lower.contains(word), "{word}: {sentence}");
        }
    }
    for query in verdicts.iter().flat_map(|v| &v.queries) {
        let sentence = query.to_string();
        assert!(sentence.contains('?'), "{sentence}");
        assert!(sentence.ends_with('.') || sentence.ends_with('?'), "{sentence}");
    }
}
