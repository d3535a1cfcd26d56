//! The full form of a date and time, read without cutting the text up: what nearly every cell of a log holds.

use super::TimeOfDay;
use chrono::NaiveDate;

/// `2026-06-14T06:12:30`, with or without `Z`, or with a blank for the T; `None` for anything else, be it right or wrong.
pub(super) fn read(text: &str) -> Option<(NaiveDate, TimeOfDay)> {
    let &[y1, y2, y3, y4, b'-', m1, m2, b'-', d1, d2, b'T' | b' ', h1, h2, b':', n1, n2, b':', s1, s2, ref tail @ ..] = text.as_bytes()
    else {
        return None;
    };
    if !matches!(tail, [] | [b'Z']) {
        return None;
    }
    let two = |tens: u8, ones: u8| {
        let (tens, ones) = (tens.wrapping_sub(b'0'), ones.wrapping_sub(b'0'));
        (tens < 10 && ones < 10).then(|| u32::from(tens) * 10 + u32::from(ones))
    };
    let year = two(y1, y2)? * 100 + two(y3, y4)?;
    let (hour, minute, second) = (two(h1, h2)?, two(n1, n2)?, two(s1, s2)?);
    if hour > 23 || minute > 59 || second > 60 {
        return None;
    }
    let date = NaiveDate::from_ymd_opt(year as i32, two(m1, m2)?, two(d1, d2)?)?;
    let ms = (hour * 3600 + minute * 60 + second) * 1000;
    Some((date, TimeOfDay { ms, step_s: 1.0, leap: second == 60 }))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::time::text::{DateOrder, read_date, read_time_of_day};

    #[test]
    fn as_the_parts_are_read() {
        for text in ["2026-06-14T06:12:30Z", "1999-12-31 23:59:60", "2024-02-29T00:00:00"] {
            let (date, clock) = text.trim_end_matches('Z').split_once(['T', ' ']).unwrap();
            assert_eq!(read(text), Some((read_date(date, DateOrder::Iso).unwrap(), read_time_of_day(clock).unwrap())));
        }
        for text in ["2026-06-14T06:12Z", "2026-06-31T06:12:30Z", "2026-06-14T24:00:00", "2026-06-14T06:12:30.5", "2026-0½-14T06:12:3"] {
            assert_eq!(read(text), None, "{text}");
        }
    }
}
