//! Every shipped cavity: it is what its comments say, and its whole answer can be read.
//!
//! The figures are the program's own, noted when the file was written, so that neither a file nor
//! the physics changes unseen; where a closed form or a published value exists, it stands beside.

use std::collections::BTreeSet;
use std::path::{Path, PathBuf};
use std::process::Command;

use approx::assert_relative_eq;
use modewright::analysis::check::{Check, check};
use modewright::analysis::measures;
use modewright::cavity::{Cavity, Measure};
use modewright::file;

/// How a check ends.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Verdict {
    Good,
    OnEdge,
    Unstable,
}

use Verdict::{Good, OnEdge, Unstable};

struct Expected {
    name: &'static str,
    verdict: Verdict,
    margin: f64,
    figures: &'static [(&'static str, f64)],
    /// A piece of each caution.
    cautions: &'static [&'static str],
}

const fn good(
    name: &'static str,
    margin: f64,
    figures: &'static [(&'static str, f64)],
) -> Expected {
    Expected {
        name,
        verdict: Good,
        margin,
        figures,
        cautions: &[],
    }
}

const SHIPPED: [Expected; 17] = [
    Expected {
        // The first of the files: its flats were never given a tolerance.
        cautions: &["flat without a tolerance"],
        ..good(
            "bow-tie-doubling-ring",
            0.6710,
            &[("X1.least", 34.02e-6), ("M3.spot", 277.6e-6)],
        )
    },
    good(
        "compensated-z-fold",
        0.3333,
        &[("X1.least", 26.81e-6), ("OC.aspect", 0.9814)],
    ),
    Expected {
        name: "confocal-analyser",
        verdict: OnEdge,
        margin: 0.0,
        figures: &[("fsr", 2.998e9)],
        cautions: &["tangential plane confocal", "sagittal plane confocal"],
    },
    good(
        "end-pumped-v-fold",
        0.8404,
        &[("X1.spot", 166.7e-6), ("OC.aspect", 0.9743)],
    ),
    good(
        "grin-rod-filter",
        0.7608,
        &[("rod.least", 37.25e-6), ("M2.spot", 32.48e-6)],
    ),
    good(
        "hemispherical-gas-laser",
        0.3111,
        &[("OC.spot", 148.6e-6), ("bore.spot", 322.6e-6)],
    ),
    // Published: 16.197 mm and 35.3005 mm.
    good(
        "kilometre-arm",
        0.6704,
        &[("arm.waist", 16.197e-3), ("ETM.spot", 35.3005e-3)],
    ),
    good(
        "micrometre-open-cavity",
        0.3510,
        &[("membrane.least", 1.388e-6), ("dimple.spot", 1.529e-6)],
    ),
    good(
        "mode-locked-x-fold",
        0.5910,
        &[("absorber.spot", 127.2e-6), ("fsr", 99.82e6)],
    ),
    // Three quarters of its radius long: g = 1/4.
    good(
        "monolithic-crystal-resonator",
        0.5,
        &[("X1.least", 25.65e-6), ("half_trace.sagittal", -0.5)],
    ),
    good(
        "ring-down-cell",
        0.4050,
        &[("cell.waist", 484.3e-6), ("M1.spot", 568.8e-6)],
    ),
    good(
        "side-pumped-rod",
        0.2857,
        &[("rod.spot", 502.0e-6), ("fsr", 204.29e6)],
    ),
    good(
        "thin-disc-laser",
        0.5955,
        &[("disc.spot", 765.8e-6), ("HR.spot", 1226e-6)],
    ),
    good(
        "triangular-mode-cleaner",
        0.4190,
        &[("short.waist", 371.3e-6), ("fsr", 714.57e6)],
    ),
    good(
        "two-deck-laser-head",
        0.3073,
        &[("X1.spot", 472.5e-6), ("OC.aspect", 1.2045)],
    ),
    // w₀² = (λ/π) √(L (R − L)): 258.2 µm.
    good(
        "ultra-stable-reference-cavity",
        0.2,
        &[("bore.waist", 258.18e-6), ("M2.spot", 272.1e-6)],
    ),
    Expected {
        verdict: Unstable,
        ..good(
            "unstable-empty-z-fold",
            -2.496,
            &[("half_trace.sagittal", 3.496)],
        )
    },
];

