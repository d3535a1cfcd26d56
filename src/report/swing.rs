//! A swing: the coefficients, the fit, and the table of observed deviations.

use super::figure::{east_west, round4, signed};
use crate::angle::text::write;
use crate::angle::{CompassBearing, Position};
use crate::compass::curve::latitude::Part;
use crate::compass::curve::{Coefficients, Curve, Estimate};
use crate::logbook::swing::{BadRow, SwingRow};
use crate::notice::Notice;
use serde_json::{Map, Value, json};
use std::fmt::Write;

/// What stands above every table of deviations.
pub const TITLE: &str = "Table of observed deviations - not an adjuster's certificate";

/// What a table of deviations says of itself; blank where not stated.
#[derive(Debug, Clone, Default)]
pub struct Particulars {
    /// The vessel.
    pub vessel: String,
    /// The magnetic compass.
    pub magnetic_compass: String,
    /// The date of the swing.
    pub date: String,
    /// Where the ship was swung.
    pub place: String,
    /// The correctors as they were found.
    pub correctors: String,
}

/// What the curve would be elsewhere.
#[derive(Debug, Clone)]
pub struct Elsewhere {
    /// The other place.
    pub position: Position,
    /// Coefficients A to E there, where the data can tell.
    pub coefficients: [Option<Part>; 5],
    /// Permanent parts of B and C, stated at an intensity.
    pub permanent: [Option<Part>; 2],
    /// That intensity, nanotesla.
    pub reference_nt: f64,
    /// Induced parts of B and C, where the tangent of the inclination is 1.
    pub induced: [Option<Part>; 2],
    /// Where the data cannot tell: the coefficients there if B and C were all permanent, and if they were all induced.
    pub bounds: [Option<Coefficients>; 2],
    /// Readings that cannot belong to a curve that changes with latitude, by data row.
    pub set_aside: Vec<usize>,
    /// The deviations there, where the data can tell.
    pub card: Vec<(f64, Option<Part>)>,
}

impl Elsewhere {
    /// Whether the data tell the curve there.
    pub fn is_told(&self) -> bool {
        self.coefficients.iter().all(Option::is_some)
    }
}

/// All that is reported of a swing.
#[derive(Debug)]
pub struct SwingReport<'a> {
    /// What the table says of itself.
    pub particulars: &'a Particulars,
    /// The readings, in the order that the curve was fitted to.
    pub rows: &'a [SwingRow],
    /// Rows that could not be used.
    pub bad_rows: &'a [BadRow],
    /// The curve.
    pub curve: &'a Curve,
    /// Headings of the table, degrees, and the curve there.
    pub card: Vec<(f64, Option<Estimate>)>,
    /// A heading asked for, degrees, and the curve there.
    pub asked: Option<(f64, Option<Estimate>)>,
    /// The curve at another place.
    pub elsewhere: Option<Elsewhere>,
    /// What the earth's field says of a compass where the readings were taken.
    pub of_field: Vec<Notice>,
    /// Whether the readings come from different magnetic latitudes, so that one curve does not hold for all.
    pub latitudes_mixed: bool,
}

/// The curve on every `step_deg` degrees.
pub fn table_of(curve: &Curve, step_deg: f64) -> Vec<(f64, Option<Estimate>)> {
    headings(step_deg).map(|h| (h, curve.on(CompassBearing::wrapping_deg(h)))).collect()
}

/// Every `step_deg` degrees round the compass.
pub fn headings(step_deg: f64) -> impl Iterator<Item = f64> {
    (0..(360.0 / step_deg) as u32).map(move |i| f64::from(i) * step_deg)
}

