//! Which headings were observed, and which sectors never.

use crate::angle::CompassBearing;

/// A gap between neighbouring observed headings wider than this is a sector never observed, degrees (our own: wider than the 45 of a
/// swing on eight headings with a helmsman's error).
const SECTOR_DEG: f64 = 60.0;
/// Headings closer together than this count as one, degrees (our own).
const SAME_DEG: f64 = 1.0;

/// Headings in order round the compass, each with the gap to the next, degrees.
fn gaps(headings: impl Iterator<Item = CompassBearing>) -> Vec<(CompassBearing, f64)> {
    let mut sorted: Vec<CompassBearing> = headings.collect();
    sorted.sort_unstable_by(|a, b| a.deg().total_cmp(&b.deg()));
    let Some(first) = sorted.first().copied() else { return Vec::new() };
    let next = sorted.iter().skip(1).map(|h| h.deg()).chain([first.deg() + 360.0]);
    sorted.iter().zip(next).map(|(heading, next)| (*heading, next - heading.deg())).collect()
}

/// How many different headings there are: each at least a degree from the one counted before it.
pub(super) fn distinct(headings: impl Iterator<Item = CompassBearing>) -> usize {
    let (mut count, mut since_last, mut round) = (0, f64::INFINITY, 360.0);
    for (_, gap) in gaps(headings) {
        // The first counts; the last does not where it is the first again, across north.
        if since_last >= SAME_DEG && (count == 0 || round >= SAME_DEG) {
            count += 1;
            since_last = 0.0;
        }
        since_last += gap;
        round -= gap;
    }
    count
}

/// The sectors without an observation: from the observed heading before to the one after, clockwise.
pub(super) fn unproven(headings: impl Iterator<Item = CompassBearing>) -> Vec<(CompassBearing, CompassBearing)> {
    let wide = gaps(headings).into_iter().filter(|(_, gap)| *gap > SECTOR_DEG);
    wide.map(|(from, gap)| (from, CompassBearing::wrapping_deg(from.deg() + gap))).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn of(headings: &[f64]) -> impl Iterator<Item = CompassBearing> {
        headings.iter().map(|h| CompassBearing::wrapping_deg(*h))
    }

    #[test]
    fn gaps_close_round_north() {
        assert!(unproven(of(&[0.0, 45.0, 90.0, 135.0, 180.0, 225.0, 270.0, 315.0])).is_empty());
        let sectors = unproven(of(&[350.0, 10.0, 200.0]));
        assert_eq!(sectors.iter().map(|(a, b)| (a.deg(), b.deg())).collect::<Vec<_>>(), [(10.0, 200.0), (200.0, 350.0)]);
        assert_eq!(distinct(of(&[350.0, 10.0, 200.0, 200.4])), 3);
        assert_eq!(distinct(of(&[90.0, 90.0])), 1);
        assert_eq!(distinct(of(&[])), 0);
        assert_eq!(distinct(of(&[0.0, 359.5])), 1);
        assert_eq!(distinct(of(&[0.0, 90.0, 359.5])), 2);
        // Close together all the way round: one in each degree.
        let all_round: Vec<f64> = (0..3600).map(|i| f64::from(i) / 10.0).collect();
        assert!((355..=361).contains(&distinct(of(&all_round))));
        assert_eq!(distinct(of(&[10.0, 10.6, 11.2, 11.8])), 2);
    }
}
