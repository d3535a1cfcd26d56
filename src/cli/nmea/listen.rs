//! Reading from files, pipes and sockets, bounded in time and bytes.

use super::source::Source;
use shadowpin::error::{Error, Result};
use shadowpin::limits::Limits;
use shadowpin::logbook::nmea::{Ages, Bridge, FromBridge, Recorded};
use std::fs::File;
use std::io::{self, ErrorKind, Read};
use std::net::{Ipv4Addr, TcpStream, ToSocketAddrs, UdpSocket};
use std::sync::mpsc;
use std::time::{Duration, Instant};

/// A network is listened to for at least a round of the instruments, so that the better of two talkers has its turn.
const LEAST: Duration = Duration::from_millis(1100);
/// The longest that a socket is waited for at a time.
const SLICE: Duration = Duration::from_millis(100);
/// More bytes than this are not read from a file: weeks of a ship's line.
const MOST_BYTES: u64 = 1 << 30;
/// Bytes read at a time; a datagram is never larger.
const CHUNK: usize = 1 << 16;

/// How the listening went.
pub struct Listened {
    /// What ages are counted to.
    pub ages: Ages,
    /// Whether the data may be old.
    pub recorded: Recorded,
    /// Whether the whole time went by before the data ended, or a network had given enough.
    pub whole_wait: bool,
}

/// Pushes what the source gives, until it ends, or the time is over, or a network has given enough.
pub fn listen(
    source: &Source,
    wait: Duration,
    bridge: &mut Bridge,
    limits: &Limits,
    enough: &dyn Fn(&FromBridge) -> bool,
) -> Result<Listened> {
    let mut ear = Ear { bridge, limits, enough, start: Instant::now(), wait };
    match source {
        Source::Standard => ear.pipe(source, io::stdin()),
        Source::File(path) => {
            let failed = |source| Error::File { path: path.clone(), source };
            let file = File::open(path).map_err(failed)?;
            let kind = file.metadata().map_err(failed)?;
            if kind.is_dir() {
                return Err(failed(io::Error::new(ErrorKind::IsADirectory, "is a folder, not a recording")));
            }
            if kind.is_file() { ear.file(source, file) } else { ear.pipe(source, file) }
        }
        Source::Udp(port) => {
            // Instruments send to every machine of their network, so every address of this one is listened on.
            let socket = UdpSocket::bind((Ipv4Addr::UNSPECIFIED, *port)).map_err(|e| cannot(source, "open the port", &e))?;
            ear.network(source, |wait, chunk| {
                socket.set_read_timeout(Some(wait))?;
                // A datagram may be empty, which ends nothing.
                socket.recv(chunk).map(Some)
            })
        }
        Source::Tcp(address) => {
            let mut stream = connect(source, address, wait)?;
            ear.network(source, |wait, chunk| {
                stream.set_read_timeout(Some(wait))?;
                stream.read(chunk).map(|count| (count > 0).then_some(count))
            })
        }
    }
}

pub(super) fn cannot(source: &Source, what: &str, why: &io::Error) -> Error {
    let hint = if why.kind() == ErrorKind::AddrInUse { "; does another program listen there?" } else { "" };
    Error::Content { file: source.to_string(), line: 0, message: format!("cannot {what}: {why}{hint}") }
}

/// Tries each address of the host.
pub(super) fn connect(source: &Source, address: &str, wait: Duration) -> Result<TcpStream> {
    let start = Instant::now();
    let mut failed = io::Error::new(ErrorKind::NotFound, "the host has no address");
    for at in address.to_socket_addrs().map_err(|e| cannot(source, "find the host", &e))? {
        let left = wait.saturating_sub(start.elapsed()).max(SLICE);
        match TcpStream::connect_timeout(&at, left) {
            Ok(stream) => return Ok(stream),
            Err(why) => failed = why,
        }
    }
    Err(cannot(source, "connect", &failed))
}

struct Ear<'a> {
    bridge: &'a mut Bridge,
    limits: &'a Limits,
    enough: &'a dyn Fn(&FromBridge) -> bool,
    start: Instant,
    wait: Duration,
}

