//! `shadowpin plan`: what to observe next.

use super::exit::Exit;
use super::files::never_over_inputs;
use super::instruments::read_limits;
use super::nmea::{self, Heard};
use super::output::{Format, OutputArgs};
use super::when_where::{WhenWhere, option};
use clap::Args as ClapArgs;
use shadowpin::angle::text::{ErrorSign, Letters, read_direction, read_error, read_number, write};
use shadowpin::angle::{CompassError, GyroError, TrueBearing};
use shadowpin::compass::{Observation, Target};
use shadowpin::error::{Error, Result};
use shadowpin::logbook::nmea::Item;
use shadowpin::plan::{Ask, LONGEST_H, Track, identify, plan};
use shadowpin::report::plan::{PlanPage, candidates_json, candidates_text};
use std::path::PathBuf;

/// How far a body may stand from what was sighted, degrees, where no tolerance is given.
const TOLERANCE_DEG: f64 = 5.0;

/// What can be observed in the next hours, from when to when, and which is best.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Examples:\n  \
    shadowpin plan --utc 2026-06-14T06:00:00Z --zone -9 --lat 36-05.8S --lon 130-33.6E --course 204 --speed 12 --gyro-error 0.5L\n  \
    shadowpin plan --utc 2026-06-14T12:00:00Z --lat 36-05.8S --lon 130-33.6E --bearing 118 --altitude 32")]
pub struct Args {
    #[command(flatten)]
    when_where: WhenWhere,
    /// True course; goes with --speed. With --nmea, where it is not given, the gyro heading is the course steered
    #[arg(long, value_name = "COURSE")]
    course: Option<String>,
    /// Speed in knots
    #[arg(long, value_name = "KNOTS", allow_hyphen_values = true)]
    speed: Option<String>,
    /// Hours to look ahead, to 48
    #[arg(long, value_name = "HOURS", default_value = "4", allow_hyphen_values = true)]
    hours: String,
    /// Height of eye in metres
    #[arg(long, value_name = "METRES", allow_hyphen_values = true)]
    eye_height: Option<String>,
    /// The gyro's error, such as 0.5L, for the bearings to expect
    #[arg(long, value_name = "ERROR", allow_hyphen_values = true)]
    gyro_error: Option<String>,
    /// The magnetic compass's error on this heading, such as 4E, for the bearings to expect
    #[arg(long, value_name = "ERROR", allow_hyphen_values = true)]
    compass_error: Option<String>,
    /// Limits file (TOML); its blind arcs are left out
    #[arg(long, value_name = "FILE")]
    limits: Option<PathBuf>,
    /// Show every star
    #[arg(long)]
    all: bool,
    /// Which body is that? Its true bearing
    #[arg(long, value_name = "BEARING")]
    bearing: Option<String>,
    /// Its altitude, degrees
    #[arg(long, value_name = "DEGREES", requires = "bearing", allow_hyphen_values = true)]
    altitude: Option<String>,
    /// How far a body may stand from that, degrees
    #[arg(long, value_name = "DEGREES", requires = "bearing", allow_hyphen_values = true)]
    tolerance: Option<String>,
    #[command(flatten)]
    output: OutputArgs,
}

