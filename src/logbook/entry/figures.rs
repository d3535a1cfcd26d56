//! Readings and logged results of a row.

use super::target::one_of;
use super::{Logged, Reader};
use crate::angle::text::{Letters, read_direction, read_error, read_number};
use crate::angle::{CompassBearing, GyroBearing, Reading};
use crate::compass::{GyroType, Observation, Target, Whereabouts};
use crate::error::BadValue;
use crate::logbook::columns::Column;
use crate::logbook::log::Cells;

impl<C: Cells> Reader<'_, C> {
    /// The readings, in an observation whose target, time and place are filled in by the caller.
    pub(super) fn readings(&mut self) -> Observation {
        const TYPES: [(&str, GyroType); 2] = [("spinning", GyroType::Spinning), ("other", GyroType::Other)];
        const PLACES: [(&str, Whereabouts); 3] =
            [("sea", Whereabouts::Sea), ("anchor", Whereabouts::Anchor), ("berth", Whereabouts::Berth)];
        const MEANT_TYPES: [(&str, &str); 5] =
            [("fog", "other"), ("fib", "other"), ("sat", "other"), ("ring laser", "other"), ("mechanical", "spinning")];
        const MEANT_PLACES: [(&str, &str); 6] =
            [("harbour", "berth"), ("port", "berth"), ("moored", "berth"), ("along", "berth"), ("dock", "berth"), ("under way", "sea")];
        let number = |range, what| move |text: &str| read_number(text, range, what);
        Observation {
            gyro_bearing: self.direction(Column::GyroBearing, GyroBearing::wrapping_deg),
            compass_bearing: self.direction(Column::CompassBearing, CompassBearing::wrapping_deg),
            gyro_heading: self.direction(Column::GyroHeading, GyroBearing::wrapping_deg),
            compass_heading: self.direction(Column::CompassHeading, CompassBearing::wrapping_deg),
            speed_kn: self.read(Column::Speed, number(0.0..=100.0, "a speed in knots, 0 to 100")),
            eye_height_m: self.read(Column::EyeHeight, number(0.0..=100.0, "a height of eye in metres, 0 to 100")),
            heel_deg: self.read(Column::Heel, number(-90.0..=90.0, "a heel in degrees, starboard +, -90 to 90")),
            whereabouts: self.read(Column::Where, |text| one_of(text, &PLACES, &MEANT_PLACES, "sea, anchor or berth")).unwrap_or_default(),
            gyro_type: self.read(Column::GyroType, |text| one_of(text, &TYPES, &MEANT_TYPES, "spinning or other")).unwrap_or_default(),
            ..Observation::of(Target::Headings)
        }
    }

    fn direction<T>(&mut self, column: Column, of: impl FnOnce(f64) -> T) -> Option<Reading<T>> {
        self.read(column, read_direction).map(|reading| reading.map(of))
    }

    /// What the officer worked out.
    pub(super) fn logged(&mut self) -> Logged {
        let sign = self.read_as.logged_sign;
        let east_plus = crate::angle::text::ErrorSign::EastPlus;
        let error = |sign, letters| move |text: &str| -> Result<Reading<f64>, BadValue> { read_error(text, sign, letters) };
        Logged {
            azimuth: self.read(Column::LoggedAzimuth, read_direction),
            gyro_error: self.read(Column::LoggedGyroError, error(sign, Letters::LowHighToo)),
            compass_error: self.read(Column::LoggedCompassError, error(east_plus, Letters::EastWest)),
            variation: self.read(Column::LoggedVariation, error(east_plus, Letters::EastWest)),
            deviation: self.read(Column::LoggedDeviation, error(east_plus, Letters::EastWest)),
        }
    }
}
