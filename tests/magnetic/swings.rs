//! Swings with known coefficients: the 24 files, and as many as wanted from a generator of our own with other seeds.

use shadowpin::angle::{CompassBearing, Deviation};
use shadowpin::compass::curve::{Coefficients, Curve, DeviationReading, NoCurve, Turn, fit};

pub fn reading(heading_deg: f64, deviation_deg: f64) -> DeviationReading {
    DeviationReading { heading: CompassBearing::wrapping_deg(heading_deg), deviation: Deviation::wrapping_deg(deviation_deg), turn: None }
}

fn file(name: &str) -> String {
    std::fs::read_to_string(std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("fixtures/swings").join(name)).unwrap()
}

fn rows_aside(curve: &Curve) -> Vec<usize> {
    curve.set_aside.iter().map(|s| s.index).collect()
}

/// What a fit got right.
#[derive(Default, Debug)]
struct Tally {
    swings: usize,
    blunders: usize,
    found: usize,
    wrongly_aside: usize,
    swings_with_wrongly_aside: usize,
    coefficients: usize,
    inside_3u: usize,
    inside_2u: usize,
}

impl Tally {
    fn add(&mut self, curve: &Curve, truth: Coefficients, blunders: &[usize]) {
        let aside = rows_aside(curve);
        let wrongly = aside.iter().filter(|row| !blunders.contains(row)).count();
        self.swings += 1;
        self.blunders += blunders.len();
        self.found += blunders.iter().filter(|row| aside.contains(row)).count();
        self.wrongly_aside += wrongly;
        self.swings_with_wrongly_aside += usize::from(wrongly > 0);
        for ((found, u), truth) in curve.coefficients.to_array().into_iter().zip(curve.u_deg()).zip(truth.to_array()) {
            let Some(u) = u else { continue };
            self.coefficients += 1;
            self.inside_3u += usize::from((found - truth).abs() <= 3.0 * u);
            self.inside_2u += usize::from((found - truth).abs() <= 2.0 * u);
        }
    }

    fn share_3u(&self) -> f64 {
        self.inside_3u as f64 / self.coefficients as f64
    }
}

#[test]
fn the_24_files() {
    let truth: serde_json::Value = serde_json::from_str(&file("truth.json")).unwrap();
    let mut tally = Tally::default();
    for swing in truth.as_array().unwrap() {
        let text = file(swing["file"].as_str().unwrap());
        let numbers = |line: &str| line.split(',').map(|x| x.parse().unwrap()).collect::<Vec<f64>>();
        let readings: Vec<DeviationReading> = text.lines().skip(1).map(|l| reading(numbers(l)[0], numbers(l)[1])).collect();
        let list = |key: &str| swing[key].as_array().unwrap().iter().map(|x| x.as_f64().unwrap()).collect::<Vec<_>>();
        let coefficients = Coefficients::from_array(list("coefficients").try_into().unwrap());
        let blunders: Vec<usize> = list("blunder_rows").into_iter().map(|x| x as usize).collect();
        tally.add(&fit(&readings).unwrap(), coefficients, &blunders);
    }
    println!("the 24 files: {tally:?}");
    assert_eq!((tally.swings, tally.blunders, tally.coefficients), (24, 12, 120));
    assert_eq!(tally.found, tally.blunders);
    assert!(tally.swings_with_wrongly_aside <= 1);
    assert!(tally.share_3u() >= 0.98);
}

/// A small generator of numbers (xorshift), so that every run makes the same swings.
pub struct Numbers(u64);

impl Numbers {
    pub fn new(seed: u64) -> Self {
        Self(seed.wrapping_mul(0x9E37_79B9_7F4A_7C15) | 1)
    }

    pub fn even(&mut self, from: f64, to: f64) -> f64 {
        self.0 ^= self.0 << 13;
        self.0 ^= self.0 >> 7;
        self.0 ^= self.0 << 17;
        from + (to - from) * (self.0 >> 11) as f64 / (1u64 << 53) as f64
    }

