//! How much time goes by in a stream, from the times of day that it says.

use super::fields::DAY_MS;
use super::sentence::Talker;
use crate::time::UtcInstant;
use std::collections::BTreeMap;

/// Steps back up to this are the order of the sentences of one second, not a clock put back; milliseconds.
const JITTER_MS: i64 = 2_000;

/// The milliseconds gone by since the stream's first word.
///
/// Each talker's clock is compared with itself alone, so that one that is years off ages nobody's data. A clock put back is
/// time of unknown length: it counts as long as it was put back.
#[derive(Debug, Default)]
pub(super) struct Pace {
    gone_ms: i64,
    talkers: BTreeMap<Talker, Clock>,
}

#[derive(Debug)]
struct Clock {
    /// Its last word, milliseconds; of the Unix count once it has said a date.
    own_ms: i64,
    dated: bool,
    /// Milliseconds gone by when it was said.
    gone_ms: i64,
}

impl Pace {
    /// Hears a time of day, with its date where the sentence has one; answers how far the word lags behind the stream,
    /// milliseconds.
    pub fn hear(&mut self, talker: Talker, day_ms: i64, dated: Option<UtcInstant>) -> i64 {
        let said_ms = dated.map(UtcInstant::unix_ms);
        let Some(clock) = self.talkers.get_mut(&talker) else {
            let clock = Clock { own_ms: said_ms.unwrap_or(day_ms), dated: dated.is_some(), gone_ms: self.gone_ms };
            self.talkers.insert(talker, clock);
            return 0;
        };
        let step_ms = match said_ms {
            Some(said_ms) if clock.dated => said_ms - clock.own_ms,
            // Without two dates, the nearer way round the clock.
            _ => (day_ms - clock.own_ms + DAY_MS / 2).rem_euclid(DAY_MS) - DAY_MS / 2,
        };
        // Only a date puts a clock back: a lone time of day that steps back is an old word said again.
        if step_ms < 0 && (said_ms.is_none() || step_ms >= -JITTER_MS) {
            return -step_ms;
        }
        let own_ms = said_ms.unwrap_or(clock.own_ms + step_ms);
        *clock = Clock { own_ms, dated: clock.dated || dated.is_some(), gone_ms: clock.gone_ms.saturating_add(step_ms.abs()) };
        let lag_ms = (self.gone_ms - clock.gone_ms).max(0);
        self.gone_ms = self.gone_ms.max(clock.gone_ms);
        lag_ms
    }

    /// Milliseconds gone by.
    pub fn gone_ms(&self) -> i64 {
        self.gone_ms
    }

    /// Whether any time was said.
    pub fn is_known(&self) -> bool {
        !self.talkers.is_empty()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::time::text::read_utc;

    fn hear(pace: &mut Pace, talker: &str, text: &str, dated: bool) -> i64 {
        let utc = read_utc(text).unwrap().utc;
        pace.hear(Talker::from_text(talker).unwrap(), utc.unix_ms().rem_euclid(DAY_MS), dated.then_some(utc))
    }

    #[test]
    fn across_midnight_dated_or_not() {
        let mut pace = Pace::default();
        assert!(!pace.is_known());
        hear(&mut pace, "GP", "2026-06-13T23:59:58Z", false);
        hear(&mut pace, "GP", "2026-06-13T23:59:59Z", true);
        hear(&mut pace, "GP", "2026-06-14T00:00:02Z", false);
        hear(&mut pace, "GP", "2026-06-14T00:01:02Z", true);
        // Within a second, the order of sentences is theirs.
        assert_eq!(hear(&mut pace, "GP", "2026-06-14T00:01:01Z", true), 1000);
        // A position that stands still beside a clock that goes.
        assert_eq!(hear(&mut pace, "GP", "2026-06-14T00:00:02Z", false), 60_000);
        assert_eq!((pace.gone_ms(), pace.is_known()), (64_000, true));
    }

    #[test]
    fn a_talker_that_is_years_off_or_behind() {
        let mut pace = Pace::default();
        hear(&mut pace, "GP", "2026-06-14T06:00:00Z", true);
        hear(&mut pace, "GL", "2006-10-29T06:00:00Z", true);
        hear(&mut pace, "GP", "2026-06-14T06:00:20Z", true);
        assert_eq!(hear(&mut pace, "GL", "2006-10-29T06:00:01Z", true), 19_000);
        assert_eq!(pace.gone_ms(), 20_000);
        // Two recordings, the later one first.
        hear(&mut pace, "GP", "2026-06-13T06:00:20Z", true);
        assert_eq!(pace.gone_ms(), 20_000 + DAY_MS);
    }
}
