//! One cavity at a time: the mode and the beam at every station of a 12-part ring.

use divan::{Bencher, black_box};
use modewright::analysis::check::check;
use modewright::analysis::eigenmode::Eigenmode;
use modewright::analysis::envelope::Envelope;
use modewright::analysis::modes::{APART, modes};
use modewright::analysis::ranges::stable_ranges;
use modewright::analysis::spectrum::{Multiples, least_offset};
use modewright::cavity::Cavity;
use modewright::file;

const RING: &str = r#"
wavelength = "1064 nm"
form = "ring"
path = [
  { mirror = "M1", roc = "flat", aoi = "8 deg", fold = "left" },
  { gap = "d1", length = "80 mm" },
  { mirror = "M2", roc = "flat", aoi = "8 deg", fold = "left" },
  { gap = "d2", length = "73.34 mm" },
  { mirror = "M3", roc = "50 mm", aoi = "8 deg", fold = "right" },
  { gap = "d3", length = "23 mm" },
  { slab = "X1", index = 1.605, group_index = 1.63, thickness = "15 mm" },
  { gap = "d4", length = "23 mm" },
  { mirror = "M4", roc = "50 mm", aoi = "8 deg", fold = "right" },
  { gap = "d5", length = "40 mm" },
  { slab = "P1", index = 1.45, group_index = 1.46, thickness = "2 mm", aoi = "brewster" },
  { gap = "d6", length = "32 mm" },
]
"#;

fn ring() -> Cavity {
    match file::load("ring.toml", RING, &[]) {
        Ok(loaded) => loaded.cavity,
        Err(refused) => panic!("{:?}", refused.diagnostics),
    }
}

fn main() {
    divan::main();
}

#[divan::bench]
fn mode_and_all_stations(bencher: Bencher) {
    let cavity = ring();
    let values = cavity.book().nominal();
    bencher.bench_local(|| {
        let values = black_box(&values);
        let mode = Eigenmode::of(&cavity, values);
        Envelope::of(&cavity, values, mode.start())
    });
}

#[divan::bench]
fn mode_alone(bencher: Bencher) {
    let cavity = ring();
    let values = cavity.book().nominal();
    bencher.bench_local(|| Eigenmode::of(&cavity, black_box(&values)));
}

#[divan::bench]
fn all_stability_ranges(bencher: Bencher) {
    let cavity = ring();
    bencher.bench_local(|| stable_ranges(black_box(&cavity)));
}

#[divan::bench]
fn whole_check(bencher: Bencher) {
    let cavity = ring();
    bencher.bench_local(|| check(black_box(&cavity)));
}

#[divan::bench]
fn reading_the_file(bencher: Bencher) {
    bencher.bench_local(|| file::load("ring.toml", black_box(RING), &[]).is_ok());
}

#[divan::bench]
fn offsets_and_clearance_to_order_12(bencher: Bencher) {
    let cavity = ring();
    let mode = Eigenmode::of(&cavity, &cavity.book().nominal());
    let spacing = mode
        .planes
        .map(|plane| plane.gouy_folded.unwrap_or_default() / std::f64::consts::TAU);
    let mut multiples = Multiples::default();
    bencher.bench_local(|| least_offset(black_box(spacing), 12, &mut multiples));
}

#[divan::bench]
fn whole_modes(bencher: Bencher) {
    let cavity = ring();
    bencher.bench_local(|| modes(black_box(&cavity), APART, &[]));
}
