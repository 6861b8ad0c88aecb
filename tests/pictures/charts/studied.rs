//! Tolerance studies of shipped cavities.

use std::sync::OnceLock;

use modewright::cavity::Measure;
use modewright::file;
use modewright::report::chart::Chart;
use modewright::report::describe;
use modewright::study::tolerance::{Options, tolerance};

fn studied(name: &str, measures: &[&str]) -> Chart {
    let text = std::fs::read_to_string(format!("cavities/{name}.toml")).unwrap();
    let cavity = file::load(name, &text, &[]).unwrap().cavity;
    let measures = measures
        .iter()
        .map(|name| (name.to_string(), Measure::parse(name, &cavity).unwrap()));
    let options = Options {
        measures: measures.collect(),
        samples: Some(20_000),
        ..Options::default()
    };
    let found = tolerance(&cavity, &options, &mut |_, _| true).unwrap();
    describe::tolerance_chart(&found)
}

/// A study is dear, and every test draws all charts.
static CHARTS: [OnceLock<Chart>; 3] = [const { OnceLock::new() }; 3];

pub fn failing_limits() -> Chart {
    let study = || studied("compensated-z-fold", &["margin"]);
    CHARTS[0].get_or_init(study).clone()
}

pub fn spacings() -> Chart {
    let measures = ["spacing.tangential", "mode_clearance", "lifetime"];
    let study = || studied("triangular-mode-cleaner", &measures);
    CHARTS[1].get_or_init(study).clone()
}

pub fn no_mode() -> Chart {
    let study = || studied("unstable-empty-z-fold", &["margin", "fsr"]);
    CHARTS[2].get_or_init(study).clone()
}