    pub fn normal(&mut self) -> f64 {
        let (u, v) = (self.even(1e-12, 1.0), self.even(0.0, std::f64::consts::TAU));
        (-2.0 * u.ln()).sqrt() * v.cos()
    }
}

/// A swing of `count` headings round the compass with reading noise `sigma`, rounded to 0.1, and blunders of the sizes given.
fn swing(n: &mut Numbers, count: usize, sigma: f64, blunders: &[f64]) -> (Vec<DeviationReading>, Coefficients, Vec<usize>) {
    let truth =
        Coefficients { a: 0.7 * n.normal(), b: 5.0 * n.normal(), c: 4.0 * n.normal(), d: 1.5 + 1.5 * n.normal(), e: 0.5 * n.normal() };
    let first = n.even(0.0, 20.0);
    let mut rows: Vec<DeviationReading> = (0..count)
        .map(|i| {
            let heading = CompassBearing::wrapping_deg(first + 360.0 * i as f64 / count as f64 + 2.0 * n.normal());
            let deviation = ((truth.deviation_deg(heading) + sigma * n.normal()) * 10.0).round() / 10.0;
            DeviationReading { heading, deviation: Deviation::wrapping_deg(deviation), turn: None }
        })
        .collect();
    let mut at: Vec<usize> = Vec::new();
    for size in blunders {
        let mut row = n.even(0.0, count as f64) as usize;
        while at.contains(&row) {
            row = n.even(0.0, count as f64) as usize;
        }
        let size = if n.even(0.0, 1.0) < 0.5 { -size } else { *size };
        rows[row].deviation = Deviation::wrapping_deg(rows[row].deviation.deg() + size);
        at.push(row);
    }
    (rows, truth, at)
}

fn many(count: usize, sigma: f64, sizes: &[f64], seeds: std::ops::Range<u64>) -> Tally {
    let mut tally = Tally::default();
    for seed in seeds {
        let mut n = Numbers::new(seed);
        let (rows, truth, blunders) = swing(&mut n, count, sigma, sizes);
        if let Ok(curve) = fit(&rows) {
            tally.add(&curve, truth, &blunders);
        }
    }
    println!("{count:2} headings, noise {sigma}, blunders {sizes:?}: {tally:?}");
    tally
}

#[test]
fn clean_swings_lose_no_reading_and_u_holds() {
    for (count, sigma) in [(5, 0.4), (6, 0.4), (7, 0.4), (8, 0.4), (8, 0.5), (12, 0.4), (16, 0.5), (24, 0.4), (36, 0.5), (24, 1.0)] {
        let tally = many(count, sigma, &[], 1000..1400);
        assert!(tally.swings >= 390);
        assert!(tally.swings_with_wrongly_aside * 100 <= 2 * tally.swings, "{count} {sigma}: {tally:?}");
        assert!(tally.share_3u() >= 0.98, "{count} {sigma}: {tally:?}");
        let share_2u = tally.inside_2u as f64 / tally.coefficients as f64;
        assert!((0.93..=0.998).contains(&share_2u), "{count} {sigma}: {share_2u}");
    }
}

#[test]
fn blunders_are_found_from_eight_headings_on() {
    for (count, sizes, least_found) in [
        (8, &[10.0][..], 0.97),
        (12, &[4.0], 0.75),
        (12, &[6.0], 0.97),
        (12, &[10.0, 10.0], 0.9),
        (16, &[4.0], 0.85),
        (16, &[8.0, 16.0], 0.97),
        (24, &[4.0], 0.9),
        (24, &[6.0, 6.0], 0.97),
        (24, &[10.0, 20.0], 0.97),
        (36, &[5.0, 5.0], 0.97),
        (36, &[10.0, 10.0, 10.0, 10.0], 0.97),
        (41, &[6.0, 10.0, 15.0], 0.97),
        (48, &[5.0, 5.0, 20.0, 20.0, 20.0], 0.97),
        (72, &[8.0; 7], 0.97),
    ] {
        let tally = many(count, 0.4, sizes, 5000..5300);
        let found = tally.found as f64 / tally.blunders as f64;
        assert!(found >= least_found, "{count} {sizes:?}: {tally:?}");
        assert!(tally.wrongly_aside * 100 <= tally.swings, "{count} {sizes:?}: {tally:?}");
    }
}

