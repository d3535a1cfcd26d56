//! Bearings on the horizon: the amplitude, and how high a body stands when it is on the celestial one.

use super::refraction::{dip_deg, refraction_from_apparent_deg, refraction_from_true_deg};
use crate::angle::{Latitude, TrueBearing, wrap_180_deg};
use std::fmt;

/// The sun's mean diameter, degrees: twice 959.63" (The Astronomical Almanac); the eye's measure of a height above the horizon.
pub const SUN_DIAMETER_DEG: f64 = 2.0 * 959.63 / 3600.0;

/// Which of the two crossings of a horizon.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum RisingOrSetting {
    /// Upward, on the eastern side.
    Rising,
    /// Downward, on the western side.
    Setting,
}

/// The part of a body's disc that touches the visible horizon.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Default)]
pub enum Limb {
    /// The centre; the only one a star or planet has.
    #[default]
    Centre,
    /// The highest point.
    Upper,
    /// The lowest point.
    Lower,
}

impl Limb {
    /// How far the limb lies above the centre, in semidiameters.
    fn above_centre(self) -> f64 {
        match self {
            Self::Centre => 0.0,
            Self::Upper => 1.0,
            Self::Lower => -1.0,
        }
    }
}

/// The horizon a body is on.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum HorizonLine {
    /// The centre's geocentric altitude is 0.
    Celestial,
    /// A limb is seen on the line of sea and sky.
    Visible {
        /// Which limb.
        limb: Limb,
        /// Height of eye, metres.
        eye_height_m: f64,
    },
}

impl HorizonLine {
    /// Topocentric altitude of the body's centre on the visible horizon, degrees; geocentric 0 on the celestial one.
    ///
    /// The limb's apparent altitude is the dip, downward; refraction there brings it to the true one.
    pub fn centre_altitude_deg(self, semidiameter_deg: f64) -> f64 {
        match self {
            Self::Celestial => 0.0,
            Self::Visible { limb, eye_height_m } => {
                let apparent = -dip_deg(eye_height_m);
                apparent - refraction_from_apparent_deg(apparent) - limb.above_centre() * semidiameter_deg
            }
        }
    }
}

/// A direction on the horizon, reckoned from true east (rising) or west (setting).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Amplitude {
    /// Which side it is reckoned from.
    pub event: RisingOrSetting,
    /// Degrees toward the north +, toward the south -.
    pub northward_deg: f64,
}

impl Amplitude {
    /// The amplitude of a body that bears `azimuth`.
    pub fn from_azimuth(event: RisingOrSetting, azimuth: TrueBearing) -> Self {
        let northward_deg = match event {
            RisingOrSetting::Rising => wrap_180_deg(90.0 - azimuth.deg()),
            RisingOrSetting::Setting => wrap_180_deg(azimuth.deg() - 270.0),
        };
        Self { event, northward_deg }
    }

    /// The same direction as an azimuth.
    pub fn azimuth(self) -> TrueBearing {
        TrueBearing::wrapping_deg(match self.event {
            RisingOrSetting::Rising => 90.0 - self.northward_deg,
            RisingOrSetting::Setting => 270.0 + self.northward_deg,
        })
    }
}

/// As it is named: `E 21.3 S`; `W 0.0` without a name for what rounds to nothing.
impl fmt::Display for Amplitude {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let side = match self.event {
            RisingOrSetting::Rising => 'E',
            RisingOrSetting::Setting => 'W',
        };
        let tenths = (self.northward_deg * 10.0).round();
        let name = if tenths > 0.0 {
            " N"
        } else if tenths < 0.0 {
            " S"
        } else {
            ""
        };
        write!(f, "{side} {:.1}{name}", tenths.abs() / 10.0)
    }
}

/// Whether a body of that declination reaches the altitude at all.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum AmplitudeAnswer {
    /// It does, in this direction.
    At(Amplitude),
    /// It stays above all day.
    AlwaysAbove,
    /// It stays below all day.
    AlwaysBelow,
}

