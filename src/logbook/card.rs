//! Reading deviation cards.

use super::figures::{read_day, read_deviation};
use super::table::Table;
use crate::angle::Deviation;
use crate::angle::text::read_direction;
use crate::compass::card::{Card, CardOf, Cards, EnteredBy};
use crate::error::Result;

/// Reads the cards of a file: `compass_heading` or `magnetic_heading`, `deviation`, and where there are several, `vessel`,
/// `magnetic_compass`, `valid_from`, `place`. Rows alike in these four are one card, in any order.
///
/// `name` is what messages call the file.
///
/// # Errors
/// [`crate::error::Error::Content`] with the line: a card is used as a whole or not at all.
///
/// # Example
/// ```
/// use shadowpin::logbook::card::read_cards;
/// let cards = read_cards("card.csv", b"compass_heading,deviation\n0,1.5W\n90,2.0E\n180,-0.5\n270,0\n").unwrap();
/// assert_eq!(cards.iter().count(), 1);
/// ```
pub fn read_cards(name: &str, bytes: &[u8]) -> Result<Cards> {
    let table = Table::read(name, bytes)?;
    let (by_compass, by_magnetic) = (table.column("compass_heading"), table.column("magnetic_heading"));
    let deviation = table.column("deviation");
    let (heading, by) = match (by_compass.is_there(), by_magnetic.is_there()) {
        (true, false) => (by_compass, EnteredBy::CompassHeading),
        (false, true) => (by_magnetic, EnteredBy::MagneticHeading),
        (true, true) => return Err(table.unusable("compass_heading and magnetic_heading: a card has one of them".to_owned())),
        (false, false) => {
            return Err(table.unusable(format!("no column compass_heading or magnetic_heading; the columns are {}", table.columns())));
        }
    };
    if !deviation.is_there() {
        return Err(table.unusable(format!("no column deviation; the columns are {}", table.columns())));
    }
    let [vessel, compass, valid_from, place] = ["vessel", "magnetic_compass", "valid_from", "place"].map(|name| table.column(name));

    let mut cards: Vec<(CardOf, Vec<(f64, Deviation)>)> = Vec::new();
    for row in &table.rows {
        let at = |column: &str, bad| table.error(row, format!("{column}: {bad}"));
        let heading_deg = read_direction(row.cell(heading)).map_err(|bad| at("heading", bad))?.value;
        let deviation = read_deviation(row.cell(deviation)).map_err(|bad| at("deviation", bad))?;
        let from = match row.cell(valid_from) {
            "" => None,
            text => Some(read_day(text).map_err(|bad| at("valid_from", bad))?),
        };
        let of = CardOf {
            vessel: row.cell(vessel).to_owned(),
            magnetic_compass: row.cell(compass).to_owned(),
            valid_from: from,
            place: row.cell(place).to_owned(),
        };
        match cards.iter_mut().find(|(known, _)| *known == of) {
            Some((_, figures)) => figures.push((heading_deg, deviation)),
            None => cards.push((of, vec![(heading_deg, deviation)])),
        }
    }
    if cards.is_empty() {
        return Err(table.unusable("a header and no card below it".to_owned()));
    }
    let card = |(of, figures): (CardOf, Vec<_>)| {
        let whose = [&of.vessel, &of.magnetic_compass].into_iter().filter(|n| !n.is_empty()).cloned().collect::<Vec<_>>().join(", ");
        let whose = if whose.is_empty() { String::new() } else { format!("{whose}: ") };
        Card::new(of, by, &figures).map_err(|bad| table.unusable(format!("{whose}{bad}")))
    };
    Ok(Cards::new(cards.into_iter().map(card).collect::<Result<_>>()?))
}
