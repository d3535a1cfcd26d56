//! What to observe next: which bodies, from when to when, on which side, and how good each would be.

mod identify;
mod sampled;
mod track;
mod window;

pub use identify::{Candidate, identify};
pub use sampled::{HorizonInstant, TwilightInstant};
pub use track::Track;
pub use window::{Window, WindowEnd};

use crate::angle::{Position, TrueBearing};
use crate::horizon::horizontal;
use crate::limits::Limits;
use crate::sky::{self, Body};
use crate::time::UtcInstant;

/// The question: a ship, a span of time.
#[derive(Debug, Clone)]
pub struct Ask<'a> {
    /// Where the ship is and how she goes.
    pub track: Track,
    /// Hours to look ahead.
    pub hours: f64,
    /// Height of eye, metres.
    pub eye_height_m: f64,
    /// Uncertainties, bands of altitude, blind arcs, how dark it must be.
    pub limits: &'a Limits,
}

/// The longest span that is looked at, hours: two days.
pub const LONGEST_H: f64 = 48.0;

impl Ask<'_> {
    /// The instants looked at, whole steps of `step_s` from the start to the end, both included.
    fn instants(&self, step_s: f64) -> Vec<UtcInstant> {
        let span_s = self.hours.clamp(0.0, LONGEST_H) * 3600.0;
        let steps = (span_s / step_s).ceil() as u32;
        (0..=steps).filter_map(|i| self.track.from.plus_seconds((f64::from(i) * step_s).min(span_s)).ok()).collect()
    }
}

/// Polaris, which has a line of its own: it stands nearly still.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PolarisLine {
    /// Azimuth at the start.
    pub azimuth_from: TrueBearing,
    /// Azimuth at the end.
    pub azimuth_to: TrueBearing,
    /// Altitude at the start, degrees.
    pub altitude_deg: f64,
    /// Whether it is dark enough for it at some time in the span.
    pub dark: bool,
}

/// The answer.
#[derive(Debug, Clone)]
pub struct Plan {
    /// Usable windows, in order of time.
    pub windows: Vec<Window>,
    /// Risings and settings on the celestial horizon, in order of time.
    pub horizon: Vec<HorizonInstant>,
    /// Twilights, in order of time.
    pub twilight: Vec<TwilightInstant>,
    /// Polaris, where it stands above the horizon.
    pub polaris: Option<PolarisLine>,
}

/// What can be observed along the track.
///
/// Instants are found to the second from samples five minutes apart: a body that shows itself for less is passed over.
pub fn plan(ask: &Ask) -> Plan {
    let mut windows: Vec<Window> = Body::all().filter(|b| !is_polaris(*b)).flat_map(|body| window::windows(ask, body)).collect();
    windows.sort_by(|a, b| a.from.utc.cmp(&b.from.utc).then(a.u_deg.total_cmp(&b.u_deg)));
    Plan { windows, horizon: sampled::horizon(ask), twilight: sampled::twilights(ask), polaris: polaris(ask) }
}

impl Plan {
    /// The window with the least uncertainty; the earlier of two alike.
    pub fn best_window(&self) -> Option<&Window> {
        self.windows.iter().min_by(|a, b| better(a, b))
    }

    /// The rank of a window by the uncertainty that an observation in it would have: 1 for the best.
    pub fn rank(&self, window: &Window) -> usize {
        1 + self.windows.iter().filter(|other| better(other, window).is_lt()).count()
    }
}

/// The less uncertain first, the earlier of two alike.
fn better(a: &Window, b: &Window) -> std::cmp::Ordering {
    a.u_deg.total_cmp(&b.u_deg).then(a.from.utc.cmp(&b.from.utc))
}

fn is_polaris(body: Body) -> bool {
    body.name() == "Polaris"
}

fn polaris(ask: &Ask) -> Option<PolarisLine> {
    let body = Body::all().find(|b| is_polaris(*b))?;
    let instants = ask.instants(600.0);
    let seen = |utc: UtcInstant| horizontal(&sky::apparent_place(body, utc), ask.track.at(utc)).ok();
    let (first, last) = (seen(*instants.first()?)?, seen(*instants.last()?)?);
    let dark = instants.iter().any(|utc| window::dark_enough(body, *utc, ask.track.at(*utc), ask.limits));
    (first.altitude_deg > 5.0).then_some(PolarisLine {
        azimuth_from: first.azimuth,
        azimuth_to: last.azimuth,
        altitude_deg: first.altitude_deg,
        dark,
    })
}

/// Altitude of the sun, degrees.
pub(crate) fn sun_altitude_deg(utc: UtcInstant, at: Position) -> f64 {
    crate::horizon::altitude_deg(&sky::apparent_place(Body::Sun, utc), at)
}
