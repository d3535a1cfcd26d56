//! `shadowpin swing`

use super::exit::Exit;
use super::files::{self, RowsOut};
use super::output::{Format, OutputArgs};
use super::read;
use super::sheets;
use clap::ValueEnum;
use shadowpin::angle::text::{read_direction, write};
use shadowpin::angle::{CompassBearing, Position};
use shadowpin::compass::curve::latitude::{self, MagneticPlace};
use shadowpin::compass::curve::{Curve, DeviationReading, NoCurve, fit};
use shadowpin::compass::field::{self, Field};
use shadowpin::compass::{Place, Target, work};
use shadowpin::error::{Error, NoAnswer, Result};
use shadowpin::limits::Limits;
use shadowpin::logbook::TableForm;
use shadowpin::logbook::swing::{BadRow, COLUMNS, SightRow, Swing, SwingRow, read_swing};
use shadowpin::notice::Notice;
use shadowpin::report::page;
use shadowpin::report::swing::{Elsewhere, Particulars, SwingReport, headings, table_of};
use shadowpin::time::{Moment, UtcInstant};
use std::path::PathBuf;

/// Coefficients A to E with their uncertainty, the fit, and a table of the deviations, from the deviations on five headings or more.
#[derive(Debug, clap::Args)]
#[command(after_help = "Example:\n  shadowpin swing swing.csv --vessel \"Amber Tern\" --compass standard --card-out card.csv\n\n\
The file has the columns compass_heading and deviation (1.5W or -1.5), or compass_heading, compass_bearing and body with utc, lat and lon, \
or compass_heading, compass_bearing and charted_bearing. It may have turn (clockwise, anticlockwise).")]
pub struct Args {
    /// The swing: CSV or a workbook (.xlsx); - for standard input
    file: PathBuf,
    /// The sheet of a workbook, instead of its first
    #[arg(long, value_name = "NAME")]
    sheet: Option<String>,
    /// Column names other than ours: a TOML file with lines such as deviation = "Dev"
    #[arg(long, value_name = "FILE")]
    columns: Option<PathBuf>,
    /// Figures are written with a decimal comma
    #[arg(long)]
    decimal_comma: bool,
    /// Spacing of the table, degrees
    #[arg(long, value_name = "DEGREES", value_enum, default_value_t = Every::Fifteen)]
    every: Every,
    /// Deviation on this heading by compass too
    #[arg(long, value_name = "DEGREES")]
    heading: Option<String>,
    /// Write the table as a deviation card to this file
    #[arg(long, value_name = "FILE")]
    card_out: Option<PathBuf>,
    /// Write a report for a person to this file: one HTML page that needs no script and fetches nothing
    #[arg(long, value_name = "FILE")]
    report: Option<PathBuf>,
    /// Vessel, for the table's head
    #[arg(long, value_name = "NAME", default_value = "", hide_default_value = true)]
    vessel: String,
    /// Magnetic compass, for the table's head
    #[arg(long, value_name = "NAME", default_value = "", hide_default_value = true)]
    compass: String,
    /// Place in words, for the table's head; otherwise --lat and --lon
    #[arg(long, value_name = "WORDS", default_value = "", hide_default_value = true)]
    place: String,
    /// Correctors as found, for the table's head
    #[arg(long, value_name = "WORDS", default_value = "", hide_default_value = true)]
    correctors: String,
    /// Date, or date and time, of the swing, UTC
    #[arg(long, value_name = "TIME")]
    utc: Option<String>,
    /// Latitude of the swing
    #[arg(long, value_name = "LATITUDE", allow_hyphen_values = true, requires_all = ["lon", "utc"])]
    lat: Option<String>,
    /// Longitude of the swing
    #[arg(long, value_name = "LONGITUDE", allow_hyphen_values = true, requires = "lat")]
    lon: Option<String>,
    /// The curve to expect at this latitude
    #[arg(long, value_name = "LATITUDE", allow_hyphen_values = true, requires = "for_lon")]
    for_lat: Option<String>,
    /// The curve to expect at this longitude
    #[arg(long, value_name = "LONGITUDE", allow_hyphen_values = true, requires = "for_lat")]
    for_lon: Option<String>,
    #[command(flatten)]
    output: OutputArgs,
}

