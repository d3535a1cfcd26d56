//! The listener: which words it takes, how old they are, and what it does with noise.

use super::{line, lines};
use proptest::prelude::*;
use shadowpin::compass::{Observation, Target};
use shadowpin::limits::Limits;
use shadowpin::logbook::nmea::{Ages, Bridge, ClockCheck, Fill, FromBridge, Item, Recorded, Talker};
use shadowpin::time::text::read_utc;
use shadowpin::time::text::write::iso;
use std::time::Duration;

fn heard(text: &str) -> FromBridge {
    let mut bridge = Bridge::new(None);
    bridge.push(text.as_bytes(), Duration::ZERO);
    bridge.found(Ages::ByStream, &Limits::default())
}

/// Two seconds of a ship, made for this test.
const SHIP: [&str; 9] = [
    "GPRMC,061158.00,A,3605.8300,S,13033.5900,E,12.3,203.5,140626,,,A",
    "HEHDT,203.8,T",
    "GPRMC,061159.00,A,3605.8330,S,13033.5880,E,12.3,203.5,140626,,,A",
    "GPGGA,061159.00,3605.8331,S,13033.5881,E,1,09,0.9,21.0,M,,M,,",
    "GPVTG,203.5,T,198.9,M,12.4,N,23.0,K,A",
    "HEHDT,204.0,T",
    "HCHDG,200.5,1.5,W,4.6,E",
    "GPZDA,061200.00,14,06,2026,-09,00",
    "GPVTG,203.5,T,198.9,M,12.5,N,23.1,K,N",
];

#[test]
fn the_last_word_of_each() {
    let found = heard(&lines(&SHIP));
    let time = found.time.unwrap();
    assert_eq!((iso(time.value.utc).as_str(), time.from.to_string().as_str()), ("2026-06-14T06:12:00Z", "GPZDA"));
    let position = found.position.unwrap();
    assert!((position.value.position.lat.deg() + 36.0 + 5.8331 / 60.0).abs() < 1e-9);
    assert_eq!((position.from.to_string().as_str(), position.age_s), ("GPGGA", Some(1.0)));
    assert_eq!((found.gyro_heading.unwrap().value.value.deg(), found.compass_heading.unwrap().value.value.deg()), (204.0, 200.5));
    // The course of RMC and VTG is no heading, and the last VTG is not valid.
    assert_eq!(found.speed_kn.unwrap().value, 12.4);
    let refused: Vec<String> = found.refused.iter().map(|(name, why, count)| format!("{} {why} {count}", name.unwrap())).collect();
    assert_eq!(refused, ["GPVTG mode N: not valid 1"]);
    assert!(found.doubts.is_empty());
}

#[test]
fn a_course_is_not_a_heading_and_a_date_only_in_zda_or_rmc() {
    let found = heard(&lines(&["GPVTG,203.5,T,198.9,M,12.4,N,23.0,K,A", "GPGGA,061159,3605.83,S,13033.59,E,1,09,0.9,21.0,M,,M,,"]));
    assert!(found.gyro_heading.is_none() && found.compass_heading.is_none() && found.time.is_none());
    assert!(found.speed_kn.is_some() && found.position.is_some());
}

/// A fix that is lost while the receiver's clock goes on; a gyro that falls silent.
#[test]
fn words_grow_old() {
    let mut text = lines(&SHIP);
    text += &lines(&["GPRMC,061202.50,V,,,,,,,140626,,,N", "GPZDA,061203.00,14,06,2026,,"]);
    let found = heard(&text);
    assert_eq!(found.position.map(|p| (p.age_s, p.stale)), Some((Some(4.0), false)));
    assert_eq!(found.gyro_heading.map(|h| (h.age_s, h.stale)), Some((Some(4.0), true)));
    text += &line("GPRMC,061209.10,V,,,,,,,140626,,,N");
    let found = heard(&text);
    assert_eq!(found.position.map(|p| (p.age_s, p.stale)), Some((Some(10.1), true)));
    assert!(found.time.is_some_and(|t| !t.stale && t.age_s == Some(6.1)));
    let mut observation = Observation::of(Target::Headings);
    let filled = found.fill(&mut observation, &Item::ALL, None);
    assert_eq!(filled[..3], [(Item::Time, Fill::Taken), (Item::Position, Fill::Stale), (Item::GyroHeading, Fill::Stale)]);
    assert!(observation.place.is_none() && observation.gyro_heading.is_none());
}

