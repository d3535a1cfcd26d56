//! Time, position and speed: ZDA, RMC, GGA, GLL, VTG.

use super::fields::{date_of_six_figures, date_of_three_fields, instant, letter, place, speed_kn, time_of_day};
use super::refused::Refusal;
use super::sentence::Sentence;
use crate::compass::Place;
use crate::time::Moment;
use crate::time::text::TimeOfDay;

/// What one of these sentences says.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub(super) struct Fix {
    pub time: Option<Moment>,
    /// Whether the year was written with two figures.
    pub short_year: bool,
    pub place: Option<Place>,
    pub speed_kn: Option<f64>,
}

/// The time of day that a sentence says, valid or not: it shows that time goes on while a receiver has no fix.
pub(super) fn clock(sentence: &Sentence, at: usize) -> Option<TimeOfDay> {
    time_of_day(sentence.field(at)).ok()
}

/// Time, day, month, year; its zone is not needed.
pub(super) fn zda(s: &Sentence) -> Result<Fix, Refusal> {
    let time = time_of_day(s.field(1))?;
    let date = date_of_three_fields(s.field(2), s.field(3), s.field(4))?;
    Ok(Fix { time: Some(instant(date, time)?), ..Fix::default() })
}

/// Time, status, position, speed, course, date, variation, mode.
pub(super) fn rmc(s: &Sentence) -> Result<Fix, Refusal> {
    status(s.field(2))?;
    mode(s.field(12))?;
    let time = instant(date_of_six_figures(s.field(9))?, time_of_day(s.field(1))?)?;
    let place = place([s.field(3), s.field(4), s.field(5), s.field(6)])?;
    // A receiver that lies still may leave the speed out.
    let speed_kn = match speed_kn(s.field(7)) {
        Err(Refusal::Empty) => None,
        speed => Some(speed?),
    };
    Ok(Fix { time: Some(time), short_year: true, place: Some(place), speed_kn })
}

/// Time without a date, position, quality.
pub(super) fn gga(s: &Sentence) -> Result<Fix, Refusal> {
    match letter(s.field(6))? {
        Some('1'..='5') => {}
        Some(other) => return Err(Refusal::Quality(other)),
        None => return Err(Refusal::Empty),
    }
    time_of_day(s.field(1))?;
    Ok(Fix { place: Some(place([s.field(2), s.field(3), s.field(4), s.field(5)])?), ..Fix::default() })
}

/// Position, time without a date, status, mode.
pub(super) fn gll(s: &Sentence) -> Result<Fix, Refusal> {
    status(s.field(6))?;
    mode(s.field(7))?;
    Ok(Fix { place: Some(place([s.field(1), s.field(2), s.field(3), s.field(4)])?), ..Fix::default() })
}

/// Course, T, course, M, speed, N, speed, K, mode. The course is over the ground and no heading.
pub(super) fn vtg(s: &Sentence) -> Result<Fix, Refusal> {
    mode(s.field(9))?;
    let knots = speed_kn(s.field(5))?;
    if s.field(6) != "N" {
        return Err(Refusal::Unreadable);
    }
    Ok(Fix { speed_kn: Some(knots), ..Fix::default() })
}

fn status(field: &str) -> Result<(), Refusal> {
    match letter(field)? {
        Some('A') => Ok(()),
        Some(_) => Err(Refusal::Status),
        None => Err(Refusal::Empty),
    }
}

