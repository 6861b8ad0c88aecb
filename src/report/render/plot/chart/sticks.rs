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
const LEADER: f64 = 20.0;
/// How far aside of its head a name may stand.
const FAR: f64 = 70.0;

/// Names what finds room, and gives back how many sticks found none.
pub(super) fn name(scene: &mut Scene, occupied: &mut Occupied, placed: &Placed<'_>) -> usize {
    let mut all: Vec<Named<'_>> = placed
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

    // Side by side with those of about the same height, or with all, whichever leaves out less.
    let (mut by_height, mut together) = (occupied.clone(), occupied.clone());
    let groups = of_one_height(&all);
    let apart: Vec<Upright> = groups
        .iter()
        .flat_map(|group| upright(&mut by_height, within, group))
        .collect();
    let whole = upright(&mut together, within, &all);
    let (chosen, after) = if apart.len() >= whole.len() {
        (apart, by_height)
    } else {
        (whole, together)
    };
    *occupied = after;
    for (leader, foot, label) in &chosen {
        scene.line(leader, Ink::Grey, 0.7);
        scene.upright_text(*foot, Anchor::Start, SMALL, Ink::Black, label);
    }
    all.len() - chosen.len()
}

/// The head of a stick and its name.
type Named<'a> = ([f64; 2], &'a str);
/// A line from a head, where a name begins, and the name.
type Upright<'a> = ([[f64; 2]; 2], [f64; 2], &'a str);

/// Sticks whose names would stand at about the same height, each group from left to right.
fn of_one_height<'a>(all: &[Named<'a>]) -> Vec<Vec<Named<'a>>> {
    let mut by_height: Vec<Named<'a>> = all.to_vec();
    by_height.sort_by(|a, b| a.0[1].total_cmp(&b.0[1]));
    let mut groups: Vec<Vec<Named<'a>>> = Vec::new();
    for stick in by_height {
        match groups.last_mut() {
            Some(group) if stick.0[1] - group[0].0[1] < LEADER => group.push(stick),
            _ => groups.push(vec![stick]),
        }
    }
    for group in &mut groups {
        group.sort_by(|a, b| a.0[0].total_cmp(&b.0[0]));
    }
    groups
}

/// Names reading upwards, as many as find room.
fn upright<'a>(occupied: &mut Occupied, within: Rect, sticks: &[Named<'a>]) -> Vec<Upright<'a>> {
    let half = 0.5 * text::height(SMALL);
    let wished: Vec<f64> = sticks.iter().map(|(at, _)| at[0]).collect();
    let widths = vec![2.0 * half + 3.5; sticks.len()];
    let centres = spread(&wished, &widths, within.left, within.right);
    let mut found = Vec::new();
    for (([x, y], label), centre) in sticks.iter().zip(centres) {
        let foot = y - DOT - LEADER;
        let leader = [[*x, y - DOT - 1.0], [centre, foot + 2.0]];
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
        if occupied
            .take_clear(within, is_near.then_some(candidate))
            .is_some()
        {
            found.push((leader, [centre, foot], *label));
        }
    }
    found
}
