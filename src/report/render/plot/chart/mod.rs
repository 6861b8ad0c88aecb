//! From a chart to a page: its panels in rows, each with axes and layers of its own.

mod afar;
mod areas;
mod bars;
mod contours;
mod frame;
mod labels;
mod lines;
mod map;
mod sticks;
mod tags;

use super::page::{self, Heading, WIDTH};
use super::place::Occupied;
use super::scene::{Rect, Scene};
use crate::report::chart::{Chart, Layer, Panel};
use frame::Placed;
use tags::Tags;

/// Margin of the page, and between two columns.
const SIDE: f64 = 14.0;
const BETWEEN: f64 = 18.0;
/// Space under a row of panels.
const UNDER: f64 = 12.0;

/// The page of a chart.
pub(super) fn scene(chart: &Chart) -> Scene {
    let mut scene = Scene {
        width: WIDTH,
        ..Scene::default()
    };
    let heading = Heading {
        title: &chart.title,
        verdict: &chart.verdict,
        particulars: &chart.particulars,
        missing: &chart.missing,
        in_two_lines: true,
    };
    let mut top = heading.draw(&mut scene);
    let columns = chart.columns.clamp(1, 2);
    let mut placed = side_by_side(chart, columns);
    let mut notes = chart.notes.clone();
    let mut more = labels::Unnamed::of(chart.panels.len());
    for row in placed.chunks_mut(columns) {
        let head = row.iter().map(Placed::head).fold(0.0, f64::max);
        let height = row.iter().map(|panel| panel.height).fold(0.0, f64::max);
        let foot = row.iter().map(Placed::foot).fold(0.0, f64::max);
        for panel in row {
            panel.head_room = head;
            panel.area.top = top + head;
            panel.area.bottom = panel.area.top + panel.height;
            draw(&mut scene, panel, &mut more);
        }
        top += head + height + foot + UNDER;
    }
    notes.extend(more.notes());
    let ends = [SIDE + 6.0, WIDTH - SIDE];
    page::footing(&mut scene, top, ends, &notes);
    scene
}

/// The panels with their widths; how far down they stand is still unknown.
fn side_by_side(chart: &Chart, columns: usize) -> Vec<Placed<'_>> {
    let rows = chart.panels.len().div_ceil(columns);
    let width = (WIDTH - 2.0 * SIDE - BETWEEN * (columns - 1) as f64) / columns as f64;
    let heights: Vec<f64> = chart
        .panels
        .iter()
        .map(|panel| height(panel, columns, rows))
        .collect();
    let margins: Vec<[f64; 2]> = chart
        .panels
        .iter()
        .zip(&heights)
        .map(|(panel, height)| frame::margins(panel, width, *height))
        .collect();
    chart
        .panels
        .iter()
        .enumerate()
        .map(|(index, panel)| {
            let column = index % columns;
            // Frames in one column stand under each other.
            let margin = |side: usize| {
                let in_column = margins.iter().skip(column).step_by(columns);
                in_column.map(|margin| margin[side]).fold(0.0, f64::max)
            };
            let start = SIDE + (width + BETWEEN) * column as f64;
            let area = Rect {
                left: start + margin(0),
                right: start + width - margin(1),
                top: 0.0,
                bottom: 0.0,
            };
            let below = chart.panels.get(index + columns);
            let above = index.checked_sub(columns).map(|above| &chart.panels[above]);
            Placed {
                panel,
                area,
                height: heights[index],
                start,
                is_read_below: below.is_some_and(|below| below.x == panel.x),
                head_room: 0.0,
                tags: Tags::of(panel, above, area),
            }
        })
        .collect()
}

/// Height of a panel's frame.
fn height(panel: &Panel, columns: usize, rows: usize) -> f64 {
    if panel.y.is_none() {
        return bars::height(panel);
    }
    let has_map = panel
        .layers
        .iter()
        .any(|layer| matches!(layer, Layer::Map(_)));
    match (columns, rows, has_map) {
        (1, _, true) => 440.0,
        (_, _, true) => 320.0,
        (1, 1, _) => 400.0,
        (1, 2, _) => 250.0,
        (1, 3, _) => 200.0,
        (1, ..) => 170.0,
        (_, 1, _) => 300.0,
        (_, 2, _) => 220.0,
        _ => 160.0,
    }
}

/// One panel: areas lie beneath lines, lines beneath marks, and labels keep clear of all.
fn draw(scene: &mut Scene, placed: &Placed<'_>, unnamed: &mut labels::Unnamed) {
    scene.frames.push(placed.area);
    let mut occupied = Occupied::default();
    areas::ranges(scene, &mut occupied, placed);
    map::cells(scene, placed);
    frame::grid(scene, placed);
    areas::draw(scene, &mut occupied, placed);
    bars::draw(scene, placed);
    frame::zero(scene, placed);
    let contours = map::contours(scene, &mut occupied, placed);
    lines::draw(scene, &mut occupied, placed, unnamed);
    map::nominal(scene, &mut occupied, placed);
    frame::draw(scene, placed);
    bars::write(scene, &mut occupied, placed);
    placed.tags.draw(scene, placed, unnamed);
    if placed.is_empty() {
        frame::nothing_to_draw(scene, placed);
        return;
    }
    labels::write(scene, &mut occupied, placed, &contours, unnamed);
}
