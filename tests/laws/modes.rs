//! Transverse modes by second roads: offsets from the eigenphases of the round trip, ways out and
//! windows from dense scans.

use std::f64::consts::TAU;

use modewright::analysis::eigenmode::{Eigenmode, Stability};
use modewright::analysis::measures;
use modewright::analysis::modes::{APART, Modes, modes};
use modewright::cavity::{Cavity, Measure, Slot};
use modewright::file;
use modewright::optics::Plane;
use num_complex::Complex;
use proptest::prelude::*;

use crate::spec::any_cavity;

/// Offsets in free spectral ranges differ by rounding, times the order and what the margin does to
/// an angle.
const ROUNDING: f64 = 1e-11;

fn load(text: &str) -> Cavity {
    file::load("test.toml", text, &[]).unwrap().cavity
}

/// The phase that TEM_m gains over TEM_{m−1} in a round trip with the given matrix, flips included:
/// with the beam q that repeats itself, A + B/q = exp(−iψ), and a flipped matrix adds half a turn.
fn phase(cavity: &Cavity, plane: Plane) -> f64 {
    let m = Eigenmode::of(cavity, &cavity.book().nominal()).planes[plane].matrix;
    let root = Complex::new((m.d - m.a).powi(2) + 4.0 * m.b * m.c, 0.0).sqrt();
    // Cq² + (D − A)q − B = 0; of its two solutions the beam has the positive imaginary part.
    let solutions = [1.0, -1.0].map(|sign| (root * sign + (m.a - m.d)) / (2.0 * m.c));
    let beam = solutions.into_iter().find(|q| q.im > 0.0).unwrap();
    -(m.a + m.b / beam).arg()
}

proptest! {
    #![proptest_config(crate::config(200))]

    #[test]
    fn offsets_are_eigenphases_of_the_round_trip(
        spec in any_cavity(12).prop_filter("stable", |spec| {
            let cavity = spec.cavity();
            Eigenmode::of(&cavity, &cavity.book().nominal()).margin() > 1e-3
        })
    ) {
        let cavity = spec.cavity();
        let margin = Eigenmode::of(&cavity, &cavity.book().nominal()).margin();
        let [t, s] = Plane::BOTH.map(|plane| phase(&cavity, plane) / TAU);
        let found = modes(&cavity, APART, &[]);
        prop_assert_eq!(found.modes.len(), 90);
        for mode in &found.modes {
            let turns = mode.m as f64 * t + mode.n as f64 * s - mode.offset_hz / found.fsr_hz;
            let apart = (turns - turns.round()).abs();
            prop_assert!(apart < ROUNDING * mode.order as f64 / margin, "{mode:?}: {apart}");
            prop_assert!(mode.offset_hz >= -0.5 * found.fsr_hz);
            prop_assert!(mode.offset_hz < 0.5 * found.fsr_hz);
        }
        let least = found.modes.iter().map(|mode| mode.offset_hz.abs()).fold(f64::INFINITY, f64::min);
        let clearance = found.mode_clearance.unwrap().offset_hz.abs();
        prop_assert!((clearance - least).abs() <= 1e-8 * found.fsr_hz);
    }
}

/// Points of a scan over one quantity.
const SCAN: usize = 3000;

/// Windows narrower than this share of what is searched may be missed by the search; the scan says
/// nothing nearer to a boundary either.
const FINE: f64 = 1e-5;

/// The clearance with one quantity at a value: linewidths, or hundredths of a free spectral range
/// where there is no loss.
fn clearance(cavity: &Cavity, slot: Slot, x: f64) -> Option<f64> {
    let mut values = cavity.book().nominal();
    values[slot.index()] = x;
    cavity.book().follow_ties(&mut values);
    let up_to = cavity.highest_order;
    measures::value(cavity, &values, Measure::ModeClearance { up_to })
}

/// Checks the ways out and windows of one quantity.
fn hold(cavity: &Cavity, found: &Modes, address: &str, apart: f64) -> Result<(), TestCaseError> {
    let slot = cavity.book().find(address).unwrap();
    let nominal = cavity.book().entry(slot).value;
    let is_clear = |x: f64| clearance(cavity, slot, x).is_some_and(|count| count >= apart);
    let size = 0.1 * nominal.abs();
    for way in found.ways_out.iter().filter(|way| way.quantity == address) {
        let [from, to, until] = way.kept;
        prop_assert_eq!(from, nominal);
        let count = clearance(cavity, slot, to);
        prop_assert!(
            count.is_some_and(|count| (count - apart).abs() < 1e-6 * apart),
            "{count:?}"
        );
        // Nothing nearer helps, and all up to the end does.
        for k in 0..SCAN {
            let share = (k as f64 + 0.5) / SCAN as f64;
            let before = from + (to - from) * share;
            if (before - to).abs() > FINE * size {
                prop_assert!(!is_clear(before), "{address} at {before}, before {to}");
            }
            let within = to + (until - to) * share;
            if (within - to).abs().min((within - until).abs()) > FINE * size {
                prop_assert!(
                    is_clear(within),
                    "{address} at {within}, in {to} to {until}"
                );
            }
        }
    }
    let windows: Vec<[f64; 2]> = found
        .windows
        .iter()
        .filter(|window| window.quantity == address)
        .map(|window| window.kept)
        .collect();
    let (low, high) = cavity.book().entry(slot).kept_limits().unwrap();
    for k in 0..SCAN {
        let x = low + (high - low) * (k as f64 + 0.5) / SCAN as f64;
        let is_near_an_end = windows
            .iter()
            .flatten()
            .any(|end| (x - end).abs() < FINE * (high - low));
        let is_within = windows.iter().any(|[from, to]| (*from..=*to).contains(&x));
        if is_near_an_end || clearance(cavity, slot, x).is_none() {
            continue;
        }
        prop_assert!(is_within == is_clear(x), "{address} at {x}: {windows:?}");
    }
    Ok(())
}

