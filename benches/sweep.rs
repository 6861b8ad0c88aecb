//! A map of a million points: the bow-tie ring against a radius and a gap, its margin, a spot and
//! the mode clearance to order 12, on every core.

use divan::Bencher;
use divan::counter::ItemsCount;
use modewright::cavity::{Cavity, Measure};
use modewright::file;
use modewright::study::sweep::{Options, Vary, sweep};

fn main() {
    divan::main();
}

fn ring() -> Cavity {
    let text = include_str!("../cavities/bow-tie-doubling-ring.toml");
    match file::load("ring.toml", text, &[]) {
        Ok(loaded) => loaded.cavity,
        Err(refused) => panic!("{:?}", refused.diagnostics),
    }
}

const MEASURES: [&str; 3] = ["margin", "M3.spot", "mode_clearance"];

fn options(cavity: &Cavity, ranges: &[(&str, f64, f64)], points: usize) -> Options {
    let vary = ranges.iter().filter_map(|(address, from, to)| {
        Some(Vary {
            slot: cavity.book().find(address)?,
            from: *from,
            to: *to,
            nominal: None,
        })
    });
    let measures = MEASURES
        .iter()
        .filter_map(|name| Some((name.to_string(), Measure::parse(name, cavity).ok()?)));
    Options {
        vary: vary.collect(),
        points: Some(points),
        measures: measures.collect(),
    }
}

#[divan::bench(sample_count = 10)]
fn map_of_a_million_points(bencher: Bencher) {
    let cavity = ring();
    let ranges = [
        ("M3.roc", 1.0 / 0.045, 1.0 / 0.055),
        ("d3.length", 0.019, 0.030),
    ];
    let options = options(&cavity, &ranges, 1000);
    bencher
        .counter(ItemsCount::new(1_000_000_usize))
        .bench_local(|| sweep(&cavity, &options));
}

#[divan::bench(sample_count = 20)]
fn curve_with_its_edges_and_extremes(bencher: Bencher) {
    let cavity = ring();
    let options = options(&cavity, &[("d3.length", 0.015, 0.035)], 201);
    bencher.bench_local(|| sweep(&cavity, &options));
}
