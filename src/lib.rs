//! Compass errors by the bearings of celestial bodies: the true azimuth for a time and place, what a bearing says of
//! the gyrocompass and the magnetic compass, and how far each figure can be trusted.
//!
//! # Conventions
//!
//! | quantity | unit | range | sign |
//! |---|---|---|---|
//! | azimuth, bearing, heading, course | degrees | `0 <= x < 360` | clockwise from north |
//! | gyro error | degrees | `-180 < x <= 180` | azimuth - gyro bearing: east +, the gyro reads low; west -, it reads high |
//! | compass error | degrees | `-180 < x <= 180` | azimuth - compass bearing: east +, west - |
//! | variation | degrees | `-180 < x <= 180` | true - magnetic: east +, west - |
//! | deviation | degrees | `-180 < x <= 180` | compass error - variation: east +, west - |
//! | latitude | degrees, geodetic, WGS 84 | `-90..=90` | north + |
//! | longitude | degrees, WGS 84 | `-180 < x <= 180` | east + |
//! | declination | degrees | `-90..=90` | north + |
//! | GHA, LHA | degrees | `0 <= x < 360` | westward |
//! | altitude | degrees, topocentric, no refraction | `-90..=90` | up + |
//! | zone description | hours, kept in minutes | `-14 h..=+12 h` | added to ship's time to get UTC: east longitudes -, west + |
//! | `u` | degrees | `>= 0` | one standard uncertainty |
//! | speed | knots | `>= 0` | |
//! | height of eye | metres | `>= 0` | |
//!
//! Time is UTC taken as UT1, years 1900 to 2100.
//!
//! # Layers
//!
//! Each module uses only those above it in this list, and a test holds that.
//!
//! | module | subject |
//! |---|---|
//! | [`error`], [`notice`] | what could not be done, and what was done less surely |
//! | [`angle`] | directions, signed errors, positions; reading and writing them |
//! | [`time`] | instants, zone descriptions, the scales UT1 and TT |
//! | [`sky`] | where a body is |
//! | [`horizon`] | what an observer sees of it |
//! | [`limits`] | every threshold and uncertainty, with its origin |
//! | [`compass`] | errors, variation, deviation, the gyro |
//! | [`plan`] | what to observe next |
//! | [`logbook`] | the log's columns and their reading; the ship's instruments |
//! | [`review`] | what in a log needs an explanation |
//! | [`report`] | results as rows, text and pictures |
//! | [`watch`] | one observation at the bridge, with its neighbours: JSON in, JSON out |
//! | [`book`] | the ship's own append-only record |
#![forbid(unsafe_code)]
#![warn(missing_docs)]

pub mod angle;
pub mod book;
pub mod compass;
pub mod error;
pub mod horizon;
pub mod limits;
pub mod logbook;
pub mod notice;
pub mod plan;
pub mod report;
pub mod review;
pub mod sky;
pub mod time;
pub mod watch;
