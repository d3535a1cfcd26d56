//! The bodies that can be observed, and their names.

use super::stars::Star;
use crate::error::BadValue;
use std::collections::HashMap;
use std::sync::LazyLock;

/// A body of the sky whose place can be computed.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Body {
    /// The sun.
    Sun,
    /// The moon.
    Moon,
    /// One of the four navigational planets.
    Planet(Planet),
    /// One of the navigational stars.
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

impl Planet {
    /// All four, in order from the sun.
    pub const ALL: [Self; 4] = [Self::Venus, Self::Mars, Self::Jupiter, Self::Saturn];
}

/// Other spellings that are in use, by the name that is ours. Common practice. Bayer's names of doubles go without their number. A name that
/// belongs to two stars is left out: Algenib is Mirfak in some lists, gamma Pegasi in others (from memory).
const SPELLINGS: [(&str, &str); 29] = [
    ("rigilkent", "Rigil Kentaurus"),
    ("alphacentauri", "Rigil Kentaurus"),
    ("toliman", "Rigil Kentaurus"),
    ("northstar", "Polaris"),
    ("polestar", "Polaris"),
    ("alnath", "Elnath"),
    ("nath", "Elnath"),
    ("agena", "Hadar"),
    ("benetnasch", "Alkaid"),
    ("shedir", "Schedar"),
    ("schedir", "Schedar"),
    ("shedar", "Schedar"),
    ("etamin", "Eltanin"),
    ("eltamin", "Eltanin"),
    ("marfak", "Mirfak"),
    ("alphacen", "Rigil Kentaurus"),
    ("alphacru", "Acrux"),
    ("alphalib", "Zubenelgenubi"),
    ("thetaeri", "Acamar"),
    ("denebkaitos", "Diphda"),
    ("gemma", "Alphecca"),
    ("alphekka", "Alphecca"),
    ("rasalhauge", "Rasalhague"),
    ("betelgeux", "Betelgeuse"),
    ("betelguese", "Betelgeuse"),
    ("kausaust", "Kaus Australis"),
    ("zubenelg", "Zubenelgenubi"),
    ("zubenubi", "Zubenelgenubi"),
    ("formalhaut", "Fomalhaut"),
];

/// The letters of a name, small, without blanks and marks, in a buffer of their own.
struct Letters {
    bytes: [u8; 32],
    len: usize,
}

impl Letters {
    fn of(text: &str) -> Option<Self> {
        let mut letters = Self { bytes: [0; 32], len: 0 };
        for byte in text.bytes().filter(u8::is_ascii_alphanumeric) {
            *letters.bytes.get_mut(letters.len)? = byte.to_ascii_lowercase();
            letters.len += 1;
        }
        Some(letters)
    }

    fn as_bytes(&self) -> &[u8] {
        self.bytes.get(..self.len).unwrap_or_default()
    }
}

/// Every spelling that is known, by its letters.
static NAMES: LazyLock<HashMap<Vec<u8>, Body>> = LazyLock::new(|| {
    let mut names = HashMap::new();
    let mut add = |name: &str, body| {
        if let Some(letters) = Letters::of(name) {
            names.entry(letters.as_bytes().to_vec()).or_insert(body);
        }
    };
    for (other, name) in SPELLINGS {
        Body::all().filter(|body| body.name() == name).for_each(|body| add(other, body));
    }
    for body in Body::all() {
        add(body.name(), body);
        if let Body::Star(star) = body {
            add(star.bayer(), body);
        }
    }
    names
});

impl Body {
    /// Every body: the sun, the moon, the planets, the stars in the almanac's order.
    pub fn all() -> impl Iterator<Item = Self> {
        [Self::Sun, Self::Moon].into_iter().chain(Planet::ALL.map(Self::Planet)).chain(Self::stars())
    }

    /// Every star, in the almanac's order, Polaris last.
    pub fn stars() -> impl Iterator<Item = Self> {
        Star::all().map(Self::Star)
    }

