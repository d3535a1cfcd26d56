//! A gyro's error over time: each error with its u, the run, its steps, and what is out of the run.

use super::dates::dates;
use super::frame::{Frame, across, one, upwards};
use super::marks::{Mark, line, strokes};
use super::{named_ticks, reach};
use crate::angle::text::write::low_high;
use crate::review::{ErrorInTime, GyroDrawn};
use maud::{Markup, html};

const HEIGHT: f64 = 300.0;

/// The picture; `None` where no error has a time. `id` is one of a kind on the page, `of` says whose gyro it is.
pub fn gyro_errors(id: &str, of: &str, gyro: &GyroDrawn) -> Option<Markup> {
    let all = || gyro.repeaters.iter().flat_map(|r| r.errors.iter().chain(&r.out_of_run));
    let (from, to) = (all().map(|e| e.unix_ms).min()?, all().map(|e| e.unix_ms).max()?);
    let margin = ((to - from) / 60).max(60_000);
    let x = across((from - margin) as f64, (to + margin) as f64);
    // What is out of the run may be anywhere: it does not set the scale.
    let (low, high) = reach(gyro.repeaters.iter().flat_map(|r| &r.errors).map(|e| (e.error_deg, e.u_deg)), 1.5, 12.0);
    let y = upwards(low, high, HEIGHT);
    let place = |e: &ErrorInTime| (x.at(e.unix_ms as f64), y.at(e.error_deg.clamp(low, high)));
    let (mut whiskers, mut crosses, mut beyond) = (String::new(), String::new(), String::new());
    let mut points: Vec<(Mark, String)> = Vec::new();
    let mut runs: Vec<String> = Vec::new();
    for (repeater, mark) in gyro.repeaters.iter().zip(Mark::KINDS.iter().cycle()) {
        whiskers.push_str(&strokes(repeater.errors.iter().map(|e| {
            let edge = |deg: f64| y.at(deg.clamp(low, high));
            (x.at(e.unix_ms as f64), edge(e.error_deg - e.u_deg), edge(e.error_deg + e.u_deg))
        })));
        let mut path = String::new();
        for error in &repeater.errors {
            let (px, py) = place(error);
            if (low..=high).contains(&error.error_deg) { mark.push(&mut path, px, py) } else { edge(error, low).push(&mut beyond, px, py) }
        }
        points.push((*mark, path));
        for error in &repeater.out_of_run {
            let (px, py) = place(error);
            if (low..=high).contains(&error.error_deg) {
                Mark::Cross.push(&mut crosses, px, py);
            } else {
                edge(error, low).push(&mut beyond, px, py);
            }
        }
        let run = repeater.errors.iter().filter_map(|e| Some((x.at(e.unix_ms as f64), y.at(e.run_deg?.0.clamp(low, high)))));
        runs.push(line(run));
    }
    let inside = html! {
        path class="faint" d=(whiskers) stroke="#999" stroke-width="0.8" fill="none" {}
        g class="pen" stroke="#000" stroke-width="1.6" fill="none" {
            @for run in &runs { path d=(run) stroke-linejoin="round" {} }
        }
        @for (mark, path) in &points {
            @if mark.is_full() {
                path class="dot" d=(path) fill="#000" {}
            } @else {
                path class="open" d=(path) fill="#fff" stroke="#000" stroke-width="1" {}
            }
        }
        path class="odd" d=(crosses) stroke="#000" stroke-width="2" fill="none" {}
        path class="odd-open" d=(beyond) stroke="#000" stroke-width="1.4" fill="#fff" {}
        @for step in &gyro.steps {
            @let at = x.at(step.unix_ms as f64);
            path class="pen" d={ "M" (one(at)) ",34V" (one(HEIGHT - 46.0)) } stroke="#000" stroke-width="1.2" stroke-dasharray="2 4" fill="none" {}
            text class="ink" fill="#000" x=(one(if at > 560.0 { at - 5.0 } else { at + 5.0 })) y="45" text-anchor=(if at > 560.0 { "end" } else { "start" }) {
                "step " (low_high(step.by_deg))
            }
        }
    };
    let drawn: usize = gyro.repeaters.iter().map(|r| r.errors.len()).sum();
    let odd: usize = gyro.repeaters.iter().map(|r| r.out_of_run.len()).sum();
    let (first, last) = (day(from), day(to));
    let run = gyro.repeaters.iter().flat_map(|r| &r.errors).filter_map(|e| e.run_deg.map(|r| r.0));
    let run = run.fold(None, |range: Option<(f64, f64)>, r| Some(range.map_or((r, r), |(a, b)| (a.min(r), b.max(r)))));
    let run = run
        .map_or_else(|| "No run is established.".to_owned(), |(a, b)| format!("The run lies between {} and {}.", low_high(a), low_high(b)));
    let desc =
        format!("{drawn} errors within the run and {odd} out of it, from {first} to {last}. {run} {} in the run.", steps(gyro.steps.len()));
    let frame = Frame {
        id,
        title: &format!("Gyro error over time, {of}"),
        desc: &desc,
        height: HEIGHT,
        x,
        y,
        x_ticks: &dates(from - margin, to + margin),
        y_ticks: &named_ticks(low, high, "L", "H"),
        x_words: "UTC",
        y_words: "gyro error, degrees: L low (east), H high (west)",
    };
    Some(frame.draw(&html! {}, &inside))
}

