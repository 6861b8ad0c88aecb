//! Many cavities at a time: the bow-tie ring with its seven toleranced quantities, measured as a
//! builder would (margin, four spots, least radius in the crystal, mode clearance to order 12).

use divan::counter::ItemsCount;
use divan::{Bencher, black_box};
use modewright::analysis::measures::{Evaluator, Workspace};
use modewright::cavity::{Cavity, Measure, Slot};
use modewright::file;
use modewright::numeric::{LANES, Lanes, Real};

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

const BLOCKS: usize = 128;

#[divan::bench(args = [1, 5, 6, 7])]
fn one_core(bencher: Bencher, count: usize) {
    let cavity = ring();
    let measures = MEASURES[..count]
        .iter()
        .filter_map(|name| Measure::parse(name, &cavity).ok())
        .collect();
    let varied: Vec<Slot> = VARIED
        .iter()
        .filter_map(|address| cavity.book().find(address))
        .collect();
    let evaluator = Evaluator::new(&cavity, measures).varying(&varied);
    let mut values: Vec<Lanes> = cavity
        .book()
        .nominal()
        .into_iter()
        .map(Lanes::constant)
        .collect();
    let nominal = cavity.book().nominal();
    let inputs: Vec<[Lanes; VARIED.len()]> = (0..BLOCKS)
        .map(|block| {
            std::array::from_fn(|k| {
                let at = nominal[varied[k].index()];
                Lanes(std::array::from_fn(|lane| {
                    at * (1.0 + 1e-5 * ((block * 7 + lane * 3 + k) % 17) as f64)
                }))
            })
        })
        .collect();
    let mut workspace = Workspace::default();
    bencher
        .counter(ItemsCount::new(BLOCKS * LANES))
        .bench_local(|| {
            let mut sum = Lanes::constant(0.0);
            for input in black_box(&inputs) {
                for (slot, lanes) in varied.iter().zip(input) {
                    values[slot.index()] = *lanes;
                }
                evaluator.evaluate(&values, &mut workspace, |_, value, _| {
                    sum = sum + value;
                });
            }
            sum
        });
}