/// Autonomous, differential, real-time kinematic (fixed or float) and precise are taken, and so is the field that older
/// editions of the standard do not have.
fn mode(field: &str) -> Result<(), Refusal> {
    match letter(field)? {
        None | Some('A' | 'D' | 'F' | 'P' | 'R') => Ok(()),
        Some(other) => Err(Refusal::Mode(other)),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::time::text::read_utc;

    /// Reads a sentence given without `$` and checksum.
    fn read(body: &str, reader: fn(&Sentence) -> Result<Fix, Refusal>) -> Result<Fix, Refusal> {
        let line = format!("${body}*{:02X}", super::super::sentence::checksum(body.as_bytes()));
        reader(&Sentence::read(line.as_bytes()).unwrap().unwrap())
    }

    #[test]
    fn examples() {
        // Common practice: sentences that many texts on NMEA 0183 show.
        let fix = read("GPRMC,123519,A,4807.038,N,01131.000,E,022.4,084.4,230394,003.1,W", rmc).unwrap();
        assert_eq!(fix.time.unwrap().utc, read_utc("1994-03-23T12:35:19Z").unwrap().utc);
        let at = fix.place.unwrap().position;
        assert!((at.lat.deg() - (48.0 + 7.038 / 60.0)).abs() < 1e-9 && (at.lon.deg() - (11.0 + 31.0 / 60.0)).abs() < 1e-9);
        assert_eq!((fix.speed_kn, fix.short_year), (Some(22.4), true));
        let fix = read("GPGLL,4916.45,N,12311.12,W,225444,A", gll).unwrap();
        assert!((fix.place.unwrap().position.lon.deg() + 123.0 + 11.12 / 60.0).abs() < 1e-9);
        let fix = read("GPZDA,201530.00,04,07,2002,00,00", zda).unwrap();
        assert_eq!(fix.time.unwrap().utc, read_utc("2002-07-04T20:15:30Z").unwrap().utc);
        let fix = read("GPVTG,054.7,T,034.4,M,005.5,N,010.2,K", vtg).unwrap();
        assert_eq!(fix, Fix { speed_kn: Some(5.5), ..Fix::default() });
    }

    #[test]
    fn what_is_not_valid_is_refused() {
        let gga_of = |quality: &str| read(&format!("GPGGA,123519,4807.038,N,01131.000,E,{quality},08,0.9,545.4,M,46.9,M,,"), gga);
        for quality in ["0", "6", "7", "8", "9"] {
            assert_eq!(gga_of(quality), Err(Refusal::Quality(quality.chars().next().unwrap())));
        }
        assert_eq!((gga_of(""), gga_of("12")), (Err(Refusal::Empty), Err(Refusal::Unreadable)));
        assert!(["1", "2", "3", "4", "5"].iter().all(|q| gga_of(q).is_ok_and(|f| f.time.is_none() && f.place.is_some())));
        let rmc_of = |status: &str, mode: &str| read(&format!("GPRMC,123519,{status},4807.038,N,01131.000,E,,,230326,,,{mode}"), rmc);
        assert_eq!((rmc_of("V", "A"), rmc_of("", "A")), (Err(Refusal::Status), Err(Refusal::Empty)));
        let vtg_of = |mode: &str| read(&format!("GPVTG,054.7,T,,M,005.5,N,010.2,K,{mode}"), vtg);
        for mode in ['E', 'M', 'N', 'S', 'x'] {
            let text = mode.to_string();
            assert_eq!(rmc_of("A", &text), Err(Refusal::Mode(mode)));
            assert_eq!(vtg_of(&text), Err(Refusal::Mode(mode)));
            assert_eq!(read(&format!("GPGLL,4916.45,N,12311.12,W,225444,A,{mode}"), gll), Err(Refusal::Mode(mode)));
        }
        assert!(rmc_of("A", "D").is_ok_and(|f| f.speed_kn.is_none()) && vtg_of("").is_ok());
        // Latitude 99, and a time without a date.
        assert_eq!(read("GPGLL,9916.45,N,12311.12,W,225444,A", gll), Err(Refusal::Unreadable));
        assert_eq!(read("GPRMC,123519,A,4807.038,N,01131.000,E,1,2,,,", rmc), Err(Refusal::Empty));
        assert_eq!(read("GPVTG,054.7,T,034.4,M,005.5,K", vtg), Err(Refusal::Unreadable));
        assert_eq!(read("GPZDA,,,,,,", zda), Err(Refusal::Empty));
    }
}
