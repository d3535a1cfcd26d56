//! `shadowpin azimuth`: one bearing.

use super::card::CardArgs;
use super::exit::Exit;
use super::files::never_over_inputs;
use super::instruments::Instruments;
use super::nmea;
use super::one_row;
use super::output::{Format, OutputArgs};
use super::when_where::{WhenWhere, option};
use clap::Args as ClapArgs;
use shadowpin::compass::{Observation, Target, doubts, work};
use shadowpin::error::Result;
use shadowpin::horizon::by_hand;
use shadowpin::logbook::nmea::Item;
use shadowpin::report::against;
use shadowpin::report::azimuth::AzimuthPage;
use shadowpin::sky::Body;

/// The azimuth of a body, and what a bearing of it says of the compasses.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Example: the sun by gyro and by the standard compass\n  \
    shadowpin azimuth --utc 2026-06-14T06:12:00Z --lat 36-05.8S --lon 130-33.6E --body sun --gyro 319.5 --compass 316 \\\n    \
    --gyro-heading 204 --compass-heading 200.5\n\n\
    Time, place, headings and speed from the ship's instruments:\n  \
    shadowpin azimuth --nmea udp:10110 --body sun --gyro 319.5 --compass 316\n\n\
    Without a bearing it gives the azimuth alone. Never look at the sun without the azimuth circle's shades.")]
pub struct Args {
    #[command(flatten)]
    when_where: WhenWhere,
    /// Sun, Moon, Venus, Mars, Jupiter, Saturn or a star's name
    #[arg(long, value_name = "NAME")]
    body: String,
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

/// Works the bearing and writes the answer.
pub fn run(args: Args) -> Result<Exit> {
    never_over_inputs([args.card.file(), args.instruments.limits_file(), args.when_where.nmea.file()], [&args.output.output])?;
    let body = option("--body", Body::from_name(&args.body))?;
    let limits = args.instruments.limits()?;
    let mut observation = Observation::of(Target::Body(body));
    let zone = args.when_where.fill(&mut observation)?;
    args.instruments.fill(&mut observation)?;
    let heard = args.when_where.nmea.fill(&mut observation, &Item::ALL, &limits)?;
    let (moment, place) = nmea::time_and_place(&observation, heard.as_ref())?;
    let mut worked = work(&observation, None, &limits);
    worked.notices.extend(doubts(&observation, &worked, &limits));
    if let (None, Some(reason)) = (worked.true_azimuth, worked.no_azimuth) {
        return Err(reason.into());
    }
    let on_card = args.card.on(&observation, moment.utc, &limits)?;
    let mut remarks = against::sentences(&observation, &worked, &limits);
    remarks.extend(on_card.iter().flat_map(|card| card.sentences(&worked)));
    let answer = match args.output.format {
        Format::Text => AzimuthPage {
            body,
            utc: moment.utc,
            zone,
            position: place.position,
            observation: &observation,
            worked: &worked,
            hand: by_hand(body, moment.utc, place.position),
            remarks,
            with_budget: args.budget,
        }
        .text(),
        Format::Json => one_row::json(&observation, &worked, on_card.as_ref()),
        Format::Csv => one_row::csv(&observation, &worked, on_card.as_ref()),
    };
    args.output.write(&nmea::with_its_words(answer, heard.as_ref(), &args.output))?;
    Ok(Exit::Clean)
}
