//! Many cavities at a time give what each gives alone, for arbitrary structures, varied numbers and
//! measures.

use modewright::analysis::measures::{Evaluator, Workspace};
use modewright::cavity::{Cavity, Measure, Slot};
use modewright::numeric::{LANES, Lanes, Real};
use proptest::prelude::*;

use crate::spec::any_cavity;

fn measures(cavity: &Cavity) -> Vec<Measure> {
    let mut names = vec![
        "margin".to_string(),
        "half_trace.tangential".into(),
        "gouy.tangential".into(),
        "gouy.sagittal".into(),
        "round_trip_length".into(),
        "fsr".into(),
        "finesse".into(),
        "lifetime".into(),
        "spacing.sagittal".into(),
        "mode_clearance".into(),
        "suppression.7".into(),
    ];
    for part in cavity.parts() {
        names.push(format!("{}.spot", part.name));
        names.push(format!("{}.aspect", part.name));
        match part.kind() {
            "gap" => names.push(format!("{}.waist_at.sagittal", part.name)),
            "slab" | "duct" => names.push(format!("{}.least", part.name)),
            _ => {}
        }
    }
    names
        .iter()
        .map(|name| Measure::parse(name, cavity).unwrap())
        .collect()
}

/// Relative difference that another order of the same roundings can make, before it is multiplied by
/// what the cavity's margin does to rounding.
const ROUNDING: f64 = 1e-12;

proptest! {
    #![proptest_config(crate::config(300))]

    #[test]
    fn lanes_agree_with_single_cavities(
        spec in any_cavity(12),
        picks in proptest::collection::vec(any::<prop::sample::Index>(), 1..5),
        moves in proptest::collection::vec(-0.02..0.02_f64, LANES),
    ) {
        // A loss everywhere, so that there is a finesse.
        let text = spec.text().replace("mirror = ", "loss = \"0.3 %\", mirror = ");
        let cavity = modewright::file::load("random.toml", &text, &[]).unwrap().cavity;
        let movable: Vec<Slot> = cavity
            .book()
            .iter()
            .filter(|(_, entry)| entry.part.is_some() && entry.value != 0.0)
            .map(|(slot, _)| slot)
            .collect();
        let varied: Vec<Slot> = picks.iter().map(|pick| movable[pick.index(movable.len())]).collect();
        let measures = measures(&cavity);
        let nominal = cavity.book().nominal();
        let at = |lane: usize| {
            let mut values = nominal.clone();
            for (k, slot) in varied.iter().enumerate() {
                values[slot.index()] = nominal[slot.index()] * (1.0 + moves[(lane + k) % LANES]);
            }
            values
        };
        let mut lanes: Vec<Lanes> = nominal.iter().map(|&v| Lanes::constant(v)).collect();
        for slot in &varied {
            lanes[slot.index()] = Lanes(std::array::from_fn(|lane| at(lane)[slot.index()]));
        }
        let prepared = Evaluator::new(&cavity, measures.clone()).varying(&varied);
        let mut together = Vec::new();
        prepared.evaluate(&lanes, &mut Workspace::default(), |_, value, exists| {
            together.push((value, exists));
        });
        let alone = Evaluator::new(&cavity, measures);
        for lane in 0..LANES {
            let mut margin = 0.0;
            let mut failed = None;
            alone.evaluate(&at(lane), &mut Workspace::default(), |index, value: f64, exists| {
                if index == 0 {
                    margin = value;
                }
                let (found, found_exists) = (together[index].0.0[lane], together[index].1.holds(lane));
                if exists != found_exists {
                    failed = Some((index, value, found));
                    return;
                }
                if !exists {
                    return;
                }
                let size = match alone.measures()[index] {
                    // A margin and a half-trace near zero are differences of larger numbers, and a
                    // waist may lie at the start.
                    Measure::Margin(_) | Measure::HalfTrace(_) => value.abs().max(1.0),
                    Measure::WaistAt(..) => value.abs().max(1.0),
                    Measure::ModeClearance { .. } => value.abs().max(1000.0),
                    // Angles times a free spectral range, or a coefficient of finesse.
                    Measure::Spacing(_) => value.abs().max(1e10),
                    Measure::Suppression { .. } => value.abs().max(1e6),
                    _ => value.abs(),
                };
                let allowed = ROUNDING * size * (1.0 + 1.0 / margin.abs());
                if (value - found).abs() > allowed {
                    failed = Some((index, value, found));
                }
            });
            // On the very edge a last bit decides whether there is a mode.
            if margin.abs() > 1e-8 {
                prop_assert!(failed.is_none(), "lane {lane}: {:?} {failed:?} margin {margin}",
                    failed.map(|(index, ..)| alone.measures()[index]));
            }
        }
    }
}
