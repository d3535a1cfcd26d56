//! Zone descriptions and clock offsets: the same thing with opposite signs, never guessed from one another.

/// Zone description: what is added to ship's time to get UTC. East longitudes -, west +.
///
/// Kept in minutes, whole quarters of an hour, -14 h to +12 h.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub struct Zone {
    minutes: i16,
}

impl Zone {
    /// UTC itself, zone Z.
    pub const UTC: Self = Self { minutes: 0 };

    /// A zone description of `minutes`, UTC = ship's time + zone; `None` unless it is a whole quarter hour in -14 h to +12 h.
    pub fn from_description_minutes(minutes: i16) -> Option<Self> {
        (minutes % 15 == 0 && (-14 * 60..=12 * 60).contains(&minutes)).then_some(Self { minutes })
    }

    /// The zone of a clock that shows UTC + `minutes`; `None` as above.
    pub fn from_clock_offset_minutes(minutes: i16) -> Option<Self> {
        minutes.checked_neg().and_then(Self::from_description_minutes)
    }

    /// Zone description in minutes: UTC = ship's time + this.
    pub fn description_minutes(self) -> i16 {
        self.minutes
    }

    /// Clock offset in minutes: ship's time = UTC + this.
    pub fn clock_offset_minutes(self) -> i16 {
        -self.minutes
    }
}