/// With fewer headings a blunder cannot be told from its neighbours: nothing is set aside on a toss-up, and a large one is said.
#[test]
fn few_headings_are_not_trusted_with_a_blunder() {
    for (count, sizes) in [(5, &[12.0][..]), (6, &[12.0]), (7, &[12.0]), (8, &[12.0, 12.0]), (9, &[7.0, 15.0]), (8, &[4.0])] {
        let tally = many(count, 0.4, sizes, 9000..9200);
        assert!(tally.swings_with_wrongly_aside * 50 <= tally.swings, "{count}: {tally:?}");
    }
}

#[test]
fn too_few_headings_are_refused_in_words() {
    let rows = |n: usize| (0..n).map(|i| reading(90.0 * i as f64, 1.0)).collect::<Vec<_>>();
    for (n, have) in [(0, 0), (1, 1), (2, 2), (4, 4)] {
        assert_eq!(fit(&rows(n)).unwrap_err(), NoCurve::TooFewHeadings { have });
    }
    // Six readings, all on one heading.
    let same = vec![reading(90.0, 1.0); 6];
    assert_eq!(
        fit(&same).unwrap_err().to_string(),
        "deviations on 1 different heading: five coefficients need at least 5, and 8 all round to be trusted"
    );
}

#[test]
fn five_headings_give_a_curve_that_says_it_is_unchecked() {
    let truth = Coefficients { a: 0.5, b: 5.0, c: -3.0, d: 2.0, e: 0.0 };
    let rows: Vec<DeviationReading> =
        (0..5).map(|i| 72.0 * f64::from(i)).map(|h| reading(h, truth.deviation_deg(CompassBearing::wrapping_deg(h)))).collect();
    let curve = fit(&rows).unwrap();
    for (found, made) in curve.coefficients.to_array().into_iter().zip(truth.to_array()) {
        assert!((found - made).abs() < 1e-9);
    }
    assert_eq!(curve.scatter_deg, 0.5);
    // A: 0.5 over root 5; the others 0.5 over root 2.5.
    assert!((curve.u_deg()[0].unwrap() - 0.2236).abs() < 1e-4);
    assert!((curve.u_deg()[1].unwrap() - 0.3162).abs() < 1e-4);
    assert!(curve.notices.iter().any(|n| n.id() == "hardly-checked"));
    assert_eq!(curve.unproven.len(), 5);
    assert!(curve.handbook.is_none());
}

#[test]
fn all_deviations_alike_are_a_constant() {
    let rows: Vec<DeviationReading> = (0..8).map(|i| reading(45.0 * f64::from(i), -3.0)).collect();
    let curve = fit(&rows).unwrap();
    assert!((curve.coefficients.a + 3.0).abs() < 1e-12);
    assert!(curve.coefficients.to_array()[1..].iter().all(|x| x.abs() < 1e-12));
    assert!(curve.set_aside.is_empty());
    assert!(curve.residuals_deg.iter().all(|r| r.abs() < 1e-12));
}

