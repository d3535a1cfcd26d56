//! Marks on an axis of time.

use super::frame::Tick;
use chrono::{DateTime, Datelike, NaiveDate, Utc};

const HOUR_MS: i64 = 3_600_000;
const DAY_MS: i64 = 24 * HOUR_MS;
/// Most marks on an axis.
const MOST: i64 = 6;

fn instant(unix_ms: i64) -> DateTime<Utc> {
    DateTime::from_timestamp_millis(unix_ms).unwrap_or_default()
}

/// Marks from `from` to `to`, milliseconds of the Unix count: hours, days, or first days of months.
pub fn dates(from: i64, to: i64) -> Vec<Tick> {
    let span = (to - from).max(1);
    for hours in [1, 3, 6, 12, 24, 48, 120, 240, 480] {
        let step = hours * HOUR_MS;
        if span / step < MOST {
            let first = from.div_euclid(step) + i64::from(from.rem_euclid(step) > 0);
            let form = if step < DAY_MS { "%m-%d %H:%M" } else { "%Y-%m-%d" };
            let marks = (first..=to.div_euclid(step)).map(|i| i * step);
            return marks.map(|ms| Tick { at: ms as f64, words: instant(ms).format(form).to_string() }).collect();
        }
    }
    let (start, end) = (instant(from), instant(to));
    let months = |t: DateTime<Utc>| i64::from(t.year()) * 12 + i64::from(t.month0());
    let (first, last) = (months(start), months(end));
    let step = [1, 2, 3, 6, 12, 24, 60, 120, 240, 600].into_iter().find(|s| (last - first) / s < MOST).unwrap_or(1200);
    let marks = (first..=last).filter(|m| m % step == 0).filter_map(|m| {
        let day = NaiveDate::from_ymd_opt(i32::try_from(m.div_euclid(12)).ok()?, m.rem_euclid(12) as u32 + 1, 1)?;
        let at = day.and_hms_opt(0, 0, 0)?.and_utc().timestamp_millis();
        (from..=to).contains(&at).then(|| Tick { at: at as f64, words: day.format(if step < 12 { "%Y-%m" } else { "%Y" }).to_string() })
    });
    marks.collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn words(from: &str, to: &str) -> Vec<String> {
        let ms = |text: &str| DateTime::parse_from_rfc3339(text).unwrap().timestamp_millis();
        dates(ms(from), ms(to)).into_iter().map(|t| t.words).collect()
    }

    #[test]
    fn hours_days_and_months() {
        assert_eq!(words("2026-03-02T05:10:00Z", "2026-03-02T08:00:00Z"), ["03-02 06:00", "03-02 07:00", "03-02 08:00"]);
        assert_eq!(words("2026-03-02T05:10:00Z", "2026-03-05T08:00:00Z"), ["2026-03-03", "2026-03-04", "2026-03-05"]);
        assert_eq!(
            words("2026-01-01T00:00:00Z", "2026-12-31T00:00:00Z"),
            ["2026-01", "2026-03", "2026-05", "2026-07", "2026-09", "2026-11"]
        );
        assert_eq!(words("2000-01-01T00:00:00Z", "2008-12-31T00:00:00Z"), ["2000", "2002", "2004", "2006", "2008"]);
        assert!(words("1900-01-01T00:00:00Z", "2100-12-31T00:00:00Z").len() <= 7);
        assert_eq!(words("2026-03-02T05:00:00Z", "2026-03-02T05:00:00Z"), ["03-02 05:00"]);
    }
}
