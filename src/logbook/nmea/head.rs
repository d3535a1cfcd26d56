//! Headings: HDT, THS, HDG.

use super::fields::{heading, letter};
use super::refused::Refusal;
use super::sentence::{Sentence, Talker};
use crate::angle::{CompassBearing, GyroBearing, Reading};

/// A heading as its sentence gives it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Heading {
    /// Of a gyro.
    Gyro {
        heading: Reading<GyroBearing>,
        /// Whether the instrument calls it estimated.
        estimated: bool,
    },
    /// What the sensor of a magnetic compass reads, before deviation and variation.
    Compass(Reading<CompassBearing>),
}

/// Heading, T. There is no status: who says it decides.
pub(super) fn hdt(s: &Sentence, named: Option<Talker>) -> Result<Heading, Refusal> {
    let heading = heading(s.field(1))?;
    if s.field(2) != "T" {
        return Err(Refusal::Unreadable);
    }
    of_a_gyro(s, named)?;
    Ok(Heading::Gyro { heading: heading.map(GyroBearing::wrapping_deg), estimated: false })
}

/// Heading, mode: A and E are taken, E with a word.
pub(super) fn ths(s: &Sentence, named: Option<Talker>) -> Result<Heading, Refusal> {
    let estimated = match letter(s.field(2))? {
        Some('A') => false,
        Some('E') => true,
        Some(other) => return Err(Refusal::Mode(other)),
        None => return Err(Refusal::Empty),
    };
    let heading = heading(s.field(1))?;
    of_a_gyro(s, named)?;
    Ok(Heading::Gyro { heading: heading.map(GyroBearing::wrapping_deg), estimated })
}

/// Heading of the sensor, deviation, its side, variation, its side: the first is what a compass heading is.
pub(super) fn hdg(s: &Sentence) -> Result<Heading, Refusal> {
    let heading = heading(s.field(1))?;
    if s.name.talker.is_gyro() {
        return Err(Refusal::SensorOfGyro);
    }
    Ok(Heading::Compass(heading.map(CompassBearing::wrapping_deg)))
}

/// The gyro, or the talker that the user named in its place.
fn of_a_gyro(s: &Sentence, named: Option<Talker>) -> Result<(), Refusal> {
    let talker = s.name.talker;
    match named {
        _ if talker.is_magnetic() => Err(Refusal::TrueFromMagnetic),
        Some(named) if named == talker => Ok(()),
        Some(_) => Err(Refusal::NotTheNamed),
        None if talker.is_gyro() => Ok(()),
        None => Err(Refusal::NotTheGyro),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn read(body: &str, named: Option<&str>) -> Result<Heading, Refusal> {
        let line = format!("${body}*{:02x}", super::super::sentence::checksum(body.as_bytes()));
        let named = named.map(|n| Talker::from_text(n).unwrap());
        let sentence = Sentence::read(line.as_bytes()).unwrap().unwrap();
        match body.get(2..5).unwrap() {
            "HDT" => hdt(&sentence, named),
            "THS" => ths(&sentence, named),
            _ => hdg(&sentence),
        }
    }

    fn gyro(deg: f64, estimated: bool) -> Result<Heading, Refusal> {
        Ok(Heading::Gyro { heading: Reading::new(GyroBearing::wrapping_deg(deg), 0.1), estimated })
    }

    #[test]
    fn only_a_gyro_gives_a_gyro_heading() {
        assert_eq!(read("HEHDT,204.0,T", None), gyro(204.0, false));
        assert_eq!(read("HEHDT,360.0,T", None), gyro(0.0, false));
        assert_eq!(read("GPHDT,204.0,T", None), Err(Refusal::NotTheGyro));
        assert_eq!(read("HNHDT,204.0,T", None), Err(Refusal::NotTheGyro));
        assert_eq!(read("GPHDT,204.0,T", Some("gp")), gyro(204.0, false));
        assert_eq!(read("HEHDT,204.0,T", Some("GP")), Err(Refusal::NotTheNamed));
        for named in [None, Some("HC")] {
            assert_eq!(read("HCHDT,204.0,T", named), Err(Refusal::TrueFromMagnetic));
            assert_eq!(read("HCTHS,204.0,A", named), Err(Refusal::TrueFromMagnetic));
        }
        assert_eq!(read("HEHDT,204.0,M", None), Err(Refusal::Unreadable));
        assert_eq!(read("HEHDT,,T", None), Err(Refusal::Empty));
        assert_eq!(read("HEHDT,360.5,T", None), Err(Refusal::Unreadable));
    }

    #[test]
    fn modes_of_a_true_heading() {
        assert_eq!((read("HETHS,204.0,A", None), read("HETHS,204.0,E", None)), (gyro(204.0, false), gyro(204.0, true)));
        for mode in ['M', 'S', 'V', 'a'] {
            assert_eq!(read(&format!("HETHS,204.0,{mode}"), None), Err(Refusal::Mode(mode)));
        }
        assert_eq!(read("HETHS,204.0,", None), Err(Refusal::Empty));
    }

    #[test]
    fn the_sensor_before_its_deviation() {
        let sensor = Heading::Compass(Reading::new(CompassBearing::wrapping_deg(200.5), 0.1));
        assert_eq!(read("HCHDG,200.5,1.5,W,4.6,E", None), Ok(sensor));
        assert_eq!(read("HCHDG,200.5,,,,", None), Ok(sensor));
        assert_eq!(read("HEHDG,200.5,,,,", None), Err(Refusal::SensorOfGyro));
    }
}
