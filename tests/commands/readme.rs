//! Every answer that the README shows is the answer that its command gives.

use std::process::Command;

/// Each shell block, and the block of text that follows it, where one does.
fn shown(readme: &str) -> Vec<(&str, Option<&str>)> {
    let mut rest = readme;
    let mut found = Vec::new();
    while let Some((_, after)) = rest.split_once("```sh\n") {
        let Some((command, behind)) = after.split_once("```") else { break };
        let text = behind.strip_prefix("\n\n```text\n").map(|text| text.split_once("```").unwrap().0);
        found.push((command, text));
        rest = behind;
    }
    found
}

/// What is not run here: setting up, the tests themselves, and the page, which ends with Ctrl-C and has tests of its own.
const ELSEWHERE: [&str; 3] = ["rustup ", "cargo test", "shadowpin page "];

#[test]
fn the_readme_shows_what_is_answered() {
    let root = env!("CARGO_MANIFEST_DIR");
    let readme = std::fs::read_to_string(format!("{root}/README.md")).unwrap();
    let folder = tempfile::tempdir().unwrap();
    let program = std::path::Path::new(env!("CARGO_BIN_EXE_shadowpin")).parent().unwrap();
    let path = format!("{}:{}", program.display(), std::env::var("PATH").unwrap());
    let shown = shown(&readme);
    let answers = shown.iter().filter(|(_, answer)| answer.is_some()).count();
    assert!(answers >= 6 && shown.len() >= answers + 4, "{answers} answers in {} blocks", shown.len());
    for (command, answer) in shown {
        if ELSEWHERE.iter().any(|part| command.contains(part)) {
            continue;
        }
        // What it writes goes to a folder that is thrown away.
        let mut line = command.to_owned();
        for file in ["reviewed.csv", "summary.json", "run_up.svg", "book.csv", "june.html"] {
            line = line.replace(&format!(" {file}"), &format!(" {}/{file}", folder.path().display()));
        }
        let ran = Command::new("sh").args(["-c", &line]).current_dir(root).env("PATH", &path).env("NO_COLOR", "1").output().unwrap();
        let said = String::from_utf8_lossy(&ran.stderr).into_owned();
        assert!(!said.contains("shadowpin: ") && !said.contains("error: "), "{command}{said}");
        let Some(answer) = answer else { continue };
        // Rows and a summary for a person go different ways.
        let found = if ran.stdout.is_empty() { ran.stderr } else { ran.stdout };
        assert_eq!(String::from_utf8_lossy(&found), answer, "{command}");
    }
}
