//! All that a row and its neighbours say, against what a slip would have made of it.

use super::case::{Case, Look, Memo};
use super::checks::{dark_from_deg, sums, written_u_deg};
use super::curve::Curve;
use super::fact::Fact;
use super::order::miles;
use super::query::Sum;
use super::row::{Row, Written};
use crate::angle::wrap_180_deg;
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
            let u = u_deg.hypot(loose_deg);
            // A looser fit is paid for, so that it does not win by its looseness.
            self.sum += (wrap_180_deg(off) / u).powi(2) + 2.0 * (u / u_deg).ln();
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
pub fn wrong_by(row: &Row) -> (Option<f64>, Option<f64>, Option<f64>) {
    let mut by = (None, None, None);
    for (sum, off, _) in sums(row).into_iter().flatten() {
        let slot = match sum {
            Sum::GyroError => &mut by.0,
            Sum::CompassError => &mut by.1,
            Sum::Deviation => &mut by.2,
        };
        *slot = Some(off);
    }
    by
}

/// What `case` leaves of everything the row says; `None` where it has no azimuth at all.
pub fn left(row: &Row, case: &Case, context: &Context, memo: &Memo) -> Option<Left> {
    let (so, used) = (&case.so, &case.used);
    let look = memo.look(so);
    if look.is_none() && so.body().is_some() {
        return None;
    }
    let used_look = if so == used { look } else { memo.look(used) };
    let mut left = Left::default();
    let variation = variation_deg(row, case, memo);
    instruments(row, case, context, look, variation, &mut left);
    logged(row, case, context, used_look, variation, &mut left)?;
    sky(case, context, look, memo, &mut left);
    track(case, context, &mut left);
    Some(left)
}

/// What the subtractions alone leave of the row as it stands: no slip in time, place or body changes that where the azimuth is
/// written.
pub fn left_of_sums(row: &Row) -> f64 {
    if row.logged.azimuth.is_none() {
        return 0.0;
    }
    let figures = [row.logged.gyro_error, row.logged.compass_error, row.logged.deviation];
    let squares = |(sum, figure): (Option<(Sum, f64, f64)>, Option<Written>)| {
        sum.zip(figure).map_or(0.0, |((_, by, _), f)| (by / PAPER_U_DEG.hypot(written_u_deg(f))).powi(2))
    };
    sums(row).into_iter().zip(figures).map(squares).sum()
}

/// Variation and its u where the ship was in that case, degrees.
fn variation_deg(row: &Row, case: &Case, memo: &Memo) -> Option<(f64, f64)> {
    let (position, utc) = (case.so.position?, case.so.utc?);
    let (place, moment) = (row.place?, row.moment?);
    if position == place.position && utc.seconds_since(moment.utc).abs() < 30.0 * 86_400.0 {
        return row.worked.variation.map(|v| (v.value.deg(), v.u_deg()));
    }
    memo.variation(utc, position)
}

/// Deviation to expect on a heading, and how far single readings scatter from it, degrees.
fn deviation_deg(row: &Row, context: &Context, heading: Option<f64>) -> (f64, f64) {
    if let Some(card) = row.card {
        return (card.deviation_deg, context.curve.map_or(1.0, |c| c.scatter_deg).hypot(0.5));
    }
    let field = row.worked.field.map(|f| (f.horizontal_nt, f.inclination_deg));
    match (context.curve, heading, field) {
        (Some(curve), Some(heading), Some(field)) => {
            let (value, u) = curve.at(heading, field);
            (value, curve.scatter_deg.hypot(u))
        }
        _ => UNKNOWN_DEVIATION,
    }
}

fn instruments(row: &Row, case: &Case, context: &Context, look: Option<Look>, variation: Option<(f64, f64)>, left: &mut Left) {
    let so = &case.so;
    let azimuth = look.map(|l| l.azimuth);
    let gyro_u = row.worked.gyro_error.map_or(0.0, |g| g.u_deg()).max(context.gyro.1);
    left.angle(azimuth.zip(so.gyro).map(|(z, b)| z - b - context.gyro.0), gyro_u, case.loose_deg);
    let Some((variation, variation_u)) = variation else { return };
    let (deviation, deviation_u) = deviation_deg(row, context, so.compass_heading);
    let compass_u = row.worked.deviation.map_or(deviation_u, |d| d.u_deg().max(deviation_u)).hypot(variation_u * 0.5);
    left.angle(azimuth.zip(so.compass).map(|(z, b)| z - b - variation - deviation), compass_u, case.loose_deg);
    let headings = so.gyro_heading.zip(so.compass_heading).map(|(g, c)| g + context.gyro.0 - c - variation - deviation);
    left.angle(headings, deviation_u.hypot(HEADINGS_U_DEG), 0.0);
}

