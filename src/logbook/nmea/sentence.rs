//! One sentence: its checksum, who says it, what kind it is, its fields.

use super::refused::Refusal;
use std::fmt;

/// The two letters of the instrument that speaks: GP, GN a satellite receiver, HE a gyro, HC a magnetic compass.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub struct Talker([u8; 2]);

impl Talker {
    /// From two letters or figures in any case; `None` for anything else.
    pub fn from_text(text: &str) -> Option<Self> {
        match text.trim().as_bytes() {
            [a, b] if a.is_ascii_alphanumeric() && b.is_ascii_alphanumeric() => {
                Some(Self([a.to_ascii_uppercase(), b.to_ascii_uppercase()]))
            }
            _ => None,
        }
    }

    /// Whether that talker is a north-seeking gyro.
    pub fn is_gyro(self) -> bool {
        &self.0 == b"HE"
    }

    /// Whether that talker is a magnetic compass or a fluxgate.
    pub fn is_magnetic(self) -> bool {
        matches!(&self.0, b"HC" | b"HF")
    }

    /// How far down the list of sources of time, position and speed it stands: a receiver of several satellite systems, of GPS,
    /// of another one, an integrated system, anything else (our own order).
    pub(super) fn satellite_rank(self) -> u8 {
        match &self.0 {
            b"GN" => 0,
            b"GP" => 1,
            b"GA" | b"GB" | b"BD" | b"GL" | b"GQ" | b"GI" => 2,
            b"IN" => 3,
            _ => 4,
        }
    }
}

impl fmt::Display for Talker {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        self.0.iter().try_for_each(|b| write!(f, "{}", char::from(*b)))
    }
}

/// The kinds of sentence that are read.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
#[allow(missing_docs, reason = "the standard's own names, explained in the module")]
pub enum Kind {
    Zda,
    Rmc,
    Gga,
    Gll,
    Hdt,
    Ths,
    Hdg,
    Vtg,
}

impl Kind {
    const ALL: [(Self, &'static str); 8] = [
        (Self::Zda, "ZDA"),
        (Self::Rmc, "RMC"),
        (Self::Gga, "GGA"),
        (Self::Gll, "GLL"),
        (Self::Hdt, "HDT"),
        (Self::Ths, "THS"),
        (Self::Hdg, "HDG"),
        (Self::Vtg, "VTG"),
    ];

    fn from_text(text: &str) -> Option<Self> {
        Self::ALL.iter().find(|(_, name)| *name == text).map(|(kind, _)| *kind)
    }
}

impl fmt::Display for Kind {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(Self::ALL.iter().find(|(kind, _)| kind == self).map_or("", |(_, name)| name))
    }
}

/// Talker and kind together: `GPRMC`.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub struct SentenceName {
    /// Who says it.
    pub talker: Talker,
    /// What it is.
    pub kind: Kind,
}

impl fmt::Display for SentenceName {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}{}", self.talker, self.kind)
    }
}

/// A sentence whose checksum is right.
#[derive(Debug, PartialEq)]
pub(super) struct Sentence<'s> {
    pub name: SentenceName,
    fields: Vec<&'s str>,
}

impl<'s> Sentence<'s> {
    /// Reads one, from its `$` on; `None` for a right one of another kind.
    ///
    /// The checksum is the exclusive or of all bytes between `$` and `*`, in two hexadecimal figures.
    pub fn read(bytes: &'s [u8]) -> Result<Option<Self>, Refusal> {
        let Some(body) = bytes.strip_prefix(b"$") else { return Ok(None) };
        let star = body.iter().position(|b| *b == b'*').ok_or(Refusal::NoChecksum)?;
        let (body, sum) = (body.get(..star).unwrap_or_default(), body.get(star + 1..).unwrap_or_default());
        let figures = std::str::from_utf8(sum).ok().filter(|s| s.len() == 2 && s.bytes().all(|b| b.is_ascii_hexdigit()));
        let said = figures.and_then(|s| u8::from_str_radix(s, 16).ok()).ok_or(Refusal::WrongChecksum)?;
        if said != checksum(body) {
            return Err(Refusal::WrongChecksum);
        }
        let text = std::str::from_utf8(body).ok().filter(|t| t.bytes().all(|b| (0x20..0x7f).contains(&b))).ok_or(Refusal::Unreadable)?;
        let mut fields = text.split(',');
        let address = fields.next().unwrap_or_default();
        // A maker's own sentence begins with P; others of five letters may ask for a sentence, and are of no kind that is read.
        let named = address.split_at_checked(2).filter(|_| address.len() == 5 && !address.starts_with('P'));
        let Some((talker, kind)) = named.and_then(|(talker, kind)| Some((Talker::from_text(talker)?, Kind::from_text(kind)?))) else {
            return Ok(None);
        };
        Ok(Some(Self { name: SentenceName { talker, kind }, fields: fields.collect() }))
    }

    /// The field `at`, from 1 as the standard counts; empty where there is none.
    pub fn field(&self, at: usize) -> &'s str {
        at.checked_sub(1).and_then(|at| self.fields.get(at)).map_or("", |field| field.trim())
    }
}

/// The exclusive or of the bytes.
pub(super) fn checksum(bytes: &[u8]) -> u8 {
    bytes.iter().fold(0, |sum, b| sum ^ b)
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    #[test]
    fn checksums() {
        // Common practice: sentences that many texts on NMEA 0183 show, with their checksums.
        for shown in [
            "$GPGGA,123519,4807.038,N,01131.000,E,1,08,0.9,545.4,M,46.9,M,,*47",
            "$GPRMC,123519,A,4807.038,N,01131.000,E,022.4,084.4,230394,003.1,W*6A",
            "$GPZDA,201530.00,04,07,2002,00,00*60",
            "$GPGLL,4916.45,N,12311.12,W,225444,A*31",
        ] {
            assert!(Sentence::read(shown.as_bytes()).unwrap().is_some(), "{shown}");
            assert_eq!(Sentence::read(&shown.as_bytes()[..shown.len() - 3]), Err(Refusal::NoChecksum));
        }
        assert!(Sentence::read(b"$GPZDA,201530.00,04,07,2002,00,00*6G") == Err(Refusal::WrongChecksum));
        assert!(Sentence::read(b"$GPZDA,201530.00,04,07,2002,00,00*6") == Err(Refusal::WrongChecksum));
        assert_eq!(Sentence::read(b"!AIVDM,1*00"), Ok(None));
        assert_eq!(Sentence::read(b"$*00"), Ok(None));
        assert_eq!(Sentence::read(b"$\xc3\xa9*6a"), Err(Refusal::Unreadable));
    }

    #[test]
    fn talkers() {
        assert_eq!(Talker::from_text(" gp ").unwrap().to_string(), "GP");
        for bad in ["", "G", "GPS", "é", "G-"] {
            assert_eq!(Talker::from_text(bad), None, "{bad}");
        }
    }

    proptest! {
        /// One letter changed is always seen.
        #[test]
        fn one_changed_byte_is_refused(at in 1_usize..60, to in 0x20_u8..0x7f) {
            let mut line = b"$GPRMC,123519,A,4807.038,N,01131.000,E,022.4,084.4,230394,003.1,W*6A".to_vec();
            prop_assume!(line[at] != to);
            line[at] = to;
            prop_assert!(Sentence::read(&line).is_err());
        }
    }
}
