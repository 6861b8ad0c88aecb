//! `--plot`: a whole picture, or none and the reason.

use std::path::Path;
use std::process::{Command, Output};

use crate::cavities;

/// Runs `check` on a cavity in an empty folder.
fn check(folder: &Path, text: &str, arguments: &[&str]) -> Output {
    std::fs::write(folder.join("cavity.toml"), text).unwrap();
    Command::new(env!("CARGO_BIN_EXE_modewright"))
        .current_dir(folder)
        .args(["check", "cavity.toml"])
        .args(arguments)
        .output()
        .unwrap()
}

fn files(folder: &Path) -> Vec<String> {
    let mut names: Vec<String> = std::fs::read_dir(folder)
        .unwrap()
        .map(|entry| entry.unwrap().file_name().into_string().unwrap())
        .collect();
    names.sort();
    names
}

#[test]
fn a_picture_beside_text_and_json() {
    let folder = tempfile::tempdir().unwrap();
    let plain = check(folder.path(), &cavities::two(), &["--json"]);
    let output = check(
        folder.path(),
        &cavities::two(),
        &["--json", "--plot", "beam.svg"],
    );
    assert_eq!(output.status.code(), Some(0));
    assert_eq!(output.stdout, plain.stdout);
    let output = check(folder.path(), &cavities::two(), &["--plot", "beam.PNG"]);
    assert!(output.stdout.starts_with(b"Two mirrors"));
    assert_eq!(
        files(folder.path()),
        ["beam.PNG", "beam.svg", "cavity.toml"]
    );
}

#[test]
fn an_unstable_cavity_is_drawn_and_exits_with_no() {
    let folder = tempfile::tempdir().unwrap();
    let output = check(folder.path(), &cavities::no_plane(), &["--plot", "a.svg"]);
    assert_eq!(output.status.code(), Some(1));
    assert_eq!(files(folder.path()), ["a.svg", "cavity.toml"]);
}

#[test]
fn what_cannot_be_written_is_refused_and_leaves_nothing() {
    let folder = tempfile::tempdir().unwrap();
    std::fs::create_dir(folder.path().join("folder.svg")).unwrap();
    for (path, why) in [
        ("beam.pdf", "ends in .svg or .png"),
        ("beam", "ends in .svg or .png"),
        ("missing/beam.svg", "folder does not exist"),
        ("folder.svg", "a folder"),
    ] {
        let output = check(folder.path(), &cavities::two(), &["--plot", path]);
        assert_eq!(output.status.code(), Some(2), "{path}");
        assert!(output.stdout.is_empty(), "{path}");
        let error = String::from_utf8(output.stderr).unwrap();
        assert!(error.contains(why), "{error}");
        assert_eq!(files(folder.path()), ["cavity.toml", "folder.svg"]);
    }
}
