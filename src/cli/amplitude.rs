//! `shadowpin amplitude`: a bearing at rising or setting.

use super::card::CardArgs;
use super::exit::Exit;
use super::files::never_over_inputs;
use super::instruments::Instruments;
use super::nmea;
use super::one_row;
use super::output::{Format, OutputArgs};
use super::when_where::{WhenWhere, option};
use clap::{Args as ClapArgs, ValueEnum};
use shadowpin::angle::GyroError;
use shadowpin::angle::text::{ErrorSign, Letters, read_error};
use shadowpin::compass::{HorizonKind, Observation, Target, work};
use shadowpin::error::{Error, Result};
use shadowpin::horizon::{Limb, RisingOrSetting, Search, ladder, limb_diameters};
use shadowpin::logbook::nmea::Item;
use shadowpin::report::amplitude::AmplitudePage;
use shadowpin::sky::Body;

/// Minutes of the ladder either side of the instant.
const LADDER_MINUTES: u16 = 15;

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
enum EventArg {
    Rising,
    Setting,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
enum HorizonArg {
    Celestial,
    Visible,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
enum LimbArg {
    Centre,
    Upper,
    Lower,
}

/// The bearing of a body as it rises or sets, when to take it, and what it says of the compasses.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Example: the sun at sunrise by gyro, with the minutes about it in ship's time\n  \
    shadowpin amplitude --ship-time \"2026-06-14 07:05\" --zone -9 --lat 36-05.8S --lon 130-33.6E --event rising \\\n    \
    --eye-height 18 --gyro 061.5 --ladder\n\n\
    Never look at the sun without the azimuth circle's shades.")]
pub struct Args {
    #[command(flatten)]
    when_where: WhenWhere,
    /// Sun, Moon, Venus, Mars, Jupiter, Saturn or a star's name
    #[arg(long, value_name = "NAME", default_value = "sun")]
    body: String,
    /// Rising or setting
    #[arg(long, value_enum)]
    event: EventArg,
    /// The horizon that the body was on
    #[arg(long, value_enum, default_value_t = HorizonArg::Celestial)]
    horizon: HorizonArg,
    /// The part of the disc on the visible horizon
    #[arg(long, value_enum)]
    limb: Option<LimbArg>,
    /// Each minute for a quarter of an hour either side
    #[arg(long)]
    ladder: bool,
    /// The gyro's error, such as 0.5L, for the bearings to expect; otherwise that of --gyro
    #[arg(long, value_name = "ERROR", allow_hyphen_values = true)]
    gyro_error: Option<String>,
    #[command(flatten)]
    instruments: Instruments,
    #[command(flatten)]
    card: CardArgs,
    /// List every term of each uncertainty
    #[arg(long)]
    budget: bool,
    #[command(flatten)]
    output: OutputArgs,
}

/// Works the amplitude and writes the answer.
pub fn run(args: Args) -> Result<Exit> {
    never_over_inputs([args.card.file(), args.instruments.limits_file(), args.when_where.nmea.file()], [&args.output.output])?;
    let body = option("--body", Body::from_name(&args.body))?;
    let limits = args.instruments.limits()?;
    let event = match args.event {
        EventArg::Rising => RisingOrSetting::Rising,
        EventArg::Setting => RisingOrSetting::Setting,
    };
    let horizon = match (args.horizon, args.limb) {
        (HorizonArg::Celestial, None) => HorizonKind::Celestial,
        (HorizonArg::Celestial, Some(_)) => return Err(Error::Usage("--limb goes with --horizon visible".into())),
        (HorizonArg::Visible, None | Some(LimbArg::Centre)) => HorizonKind::Visible(Limb::Centre),
        (HorizonArg::Visible, Some(LimbArg::Upper)) => HorizonKind::Visible(Limb::Upper),
        (HorizonArg::Visible, Some(LimbArg::Lower)) => HorizonKind::Visible(Limb::Lower),
    };
    let target = Target::OnHorizon { body, event, horizon };
    let mut observation = Observation::of(target);
    let zone = args.when_where.fill(&mut observation)?;
    args.instruments.fill(&mut observation)?;
    let heard = args.when_where.nmea.fill(&mut observation, &Item::ALL, &limits)?;
    let (moment, place) = nmea::time_and_place(&observation, heard.as_ref())?;
    let worked = work(&observation, None, &limits);
    if let (None, Some(reason)) = (worked.true_azimuth, worked.no_azimuth) {
        return Err(reason.into());
    }
    let on_card = args.card.on(&observation, moment.utc, &limits)?;
    let remarks = on_card.iter().flat_map(|card| card.sentences(&worked)).collect();
    let answer = match args.output.format {
        Format::Json => one_row::json(&observation, &worked, on_card.as_ref()),
        Format::Csv => one_row::csv(&observation, &worked, on_card.as_ref()),
        Format::Text => {
            let eye_height_m = observation.eye_height_m.unwrap_or(limits.uncertainty.eye_height_assumed_m);
            let crossing = match worked.on_horizon.map(|h| h.search) {
                Some(Search::At(crossing)) => Some(crossing),
                _ => None,
            };
            let rungs = match (args.ladder, crossing, worked.true_azimuth) {
                (true, Some(c), Some(z)) => ladder(body, place.position, c.utc, z.deg(), eye_height_m, LADDER_MINUTES)?,
                _ => Vec::new(),
            };
            let stated =
                args.gyro_error.as_deref().map(|e| option("--gyro-error", read_error(e, ErrorSign::EastPlus, Letters::LowHighToo)));
            let stated = stated.transpose()?.map(|e| GyroError::wrapping_deg(e.value));
            AmplitudePage {
                body,
                event,
                horizon,
                utc: moment.utc,
                zone,
                position: place.position,
                eye_height_m,
                observation: &observation,
                worked: &worked,
                limb_diameters: crossing.map(|c| limb_diameters(body, c.utc, place.position, eye_height_m)),
                ladder: rungs,
                gyro_error: stated.or(worked.gyro_error.map(|e| e.value)),
                remarks,
                with_budget: args.budget,
            }
            .text()
        }
    };
    args.output.write(&nmea::with_its_words(answer, heard.as_ref(), &args.output))?;
    Ok(Exit::Clean)
}