fn bow_tie(d1: f64, d3: f64, roc: f64, aoi: f64, loss: f64) -> Cavity {
    load(&format!(
        r#"
        wavelength = "1064 nm"
        form = "ring"
        path = [
          {{ mirror = "M1", roc = "flat", aoi = "{aoi} deg", loss = "{loss} %" }},
          {{ gap = "d1", length = "{d1} mm ± 4 mm" }},
          {{ mirror = "M2", roc = "flat", aoi = "{aoi} deg" }},
          {{ gap = "d2", length = "73.34 mm" }},
          {{ mirror = "M3", roc = "{roc} mm ± 2 %", aoi = "{aoi} deg" }},
          {{ gap = "d3", length = "{d3} mm ± 0.4 mm" }},
          {{ slab = "X1", index = 1.605, group_index = 1.63, thickness = "15 mm" }},
          {{ gap = "d4", length = "23 mm" }},
          {{ mirror = "M4", roc = "50 mm", aoi = "{aoi} deg" }},
          {{ gap = "d5", length = "73.34 mm" }},
        ]
        "#
    ))
}

proptest! {
    #![proptest_config(crate::config(25))]

    #[test]
    fn ways_out_are_where_a_scan_finds_them(
        d1 in 60.0..100.0_f64,
        d3 in 21.0..26.0_f64,
        roc in 46.0..54.0_f64,
        aoi in 5.0..12.0_f64,
        loss in 0.05..4.0_f64,
        apart in 0.5..12.0_f64,
    ) {
        let cavity = bow_tie(d1, d3, roc, aoi, loss);
        let nominal = cavity.book().nominal();
        prop_assume!(Eigenmode::of(&cavity, &nominal).stability() == Stability::Stable);
        let found = modes(&cavity, apart, &[]);
        for address in ["d1.length", "M3.roc", "d3.length"] {
            hold(&cavity, &found, address, apart)?;
        }
        let is_clear = found.mode_clearance.unwrap().linewidths.unwrap() >= apart;
        prop_assert!(!is_clear || found.ways_out.is_empty());
    }
}

/// A confocal cavity has a way out to either side: it is where orders 2 lie five linewidths away.
#[test]
fn a_confocal_cavity_has_ways_out() {
    let cavity = load(
        r#"
        wavelength = "780 nm"
        form = "standing"
        path = [
          { mirror = "A", roc = "50 mm", reflectance = "99.3 %" },
          { gap = "d", length = "50 mm ± 1 mm" },
          { mirror = "B", roc = "50 mm", reflectance = "99.3 %" },
        ]
        "#,
    );
    let found = modes(&cavity, APART, &[]);
    assert!(found.on_edge && found.no_answer.is_none());
    let nearest = found.mode_clearance.unwrap();
    assert_eq!((nearest.m, nearest.n), (2, 0));
    assert!(nearest.offset_hz.abs() < 1e-6 * found.fsr_hz);
    let odd = found.modes.iter().filter(|mode| mode.order % 2 == 1);
    for mode in odd {
        assert!((mode.offset_hz + 0.5 * found.fsr_hz).abs() < 1e-6 * found.fsr_hz);
    }
    let ways: Vec<f64> = found.ways_out.iter().map(|way| way.kept[1]).collect();
    assert_eq!(ways.len(), 2, "{:?}", found.ways_out);
    // ψ = 2 arccos(1 − L/R), and order 2 has an offset of 2ψ/2π.
    for (way, side) in ways.iter().zip([-1.0, 1.0]) {
        assert!((way - 0.05) * side > 0.0);
        let turns = 2.0 * (1.0 - way / 0.05).acos() / (TAU / 2.0);
        let offset = (turns - turns.round()).abs() * found.finesse.unwrap();
        assert!((offset - APART).abs() < 1e-6, "{offset}");
    }
}

/// What has no mode has no answer.
#[test]
fn no_mode_no_spectrum() {
    let pair = |roc: &str| {
        modes(
            &load(&format!(
                r#"
                wavelength = "1064 nm"
                form = "standing"
                path = [
                  {{ mirror = "A", roc = "{roc}" }},
                  {{ gap = "d", length = "1 m" }},
                  {{ mirror = "B", roc = "{roc}" }},
                ]
                "#
            )),
            APART,
            &[],
        )
    };
    for roc in ["flat", "0.4 m", "0.5 m", "-1 m"] {
        let found = pair(roc);
        assert!(found.no_answer.is_some() && found.modes.is_empty(), "{roc}");
    }
    assert!(pair("1 m").no_answer.is_none());
}
