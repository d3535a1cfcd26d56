//! Instants and zones written for a person and for a file.

use crate::time::{UtcInstant, Zone};
use chrono::{DateTime, Utc};

/// ISO 8601, to the second: `2026-06-14T06:12:30Z`.
pub fn iso(utc: UtcInstant) -> String {
    to_the_second(utc).format("%Y-%m-%dT%H:%M:%SZ").to_string()
}

/// For a person: `2026-06-14 06:12:30`.
pub fn date_time(utc: UtcInstant) -> String {
    to_the_second(utc).format("%Y-%m-%d %H:%M:%S").to_string()
}

/// For a person, to the nearest minute: `2026-06-14 06:13`.
pub fn to_the_minute(utc: UtcInstant) -> String {
    let rounded = DateTime::from_timestamp((utc.unix_ms() + 30_000).div_euclid(60_000) * 60, 0).unwrap_or_default();
    rounded.format("%Y-%m-%d %H:%M").to_string()
}

/// The clock of a ship that keeps `zone`: `2026-06-14 15:12:30`.
pub fn ship_date_time(utc: UtcInstant, zone: Zone) -> String {
    let local = to_the_second(utc) + chrono::Duration::minutes(i64::from(zone.clock_offset_minutes()));
    local.format("%Y-%m-%d %H:%M:%S").to_string()
}

/// A zone description: `-9`, `+3.5`, `0`.
pub fn zone(zone: Zone) -> String {
    let minutes = zone.description_minutes();
    let (hours, rest) = (minutes.abs() / 60, minutes.abs() % 60);
    let part = match rest {
        15 => ".25",
        30 => ".5",
        45 => ".75",
        _ => "",
    };
    let sign = match minutes {
        0 => "",
        m if m < 0 => "-",
        _ => "+",
    };
    format!("{sign}{hours}{part}")
}

/// Rounded, not cut, to the second.
fn to_the_second(utc: UtcInstant) -> DateTime<Utc> {
    DateTime::from_timestamp((utc.unix_ms() + 500).div_euclid(1000), 0).unwrap_or_default()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::time::text::{read_utc, read_zone};
    use proptest::prelude::*;

    proptest! {
        #[test]
        fn instants_read_back(seconds in -2_208_988_800_i64..4_133_980_799) {
            let utc = UtcInstant::from_unix_ms(seconds * 1000).unwrap();
            prop_assert_eq!(read_utc(&iso(utc)).unwrap().utc, utc);
            prop_assert_eq!(read_utc(&date_time(utc)).unwrap().utc, utc);
        }

        #[test]
        fn zones_read_back(quarters in -56_i16..=48) {
            let z = Zone::from_description_minutes(quarters * 15).unwrap();
            prop_assert_eq!(read_zone(&zone(z)).unwrap(), z);
        }
    }
}
