//! Ranges of stability against dense scans of the round trip.

use modewright::analysis::eigenmode::Eigenmode;
use modewright::analysis::lengths::RoundTripLengths;
use modewright::analysis::ranges::{End, stable_range, stable_ranges};
use modewright::cavity::{Cavity, Slot};
use modewright::file;
use proptest::prelude::*;

use crate::spec::any_cavity;

fn margin(cavity: &Cavity, slot: Slot, x: f64) -> f64 {
    let mut values = cavity.book().nominal();
    values[slot.index()] = x;
    cavity.book().follow_ties(&mut values);
    Eigenmode::of(cavity, &values).margin()
}

/// Points of a scan; edges closer together than its step may escape it, never the search.
const SCAN: usize = 2000;

/// A margin below this is not told from zero by a scan.
const ROUNDING: f64 = 1e-9;

/// Checks every range of a cavity against scans inside it and around it.
fn hold(cavity: &Cavity) -> Result<(), TestCaseError> {
    let stable = Eigenmode::of(cavity, &cavity.book().nominal()).margin() > 1e-10;
    let length = RoundTripLengths::of(cavity, &cavity.book().nominal()).geometric;
    let unit = |slot: Slot| {
        let entry = cavity.book().entry(slot);
        // How far a scan goes where the search finds no edge.
        if entry.key == "length" || entry.key == "thickness" {
            10.0
        } else {
            30.0
        }
    };
    for found in stable_ranges(cavity) {
        let (slot, nominal) = (found.slot, found.nominal);
        let address = &cavity.book().entry(slot).address;
        let at = |end: End, open: f64| end.value().unwrap_or(open);
        let Some(range) = found.range else {
            // No value helps: a scan finds none either, as far as anybody would go.
            let is_length = unit(slot) == 10.0;
            let reach = 9.0 * if is_length { length } else { 1.0 / length };
            let lowest = if is_length { 0.0 } else { nominal - reach };
            for k in 0..SCAN {
                let x = lowest + (nominal + reach - lowest) * (k as f64 + 0.5) / SCAN as f64;
                prop_assert!(margin(cavity, slot, x) < ROUNDING, "{address} at {x}");
            }
            continue;
        };
        // A search for a way back ends where nobody would go; only its near end is sure.
        let open = if stable { unit(slot) } else { 0.01 };
        let low = at(range.from, at(range.to, nominal).min(nominal) - open);
        let high = at(range.to, low.max(nominal) + open);
        prop_assert!(low < high);
        if stable {
            prop_assert!(low <= nominal && nominal <= high);
        }
        for k in 0..SCAN {
            let x = low + (high - low) * (k as f64 + 0.5) / SCAN as f64;
            prop_assert!(margin(cavity, slot, x) > -ROUNDING, "{address} at {x}");
        }
        for (end, outward) in [(range.from, -1.0), (range.to, 1.0)] {
            if let End::Edge { at, touch, .. } = end {
                let step = 1e-7 * (high - low).max(at.abs());
                let beyond = margin(cavity, slot, at + outward * step);
                prop_assert!(touch || beyond < 1e-6, "{address} beyond {at}: {beyond}");
                let edge = margin(cavity, slot, at);
                let slope = (margin(cavity, slot, at - outward * step) - edge).abs() / step;
                // Solved to rounding: nothing is left but the slope times a few last bits.
                prop_assert!(
                    edge.abs() <= 1e-9 + slope * at.abs() * 1e-13,
                    "{address}: {edge}"
                );
            }
        }
        if !stable {
            // Nothing nearer helps.
            let nearest = if (low - nominal).abs() < (high - nominal).abs() {
                low
            } else {
                high
            };
            for k in 0..SCAN {
                let share = (k as f64 + 0.5) / SCAN as f64;
                let x = nominal + (nearest - nominal) * share * (1.0 - 1e-9);
                prop_assert!(margin(cavity, slot, x) < ROUNDING, "{address} at {x}");
            }
        }
    }
    Ok(())
}