impl Ear<'_> {
    fn recorded(whole_wait: bool) -> Listened {
        Listened { ages: Ages::ByStream, recorded: Recorded::Yes, whole_wait }
    }

    /// A file, to its end.
    fn file(&mut self, source: &Source, mut file: File) -> Result<Listened> {
        let mut chunk = vec![0; CHUNK];
        let mut total = 0;
        loop {
            match file.read(&mut chunk) {
                Ok(0) => return Ok(Self::recorded(false)),
                Ok(count) => {
                    total += count as u64;
                    within(source, total)?;
                    self.bridge.push(chunk.get(..count).unwrap_or_default(), Duration::ZERO);
                }
                Err(why) if why.kind() == ErrorKind::Interrupted => {}
                Err(why) => return Err(cannot(source, "read it", &why)),
            }
        }
    }

    /// A pipe or a device, to its end or until the time is over: it may never end, nor say anything.
    fn pipe(&mut self, source: &Source, mut pipe: impl Read + Send + 'static) -> Result<Listened> {
        let (sender, chunks) = mpsc::sync_channel::<io::Result<Vec<u8>>>(4);
        // It ends with the pipe, or with the program.
        std::thread::spawn(move || {
            loop {
                let mut chunk = vec![0; CHUNK];
                let read = match pipe.read(&mut chunk) {
                    Err(why) if why.kind() == ErrorKind::Interrupted => continue,
                    Ok(0) => return,
                    Ok(count) => {
                        chunk.truncate(count);
                        Ok(chunk)
                    }
                    Err(why) => Err(why),
                };
                let last = read.is_err();
                if sender.send(read).is_err() || last {
                    return;
                }
            }
        });
        let mut total = 0;
        loop {
            match chunks.recv_timeout(self.wait.saturating_sub(self.start.elapsed())) {
                Ok(Ok(chunk)) => {
                    total += chunk.len() as u64;
                    within(source, total)?;
                    self.bridge.push(&chunk, Duration::ZERO);
                }
                Ok(Err(why)) => return Err(cannot(source, "read it", &why)),
                Err(mpsc::RecvTimeoutError::Timeout) => return Ok(Self::recorded(true)),
                Err(mpsc::RecvTimeoutError::Disconnected) => return Ok(Self::recorded(false)),
            }
        }
    }

    /// A socket, until there is enough, or it is closed, or the time is over.
    fn network(&mut self, source: &Source, mut receive: impl FnMut(Duration, &mut [u8]) -> io::Result<Option<usize>>) -> Result<Listened> {
        let mut chunk = vec![0; CHUNK];
        loop {
            let gone = self.start.elapsed();
            let left = self.wait.saturating_sub(gone);
            let heard_enough = gone >= LEAST && (self.enough)(&self.bridge.found(Ages::ByArrival { now: gone }, self.limits));
            if left.is_zero() || heard_enough {
                return Ok(self.live(!heard_enough));
            }
            match receive(left.min(SLICE).max(Duration::from_millis(1)), &mut chunk) {
                Ok(Some(count)) => self.bridge.push(chunk.get(..count).unwrap_or_default(), self.start.elapsed()),
                Ok(None) => return Ok(self.live(false)),
                Err(why) if matches!(why.kind(), ErrorKind::WouldBlock | ErrorKind::TimedOut | ErrorKind::Interrupted) => {}
                Err(why) => return Err(cannot(source, "read it", &why)),
            }
        }
    }

    fn live(&self, whole_wait: bool) -> Listened {
        Listened { ages: Ages::ByArrival { now: self.start.elapsed() }, recorded: Recorded::No, whole_wait }
    }
}

fn within(source: &Source, total: u64) -> Result<()> {
    if total > MOST_BYTES {
        let message = "over 1 GiB: give the last part of it, which is all that counts".to_owned();
        return Err(Error::Content { file: source.to_string(), line: 0, message });
    }
    Ok(())
}
