//! Every answer that the README shows is the answer that its command gives.

use std::process::Command;

/// Each shell block that is followed by a block of text.
fn shown(readme: &str) -> Vec<(&str, &str)> {
    let mut rest = readme;
    let mut found = Vec::new();
    while let Some((_, after)) = rest.split_once("```sh\n") {
        let Some((command, behind)) = after.split_once("```") else { break };
        if let Some(text) = behind.strip_prefix("\n\n```text\n") {
            found.push((command, text.split_once("```").unwrap().0));
        }
        rest = behind;
    }
    found
}

#[test]
fn the_readme_shows_what_is_answered() {
    let root = env!("CARGO_MANIFEST_DIR");
    let readme = std::fs::read_to_string(format!("{root}/README.md")).unwrap();
    let folder = tempfile::tempdir().unwrap();
    let program = std::path::Path::new(env!("CARGO_BIN_EXE_shadowpin")).parent().unwrap();
    let path = format!("{}:{}", program.display(), std::env::var("PATH").unwrap());
    let shown = shown(&readme);
    assert!(shown.len() >= 4, "only {} answers in the README", shown.len());
    for (command, answer) in shown {
        // What it writes goes to a folder that is thrown away.
        let mut line = command.to_owned();
        for file in ["reviewed.csv", "summary.json", "run_up.svg"] {
            line = line.replace(&format!(" {file}"), &format!(" {}/{file}", folder.path().display()));
        }
        let ran = Command::new("sh").args(["-c", &line]).current_dir(root).env("PATH", &path).env("NO_COLOR", "1").output().unwrap();
        // Rows and a summary for a person go different ways.
        let found = if ran.stdout.is_empty() { ran.stderr } else { ran.stdout };
        assert_eq!(String::from_utf8_lossy(&found), answer, "{command}");
    }
}
