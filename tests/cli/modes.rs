//! `modes`: its text, its JSON, its table, its refusals.

use super::{fine, fits_80_columns, run, wrong};
use modewright::file::starters::SHIPPED;

const RING: &str = "cavities/bow-tie-doubling-ring.toml";

fn json(words: &[&str]) -> serde_json::Value {
    serde_json::from_str(&fine(words)).unwrap()
}

/// Every shipped cavity has an answer, but for the one that is unstable on purpose, and it fits.
#[test]
fn every_shipped_cavity_has_its_modes() {
    for shipped in SHIPPED {
        let path = format!("cavities/{}.toml", shipped.name);
        let said = run(&["modes", &path]);
        let unstable = shipped.name == "unstable-empty-z-fold";
        assert_eq!(
            said.status,
            Some(i32::from(unstable)),
            "{path}: {}",
            said.err
        );
        fits_80_columns(&said.out);
        let said = run(&["modes", &path, "--json", "--apart", "40"]);
        let found: serde_json::Value = serde_json::from_str(&said.out).unwrap();
        assert_eq!(found["modes"].as_array().unwrap().is_empty(), unstable);
        assert_eq!(found["no_answer"].is_string(), unstable);
    }
}

#[test]
fn the_json_has_what_it_promises() {
    let found = json(&["modes", RING, "--json"]);
    for key in [
        "fsr_hz",
        "linewidth_hz",
        "highest_order",
        "gouy_folded_rad",
        "polarisation",
        "other_polarisation_offset_hz",
        "modes",
        "mode_clearance",
        "mode_clearance_surviving",
        "by_order",
        "parasitic",
        "sidebands",
        "coincidences",
        "ways_out",
    ] {
        assert!(!found[key].is_null(), "{key}");
    }
    assert_eq!(found["command"], "modes");
    let modes = found["modes"].as_array().unwrap();
    assert_eq!(modes.len(), 90);
    let fsr = found["fsr_hz"].as_f64().unwrap();
    let sum: f64 = modes
        .iter()
        .filter_map(|mode| mode["content"].as_f64())
        .sum();
    let all = sum
        + found["fundamental_content"].as_f64().unwrap()
        + found["content_beyond"].as_f64().unwrap();
    assert!((all - 1.0).abs() < 1e-9);
    for mode in modes {
        let offset = mode["offset_hz"].as_f64().unwrap();
        assert!((-0.5 * fsr..0.5 * fsr).contains(&offset));
        assert!(mode["clip_loss"].as_f64().unwrap() < 1e-3);
    }
    let ways = found["ways_out"].as_array().unwrap();
    assert!(ways.iter().any(|way| way["quantity"] == "d3.length"));
    for way in ways {
        let clearance = way["mode_clearance_linewidths"].as_f64().unwrap();
        assert!((clearance - 5.0).abs() < 1e-6);
    }
}

/// Two rows for each modulation frequency, ±; the fundamental counts.
#[test]
fn sidebands_come_in_pairs() {
    let path = "cavities/triangular-mode-cleaner.toml";
    let found = json(&["modes", path, "--json"]);
    let rows = found["sidebands"].as_array().unwrap();
    let at: Vec<f64> = rows
        .iter()
        .map(|row| row["sideband_hz"].as_f64().unwrap())
        .collect();
    assert_eq!(at, [12e6, -12e6]);
    assert_eq!((&rows[1]["m"], &rows[1]["n"]), (&0.into(), &0.into()));
    assert_eq!(rows[1]["offset_hz"].as_f64(), Some(12e6));
    let fsr = found["fsr_hz"].as_f64().unwrap();
    let other = found["other_polarisation_offset_hz"].as_f64().unwrap();
    assert_eq!(other, -0.5 * fsr);
}

/// A confocal cavity is what the command is for: an answer, and nothing of its beam.
#[test]
fn a_confocal_cavity_has_an_answer() {
    let path = "cavities/confocal-analyser.toml";
    assert!(fine(&["modes", path]).contains("on the fundamental itself"));
    let found = json(&["modes", path, "--json"]);
    assert_eq!(found["on_edge"], true);
    assert!(found["mode_clearance_surviving"].is_null());
    assert!(found["modes"][0]["clip_loss"].is_null());
    assert!(found["modes"][0]["why"].is_string());
    assert!(found["why"].is_string());
}

#[test]
fn the_table_holds_every_mode() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("modes.csv");
    let found = json(&["modes", RING, "--json", "--csv", path.to_str().unwrap()]);
    let mut table = csv::Reader::from_path(&path).unwrap();
    let rows: Vec<csv::StringRecord> = table.records().map(Result::unwrap).collect();
    let modes = found["modes"].as_array().unwrap();
    assert_eq!(rows.len(), modes.len());
    for (row, mode) in rows.iter().zip(modes) {
        assert_eq!(row[3].parse::<f64>().ok(), mode["offset_hz"].as_f64());
    }
}

#[test]
fn a_picture_is_drawn_even_without_a_spectrum() {
    let folder = tempfile::tempdir().unwrap();
    for (name, status) in [
        ("bow-tie-doubling-ring", 0),
        ("confocal-analyser", 0),
        ("kilometre-arm", 0),
        ("unstable-empty-z-fold", 1),
    ] {
        let path = folder.path().join(format!("{name}.svg"));
        let file = format!("cavities/{name}.toml");
        let said = run(&["modes", &file, "--plot", path.to_str().unwrap()]);
        assert_eq!(said.status, Some(status), "{}", said.err);
        let picture = std::fs::read_to_string(&path).unwrap();
        assert!(picture.contains("fundamental"), "{name}");
    }
}

#[test]
fn what_is_typed_wrongly_is_refused() {
    for (words, why) in [
        (["--free", "nothing.length"], "no such quantity"),
        (["--free", "X1.group_index"], "does not move"),
        (["--apart", "0"], "above zero"),
        (["--apart", "NaN"], "above zero"),
        (["--plot", "modes.pdf"], "ends in .svg or .png"),
    ] {
        let said = wrong(&["modes", RING, words[0], words[1]]);
        assert!(said.contains(why), "{said}");
    }
    let tied = wrong(&[
        "modes",
        "cavities/triangular-mode-cleaner.toml",
        "--free",
        "out.length,back.length",
    ]);
    assert!(tied.contains("is tied"), "{tied}");
}

/// What is named without a tolerance is searched too.
#[test]
fn a_named_quantity_gets_its_ways_out() {
    let found = json(&["modes", RING, "--json", "--free", "X1.thickness"]);
    let ways = found["ways_out"].as_array().unwrap();
    let named: Vec<_> = ways
        .iter()
        .filter(|way| way["quantity"] == "X1.thickness")
        .collect();
    assert!(!named.is_empty());
    assert!(named.iter().all(|way| way["within_limits"].is_null()));
}
