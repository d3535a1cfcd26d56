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
    /// A star.
    Star(Star),
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

/// The stars used in navigation.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Star {}

impl Body {
    /// The name, as it is printed.
    pub fn name(self) -> &'static str {
        match self {
            Self::Sun => "Sun",
            Self::Moon => "Moon",
            Self::Planet(Planet::Venus) => "Venus",
            Self::Planet(Planet::Mars) => "Mars",
            Self::Planet(Planet::Jupiter) => "Jupiter",
            Self::Planet(Planet::Saturn) => "Saturn",
            Self::Star(star) => match star {},
        }
    }

    /// The body of that name, in any case.
    ///
    /// # Errors
    /// [`BadValue`](crate::error::BadValue) for a name that is not known.
    pub fn from_name(text: &str) -> Result<Self, crate::error::BadValue> {
        if text.trim().eq_ignore_ascii_case("sun") { Ok(Self::Sun) } else { Err(crate::error::BadValue::new(text, "a body")) }
    }
}