fn logged(row: &Row, case: &Case, context: &Context, look: Option<Look>, variation: Option<(f64, f64)>, left: &mut Left) -> Option<()> {
    let (l, used, r) = (row.logged, &case.used, &case.results);
    let worked = case.worked_azimuth(look);
    if let Some(azimuth) = l.azimuth {
        let budget = row.worked.azimuth_budget;
        let u = TABLES_U_DEG.hypot(budget.time_deg).hypot(budget.position_deg).hypot(written_u_deg(azimuth));
        // A working that has no azimuth cannot have given the logged one.
        left.angle(Some(azimuth.deg - worked?), u, case.loose_deg);
    }
    let azimuth = l.azimuth.map(|a| a.deg).or(worked);
    if let Some(error) = l.gyro_error {
        let parts = azimuth.zip(used.gyro).map(|(z, b)| r.gyro_sign * wrap_180_deg(z - b) + r.gyro_by);
        left.angle(parts.map(|p| error.deg - p), PAPER_U_DEG.hypot(written_u_deg(error)), 0.0);
    }
    let compass_error = azimuth.zip(used.compass).map(|(z, b)| r.compass_sign * wrap_180_deg(z - b) + r.compass_by);
    if let Some(error) = l.compass_error {
        let by_headings = l
            .gyro_error
            .zip(used.gyro_heading)
            .zip(used.compass_heading)
            .map(|((e, g), c)| r.compass_sign * wrap_180_deg(g + e.deg - c) + r.compass_by);
        let off = |parts: Option<f64>| parts.map(|p| wrap_180_deg(error.deg - p));
        let off = match (off(compass_error), off(by_headings)) {
            (Some(a), Some(b)) if b.abs() < a.abs() => Some(b),
            (a, b) => a.or(b),
        };
        left.angle(off, PAPER_U_DEG.hypot(written_u_deg(error)), 0.0);
    }
    if let (Some(written), Some((variation, u))) = (l.variation, variation) {
        let expected = r.variation_sign * (variation + context.variation_off_deg);
        left.angle(Some(written.deg - expected), CHART_U_DEG.hypot(u).hypot(written_u_deg(written)), 0.0);
    }
    if let Some(deviation) = l.deviation {
        let u = PAPER_U_DEG.hypot(written_u_deg(deviation));
        let applied = l.variation.map(|v| v.deg).or(variation.map(|v| v.0)).map(|v| r.applied_sign * v);
        let error = l.compass_error.map(|e| e.deg).or(compass_error);
        let (parts, u) = if r.card_by_bearing {
            let (by_bearing, card_u) = deviation_deg_by_bearing(row, context, used.compass)?;
            (Some(by_bearing), u.hypot(card_u))
        } else {
            (error.zip(applied).map(|(e, v)| r.deviation_sign * wrap_180_deg(e - v) + r.deviation_by), u)
        };
        left.angle(parts.map(|p| deviation.deg - p), PAPER_U_DEG.hypot(written_u_deg(deviation)), if r.card_by_bearing { u } else { 0.0 });
    }
    Some(())
}

/// What the curve says for the bearing, as if it were a heading, and how far an officer's card may be from it.
fn deviation_deg_by_bearing(row: &Row, context: &Context, bearing: Option<f64>) -> Option<(f64, f64)> {
    let field = row.worked.field?;
    let (value, u) = context.curve?.at(bearing?, (field.horizontal_nt, field.inclination_deg));
    Some((value, u.hypot(0.3)))
}

fn sky(case: &Case, context: &Context, look: Option<Look>, memo: &Memo, left: &mut Left) {
    let Some(body) = case.so.body() else { return };
    let Some(look) = look else { return };
    if let Some(off) = look.off_horizon {
        left.other(off.abs() / HORIZON_U_DEG);
    } else if let Some(altitude) = look.altitude {
        let below = -0.5 - altitude;
        let above = altitude - context.limits.thresholds.too_high_deg;
        left.other((below.max(above).max(0.0)) / HORIZON_U_DEG);
    }
    dark(body, case, context, memo, left);
}

fn dark(body: Body, case: &Case, context: &Context, memo: &Memo, left: &mut Left) {
    let (Some(utc), Some(position)) = (case.so.utc, case.so.position) else { return };
    let over = match dark_from_deg(body, context.limits) {
        Some(most) => (memo.sun_altitude_deg(utc, position) - most).max(0.0),
        None => 0.0,
    };
    left.other(over / 1.5);
}

/// The position against the track of both neighbours, and the time against theirs.
fn track(case: &Case, context: &Context, left: &mut Left) {
    let Some(utc) = case.so.utc else { return };
    if let (Some(position), Some((there, miles_u))) = (case.so.position, context.on_track(Some(utc))) {
        let here = (position.lat.deg(), position.lon.deg());
        left.other(miles(there, here) / miles_u);
        left.other(context.out_of_reach(utc, here).unwrap_or(0.0).max(0.0));
    }
    let hours_past = |f: Option<&Fact>, way: f64| f.and_then(Fact::unix_ms).map_or(0.0, |t| way * (utc.unix_ms() - t) as f64 / 3_600_000.0);
    let out = hours_past(context.before, -1.0).max(hours_past(context.after, 1.0));
    // The times kept of the neighbours are to 2 s.
    left.other(if out > 0.01 { 3.0 + out / 2.0 } else { 0.0 });
}
