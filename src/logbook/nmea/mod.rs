//! What a ship's own instruments say on a line of NMEA 0183: bytes in, time, position, heading and speed out.
//!
//! Nothing here opens a file or a socket or knows the time of day: bytes are pushed as they come, with the moment of their
//! arrival, and [`Bridge::found`] answers what can be taken, from which sentence, how old it is, and what was refused and why.
//!
//! | sentence | taken from it | not taken |
//! |---|---|---|
//! | ZDA | time with its date | the zone in it: the time is UTC already |
//! | RMC | time with its date, position, speed | all of it without status A, or by the modes E, M, N, S; its course |
//! | GGA | position | of the qualities other than 1 to 5; it has no date |
//! | GLL | position | without status A, or by the modes E, M, N, S; it has no date |
//! | HDT, THS | gyro heading, from the talker HE or the one named | from other talkers; THS by the modes M, S, V |
//! | HDG | compass heading: the sensor's reading, before its deviation | from a gyro |
//! | VTG | speed | by the modes E, M, N, S; its course, for a course is not a heading |
//!
//! A sentence counts only with a right checksum.
//!
//! Source: the sentences of NMEA 0183 and IEC 61162-1, as common practice describes them.

mod bridge;
mod clock;
mod doubt;
mod fields;
mod fill;
mod fix;
mod head;
mod latest;
mod lines;
mod pace;
mod refused;
mod sentence;

pub use bridge::{Ages, Bridge, FromBridge};
pub use clock::{ClockCheck, Recorded};
pub use doubt::Doubt;
pub use fill::{Fill, Item};
pub use latest::Found;
pub use lines::{LONGEST_SENTENCE, LineCounts};
pub use refused::{Refusal, Refused};
pub use sentence::{Kind, SentenceName, Talker};
