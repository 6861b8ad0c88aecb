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
const PASSING: f64 = 8.0;
/// How far a label may stand from its line before another row is begun.
const FAR: f64 = 55.0;
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
    /// Where its line passes each row up to its own, in which its middle stands.
    through: Vec<f64>,
}

impl Tags {
    /// Arranges the labels over a frame, of which only left and right are looked at.
    pub(super) fn of(panel: &Panel, area: Rect) -> Tags {
        let mut found: Vec<(f64, String, Meaning)> = panel
            .layers
            .iter()
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
            for rows in 1..=MOST_ROWS {
                if let Some(labels) = arranged(&found, rows, bounds) {
                    return Tags {
                        height: rows as f64 * ROW + LEADERS,
                        labels,
                        left_out,
                    };
                }
            }
            // Quantiles are missed less than limits.
            let least = found
                .iter()
                .rposition(|(_, _, meaning)| *meaning == Meaning::Guide)
                .unwrap_or(found.len() - 1);
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
            let x = label.through.last().copied().unwrap_or(label.at);
            let at = [x, height(label.row) - 0.5 * ROW];
            scene.text(at, Anchor::Middle, SMALL, label.ink, &label.text);
        }
        for label in &self.left_out {
            unnamed.note(format!(
                "a line without its label, for want of room: {label}"
            ));
        }
    }
}

/// The labels in so many rows, where they fit.
///
/// From the lowest row up: labels of higher rows need only room for their line to pass.
fn arranged(
    found: &[(f64, String, Meaning)],
    rows: usize,
    [from, to]: [f64; 2],
) -> Option<Vec<Label>> {
    let mut labels: Vec<Label> = found
        .iter()
        .enumerate()
        .map(|(index, (at, text, meaning))| Label {
            text: text.clone(),
            ink: lines::label_ink(*meaning),
            at: *at,
            row: index % rows,
            through: Vec::new(),
        })
        .collect();
    for row in 0..rows {
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
            .all(|(label, centre)| (label.at - centre).abs() <= FAR);
        let is_last_resort = rows == MOST_ROWS;
        if !fits || !(is_near || is_last_resort) {
            return None;
        }
        for (label, centre) in here.iter_mut().zip(centres) {
            label.through.push(centre);
        }
    }
    Some(labels)
}