impl SwingReport<'_> {
    pub(super) fn notices(&self) -> Vec<Notice> {
        let untold = self.elsewhere.as_ref().filter(|elsewhere| !elsewhere.is_told()).map(|_| Notice::LatitudeUntold);
        let mixed = self.latitudes_mixed.then_some(Notice::LatitudesMixed);
        // Mixed latitudes explain a large scatter: it is no sign of wrong readings.
        let of_curve = self.curve.notices.iter().filter(|n| !(self.latitudes_mixed && matches!(n, Notice::LargeScatter { .. })));
        of_curve.chain(&self.of_field).copied().chain(mixed).chain(untold).collect()
    }

    /// What is said of the curve at another place, where one was asked for.
    pub(super) fn elsewhere_words(&self) -> Option<String> {
        let mut text = String::new();
        elsewhere_text(self.elsewhere.as_ref()?, &mut text);
        Some(text)
    }

    /// For a person.
    pub fn text(&self) -> String {
        let mut out = format!("{TITLE}\n\n");
        self.particulars_text(&mut out);
        self.table_text(&mut out);
        self.coefficients_text(&mut out);
        self.readings_text(&mut out);
        if let Some(elsewhere) = &self.elsewhere {
            elsewhere_text(elsewhere, &mut out);
        }
        let notices = self.notices();
        if !notices.is_empty() {
            out.push('\n');
        }
        for notice in notices {
            let _ = writeln!(out, "Notice: {notice}.");
        }
        out.push_str("\nA compass is adjusted by a qualified adjuster; the adjuster's card comes before this table.\n");
        out
    }

    fn particulars_text(&self, out: &mut String) {
        let p = self.particulars;
        for (name, value) in [
            ("Vessel", &p.vessel),
            ("Compass", &p.magnetic_compass),
            ("Date", &p.date),
            ("Place", &p.place),
            ("Correctors as found", &p.correctors),
        ] {
            let value = if value.is_empty() { "not stated" } else { value };
            let _ = writeln!(out, "{name:<20} {value}");
        }
    }

    fn table_text(&self, out: &mut String) {
        out.push_str("\nHeading by compass   Deviation     u\n");
        for (deg, estimate) in &self.card {
            let _ = match estimate {
                Some(e) => writeln!(out, "{:>18}   {:>9}   {:.1}", write::direction(*deg, 1), named(e.deviation_deg), e.u_deg),
                None => writeln!(out, "{:>18}   {:>9}   -", write::direction(*deg, 1), "unknown"),
            };
        }
        if let Some((deg, estimate)) = &self.asked {
            let _ = match estimate {
                Some(e) => writeln!(
                    out,
                    "\nOn heading {}: deviation {}, u {:.1}",
                    write::direction(*deg, 1),
                    named(e.deviation_deg).trim(),
                    e.u_deg
                ),
                None => writeln!(out, "\nOn heading {}: these readings cannot tell the deviation", write::direction(*deg, 1)),
            };
        }
    }

    fn coefficients_text(&self, out: &mut String) {
        let curve = self.curve;
        let by_rule = curve.handbook.map(Coefficients::to_array);
        let rule_heading = if by_rule.is_some() { "   by the rule for eight headings" } else { "" };
        let _ = writeln!(out, "\nCoefficient   least squares      u{rule_heading}");
        let values = curve.coefficients.to_array().into_iter().zip(curve.u_deg()).zip(Coefficients::NAMES);
        for (i, ((value, u), name)) in values.enumerate() {
            let _ = match u {
                Some(u) => write!(out, "{name:>11}   {:>13}   {u:.2}", signed(value, 2)),
                None => write!(out, "{name:>11}   {:>13}      -", "undetermined"),
            };
            if let Some(value) = by_rule.and_then(|rule| rule.get(i).copied()) {
                let _ = write!(out, "   {:>31}", signed(value, 2));
            }
            out.push('\n');
        }
        if let Some(exact) = curve.exact {
            let values: Vec<String> =
                exact.to_array().into_iter().zip(Coefficients::NAMES).map(|(x, name)| format!("{name} {}", signed(x, 4))).collect();
            let _ = writeln!(out, "Exact form (numbers): {}; the table is by this form", values.join(", "));
        }
        for one in 0..5 {
            for other in one + 1..5 {
                if let Some(r) = curve.correlation(one, other).filter(|r| r.abs() >= TELLING_CORRELATION) {
                    let name = |i: usize| Coefficients::NAMES.get(i).copied().unwrap_or("");
                    let _ = writeln!(out, "{} and {} are not told apart well: correlation {}", name(one), name(other), signed(r, 2));
                }
            }
        }
        let _ = writeln!(
            out,
            "\n{} readings used, {} set aside; root mean square of the residuals {:.2}; u from a scatter of {:.2}",
            self.rows.len() - curve.set_aside.len(),
            curve.set_aside.len(),
            curve.rms_deg,
            curve.scatter_deg
        );
        if let Some((half, u)) = curve.half_turn_difference_deg {
            let _ = writeln!(out, "Clockwise less anticlockwise {}, u {:.2}: the curve lies midway", east_west(2.0 * half, 2), 2.0 * u);
        }
    }

    fn readings_text(&self, out: &mut String) {
        out.push_str("\n    Row   Heading   Deviation   Off the curve\n");
        for (i, (SwingRow { number, reading, .. }, residual)) in self.rows.iter().zip(&self.curve.residuals_deg).enumerate() {
            let _ = write!(
                out,
                "{number:>7}   {:>7}   {:>9}   {:>13}",
                write::direction(reading.heading.deg(), 1),
                named(reading.deviation.deg()),
                signed(*residual, 1)
            );
            if let Some(aside) = self.curve.set_aside.iter().find(|s| s.index == i) {
                out.push_str("   set aside: too far from the curve through the others");
                if let Some(slip) = aside.slip {
                    let _ = write!(out, "; {slip}");
                }
            }
            out.push('\n');
        }
        for bad in self.bad_rows {
            let _ = writeln!(out, "{:>7}   not used: {}", bad.number, bad.why);
        }
    }

    /// For a program: one object.
    pub fn json(&self) -> Value {
        let curve = self.curve;
        let mut coefficients = Map::new();
        for ((value, u), name) in curve.coefficients.to_array().into_iter().zip(curve.u_deg()).zip(Coefficients::NAMES) {
            coefficients.insert(name.to_owned(), json!(u.map(|_| round4(value))));
            coefficients.insert(format!("{name}_u"), json!(u.map(round4)));
        }
        let by_name = |c: Coefficients| {
            Coefficients::NAMES.into_iter().zip(c.to_array()).map(|(n, x)| (n.to_owned(), json!(round4(x)))).collect::<Map<_, _>>()
        };
        let row = |index: usize| self.rows.get(index).map(|row| row.number);
        let aside = |s: &crate::compass::curve::SetAside| json!({ "row": row(s.index), "residual": round4(s.residual_deg) });
        let line = |(deg, e): &(f64, Option<Estimate>)| json!({ "compass_heading": deg, "deviation": e.map(|e| round4(e.deviation_deg)), "deviation_u": e.map(|e| round4(e.u_deg)) });
        let mut object = json!({
            "coefficients": coefficients,
            "handbook": curve.handbook.map(by_name),
            "rms": round4(curve.rms_deg),
            "set_aside": curve.set_aside.iter().map(aside).collect::<Vec<_>>(),
            "card": self.card.iter().map(line).collect::<Vec<_>>(),
            "unproven_headings": curve.unproven.iter().map(|(a, b)| [round4(a.deg()), round4(b.deg())]).collect::<Vec<_>>(),
            "notices": self.notices().iter().map(Notice::id).collect::<Vec<_>>(),
        });
        if let Value::Object(object) = &mut object {
            if let Some(asked) = &self.asked {
                object.insert("asked".to_owned(), line(asked));
            }
            if let Some(elsewhere) = &self.elsewhere {
                object.insert("elsewhere".to_owned(), elsewhere_json(elsewhere));
            }
            if !self.bad_rows.is_empty() {
                let problems = self.bad_rows.iter().map(|b| json!({ "row": b.number, "problem": b.why })).collect();
                object.insert("problems".to_owned(), Value::Array(problems));
            }
        }
        object
    }

    /// For a program: the table as rows.
    pub fn csv(&self) -> String {
        let mut out = String::from("compass_heading,deviation,deviation_u\n");
        for (deg, estimate) in &self.card {
            let _ = match estimate {
                Some(e) => writeln!(out, "{deg},{:.2},{:.2}", round4(e.deviation_deg), e.u_deg),
                None => writeln!(out, "{deg},,"),
            };
        }
        out
    }

    /// The table as a card that is read back: headings that the readings cannot tell are left out.
    ///
    /// `valid_from` is a date, or blank.
    pub fn card_csv(&self, valid_from: &str) -> String {
        let p = self.particulars;
        let mut out = String::from("compass_heading,deviation,deviation_u,vessel,magnetic_compass,valid_from,place\n");
        for (deg, estimate) in &self.card {
            let Some(e) = estimate else { continue };
            let names = [&p.vessel, &p.magnetic_compass, valid_from, &p.place].map(quoted).join(",");
            let _ = writeln!(out, "{deg},{:.2},{:.2},{names}", (e.deviation_deg * 100.0).round() / 100.0 + 0.0, e.u_deg);
        }
        out
    }
}

