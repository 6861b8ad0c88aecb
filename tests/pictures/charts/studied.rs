//! Tolerance studies of shipped cavities.

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

pub fn failing_limits() -> Chart {
    studied("compensated-z-fold", &["margin"])
}

pub fn spacings() -> Chart {
    studied(
        "triangular-mode-cleaner",
        &["spacing.tangential", "mode_clearance", "lifetime"],
    )
}

pub fn no_mode() -> Chart {
    studied("unstable-empty-z-fold", &["margin", "fsr"])
}
