//! What is answered: three files and five questions, nothing else.

use super::desk::Desk;
use super::guard::{self, Head};
use super::reply::{Reply, json, refuse, reply};
use http_body_util::BodyExt;
use hyper::body::{Body, Incoming};
use hyper::{Method, Request, StatusCode};
use serde_json::{Value, json};
use shadowpin::time::UtcInstant;
use shadowpin::time::text::write::iso;
use shadowpin::watch;
use std::sync::Arc;

const INDEX: &str = include_str!("files/index.html");
const STYLE: &str = include_str!("files/page.css");
const SCRIPT: &str = include_str!("files/page.js");

/// The longest body, bytes: a hundred entries of a session.
const LARGEST_BODY: usize = 64 * 1024;
/// As much of one that is too long is read away, so that its sender hears why.
const READ_AWAY: usize = 16 * LARGEST_BODY;

/// Answers a request.
pub async fn answer(request: Request<Incoming>, desk: Arc<Desk>) -> Reply {
    let head = Head { method: request.method(), uri: request.uri(), headers: request.headers() };
    let admitted = guard::admit(head, &desk.address).map(str::to_owned);
    let method = request.method().clone();
    let refused = match admitted {
        Ok(path) if method == Method::GET => match get(&path, &desk) {
            Some(reply) => return reply,
            None if ["answer", "add"].contains(&path.as_str()) => (StatusCode::METHOD_NOT_ALLOWED, "that is asked by POST"),
            None => (StatusCode::NOT_FOUND, "there is nothing there"),
        },
        Ok(path) if method == Method::POST => match path.as_str() {
            "answer" | "add" => return post(path, request, desk).await,
            _ => (StatusCode::NOT_FOUND, "there is nothing there"),
        },
        Ok(_) => (StatusCode::METHOD_NOT_ALLOWED, "GET or POST"),
        Err(refused) => refused,
    };
    read_away(request.into_body()).await;
    refuse(refused.0, refused.1)
}

fn get(path: &str, desk: &Desk) -> Option<Reply> {
    let file = |kind, text: &'static str| reply(StatusCode::OK, kind, text);
    Some(match path {
        "" if desk.night => reply(StatusCode::OK, "text/html; charset=utf-8", INDEX.replacen("class=\"day\"", "class=\"night\"", 1)),
        "" => file("text/html; charset=utf-8", INDEX),
        "page.css" => file("text/css; charset=utf-8", STYLE),
        "page.js" => file("text/javascript; charset=utf-8", SCRIPT),
        "start" => json(StatusCode::OK, &start(desk)),
        "clock" => json(StatusCode::OK, &clock()),
        "nmea" => json(StatusCode::OK, &desk.heard.as_ref().map_or(Value::Null, |heard| heard())),
        _ => return None,
    })
}

/// What the page is told when it opens.
fn start(desk: &Desk) -> Value {
    let book = desk.record().map(|record| record.name());
    json!({"bodies": watch::bodies(), "book": book, "card": desk.card_name, "nmea": desk.heard.is_some(), "given": desk.given})
}

/// The time, and whose it is.
fn clock() -> Value {
    let now = UtcInstant::from_unix_ms(chrono::Utc::now().timestamp_millis()).ok().map(iso);
    json!({"utc": now, "from": "this computer's clock"})
}

async fn post(path: String, request: Request<Incoming>, desk: Arc<Desk>) -> Reply {
    let Some(bytes) = body(request.into_body()).await else {
        return refuse(StatusCode::PAYLOAD_TOO_LARGE, "the request is too long");
    };
    let asked: Value = match serde_json::from_slice(&bytes) {
        Ok(asked) => asked,
        Err(why) => return refuse(StatusCode::BAD_REQUEST, &format!("no JSON: {why}")),
    };
    // Computing and writing would keep the other connections waiting.
    let done = tokio::task::spawn_blocking(move || if path == "add" { add(&asked, &desk) } else { work(&asked, &desk) }).await;
    done.unwrap_or_else(|_| refuse(StatusCode::INTERNAL_SERVER_ERROR, "that could not be worked; nothing was entered"))
}

/// The library's one answer.
fn work(asked: &Value, desk: &Desk) -> Reply {
    // A book that cannot be read now does not keep the officer from working a bearing.
    let (before, unread) = match desk.record().map(|mut record| record.before(&desk.limits)) {
        Some(Ok(before)) => (before, None),
        Some(Err(why)) => (Arc::from([]), Some(why.to_string())),
        None => (Arc::from([]), None),
    };
    let ship = watch::Ship { limits: &desk.limits, cards: desk.cards.as_ref(), card_as_given: desk.card_as_given, before: &before };
    match watch::answer(asked, &ship) {
        Ok(mut answer) => {
            if let (Some(why), Value::Object(members)) = (unread, &mut answer) {
                members.insert("book_unread".to_owned(), why.into());
            }
            json(StatusCode::OK, &answer)
        }
        Err(bad) => refuse(StatusCode::BAD_REQUEST, &bad.to_string()),
    }
}

/// An entry in the book.
fn add(asked: &Value, desk: &Desk) -> Reply {
    let Some(mut record) = desk.record() else {
        return refuse(StatusCode::CONFLICT, "no book was given: start the page with --book FILE");
    };
    let typed = match watch::Typed::of(asked.get("cells").unwrap_or(&Value::Null)) {
        Ok(typed) => typed,
        Err(bad) => return refuse(StatusCode::BAD_REQUEST, &bad.to_string()),
    };
    match record.add(&typed, &desk.limits) {
        Ok(Ok(added)) => json(StatusCode::OK, &json!({"entry": added.entry, "seal": added.seal.to_string(), "found": added.found})),
        Ok(Err(faults)) => json(StatusCode::UNPROCESSABLE_ENTITY, &json!({ "faults": faults })),
        Err(why) => refuse(StatusCode::INTERNAL_SERVER_ERROR, &why.to_string()),
    }
}

/// The whole body; `None` for one that is too long or is broken off.
async fn body(mut body: Incoming) -> Option<Vec<u8>> {
    if body.size_hint().lower() > LARGEST_BODY as u64 {
        read_away(body).await;
        return None;
    }
    let mut bytes = Vec::new();
    while let Some(frame) = body.frame().await {
        let Ok(data) = frame.ok()?.into_data() else { continue };
        if bytes.len() + data.len() > LARGEST_BODY {
            read_away(body).await;
            return None;
        }
        bytes.extend_from_slice(&data);
    }
    Some(bytes)
}

async fn read_away(mut body: Incoming) {
    let mut gone = 0;
    while let Some(Ok(frame)) = body.frame().await {
        gone += frame.data_ref().map_or(0, |data| data.len());
        if gone > READ_AWAY {
            return;
        }
    }
}
