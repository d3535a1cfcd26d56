//! Where the bytes come from.

use shadowpin::error::BadValue;
use std::fmt;
use std::path::{Path, PathBuf};

/// A source as the user names it.
#[derive(Debug, PartialEq)]
pub enum Source {
    /// `-`.
    Standard,
    /// A recording, a device, a named pipe.
    File(PathBuf),
    /// A port of this machine.
    Udp(u16),
    /// A host and its port, `[::1]:10110` for an address with colons.
    Tcp(String),
}

const EXPECTED: &str = "a file, - for standard input, udp:PORT or tcp:HOST:PORT";

impl Source {
    /// Reads a source; a file whose name begins with `udp:` is given as `./udp:...`.
    pub fn of(path: &Path) -> Result<Self, BadValue> {
        let Some(text) = path.to_str() else { return Ok(Self::File(path.to_owned())) };
        let bad = |hint: &'static str| BadValue::new(text, EXPECTED).hint(hint);
        let port = |port: &str| port.parse::<u16>().ok().filter(|p| *p > 0);
        let port_hint = "a port is a number from 1 to 65535";
        match text.split_once(':') {
            _ if text == "-" => Ok(Self::Standard),
            _ if text.is_empty() => Err(bad("")),
            Some((kind, rest)) if kind.eq_ignore_ascii_case("udp") => port(rest).map(Self::Udp).ok_or_else(|| bad(port_hint)),
            Some((kind, rest)) if kind.eq_ignore_ascii_case("tcp") => {
                let (host, at) = rest.rsplit_once(':').ok_or_else(|| bad("the port is missing"))?;
                port(at).ok_or_else(|| bad(port_hint))?;
                let bracketed = host.starts_with('[') && host.ends_with(']');
                if host.is_empty() || (host.contains(':') && !bracketed) {
                    return Err(bad("an address with colons stands in brackets: tcp:[::1]:10110"));
                }
                Ok(Self::Tcp(rest.to_owned()))
            }
            _ => Ok(Self::File(path.to_owned())),
        }
    }
}

impl fmt::Display for Source {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Standard => write!(f, "standard input"),
            Self::File(path) => write!(f, "{}", path.display()),
            Self::Udp(port) => write!(f, "udp:{port}"),
            Self::Tcp(address) => write!(f, "tcp:{address}"),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn sources() {
        let of = |text: &str| Source::of(Path::new(text));
        assert_eq!(of("-"), Ok(Source::Standard));
        assert_eq!(of("udp:10110"), Ok(Source::Udp(10110)));
        assert_eq!(of("TCP:bridge:10110"), Ok(Source::Tcp("bridge:10110".into())));
        assert_eq!(of("tcp:[::1]:10110"), Ok(Source::Tcp("[::1]:10110".into())));
        assert_eq!(of("./udp:1"), Ok(Source::File("./udp:1".into())));
        for bad in ["", "udp:", "udp:0", "udp:65536", "udp:x:1", "tcp:", "tcp:1", "tcp::1", "tcp:host:", "tcp:::1:10110"] {
            assert!(of(bad).is_err(), "{bad}");
        }
    }
}
