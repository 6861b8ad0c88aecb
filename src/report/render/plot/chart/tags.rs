//! Labels of upright reference lines: over the frame, where they hide nothing.

use super::frame::{self, Placed};
use super::labels::Unnamed;
use super::lines;
use crate::report::chart::{Across, Layer, Meaning, Panel};
use crate::report::render::plot::page::SMALL;
use crate::report::render::plot::scene::{Anchor, Ink, Rect, Scene};
use crate::report::render::plot::spread::spread;
use crate::report::render::plot::text;

/// Space between two labels, and beside a line that passes between them.
const APART: f64 = 10.0;
/// How far from its end a line meets a label at the least.
const WITHIN: f64 = 6.0;
const PASSING: f64 = 8.0;
/// How far a label may stand from its line before another row is begun.
const FAR: f64 = 30.0;
/// The same where another label would have to be left out.
const FARTHEST: f64 = 75.0;
/// Height of a row, and of the lines between the frame and the lowest.
const ROW: f64 = 15.0;
const LEADERS: f64 = 9.0;
const MOST_ROWS: usize = 3;
/// Longest label, as a share of the frame's width.
const LONGEST: f64 = 0.6;

/// The labels at their places.
#[derive(Default)]
pub(super) struct Tags {
    labels: Vec<Label>,
    /// Labels for which there is no room.
    left_out: Vec<String>,
    /// Height of all rows.
    pub height: f64,
}

struct Label {
    text: String,
    ink: Ink,
    /// Where its line stands.
    at: f64,
    /// The row, from the lowest.
    row: usize,
    /// Where its middle stands.
    centre: f64,
    /// Where its line passes each row below its own, and meets the label.
    through: Vec<f64>,
}

impl Label {
    /// How far aside its line goes.
    fn detour(&self) -> f64 {
        let from = std::iter::once(&self.at).chain(&self.through);
        let steps = from.zip(&self.through);
        steps.map(|(from, to)| (to - from).abs()).sum()
    }

    /// Where its line passes a row, or meets the label at the place nearest to it.
    fn foot(&self, row: usize, centre: f64) -> f64 {
        if row < self.row {
            return centre;
        }
        let before = self.through.last().copied().unwrap_or(self.at);
        let half = (0.5 * text::length(&self.text, SMALL) - WITHIN).max(0.0);
        before.clamp(centre - half, centre + half)
    }
}

impl Tags {
    /// Arranges the labels over a frame, of which only left and right are looked at. What is
    /// labelled at the same place of the panel above is not labelled again.
    pub(super) fn of(panel: &Panel, above: Option<&Panel>, area: Rect) -> Tags {
        let above = above.filter(|above| above.x == panel.x);
        let is_labelled_above =
            |layer: &Layer| above.is_some_and(|above| above.layers.contains(layer));
        let mut found: Vec<(f64, String, Meaning)> = panel
            .layers
            .iter()
            .filter(|layer| !is_labelled_above(layer))
            .filter_map(|layer| match layer {
                Layer::Reference(line) if line.across == Across::X && !line.label.is_empty() => {
                    let share = frame::along(&panel.x, line.at);
                    let x = frame::x_in(area, &panel.x, line.at);
                    let longest = LONGEST * (area.right - area.left);
                    (0.0..=1.0).contains(&share).then(|| {
                        let label = text::shortened(&line.label, SMALL, longest);
                        (x, label, line.meaning)
                    })
                }
                _ => None,
            })
            .collect();
        if found.is_empty() {
            return Tags::default();
        }
        found.sort_by(|a, b| a.0.total_cmp(&b.0));
        let mut left_out = Vec::new();
        let bounds = [area.left - 10.0, area.right + 10.0];
        loop {
            let near = (1..=MOST_ROWS).map(|rows| (rows, FAR));
            let far = (1..=MOST_ROWS).map(|rows| (rows, FARTHEST));
            for (rows, far) in near.chain(far) {
                let ways = assignments(found.len(), rows);
                let arranged = ways
                    .iter()
                    .filter_map(|rows| arranged(&found, rows, far, bounds));
                let way = |labels: &Vec<Label>| labels.iter().map(Label::detour).sum::<f64>();
                if let Some(labels) = arranged.min_by(|a, b| way(a).total_cmp(&way(b))) {
                    return Tags {
                        height: rows as f64 * ROW + LEADERS,
                        labels,
                        left_out,
                    };
                }
            }
            // Quantiles are missed less than limits.
            let least = least_missed(&found);
            left_out.push(found.remove(least).1);
        }
    }

