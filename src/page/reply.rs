//! Answers, each with the headers that keep a browser from doing more than it should.

use http_body_util::Full;
use hyper::body::Bytes;
use hyper::header::{self, HeaderName, HeaderValue};
use hyper::{Response, StatusCode};
use serde_json::Value;

/// An answer.
pub type Reply = Response<Full<Bytes>>;

/// Nothing from elsewhere, no script or style but the page's own files, in no frame.
const POLICY: &str = "default-src 'none'; script-src 'self'; style-src 'self'; connect-src 'self'; img-src 'self' data:; \
form-action 'none'; base-uri 'none'; frame-ancestors 'none'";

const HEADERS: [(HeaderName, &str); 6] = [
    (header::CONTENT_SECURITY_POLICY, POLICY),
    (header::X_CONTENT_TYPE_OPTIONS, "nosniff"),
    (header::REFERRER_POLICY, "no-referrer"),
    (header::CACHE_CONTROL, "no-store"),
    (HeaderName::from_static("cross-origin-resource-policy"), "same-origin"),
    (HeaderName::from_static("cross-origin-opener-policy"), "same-origin"),
];

/// Bytes of a kind.
pub fn reply(status: StatusCode, kind: &'static str, body: impl Into<Bytes>) -> Reply {
    let mut reply = Response::new(Full::new(body.into()));
    *reply.status_mut() = status;
    let headers = reply.headers_mut();
    headers.insert(header::CONTENT_TYPE, HeaderValue::from_static(kind));
    for (name, value) in HEADERS {
        headers.insert(name, HeaderValue::from_static(value));
    }
    reply
}

/// A refusal in a few words.
pub fn refuse(status: StatusCode, why: &str) -> Reply {
    reply(status, "text/plain; charset=utf-8", format!("{why}\n"))
}

/// JSON.
pub fn json(status: StatusCode, value: &Value) -> Reply {
    reply(status, "application/json", value.to_string())
}
