//! `modewright new`.

use std::fs;
use std::path::PathBuf;

use super::{fine, run_with, wrong};

/// A path for one test alone, with nothing there.
fn fresh(name: &str) -> PathBuf {
    let path = PathBuf::from(env!("CARGO_TARGET_TMPDIR")).join(name);
    let _ = fs::remove_file(&path);
    path
}

#[test]
fn a_starter_explains_itself_and_checks_without_a_caution() {
    for (words, form) in [
        (&["new"][..], "standing"),
        (&["new", "--standing"], "standing"),
        (&["new", "--ring"], "ring"),
    ] {
        let text = fine(words);
        assert!(text.starts_with("# "));
        let path = fresh(&format!("starter{}.toml", words.len() + form.len()));
        fs::write(&path, &text).unwrap();
        let check = fine(&["check", path.to_str().unwrap(), "--json"]);
        let check: serde_json::Value = serde_json::from_str(&check).unwrap();
        assert_eq!(check["stable"], true);
        assert_eq!(check["form"], form);
        assert_eq!(check["cautions"].as_array().unwrap().len(), 0, "{check}");
    }
}

#[cfg(target_os = "linux")]
#[test]
fn a_starter_goes_through_a_pipe() {
    let said = run_with(&["check", "/dev/stdin"], &fine(&["new", "--ring"]));
    assert_eq!(said.status, Some(0), "{}", said.err);
    assert!(said.out.contains("STABLE"));
}

#[test]
fn a_file_is_written_once_and_never_overwritten() {
    let path = fresh("once.toml");
    let name = path.to_str().unwrap();
    let said = fine(&["new", "--ring", name]);
    assert!(said.contains(&format!("modewright check {name}")));
    assert_eq!(fs::read_to_string(&path).unwrap(), fine(&["new", "--ring"]));
    fs::write(&path, "mine").unwrap();
    assert!(wrong(&["new", name]).contains("exists already"));
    assert_eq!(fs::read_to_string(&path).unwrap(), "mine");
    assert!(wrong(&["new", "/no/such/folder/x.toml"]).contains("cannot write"));
}

#[test]
fn a_shipped_cavity_is_copied_byte_by_byte() {
    let folder = concat!(env!("CARGO_MANIFEST_DIR"), "/cavities");
    for entry in fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        if path.extension().is_some_and(|ending| ending == "toml") {
            let name = path.file_stem().unwrap().to_str().unwrap();
            let copy = fine(&["new", "--from", name]);
            assert_eq!(copy, fs::read_to_string(&path).unwrap());
        }
    }
}

#[test]
fn a_name_that_is_not_known_lists_those_that_are() {
    let said = wrong(&["new", "--from", "bow-tie-doubling-rang"]);
    assert!(
        said.contains("did you mean bow-tie-doubling-ring?"),
        "{said}"
    );
    assert!(said.contains("Bow-tie ring for second-harmonic generation"));
    assert!(wrong(&["new", "--from", ""]).contains("bow-tie-doubling-ring"));
    assert!(wrong(&["new", "--ring", "--standing"]).contains("cannot be used with"));
}
