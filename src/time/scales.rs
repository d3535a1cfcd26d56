//! UT1, by which the earth turns, and TT, by which the bodies move.

/// An instant on the scale UT1: days from J2000.0 (2000-01-01 12h UT1).
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct Ut1 {
    days_j2000: f64,
}

impl Ut1 {
    /// From days since 2000-01-01 12h UT1.
    pub fn from_days_j2000(days: f64) -> Self {
        Self { days_j2000: days }
    }

    /// Days since 2000-01-01 12h UT1.
    pub fn days_j2000(self) -> f64 {
        self.days_j2000
    }
}

/// An instant on the scale TT: days from J2000.0 (2000-01-01 12h TT).
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct Tt {
    days_j2000: f64,
}

impl Tt {
    /// From days since 2000-01-01 12h TT.
    pub fn from_days_j2000(days: f64) -> Self {
        Self { days_j2000: days }
    }

    /// Days since 2000-01-01 12h TT.
    pub fn days_j2000(self) -> f64 {
        self.days_j2000
    }

    /// Julian centuries of 36525 days since J2000.0.
    pub fn centuries_j2000(self) -> f64 {
        self.days_j2000 / 36_525.0
    }
}
