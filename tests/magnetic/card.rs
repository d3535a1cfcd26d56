//! Deviation cards: reading, the one in force, both ways of interpolating, and the doubts they raise.

use shadowpin::angle::{CompassBearing, Deviation};
use shadowpin::compass::card::{Card, CardOf, Cards, EnteredBy};
use shadowpin::compass::curve::Coefficients;
use shadowpin::logbook::card::read_cards;
use shadowpin::time::UtcInstant;

const CURVE: Coefficients = Coefficients { a: 0.2, b: 4.0, c: -2.5, d: 1.0, e: 0.3 };

fn day(y: i32, m: u32, d: u32) -> UtcInstant {
    UtcInstant::from_naive(chrono::NaiveDate::from_ymd_opt(y, m, d).unwrap().and_time(chrono::NaiveTime::MIN)).unwrap()
}

fn compass(deg: f64) -> CompassBearing {
    CompassBearing::wrapping_deg(deg)
}

fn tenth(deg: f64) -> Deviation {
    Deviation::wrapping_deg((deg * 10.0).round() / 10.0)
}

/// A card of a curve on headings every `step` degrees, its figures to a tenth.
fn card(of: CardOf, curve: Coefficients, step: u32) -> Card {
    let figures: Vec<(f64, Deviation)> =
        (0..360).step_by(step as usize).map(|h| (f64::from(h), tenth(curve.deviation_deg(compass(f64::from(h)))))).collect();
    Card::new(of, EnteredBy::CompassHeading, &figures).unwrap()
}

fn ids(card: &Card) -> Vec<&'static str> {
    card.notices(None, 24).iter().map(|n| n.id()).collect()
}

#[test]
fn by_the_curve_and_as_given() {
    let card = card(CardOf::default(), CURVE, 45);
    for heading in 0..360 {
        let heading = compass(f64::from(heading) + 0.5);
        // The figures are rounded to a tenth: a mean of eight is off by less than 0.1.
        assert!((card.deviation(heading).deg() - CURVE.deviation_deg(heading)).abs() < 0.1);
    }
    // Across north in a straight line: a third of the way from 315 to 360 and on to 45.
    let on = |deg: f64| card.as_given(compass(deg)).deg();
    assert!((on(330.0) - (on(315.0) + (on(0.0) - on(315.0)) / 3.0)).abs() < 1e-9);
    assert!((on(359.999_999) - on(0.0)).abs() < 1e-6);
    assert_eq!(on(45.0), card.points()[1].1.deg());
    assert!(ids(&card).is_empty());
}

#[test]
fn by_magnetic_heading_is_the_same_card() {
    let by_compass = card(CardOf::default(), CURVE, 15);
    let figures: Vec<(f64, Deviation)> = by_compass.points().iter().map(|(h, d)| ((*h + *d).deg(), *d)).collect();
    let by_magnetic = Card::new(CardOf::default(), EnteredBy::MagneticHeading, &figures).unwrap();
    for heading in 0..72 {
        let heading = compass(5.0 * f64::from(heading));
        assert!((by_magnetic.deviation(heading).deg() - by_compass.deviation(heading).deg()).abs() < 1e-6);
    }
}

#[test]
fn zero_and_360_may_both_stand_there_but_not_differ() {
    let figures =
        |last: f64| [(0.0, 1.0), (90.0, 2.0), (180.0, -1.0), (270.0, 0.0), (360.0, last)].map(|(h, d)| (h, Deviation::wrapping_deg(d)));
    assert_eq!(Card::new(CardOf::default(), EnteredBy::CompassHeading, &figures(1.0)).unwrap().points().len(), 4);
    let bad = Card::new(CardOf::default(), EnteredBy::CompassHeading, &figures(1.5)).unwrap_err();
    assert_eq!(bad.to_string(), "two different deviations (1.0 and 1.5) for heading 000.0");
}

#[test]
fn doubts() {
    let with = |curve: Coefficients| card(CardOf::default(), curve, 45);
    assert_eq!(ids(&with(Coefficients { a: -1.6, ..CURVE })), ["card-constant"]);
    assert_eq!(ids(&with(Coefficients::default())), ["card-near-nil"]);
    let mut figures: Vec<(f64, Deviation)> = with(CURVE).points().iter().map(|(h, d)| (h.deg(), *d)).collect();
    figures[3].1 = Deviation::wrapping_deg(figures[3].1.deg() + 2.5);
    let rough = Card::new(CardOf::default(), EnteredBy::CompassHeading, &figures).unwrap();
    assert_eq!(ids(&rough), ["card-not-smooth"]);
    let sparse = Card::new(CardOf::default(), EnteredBy::CompassHeading, &figures[..4]).unwrap();
    assert_eq!(ids(&sparse), ["card-sparse"]);
    assert!(sparse.curve().is_none());
    assert_eq!(sparse.deviation(compass(22.5)), sparse.as_given(compass(22.5)));
    // Figures that no curve runs through, all round.
    let wild: Vec<(f64, Deviation)> = (0..8)
        .map(|i| (45.0 * f64::from(i), Deviation::wrapping_deg([9.0, -11.0, 4.0, 14.0, -9.0, 12.0, -13.0, 5.0][i as usize])))
        .collect();
    let wild = Card::new(CardOf::default(), EnteredBy::CompassHeading, &wild).unwrap();
    assert_eq!(ids(&wild), ["card-not-smooth"]);
    assert_eq!(wild.deviation(compass(22.5)), wild.as_given(compass(22.5)));
}

