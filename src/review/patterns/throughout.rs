//! One slip that explains nearly all affected rows of a vessel: a habit of the house, said once.

use super::super::evidence::{Context, UNKNOWN_GYRO};
use super::super::explain::explain;
use super::super::learn::Logbook;
use super::super::pattern::{Pattern, PatternId};
use super::super::robust::{median, scale_about_zero};
use super::super::run::Run;
use super::super::slip::{Place, Slip};
use super::super::vessel::Vessel;
use crate::limits::Limits;

/// Fewest affected rows.
const LEAST_ROWS: usize = 8;
/// Share of all observations that must be affected.
const LEAST_SHARE: f64 = 0.3;
/// Share of the affected rows that the one slip must explain.
const EXPLAINED: f64 = 0.75;

/// Names the slip made throughout, if there is one; answers why nothing else can be read from the rows, where that is so.
pub fn find(vessel: &mut Vessel, book: &Logbook, limits: &Limits) -> Option<String> {
    let affected = book.affected as f64;
    if book.sample.len() < LEAST_ROWS || affected < LEAST_SHARE * book.observations as f64 {
        return None;
    }
    let mut counts: Vec<(Slip, Place, usize, usize)> = Vec::new();
    for kept in &book.sample {
        let worked = kept.work(limits);
        let row = kept.row(&worked);
        let known = |gyro: u8| {
            let run = vessel.gyro_of(gyro)?.run.as_ref().filter(|r| r.established() && r.scatter_deg < 1.0)?;
            (run.coefficient(0).0.abs() < 5.0).then_some(())?;
            Some(vessel.place_of(row.number).and_then(|at| vessel.expected(at, gyro)))?
        };
        // Neighbours with the same slip say nothing of order and track.
        let context = Context {
            gyro: known(kept.gyro).unwrap_or(UNKNOWN_GYRO),
            curve: None,
            variation_off_deg: vessel.variation_off_deg(&row),
            before: None,
            after: None,
            earlier: &[],
            route: vessel.route,
            speed_kn: row.observation.and_then(|o| o.speed_kn),
            limits,
        };
        for (rank, e) in explain(&row, &context, 0.0).iter().filter(|e| e.with.is_none()).enumerate() {
            match counts.iter_mut().find(|c| c.0 == e.slip && c.1 == e.place) {
                Some(count) => (count.2, count.3) = (count.2 + 1, count.3 + rank),
                None => counts.push((e.slip, e.place, 1, rank)),
            }
        }
    }
    // Most rows explained; of two alike, the one that stands higher in the lists.
    let best = counts.iter().max_by_key(|c| (c.2, std::cmp::Reverse(c.3)))?;
    if (best.2 as f64) < EXPLAINED * book.sample.len() as f64 {
        return None;
    }
    let (slip, place) = (best.0, best.1);
    vessel.throughout = Some((slip, place));
    let detail = format!(
        "Is it a habit of this vessel? Could {} throughout ({slip}, {})? It would explain {} of {} such rows looked at closely; {affected:.0} of {} observations are affected.",
        slip.words(),
        place.words(),
        best.2,
        book.sample.len(),
        book.observations
    );
    vessel.patterns.push(Pattern { id: PatternId::SameSlipThroughout, detail, since: None });
    // In the working, the recomputed errors are real; in the record they are not.
    if !place.is_in_record() {
        return None;
    }
    level_without_it(vessel, book, slip, place, limits);
    Some(format!("the records carry one slip throughout ({slip}), and the run and the curve are not those of the compasses"))
}

/// The gyro's level with the slip undone, from the rows kept whole, so that other rows can still be judged.
fn level_without_it(vessel: &mut Vessel, book: &Logbook, slip: Slip, place: Place, limits: &Limits) {
    let names: Vec<String> = vessel.runs.iter().map(|g| g.name.clone()).collect();
    for (name, gyro) in names.iter().zip(&mut vessel.runs) {
        let mut errors: Vec<f64> = book
            .sample
            .iter()
            .filter(|k| vessel.gyros.get(usize::from(k.gyro)).is_some_and(|g| g.0 == *name))
            .filter_map(|k| super::super::explain::gyro_error_without(&k.row(&k.work(limits)), slip, place, limits))
            .collect();
        let n = errors.len();
        gyro.run = median(&mut errors).filter(|_| n >= 4).map(|level| {
            let scatter = scale_about_zero(errors.iter().map(|e| e - level)).unwrap_or(1.0).max(0.3);
            Run::level(level, scatter / (n as f64).sqrt(), scatter, n)
        });
    }
    // Rows' own deviations are as unreal as their gyro errors.
    vessel.curves.iter_mut().for_each(|c| *c = None);
}