#[test]
fn headings_on_a_narrow_arc_determine_nothing_but_the_arc() {
    let truth = Coefficients { a: 0.5, b: 5.0, c: -3.0, d: 2.0, e: 0.5 };
    let mut n = Numbers::new(77);
    let rows: Vec<DeviationReading> = (0..20)
        .map(|i| 20.0 + 2.0 * f64::from(i))
        .map(|h| reading(h, truth.deviation_deg(CompassBearing::wrapping_deg(h)) + 0.4 * n.normal()))
        .collect();
    let curve = fit(&rows).unwrap();
    assert_eq!(curve.u_deg(), [None; 5]);
    assert_eq!(curve.correlation(0, 1), None);
    assert!(curve.notices.iter().any(|n| n.to_string() == "these headings cannot tell A, B, C, D and E"));
    assert!(curve.notices.iter().any(|n| n.to_string() == "nothing was observed between headings 058 and 020"));
    let inside = curve.on(CompassBearing::wrapping_deg(39.0)).unwrap();
    assert!((inside.deviation_deg - truth.deviation_deg(CompassBearing::wrapping_deg(39.0))).abs() < 3.0 * inside.u_deg);
    assert!(inside.u_deg < 0.5);
    for heading in [120.0, 200.0, 290.0] {
        assert_eq!(curve.on(CompassBearing::wrapping_deg(heading)), None);
    }
}

#[test]
fn half_the_compass_leaves_the_other_half_unproven() {
    let truth = Coefficients { a: 0.0, b: 4.0, c: 2.0, d: 1.0, e: 0.0 };
    let rows: Vec<DeviationReading> =
        (0..=12).map(|i| 15.0 * f64::from(i)).map(|h| reading(h, truth.deviation_deg(CompassBearing::wrapping_deg(h)))).collect();
    let curve = fit(&rows).unwrap();
    assert_eq!(curve.unproven.iter().map(|(a, b)| (a.deg(), b.deg())).collect::<Vec<_>>(), [(180.0, 0.0)]);
    println!("half the compass: u {:?}, correlation A-B {:?}", curve.u_deg(), curve.correlation(0, 1));
}

#[test]
fn turns_are_averaged() {
    // Clockwise 0.8 east of the curve, anticlockwise 0.8 west; one turn has other headings than the other.
    let truth = Coefficients { a: 0.3, b: 4.0, c: -2.0, d: 1.0, e: 0.2 };
    let row = |heading: f64, turn, by: f64| {
        let mut r = reading(heading, truth.deviation_deg(CompassBearing::wrapping_deg(heading)) + by);
        r.turn = Some(turn);
        r
    };
    let clockwise = (0..8).map(|i| row(45.0 * f64::from(i), Turn::Clockwise, 0.8));
    let anticlockwise = (0..6).map(|i| row(60.0 * f64::from(i) + 10.0, Turn::Anticlockwise, -0.8));
    let curve = fit(&clockwise.chain(anticlockwise).collect::<Vec<_>>()).unwrap();
    for (found, made) in curve.coefficients.to_array().into_iter().zip(truth.to_array()) {
        assert!((found - made).abs() < 1e-9);
    }
    assert!((curve.half_turn_difference_deg.unwrap().0 - 0.8).abs() < 1e-9);
    assert!(curve.notices.iter().any(|n| n.id() == "turns-differ"));
    // On the same headings it is the plain mean of both turns.
    let both: Vec<DeviationReading> =
        (0..8).flat_map(|i| [row(45.0 * f64::from(i), Turn::Clockwise, 1.0), row(45.0 * f64::from(i), Turn::Anticlockwise, 0.0)]).collect();
    let mean: Vec<DeviationReading> = (0..8).map(|i| reading(45.0 * f64::from(i), both[2 * i as usize].deviation.deg() - 0.5)).collect();
    let (both, mean) = (fit(&both).unwrap(), fit(&mean).unwrap());
    assert!((both.coefficients.a - mean.coefficients.a).abs() < 1e-9 && (both.coefficients.b - mean.coefficients.b).abs() < 1e-9);
}

