//! Whether an error is like the last ones.

use super::before::{Before, Names};
use crate::angle::text::write::{east_west, low_high};
use crate::angle::{CompassBearing, wrap_180_deg};
use crate::compass::Worked;
use crate::limits::Limits;
use crate::time::UtcInstant;
use crate::time::text::write::to_the_minute;

/// Entries looked back to.
const LAST: usize = 10;
/// Fewer say nothing of their scatter.
const LEAST: usize = 3;
/// A deviation is compared with those on headings within this many degrees: over that it may be another one.
const NEAR_HEADING_DEG: f64 = 15.0;
/// Makes the median absolute deviation of a normal sample its standard deviation (1 / 0.6745).
const MAD_TO_SD: f64 = 1.4826;

/// An error that came before.
struct Past {
    utc: UtcInstant,
    deg: f64,
}

/// One sentence for the gyro error and one for the deviation, as far as there are any.
pub(super) fn sentences(
    worked: &Worked,
    (utc, names): (Option<UtcInstant>, &Names),
    heading: Option<CompassBearing>,
    before: &[&Before],
    limits: &Limits,
) -> Vec<String> {
    let mut said = Vec::new();
    // Worked again after it was entered, an entry is not like itself.
    let others: Vec<&Before> = before.iter().copied().filter(|b| Some(b.utc) != utc).collect();
    let sigma = limits.thresholds.out_of_run_sigma;
    if let Some(gyro) = worked.gyro_error {
        let past = others.iter().filter(|b| b.names.same_gyro(names));
        let past = last(past.filter_map(|b| Some(Past { utc: b.utc, deg: b.gyro_error_deg? })).collect());
        let now = Now { deg: gyro.value.deg(), u_deg: gyro.u_deg(), most_deg: limits.thresholds.gyro_out_of_run_deg, sigma };
        said.push(now.against(
            &past,
            "Gyro error",
            "of this gyro and repeater",
            low_high,
            "has the gyro wandered, or the speed or latitude setting changed",
        ));
    }
    if let (Some(deviation), Some(heading)) = (worked.deviation.or(worked.deviation_by_comparison), heading) {
        let near = |b: &&&Before| b.compass_heading.is_some_and(|h| wrap_180_deg(h.deg() - heading.deg()).abs() <= NEAR_HEADING_DEG);
        let past = others.iter().filter(|b| b.names.same_compass(names)).filter(near);
        let past = last(past.filter_map(|b| Some(Past { utc: b.utc, deg: b.deviation_deg? })).collect());
        let now = Now { deg: deviation.value.deg(), u_deg: deviation.u_deg(), most_deg: limits.thresholds.off_card_deg, sigma };
        said.push(now.against(
            &past,
            "Deviation",
            "within 15 degrees of this heading",
            east_west,
            "is there steel near the compass, cargo or cranes, or was a lid or a chair left there",
        ));
    }
    said
}

fn last(mut past: Vec<Past>) -> Vec<Past> {
    past.sort_by_key(|p| p.utc);
    past.split_off(past.len().saturating_sub(LAST))
}

struct Now {
    deg: f64,
    u_deg: f64,
    most_deg: f64,
    sigma: f64,
}

impl Now {
    /// The middle and scatter of the last ones, and how this one stands to them. What a review would ask about is said in its own words.
    fn against(&self, past: &[Past], what: &str, which: &str, write: fn(f64) -> String, causes: &str) -> String {
        let (Some(first), true) = (past.first(), past.len() >= LEAST) else {
            return match past.len() {
                0 => format!("{what}: nothing before it {which} to compare with."),
                1 => format!("{what}: one entry before it {which}, too few to compare with."),
                count => format!("{what}: {count} entries before it {which}, too few to compare with."),
            };
        };
        let middle = median(past.iter().map(|p| p.deg).collect());
        let scatter = MAD_TO_SD * median(past.iter().map(|p| wrap_180_deg(p.deg - middle).abs()).collect());
        let off = wrap_180_deg(self.deg - middle);
        let (size, side) = (off.abs(), if off < 0.0 { "west" } else { "east" });
        let of = format!(
            "the last {} {which}, since {}, which were {} in the middle with a scatter of {scatter:.1}",
            past.len(),
            to_the_minute(first.utc),
            write(middle)
        );
        if size > self.most_deg.max(self.sigma * scatter) {
            format!("{what} is not like {of}: it is {size:.1} to the {side}. Is the time, the body or a reading another; {causes}?")
        } else if size > 2.0 * scatter.hypot(self.u_deg) {
            format!("{what} is further from {of}, than chance explains: {size:.1} to the {side}. Another bearing would tell.")
        } else if size < 0.05 {
            format!("{what} is like {of}.")
        } else {
            format!("{what} is like {of}: {size:.1} to the {side} of that.")
        }
    }
}

/// The middle value of some; nothing is 0.
fn median(mut values: Vec<f64>) -> f64 {
    values.sort_by(f64::total_cmp);
    let at = |i: usize| values.get(i).copied().unwrap_or(0.0);
    let half = values.len() / 2;
    if values.len() % 2 == 1 { at(half) } else { f64::midpoint(at(half.saturating_sub(1)), at(half)) }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn said(now: f64, past: &[f64]) -> String {
        let at = |i: usize| UtcInstant::from_unix_ms(1_781_400_000_000 + i as i64 * 14_400_000).unwrap();
        let past: Vec<Past> = past.iter().enumerate().map(|(i, deg)| Past { utc: at(i), deg: *deg }).collect();
        Now { deg: now, u_deg: 0.3, most_deg: 1.5, sigma: 4.0 }.against(&past, "Gyro error", "of it", low_high, "why")
    }

    #[test]
    fn like_and_unlike() {
        let past = [0.5, 0.3, 0.4, 0.6, 0.5];
        assert!(said(0.6, &past).starts_with("Gyro error is like the last 5 of it, since 2026-06-14"), "{}", said(0.6, &past));
        assert!(said(0.6, &past).ends_with("0.5 L in the middle with a scatter of 0.1: 0.1 to the east of that."));
        assert!(said(1.3, &past).contains("than chance explains: 0.8 to the east"));
        assert!(said(-1.6, &past).contains("is not like") && said(-1.6, &past).contains("2.1 to the west"));
        assert!(said(0.5, &[0.5, 0.5]).contains("2 entries before it of it, too few"));
        // No scatter at all is no reason to ask.
        assert!(said(0.7, &[0.5; 6]).contains("is like"));
        // Median, so that one wild entry does not make the next good one look wrong.
        assert!(said(0.5, &[0.5, 0.4, 60.0, 0.6, 0.5]).contains("is like"));
    }
}