/// The amplitude of a body from latitude and declination alone, its centre at a geocentric altitude; 0 is the celestial
/// horizon, where sin(amplitude) = sin(declination) / cos(latitude).
///
/// Units and signs: degrees, north +, up +. Where it grazes the altitude, due north or south, it is answered `At`.
/// Within [`POLE_DEG`](super::POLE_DEG) of a pole it neither rises nor sets.
/// Source: the spherical triangle solved for its azimuth.
///
/// # Example
/// ```
/// use shadowpin::angle::Latitude;
/// use shadowpin::horizon::{AmplitudeAnswer, RisingOrSetting, amplitude_at_altitude};
/// let lat = Latitude::from_deg(51.077).ok_or("no such latitude")?;
/// let AmplitudeAnswer::At(a) = amplitude_at_altitude(lat, 19.007, 0.0, RisingOrSetting::Setting) else { return Err("never".into()) };
/// assert_eq!(a.to_string(), "W 31.2 N");
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub fn amplitude_at_altitude(latitude: Latitude, declination_deg: f64, altitude_deg: f64, event: RisingOrSetting) -> AmplitudeAnswer {
    let (lat, dec) = (latitude.deg(), declination_deg);
    // Altitudes of the upper and the lower culmination.
    let (highest, lowest) = (90.0 - (lat - dec).abs(), (lat + dec).abs() - 90.0);
    if altitude_deg > highest {
        return AmplitudeAnswer::AlwaysBelow;
    }
    if altitude_deg < lowest {
        return AmplitudeAnswer::AlwaysAbove;
    }
    if lat.abs() > 90.0 - super::POLE_DEG {
        let elevation = dec * lat.signum();
        return if elevation >= altitude_deg { AmplitudeAnswer::AlwaysAbove } else { AmplitudeAnswer::AlwaysBelow };
    }
    let (sin_lat, cos_lat) = lat.to_radians().sin_cos();
    let (sin_alt, cos_alt) = altitude_deg.to_radians().sin_cos();
    let cos_azimuth = ((dec.to_radians().sin() - sin_lat * sin_alt) / (cos_lat * cos_alt)).clamp(-1.0, 1.0);
    AmplitudeAnswer::At(Amplitude { event, northward_deg: cos_azimuth.asin().to_degrees() })
}

