//! Lists, completions, pages of the manual, and the help of every command.

use super::shadowpin;

/// Every command that the program has, by its own help.
fn commands() -> Vec<String> {
    let help = shadowpin(&["--help"], b"").out;
    let list = help.split("Commands:").nth(1).unwrap().split("\n\n").next().unwrap().to_owned();
    let name = |line: &str| line.strip_prefix("  ").and_then(|l| l.split_whitespace().next()).map(str::to_owned);
    list.lines().filter(|line| !line.starts_with("   ")).filter_map(name).filter(|name| name != "help").collect()
}

#[test]
fn every_command_has_help_with_an_example_that_names_it() {
    let all = commands();
    assert!(all.len() >= 13, "{all:?}");
    for command in &all {
        let ran = shadowpin(&[command, "--help"], b"");
        assert_eq!(ran.code, Some(0));
        let flat = ran.out.split_whitespace().collect::<Vec<_>>().join(" ");
        assert!(flat.contains("Example") && flat.contains(&format!("shadowpin {command}")), "{command}: {}", ran.out);
    }
}

#[test]
fn lists_in_every_form() {
    for list in ["columns", "queries", "limits"] {
        let csv = shadowpin(&[list, "--format", "csv"], b"").out;
        let json: Vec<serde_json::Value> = serde_json::from_str(&shadowpin(&[list, "--format", "json"], b"").out).unwrap();
        assert_eq!(csv::Reader::from_reader(csv.as_bytes()).records().map(Result::unwrap).count(), json.len(), "{list}");
        assert!(shadowpin(&[list], b"").out.lines().count() > json.len());
    }
    // The limits in force, not those built in.
    let folder = tempfile::tempdir().unwrap();
    let limits = folder.path().join("limits.toml");
    std::fs::write(&limits, "[limits]\ntoo_high = 66.5\n").unwrap();
    assert!(shadowpin(&["queries", "--limits", limits.to_str().unwrap()], b"").out.contains("too_high = 66.5 degrees"));
}

#[test]
fn completions_and_pages_name_every_command() {
    let all = commands();
    for shell in ["bash", "zsh", "fish", "powershell", "elvish"] {
        let script = shadowpin(&["completions", shell], b"");
        assert_eq!(script.code, Some(0));
        assert!(all.iter().all(|command| script.out.contains(command.as_str())), "{shell}");
    }
    let folder = tempfile::tempdir().unwrap();
    assert_eq!(shadowpin(&["man", folder.path().to_str().unwrap()], b"").code, Some(0));
    for command in &all {
        let page = std::fs::read_to_string(folder.path().join(format!("shadowpin-{command}.1"))).unwrap();
        assert!(page.contains(".SH SYNOPSIS") && page.contains("Example"), "{command}");
    }
    assert_eq!(shadowpin(&["man", "no/such/folder"], b"").code, Some(2));
}