#[test]
fn live_words_age_from_their_arrival() {
    let mut bridge = Bridge::new(None);
    bridge.push(lines(&SHIP).as_bytes(), Duration::from_secs(5));
    let text = line("HEHDT,205.0,T");
    let (half, rest) = text.split_at(9);
    bridge.push(half.as_bytes(), Duration::from_secs(6));
    bridge.push(rest.as_bytes(), Duration::from_secs(7));
    let at = |ms| bridge.found(Ages::ByArrival { now: Duration::from_millis(ms) }, &Limits::default());
    let found = at(9_500);
    assert_eq!(found.gyro_heading.map(|h| (h.value.value.deg(), h.age_s, h.stale)), Some((205.0, Some(2.5), false)));
    assert_eq!(found.compass_heading.map(|h| (h.age_s, h.stale)), Some((Some(4.5), true)));
    assert!(at(15_500).time.unwrap().stale && !at(14_900).time.unwrap().stale);
    let mut limits = Limits::default();
    limits.thresholds.nmea_stale_s = 60.0;
    assert!(!bridge.found(Ages::ByArrival { now: Duration::from_secs(60) }, &limits).time.unwrap().stale);
}

#[test]
fn the_better_talker_and_what_the_other_says() {
    let found = heard(&lines(&[
        "GNRMC,061159.00,A,3605.83,S,13033.59,E,12.3,203.5,140626,,,A",
        "IIRMC,061130.00,A,3610.83,S,13033.59,E,12.3,203.5,140626,,,A",
        "GPGLL,3605.83,S,13033.60,E,061159.00,A,A",
    ]));
    assert_eq!(found.position.unwrap().from.to_string(), "GNRMC");
    let doubts: Vec<String> = found.doubts.iter().map(ToString::to_string).collect();
    assert_eq!(
        doubts,
        [
            "IIRMC gives a position 5.0 miles from that of GNRMC, which is taken: is one of them not on satellites?",
            "the clock of IIRMC is 29 seconds behind that of GNRMC, which is taken"
        ]
    );
    // A better talker that has fallen silent gives way.
    let silent: String = (0..20).map(|s| line(&format!("IIRMC,0612{s:02}.00,A,3610.83,S,13033.59,E,12.3,203.5,140626,,,A"))).collect();
    let found = heard(&(line("GNRMC,061200.00,A,3605.83,S,13033.59,E,12.3,203.5,140626,,,A") + &silent));
    assert_eq!((found.position.unwrap().from.to_string().as_str(), found.doubts.len()), ("IIRMC", 0));
}

#[test]
fn a_named_talker_gives_the_gyro_heading() {
    let mut bridge = Bridge::new(Talker::from_text("gp"));
    bridge.push(lines(&["GPHDT,010.0,T", "HEHDT,011.0,T", "HCHDT,012.0,T"]).as_bytes(), Duration::ZERO);
    let found = bridge.found(Ages::ByStream, &Limits::default());
    // Nothing said the time, so the age is not known.
    assert_eq!(found.gyro_heading.map(|h| (h.value.value.deg(), h.age_s, h.stale)), Some((10.0, None, false)));
    assert_eq!(found.refused.iter().count(), 2);
}

#[test]
fn by_hand_goes_before_the_stream_and_a_lost_count_of_weeks_is_not_taken() {
    let found = heard(&lines(&SHIP));
    let computer = read_utc("2046-01-28T06:00:00Z").unwrap().utc;
    let clock = found.clock(computer, Recorded::No);
    assert_eq!(clock, Some(ClockCheck::Rollover { weeks: -1024 }));
    let mut observation = Observation { speed_kn: Some(3.0), ..Observation::of(Target::Headings) };
    let filled = found.fill(&mut observation, &Item::ALL, clock);
    assert_eq!(filled.iter().map(|f| f.1).collect::<Vec<_>>(), [Fill::ClockFarOff, Fill::Taken, Fill::Taken, Fill::Taken, Fill::ByHand]);
    assert_eq!((observation.moment, observation.speed_kn), (None, Some(3.0)));
}

