//! Sweeps of shipped cavities: real data in the place of invented ones.

use modewright::cavity::{Cavity, Measure};
use modewright::file;
use modewright::report::chart::Chart;
use modewright::report::describe;
use modewright::study::sweep::{Options, Sweep, Vary, sweep};

fn cavity(name: &str) -> Cavity {
    let text = std::fs::read_to_string(format!("cavities/{name}.toml")).unwrap();
    file::load(name, &text, &[]).unwrap().cavity
}

pub fn swept(name: &str, vary: &[(&str, f64, f64)], measures: &[&str]) -> Sweep {
    let cavity = cavity(name);
    let vary = vary.iter().map(|(address, from, to)| {
        let slot = cavity.book().find(address).unwrap();
        Vary {
            slot,
            from: *from,
            to: *to,
            nominal: Some(cavity.book().entry(slot).value),
        }
    });
    let measures = measures
        .iter()
        .map(|name| (name.to_string(), Measure::parse(name, &cavity).unwrap()));
    let options = Options {
        vary: vary.collect(),
        points: None,
        measures: measures.collect(),
    };
    sweep(&cavity, &options).unwrap()
}

const RING: &str = "bow-tie-doubling-ring";

pub fn gap() -> Chart {
    describe::sweep_chart(&swept(
        RING,
        &[("d3.length", 0.015, 0.035)],
        &[
            "margin.tangential",
            "margin.sagittal",
            "X1.least.tangential",
            "X1.least.sagittal",
            "M3.spot",
            "mode_clearance",
        ],
    ))
}

pub fn pump() -> Chart {
    describe::sweep_chart(&swept(
        "side-pumped-rod",
        &[("pump", 0.0, 400.0)],
        &["margin", "rod.spot", "OC.spot"],
    ))
}

pub fn through_flat() -> Chart {
    describe::sweep_chart(&swept(
        RING,
        &[("M1.roc", -8.0, 12.0)],
        &["margin", "X1.least", "fsr"],
    ))
}

pub fn without_mode() -> Chart {
    describe::sweep_chart(&swept(
        RING,
        &[("d3.length", 0.1, 0.2)],
        &["margin", "X1.least"],
    ))
}

pub fn two() -> Chart {
    describe::sweep_chart(&swept(
        RING,
        &[
            ("M3.roc", 1.0 / 0.04, 1.0 / 0.07),
            ("d3.length", 0.01, 0.035),
        ],
        &["margin", "X1.least", "M3.spot", "mode_clearance"],
    ))
}
