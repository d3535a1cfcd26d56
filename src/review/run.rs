//! A gyro's run: its level, what it follows, its steps, and its slow drift, from its own rows.

use super::fact::{Fact, flag};
use super::pattern::PatternId;
use super::robust::{self, Fit, median, scale_about_zero, scale_of_neighbours};

/// Something a gyro's error may follow.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Term {
    /// Its level.
    Level,
    /// This repeater against the one most used.
    Repeater(u8),
    /// V cos C / (5 pi cos lat): 1 where nothing corrects it would be -1 on this term.
    Speed,
    /// tan latitude.
    Latitude,
    /// tan altitude of the body.
    Altitude,
    /// Degrees of azimuth a degree of altitude, on risings and settings.
    OnHorizon,
    /// Starboard against port.
    Side,
    /// Days since this time, seconds of [`Fact::seconds`]: a slow drift.
    Drift(i64),
    /// A step at this time, seconds of [`Fact::seconds`].
    Step(i64),
}

impl Term {
    fn value(self, fact: &Fact) -> f64 {
        let yes = |b: bool| if b { 1.0 } else { 0.0 };
        match self {
            Self::Level => 1.0,
            Self::Repeater(gyro) => yes(fact.gyro == gyro),
            Self::Speed => fact.speed_error_deg().unwrap_or(0.0),
            Self::Latitude => fact.tan_lat(),
            Self::Altitude => fact.tan_altitude(),
            Self::OnHorizon => fact.on_horizon(),
            Self::Side => (yes(fact.has(flag::STARBOARD)) - yes(fact.has(flag::PORT))) / 2.0,
            Self::Drift(from) => fact.seconds().map_or(0.0, |t| (t - from) as f64 / 86_400.0),
            Self::Step(at) => yes(fact.seconds().is_some_and(|t| t >= at)),
        }
    }

    /// The pattern that it is named by.
    pub fn pattern(self) -> Option<PatternId> {
        match self {
            // A drift needs no name: the run goes with it.
            Self::Level | Self::Drift(_) => None,
            Self::Repeater(_) | Self::Side => Some(PatternId::RepeaterDiffers),
            Self::Speed => Some(PatternId::SpeedCorrectorOff),
            Self::Latitude => Some(PatternId::LatitudeCorrectorOff),
            Self::Altitude => Some(PatternId::AzimuthCircleTilt),
            Self::OnHorizon => Some(PatternId::VisibleHorizon),
            Self::Step(_) => Some(PatternId::GyroStep),
        }
    }

    /// Standard deviation it is expected to have before the rows are looked at.
    fn prior_sd(self) -> f64 {
        match self {
            Self::Level | Self::Step(_) | Self::Repeater(_) => 3.0,
            Self::Speed => 1.5,
            Self::Drift(_) => 0.1,
            Self::Latitude | Self::Altitude | Self::OnHorizon | Self::Side => 2.0,
        }
    }

    /// Standard deviations that it must stand out by. What shows on a few rows only, and is looked for by its own shape, less.
    fn sure(self) -> f64 {
        if self == Self::OnHorizon { 5.0 } else { 6.0 }
    }

    /// The least coefficient, and the least effect over the middle nine tenths of the rows (degrees), that is worth naming.
    fn least(self) -> (f64, f64) {
        match self {
            Self::Level | Self::Repeater(_) => (0.0, 0.0),
            Self::Speed => (0.4, 0.4),
            Self::Latitude => (0.6, 0.6),
            Self::Altitude => (0.6, 0.6),
            Self::OnHorizon => (0.35, 0.35),
            Self::Side => (0.8, 0.8),
            Self::Drift(_) => (0.005, 0.5),
            Self::Step(_) => (1.0, 1.0),
        }
    }
}

