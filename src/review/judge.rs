//! The second pass: one row against what the fleet's rows say together.

use super::checks::{Route, row_queries, unrounded};
use super::explain::{GAIN, explain};
use super::fact::{Fact, flag};
use super::fleet::Fleet;
use super::order::apart;
use super::pattern::PatternId;
use super::query::{Instrument, Query};
use super::row::Row;
use super::run::Term;
use super::slip::{Explanation, Slip};
use super::vessel::Vessel;
use crate::angle::wrap_180_deg;
use crate::limits::Limits;
use crate::notice::Notice;

/// What the review says of one row.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Verdict {
    /// What needs an explanation, the strongest first.
    pub queries: Vec<Query>,
    /// The slips that explain it, best first.
    pub slips: Vec<Explanation>,
    /// A slip was looked for; none in `slips` means that nothing explains the row.
    pub searched: bool,
    /// Notices besides those of the working.
    pub notices: Vec<Notice>,
    /// Patterns of the vessel that explain the row.
    pub patterns: Vec<PatternId>,
}

impl Verdict {
    /// One sentence or two for a person; nothing for a clean row.
    pub fn note(&self) -> Option<String> {
        let Some(query) = self.queries.first() else {
            let pattern = self.patterns.first()?;
            return Some(format!("As on other entries of this vessel: {}, see the summary.", pattern.id()));
        };
        let slip = match self.slips.first() {
            Some(Explanation { slip, place, with: None, .. }) => {
                // What the sun's azimuth cannot show is said, so that nobody looks for it there.
                let unseen = if matches!(slip, Slip::DayAhead | Slip::DayBehind | Slip::Year) {
                    " The sun's azimuth hardly shows it: it is the order of the entries, the moon and the stars that do."
                } else {
                    ""
                };
                format!(" Could {}? It looks to be {}.{unseen}", slip.words(), place.words())
            }
            Some(Explanation { slip, with: Some((second, _)), .. }) => {
                format!(" No single slip explains it; could {}, and {}?", slip.words(), second.words())
            }
            None if self.searched => " No slip known here explains it: nothing explains it yet.".to_owned(),
            None => String::new(),
        };
        Some(format!("{query}{slip}"))
    }
}

/// Judges one row; the same whatever the order in which rows are judged.
pub fn judge(row: &Row, fleet: &Fleet) -> Verdict {
    let limits = &fleet.limits;
    let mut verdict = Verdict::default();
    let found = fleet.vessel(row.names.vessel).and_then(|v| Some((v, v.place_of(row.number)?)));
    let route = found.map_or(Route::Either, |(vessel, _)| vessel.route);
    row_queries(row, route, limits, &mut verdict.queries, &mut verdict.notices);
    let Some((vessel, at)) = found else { return verdict };
    let Some(fact) = vessel.facts.get(at) else { return verdict };
    order(row, vessel, at, fact, limits, &mut verdict);
    if row.observation.is_some() {
        variation(row, vessel, limits, &mut verdict);
        gyro(row, vessel, at, fact, limits, &mut verdict);
        compass(row, vessel, fact, limits, &mut verdict);
        if let Some(notice) = after_turn(row, vessel, at, fact, limits) {
            verdict.notices.push(notice);
        }
    }
    verdict.notices.extend(zone_odd(row, limits));
    if let Some(id) = vessel.unrounded
        && unrounded(row, &verdict.queries)
    {
        verdict.queries.clear();
        verdict.patterns.push(id);
    }
    slips(row, vessel, at, fact, limits, &mut verdict);
    limits_of_errors(row, vessel, fact, limits, &mut verdict);
    verdict.queries.sort_by(|a, b| b.weight().total_cmp(&a.weight()));
    verdict
}

