//! All that a row and its neighbours say, against what a slip would have made of it.

use super::case::{Case, Look, Memo, Sight};
use super::checks::{OffSum, Route, dark_from_deg, sums, written_u_deg};
use super::curve::Curve;
use super::fact::Fact;
use super::order::miles;
use super::query::Sum;
use super::row::Row;
use crate::angle::{Reading, wrap_180_deg};
use crate::limits::Limits;
use crate::sky::Body;
use crate::time::UtcInstant;

/// What is known besides the row itself.
#[derive(Debug, Clone, Copy)]
pub struct Context<'a> {
    /// Gyro error to expect and how far single readings scatter, degrees.
    pub gyro: (f64, f64),
    /// The magnetic compass's curve.
    pub curve: Option<&'a Curve>,
    /// By how much the variation written is off on this vessel, degrees.
    pub variation_off_deg: f64,
    /// The rows before and after it that are in order and on the track.
    pub before: Option<&'a Fact>,
    pub after: Option<&'a Fact>,
    /// A few rows before it.
    pub earlier: &'a [Fact],
    /// How the vessel works its compass errors.
    pub route: Route,
    /// Speed written on the row, knots.
    pub speed_kn: Option<f64>,
    pub limits: &'a Limits,
}

/// How far readings may be from nothing before any run or curve is known, degrees.
pub const UNKNOWN_GYRO: (f64, f64) = (0.0, 2.0);
const UNKNOWN_DEVIATION: (f64, f64) = (0.0, 3.0);
/// Headings of two compasses on a yawing ship, degrees.
const HEADINGS_U_DEG: f64 = 1.2;
/// What an azimuth worked by tables is good for, degrees.
const TABLES_U_DEG: f64 = 0.08;
/// What a subtraction on paper is good for, degrees.
const PAPER_U_DEG: f64 = 0.06;
/// What a variation taken from a chart is good for, besides the model's own u, degrees.
const CHART_U_DEG: f64 = 0.15;
/// A thing that cannot be is taken as this many standard deviations off at most.
const CANNOT_BE: f64 = 6.0;
/// Nothing is observed under this altitude, degrees: dip and refraction from a high bridge.
const LOWEST_DEG: f64 = -0.5;
/// How sharply daylight hides a star, degrees of the sun's altitude.
const TWILIGHT_U_DEG: f64 = 1.5;
/// How far an officer's card may be from the compass's own curve, degrees.
const CARD_U_DEG: f64 = 0.3;
/// Altitudes at a rising or setting are judged by eye to this, degrees.
const HORIZON_U_DEG: f64 = 0.5;
/// Fixes are good for so many miles.
const TRACK_MILES: f64 = 4.0;
/// Between entries a ship may alter course: the straight track is known to this share of the distance run.
const TRACK_SHARE: f64 = 0.5;
/// No ship runs further than her speed and this share more, with the stream.
const STREAM_SHARE: f64 = 0.1;
/// Knots where nothing says how fast the ship was.
const USUAL_KN: f64 = 18.0;

impl Context<'_> {
    fn speed_kn(&self) -> f64 {
        self.speed_kn.unwrap_or(USUAL_KN).max(5.0)
    }

    /// Standard deviations by which the position is further from its neighbours than could be run in the time.
    fn out_of_reach(&self, utc: UtcInstant, position: (f64, f64)) -> Option<f64> {
        let excess = |f: &Fact| {
            let hours = (utc.unix_ms() - f.unix_ms()?).abs() as f64 / 3_600_000.0;
            let run = self.speed_kn() * hours;
            Some((miles(f.place()?, position) - run * (1.0 + STREAM_SHARE) - TRACK_MILES) / (TRACK_MILES + STREAM_SHARE * run))
        };
        let (a, b) = (self.before.and_then(excess), self.after.and_then(excess));
        Some(a.into_iter().chain(b).fold(f64::NEG_INFINITY, f64::max)).filter(|e| e.is_finite())
    }

    /// The position on the track at `utc`, degrees, and how far it is known, miles; beyond the neighbours, carried on.
    pub fn on_track(&self, utc: Option<UtcInstant>) -> Option<((f64, f64), f64)> {
        let t = utc?.unix_ms() as f64 / 1000.0;
        let at = |f: &Fact| Some((f.unix_ms()? as f64 / 1000.0, f.place()?));
        let (a, b) = (self.before.and_then(at), self.after.and_then(at));
        let near = |(time, _): (f64, (f64, f64))| (t - time).abs() / 3600.0;
        match (a, b) {
            (Some(a), Some(b)) if b.0 > a.0 => {
                let share = ((t - a.0) / (b.0 - a.0)).clamp(-1.0, 2.0);
                let lon = a.1.1 + share * wrap_180_deg(b.1.1 - a.1.1);
                let hours = near(a).min(near(b));
                Some(((a.1.0 + share * (b.1.0 - a.1.0), lon), TRACK_MILES + TRACK_SHARE * self.speed_kn() * hours))
            }
            (Some(one), _) | (None, Some(one)) => Some((one.1, TRACK_MILES + self.speed_kn() * near(one))),
            (None, None) => None,
        }
    }
}

