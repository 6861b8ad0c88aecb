//! Many cavities at a time: the bow-tie ring with its seven toleranced quantities, measured as a
//! builder would (margin, four spots, least radius in the crystal, mode clearance to order 12); the
//! same with a tilted crystal and its thermal lens; a whole tolerance study.

use divan::Bencher;
use divan::counter::ItemsCount;
use modewright::cavity::{Cavity, Measure, Slot};
use modewright::file;
use modewright::numeric::Lanes;
use modewright::study::batch::{BLOCKS, Batch, CHUNK, Instructions};
use modewright::study::tolerance::{Options, tolerance};
use rayon::prelude::*;

fn main() {
    divan::main();
}

fn ring(set: &[&str]) -> Cavity {
    let set: Vec<String> = set.iter().map(|set| set.to_string()).collect();
    let text = include_str!("../cavities/bow-tie-doubling-ring.toml");
    match file::load("ring.toml", text, &set) {
        Ok(loaded) => loaded.cavity,
        Err(refused) => panic!("{:?}", refused.diagnostics),
    }
}

const MEASURES: [&str; 7] = [
    "margin",
    "M1.spot",
    "M2.spot",
    "M3.spot",
    "M4.spot",
    "X1.least",
    "mode_clearance",
];

const VARIED: [&str; 7] = [
    "d1.length",
    "d2.length",
    "d3.length",
    "d4.length",
    "d5.length",
    "M3.roc",
    "M4.roc",
];

/// Chunks a core.
const CHUNKS: usize = 64;

fn measures(cavity: &Cavity, names: &[&str]) -> Vec<(String, Measure)> {
    names
        .iter()
        .filter_map(|name| Some((name.to_string(), Measure::parse(name, cavity).ok()?)))
        .collect()
}

fn bench(
    bencher: Bencher,
    cavity: &Cavity,
    names: &[&str],
    varied: &[&str],
    instructions: Instructions,
    cores: usize,
) {
    let measures = measures(cavity, names)
        .into_iter()
        .map(|(_, m)| m)
        .collect();
    let varied: Vec<Slot> = varied
        .iter()
        .filter_map(|address| cavity.book().find(address))
        .collect();
    let nominal = cavity.book().nominal();
    let batch = Batch::new(cavity, measures, varied).with(instructions);
    let mut chunk = batch.chunk();
    let count = batch.varied().len();
    for (k, input) in chunk.inputs.iter_mut().enumerate() {
        let at = nominal[batch.varied()[k % count].index()];
        *input = Lanes(std::array::from_fn(|lane| {
            at * (1.0 + 1e-5 * ((k * 7 + lane * 3) % 17) as f64)
        }));
    }
    let mut chunks = vec![chunk; cores];
    bencher
        .counter(ItemsCount::new(cores * CHUNKS * CHUNK))
        .bench_local(|| {
            chunks.par_iter_mut().for_each(|chunk| {
                for _ in 0..CHUNKS {
                    batch.evaluate(chunk, BLOCKS);
                }
            });
        });
}

#[divan::bench(args = [1, 5, 6, 7])]
fn one_core_plain(bencher: Bencher, count: usize) {
    let names = &MEASURES[..count];
    bench(bencher, &ring(&[]), names, &VARIED, Instructions::Plain, 1);
}

#[divan::bench(args = [1, 5, 6, 7])]
fn one_core(bencher: Bencher, count: usize) {
    let names = &MEASURES[..count];
    bench(bencher, &ring(&[]), names, &VARIED, Instructions::Widest, 1);
}

#[divan::bench]
fn two_cores_plain(bencher: Bencher) {
    bench(
        bencher,
        &ring(&[]),
        &MEASURES,
        &VARIED,
        Instructions::Plain,
        2,
    );
}

#[divan::bench]
fn two_cores(bencher: Bencher) {
    bench(
        bencher,
        &ring(&[]),
        &MEASURES,
        &VARIED,
        Instructions::Widest,
        2,
    );
}

/// The angle of a tilted crystal and its thermal lens vary too.
#[divan::bench]
fn two_cores_tilted_and_thermal(bencher: Bencher) {
    let cavity = ring(&["X1.aoi=10 deg", "X1.thermal=2 1/m"]);
    let varied = [&VARIED[..], &["X1.aoi", "X1.thermal"]].concat();
    bench(
        bencher,
        &cavity,
        &MEASURES,
        &varied,
        Instructions::Widest,
        2,
    );
}

/// Four million samples with histograms and culprits, and all that a study does beside.
#[divan::bench(sample_count = 10)]
fn study(bencher: Bencher) {
    const SAMPLES: u64 = 4_000_000;
    let cavity = ring(&[]);
    let options = Options {
        measures: measures(&cavity, &MEASURES),
        samples: Some(SAMPLES),
        ..Options::default()
    };
    bencher
        .counter(ItemsCount::new(SAMPLES))
        .bench_local(|| tolerance(&cavity, &options, &mut |_, _| true));
}