/// Correlations from here on are said, as a number between -1 and 1 (our own).
const TELLING_CORRELATION: f64 = 0.7;

/// A deviation in a column: `1.5 E`, and nil with the room of the name.
fn named(deg: f64) -> String {
    let text = write::east_west(deg);
    if text.contains(' ') { text } else { format!("{text}  ") }
}

/// A cell of CSV, in quotes where it needs them.
fn quoted(cell: &str) -> String {
    if cell.contains([',', '"', '\n', '\r']) { format!("\"{}\"", cell.replace('"', "\"\"")) } else { cell.to_owned() }
}

fn elsewhere_text(elsewhere: &Elsewhere, out: &mut String) {
    let _ = writeln!(out, "\nAt {}", write::position(elsewhere.position));
    for (part, name) in elsewhere.permanent.iter().zip(["B", "C"]) {
        if let Some(p) = part {
            let _ = writeln!(
                out,
                "{name}, permanent part  {:>7}, u {:.2}, where the horizontal field is {:.0} nT",
                signed(p.value_deg, 2),
                p.u_deg,
                elsewhere.reference_nt
            );
        }
    }
    for (part, name) in elsewhere.induced.iter().zip(["B", "C"]) {
        if let Some(p) = part {
            let _ = writeln!(out, "{name}, induced part    {:>7}, u {:.2}, where the inclination is 45", signed(p.value_deg, 2), p.u_deg);
        }
    }
    for row in &elsewhere.set_aside {
        let _ = writeln!(out, "Row {row} was set aside: too far from what the others make of it");
    }
    if elsewhere.is_told() {
        out.push_str("Coefficients to expect there: ");
        let expected = elsewhere.coefficients.iter().zip(Coefficients::NAMES).filter_map(|(part, name)| {
            let part = (*part)?;
            Some(format!("{name} {} (u {:.2})", signed(part.value_deg, 2), part.u_deg))
        });
        let _ = writeln!(out, "{}", expected.collect::<Vec<_>>().join(", "));
        out.push_str("\nHeading by compass   Deviation to expect there     u\n");
        for (deg, part) in &elsewhere.card {
            let _ = match part {
                Some(p) => writeln!(out, "{:>18}   {:>25}   {:.1}", write::direction(*deg, 1), named(p.value_deg), p.u_deg),
                None => writeln!(out, "{:>18}   {:>25}   -", write::direction(*deg, 1), "unknown"),
            };
        }
    } else {
        for (bound, of) in elsewhere.bounds.iter().zip(["all permanent", "all induced in vertical iron"]) {
            let _ = match bound {
                Some(c) => writeln!(out, "If B and C are {of}: B {}, C {} there", signed(c.b, 1), signed(c.c, 1)),
                None => writeln!(out, "If B and C are {of}: these readings do not say"),
            };
        }
    }
}