fn steps(count: usize) -> String {
    match count {
        0 => "No step".to_owned(),
        1 => "One step".to_owned(),
        n => format!("{n} steps"),
    }
}

fn edge(error: &ErrorInTime, low: f64) -> Mark {
    if error.error_deg < low { Mark::Below } else { Mark::Above }
}

fn day(unix_ms: i64) -> String {
    chrono::DateTime::from_timestamp_millis(unix_ms).unwrap_or_default().format("%Y-%m-%d").to_string()
}

/// The key of the marks, in words.
pub fn key(gyro: &GyroDrawn) -> String {
    let named = |name: &str| if name.is_empty() { "no repeater named".to_owned() } else { name.to_owned() };
    if gyro.repeaters.len() < 2 {
        return "Points: errors".to_owned();
    }
    let kinds = gyro.repeaters.iter().zip(Mark::KINDS.iter().cycle());
    let list: Vec<String> = kinds.map(|(r, mark)| format!("{}: {}", mark.words(), named(r.repeater))).collect();
    list.join("; ")
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::review::{RepeaterDrawn, StepInRun};

    #[test]
    fn what_is_out_of_the_run_does_not_set_the_scale() {
        let error = |i: i64, error_deg: f64| ErrorInTime {
            number: i as u64,
            unix_ms: i * 3_600_000,
            error_deg,
            u_deg: 0.3,
            run_deg: Some((0.2, 0.3)),
        };
        let repeater = RepeaterDrawn {
            repeater: "",
            errors: (0..20).map(|i| error(i, 0.2)).collect(),
            out_of_run: vec![error(5, -150.0), error(6, 1.6)],
            counts: (22, 2),
            without_time: 0,
        };
        let steps = vec![StepInRun { unix_ms: 3_600_000 * 9, by_deg: -1.2, u_deg: 0.1 }];
        let svg = gyro_errors("g", "a vessel", &GyroDrawn { gyro: "", repeaters: vec![repeater], steps }).unwrap().into_string();
        assert!(svg.contains("step 1.2 H") && svg.contains("20 errors within the run and 2 out of it"), "{svg}");
        assert!(!svg.contains("NaN") && !svg.contains("-0.0"));
        // One beyond, at the lower edge; one cross.
        assert_eq!((svg.matches("m-5-5l5,9l5-9z").count(), svg.matches("m-4-4l8,8m-8,0l8-8").count()), (1, 1));
    }
}
