//! The physics is written once, over a number type: with a dual number it gives the same values as
//! with f64, and derivatives that agree with differences.

use modewright::analysis::measures::{Evaluator, Workspace, value as value_of};
use modewright::cavity::{Cavity, Measure};
use modewright::numeric::Dual;
use proptest::prelude::*;

use crate::spec::any_cavity;

fn measures(cavity: &Cavity) -> Vec<Measure> {
    let mut names = vec![
        "margin".to_string(),
        "half_trace.tangential".into(),
        "half_trace.sagittal".into(),
        "gouy.tangential".into(),
        "round_trip_length".into(),
        "fsr".into(),
    ];
    for part in cavity.parts() {
        names.push(format!("{}.spot", part.name));
        names.push(format!("{}.aspect", part.name));
        if part.kind() == "gap" {
            names.push(format!("{}.waist.sagittal", part.name));
            names.push(format!("{}.waist_at", part.name));
        }
        if part.kind() == "slab" {
            names.push(format!("{}.least", part.name));
        }
    }
    names
        .iter()
        .map(|name| Measure::parse(name, cavity).unwrap())
        .collect()
}

/// Step of the central differences, as a share of the number; the mode of a cavity with a margin
/// above 0.05 is smooth over it.
const STEP: f64 = 1e-5;

proptest! {
    #![proptest_config(crate::config(100))]

    #[test]
    fn dual_numbers_agree_with_plain_ones(
        spec in any_cavity(10).prop_filter("stable", |spec| {
            let cavity = spec.cavity();
                        value_of(&cavity, &cavity.book().nominal(), Measure::Margin(None)).unwrap() > 0.05
        }),
        which in any::<prop::sample::Index>(),
    ) {
        let cavity = spec.cavity();
        let nominal = cavity.book().nominal();
        let movable: Vec<_> = cavity
            .book()
            .iter()
            .filter(|(slot, entry)| {
                entry.shapes_the_mode() && cavity.moves_rays(*slot) && entry.value != 0.0
            })
            .map(|(slot, _)| slot)
            .collect();
        let slot = movable[which.index(movable.len())];
        let mut duals: Vec<Dual<f64>> = nominal.iter().map(|&v| Dual::fixed(v)).collect();
        duals[slot.index()] = Dual::variable(nominal[slot.index()]);
        let evaluator = Evaluator::new(&cavity, measures(&cavity));
        let at = |values: &[f64]| {
            let mut found = Vec::new();
            evaluator.evaluate(values, &mut Workspace::default(), |_, value: f64, exists| {
                found.push(exists.then_some(value));
            });
            found
        };
        let mut with_slopes = Vec::new();
        evaluator.evaluate(&duals, &mut Workspace::default(), |_, value, exists| {
            with_slopes.push((value, exists));
        });
        let step = STEP * slot.of(&nominal).abs();
        let moved = |by: f64| {
            let mut values = nominal.clone();
            values[slot.index()] += by;
            at(&values)
        };
        let (plain, low, high) = (at(&nominal), moved(-step), moved(step));
        for (index, measure) in evaluator.measures().iter().enumerate() {
            let value = plain[index].unwrap();
            let (with_slope, exists) = with_slopes[index];
            prop_assert!(exists);
            prop_assert_eq!(with_slope.value, value);
            let (Some(low), Some(high)) = (low[index], high[index]) else {
                continue;
            };
            // A measure that is the lesser of two has a kink; a difference across it is no slope.
            let (left, right) = ((value - low) / step, (high - value) / step);
            let size = left.abs().max(right.abs()) + 1e-4 * value.abs() / slot.of(&nominal).abs();
            if (left - right).abs() < 1e-2 * size {
                let slope = (high - low) / (2.0 * step);
                prop_assert!(
                    (with_slope.slope - slope).abs() <= 1e-4 * size + 1e-9 * value.abs() / step,
                    "{measure:?}: {} against {slope}", with_slope.slope
                );
            }
        }
    }
}