/// How high a limb is seen above the visible horizon, degrees, for a topocentric true altitude of the centre and a height of
/// eye in metres; negative below it. Divided by [`SUN_DIAMETER_DEG`] it is the figure an officer judges by eye.
///
/// The refraction is that of the centre and the semidiameter is the disc's own: near the horizon the lower limb is in truth
/// lifted 0.04 degrees more than the centre, and the disc flattened by about as much, less than the eye can judge.
/// On the celestial horizon the topocentric altitude of the centre is minus the horizontal parallax (to 0.004 degrees for the
/// moon).
///
/// # Example
/// The sun's lower limb, from 15 m, with its centre on the celestial horizon:
/// ```
/// use shadowpin::horizon::{Limb, SUN_DIAMETER_DEG, height_above_visible_horizon_deg};
/// let height = height_above_visible_horizon_deg(-0.0024, SUN_DIAMETER_DEG / 2.0, Limb::Lower, 15.0);
/// assert_eq!(format!("{:.2}", height / SUN_DIAMETER_DEG), "0.61");
/// ```
pub fn height_above_visible_horizon_deg(centre_altitude_deg: f64, semidiameter_deg: f64, limb: Limb, eye_height_m: f64) -> f64 {
    centre_altitude_deg + refraction_from_true_deg(centre_altitude_deg) + limb.above_centre() * semidiameter_deg + dip_deg(eye_height_m)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn lat(deg: f64) -> Latitude {
        Latitude::from_deg(deg).unwrap()
    }

    /// Our own table, kept so that the figures the cadet is told do not move.
    #[test]
    fn limb_heights_in_diameters() {
        let diameters = |altitude, semidiameter, limb, eye| {
            (height_above_visible_horizon_deg(altitude, semidiameter, limb, eye) / SUN_DIAMETER_DEG * 100.0).round() / 100.0
        };
        let sun = |eye| diameters(-8.794 / 3600.0, SUN_DIAMETER_DEG / 2.0, Limb::Lower, eye);
        assert_eq!([0.0, 10.0, 15.0, 20.0, 25.0, 30.0, 40.0].map(sun), [0.40, 0.57, 0.61, 0.65, 0.68, 0.70, 0.75]);
        let star = |eye| diameters(0.0, 0.0, Limb::Centre, eye);
        assert_eq!([0.0, 10.0, 20.0, 30.0].map(star), [0.90, 1.08, 1.15, 1.21]);
        let moon = diameters(-0.95, 0.259, Limb::Upper, 15.0);
        assert!(moon.abs() < 0.15, "the moon's upper limb is about on the horizon: {moon}");
    }

    #[test]
    fn names_of_the_four_quarters() {
        let named = |event, azimuth| Amplitude::from_azimuth(event, TrueBearing::wrapping_deg(azimuth)).to_string();
        assert_eq!(named(RisingOrSetting::Rising, 111.3), "E 21.3 S");
        assert_eq!(named(RisingOrSetting::Rising, 68.7), "E 21.3 N");
        assert_eq!(named(RisingOrSetting::Setting, 291.3), "W 21.3 N");
        assert_eq!(named(RisingOrSetting::Setting, 248.7), "W 21.3 S");
        assert_eq!(named(RisingOrSetting::Setting, 269.96), "W 0.0");
        assert_eq!(named(RisingOrSetting::Setting, 359.99), "W 90.0 N");
    }

    #[test]
    fn an_amplitude_and_its_azimuth_are_one() {
        for event in [RisingOrSetting::Rising, RisingOrSetting::Setting] {
            for i in -89..=89 {
                let amplitude = Amplitude { event, northward_deg: f64::from(i) };
                let back = Amplitude::from_azimuth(event, amplitude.azimuth());
                assert!((back.northward_deg - amplitude.northward_deg).abs() < 1e-9);
            }
        }
    }

    #[test]
    fn neither_rises_nor_sets() {
        let sun = |latitude, dec| amplitude_at_altitude(lat(latitude), dec, 0.0, RisingOrSetting::Rising);
        assert_eq!(sun(70.0, 23.0), AmplitudeAnswer::AlwaysAbove);
        assert_eq!(sun(-70.0, 23.0), AmplitudeAnswer::AlwaysBelow);
        assert_eq!(sun(90.0, 0.1), AmplitudeAnswer::AlwaysAbove);
        assert_eq!(sun(90.0, 0.0), AmplitudeAnswer::AlwaysAbove);
        assert_eq!(sun(-90.0, 0.1), AmplitudeAnswer::AlwaysBelow);
        assert_eq!(sun(89.9999, 0.000_05), AmplitudeAnswer::AlwaysAbove);
        // A graze due north: the arcsine of nearly one keeps half of the digits.
        let AmplitudeAnswer::At(graze) = sun(70.0, 20.0) else { panic!() };
        assert!((graze.northward_deg - 90.0).abs() < 1e-5);
    }

    #[test]
    fn a_high_eye_sees_the_limb_sooner() {
        let centre = |limb, eye_height_m| HorizonLine::Visible { limb, eye_height_m }.centre_altitude_deg(0.267);
        assert!(centre(Limb::Upper, 20.0) < centre(Limb::Upper, 0.0));
        assert!(centre(Limb::Upper, 0.0) < centre(Limb::Centre, 0.0) && centre(Limb::Centre, 0.0) < centre(Limb::Lower, 0.0));
    }
}