/// Looks ahead, or answers which body that is.
pub fn run(args: Args) -> Result<Exit> {
    if args.output.format == Format::Csv {
        return Err(Error::Usage("plan answers as text or json".into()));
    }
    never_over_inputs([args.limits.as_ref(), args.when_where.nmea.file()], [&args.output.output])?;
    if args.course.is_some() != args.speed.is_some() && !args.when_where.nmea.is_given() {
        return Err(Error::Usage("--course and --speed go together".into()));
    }
    let limits = read_limits(args.limits.as_deref())?;
    let number =
        |name: &str, text: &Option<String>, range, what| text.as_deref().map(|t| option(name, read_number(t, range, what))).transpose();
    let gyro_error = args.gyro_error.as_deref().map(|e| option("--gyro-error", read_error(e, ErrorSign::EastPlus, Letters::LowHighToo)));
    let gyro_error = gyro_error.transpose()?.map(|e| GyroError::wrapping_deg(e.value));
    let course = args.course.as_deref().map(|c| option("--course", read_direction(c))).transpose()?;

    // An observation of nothing holds what is known of the ship.
    let mut ship = Observation::of(Target::Headings);
    let zone = args.when_where.fill(&mut ship)?;
    ship.speed_kn = number("--speed", &args.speed, 0.0..=100.0, "a speed in knots, 0 to 100")?;
    let wanted: &[Item] = match (&args.bearing, course) {
        (Some(_), _) => &[Item::Time, Item::Position],
        (None, Some(_)) => &[Item::Time, Item::Position, Item::Speed],
        (None, None) => &[Item::Time, Item::Position, Item::Speed, Item::GyroHeading],
    };
    let mut heard = args.when_where.nmea.fill(&mut ship, wanted, &limits)?;
    let (moment, place) = nmea::time_and_place(&ship, heard.as_ref())?;
    let position = place.position;
    if let Some(bearing) = &args.bearing {
        let bearing = TrueBearing::wrapping_deg(option("--bearing", read_direction(bearing))?.value);
        let altitude_deg = number("--altitude", &args.altitude, -2.0..=90.0, "an altitude in degrees, -2 to 90")?;
        let tolerance_deg = number("--tolerance", &args.tolerance, 0.1..=90.0, "degrees, 0.1 to 90")?.unwrap_or(TOLERANCE_DEG);
        let candidates = identify(position, moment.utc, bearing, altitude_deg, tolerance_deg);
        let answer = match args.output.format {
            Format::Json => candidates_json(&candidates),
            _ => candidates_text(moment.utc, bearing, tolerance_deg, &candidates),
        };
        args.output.write(&nmea::with_its_words(answer, heard.as_ref(), &args.output))?;
        return Ok(Exit::Clean);
    }
    let course = course.map(|c| TrueBearing::wrapping_deg(c.value)).or_else(|| steered(&ship, gyro_error, heard.as_mut()));
    if let (Some(heard), Some(_), None) = (heard.as_mut(), course, ship.speed_kn) {
        heard.remarks.push("No speed was given or heard: the ship is taken to lie still.".to_owned());
    }
    if course.is_none() && args.speed.is_some() {
        return Err(Error::Usage("--speed goes with --course, or with a gyro heading that the instruments give".into()));
    }
    let ask = Ask {
        track: Track { from: moment.utc, position, course, speed_kn: ship.speed_kn.unwrap_or(0.0) },
        hours: option("--hours", read_number(&args.hours, 0.1..=LONGEST_H, "hours, 0.1 to 48"))?,
        eye_height_m: number("--eye-height", &args.eye_height, 0.0..=100.0, "a height of eye in metres, 0 to 100")?
            .unwrap_or(limits.uncertainty.eye_height_assumed_m),
        limits: &limits,
    };
    let compass_error =
        args.compass_error.as_deref().map(|e| option("--compass-error", read_error(e, ErrorSign::EastPlus, Letters::EastWest)));
    let page = PlanPage {
        ask: &ask,
        plan: &plan(&ask),
        zone,
        gyro_error,
        compass_error: compass_error.transpose()?.map(|e| CompassError::wrapping_deg(e.value)),
        all: args.all,
    };
    let answer = if args.output.format == Format::Json { page.json() } else { page.text() };
    args.output.write(&nmea::with_its_words(answer, heard.as_ref(), &args.output))?;
    Ok(Exit::Clean)
}

/// The course as steered by the gyro, corrected where its error is known.
fn steered(ship: &Observation, gyro_error: Option<GyroError>, heard: Option<&mut Heard>) -> Option<TrueBearing> {
    let heading = ship.gyro_heading.map(|h| h.value);
    let course = heading.map(|h| gyro_error.map_or(TrueBearing::wrapping_deg(h.deg()), |e| h + e));
    if let Some(heard) = heard {
        heard.remarks.push(match (course, gyro_error) {
            (None, _) => "Neither --course nor a gyro heading: the ship is taken to lie still.".to_owned(),
            (Some(course), Some(_)) => format!("Course {}: the gyro heading with --gyro-error.", write::direction(course.deg(), 1)),
            (Some(course), None) => {
                format!("Course {}: the gyro heading as it stands, its error not known (--gyro-error).", write::direction(course.deg(), 1))
            }
        });
    }
    course
}
