//! `shadowpin page`: the page for the bridge.

use super::card::read_cards_of;
use super::exit::Exit;
use super::files::never_over_inputs;
use super::instruments::read_limits;
use super::nmea::{Live, NmeaArgs};
use super::when_where::option;
use crate::page::{Address, Desk, Heard, Record, serve};
use clap::Args as ClapArgs;
use serde_json::Map;
use shadowpin::error::{Error, Result};
use shadowpin::logbook::columns::Column;
use shadowpin::time::text::read_zone;
use std::io::{self, Write};
use std::net::{Ipv4Addr, TcpListener};
use std::path::PathBuf;
use std::sync::Mutex;

/// A page for the bridge, on this machine alone: bearings worked as they are typed, what to take next, the record.
#[derive(Debug, ClapArgs)]
#[command(after_help = "Examples:\n  \
    shadowpin page --book book.csv --card card.csv --nmea udp:10110 --zone -9\n  \
    shadowpin page --port 8181 --night\n\n\
    Open the address that it prints in a browser of this machine; the long word in it keeps other users out. Ctrl-C ends it.")]
pub struct Args {
    /// Port on 127.0.0.1; any free one where none is given
    #[arg(long, value_name = "PORT", default_value_t = 0)]
    port: u16,
    /// The book that entries are added to (CSV); begun where it is not there yet
    #[arg(long, value_name = "FILE")]
    book: Option<PathBuf>,
    /// Deviation card (CSV), to compare with
    #[arg(long, value_name = "FILE")]
    card: Option<PathBuf>,
    /// Read the card in a straight line between its headings, not by its five-coefficient curve
    #[arg(long, requires = "card")]
    card_as_given: bool,
    /// Limits file (TOML)
    #[arg(long, value_name = "FILE")]
    limits: Option<PathBuf>,
    #[command(flatten)]
    nmea: NmeaArgs,
    /// The ship
    #[arg(long, value_name = "NAME")]
    vessel: Option<String>,
    /// Which gyro, such as No.1
    #[arg(long, value_name = "NAME")]
    gyro_name: Option<String>,
    /// Which repeater bearings are read on, such as port
    #[arg(long, value_name = "NAME")]
    repeater: Option<String>,
    /// Which magnetic compass, such as standard
    #[arg(long, value_name = "NAME")]
    magnetic_compass: Option<String>,
    /// Height of eye in metres
    #[arg(long, value_name = "METRES")]
    eye_height: Option<String>,
    /// Zone description, added to ship's time to get UTC: east -, west +
    #[arg(long, value_name = "ZONE", allow_hyphen_values = true)]
    zone: Option<String>,
    /// Open in night colours
    #[arg(long)]
    night: bool,
}

/// Prints the address and answers until the program is ended.
pub fn run(args: Args) -> Result<Exit> {
    never_over_inputs([args.card.as_ref(), args.limits.as_ref(), args.nmea.file()], [&args.book])?;
    let limits = read_limits(args.limits.as_deref())?;
    let cards = args.card.as_deref().map(read_cards_of).transpose()?.map(|(_, cards)| cards);
    let record = args.book.clone().map(|path| Record::open(path, &limits)).transpose()?.map(Mutex::new);
    if let Some(zone) = &args.zone {
        option("--zone", read_zone(zone))?;
    }
    let given: Map<String, serde_json::Value> = [
        (Column::Vessel, &args.vessel),
        (Column::Gyro, &args.gyro_name),
        (Column::Repeater, &args.repeater),
        (Column::MagneticCompass, &args.magnetic_compass),
        (Column::EyeHeight, &args.eye_height),
        (Column::Zone, &args.zone),
    ]
    .into_iter()
    .filter_map(|(column, text)| Some((column.info().name.to_owned(), text.clone()?.into())))
    .collect();
    let live = Live::start(&args.nmea)?;
    let heard_limits = limits.clone();
    let heard = live.map(|live| -> Heard { Box::new(move || live.heard(&heard_limits)) });

    let failed = |what| move |source| Error::Stream { what, source };
    let listener = TcpListener::bind((Ipv4Addr::LOCALHOST, args.port)).map_err(failed("opening the port on 127.0.0.1"))?;
    let port = listener.local_addr().map_err(failed("opening the port on 127.0.0.1"))?.port();
    let address = Address::new(port).map_err(|why| Error::Stream { what: "making the token", source: io::Error::other(why) })?;
    let card_name = args.card.as_ref().map(|path| path.file_name().unwrap_or(path.as_os_str()).to_string_lossy().into_owned());
    let mut out = io::stdout().lock();
    writeln!(out, "{}", address.url()).and_then(|()| out.flush()).map_err(failed("writing to standard output"))?;
    drop(out);
    let desk = Desk { address, limits, cards, card_name, card_as_given: args.card_as_given, heard, given, night: args.night, record };
    serve(listener, desk).map_err(failed("answering"))?;
    Ok(Exit::Clean)
}