#[test]
fn past_20_degrees_the_exact_form_is_taken() {
    use shadowpin::compass::curve::ExactCoefficients;
    let made = ExactCoefficients::new([0.01, 0.45, -0.25, 0.09, 0.01]).unwrap();
    let mut n = Numbers::new(5);
    let mut rows: Vec<DeviationReading> = (0..24)
        .map(|i| CompassBearing::wrapping_deg(15.0 * f64::from(i)))
        .map(|h| reading(h.deg(), made.on_compass_heading(h).deg() + 0.3 * n.normal()))
        .collect();
    rows[7].deviation = Deviation::wrapping_deg(rows[7].deviation.deg() + 9.0);
    let curve = fit(&rows).unwrap();
    assert_eq!(rows_aside(&curve), [7]);
    let exact = curve.exact.unwrap();
    for (found, made) in exact.to_array().into_iter().zip(made.to_array()) {
        assert!((found - made).abs() < 0.01, "{exact:?}");
    }
    for heading in 0..36 {
        let heading = CompassBearing::wrapping_deg(10.0 * f64::from(heading));
        let estimate = curve.on(heading).unwrap();
        assert!((estimate.deviation_deg - made.on_compass_heading(heading).deg()).abs() < 3.0 * estimate.u_deg);
        // A 27-degree curve in its approximate form is off by far more than reading allows somewhere.
    }
    let worst = (0..36)
        .map(|h| CompassBearing::wrapping_deg(10.0 * f64::from(h)))
        .map(|h| (curve.coefficients.deviation_deg(h) - made.on_compass_heading(h).deg()).abs())
        .fold(0.0, f64::max);
    println!("approximate form off by up to {worst:.2} where the deviation reaches 33 degrees; exact rms {:.2}", curve.rms_deg);
    assert!(worst > 1.0, "{worst}");
    assert!(curve.notices.iter().any(|n| n.id() == "large-deviation"));
}

#[test]
fn many_rows_with_blunders() {
    let mut n = Numbers::new(11);
    let (mut rows, truth, _) = swing(&mut n, 2000, 0.8, &[]); // headings a fifth of a degree apart
    for row in rows.iter_mut().step_by(20) {
        row.deviation = Deviation::wrapping_deg(row.deviation.deg() + 15.0);
    }
    let curve = fit(&rows).unwrap();
    let aside = rows_aside(&curve);
    assert!((0..2000).step_by(20).all(|row| aside.contains(&row)));
    assert!(aside.len() <= 102, "{}", aside.len());
    for (found, made) in curve.coefficients.to_array().into_iter().zip(truth.to_array()) {
        assert!((found - made).abs() < 0.1);
    }
}

/// Whatever is read, no figure is ever not a number, and nothing stops the program.
mod whatever_is_read {
    use super::*;
    use proptest::prelude::*;

    proptest! {
        #[test]
        fn no_figure_is_not_a_number(
            rows in prop::collection::vec((0u16..3600, -1800i16..=1800, 0u8..3), 0..45),
            narrow in any::<bool>(),
            small in any::<bool>(),
        ) {
            let readings: Vec<DeviationReading> = rows
                .iter()
                .map(|(heading, deviation, turn)| DeviationReading {
                    heading: CompassBearing::wrapping_deg(f64::from(*heading) / if narrow { 90.0 } else { 10.0 }),
                    deviation: Deviation::wrapping_deg(f64::from(*deviation) / if small { 200.0 } else { 10.0 }),
                    turn: [None, Some(Turn::Clockwise), Some(Turn::Anticlockwise)][usize::from(*turn)],
                })
                .collect();
            if let Ok(curve) = fit(&readings) {
                prop_assert!(curve.u_deg().iter().flatten().all(|u| u.is_finite() && *u > 0.0));
                prop_assert!(curve.residuals_deg.iter().all(|r| r.is_finite()));
                prop_assert!(curve.rms_deg.is_finite() && curve.scatter_deg >= 0.5);
                prop_assert!(curve.set_aside.len() * 4 <= readings.len().max(4) || readings.len() > 40);
                for heading in (0..360).step_by(20) {
                    if let Some(e) = curve.on(CompassBearing::wrapping_deg(f64::from(heading))) {
                        prop_assert!(e.deviation_deg.is_finite() && e.u_deg.is_finite());
                    }
                }
                for (one, other) in [(0, 1), (1, 2), (3, 4)] {
                    prop_assert!(curve.correlation(one, other).is_none_or(|r| r.abs() <= 1.0 + 1e-9));
                }
            }
        }
    }
}
