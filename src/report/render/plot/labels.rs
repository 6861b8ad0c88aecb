//! The names of the optics above their row: side by side where they have room, reading upwards
//! where they have not, each with a line to its optic.

use super::scene::{Anchor, Ink, Scene};
use super::spread::spread;
use super::text;
use crate::report::figure::Symbol;

/// Letters of a name, and of what is written with it.
const NAME: f64 = 12.5;
const VALUE: f64 = 10.5;
/// Space between neighbours, side by side and reading upwards.
const APART: f64 = 12.0;
const APART_UPRIGHT: f64 = 3.0;
/// How far a label may stand from its optic before all are turned upright.
const FAR: f64 = 70.0;
/// Height of the lines between labels and optics.
const LEADERS: f64 = 22.0;
/// Longest name.
const LONGEST_NAME: f64 = 200.0;

/// Names and where their optics are, and how all of them are written.
pub(super) struct Band {
    labels: Vec<Label>,
    upright: bool,
    /// Height of the band, lines to the optics included.
    pub height: f64,
}

struct Label {
    name: String,
    value: String,
    at: f64,
    centre: f64,
}

/// Least width in which so many names can stand upright.
pub(super) fn least_width(count: usize) -> f64 {
    count as f64 * (text::height(NAME) + APART_UPRIGHT)
}

impl Band {
    /// Arranges the names of optics that stand at the given places, in order.
    pub(super) fn of(symbols: &[(&Symbol, f64)], from: f64, to: f64) -> Band {
        let mut labels: Vec<Label> = symbols
            .iter()
            .map(|(symbol, at)| Label {
                name: text::shortened(&symbol.name, NAME, LONGEST_NAME),
                value: symbol.value.clone(),
                at: *at,
                centre: *at,
            })
            .collect();
        labels.sort_by(|a, b| a.at.total_cmp(&b.at));
        let wished: Vec<f64> = labels.iter().map(|label| label.at).collect();
        let widths: Vec<f64> = labels
            .iter()
            .map(|label| {
                let (name, value) = (
                    text::length(&label.name, NAME),
                    text::length(&label.value, VALUE),
                );
                name.max(value) + APART
            })
            .collect();
        let flat = spread(&wished, &widths, from, to);
        let fits = widths.iter().sum::<f64>() <= to - from;
        let near = wished.iter().zip(&flat).all(|(a, b)| (a - b).abs() <= FAR);
        let upright = !(fits && near);
        let centres = if upright {
            let width = text::height(NAME) + APART_UPRIGHT;
            spread(&wished, &vec![width; labels.len()], from, to)
        } else {
            flat
        };
        for (label, centre) in labels.iter_mut().zip(centres) {
            label.centre = centre;
        }
        let letters = if upright {
            labels.iter().map(Label::length).fold(0.0, f64::max)
        } else {
            text::height(NAME) + text::height(VALUE)
        };
        Band {
            labels,
            upright,
            height: letters + LEADERS + 4.0,
        }
    }

    /// Draws the band; `bottom` is where the optics begin.
    pub(super) fn draw(&self, scene: &mut Scene, bottom: f64) {
        let foot = bottom - LEADERS;
        for label in &self.labels {
            let x = label.centre;
            let leader = [[x, foot + 3.0], [x, foot + 6.0], [label.at, bottom - 2.0]];
            scene.line(&leader, Ink::Grey, 0.7);
            if self.upright {
                let name = [x, foot];
                scene.upright_text(name, Anchor::Start, NAME, Ink::Black, &label.name);
                if !label.value.is_empty() {
                    let value = [x, foot - text::length(&label.name, NAME) - 8.0];
                    scene.upright_text(value, Anchor::Start, VALUE, Ink::Grey, &label.value);
                }
                continue;
            }
            let value = foot - 0.5 * text::height(VALUE);
            let name = foot - text::height(VALUE) - 0.5 * text::height(NAME);
            scene.text([x, name], Anchor::Middle, NAME, Ink::Black, &label.name);
            if !label.value.is_empty() {
                scene.text([x, value], Anchor::Middle, VALUE, Ink::Grey, &label.value);
            }
        }
    }
}

impl Label {
    fn length(&self) -> f64 {
        text::length(&self.name, NAME) + 8.0 + text::length(&self.value, VALUE)
    }
}
