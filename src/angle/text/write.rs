//! Angles written for a person. Every one rounds first and wraps or carries second.

use crate::angle::{Latitude, Longitude, Position};

/// A direction in three figures with `decimals` decimals: `045.0`; 359.96 is `000.0`.
pub fn direction(deg: f64, decimals: usize) -> String {
    let scale = 10_f64.powi(decimals.min(9) as i32);
    let rounded = (crate::angle::wrap_360_deg(deg) * scale).round() / scale;
    let width = if decimals == 0 { 3 } else { 4 + decimals };
    format!("{:0width$.decimals$}", if rounded >= 360.0 { 0.0 } else { rounded })
}

/// Tenths of a minute, whole and carried: degrees and the minutes that go with them.
fn degrees_and_tenths(deg: f64) -> (u64, u64) {
    let tenths = (deg.abs() * 600.0).round() as u64;
    (tenths / 600, tenths % 600)
}

/// Degrees and minutes of an angle that is not signed: `272°58.1'`, `0°00.0'`.
pub fn degrees_minutes(deg: f64) -> String {
    let (whole, tenths) = degrees_and_tenths(deg);
    format!("{whole}°{:02}.{}'", tenths / 10, tenths % 10)
}

/// An hour angle: as [`degrees_minutes`], and a full circle is `0°00.0'`.
pub fn hour_angle(deg: f64) -> String {
    let tenths = (crate::angle::wrap_360_deg(deg) * 600.0).round() as u64 % 216_000;
    format!("{}°{:02}.{}'", tenths / 600, tenths % 600 / 10, tenths % 10)
}

/// Degrees and minutes with a name for the side: `12°34.5'N`, and no name for what rounds to nothing.
pub fn named_degrees_minutes(deg: f64, width: usize, plus: char, minus: char) -> String {
    let (whole, tenths) = degrees_and_tenths(deg);
    let name = if deg < 0.0 { minus } else { plus };
    format!("{whole:0width$}°{:02}.{}'{name}", tenths / 10, tenths % 10)
}

/// A latitude: `36°05.8'S`.
pub fn latitude(lat: Latitude) -> String {
    named_degrees_minutes(lat.deg(), 2, 'N', 'S')
}

/// A longitude: `130°33.6'E`.
pub fn longitude(lon: Longitude) -> String {
    named_degrees_minutes(lon.deg(), 3, 'E', 'W')
}

/// A position: latitude, then longitude.
pub fn position(position: Position) -> String {
    format!("{} {}", latitude(position.lat), longitude(position.lon))
}

/// A signed figure as its size and a name, to 0.1: `1.5 E`; `0.0` for what rounds to nothing.
pub fn named(deg: f64, plus: &str, minus: &str) -> String {
    let tenths = (deg.abs() * 10.0).round();
    let name = if tenths == 0.0 {
        ""
    } else if deg < 0.0 {
        minus
    } else {
        plus
    };
    format!("{:.1} {name}", tenths / 10.0).trim_end().to_owned()
}

/// An error with its side: `1.5 E`, `1.5 W`.
pub fn east_west(deg: f64) -> String {
    named(deg, "E", "W")
}

/// A gyro error: `0.5 L` (low, east), `0.5 H` (high, west).
pub fn low_high(deg: f64) -> String {
    named(deg, "L", "H")
}

/// The nearest half degree, as a book is kept; never -0.
pub fn nearest_half(deg: f64) -> f64 {
    (deg * 2.0).round() / 2.0 + 0.0
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn round_first_wrap_second() {
        assert_eq!(direction(359.96, 1), "000.0");
        assert_eq!(direction(359.94, 1), "359.9");
        assert_eq!(direction(5.0, 0), "005");
        assert_eq!(direction(-0.01, 1), "000.0");
        assert_eq!(degrees_minutes(12.999_9), "13°00.0'");
        assert_eq!(hour_angle(359.999_99), "0°00.0'");
        assert_eq!(latitude(Latitude::from_deg(-36.096_6).unwrap()), "36°05.8'S");
        assert_eq!(longitude(Longitude::from_deg(7.999_99).unwrap()), "008°00.0'E");
        assert_eq!(latitude(Latitude::from_deg(-0.5).unwrap()), "00°30.0'S");
    }

    #[test]
    fn names() {
        assert_eq!(east_west(-1.46), "1.5 W");
        assert_eq!(low_high(0.5), "0.5 L");
        assert_eq!(low_high(-0.5), "0.5 H");
        assert_eq!(east_west(-0.04), "0.0");
        assert_eq!(nearest_half(-0.2).to_string(), "0");
        assert_eq!(nearest_half(1.3), 1.5);
    }
}
