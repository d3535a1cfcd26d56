//! The bodies that can be observed.

/// A body of the sky whose place can be computed.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Body {
    /// The sun.
    Sun,
    /// The moon.
    Moon,
    /// One of the four navigational planets.
    Planet(Planet),
    /// x
    Star(u8),
}

/// The planets used in navigation.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Planet {
    /// Venus.
    Venus,
    /// Mars.
    Mars,
    /// Jupiter.
    Jupiter,
    /// Saturn.
    Saturn,
}

impl Body {
    /// x
    pub fn name(self) -> &'static str {
        "Sun"
    }
    /// x
    pub fn from_name(_: &str) -> Result<Self, crate::error::BadValue> {
        Ok(Self::Sun)
    }
}
