//! The README's examples are run: each `$ haloshed ...` in a console block, with its output.

use std::path::{Path, PathBuf};
use std::process::Command;

fn readme() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("README.md")
}

/// The words of a command as a shell would see them; double quotes only.
fn words(line: &str) -> Vec<String> {
    let mut words = Vec::new();
    for (index, part) in line.split('"').enumerate() {
        match index % 2 {
            1 => words.push(part.to_owned()),
            _ => words.extend(part.split_whitespace().map(str::to_owned)),
        }
    }
    words
}

fn output_of(line: &str) -> String {
    let words = words(line);
    assert_eq!(words[0], "haloshed", "{line}");
    let done = Command::new(assert_cmd::cargo::cargo_bin!("haloshed")).args(&words[1..]).output().unwrap();
    assert!(done.status.success(), "{line}: {}", String::from_utf8_lossy(&done.stderr));
    String::from_utf8(done.stdout).unwrap()
}

/// The text with what the commands print put below them.
fn with_outputs(text: &str) -> String {
    let mut out = String::new();
    let mut in_console = false;
    for line in text.lines() {
        if line.starts_with("```") {
            in_console = line == "```console";
        } else if in_console && !line.starts_with("$ ") {
            continue;
        }
        out.push_str(line);
        out.push('\n');
        if let (true, Some(command)) = (in_console, line.strip_prefix("$ ")) {
            out.push_str(output_of(command).trim_end());
            out.push('\n');
        }
    }
    out
}

#[test]
#[allow(clippy::disallowed_methods, reason = "keeping rewrites the examples in place")]
fn examples_print_what_the_readme_shows() {
    let text = std::fs::read_to_string(readme()).unwrap();
    let run = with_outputs(&text);
    if std::env::var_os("HALOSHED_KEEP").is_some() {
        std::fs::write(readme(), run).unwrap();
        return;
    }
    assert!(text == run, "README.md is out of step: HALOSHED_KEEP=1 cargo test readme, and read the difference");
}
