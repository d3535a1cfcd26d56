//! One observation as a row of the log: the log's own columns, then ours.

use shadowpin::compass::{HorizonKind, Observation, Target, Worked};
use shadowpin::horizon::{Limb, RisingOrSetting};
use shadowpin::report::card::OnCard;
use shadowpin::report::rows::{RowFigures, push_csv_text, push_json_text};
use shadowpin::time::text::write::iso;

/// The cells given, under the log's names.
fn given(observation: &Observation) -> Vec<(&'static str, String)> {
    let mut cells = Vec::new();
    let mut put = |name, text: Option<String>| {
        if let Some(text) = text {
            cells.push((name, text));
        }
    };
    put("utc", observation.moment.map(|m| iso(m.utc)));
    put("lat", observation.place.map(|p| format!("{:.5}", p.position.lat.deg())));
    put("lon", observation.place.map(|p| format!("{:.5}", p.position.lon.deg())));
    put("body", observation.body().map(|b| b.name().to_owned()));
    if let Target::OnHorizon { event, horizon, .. } = observation.target {
        put("method", Some(if event == RisingOrSetting::Rising { "rising" } else { "setting" }.to_owned()));
        let (horizon, limb) = match horizon {
            HorizonKind::Celestial => ("celestial", None),
            HorizonKind::Visible(Limb::Centre) => ("visible", Some("centre")),
            HorizonKind::Visible(Limb::Upper) => ("visible", Some("upper")),
            HorizonKind::Visible(Limb::Lower) => ("visible", Some("lower")),
        };
        put("horizon", Some(horizon.to_owned()));
        put("limb", limb.map(str::to_owned));
    }
    put("eye_height_m", observation.eye_height_m.map(|h| h.to_string()));
    let direction = |deg: f64| deg.to_string();
    put("gyro_bearing", observation.gyro_bearing.map(|r| direction(r.value.deg())));
    put("compass_bearing", observation.compass_bearing.map(|r| direction(r.value.deg())));
    put("gyro_heading", observation.gyro_heading.map(|r| direction(r.value.deg())));
    put("compass_heading", observation.compass_heading.map(|r| direction(r.value.deg())));
    put("speed_kn", observation.speed_kn.map(|v| v.to_string()));
    cells
}

/// The ids of the notices, `;` between.
fn notice_ids(worked: &Worked, on_card: Option<&OnCard>) -> String {
    let of_card = on_card.into_iter().flat_map(|card| &card.notices);
    worked.notices.iter().chain(of_card).map(|n| n.id()).collect::<Vec<_>>().join(";")
}

/// A header and one row.
pub fn csv(observation: &Observation, worked: &Worked, on_card: Option<&OnCard>) -> String {
    let notices = notice_ids(worked, on_card);
    let card_deviation_deg = on_card.map(|card| card.deviation.deg());
    let figures = RowFigures { worked: Some(worked), card_deviation_deg, notices: &notices, ..RowFigures::default() };
    let (mut header, mut row) = (Vec::new(), Vec::new());
    for (at, (name, text)) in given(observation).iter().enumerate() {
        if at > 0 {
            header.push(b',');
            row.push(b',');
        }
        header.extend_from_slice(name.as_bytes());
        // The log's own cells: a minus sign of a latitude is a number, not a formula.
        row.extend_from_slice(text.as_bytes());
    }
    for (name, _) in figures.cells() {
        header.push(b',');
        push_csv_text(&mut header, name, b',');
    }
    figures.push_csv(&mut row, b',');
    header.push(b'\n');
    header.append(&mut row);
    String::from_utf8_lossy(&header).into_owned()
}

/// One object.
pub fn json(observation: &Observation, worked: &Worked, on_card: Option<&OnCard>) -> String {
    let notices = notice_ids(worked, on_card);
    let card_deviation_deg = on_card.map(|card| card.deviation.deg());
    let figures = RowFigures { worked: Some(worked), card_deviation_deg, notices: &notices, ..RowFigures::default() };
    let mut out = vec![b'{'];
    for (at, (name, text)) in given(observation).iter().enumerate() {
        if at > 0 {
            out.push(b',');
        }
        push_json_text(&mut out, name);
        out.push(b':');
        match text.parse::<f64>() {
            Ok(number) => out.extend_from_slice(number.to_string().as_bytes()),
            Err(_) => push_json_text(&mut out, text),
        }
    }
    figures.push_json(&mut out);
    out.push(b'}');
    String::from_utf8_lossy(&out).into_owned()
}