/// Spacings of a table.
#[derive(Debug, Clone, Copy, ValueEnum)]
enum Every {
    #[value(name = "10")]
    Ten,
    #[value(name = "15")]
    Fifteen,
    #[value(name = "22.5")]
    Points,
}

impl Every {
    fn deg(self) -> f64 {
        match self {
            Self::Ten => 10.0,
            Self::Fifteen => 15.0,
            Self::Points => 22.5,
        }
    }
}

pub fn run(args: Args) -> Result<Exit> {
    files::never_over_inputs([Some(&args.file), args.columns.as_ref()], [&args.output.output, &args.card_out, &args.report])?;
    let utc = args.utc.as_deref().map(|text| read::utc("--utc", text)).transpose()?;
    let swung_at = match (&args.lat, &args.lon) {
        (Some(lat), Some(lon)) => Some(read::position(("--lat", lat), ("--lon", lon))?),
        _ => None,
    };
    let asked = args.heading.as_deref().map(heading).transpose()?;
    let form = TableForm { names: sheets::names(args.columns.as_deref())?, decimal_comma: args.decimal_comma };
    let (name, bytes, sheet) = sheets::table(&args.file, args.sheet.as_deref(), &form.names, &COLUMNS)?;
    let mut swing = read_swing(&name, &bytes, &form)?;
    if let Some(sheet) = &sheet {
        swing.bad_rows.iter_mut().for_each(|bad| bad.why = sheets::with_cell(sheet, bad.number, &bad.why));
    }
    let by_option = swung_at.zip(utc);
    work_out(&mut swing, by_option);
    let readings: Vec<DeviationReading> = swing.rows.iter().map(|row| row.reading).collect();
    let curve = fit(&readings).map_err(|none| no_curve(name.clone(), none, &swing.bad_rows))?;
    let places = places(&swing.rows, by_option);

    let first = swing.rows.iter().find_map(|row| row.taken).map(|(_, utc)| utc);
    let date = utc.or(first).map(|utc| utc.to_chrono().format("%Y-%m-%d").to_string()).unwrap_or_default();
    let place = if args.place.is_empty() { swung_at.map(write::position).unwrap_or_default() } else { args.place };
    let particulars = Particulars { vessel: args.vessel, magnetic_compass: args.compass, date, place, correctors: args.correctors };
    let elsewhere = match (&args.for_lat, &args.for_lon) {
        (Some(lat), Some(lon)) => {
            let there = read::position(("--for-lat", lat), ("--for-lon", lon))?;
            Some(elsewhere(&swing.rows, &curve, &places, there, args.every.deg())?)
        }
        _ => None,
    };
    let report = SwingReport {
        particulars: &particulars,
        rows: &swing.rows,
        bad_rows: &swing.bad_rows,
        curve: &curve,
        card: table_of(&curve, args.every.deg()),
        asked: asked.map(|asked| (asked.deg(), curve.on(asked))),
        elsewhere,
        of_field: of_field(&places),
        latitudes_mixed: latitude::are_different(places.iter().flatten().filter_map(MagneticPlace::of)),
    };
    if let Some(path) = &args.card_out {
        std::fs::write(path, report.card_csv(&particulars.date)).map_err(|source| Error::File { path: path.clone(), source })?;
    }
    if let Some(path) = &args.report {
        RowsOut::open(Some(path))?.whole(&page::swing(&report, &name))?;
    }
    args.output.write(&match args.output.format {
        Format::Text => report.text(),
        Format::Json => report.json().to_string(),
        Format::Csv => report.csv(),
    })?;
    Ok(if swing.bad_rows.is_empty() { Exit::Clean } else { Exit::Problems })
}

fn heading(text: &str) -> Result<CompassBearing> {
    let read = read_direction(text).map_err(|bad| Error::Option { what: "--heading".to_owned(), bad })?;
    Ok(CompassBearing::wrapping_deg(read.value))
}

/// Bearings to deviations; a row that has none is a bad row.
fn work_out(swing: &mut Swing, by_option: Option<(Position, UtcInstant)>) {
    for sight in std::mem::take(&mut swing.sights) {
        let number = sight.number;
        match deviation_of(&sight, by_option) {
            Ok(row) => swing.rows.push(row),
            Err(why) => swing.bad_rows.push(BadRow { number, why }),
        }
    }
    swing.bad_rows.sort_by_key(|bad| bad.number);
}

