//! A strict little reader of our own pages: what a page may hold, and that its parts belong together.

use std::collections::BTreeSet;

/// Elements that our pages are made of; nothing else may appear, whatever a log says.
const KNOWN: [&str; 46] = [
    "a",
    "article",
    "bdi",
    "body",
    "br",
    "caption",
    "code",
    "dd",
    "desc",
    "details",
    "div",
    "dl",
    "dt",
    "figcaption",
    "figure",
    "footer",
    "g",
    "h1",
    "h2",
    "h3",
    "h4",
    "head",
    "html",
    "li",
    "line",
    "main",
    "meta",
    "nav",
    "p",
    "path",
    "circle",
    "pre",
    "q",
    "rect",
    "section",
    "span",
    "strong",
    "style",
    "summary",
    "svg",
    "table",
    "tbody",
    "td",
    "text",
    "th",
    "title",
];
const ALSO: [&str; 3] = ["thead", "tr", "ul"];
const VOID: [&str; 2] = ["meta", "br"];

/// One start tag.
struct Tag {
    name: String,
    attributes: Vec<(String, String)>,
}

impl Tag {
    fn get(&self, name: &str) -> Option<&str> {
        self.attributes.iter().find(|(n, _)| n == name).map(|(_, v)| v.as_str())
    }
}

/// Reads what stands between `<` and `>`: quotes are closed before the tag is.
fn start_tag(rest: &str) -> (Tag, usize) {
    let name: String = rest.chars().take_while(char::is_ascii_alphanumeric).collect();
    let mut chars = rest.char_indices().skip(name.len()).peekable();
    let mut attributes = Vec::new();
    while let Some((at, c)) = chars.next() {
        match c {
            '>' => return (Tag { name, attributes }, at + 1),
            ' ' => {}
            first => {
                let mut key = first.to_string();
                while let Some((_, c)) = chars.next_if(|(_, c)| !matches!(c, '=' | ' ' | '>')) {
                    key.push(c);
                }
                let mut value = String::new();
                if chars.next_if(|(_, c)| *c == '=').is_some() {
                    assert_eq!(chars.next().map(|c| c.1), Some('"'), "a value without quotes: {key}");
                    while let Some((_, c)) = chars.next_if(|(_, c)| *c != '"') {
                        value.push(c);
                    }
                    chars.next();
                }
                attributes.push((key, value));
            }
        }
    }
    panic!("a tag without an end: {name}");
}

/// Fails where a page could run or fetch something, is not well formed, or cannot be read aloud; answers the ids of its rows in order.
pub fn sound(page: &str) -> Vec<u64> {
    assert!(page.starts_with("<!DOCTYPE html><html lang=\"en\">"));
    let lower = page.to_ascii_lowercase();
    for never in ["<script", "http:", "https:", "url(", "@import", "javascript:"] {
        assert!(!lower.contains(never), "the page holds {never}");
    }
    assert!(!page.contains("NaN") && !page.contains("-0.0,") && !page.contains(">-0.0<"));
    let mut tags = Vec::new();
    let mut open: Vec<String> = Vec::new();
    let mut rest = page.strip_prefix("<!DOCTYPE html>").unwrap();
    while let Some(at) = rest.find('<') {
        rest = &rest[at + 1..];
        if let Some(end) = rest.strip_prefix('/') {
            let name = &end[..end.find('>').unwrap()];
            assert_eq!(open.pop().as_deref(), Some(name), "closed out of order");
            continue;
        }
        let (tag, length) = start_tag(rest);
        assert!(KNOWN.contains(&tag.name.as_str()) || ALSO.contains(&tag.name.as_str()), "an element of another kind: {}", tag.name);
        rest = &rest[length..];
        if tag.name == "style" {
            rest = &rest[rest.find("</style>").unwrap()..];
        }
        if !VOID.contains(&tag.name.as_str()) {
            open.push(tag.name.clone());
        }
        tags.push(tag);
    }
    assert!(open.is_empty(), "left open: {open:?}");
    let mut ids = BTreeSet::new();
    for tag in &tags {
        for (name, _) in &tag.attributes {
            assert!(!name.starts_with("on") && name != "src" && name != "style", "attribute {name}");
        }
        if let Some(id) = tag.get("id") {
            assert!(!id.is_empty() && ids.insert(id), "id {id} twice");
        }
    }
    for (i, tag) in tags.iter().enumerate() {
        if let Some(href) = tag.get("href") {
            assert!(href.strip_prefix('#').is_some_and(|id| ids.contains(id)), "link {href}");
        }
        if let Some(names) = tag.get("aria-labelledby") {
            assert!(names.split(' ').all(|id| ids.contains(id)), "named by {names}");
        }
        if tag.name == "svg" {
            assert_eq!(tag.get("role"), Some("img"));
            assert!(tag.get("aria-labelledby").is_some() && tags[i + 1].name == "title" && tags[i + 2].name == "desc");
        }
    }
    let rows = tags.iter().filter(|t| t.name == "article").filter_map(|t| t.get("id")?.strip_prefix("row-")?.parse().ok());
    rows.collect()
}
