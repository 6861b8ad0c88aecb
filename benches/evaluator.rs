//! Many cavities at a time: the bow-tie ring with its seven toleranced quantities, measured as a
//! builder would (margin, four spots, least radius in the crystal, mode clearance to order 12).

use divan::Bencher;
use divan::counter::ItemsCount;
use modewright::cavity::{Cavity, Measure, Slot};
use modewright::file;
use modewright::numeric::Lanes;
use modewright::study::batch::{BLOCKS, Batch, CHUNK, Instructions};

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

fn bench(bencher: Bencher, measures: &[&str], varied: &[&str], instructions: Instructions) {
    const CHUNKS: usize = 64;
    let cavity = ring();
    let measures = measures
        .iter()
        .filter_map(|name| Measure::parse(name, &cavity).ok())
        .collect();
    let varied: Vec<Slot> = varied
        .iter()
        .filter_map(|address| cavity.book().find(address))
        .collect();
    let nominal = cavity.book().nominal();
    let batch = Batch::new(&cavity, measures, varied).with(instructions);
    let mut chunk = batch.chunk();
    let count = batch.varied().len();
    for (k, input) in chunk.inputs.iter_mut().enumerate() {
        let at = nominal[batch.varied()[k % count].index()];
        *input = Lanes(std::array::from_fn(|lane| {
            at * (1.0 + 1e-5 * ((k * 7 + lane * 3) % 17) as f64)
        }));
    }
    bencher
        .counter(ItemsCount::new(CHUNKS * CHUNK))
        .bench_local(|| {
            for _ in 0..CHUNKS {
                batch.evaluate(&mut chunk, BLOCKS);
            }
        });
}

#[divan::bench(args = [1, 5, 6, 7])]
fn one_core_plain(bencher: Bencher, count: usize) {
    bench(bencher, &MEASURES[..count], &VARIED, Instructions::Plain);
}

#[divan::bench(args = [1, 5, 6, 7])]
fn one_core(bencher: Bencher, count: usize) {
    bench(bencher, &MEASURES[..count], &VARIED, Instructions::Widest);
}