fn order(row: &Row, vessel: &Vessel, at: usize, fact: &Fact, limits: &Limits, verdict: &mut Verdict) {
    if let Ok(i) = vessel.repeats.binary_search_by_key(&row.number, |r| r.0)
        && let Some((_, of_row)) = vessel.repeats.get(i)
    {
        verdict.queries.push(Query::Repeat { of_row: *of_row });
    }
    // Where every time is off by the zone, a change of zone looks like a jump, and the sun is elsewhere: the pattern is said instead.
    if vessel.throughout.is_some_and(|(slip, place)| slip.is_in_time() && place.is_in_record()) {
        let before = verdict.queries.len();
        verdict.queries.retain(|q| !matches!(q, Query::ReasonDoubtful { .. }));
        if fact.has(flag::OUT_OF_ORDER) || fact.has(flag::TOO_FAR) || verdict.queries.len() < before {
            verdict.patterns.push(PatternId::SameSlipThroughout);
        }
        return;
    }
    let before = vessel.facts.get(..at).unwrap_or_default();
    let after = vessel.facts.get(at + 1..).unwrap_or_default();
    if fact.has(flag::OUT_OF_ORDER) {
        let sound = |f: &&Fact| f.has(flag::TIME) && !f.has(flag::OUT_OF_ORDER);
        let seconds = |f: Option<&Fact>| f.and_then(Fact::seconds);
        if let Some(now) = fact.seconds() {
            // Too early for the one before, or too late for the one after.
            let early = seconds(before.iter().rev().find(sound)).map_or(0, |t| t - now);
            let late = seconds(after.iter().find(sound)).map_or(0, |t| now - t);
            verdict.queries.push(Query::OutOfOrder { hours: early.max(late) as f64 / 3600.0, early: early >= late });
        }
    }
    if fact.has(flag::TOO_FAR) {
        let sound = |f: &&Fact| f.has(flag::PLACE) && f.has(flag::TIME) && !f.has(flag::OUT_OF_ORDER) && !f.has(flag::TOO_FAR);
        let near = before.iter().rev().find(sound).or(after.iter().find(sound));
        if let Some((miles, most_miles)) = near.and_then(|n| apart(n, fact, limits)) {
            verdict.queries.push(Query::TooFarTooSoon { miles, most_miles });
        }
    }
}

/// By how much the logged variation is expected to be off on this vessel, there and then.
fn variation(row: &Row, vessel: &Vessel, limits: &Limits, verdict: &mut Verdict) {
    let (Some(written), Some(model)) = (row.logged.variation, row.worked.variation) else { return };
    let by_deg = wrap_180_deg(written.value - model.value.deg());
    let most_deg = limits.thresholds.variation_differs_deg.max(2.0 * model.u_deg());
    if by_deg.abs() <= most_deg {
        return;
    }
    let expected = vessel.variation_off_deg(row);
    if expected != 0.0 && (by_deg - expected).abs() <= most_deg {
        verdict.patterns.push(PatternId::VariationStale);
    } else {
        verdict.queries.push(Query::VariationDiffers { by_deg: by_deg - expected, most_deg });
    }
}

fn gyro(row: &Row, vessel: &Vessel, at: usize, fact: &Fact, limits: &Limits, verdict: &mut Verdict) {
    let Some(error) = row.worked.gyro_error else { return };
    let Some((expected, scatter)) = vessel.expected(at, fact.gyro) else { return };
    let by_deg = wrap_180_deg(error.value.deg() - expected);
    let most_deg = limits.thresholds.gyro_out_of_run_deg.max(limits.thresholds.out_of_run_sigma * scatter.max(error.u_deg()));
    if by_deg.abs() > most_deg {
        verdict.queries.push(Query::GyroOutOfRun { by_deg, most_deg });
        return;
    }
    // Within the run only because of what the gyro follows: then that is said.
    let Some(run) = vessel.gyro_of(fact.gyro).and_then(|g| g.run.as_ref()) else { return };
    for (term, what) in run.terms.iter().enumerate() {
        let Some(id) = what.pattern() else { continue };
        let without = by_deg + run.part_deg(term, fact);
        if without.abs() > most_deg && !verdict.patterns.contains(&id) && vessel.patterns.iter().any(|p| p.id == id) {
            verdict.patterns.push(id);
        }
    }
}