/// Residuals are cut to this before something is looked for in them, degrees, so that slips of a hundred degrees weigh as others.
const CUT_DEG: f64 = 4.0;
/// Fewest rows for a run.
const LEAST_ROWS: usize = 4;
/// Fewest rows to look for what a gyro follows.
const LEAST_ROWS_TERMS: usize = 12;
/// Rows on each side of a step.
const STEP_SIDE: usize = 8;
/// Terms beside level and repeaters.
const MOST_TERMS: usize = 5;
/// A run is not one where its rows scatter more, degrees.
const MOST_SCATTER_DEG: f64 = 3.0;
/// Rows a fit is made from; of more, every second, third, ...
const MOST_ROWS: usize = 1500;
/// What a run is never taken to scatter less than, degrees.
const LEAST_SCALE_DEG: f64 = 0.15;

/// The run of one gyro, all its repeaters.
#[derive(Debug, Clone, PartialEq)]
pub struct Run {
    /// What it follows.
    pub terms: Vec<Term>,
    fit: Fit,
    /// Rows it rests on.
    pub rows: usize,
    /// Standard deviation of what is left, outliers aside, not counting slow drift, degrees.
    pub scatter_deg: f64,
}

impl Run {
    /// The run through `facts` (of one gyro, in the order of time); `None` where there is none to be found.
    pub fn of(facts: &[&Fact], repeaters: &[u8], sides: bool) -> Option<Self> {
        let step = facts.len().div_ceil(MOST_ROWS).max(1);
        let facts: Vec<&Fact> = facts.iter().copied().step_by(step).collect();
        if facts.len() < LEAST_ROWS {
            return None;
        }
        let mut terms = vec![Term::Level];
        terms.extend(repeaters.iter().skip(1).map(|&r| Term::Repeater(r)));
        let base = terms.len();
        let mut fit = fit_terms(&terms, &facts)?;
        while facts.len() >= LEAST_ROWS_TERMS && terms.len() < base + MOST_TERMS {
            let residuals = residuals(&terms, &fit, &facts);
            let noise = scale_of_neighbours(&residuals).unwrap_or(1.0).max(LEAST_SCALE_DEG);
            // Several may stand out for one cause; the one that leaves least is it.
            let best = standing_out(&terms, &facts, &residuals, noise, sides)
                .into_iter()
                .filter_map(|term| {
                    let with: Vec<Term> = terms.iter().copied().chain([term]).collect();
                    let better = fit_terms(&with, &facts)?;
                    let (coefficient, u) = (better.coefficients.last()?.abs(), better.u(with.len() - 1));
                    let sure = coefficient > term.least().0 && coefficient > (term.sure() - 1.0) * u && better.scale <= fit.scale * 1.02;
                    sure.then(|| (left(&with, &better, &facts, noise), with, better))
                })
                .min_by(|a, b| a.0.total_cmp(&b.0));
            let Some((_, with, better)) = best else { break };
            (terms, fit) = (with, better);
        }
        let scatter_deg = fit.scale;
        Some(Self { terms, fit, rows: facts.len(), scatter_deg })
    }

    /// A run known only as a level.
    pub fn level(level_deg: f64, u_deg: f64, scatter_deg: f64, rows: usize) -> Self {
        let fit = Fit { coefficients: vec![level_deg], covariance: vec![u_deg * u_deg], scale: scatter_deg };
        Self { terms: vec![Term::Level], fit, rows, scatter_deg }
    }

    /// Whether its rows hold together.
    pub fn established(&self) -> bool {
        self.scatter_deg < MOST_SCATTER_DEG
    }

    /// The error to expect on a row, degrees, slow drift aside.
    pub fn value_deg(&self, fact: &Fact) -> f64 {
        self.terms.iter().zip(&self.fit.coefficients).map(|(t, c)| c * t.value(fact)).sum()
    }

    /// Standard uncertainty of that, degrees.
    pub fn value_u_deg(&self, fact: &Fact) -> f64 {
        let values = || self.terms.iter().map(|t| t.value(fact));
        self.fit.quadratic(values(), values).max(0.0).sqrt()
    }

