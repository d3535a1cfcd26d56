//! Reports as one HTML file: no script, nothing fetched, legible on paper and read aloud.
//!
//! All that comes from a log or an option goes through maud, which escapes it; names of unknown script are kept from turning the
//! text around them.

mod cautions;
mod review;
mod settle;
mod swing;

pub use review::ReviewPage;
pub use settle::settle;
pub use swing::swing;

use maud::{DOCTYPE, Markup, PreEscaped, html};

const STYLE: &str = include_str!("style.css");
/// Nothing may run and nothing may be fetched, even if a reader's own program would.
const POLICY: &str = "default-src 'none'; style-src 'unsafe-inline'; base-uri 'none'; form-action 'none'";
/// Letters of a value that are shown.
const LONGEST: usize = 300;

/// A whole page.
fn document(title: &str, body: &Markup) -> String {
    let page = html! {
        (DOCTYPE)
        html lang="en" {
            head {
                meta charset="utf-8";
                meta http-equiv="Content-Security-Policy" content=(POLICY);
                meta name="viewport" content="width=device-width, initial-scale=1";
                meta name="color-scheme" content="light dark";
                title { (shown(title)) }
                style { (PreEscaped(STYLE)) }
            }
            body {
                main { (body) }
                (cautions::cautions())
                p class="soft small" { "Made by shadowpin " (env!("CARGO_PKG_VERSION")) " from what is named above, and from nothing else." }
            }
        }
    };
    page.into_string() + "\n"
}

/// A value as it is shown: without characters that no page may hold, and not endless.
fn shown(text: &str) -> String {
    let mut clean: String = text.chars().take(LONGEST).map(|c| if c.is_control() { '\u{fffd}' } else { c }).collect();
    if text.chars().nth(LONGEST).is_some() {
        clean.push('\u{2026}');
    }
    clean
}

/// A sentence of ours, which may hold such values and may be longer than one.
fn sentence(text: &str) -> String {
    text.chars().map(|c| if c.is_control() { '\u{fffd}' } else { c }).collect()
}

/// A name from a log, which may be of any script.
fn named(text: &str) -> Markup {
    html! { bdi { (shown(text)) } }
}

/// A picture with its caption, and the same as a table.
fn figure(picture: &Markup, caption: &Markup, table: &Markup) -> Markup {
    html! {
        figure {
            div class="wide" { (picture) }
            figcaption { (caption) }
            details { summary { "The same as a table" } div class="wide" { (table) } }
        }
    }
}

/// `1 row`, `2 rows`.
fn counted(n: u64, one: &str, many: &str) -> String {
    format!("{n} {}", if n == 1 { one } else { many })
}

/// An uncertainty to the decimals that it is worth.
fn u(u_deg: f64) -> String {
    if u_deg < 0.095 { format!("{u_deg:.2}") } else { format!("{u_deg:.1}") }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_value_is_text_and_ends() {
        let page = document("<script>", &html! { (named("\"><svg onload=x>\u{0}\u{202e}")) });
        assert!(page.contains("<title>&lt;script&gt;</title>"));
        assert!(page.contains("<bdi>&quot;&gt;&lt;svg onload=x&gt;\u{fffd}\u{202e}</bdi>"), "{page}");
        assert_eq!(shown(&"x".repeat(400)).chars().count(), 301);
    }
}