proptest! {
    #![proptest_config(crate::config(120))]

    #[test]
    fn stable_cavities_have_their_edges_where_a_scan_finds_them(
        spec in any_cavity(14).prop_filter("stable", |spec| {
            let cavity = spec.cavity();
            Eigenmode::of(&cavity, &cavity.book().nominal()).margin() > 1e-3
        })
    ) {
        hold(&spec.cavity())?;
    }

    #[test]
    fn unstable_cavities_come_back_where_a_scan_says(
        spec in any_cavity(10).prop_filter("unstable", |spec| {
            let cavity = spec.cavity();
            let margin = Eigenmode::of(&cavity, &cavity.book().nominal()).margin();
            margin < -1e-3 && margin > -20.0
        })
    ) {
        hold(&spec.cavity())?;
    }
}

fn load(text: &str) -> Cavity {
    file::load("test.toml", text, &[]).unwrap().cavity
}

/// Two equal mirrors pass the confocal length without becoming unstable: 0 < g² < 1 on both sides.
#[test]
fn a_touch_ends_a_range_and_is_named() {
    let cavity = load(
        r#"
        wavelength = "1064 nm"
        form = "standing"
        path = [
          { mirror = "A", roc = "1 m" },
          { gap = "d", length = "0.7 m" },
          { mirror = "B", roc = "1 m" },
        ]
        "#,
    );
    let slot = cavity.book().find("d.length").unwrap();
    let range = stable_range(&cavity, slot).range.unwrap();
    assert!(matches!(range.to, End::Edge { at, touch: true, .. } if (at - 1.0).abs() < 1e-12));
    assert_eq!(range.from, End::Zero { at: 0.0 });
}

/// From the edge itself the range begins at once: a confocal cavity is stable a little shorter and
/// a little longer, and no change of half a metre is needed.
#[test]
fn a_range_can_begin_at_the_nominal_value() {
    let cavity = load(
        r#"
        wavelength = "1064 nm"
        form = "standing"
        path = [
          { mirror = "A", roc = "1 m" },
          { gap = "d", length = "1 m" },
          { mirror = "B", roc = "1 m" },
        ]
        "#,
    );
    let found = stable_range(&cavity, cavity.book().find("d.length").unwrap());
    let range = found.range.unwrap();
    assert!(matches!(range.from, End::Edge { at, touch: true, .. } if at == 1.0));
    assert!(matches!(range.to, End::Edge { at, touch: false, .. } if (at - 2.0).abs() < 1e-12));
    assert_eq!(found.change_needed, 0.0);
}

/// Flat is exactly flat where a range ends there, and a range that ends at no length says so.
#[test]
fn a_range_ends_at_flat_and_at_zero_exactly() {
    let cavity = load(
        r#"
        wavelength = "1064 nm"
        form = "standing"
        path = [
          { mirror = "A", roc = "flat" },
          { gap = "d", length = "0.1 m" },
          { mirror = "B", roc = "1 m" },
        ]
        "#,
    );
    let range = |address: &str| {
        let slot = cavity.book().find(address).unwrap();
        stable_range(&cavity, slot).range.unwrap()
    };
    assert!(matches!(range("B.roc").from, End::Edge { at: 0.0, .. }));
    assert_eq!(range("d.length").from, End::Zero { at: 0.0 });
}

/// The same cavity written as a ring: there the touch is a double root of the half-trace itself.
#[test]
fn a_touch_is_found_in_a_ring() {
    let cavity = load(
        r#"
        wavelength = "1064 nm"
        form = "ring"
        ties = ["back.length = d.length"]
        path = [
          { mirror = "A", roc = "1 m" },
          { gap = "d", length = "0.7 m" },
          { mirror = "B", roc = "1 m" },
          { gap = "back" },
        ]
        "#,
    );
    let slot = cavity.book().find("d.length").unwrap();
    let range = stable_range(&cavity, slot).range.unwrap();
    assert!(
        matches!(range.to, End::Edge { at, touch: true, .. } if (at - 1.0).abs() < 1e-7),
        "{range:?}"
    );
}