fn deviation_of(sight: &SightRow, by_option: Option<(Position, UtcInstant)>) -> std::result::Result<SwingRow, String> {
    let mut observation = sight.observation;
    // A mark stays where it is; a body moves on, and the time of its bearing is its own.
    if let (Target::Mark { .. }, Some((position, utc))) = (observation.target, by_option) {
        observation.place = observation.place.or(Some(Place { position, step_deg: 0.0 }));
        observation.moment = observation.moment.or(Some(Moment { utc, step_s: 0.0 }));
    }
    let (Some(place), Some(moment)) = (observation.place, observation.moment) else {
        return Err("no place and time: lat, lon and utc, or for a mark --lat, --lon and --utc".to_owned());
    };
    let worked = work(&observation, None, &Limits::default());
    let none =
        || worked.no_azimuth.map_or_else(|| "no variation: the field models do not reach that date".to_owned(), |why| why.to_string());
    let deviation = worked.deviation.ok_or_else(none)?.value;
    let reading = DeviationReading { heading: sight.heading, deviation, turn: sight.turn };
    Ok(SwingRow { number: sight.number, reading, taken: Some((place.position, moment.utc)) })
}

/// Why there is no curve, with the first row that could not be used, which may be the reason.
fn no_curve(file: String, none: NoCurve, bad_rows: &[BadRow]) -> Error {
    let first =
        bad_rows.first().map(|bad| format!("; {} rows could not be used, the first is row {}: {}", bad_rows.len(), bad.number, bad.why));
    Error::Content { file, line: 0, message: format!("{none}{}", first.unwrap_or_default()) }
}

/// The field at each row and when: from the row itself, else from the options; `None` where neither says, or no model reaches.
fn places(rows: &[SwingRow], by_option: Option<(Position, UtcInstant)>) -> Vec<Option<Field>> {
    let at = |row: &SwingRow| row.taken.or(by_option).and_then(|(position, utc)| field::field(position, utc, 0.0).ok());
    rows.iter().map(at).collect()
}

/// What the field says of a compass there, each kind once.
fn of_field(places: &[Option<Field>]) -> Vec<Notice> {
    let mut notices: Vec<Notice> = Vec::new();
    for notice in places.iter().flatten().flat_map(Field::notices) {
        if notices.iter().all(|known| known.id() != notice.id()) {
            notices.push(notice);
        }
    }
    notices
}

/// The curve to expect at another place, on the date of the last reading.
fn elsewhere(rows: &[SwingRow], curve: &Curve, places: &[Option<Field>], there: Position, every_deg: f64) -> Result<Elsewhere> {
    let located = rows.iter().zip(places).map(|(row, field)| Some((row.reading, MagneticPlace::of(field.as_ref()?)?)));
    let year = places.iter().flatten().map(|field| field.year).reduce(f64::max);
    let (Some(located), Some(year)) = (located.collect::<Option<Vec<_>>>(), year) else {
        return Err(Error::Usage(
            "--for-lat and --for-lon need the place and date of every reading, from 1900 to a year after the field model: \
             --lat, --lon and --utc, or columns lat, lon and utc"
                .to_owned(),
        ));
    };
    let field_there = field::field_in_year(there, year, 0.0)?;
    let to = MagneticPlace::of(&field_there).ok_or(NoAnswer::WeakField { horizontal_nt: field_there.horizontal_nt })?;
    let by_latitude = latitude::fit_by_latitude(&located).map_err(|none| Error::Usage(none.to_string()))?;
    // From readings of several latitudes the plain curve is a mean, which bounds nothing.
    let swung_at = located.first().map(|(_, place)| *place).filter(|_| !latitude::are_different(located.iter().map(|(_, place)| *place)));
    Ok(Elsewhere {
        position: there,
        coefficients: by_latitude.coefficients_at(to),
        permanent: by_latitude.permanent(),
        reference_nt: by_latitude.reference_nt,
        induced: by_latitude.induced(),
        bounds: swung_at.map_or([None; 2], |from| latitude::bounds(curve, from, to)),
        set_aside: by_latitude.set_aside.iter().filter_map(|i| rows.get(*i).map(|row| row.number)).collect(),
        card: headings(every_deg).map(|h| (h, by_latitude.on(CompassBearing::wrapping_deg(h), to))).collect(),
    })
}
