//! Ranges of stability within a sweep against dense scans of the same way.

use modewright::cavity::{Cavity, Measure, Origin, Slot};
use modewright::file;
use modewright::study::sweep::{Options, Sweep, Vary, sweep};
use proptest::prelude::*;
use proptest::strategy::ValueTree;
use proptest::test_runner::TestRunner;

use crate::spec::any_cavity;

/// Points of a scan.
const SCAN: usize = 100_000;
/// Cavities that are scanned.
const CAVITIES: usize = 200;
/// A margin within this of zero is not told from zero by a scan.
const ROUNDING: f64 = 1e-9;

fn swept(cavity: &Cavity, slot: Slot, from: f64, to: f64, points: usize) -> Sweep {
    let options = Options {
        vary: vec![Vary {
            slot,
            from,
            to,
            nominal: None,
        }],
        points: Some(points),
        measures: vec![("margin".into(), Measure::Margin(None))],
    };
    sweep(cavity, &options).unwrap()
}

/// Every point of the scan lies in a range if it is stable, and in none if it is not.
fn hold(found: &Sweep) {
    let varied = &found.vary[0];
    let ranges = found.stable_ranges.as_ref().unwrap();
    let margins = &found.measures.get("margin").unwrap().values;
    let span = (varied.kept[0] - varied.kept[varied.kept.len() - 1]).abs();
    for (x, margin) in varied.kept.iter().zip(margins) {
        // A lens spread over no thickness at all has no margin.
        let Some(margin) = *margin else { continue };
        let near = 1e-9 * span;
        let is_within = |room: f64| {
            let holds = |ends: [f64; 2]| ends[0] - room <= *x && *x <= ends[1] + room;
            ranges.iter().any(|range| holds(range.ends))
        };
        let address = &varied.quantity;
        if margin > ROUNDING {
            assert!(
                is_within(near),
                "{address} = {x}: missed, margin {margin}, {ranges:?}"
            );
        }
        if margin < -ROUNDING {
            assert!(
                !is_within(-near),
                "{address} = {x}: margin {margin}, {ranges:?}"
            );
        }
    }
    for pair in ranges.windows(2) {
        assert!(pair[0].ends[1] <= pair[1].ends[0], "{pair:?}");
    }
}

/// No range is missed: 200 random cavities, a quantity of each swept far beyond its design.
#[test]
fn no_range_is_missed_against_scans_of_100_000_points() {
    let mut runner = TestRunner::new(crate::config(1));
    let mut several = 0;
    for index in 0..CAVITIES {
        let cavity = any_cavity(12)
            .new_tree(&mut runner)
            .unwrap()
            .current()
            .cavity();
        let movable: Vec<(Slot, f64, bool)> = cavity
            .book()
            .iter()
            .filter(|(slot, entry)| {
                entry.shapes_the_mode()
                    && entry.origin == Origin::Written
                    && cavity.moves_rays(*slot)
            })
            .map(|(slot, entry)| {
                let is_size = matches!(entry.key, "length" | "thickness");
                (slot, entry.value, is_size)
            })
            .collect();
        let (slot, nominal, is_size) = movable[index % movable.len()];
        let (from, to) = if is_size {
            (0.0, 4.0 * nominal + 1.0)
        } else {
            (nominal - 12.0, nominal + 12.0)
        };
        let found = swept(&cavity, slot, from, to, SCAN);
        several += usize::from(found.stable_ranges.as_ref().unwrap().len() > 1);
        hold(&found);
    }
    assert!(several > 10, "{several} sweeps with more than one range");
}

fn load(text: &str) -> Cavity {
    file::load("test.toml", text, &[]).unwrap().cavity
}

/// Two mirrors are stable for 0 < g₁g₂ < 1: a touch at the confocal length, an edge at the
/// concentric one, which is the end of the sweep too.
#[test]
fn touches_part_ranges_and_ends_of_the_sweep_may_be_edges() {
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
    let found = swept(&cavity, slot, 0.5, 2.0, 11);
    let ranges = found.stable_ranges.unwrap();
    assert_eq!(ranges.len(), 2, "{ranges:?}");
    assert_eq!(ranges[0].from, Some(0.5));
    assert!(!ranges[0].from_is_edge);
    assert!(ranges[0].to_is_touch && ranges[1].from_is_touch);
    assert!((ranges[0].to.unwrap() - 1.0).abs() < 1e-12);
    assert!((ranges[1].to.unwrap() - 2.0).abs() < 1e-12);
    assert!(ranges[1].to_is_edge && !ranges[1].to_is_touch);
    // The other way round it is the same.
    let back = swept(&cavity, slot, 2.0, 0.5, 11);
    assert_eq!(back.vary[0].values[0], Some(0.5));
    assert_eq!(back.stable_ranges.unwrap().len(), 2);
    // From an edge: a cavity without length.
    let from_zero = swept(&cavity, slot, 0.0, 0.5, 11).stable_ranges.unwrap();
    assert_eq!(from_zero.len(), 1);
    assert!(from_zero[0].from_is_edge && !from_zero[0].to_is_edge);
}

/// A range far narrower than the grid is found between its points: in arms of kilometres a lens
/// of the wrong power is forgiven over almost nothing.
#[test]
fn a_narrow_range_is_found_between_points() {
    let cavity = load(
        r#"
        wavelength = "1064 nm"
        form = "standing"
        path = [
          { mirror = "A", roc = "100 mm" },
          { gap = "d", length = "120.5 mm" },
          { lens = "L", focal = "20 mm" },
          { gap = "e", length = "2 m" },
          { mirror = "B", roc = "flat" },
        ]
        "#,
    );
    let slot = cavity.book().find("d.length").unwrap();
    let found = swept(&cavity, slot, 0.0, 1.0, 11);
    let ranges = found.stable_ranges.as_ref().unwrap();
    assert!(!ranges.is_empty());
    assert!(
        ranges
            .iter()
            .all(|range| range.ends[1] - range.ends[0] < 0.02),
        "{ranges:?}"
    );
    assert!(found.has_stable);
    hold(&swept(&cavity, slot, 0.0, 1.0, SCAN));
}
