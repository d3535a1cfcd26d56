//! The leap seconds that were inserted.

use chrono::{Datelike, NaiveDate};

/// Year and half of each UTC day that ended with 23:59:60: `false` 30 June, `true` 31 December.
///
/// Source: the leap seconds announced in IERS Bulletin C, 1972 to 2016; none has been announced since (checked against the
/// table of the SOFA collection in `days_agree_with_the_collection`).
const INSERTED: [(i32, bool); 27] = [
    (1972, false),
    (1972, true),
    (1973, true),
    (1974, true),
    (1975, true),
    (1976, true),
    (1977, true),
    (1978, true),
    (1979, true),
    (1981, false),
    (1982, false),
    (1983, false),
    (1985, false),
    (1987, true),
    (1989, true),
    (1990, true),
    (1992, false),
    (1993, false),
    (1994, false),
    (1995, true),
    (1997, false),
    (1998, true),
    (2005, true),
    (2008, true),
    (2012, false),
    (2015, false),
    (2016, true),
];

/// Whether that UTC day ended with a leap second.
pub(super) fn ended_with_leap_second(day: NaiveDate) -> bool {
    let half = match (day.month(), day.day()) {
        (6, 30) => false,
        (12, 31) => true,
        _ => return false,
    };
    INSERTED.contains(&(day.year(), half))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn days_agree_with_the_collection() {
        for year in 1972..=2025 {
            for (month, day, next) in [(6, 30, (year, 7, 1)), (12, 31, (year + 1, 1, 1))] {
                let tai_utc = |y, m, d| sofars::ts::dat(y, m, d, 0.0).unwrap();
                let stepped = (tai_utc(next.0, next.1, next.2) - tai_utc(year, month, day) - 1.0).abs() < 1e-9;
                assert_eq!(
                    ended_with_leap_second(NaiveDate::from_ymd_opt(year, month as u32, day as u32).unwrap()),
                    stepped,
                    "{year}-{month}"
                );
            }
        }
    }
}
