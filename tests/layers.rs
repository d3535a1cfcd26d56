//! Each layer uses only those above it.

use std::path::{Path, PathBuf};

/// From the top down; the same list as in the crate's documentation.
const LAYERS: [&str; 14] =
    ["error", "notice", "angle", "time", "sky", "horizon", "limits", "compass", "plan", "logbook", "review", "report", "watch", "book"];

fn rust_files(folder: &Path, found: &mut Vec<PathBuf>) {
    for entry in std::fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        if path.is_dir() {
            rust_files(&path, found);
        } else if path.extension().is_some_and(|e| e == "rs") {
            found.push(path);
        }
    }
}

/// The names that follow each `crate::` in `text`, one level of braces included.
fn used_modules(text: &str) -> Vec<String> {
    let mut used = Vec::new();
    for (at, _) in text.match_indices("crate::") {
        let rest = &text[at + "crate::".len()..];
        let list = if let Some(inner) = rest.strip_prefix('{') { &inner[..inner.find('}').unwrap_or(inner.len())] } else { rest };
        let items: Vec<&str> = if rest.starts_with('{') { list.split(',').collect() } else { vec![list] };
        for item in items {
            let name: String = item.trim().chars().take_while(|c| c.is_ascii_lowercase() || *c == '_').collect();
            used.push(name);
        }
    }
    used
}

fn layer_of(src: &Path, file: &Path) -> String {
    let first = file.strip_prefix(src).unwrap().components().next().unwrap();
    first.as_os_str().to_string_lossy().trim_end_matches(".rs").to_owned()
}

#[test]
fn each_layer_uses_only_those_above_it() {
    let src = Path::new(env!("CARGO_MANIFEST_DIR")).join("src");
    let mut files = Vec::new();
    rust_files(&src, &mut files);
    let mut wrong = Vec::new();
    let mut seen = 0;
    for file in &files {
        let layer = layer_of(&src, file);
        let text = std::fs::read_to_string(file).unwrap();
        let code: String = text.lines().filter(|l| !l.trim_start().starts_with("//")).collect::<Vec<_>>().join("\n");
        let Some(rank) = LAYERS.iter().position(|l| *l == layer) else {
            // The binary's own modules are clients of the library and may use all of it.
            assert!(["lib", "main", "cli", "page"].contains(&layer.as_str()), "{} belongs to no layer", file.display());
            continue;
        };
        for used in used_modules(&code) {
            let Some(used_rank) = LAYERS.iter().position(|l| *l == used) else { continue };
            seen += 1;
            if used_rank > rank {
                wrong.push(format!("{} uses {used}", file.display()));
            }
        }
        for forbidden in ["println!", "eprintln!", "Utc::now", "SystemTime::now", "std::env::"] {
            // A unit test may print what it measures.
            let shipped = code.split("#[cfg(test)]").next().unwrap_or_default();
            if shipped.contains(forbidden) {
                wrong.push(format!("{} holds {forbidden}", file.display()));
            }
        }
    }
    assert!(seen > 0, "the test found no use of a layer at all: it is broken");
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn the_reading_of_used_modules_sees_both_forms() {
    assert_eq!(used_modules("use crate::angle::X; use crate::{time::Zone, sky};"), ["angle", "time", "sky"]);
}