    /// What one term adds on a row, from the middle of its values, degrees.
    pub fn part_deg(&self, term: usize, fact: &Fact) -> f64 {
        match (self.terms.get(term), self.fit.coefficients.get(term)) {
            (Some(t), Some(c)) => c * t.value(fact),
            _ => 0.0,
        }
    }

    /// Coefficient of a term and its standard uncertainty.
    pub fn coefficient(&self, term: usize) -> (f64, f64) {
        (self.fit.coefficients.get(term).copied().unwrap_or(0.0), self.fit.u(term))
    }
}

fn fit_terms(terms: &[Term], facts: &[&Fact]) -> Option<Fit> {
    let columns: Vec<f64> = facts.iter().flat_map(|f| terms.iter().map(move |t| t.value(f))).collect();
    let y: Vec<f64> = facts.iter().map(|f| f.gyro_error_deg().unwrap_or(0.0)).collect();
    let prior: Vec<f64> = terms.iter().map(|t| t.prior_sd()).collect();
    robust::fit(&columns, &y, &prior, LEAST_SCALE_DEG)
}

fn residuals(terms: &[Term], fit: &Fit, facts: &[&Fact]) -> Vec<f64> {
    facts
        .iter()
        .map(|f| {
            let value: f64 = terms.iter().zip(&fit.coefficients).map(|(t, c)| c * t.value(f)).sum();
            (f.gyro_error_deg().unwrap_or(0.0) - value).clamp(-CUT_DEG, CUT_DEG)
        })
        .collect()
}

/// What a fit leaves, each row counted to three times the noise at most.
fn left(terms: &[Term], fit: &Fit, facts: &[&Fact], noise: f64) -> f64 {
    residuals(terms, fit, facts).iter().map(|r| r.abs().min(3.0 * noise).powi(2)).sum()
}

/// The terms that stand out in the residuals.
fn standing_out(have: &[Term], facts: &[&Fact], residuals: &[f64], noise: f64, sides: bool) -> Vec<Term> {
    let mut found = Vec::new();
    let drift = Term::Drift(facts.first().and_then(|f| f.seconds()).unwrap_or(0));
    for term in [Term::Speed, Term::Latitude, Term::Altitude, Term::OnHorizon, Term::Side, drift] {
        if have.contains(&term) || (term == Term::Side && !sides) {
            continue;
        }
        let (x, y): (Vec<f64>, Vec<f64>) = facts
            .iter()
            .map(|f| term.value(f))
            .zip(residuals.iter().copied())
            .filter(|(x, _)| term != Term::OnHorizon || *x != 0.0)
            .unzip();
        if let Some((slope, u, spread)) = slope_by_classes(&x, &y, noise) {
            let (least, least_effect) = term.least();
            if slope.abs() > least && slope.abs() * spread > least_effect && slope.abs() > term.sure() * u {
                found.push(term);
            }
        }
    }
    if let Some((z, at)) = step(facts, residuals, noise)
        && z > Term::Step(at).sure()
        && !have.iter().any(|h| matches!(h, Term::Step(t) if (t - at).abs() < 86_400))
    {
        found.push(Term::Step(at));
    }
    found
}

/// Classes of x that medians are taken in.
const CLASSES: usize = 8;