/// The sum of squares of everything left over, each against what it is good for.
#[derive(Debug, Clone, Copy, Default, PartialEq)]
pub struct Left {
    /// Sum of squares.
    pub sum: f64,
    /// How many pieces of evidence spoke.
    pub count: usize,
    /// Sum of the weights of those that are angles, 1/degrees squared.
    pub weight: f64,
}

impl Left {
    fn angle(&mut self, off_deg: Option<f64>, u_deg: f64, loose_deg: f64) {
        if let Some(off) = off_deg {
            self.sum += if loose_deg == 0.0 {
                (wrap_180_deg(off) / u_deg).powi(2)
            } else {
                // A looser fit is paid for, so that it does not win by its looseness.
                let u = u_deg.hypot(loose_deg);
                (wrap_180_deg(off) / u).powi(2) + 2.0 * (u / u_deg).ln()
            };
            self.count += 1;
            self.weight += u_deg.powi(-2);
        }
    }

    fn other(&mut self, off: f64) {
        self.sum += off.min(CANNOT_BE).powi(2);
        self.count += 1;
    }
}

/// By how much each logged error is off what its parts give, degrees.
pub fn wrong_by(row: &Row, route: Route) -> (Option<f64>, Option<f64>, Option<f64>) {
    let mut by = (None, None, None);
    for (sum, off, _) in sums(row, route).into_iter().flatten() {
        let slot = match sum {
            Sum::GyroError => &mut by.0,
            Sum::CompassError => &mut by.1,
            Sum::Deviation => &mut by.2,
        };
        *slot = Some(off);
    }
    by
}

/// What the subtractions alone leave of the row as it stands: no slip in time, place or body changes that where the azimuth is
/// written.
pub fn left_of_sums(row: &Row, route: Route) -> f64 {
    if row.logged.azimuth.is_none() {
        return 0.0;
    }
    let figures = [row.logged.gyro_error, row.logged.compass_error, row.logged.deviation];
    let squares = |(sum, figure): (OffSum, Option<Reading<f64>>)| {
        sum.zip(figure).map_or(0.0, |((_, by, _), f)| (by / PAPER_U_DEG.hypot(written_u_deg(f))).powi(2))
    };
    sums(row, route).into_iter().zip(figures).map(squares).sum()
}

/// A row with all that is the same whatever slip is tried.
#[derive(Debug)]
pub struct Ground<'a> {
    pub row: &'a Row<'a>,
    pub context: &'a Context<'a>,
    memo: Memo,
    plain: Sight,
    plain_look: Option<Look>,
    /// Deviation to expect on the heading written, and how far single readings scatter from it, degrees.
    deviation: (f64, f64),
    /// What sky, track and time leave of the row as written.
    around: Left,
    us: Us,
}

/// What each figure of the row is good for, degrees.
#[derive(Debug, Clone, Copy)]
struct Us {
    gyro: f64,
    azimuth: f64,
    gyro_error: f64,
    compass_error: f64,
    deviation: f64,
    /// Of the logged variation, the model's own u aside.
    variation: f64,
}

impl<'a> Ground<'a> {
    pub fn new(row: &'a Row<'a>, context: &'a Context<'a>, plain: Sight) -> Self {
        let (l, budget) = (row.logged, row.worked.azimuth_budget);
        let paper = |figure: Option<Reading<f64>>| PAPER_U_DEG.hypot(figure.map_or(0.0, written_u_deg));
        let us = Us {
            gyro: row.worked.gyro_error.map_or(0.0, |g| g.u_deg()).max(context.gyro.1),
            azimuth: TABLES_U_DEG.hypot(budget.time_deg).hypot(budget.position_deg).hypot(l.azimuth.map_or(0.0, written_u_deg)),
            gyro_error: paper(l.gyro_error),
            compass_error: paper(l.compass_error),
            deviation: paper(l.deviation),
            variation: CHART_U_DEG.hypot(l.variation.map_or(0.0, written_u_deg)),
        };
        let memo = Memo::default();
        let plain_look = plain.look();
        let mut ground = Self { row, context, memo, plain, plain_look, deviation: UNKNOWN_DEVIATION, around: Left::default(), us };
        ground.deviation = ground.deviation_deg(plain.compass_heading);
        let mut around = Left::default();
        track(&plain, context, &mut around);
        ground.sky(&plain, plain_look, &mut around);
        ground.around = around;
        ground
    }

