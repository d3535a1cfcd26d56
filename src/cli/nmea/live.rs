//! Listening for as long as the program runs.

use super::listen::{cannot, connect};
use super::source::Source;
use super::{NmeaArgs, gyro_talker};
use crate::cli::when_where::{now, option};
use serde_json::{Value, json};
use shadowpin::error::{Error, Result};
use shadowpin::limits::Limits;
use shadowpin::logbook::nmea::{Ages, Bridge, Recorded};
use shadowpin::watch::heard;
use std::fs::File;
use std::io::{self, ErrorKind, Read};
use std::net::{Ipv4Addr, UdpSocket};
use std::sync::{Arc, Mutex, MutexGuard, PoisonError};
use std::time::{Duration, Instant};

/// Bytes read at a time; a datagram is never larger.
const CHUNK: usize = 1 << 16;
/// A connection that could not be had, or was closed, is tried again after this time.
const AGAIN_AFTER: Duration = Duration::from_secs(2);

/// A source that is listened to.
pub struct Live {
    name: String,
    ear: Arc<Mutex<Ear>>,
    start: Instant,
    /// A recording, whose ages count by its own last word.
    recorded: bool,
}

struct Ear {
    bridge: Bridge,
    /// What is the matter with the source; empty where nothing is.
    state: String,
}

impl Live {
    /// Begins to listen; `None` where no source was given.
    pub fn start(args: &NmeaArgs) -> Result<Option<Self>> {
        let Some(path) = &args.nmea else { return Ok(None) };
        let source = option("--nmea", Source::of(path))?;
        let talker = args.nmea_heading.as_deref().map(|t| option("--nmea-heading", gyro_talker(t))).transpose()?;
        let ear = Arc::new(Mutex::new(Ear { bridge: Bridge::new(talker), state: String::new() }));
        let mut live = Self { name: source.to_string(), ear, start: Instant::now(), recorded: false };
        match source {
            Source::File(path) => {
                let failed = |source| Error::File { path: path.clone(), source };
                let mut file = File::open(&path).map_err(failed)?;
                live.recorded = file.metadata().map_err(failed)?.is_file();
                if live.recorded {
                    live.hear(|chunk| file.read(chunk)).map_err(failed)?;
                } else {
                    live.in_background(move |chunk| file.read(chunk));
                }
            }
            Source::Standard => live.in_background(|chunk| io::stdin().lock().read(chunk)),
            Source::Udp(port) => {
                let socket = UdpSocket::bind((Ipv4Addr::UNSPECIFIED, port));
                let socket = socket.map_err(|e| cannot(&Source::Udp(port), "open the port", &e))?;
                // A datagram may be empty, which ends nothing.
                live.in_background(move |chunk| socket.recv(chunk).map(|count| count.max(1)));
            }
            Source::Tcp(address) => live.connected(address),
        }
        Ok(Some(live))
    }

    /// What can be taken now, and what is the matter with the source.
    pub fn heard(&self, limits: &Limits) -> Value {
        let (found, state) = {
            let ear = held(&self.ear);
            let ages = if self.recorded { Ages::ByStream } else { Ages::ByArrival { now: self.start.elapsed() } };
            (ear.bridge.found(ages, limits), ear.state.clone())
        };
        let recorded = if self.recorded { Recorded::Yes } else { Recorded::No };
        let clock = now().ok().and_then(|now| found.clock(now, recorded));
        let mut answer = heard(&found, clock);
        if let Value::Object(members) = &mut answer {
            members.insert("source".to_owned(), json!(self.name));
            members.insert("state".to_owned(), json!(state));
        }
        answer
    }

    /// Hears to the end.
    fn hear(&self, read: impl FnMut(&mut [u8]) -> io::Result<usize>) -> io::Result<()> {
        to_the_end(&self.ear, self.start, read)
    }

    fn in_background(&self, read: impl FnMut(&mut [u8]) -> io::Result<usize> + Send + 'static) {
        let (ear, start) = (Arc::clone(&self.ear), self.start);
        std::thread::spawn(move || {
            let ended = to_the_end(&ear, start, read);
            held(&ear).state = ended.map_or_else(|why| why.to_string(), |()| "it has ended".to_owned());
        });
    }

    /// A server of the bridge may be started later, or again.
    fn connected(&self, address: String) {
        let (ear, start) = (Arc::clone(&self.ear), self.start);
        std::thread::spawn(move || {
            let source = Source::Tcp(address.clone());
            loop {
                let ended = connect(&source, &address, Duration::from_secs(5)).map_err(|why| why.to_string()).and_then(|mut stream| {
                    held(&ear).state.clear();
                    to_the_end(&ear, start, |chunk| stream.read(chunk)).map_err(|why| why.to_string())
                });
                held(&ear).state = ended.map_or_else(|why| why, |()| "the connection was closed".to_owned());
                std::thread::sleep(AGAIN_AFTER);
            }
        });
    }
}

fn held(ear: &Mutex<Ear>) -> MutexGuard<'_, Ear> {
    ear.lock().unwrap_or_else(PoisonError::into_inner)
}

fn to_the_end(ear: &Mutex<Ear>, start: Instant, mut read: impl FnMut(&mut [u8]) -> io::Result<usize>) -> io::Result<()> {
    let mut chunk = vec![0; CHUNK];
    loop {
        match read(&mut chunk) {
            Ok(0) => return Ok(()),
            Ok(count) => held(ear).bridge.push(chunk.get(..count).unwrap_or_default(), start.elapsed()),
            Err(why) if matches!(why.kind(), ErrorKind::Interrupted | ErrorKind::WouldBlock | ErrorKind::TimedOut) => {}
            Err(why) => return Err(why),
        }
    }
}