/// What three or four written digits leave open.
const DIGITS: f64 = 1e-3;

fn folder() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("cavities")
}

fn path(name: &str) -> PathBuf {
    folder().join(name).with_extension("toml")
}

fn load(name: &str, overrides: &[&str]) -> Cavity {
    let text = std::fs::read_to_string(path(name)).unwrap();
    let overrides: Vec<String> = overrides.iter().map(|set| set.to_string()).collect();
    match file::load(name, &text, &overrides) {
        Ok(loaded) => loaded.cavity,
        Err(refused) => panic!("{name}: {:?}", refused.diagnostics),
    }
}

fn run(name: &str, arguments: &[&str]) -> (Option<i32>, String) {
    let output = Command::new(env!("CARGO_BIN_EXE_modewright"))
        .arg("check")
        .arg(path(name))
        .args(arguments)
        .output()
        .unwrap();
    assert!(output.stderr.is_empty(), "{name}: {output:?}");
    (
        output.status.code(),
        String::from_utf8(output.stdout).unwrap(),
    )
}

fn verdict(check: &Check) -> Verdict {
    match (check.stable, check.on_edge) {
        (true, false) => Good,
        (false, true) => OnEdge,
        _ => Unstable,
    }
}

#[test]
fn no_file_is_forgotten() {
    let listed: BTreeSet<String> = SHIPPED.iter().map(|e| format!("{}.toml", e.name)).collect();
    let found: BTreeSet<String> = std::fs::read_dir(folder())
        .unwrap()
        .map(|entry| entry.unwrap().file_name().into_string().unwrap())
        .collect();
    assert_eq!(listed, found);
}

#[test]
fn every_file_has_its_verdict_and_figures() {
    for expected in &SHIPPED {
        let name = expected.name;
        let cavity = load(name, &[]);
        let check = check(&cavity);
        assert_eq!(verdict(&check), expected.verdict, "{name}");
        assert!(
            (check.margin - expected.margin).abs() <= DIGITS * expected.margin.abs().max(0.1),
            "{name}: margin {}",
            check.margin
        );
        assert_eq!(
            check.cautions.len(),
            expected.cautions.len(),
            "{name}: {:?}",
            check.cautions
        );
        for (caution, piece) in check.cautions.iter().zip(expected.cautions) {
            assert!(caution.contains(piece), "{name}: {caution}");
        }
        if expected.verdict == Good {
            for limit in &check.limits {
                assert!(limit.holds, "{name}: {limit:?}");
            }
        }
        let values = cavity.book().nominal();
        for (measure, wanted) in expected.figures {
            let found = Measure::parse(measure, &cavity).unwrap();
            let found = measures::value(&cavity, &values, found)
                .unwrap_or_else(|| panic!("{name}: {measure} has no value"));
            assert!(
                (found / wanted - 1.0).abs() <= DIGITS,
                "{name}: {measure} is {found}, not {wanted}"
            );
        }
    }
}

/// A stable cavity lies inside each of its ranges, and every range leaves room for the tolerance.
#[test]
fn ranges_hold_the_nominal_values() {
    for expected in SHIPPED.iter().filter(|e| e.verdict == Good) {
        let check = check(&load(expected.name, &[]));
        assert!(!check.ranges.is_empty());
        for range in &check.ranges {
            let name = format!("{} {}", expected.name, range.quantity);
            assert!(range.holds_nominal, "{name}");
            assert!(range.found.range.is_some(), "{name}");
            assert!(range.room().is_none_or(|room| room > 1.0), "{name}");
        }
    }
}