    /// What `case` leaves of everything the row says; `None` where it has no azimuth at all, or leaves more than `most` for certain.
    pub fn left(&self, case: &Case, most: f64) -> Option<Left> {
        let mut left = Left::default();
        let variation = self.variation_deg(case);
        // What needs no look at the sky comes first.
        if self.row.logged.azimuth.is_some() {
            self.sums(case, self.row.logged.azimuth.map(|a| a.value), variation, &mut left)?;
        }
        self.logged_variation(case, variation, &mut left);
        let (so, used) = (&case.so, &case.used);
        let as_written = so.utc == self.plain.utc && so.position == self.plain.position && so.target == self.plain.target;
        if as_written {
            left.sum += self.around.sum;
            left.count += self.around.count;
        } else {
            track(so, self.context, &mut left);
        }
        if left.sum > most {
            return None;
        }
        let look = self.look(so);
        if look.is_none() && so.body().is_some() {
            return None;
        }
        let used_look = if so == used { look } else { self.look(used) };
        self.azimuth(case, used_look, variation, &mut left)?;
        self.instruments(case, look, variation, &mut left);
        if left.sum > most {
            return None;
        }
        if !as_written {
            self.sky(so, look, &mut left);
        }
        Some(left)
    }

    fn look(&self, sight: &Sight) -> Option<Look> {
        if sight.utc == self.plain.utc && sight.position == self.plain.position && sight.target == self.plain.target {
            self.plain_look
        } else {
            self.memo.look(sight)
        }
    }

    /// Variation and its u where the ship was in that case, degrees.
    fn variation_deg(&self, case: &Case) -> Option<(f64, f64)> {
        let (position, utc) = (case.so.position?, case.so.utc?);
        let (place, moment) = (self.row.place?, self.row.moment?);
        // A month changes it by nothing.
        if position == place.position && utc.seconds_since(moment.utc).abs() < 30.0 * 86_400.0 {
            return self.row.worked.variation.map(|v| (v.value.deg(), v.u_deg()));
        }
        self.memo.variation(utc, position)
    }

    /// Deviation to expect on a heading, and how far single readings scatter from it, degrees.
    fn deviation_deg(&self, heading: Option<f64>) -> (f64, f64) {
        if let Some(card) = self.row.card {
            return (card.deviation_deg, self.context.curve.map_or(1.0, |c| c.scatter_deg).hypot(0.5));
        }
        let field = self.row.worked.field.map(|f| (f.horizontal_nt, f.inclination_deg));
        match (self.context.curve, heading, field) {
            (Some(curve), Some(heading), Some(field)) => {
                let (value, u) = curve.at(heading, field);
                (value, curve.scatter_deg.hypot(u))
            }
            _ => UNKNOWN_DEVIATION,
        }
    }

    /// Each instrument against what is known of it.
    fn instruments(&self, case: &Case, look: Option<Look>, variation: Option<(f64, f64)>, left: &mut Left) {
        let (so, context) = (&case.so, self.context);
        let azimuth = look.map(|l| l.azimuth);
        left.angle(azimuth.zip(so.gyro).map(|(z, b)| z - b - context.gyro.0), self.us.gyro, case.loose_deg);
        let Some((variation, variation_u)) = variation else { return };
        let same_heading = so.compass_heading == self.plain.compass_heading;
        let (deviation, deviation_u) = if same_heading { self.deviation } else { self.deviation_deg(so.compass_heading) };
        let compass_u = self.row.worked.deviation.map_or(deviation_u, |d| d.u_deg().max(deviation_u)).hypot(variation_u * 0.5);
        left.angle(azimuth.zip(so.compass).map(|(z, b)| z - b - variation - deviation), compass_u, case.loose_deg);
        let headings = so.gyro_heading.zip(so.compass_heading).map(|(g, c)| g + context.gyro.0 - c - variation - deviation);
        left.angle(headings, deviation_u.hypot(HEADINGS_U_DEG), 0.0);
    }

    /// The logged azimuth; and the subtractions, where they need the one that would have been worked.
    fn azimuth(&self, case: &Case, look: Option<Look>, variation: Option<(f64, f64)>, left: &mut Left) -> Option<()> {
        let worked = case.worked_azimuth(look);
        match self.row.logged.azimuth {
            // A working that has no azimuth cannot have given the logged one.
            Some(azimuth) => left.angle(Some(azimuth.value - worked?), self.us.azimuth, case.loose_deg),
            None => self.sums(case, worked, variation, left)?,
        }
        Some(())
    }

