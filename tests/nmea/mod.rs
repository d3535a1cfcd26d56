//! What a ship's instruments say on a line of NMEA 0183: the listener, and the commands that listen.

mod commands;
mod stream;

use std::time::{Duration, SystemTime, UNIX_EPOCH};

/// A sentence with its checksum and line end, from what stands between `$` and `*`.
fn line(body: &str) -> String {
    format!("${body}*{:02X}\r\n", body.bytes().fold(0, |sum, b| sum ^ b))
}

/// Several of them.
fn lines(bodies: &[&str]) -> String {
    bodies.iter().map(|body| line(body)).collect()
}

/// A ZDA of this computer's clock, `later_s` seconds on.
fn zda_now(later_s: i64) -> String {
    let now = SystemTime::now().duration_since(UNIX_EPOCH).unwrap_or(Duration::ZERO).as_secs() as i64;
    let at = chrono::DateTime::from_timestamp(now + later_s, 0).unwrap();
    line(&at.format("GPZDA,%H%M%S.00,%d,%m,%Y,,").to_string())
}
