//! The program as its users run it.

mod csv;
mod manual;
mod materials;
mod modes;
mod new;
mod schema;
mod sweep;
mod tolerance;

use std::io::Write;
use std::process::{Command, Output, Stdio};

/// What a run had to say.
struct Said {
    out: String,
    err: String,
    status: Option<i32>,
}

fn run(words: &[&str]) -> Said {
    run_with(words, "")
}

/// Runs the program with a text on its standard input.
fn run_with(words: &[&str], typed: &str) -> Said {
    let mut child = Command::new(env!("CARGO_BIN_EXE_modewright"))
        .args(words)
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    child
        .stdin
        .take()
        .unwrap()
        .write_all(typed.as_bytes())
        .unwrap();
    let Output {
        status,
        stdout,
        stderr,
    } = child.wait_with_output().unwrap();
    Said {
        out: String::from_utf8(stdout).unwrap(),
        err: String::from_utf8(stderr).unwrap(),
        status: status.code(),
    }
}

/// The output of a run that must go well.
fn fine(words: &[&str]) -> String {
    let said = run(words);
    assert_eq!(said.status, Some(0), "{words:?}: {}", said.err);
    assert_eq!(said.err, "");
    said.out
}

/// The message of a run whose input is wrong.
fn wrong(words: &[&str]) -> String {
    let said = run(words);
    assert_eq!(said.status, Some(2), "{words:?}: {}", said.out);
    assert_eq!(said.out, "");
    said.err
}

fn fits_80_columns(text: &str) {
    for line in text.lines() {
        assert!(line.chars().count() <= 80, "{line}");
    }
}

#[test]
fn every_help_fits_80_columns_and_shows_an_example() {
    fits_80_columns(&fine(&["--help"]));
    for command in [
        "check",
        "sweep",
        "materials",
        "tolerance",
        "modes",
        "new",
        "schema",
        "completions",
        "manual",
    ] {
        let help = fine(&[command, "--help"]);
        assert!(help.contains(&format!("  modewright {command}")), "{help}");
        let is_example = |line: &&str| line.starts_with("  modewright");
        for line in help.lines().filter(|line| !is_example(line)) {
            fits_80_columns(line);
        }
    }
}