fn elsewhere_json(elsewhere: &Elsewhere) -> Value {
    let part = |p: &Option<Part>| json!(p.map(|p| json!({ "value": round4(p.value_deg), "u": round4(p.u_deg) })));
    let coefficients: Map<String, Value> =
        Coefficients::NAMES.into_iter().zip(&elsewhere.coefficients).map(|(name, p)| (name.to_owned(), part(p))).collect();
    let [permanent_b, permanent_c] = &elsewhere.permanent;
    let [induced_b, induced_c] = &elsewhere.induced;
    let [all_permanent, all_induced] = elsewhere.bounds.map(|bound| json!(bound.map(|c| json!({ "B": round4(c.b), "C": round4(c.c) }))));
    json!({
        "lat": elsewhere.position.lat.deg(),
        "lon": elsewhere.position.lon.deg(),
        "coefficients": coefficients,
        "reference_nt": round4(elsewhere.reference_nt),
        "permanent": { "B": part(permanent_b), "C": part(permanent_c) },
        "induced": { "B": part(induced_b), "C": part(induced_c) },
        "set_aside": elsewhere.set_aside,
        "if_all_permanent": all_permanent,
        "if_all_induced": all_induced,
        "card": elsewhere.card.iter().map(|(deg, p)| json!({
            "compass_heading": deg, "deviation": p.map(|p| round4(p.value_deg)), "deviation_u": p.map(|p| round4(p.u_deg)),
        })).collect::<Vec<_>>(),
    })
}
