//! Angles as text: every form that logs are written in, and the one form that we write.

mod direction;
mod number;
mod plain;
mod position;
mod signed;
mod token;
pub mod write;

pub use direction::read_direction;
pub use number::read_number;
pub use position::{read_latitude, read_longitude, read_position};
pub use signed::{ErrorSign, Letters, read_error};

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::{Latitude, Longitude, Position};
    use proptest::prelude::*;

    proptest! {
        #[test]
        fn positions_read_back(lat in -90.0_f64..=90.0, lon in -179.99_f64..=180.0) {
            let (lat, lon) = (Latitude::from_deg(lat).unwrap(), Longitude::from_deg(lon).unwrap());
            let (back_lat, back_lon) = read_position(&write::position(Position { lat, lon })).unwrap();
            prop_assert!((back_lat.value.deg() - lat.deg()).abs() <= 0.0501 / 60.0);
            prop_assert!((back_lon.value.deg() - lon.deg()).abs() <= 0.0501 / 60.0);
        }

        #[test]
        fn directions_read_back(deg in 0.0_f64..360.0) {
            let back = read_direction(&write::direction(deg, 1)).unwrap().value;
            prop_assert!(crate::angle::wrap_180_deg(back - deg).abs() <= 0.050_001);
        }

        #[test]
        fn errors_read_back(deg in -180.0_f64..=180.0) {
            let back = read_error(&write::east_west(deg), ErrorSign::EastPlus, Letters::EastWest).unwrap().value;
            prop_assert!((back - deg).abs() <= 0.050_001);
            let back = read_error(&write::low_high(deg), ErrorSign::HighPlus, Letters::LowHighToo).unwrap().value;
            prop_assert!((back - deg).abs() <= 0.050_001);
        }

        #[test]
        fn no_text_panics(text in ".{0,40}") {
            let _ = (read_latitude(&text).is_ok(), read_longitude(&text).is_ok(), read_position(&text).is_ok());
            let _ = (read_direction(&text).is_ok(), read_error(&text, ErrorSign::EastPlus, Letters::LowHighToo).is_ok());
            let _ = read_number(&text, 0.0..=1.0, "a number");
        }

        #[test]
        fn no_mix_of_its_own_characters_panics(text in "[-+0-9.NSEWOnsewo°'\"½ ,:/]{0,24}") {
            if let Ok(lat) = read_latitude(&text) { prop_assert!(lat.value.deg().abs() <= 90.0); }
            if let Ok(direction) = read_direction(&text) { prop_assert!((0.0..360.0).contains(&direction.value)); }
            let _ = read_position(&text);
        }
    }
}