/// Noise of ten megabytes between two sentences, with line ends and without, hides neither.
#[test]
fn noise_between_sentences() {
    for noise in [vec![0xff_u8; 10 << 20], b"\x00$\n".repeat(1 << 20), b"$GPRMC,0611".repeat(1 << 18)] {
        let mut bridge = Bridge::new(None);
        bridge.push(line(SHIP[1]).as_bytes(), Duration::ZERO);
        noise.chunks(4096).for_each(|chunk| bridge.push(chunk, Duration::ZERO));
        bridge.push(line(SHIP[6]).as_bytes(), Duration::ZERO);
        let found = bridge.found(Ages::ByStream, &Limits::default());
        assert!(found.gyro_heading.is_some() && found.compass_heading.is_some());
        assert!(found.time.is_none() && found.position.is_none());
    }
}

proptest! {
    /// Wherever the chunks end, what is found is the same.
    #[test]
    fn chunk_edges_change_nothing(edges in proptest::collection::vec(0_usize..500, 0..20)) {
        let text = lines(&SHIP);
        let mut edges: Vec<usize> = edges.into_iter().map(|e| e.min(text.len())).chain([0, text.len()]).collect();
        edges.sort_unstable();
        let mut bridge = Bridge::new(None);
        edges.windows(2).for_each(|w| bridge.push(&text.as_bytes()[w[0]..w[1]], Duration::ZERO));
        prop_assert_eq!(bridge.found(Ages::ByStream, &Limits::default()), heard(&text));
    }

    /// Of a stream cut short anywhere, no figure is taken that the whole sentences before the cut do not say.
    #[test]
    fn half_a_sentence_says_nothing(cut in 0_usize..500) {
        let text = lines(&SHIP);
        let cut = cut.min(text.len());
        let whole: String = SHIP.iter().map(|b| line(b)).scan(0, |at, l| { *at += l.len(); Some((*at, l)) })
            .take_while(|(end, _)| *end <= cut + 2).map(|(_, l)| l).collect();
        let (part, whole) = (heard(&text[..cut]), heard(&whole));
        prop_assert_eq!((part.time, part.position, part.gyro_heading), (whole.time, whole.position, whole.gyro_heading));
        prop_assert_eq!((part.compass_heading, part.speed_kn), (whole.compass_heading, whole.speed_kn));
    }

    /// A stream with one byte changed says nothing that the stream without that sentence does not, but for line ends.
    #[test]
    fn a_changed_byte_costs_its_sentence_alone(at in 0_usize..500, to in any::<u8>()) {
        let text = lines(&SHIP);
        let at = at.min(text.len() - 1);
        let mut bytes = text.clone().into_bytes();
        // The two line ends and the `$` do not count in the checksum; a hexadecimal figure may be written small.
        prop_assume!(!matches!(bytes[at], b'\r' | b'\n' | b'$') && !bytes[at].eq_ignore_ascii_case(&to));
        bytes[at] = to;
        let hit = text[..at].matches('\n').count();
        let without: String = SHIP.iter().enumerate().filter(|(i, _)| *i != hit).map(|(_, b)| line(b)).collect();
        let mut bridge = Bridge::new(None);
        bridge.push(&bytes, Duration::ZERO);
        let (found, without) = (bridge.found(Ages::ByStream, &Limits::default()), heard(&without));
        prop_assert_eq!((found.time, found.position, found.gyro_heading), (without.time, without.position, without.gyro_heading));
        prop_assert_eq!((found.compass_heading, found.speed_kn), (without.compass_heading, without.speed_kn));
    }

    /// Right checksums over any fields: whatever is found is in range.
    #[test]
    fn any_fields_under_a_right_checksum(
        kinds in proptest::collection::vec("(GP|HE|HC|II)(ZDA|RMC|GGA|GLL|HDT|THS|HDG|VTG)(,([0-9]{0,8}(\\.[0-9]{0,3})?|[ANSEWTVM]|-?[0-9]{1,20})){0,12}", 0..8)
    ) {
        let text: String = kinds.iter().map(|k| line(k)).collect();
        let found = heard(&text);
        if let Some(p) = found.position { prop_assert!(p.value.position.lat.deg().abs() <= 90.0); }
        if let Some(h) = found.gyro_heading { prop_assert!((0.0..360.0).contains(&h.value.value.deg())); }
        if let Some(v) = found.speed_kn { prop_assert!((0.0..=100.0).contains(&v.value)); }
    }
}