#[test]
fn age_in_whole_months() {
    let card = card(CardOf { valid_from: Some(day(2024, 1, 31)), ..CardOf::default() }, CURVE, 45);
    assert_eq!(card.age_months(day(2024, 2, 28)), Some(0));
    assert_eq!(card.age_months(day(2024, 2, 29)), Some(1));
    assert_eq!(card.age_months(day(2026, 1, 30)), Some(23));
    assert_eq!(card.age_months(day(2026, 1, 31)), Some(24));
    assert_eq!(card.age_months(day(2023, 12, 1)), None);
    assert_eq!(card.notices(Some(day(2026, 1, 31)), 24)[0].to_string(), "the card is 24 months old, 24 are allowed");
    assert!(card.notices(Some(day(2026, 1, 30)), 24).is_empty());
}

#[test]
fn a_reversed_card_is_told_from_a_right_one() {
    let card = card(CardOf::default(), CURVE, 45);
    let mut n = super::swings::Numbers::new(3);
    let mut observed = |sign: f64, count: usize| {
        (0..count)
            .map(|i| compass(37.0 * i as f64))
            .map(|h| (h, Deviation::wrapping_deg(sign * CURVE.deviation_deg(h) + 0.7 * n.normal())))
            .collect::<Vec<_>>()
    };
    assert_eq!(card.reversed_by(&observed(1.0, 12)), None);
    assert_eq!(card.reversed_by(&observed(-1.0, 7)), None);
    assert_eq!(card.reversed_by(&observed(-1.0, 12)).unwrap().id(), "card-reversed");
}

#[test]
fn the_card_in_force() {
    let of = |vessel: &str, compass: &str, from: Option<UtcInstant>, place: &str| CardOf {
        vessel: vessel.into(),
        magnetic_compass: compass.into(),
        valid_from: from,
        place: place.into(),
    };
    let cards = Cards::new(vec![
        card(of("", "", None, "any"), CURVE, 45),
        card(of("Amber Tern", "standard", Some(day(2024, 5, 1)), "old"), CURVE, 45),
        card(of("Amber Tern", "standard", Some(day(2026, 3, 1)), "new"), CURVE, 45),
        card(of("Amber Tern", "steering", Some(day(2025, 1, 1)), "steering"), CURVE, 45),
    ]);
    let place = |vessel, compass, at| cards.in_force(vessel, compass, at).map(|c| c.of.place.as_str());
    assert_eq!(place("Amber Tern", "standard", day(2026, 2, 28)), Some("old"));
    assert_eq!(place("amber tern ", "Standard", day(2026, 3, 1)), Some("new"));
    assert_eq!(place("Amber Tern", "steering", day(2026, 3, 1)), Some("steering"));
    // Before its first own card, and for another vessel: the one that names nobody.
    assert_eq!(place("Amber Tern", "standard", day(2024, 4, 30)), Some("any"));
    assert_eq!(place("Grey Heron", "", day(2026, 3, 1)), Some("any"));
}

#[test]
fn files() {
    let text = "Magnetic_Heading;Deviation;Vessel;Valid_From\n0;1,5W;Amber Tern;2026-03-01\n90;2,0 E;Amber Tern;2026-03-01\n\n180;-0,5;Grey Heron;\n";
    let cards = read_cards("card.csv", text.as_bytes()).unwrap();
    let all: Vec<&Card> = cards.iter().collect();
    assert_eq!(all.len(), 2);
    assert_eq!(all[0].of.valid_from, Some(day(2026, 3, 1)));
    // Magnetic 000, deviation 1.5 W: by compass 001.5.
    assert_eq!(all[0].points()[0], (compass(1.5), Deviation::wrapping_deg(-1.5)));

    let message = |text: &str| read_cards("card.csv", text.as_bytes()).unwrap_err().to_string();
    for (text, wanted) in [
        ("", "card.csv: the file is empty: a header and rows were expected"),
        ("compass_heading,deviation\n", "card.csv: a header and no card below it"),
        ("heading,deviation\n0,1\n", "card.csv: no column compass_heading or magnetic_heading; the columns are heading, deviation"),
        ("compass_heading,dev\n0,1\n", "card.csv: no column deviation; the columns are compass_heading, dev"),
        (
            "compass_heading,deviation\n0,1\n90,-1.5W\n",
            "card.csv, line 3: deviation: \"-1.5W\": expected an error such as 1.5E, 1.5 W, -1.5 or 1½ W; a sign or a letter, not both",
        ),
        (
            "compass_heading,deviation\n400,1\n",
            "card.csv, line 2: heading: \"400\": expected a direction from 000 to 360, such as 045, 045.5, 045½ or N 68 E; it is over 360",
        ),
        ("compass_heading,deviation,vessel\n0,1,A\n0,2,A\n", "card.csv: A: two different deviations (1.0 and 2.0) for heading 000.0"),
        ("compass_heading,deviation,Deviation\n0,1,1\n", "card.csv: the column deviation stands there twice"),
    ] {
        assert_eq!(message(text), wanted);
    }
}