fn compass(row: &Row, vessel: &Vessel, fact: &Fact, limits: &Limits, verdict: &mut Verdict) {
    let t = &limits.thresholds;
    if let Some(months) = row.card.and_then(|c| c.age_months)
        && months > t.card_months
    {
        verdict.queries.push(Query::CardOutOfDate { months, most_months: t.card_months });
    }
    let Some(deviation) = row.worked.deviation.or(row.worked.deviation_by_comparison) else { return };
    let curve = vessel.curve(fact.compass());
    let heading = row.observation.and_then(|o| o.compass_heading).map(|h| h.value.deg());
    let field = row.worked.field.map(|f| (f.horizontal_nt, f.inclination_deg));
    let fitted = curve.zip(heading).zip(field).map(|((c, h), f)| c.at(h, f));
    let (expected, scatter, card) = match (row.card, fitted) {
        (Some(card), _) => (card.deviation_deg, curve.map_or(0.0, |c| c.scatter_deg), true),
        (None, Some((value, u))) => (value, curve.map_or(0.0, |c| c.scatter_deg).hypot(u), false),
        (None, None) => return,
    };
    let by_deg = wrap_180_deg(deviation.value.deg() - expected);
    let most_deg = t.off_card_deg.max(t.out_of_run_sigma * scatter.max(deviation.u_deg()));
    let on_days = !card || by_deg.abs() > t.off_card_once_deg || vessel.off_card_days.contains(&fact.compass());
    let constant_deg = if card { vessel.constant_a_deg(fact.compass()) } else { 0.0 };
    if by_deg.abs() > most_deg && (by_deg - constant_deg).abs() <= most_deg {
        verdict.patterns.push(PatternId::ConstantA);
    } else if by_deg.abs() > most_deg && on_days {
        verdict.queries.push(Query::OffCard { by_deg, most_deg, card });
    }
}

/// Minutes since an alteration at the most: the entry before stood on another heading.
fn after_turn(row: &Row, vessel: &Vessel, at: usize, fact: &Fact, limits: &Limits) -> Option<Notice> {
    row.worked.gyro_error?;
    let before = vessel.facts.get(at.checked_sub(1)?)?;
    let turned = wrap_180_deg(fact.compass_heading_deg()? - before.compass_heading_deg()?).abs();
    let minutes = (fact.seconds()? - before.seconds()?) as f64 / 60.0;
    let spinning = row.observation?.gyro_type == crate::compass::GyroType::Spinning;
    (spinning && turned > limits.thresholds.alteration_deg && (0.0..limits.thresholds.after_turn_h * 60.0).contains(&minutes))
        .then_some(Notice::AfterTurn { minutes })
}

fn zone_odd(row: &Row, limits: &Limits) -> Option<Notice> {
    let zone_h = f64::from(row.zone?.description_minutes()) / 60.0;
    let expected_h = -(row.place?.position.lon.deg() / 15.0).round();
    // Across the date line the same clock has a zone 24 hours away.
    let apart = (zone_h - expected_h).abs();
    (apart.min(24.0 - apart) > limits.thresholds.zone_odd_h).then_some(Notice::ZoneOdd { zone_h, expected_h })
}

/// Looks for a slip where something is asked that a slip could answer.
fn slips(row: &Row, vessel: &Vessel, at: usize, fact: &Fact, limits: &Limits, verdict: &mut Verdict) {
    let answerable = |q: &Query| !matches!(q, Query::Repeat { .. } | Query::CardOutOfDate { .. } | Query::ReasonDoubtful { .. });
    if row.observation.is_none() || !verdict.queries.iter().any(answerable) {
        return;
    }
    let mut context = vessel.context(at, fact.gyro, fact.compass(), limits);
    context.speed_kn = row.observation.and_then(|o| o.speed_kn);
    context.variation_off_deg = vessel.variation_off_deg(row);
    if let Some((slip, place)) = vessel.throughout {
        // Its neighbours carry the same slip and say nothing of order and track.
        let alone = super::evidence::Context { before: None, after: None, earlier: &[], ..context };
        if explain(row, &alone, 0.0).iter().any(|e| e.with.is_none() && e.slip == slip && e.place.is_in_record() == place.is_in_record()) {
            verdict.queries.retain(|q| !answerable(q));
            if !verdict.patterns.contains(&PatternId::SameSlipThroughout) {
                verdict.patterns.insert(0, PatternId::SameSlipThroughout);
            }
            return;
        }
    }
    verdict.searched = true;
    verdict.slips = explain(row, &context, GAIN);
}

