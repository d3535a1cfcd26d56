//! Who is answered: the page itself, opened from the printed address, and nobody else.
//!
//! Loopback is open to every user of the machine and, through a browser, to every site that is open in it. So the Host must be the one that
//! was printed (a foreign name that resolves to this machine has another), whatever names an Origin must name this one, a write must name
//! it, and every path begins with a token that only the one who started the program has seen.

use super::Address;
use hyper::header::{self, HeaderMap, HeaderName};
use hyper::{Method, StatusCode, Uri};

/// A refusal: its status and why.
pub type Refused = (StatusCode, &'static str);

/// The head of a request.
#[derive(Debug, Clone, Copy)]
pub struct Head<'r> {
    pub method: &'r Method,
    pub uri: &'r Uri,
    pub headers: &'r HeaderMap,
}

/// The path behind the token, where the request may be answered.
pub fn admit<'r>(head: Head<'r>, address: &Address) -> Result<&'r str, Refused> {
    let Head { method, uri, headers } = head;
    if uri.authority().is_some() || uri.query().is_some() {
        return Err((StatusCode::BAD_REQUEST, "a path alone is expected"));
    }
    if only(headers, header::HOST)? != Some(address.host.as_str()) {
        return Err((StatusCode::FORBIDDEN, "another host's name: open the address that was printed"));
    }
    let origin = only(headers, header::ORIGIN)?;
    if origin.is_some_and(|origin| origin != address.origin) {
        return Err((StatusCode::FORBIDDEN, "another origin"));
    }
    let site = only(headers, HeaderName::from_static("sec-fetch-site"))?;
    if site.is_some_and(|site| site != "same-origin" && site != "none") {
        return Err((StatusCode::FORBIDDEN, "asked for by another site"));
    }
    let (token, path) = uri.path().strip_prefix('/').and_then(|rest| rest.split_once('/')).unwrap_or_default();
    if !alike(token, &address.token) {
        return Err((StatusCode::FORBIDDEN, "no such address: open the one that was printed"));
    }
    if method == Method::POST {
        if origin.is_none() {
            return Err((StatusCode::FORBIDDEN, "a write names its origin"));
        }
        if !only(headers, header::CONTENT_TYPE)?.is_some_and(|kind| kind.eq_ignore_ascii_case("application/json")) {
            return Err((StatusCode::UNSUPPORTED_MEDIA_TYPE, "a write is application/json"));
        }
    }
    Ok(path)
}

/// The value of a header that must not be there twice.
fn only(headers: &HeaderMap, name: HeaderName) -> Result<Option<&str>, Refused> {
    let mut values = headers.get_all(name).iter();
    let first = values.next().map(hyper::header::HeaderValue::to_str).transpose();
    match (first, values.next()) {
        (Ok(value), None) => Ok(value),
        _ => Err((StatusCode::BAD_REQUEST, "a header that cannot be read, or twice")),
    }
}

/// Equality that takes the same time wherever they differ.
fn alike(a: &str, b: &str) -> bool {
    a.len() == b.len() && a.bytes().zip(b.bytes()).fold(0, |differ, (a, b)| differ | (a ^ b)) == 0
}

#[cfg(test)]
mod tests {
    use super::*;

    fn admitted(method: &Method, path: &str, headers: &[(&'static str, &'static str)]) -> Result<String, u16> {
        let address = Address { host: "127.0.0.1:4000".into(), origin: "http://127.0.0.1:4000".into(), token: "abc".into() };
        let uri: Uri = path.parse().unwrap();
        let mut map = HeaderMap::new();
        for (name, value) in headers {
            map.append(*name, value.parse().unwrap());
        }
        admit(Head { method, uri: &uri, headers: &map }, &address).map(str::to_owned).map_err(|(status, _)| status.as_u16())
    }

    #[test]
    fn who_is_answered() {
        let host = ("host", "127.0.0.1:4000");
        let origin = ("origin", "http://127.0.0.1:4000");
        let json = ("content-type", "application/json");
        let get = |path: &str, headers: &[_]| admitted(&Method::GET, path, headers);
        let post = |headers: &[_]| admitted(&Method::POST, "/abc/add", headers);
        assert_eq!(get("/abc/", &[host]), Ok(String::new()));
        assert_eq!(get("/abc/page.css", &[host, ("sec-fetch-site", "same-origin")]), Ok("page.css".into()));
        for (path, headers) in [
            ("/abc/", &[][..]),
            ("/abc/", &[("host", "localhost:4000")]),
            ("/abc/", &[("host", "127.0.0.1:4000.example")]),
            ("/abc/", &[("host", "127.0.0.1")]),
            ("/abd/", &[host]),
            ("/ab/", &[host]),
            ("/abcd/", &[host]),
            ("/", &[host]),
            ("/abc", &[host]),
            ("/abc/", &[host, ("origin", "null")]),
            ("/abc/", &[host, ("origin", "http://127.0.0.1:4001")]),
            ("/abc/", &[host, ("sec-fetch-site", "cross-site")]),
            ("/abc/", &[host, ("sec-fetch-site", "same-site")]),
        ] {
            assert_eq!(get(path, headers), Err(403), "{path} {headers:?}");
        }
        assert_eq!(get("/abc/", &[host, host]), Err(400));
        assert_eq!(get("/abc/?x", &[host]), Err(400));
        assert_eq!(get("http://127.0.0.1:4000/abc/", &[host]), Err(400));
        assert_eq!(post(&[host, origin, json]), Ok("add".into()));
        assert_eq!(post(&[host, json]), Err(403));
        assert_eq!(post(&[host, origin]), Err(415));
        assert_eq!(post(&[host, origin, ("content-type", "text/plain")]), Err(415));
        assert_eq!(post(&[host, origin, ("content-type", "text/plain; application/json")]), Err(415));
    }
}
