//! Calendar dates.

use crate::error::BadValue;
use chrono::NaiveDate;

/// The order of a date written in figures.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum DateOrder {
    /// 2026-06-14.
    #[default]
    Iso,
    /// 14/06/2026.
    DayMonthYear,
    /// 06/14/2026.
    MonthDayYear,
}

const ISO: &str = "a date such as 2026-06-14";
const MONTHS: [&str; 12] = ["jan", "feb", "mar", "apr", "may", "jun", "jul", "aug", "sep", "oct", "nov", "dec"];

/// A date: ISO 8601 always; figures in another order only where `order` says which; a month by its English name in any case.
///
/// # Errors
/// [`BadValue`] for a date that does not exist, for two-figure years, and for figures whose order is not known.
pub fn read_date(text: &str, order: DateOrder) -> Result<NaiveDate, BadValue> {
    let trimmed = text.trim();
    let refuse = |hint: &'static str| BadValue::new(text, ISO).hint(hint);
    let mut parts = trimmed.split(['-', '/', '.', ' ']);
    let (Some(a), Some(b), Some(c), None) = (parts.next(), parts.next(), parts.next(), parts.next()) else { return Err(refuse("")) };
    let figures = |part: &str, least: usize, most: usize| -> Option<u32> {
        ((least..=most).contains(&part.len()) && part.bytes().all(|x| x.is_ascii_digit())).then(|| part.parse().ok()).flatten()
    };
    let (year, month, day) = if let (Some(y), Some(m), Some(d)) = (figures(a, 4, 4), figures(b, 1, 2), figures(c, 1, 2)) {
        (y, m, d)
    } else if let (Some(d), Some(m), Some(y)) = (figures(a, 1, 2), month_by_name(b), figures(c, 4, 4)) {
        (y, m, d)
    } else if let (Some(first), Some(second), Some(y)) = (figures(a, 1, 2), figures(b, 1, 2), figures(c, 4, 4)) {
        match order {
            DateOrder::DayMonthYear => (y, second, first),
            DateOrder::MonthDayYear => (y, first, second),
            DateOrder::Iso => return Err(refuse("day or month first? say --date-order dmy or --date-order mdy")),
        }
    } else if figures(c, 2, 2).is_some() {
        return Err(refuse("write the year with four figures"));
    } else {
        return Err(refuse(""));
    };
    let exists = i32::try_from(year).ok().and_then(|y| NaiveDate::from_ymd_opt(y, month, day));
    exists.ok_or_else(|| {
        refuse(if month > 12 && day <= 12 { "there is no such month: is the date's order another?" } else { "there is no such day" })
    })
}

fn month_by_name(name: &str) -> Option<u32> {
    let start = name.get(..3)?;
    let at = MONTHS.iter().position(|m| m.eq_ignore_ascii_case(start))?;
    name.bytes().all(|b| b.is_ascii_alphabetic()).then_some(at as u32 + 1)
}