/// Errors over their limits; not where the row itself is in doubt, for then the error is not the compass's. What a pattern of the
/// vessel explains is said there.
fn limits_of_errors(row: &Row, vessel: &Vessel, fact: &Fact, limits: &Limits, verdict: &mut Verdict) {
    if verdict.searched || row.observation.is_none() || vessel.throughout.is_some_and(|(_, place)| place.is_in_record()) {
        return;
    }
    let t = &limits.thresholds;
    if let (Some(error), Some(place)) = (row.worked.gyro_error, row.place) {
        let cos_lat = place.position.lat.deg().to_radians().cos().max(0.05);
        let limit_deg = t.gyro_settle_deg / cos_lat + t.gyro_margin_deg;
        let (error_deg, u_deg) = (error.value.deg(), error.u_deg());
        if error_deg.abs() - 2.0 * u_deg <= limit_deg {
            verdict.notices.extend((error_deg.abs() > limit_deg).then_some(Notice::MayBeOverLimit { error_deg, limit_deg }));
        } else if let Some(id) = explained(vessel, fact, |part| (error_deg - part).abs() - 2.0 * u_deg <= limit_deg) {
            if !verdict.patterns.contains(&id) {
                verdict.patterns.push(id);
            }
        } else {
            verdict.queries.push(Query::OverLimit { instrument: Instrument::Gyro, error_deg, u_deg, limit_deg });
        }
    }
    if let Some(deviation) = row.worked.deviation.or(row.worked.deviation_by_comparison) {
        let (error_deg, u_deg, limit_deg) = (deviation.value.deg(), deviation.u_deg(), t.deviation_deg);
        let constant_deg = vessel.constant_a_deg(fact.compass());
        if error_deg.abs() - 2.0 * u_deg > limit_deg && (error_deg - constant_deg).abs() - 2.0 * u_deg <= limit_deg {
            if !verdict.patterns.contains(&PatternId::ConstantA) {
                verdict.patterns.push(PatternId::ConstantA);
            }
        } else if error_deg.abs() - 2.0 * u_deg > limit_deg {
            verdict.queries.push(Query::OverLimit { instrument: Instrument::MagneticCompass, error_deg, u_deg, limit_deg });
        } else if error_deg.abs() > limit_deg {
            verdict.notices.push(Notice::MayBeOverLimit { error_deg, limit_deg });
        }
    }
}

/// The pattern of the gyro's run without whose part (degrees) `fits` holds.
fn explained(vessel: &Vessel, fact: &Fact, fits: impl Fn(f64) -> bool) -> Option<PatternId> {
    let run = vessel.gyro_of(fact.gyro)?.run.as_ref()?;
    let parts = || {
        run.terms.iter().enumerate().filter_map(|(term, what)| {
            let part = run.part_deg(term, fact);
            // Of two repeaters that differ either may be the one that is out.
            let of_the_other = matches!(what, Term::Repeater(_)) && part == 0.0;
            Some((what.pattern()?, if of_the_other { -run.coefficient(term).0 } else { part }))
        })
    };
    let named = |id: PatternId| vessel.patterns.iter().any(|p| p.id == id);
    if let Some((id, _)) = parts().find(|(id, part)| named(*id) && fits(*part)) {
        return Some(id);
    }
    let all: f64 = parts().filter(|(id, _)| named(*id)).map(|(_, part)| part).sum();
    let largest = parts().filter(|(id, _)| named(*id)).max_by(|a, b| a.1.abs().total_cmp(&b.1.abs()));
    largest.filter(|_| fits(all)).map(|(id, _)| id)
}
