//! The modes as a picture: a stick for every mode over one free spectral range.

use super::{is_clear, name, verdict_line, wanted};
use crate::analysis::modes::{Mode, Modes, SURVIVES};
use crate::analysis::spectrum;
use crate::report::chart::{Across, Chart, Layer, Meaning, Panel, Range, Reference, Stick};
use crate::report::describe::measured::frequency;
use crate::report::figure::{Axis, Stroke};
use crate::report::number::{FREQUENCIES, NUMBERS, common, plain, significant};

/// Orders whose sticks are named.
const NAMED: usize = 12;
/// Modes of one order nearer to each other than this, in free spectral ranges, are one stick.
const TOGETHER: f64 = 2e-4;

/// The spectrum of an analysis that has an answer.
pub fn describe(modes: &Modes) -> Chart {
    let half = 0.5 * modes.fsr_hz;
    let mut layers = vec![Layer::Range(Range {
        from: -modes.apart_hz.min(half),
        to: modes.apart_hz.min(half),
        label: format!("within {}", wanted(modes)),
    })];
    for sideband in &modes.sidebands {
        let sign = if sideband.sideband_hz > 0.0 {
            "+"
        } else {
            "−"
        };
        layers.push(Layer::Reference(Reference {
            across: Across::X,
            at: spectrum::in_one_range(sideband.sideband_hz / modes.fsr_hz) * modes.fsr_hz,
            meaning: Meaning::Guide,
            label: format!("{sign}{}", written(sideband.sideband_hz.abs())),
        }));
    }
    layers.push(Layer::Sticks(sticks(modes)));
    let word = if is_clear(modes) {
        "clear"
    } else {
        "not clear"
    };
    let finesse = match (modes.finesse, modes.linewidth_hz) {
        (Some(finesse), Some(linewidth)) => format!(
            ", finesse {}, linewidth {}",
            significant(finesse, 4),
            frequency(linewidth)
        ),
        _ => String::new(),
    };
    let title = modes.title.clone();
    Chart {
        title: title.unwrap_or_else(|| "Transverse modes".into()),
        verdict: match &modes.no_answer {
            Some(why) => format!("no spectrum: {why}"),
            None => format!("{word}: {}", verdict_line(modes)),
        },
        particulars: format!(
            "{} cavity, {} nm, FSR {}{finesse}",
            modes.form,
            plain(modes.wavelength_m * 1e9, 6),
            frequency(modes.fsr_hz),
        ),
        columns: 1,
        panels: vec![Panel {
            heading: String::new(),
            x: Axis::between("above the fundamental", -half, half, &FREQUENCIES),
            y: Some(Axis::between(
                "height, less for higher orders",
                0.0,
                1.2,
                &NUMBERS,
            )),
            layers,
        }],
        missing: modes.no_answer.iter().cloned().collect(),
        notes: notes(modes),
    }
}

/// A frequency that somebody wrote, without zeros at the end.
fn written(hertz: f64) -> String {
    let scale = common([hertz], &FREQUENCIES, 1.0);
    format!("{} {}", plain(hertz / scale.size, 6), scale.symbol)
}

fn sticks(modes: &Modes) -> Vec<Stick> {
    let height = |order: usize| 1.0 - 0.85 * order as f64 / (modes.highest_order as f64 + 1.0);
    let mut sticks = vec![Stick {
        at: 0.0,
        height: height(0),
        stroke: Stroke::Solid,
        label: "0".into(),
    }];
    let nearest = modes.mode_clearance.as_ref();
    let is_nearest = |mode: &Mode| nearest.is_some_and(|at| (at.m, at.n) == (mode.m, mode.n));
    let mut drawn: Vec<(usize, f64)> = Vec::new();
    for mode in &modes.modes {
        let is_drawn = drawn
            .iter()
            .rev()
            .take_while(|(order, _)| *order == mode.order)
            .any(|(_, at)| (at - mode.offset_hz).abs() < TOGETHER * modes.fsr_hz);
        if is_drawn {
            continue;
        }
        let is_first = drawn.last().is_none_or(|(order, _)| *order != mode.order);
        drawn.push((mode.order, mode.offset_hz));
        let lost = mode.clip_loss.is_some_and(|loss| loss > SURVIVES);
        sticks.push(Stick {
            at: mode.offset_hz,
            height: height(mode.order),
            stroke: if lost { Stroke::Dotted } else { Stroke::Solid },
            label: if mode.offset_hz.abs() < modes.apart_hz || is_nearest(mode) {
                name(mode.m, mode.n)
            } else if is_first && mode.order <= NAMED {
                mode.order.to_string()
            } else {
                String::new()
            },
        });
    }
    sticks
}

fn notes(modes: &Modes) -> Vec<String> {
    let mut notes = vec![
        "numbers are the orders m + n, each written at its TEM_m0; modes that are near are named"
            .into(),
    ];
    let is_lost = |loss: Option<f64>| loss.is_some_and(|loss| loss > SURVIVES);
    if modes.modes.iter().any(|mode| is_lost(mode.clip_loss)) {
        notes.push("dotted: more than 10 % lost in a round trip by clipping".into());
    }
    if !modes.sidebands.is_empty() {
        notes.push("upright lines: sidebands".into());
    }
    notes
}