    /// The name, as it is printed.
    pub fn name(self) -> &'static str {
        match self {
            Self::Sun => "Sun",
            Self::Moon => "Moon",
            Self::Planet(Planet::Venus) => "Venus",
            Self::Planet(Planet::Mars) => "Mars",
            Self::Planet(Planet::Jupiter) => "Jupiter",
            Self::Planet(Planet::Saturn) => "Saturn",
            Self::Star(star) => star.name(),
        }
    }

    /// The body of that name: in any case and spacing, by common spellings, stars also by Bayer's name (`alpha And`).
    ///
    /// # Errors
    /// [`BadValue`] with the nearest names for one that is not known.
    pub fn from_name(text: &str) -> Result<Self, BadValue> {
        let unknown = || {
            let near = nearest_names(text);
            let hint = if near.is_empty() { String::new() } else { format!("is it {}?", near.join(" or ")) };
            BadValue::new(text, "the Sun, the Moon, Venus, Mars, Jupiter, Saturn or a navigational star").hint(hint)
        };
        let letters = Letters::of(text).filter(|l| l.len > 0).ok_or_else(unknown)?;
        if letters.as_bytes() == b"sun" {
            return Ok(Self::Sun);
        }
        NAMES.get(letters.as_bytes()).copied().ok_or_else(unknown)
    }

    /// Visual magnitude, smaller is brighter; `None` for the sun and the moon, which need no darkness.
    ///
    /// Planets: a typical value (from memory), for Venus -4.1, Mars 0.7, Jupiter -2.2, Saturn 0.7; Mars may be from -2.9 to 1.8.
    /// Source of the stars': the Hipparcos main catalogue.
    pub fn magnitude(self) -> Option<f64> {
        match self {
            Self::Sun | Self::Moon => None,
            Self::Planet(Planet::Venus) => Some(-4.1),
            Self::Planet(Planet::Jupiter) => Some(-2.2),
            Self::Planet(Planet::Mars | Planet::Saturn) => Some(0.7),
            Self::Star(star) => Some(star.magnitude()),
        }
    }
}

/// The names that `text` is most like, at most three.
fn nearest_names(text: &str) -> Vec<&'static str> {
    let wanted = text.trim().to_lowercase();
    let mut near: Vec<(usize, &'static str)> = Body::all()
        .map(|b| b.name())
        .map(|name| (crate::error::edits(&wanted, &name.to_lowercase()), name))
        .filter(|(edits, name)| {
            edits * 3 <= name.len().max(wanted.len()) || (wanted.len() >= 3 && name.to_lowercase().starts_with(&wanted))
        })
        .collect();
    near.sort();
    near.into_iter().take(3).map(|(_, name)| name).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_in_any_dress() {
        for (text, name) in [
            ("sun", "Sun"),
            (" MOON ", "Moon"),
            ("jupiter", "Jupiter"),
            ("rigil  kent.", "Rigil Kentaurus"),
            ("Rigel", "Rigel"),
            ("al nair", "Al Na'ir"),
            ("ALNAIR", "Al Na'ir"),
            ("kaus-australis", "Kaus Australis"),
            ("alpha and", "Alpheratz"),
            ("north star", "Polaris"),
            ("El Nath", "Elnath"),
            ("Alpha Cen", "Rigil Kentaurus"),
            ("alpha-1 cru", "Acrux"),
            ("alpha cru", "Acrux"),
        ] {
            assert_eq!(Body::from_name(text).unwrap_or_else(|e| panic!("{e}")).name(), name, "{text}");
        }
        for body in Body::all() {
            assert_eq!(Body::from_name(body.name()).unwrap(), body);
        }
        for (other, name) in SPELLINGS {
            assert_eq!(Body::from_name(other).unwrap().name(), name, "{other}");
        }
    }

    #[test]
    fn unknown_names_get_the_nearest() {
        let hint = |text: &str| Body::from_name(text).unwrap_err().hint.into_owned();
        assert_eq!(hint("Alderbaran"), "is it Aldebaran?");
        assert_eq!(hint("Capela"), "is it Capella?");
        assert_eq!(hint("xyzzy"), "");
        assert!(Body::from_name("Algenib").is_err(), "two stars have had that name");
        assert!(Body::from_name("").is_err() && Body::from_name("½").is_err());
        assert!(Body::from_name(&"a".repeat(500)).is_err());
    }
}
