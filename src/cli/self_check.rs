//! `shadowpin self-check`: published values recomputed on this machine.

use super::exit::Exit;
use super::output::{Format, OutputArgs};
use clap::Args as ClapArgs;
use serde::Serialize;
use shadowpin::angle::text::read_latitude;
use shadowpin::angle::{Latitude, Position, wrap_180_deg};
use shadowpin::compass::field::field_in_year;
use shadowpin::error::{Error, Result};
use shadowpin::horizon::{AmplitudeAnswer, RisingOrSetting, amplitude_at_altitude, horizontal, triangle};
use shadowpin::sky::{self, Body};
use shadowpin::time::text::read_utc;

// The same files that the tests read, as delivered.
const SUN: &str = include_str!("../../fixtures/published/jpl_de421/sun_1990_2050.csv");
const MOON_PLANETS: &str = include_str!("../../fixtures/published/jpl_de421/moon_planets.csv");
const STARS: &str = include_str!("../../fixtures/published/jpl_de421/stars.csv");
const FIELD: &str = include_str!("../../fixtures/published/wmm2025_test_values.csv");
const OLD_TABLE: &str = include_str!("../../fixtures/published/old_azimuth_table.csv");
const EXAMPLES: &str = include_str!("../../fixtures/published/published.csv");

const JPL: &str = "JPL DE421 (apparent place, WGS 84, UTC taken as UT1)";

/// Recomputes published check values on this machine and prints each with its source.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Example:\n  shadowpin self-check\n\nExit 0 when every value agrees within its tolerance, 1 when one does not.")]
pub struct Args {
    #[command(flatten)]
    output: OutputArgs,
}

/// One value and what this machine makes of it.
#[derive(Debug, Serialize)]
struct Check {
    source: String,
    what: String,
    published: f64,
    computed: f64,
    tolerance: f64,
    agrees: bool,
}

/// Runs every check and writes the list.
pub fn run(args: Args) -> Result<Exit> {
    let mut checks = Vec::new();
    ephemeris(SUN, 300, 0.01, &mut checks)?;
    ephemeris(MOON_PLANETS, 120, 0.02, &mut checks)?;
    ephemeris(STARS, 100, 0.02, &mut checks)?;
    variation(&mut checks)?;
    old_table(&mut checks)?;
    examples(&mut checks)?;
    let differ = checks.iter().filter(|c| !c.agrees).count();
    let answer = match args.output.format {
        Format::Text => text(&checks, differ),
        Format::Json => serde_json::to_string_pretty(&checks).map_err(|e| built_in(&e.to_string()))?,
        Format::Csv => rows(&checks)?,
    };
    args.output.write(&answer)?;
    Ok(if differ == 0 { Exit::Clean } else { Exit::Queries })
}

impl Check {
    fn new(source: &str, what: String, published: f64, computed: f64, tolerance: f64) -> Self {
        let difference = wrap_180_deg(computed - published);
        Self { source: source.to_owned(), what, published, computed, tolerance, agrees: difference.abs() <= tolerance }
    }
}

fn text(checks: &[Check], differ: usize) -> String {
    use std::fmt::Write as _;
    let mut text = String::new();
    let mut source = "";
    for check in checks {
        if check.source != source {
            source = &check.source;
            let _ = writeln!(text, "{}{source}", if text.is_empty() { "" } else { "\n" });
            let _ = writeln!(text, "  {:<56}{:>11}{:>11}{:>11}{:>10}", "", "published", "computed", "difference", "allowed");
        }
        let difference = wrap_180_deg(check.computed - check.published);
        let verdict = if check.agrees { "" } else { "   DIFFERS" };
        let _ = writeln!(
            text,
            "  {:<56}{:>11.4}{:>11.4}{:>11.4}{:>10.4}{verdict}",
            check.what,
            check.published,
            check.computed,
            (difference * 1e4).round() / 1e4 + 0.0,
            check.tolerance
        );
    }
    let _ = match differ {
        0 => writeln!(text, "\nAll {} values agree.", checks.len()),
        n => writeln!(text, "\n{n} of {} values differ: this program must not be relied on.", checks.len()),
    };
    text
}

fn rows(checks: &[Check]) -> Result<String> {
    let mut writer = csv::Writer::from_writer(Vec::new());
    for check in checks {
        writer.serialize(check).map_err(|e| built_in(&e.to_string()))?;
    }
    let bytes = writer.into_inner().map_err(|e| built_in(&e.to_string()))?;
    String::from_utf8(bytes).map_err(|e| built_in(&e.to_string()))
}

fn built_in(message: &str) -> Error {
    Error::Content { file: "built-in check values".into(), line: 0, message: message.to_owned() }
}

/// The rows of one built-in file under their column names.
fn table(text: &str) -> Result<Vec<std::collections::HashMap<String, String>>> {
    csv::Reader::from_reader(text.as_bytes()).deserialize().collect::<Result<_, csv::Error>>().map_err(|e| built_in(&e.to_string()))
}

fn cell<'r>(row: &'r std::collections::HashMap<String, String>, name: &str) -> Result<&'r str> {
    row.get(name).map(String::as_str).ok_or_else(|| built_in(&format!("no column {name}")))
}

fn number(row: &std::collections::HashMap<String, String>, name: &str) -> Result<f64> {
    cell(row, name)?.parse().map_err(|_| built_in(&format!("{name} is not a number")))
}

fn position(row: &std::collections::HashMap<String, String>, lat: &str, lon: &str) -> Result<Position> {
    Position::from_deg(number(row, lat)?, number(row, lon)?).ok_or_else(|| built_in("a position out of range"))
}