    /// Each logged error against its parts.
    fn sums(&self, case: &Case, azimuth: Option<f64>, variation: Option<(f64, f64)>, left: &mut Left) -> Option<()> {
        let (l, used, r) = (self.row.logged, &case.used, &case.results);
        if let Some(error) = l.gyro_error {
            let parts = azimuth.zip(used.gyro).map(|(z, b)| r.gyro_sign * wrap_180_deg(z - b) + r.gyro_by);
            left.angle(parts.map(|p| error.value - p), self.us.gyro_error, 0.0);
        }
        let compass_error = azimuth.zip(used.compass).map(|(z, b)| r.compass_sign * wrap_180_deg(z - b) + r.compass_by);
        if let Some(error) = l.compass_error {
            let by_headings = l
                .gyro_error
                .zip(used.gyro_heading)
                .zip(used.compass_heading)
                .map(|((e, g), c)| r.compass_sign * wrap_180_deg(g + e.value - c) + r.compass_by);
            let off = |parts: Option<f64>| parts.map(|p| wrap_180_deg(error.value - p));
            let off = match (off(compass_error), off(by_headings)) {
                (Some(a), Some(b)) if b.abs() < a.abs() && self.context.route == Route::Either => Some(b),
                (a, b) => a.or(b),
            };
            left.angle(off, self.us.compass_error, 0.0);
        }
        if let Some(deviation) = l.deviation {
            let applied = l.variation.map(|v| v.value).or(variation.map(|v| v.0)).map(|v| r.applied_sign * v);
            let error = l.compass_error.map(|e| e.value).or(compass_error);
            let (parts, loose_deg) = if r.card_by_bearing {
                let (by_bearing, card_u) = self.deviation_deg_by_bearing(used.compass)?;
                (Some(by_bearing), card_u)
            } else {
                (error.zip(applied).map(|(e, v)| r.deviation_sign * wrap_180_deg(e - v) + r.deviation_by), 0.0)
            };
            left.angle(parts.map(|p| deviation.value - p), self.us.deviation, loose_deg);
        }
        Some(())
    }

    fn logged_variation(&self, case: &Case, variation: Option<(f64, f64)>, left: &mut Left) {
        if let (Some(written), Some((variation, u))) = (self.row.logged.variation, variation) {
            let expected = case.results.variation_sign * (variation + self.context.variation_off_deg);
            left.angle(Some(written.value - expected), self.us.variation.hypot(u), 0.0);
        }
    }

    /// What the curve says for the bearing, as if it were a heading, and how far an officer's card may be from it.
    fn deviation_deg_by_bearing(&self, bearing: Option<f64>) -> Option<(f64, f64)> {
        let field = self.row.worked.field?;
        let (value, u) = self.context.curve?.at(bearing?, (field.horizontal_nt, field.inclination_deg));
        Some((value, u.hypot(CARD_U_DEG)))
    }

    /// The body against horizon and daylight.
    fn sky(&self, so: &Sight, look: Option<Look>, left: &mut Left) {
        if let (Some(body), Some(look)) = (so.body(), look) {
            if let Some(off) = look.off_horizon {
                left.other(off.abs() / HORIZON_U_DEG);
            } else if let Some(altitude) = look.altitude {
                let below = LOWEST_DEG - altitude;
                let above = altitude - self.context.limits.thresholds.too_high_deg;
                left.other((below.max(above).max(0.0)) / HORIZON_U_DEG);
            }
            self.dark(body, so, left);
        }
    }

    fn dark(&self, body: Body, so: &Sight, left: &mut Left) {
        let (Some(utc), Some(position)) = (so.utc, so.position) else { return };
        let over = match dark_from_deg(body, self.context.limits) {
            Some(most) => (self.memo.sun_altitude_deg(utc, position) - most).max(0.0),
            None => 0.0,
        };
        left.other(over / TWILIGHT_U_DEG);
    }
}

/// The position against the track of both neighbours, and the time against theirs.
fn track(so: &Sight, context: &Context, left: &mut Left) {
    let Some(utc) = so.utc else { return };
    if let (Some(position), Some((there, miles_u))) = (so.position, context.on_track(Some(utc))) {
        let here = (position.lat.deg(), position.lon.deg());
        left.other(miles(there, here) / miles_u);
        left.other(context.out_of_reach(utc, here).unwrap_or(0.0).max(0.0));
    }
    let hours_past = |f: Option<&Fact>, way: f64| f.and_then(Fact::unix_ms).map_or(0.0, |t| way * (utc.unix_ms() - t) as f64 / 3_600_000.0);
    let out = hours_past(context.before, -1.0).max(hours_past(context.after, 1.0));
    // The times kept of the neighbours are to 2 s.
    left.other(if out > 0.01 { 3.0 + out / 2.0 } else { 0.0 });
}