/// Slope of y on x through the medians of classes of x, its standard uncertainty, and the spread of x over nine tenths of the
/// rows. Up to half of each class may be anything.
fn slope_by_classes(x: &[f64], y: &[f64], noise: f64) -> Option<(f64, f64, f64)> {
    if x.len() < CLASSES {
        return None;
    }
    let mut order: Vec<usize> = (0..x.len()).collect();
    order.sort_by(|a, b| x.get(*a).zip(x.get(*b)).map_or(std::cmp::Ordering::Equal, |(a, b)| a.total_cmp(b)));
    let value = |at: usize| order.get(at).and_then(|&i| x.get(i)).copied();
    let spread = value(order.len() - 1 - order.len() / 20)? - value(order.len() / 20)?;
    let mut points: Vec<(f64, f64, f64)> = Vec::with_capacity(CLASSES);
    for class in order.chunks(order.len().div_ceil(CLASSES).max(1)) {
        let mean_x = class.iter().filter_map(|&i| x.get(i)).sum::<f64>() / class.len() as f64;
        let mut ys: Vec<f64> = class.iter().filter_map(|&i| y.get(i).copied()).collect();
        points.push((mean_x, median(&mut ys)?, class.len() as f64));
    }
    let weight: f64 = points.iter().map(|p| p.2).sum();
    let (mx, my) = points.iter().fold((0.0, 0.0), |(a, b), p| (a + p.0 * p.2 / weight, b + p.1 * p.2 / weight));
    let (mut sxx, mut sxy) = (0.0, 0.0);
    for (px, py, n) in points {
        sxx += n * (px - mx).powi(2);
        sxy += n * (px - mx) * (py - my);
    }
    if sxx < 1e-6 {
        return None;
    }
    let slope = sxy / sxx;
    // Where x jumps from row to row, neighbours differ by what it does to y: then what it leaves is the noise.
    let own = scale_about_zero(x.iter().zip(y).map(|(x, y)| y - my - slope * (x - mx)))?.max(LEAST_SCALE_DEG);
    // The median of a normal sample is known 1.25 times less well than its mean.
    Some((slope, 1.2533 * noise.min(own) / sxx.sqrt(), spread))
}

/// Rows looked at on each side of a step.
const STEP_WINDOW: usize = 24;

/// The clearest step: standard deviations that it stands out by, and the time of the first row after it.
fn step(facts: &[&Fact], residuals: &[f64], noise: f64) -> Option<(f64, i64)> {
    let n = residuals.len();
    let mut best: Option<(f64, usize)> = None;
    let middle = |from: usize, to: usize| residuals.get(from..to).and_then(|s| median(&mut s.to_vec()));
    for at in STEP_SIDE..n.saturating_sub(STEP_SIDE - 1) {
        let (from, to) = (at.saturating_sub(STEP_WINDOW), (at + STEP_WINDOW).min(n));
        let Some(size) = middle(at, to).zip(middle(from, at)).map(|(b, a)| (b - a).abs()) else { continue };
        // At the edge itself: a slope or a passing swing shows here only in part.
        let Some(edge) = middle(at, (at + 2 * STEP_SIDE).min(n)).zip(middle(at.saturating_sub(2 * STEP_SIDE), at)) else { continue };
        if size < Term::Step(0).least().0 || (edge.0 - edge.1).abs() < 0.6 * size {
            continue;
        }
        let u = 1.2533 * noise * (1.0 / (at - from) as f64 + 1.0 / (to - at) as f64).sqrt();
        let z = size / u;
        if best.is_none_or(|(b, _)| z > b) {
            best = Some((z, at));
        }
    }
    let (z, near) = best?;
    // The place that leaves least, outliers cut.
    let (from, to) = (near.saturating_sub(STEP_WINDOW), (near + STEP_WINDOW).min(n));
    let left = |at: usize| -> Option<f64> {
        let (a, b) = (middle(from, at)?, middle(at, to)?);
        let cut = |r: f64| r.abs().min(3.0 * noise);
        let side = |s: &[f64], m: f64| s.iter().map(|r| cut(r - m)).sum::<f64>();
        Some(side(residuals.get(from..at)?, a) + side(residuals.get(at..to)?, b))
    };
    let at = (near.saturating_sub(6).max(from + 2)..(near + 7).min(to.saturating_sub(1)))
        .filter_map(|at| Some((at, left(at)?)))
        .min_by(|a, b| a.1.total_cmp(&b.1))
        .map_or(near, |(at, _)| at);
    Some((z, facts.get(at)?.seconds()?))
}