/// Every `step`th azimuth of an ephemeris file that lies within the bound's altitudes, -1 to 60.
fn ephemeris(text: &str, step: usize, tolerance_deg: f64, checks: &mut Vec<Check>) -> Result<()> {
    let bad = |bad: shadowpin::error::BadValue| built_in(&bad.to_string());
    let rows = table(text)?;
    let usable = rows.iter().filter(|r| number(r, "altitude_deg").is_ok_and(|a| (-1.0..=60.0).contains(&a)));
    for row in usable.step_by(step) {
        let (utc, body) = (cell(row, "utc")?, Body::from_name(cell(row, "body")?).map_err(bad)?);
        let place = sky::apparent_place(body, read_utc(utc).map_err(bad)?.utc);
        let computed = horizontal(&place, position(row, "lat", "lon")?)?.azimuth.deg();
        checks.push(Check::new(JPL, format!("azimuth of {}, {utc}", body.name()), number(row, "azimuth_deg")?, computed, tolerance_deg));
    }
    Ok(())
}

/// Every tenth official test value, to its printed hundredth of a degree.
fn variation(checks: &mut Vec<Check>) -> Result<()> {
    const SOURCE: &str = "World Magnetic Model 2025, official test values (NOAA NCEI and BGS)";
    for row in table(FIELD)?.iter().step_by(10) {
        let at = position(row, "lat_deg", "lon_deg")?;
        let (year, height_km) = (number(row, "decimal_year")?, number(row, "alt_km")?);
        let computed = field_in_year(at, year, height_km)?.variation.deg();
        let what = format!("variation {year:.1}, {} {}, {height_km} km", cell(row, "lat_deg")?, cell(row, "lon_deg")?);
        checks.push(Check::new(SOURCE, what, number(row, "D_deg")?, computed, 0.0051));
    }
    Ok(())
}

/// Cells of the old table, printed to the minute and read by eye: within 1.31'.
fn old_table(checks: &mut Vec<Check>) -> Result<()> {
    const SOURCE: &str = "A printed nineteenth-century time-azimuth table";
    for row in table(OLD_TABLE)?.iter().step_by(16) {
        let (lat, lha) = (number(row, "lat_deg")?, number(row, "hour_angle_deg")?);
        let dec = number(row, "dec_deg")? * if cell(row, "name")? == "same" { 1.0 } else { -1.0 };
        let latitude = Latitude::from_deg(lat).ok_or_else(|| built_in("a latitude out of range"))?;
        // The table counts from the elevated pole: west of north for a body past the meridian.
        let computed = 360.0 - triangle(latitude, dec, lha)?.azimuth.deg();
        let what = format!("azimuth angle, lat {lat}, dec {dec}, hour angle {lha}");
        checks.push(Check::new(SOURCE, what, number(row, "published_azimuth_angle_deg")?, computed, 1.31 / 60.0));
    }
    Ok(())
}

/// Worked examples whose inputs are written the same way: latitude, declination, hour angle or setting.
fn examples(checks: &mut Vec<Check>) -> Result<()> {
    for row in table(EXAMPLES)? {
        let (id, source, inputs, published) = (cell(&row, "id")?, cell(&row, "source")?, cell(&row, "inputs")?, cell(&row, "published")?);
        if id.starts_with("QM-229-") {
            let (lat, dec, lha) = (part(inputs, "lat ")?, part(inputs, "dec ")?, part(inputs, "LHA ")?);
            let lha: f64 = lha.parse().map_err(|_| built_in(id))?;
            let latitude = read_latitude(lat).map_err(|e| built_in(&e.to_string()))?.value;
            let declination = read_latitude(dec).map_err(|e| built_in(&e.to_string()))?.value.deg();
            let computed = 360.0 - triangle(latitude, declination, lha)?.azimuth.deg();
            let what = format!("azimuth angle, lat {lat}, dec {dec}, LHA {lha}");
            checks.push(Check::new(source, what, figure(published, "Z ")?, computed, 0.051));
        } else if id == "QM-amplitude" {
            let (lat, dec) = (part(inputs, "lat ")?, part(inputs, "dec ")?);
            let latitude = read_latitude(lat).map_err(|e| built_in(&e.to_string()))?.value;
            let declination = read_latitude(dec).map_err(|e| built_in(&e.to_string()))?.value.deg();
            let AmplitudeAnswer::At(amplitude) = amplitude_at_altitude(latitude, declination, 0.0, RisingOrSetting::Setting) else {
                return Err(built_in(id));
            };
            let what = format!("azimuth of the setting sun, lat {lat}, dec {dec}");
            checks.push(Check::new(source, what, figure(published, "azimuth ")?, amplitude.azimuth().deg(), 0.051));
        }
    }
    Ok(())
}

/// What stands behind `name` up to the next semicolon or bracket.
fn part<'t>(text: &'t str, name: &str) -> Result<&'t str> {
    let (_, rest) = text.split_once(name).ok_or_else(|| built_in(&format!("no \"{name}\" in \"{text}\"")))?;
    Ok(rest.split([';', '(']).next().unwrap_or(rest).trim())
}

/// The number behind `name`.
fn figure(text: &str, name: &str) -> Result<f64> {
    let rest = part(text, name)?;
    let end = rest.find(|c: char| !(c.is_ascii_digit() || c == '.')).unwrap_or(rest.len());
    rest.get(..end).and_then(|n| n.parse().ok()).ok_or_else(|| built_in(&format!("no number behind \"{name}\" in \"{text}\"")))
}
