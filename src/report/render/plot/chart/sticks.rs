//! Names of the lines of a spectrum: over their heads, or reading upwards where they crowd, each
//! with a line to its head.

use super::frame::Placed;
use super::lines::is_within;
use crate::report::chart::Layer;
use crate::report::render::plot::curves::DOT;
use crate::report::render::plot::page::SMALL;
use crate::report::render::plot::place::{Candidate, Occupied};
use crate::report::render::plot::scene::{Anchor, Ink, Rect, Scene};
use crate::report::render::plot::spread::spread;
use crate::report::render::plot::text;

/// Length of the lines from heads to names that read upwards.
const LEADER: f64 = 14.0;
/// How far aside of its head a name may stand.
const FAR: f64 = 70.0;

/// Names what finds room, and gives back how many sticks found none.
pub(super) fn name(scene: &mut Scene, occupied: &mut Occupied, placed: &Placed<'_>) -> usize {
    let mut all: Vec<([f64; 2], &str)> = placed
        .panel
        .layers
        .iter()
        .flat_map(|layer| match layer {
            Layer::Sticks(sticks) => sticks.as_slice(),
            _ => &[],
        })
        .filter(|stick| !stick.label.is_empty())
        .map(|stick| (placed.point([stick.at, stick.height]), stick.label.as_str()))
        .filter(|(at, _)| is_within(placed.area, *at))
        .collect();
    all.sort_by(|a, b| a.0[0].total_cmp(&b.0[0]));
    let within = placed.area.grown(-1.0);

    // All of them flat, or none: names that read in two ways seem to mean two things.
    let mut after = occupied.clone();
    let flat: Option<Vec<Rect>> = all
        .iter()
        .map(|([x, y], label)| {
            let over = [*x, y - DOT - 2.0 - 0.5 * text::height(SMALL)];
            let area = text::place(over, Anchor::Middle, false, SMALL, label);
            let candidate = Candidate { area, leader: None };
            after
                .take_clear(within, [candidate])
                .map(|chosen| chosen.area)
        })
        .collect();
    if let Some(areas) = flat {
        *occupied = after;
        for (area, (_, label)) in areas.iter().zip(&all) {
            let middle = [
                0.5 * (area.left + area.right),
                0.5 * (area.top + area.bottom),
            ];
            scene.text(middle, Anchor::Middle, SMALL, Ink::Black, label);
        }
        return 0;
    }

    let half = 0.5 * text::height(SMALL);
    let wished: Vec<f64> = all.iter().map(|(at, _)| at[0]).collect();
    let widths = vec![2.0 * half + 3.5; all.len()];
    let centres = spread(&wished, &widths, within.left, within.right);
    let mut unnamed = 0;
    for (([x, y], label), centre) in all.into_iter().zip(centres) {
        // A little down at their heads, so that lines side by side do not cross.
        let foot = y - DOT - LEADER;
        let leader = [[x, y - DOT - 1.0], [centre, foot + 2.0]];
        let candidate = Candidate {
            area: Rect {
                left: centre - half,
                right: centre + half,
                top: foot - text::length(label, SMALL),
                bottom: foot,
            },
            leader: Some(leader),
        };
        let is_near = (centre - x).abs() <= FAR;
        match occupied.take_clear(within, is_near.then_some(candidate)) {
            Some(_) => {
                scene.line(&leader, Ink::Grey, 0.7);
                scene.upright_text([centre, foot], Anchor::Start, SMALL, Ink::Black, label);
            }
            None => unnamed += 1,
        }
    }
    unnamed
}