    /// Draws the labels and their lines down to the frame.
    pub(super) fn draw(&self, scene: &mut Scene, placed: &Placed<'_>, unnamed: &mut Unnamed) {
        let top = placed.area.top;
        for label in &self.labels {
            let height = |row: usize| top - LEADERS - ROW * row as f64;
            let mut leader = vec![[label.at, top]];
            for (row, x) in label.through.iter().enumerate() {
                leader.push([*x, height(row)]);
                if row < label.row {
                    leader.push([*x, height(row + 1)]);
                }
            }
            scene.line(&leader, Ink::Grey, 0.7);
            let at = [label.centre, height(label.row) - 0.5 * ROW];
            scene.text(at, Anchor::Middle, SMALL, label.ink, &label.text);
        }
        for label in &self.left_out {
            unnamed.line(label, placed);
        }
    }
}

/// The label without which the others have the most room: a quantile rather than a limit.
fn least_missed(found: &[(f64, String, Meaning)]) -> usize {
    let room = |index: usize| {
        let before = index
            .checked_sub(1)
            .map_or(f64::NEG_INFINITY, |i| found[i].0);
        let after = found.get(index + 1).map_or(f64::INFINITY, |next| next.0);
        after - before
    };
    let has_guides = found.iter().any(|label| label.2 == Meaning::Guide);
    (0..found.len())
        .filter(|index| !has_guides || found[*index].2 == Meaning::Guide)
        .min_by(|a, b| room(*a).total_cmp(&room(*b)))
        .unwrap_or(0)
}

/// In which row each of so many labels may stand: in turn, or all but one in the lowest.
fn assignments(count: usize, rows: usize) -> Vec<Vec<usize>> {
    let mut ways: Vec<Vec<usize>> = (0..rows)
        .map(|first| (0..count).map(|index| (index + first) % rows).collect())
        .collect();
    if rows == 2 {
        ways.extend((0..count).map(|top| (0..count).map(|i| usize::from(i == top)).collect()));
    }
    ways
}

/// The labels in their rows, where they fit.
///
/// From the lowest row up: labels of higher rows need only room for their line to pass.
fn arranged(
    found: &[(f64, String, Meaning)],
    rows: &[usize],
    far: f64,
    [from, to]: [f64; 2],
) -> Option<Vec<Label>> {
    let mut labels: Vec<Label> = found
        .iter()
        .enumerate()
        .map(|(index, (at, text, meaning))| Label {
            text: text.clone(),
            ink: lines::label_ink(*meaning),
            at: *at,
            row: rows[index],
            centre: *at,
            through: Vec::new(),
        })
        .collect();
    for row in 0..=rows.iter().copied().max().unwrap_or(0) {
        let mut here: Vec<&mut Label> = labels.iter_mut().filter(|l| l.row >= row).collect();
        let wished: Vec<f64> = here
            .iter()
            .map(|label| label.through.last().copied().unwrap_or(label.at))
            .collect();
        let widths: Vec<f64> = here
            .iter()
            .map(|label| {
                if label.row == row {
                    text::length(&label.text, SMALL) + APART
                } else {
                    PASSING
                }
            })
            .collect();
        let centres = spread(&wished, &widths, from, to);
        let fits = widths.iter().sum::<f64>() <= to - from;
        let is_near = here
            .iter()
            .zip(&centres)
            .all(|(label, centre)| (label.foot(row, *centre) - label.at).abs() <= far);
        if !fits || !(is_near || found.len() == 1) {
            return None;
        }
        for (label, centre) in here.iter_mut().zip(centres) {
            label.centre = centre;
            let foot = label.foot(row, centre);
            label.through.push(foot);
        }
    }
    Some(labels)
}