#[test]
fn text_fits_the_terminal_and_is_plain_through_a_pipe() {
    for expected in &SHIPPED {
        let name = expected.name;
        let (status, text) = run(name, &[]);
        let (wanted, word) = match expected.verdict {
            Good => (0, "STABLE"),
            OnEdge => (1, "ON THE EDGE"),
            Unstable => (1, "UNSTABLE"),
        };
        assert_eq!(status, Some(wanted), "{name}");
        let mut lines = text.lines();
        let title = load(name, &[]).title.expect("a shipped file has a title");
        assert_eq!(lines.next(), Some(title.as_str()), "{name}");
        assert!(
            lines.next().is_some_and(|line| line.starts_with(word)),
            "{name}: {text}"
        );
        assert!(!text.contains('\u{1b}'), "{name} has colours");
        for line in text.lines() {
            assert!(line.chars().count() <= 80, "{name}: {line}");
        }
    }
}

#[test]
fn json_parses_and_agrees() {
    for expected in &SHIPPED {
        let (status, json) = run(expected.name, &["--json"]);
        assert_eq!(
            status,
            Some(i32::from(expected.verdict != Good)),
            "{}",
            expected.name
        );
        let json: serde_json::Value = serde_json::from_str(&json).unwrap();
        assert_eq!(json["command"], "check");
        assert_eq!(json["stable"], expected.verdict == Good);
        assert_eq!(json["on_edge"], expected.verdict == OnEdge);
        assert!(json["stations"].as_array().is_some_and(|s| s.len() > 2));
    }
}

/// The files themselves are read on the same terminals.
#[test]
fn comments_stand_in_a_hundred_columns() {
    for expected in &SHIPPED {
        let text = std::fs::read_to_string(path(expected.name)).unwrap();
        assert!(text.starts_with("# "), "{} says what it is", expected.name);
        for line in text.lines().filter(|line| line.trim().starts_with('#')) {
            assert!(line.chars().count() <= 100, "{}: {line}", expected.name);
        }
    }
}

/// What the comments suggest to try has the effect they promise.
#[test]
fn suggestions_in_comments_work() {
    let verdict_of = |name: &str, overrides: &[&str]| verdict(&check(&load(name, overrides)));
    assert_eq!(verdict_of("side-pumped-rod", &["pump=0 W"]), OnEdge);
    assert_eq!(verdict_of("side-pumped-rod", &["pump=450 W"]), Unstable);
    assert_eq!(verdict_of("side-pumped-rod", &["pump=600 W"]), Good);
    assert_eq!(verdict_of("end-pumped-v-fold", &["pump=25 W"]), Good);
    assert_eq!(verdict_of("confocal-analyser", &["d.length=49.9 mm"]), Good);
    assert_eq!(
        verdict_of("unstable-empty-z-fold", &["F1.aoi=5 deg", "F2.aoi=5 deg"]),
        Good
    );
    let pump = check(&load("side-pumped-rod", &[]));
    assert!(pump.ranges.iter().any(|range| range.quantity == "pump"));
    // No distance between the folding mirrors suits both planes.
    let empty = check(&load("unstable-empty-z-fold", &[]));
    let focus = empty
        .ranges
        .iter()
        .find(|range| range.quantity == "focus.length")
        .unwrap();
    assert!(focus.found.range.is_none());
    // The angle in the file is the compensating one to its written digits.
    let (n, thickness, radius) = (1.752_f64, 4e-3, 0.1);
    let angle = 7.6_f64.to_radians();
    let crystal = thickness * (n * n - 1.0) * (n * n + 1.0).sqrt() / n.powi(4);
    assert_relative_eq!(
        radius * angle.sin() * angle.tan(),
        crystal,
        max_relative = 0.01
    );
    // An odd number of mirrors parts the planes' phases by half a turn.
    let triangle = check(&load("triangular-mode-cleaner", &[]));
    let folded = |p: &modewright::analysis::check::PlaneCheck| p.gouy_folded_rad.unwrap();
    let apart = folded(&triangle.planes.tangential) - folded(&triangle.planes.sagittal);
    assert_relative_eq!(apart.abs(), std::f64::consts::PI, epsilon = 0.01);
    let decks = check(&load("two-deck-laser-head", &[]));
    assert!(!decks.tangential_is_horizontal);
}
