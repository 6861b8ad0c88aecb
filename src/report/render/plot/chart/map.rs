//! A value over both axes: its colours, their bar, lines of one value, the place as designed.

use super::contours;
use super::frame::{Placed, along};
use super::lines::{around, is_within, meant};
use crate::report::chart::{Contour, Layer, Map, Panel};
use crate::report::render::plot::page::{CAPTION, NUMBER, SMALL};
use crate::report::render::plot::place::Occupied;
use crate::report::render::plot::scene::{Anchor, Ink, Item, LEVELS, Rect, Scene};
use crate::report::render::plot::text;
use crate::report::render::plot::ticks::{Tick, ticks};

/// More columns or rows than this are drawn as so many.
const MOST: usize = 250;
/// The bar of colours: its distance from the frame, its width, and the distance of its numbers.
const AWAY: f64 = 12.0;
const BAR: f64 = 15.0;
const NUMBERS: f64 = 6.0;
/// A sample of the hatching.
const SAMPLE: f64 = 15.0;

pub(super) fn of(panel: &Panel) -> Option<&Map> {
    panel.layers.iter().find_map(|layer| match layer {
        Layer::Map(map) if map.columns > 0 && map.values.len() >= map.columns => Some(map),
        _ => None,
    })
}

/// The grid that is drawn: columns, and how far up the scale each value lies.
fn shares(map: &Map) -> (usize, Vec<Option<f64>>) {
    let rows = map.values.len() / map.columns;
    let drawn = |count: usize| count.min(MOST);
    let (columns, drawn_rows) = (drawn(map.columns), drawn(rows));
    // Places from end to end, so that the ends stay where they are.
    let nearest = |index: usize, drawn: usize, count: usize| {
        if drawn < 2 {
            return 0;
        }
        (index * (count - 1) + (drawn - 1) / 2) / (drawn - 1)
    };
    let shares = (0..drawn_rows)
        .flat_map(|row| (0..columns).map(move |column| (column, row)))
        .map(|(column, row)| {
            let from = nearest(row, drawn_rows, rows) * map.columns
                + nearest(column, columns, map.columns);
            map.values[from]
                .filter(|value| value.is_finite())
                .map(|value| along(&map.scale, value))
        })
        .collect();
    (columns, shares)
}

fn level(share: f64) -> u8 {
    (share.clamp(0.0, 1.0) * f64::from(LEVELS)).min(f64::from(LEVELS - 1)) as u8
}

fn has_absent(map: &Map) -> bool {
    map.values
        .iter()
        .any(|value| value.is_none_or(|value| !value.is_finite()))
}

/// The colours.
pub(super) fn cells(scene: &mut Scene, placed: &Placed<'_>) {
    let Some(map) = of(placed.panel) else { return };
    let (columns, shares) = shares(map);
    scene.items.push(Item::Cells {
        area: placed.area,
        columns,
        levels: shares.iter().map(|share| share.map(level)).collect(),
    });
    bar(scene, placed, map);
}

fn bar_ticks(map: &Map, height: f64) -> Vec<Tick> {
    ticks(&map.scale, (height / 45.0).clamp(2.0, 9.0))
}

/// Space that the bar of colours takes.
pub(super) fn margin(panel: &Panel, height: f64) -> f64 {
    of(panel).map_or(0.0, |map| {
        let numbers = bar_ticks(map, height)
            .iter()
            .map(|(_, label)| text::length(label, NUMBER))
            .fold(0.0, f64::max);
        let title = 4.0 + text::height(CAPTION);
        let bar = AWAY + BAR + NUMBERS + numbers + title;
        if has_absent(map) {
            let sample = AWAY + SAMPLE + NUMBERS + text::length(&map.absent, SMALL);
            bar.max(sample.min(140.0))
        } else {
            bar
        }
    })
}

fn bar(scene: &mut Scene, placed: &Placed<'_>, map: &Map) {
    let area = placed.area;
    let left = area.right + AWAY;
    let inside = Rect {
        left,
        right: left + BAR,
        ..area
    };
    // One cell more at each end, because half of the outermost is cut off.
    let mut levels: Vec<Option<u8>> = (0..LEVELS).map(Some).collect();
    levels.insert(0, Some(0));
    levels.push(Some(LEVELS - 1));
    scene.items.push(Item::Cells {
        area: inside,
        columns: 1,
        levels,
    });
    boxed(scene, inside);
    let mut last_top = f64::INFINITY;
    for (value, label) in bar_ticks(map, placed.height) {
        let y = area.bottom - (area.bottom - area.top) * along(&map.scale, value);
        scene.line(
            &[[inside.right, y], [inside.right + 4.0, y]],
            Ink::Grey,
            1.0,
        );
        if y + 0.5 * text::height(NUMBER) < last_top {
            let at = [inside.right + NUMBERS, y];
            scene.text(at, Anchor::Start, NUMBER, Ink::Black, &label);
            last_top = y - 0.5 * text::height(NUMBER);
        }
    }
    let numbers = margin_of_numbers(map, placed.height);
    let x = inside.right + NUMBERS + numbers + 4.0 + 0.5 * text::height(CAPTION);
    let title = text::shortened(&map.scale.title, CAPTION, placed.height);
    let middle = [x, 0.5 * (area.top + area.bottom)];
    scene.upright_text(middle, Anchor::Middle, CAPTION, Ink::Black, &title);
    if has_absent(map) {
        let top = area.bottom + 24.0;
        let sample = Rect {
            left,
            right: left + SAMPLE,
            top,
            bottom: top + SAMPLE,
        };
        scene.items.push(Item::Cells {
            area: sample,
            columns: 1,
            levels: vec![None],
        });
        boxed(scene, sample);
        let room = 140.0 - AWAY - SAMPLE - NUMBERS;
        let absent = text::shortened(&map.absent, SMALL, room);
        let at = [sample.right + NUMBERS, top + 0.5 * SAMPLE];
        scene.text(at, Anchor::Start, SMALL, Ink::Black, &absent);
    }
}

fn margin_of_numbers(map: &Map, height: f64) -> f64 {
    bar_ticks(map, height)
        .iter()
        .map(|(_, label)| text::length(label, NUMBER))
        .fold(0.0, f64::max)
}

fn boxed(scene: &mut Scene, area: Rect) {
    let outline = [
        [area.left, area.top],
        [area.right, area.top],
        [area.right, area.bottom],
        [area.left, area.bottom],
        [area.left, area.top],
    ];
    scene.line(&outline, Ink::Grey, 1.0);
}

/// Lines of one value; gives them back in pixels, to be named.
pub(super) fn contours<'a>(
    scene: &mut Scene,
    occupied: &mut Occupied,
    placed: &Placed<'a>,
) -> Vec<(&'a Contour, Vec<Vec<[f64; 2]>>)> {
    let Some(map) = of(placed.panel) else {
        return Vec::new();
    };
    let (columns, shares) = shares(map);
    let rows = shares.len() / columns;
    let area = placed.area;
    let step = [
        (area.right - area.left) / (columns.max(2) - 1) as f64,
        (area.bottom - area.top) / (rows.max(2) - 1) as f64,
    ];
    let mut found = Vec::new();
    for contour in &map.contours {
        let lines: Vec<Vec<[f64; 2]>> =
            contours::lines(columns, &shares, along(&map.scale, contour.level))
                .into_iter()
                .map(|line| {
                    let to_page =
                        |[x, y]: [f64; 2]| [area.left + step[0] * x, area.bottom - step[1] * y];
                    line.into_iter().map(to_page).collect()
                })
                .collect();
        for line in &lines {
            meant(scene, area, line, contour.meaning, true);
            occupied.add_curve(line.clone());
        }
        found.push((contour, lines));
    }
    found
}

/// The place as designed.
pub(super) fn nominal(scene: &mut Scene, occupied: &mut Occupied, placed: &Placed<'_>) {
    const ARM: f64 = 8.0;
    let nominal = of(placed.panel).and_then(|map| map.nominal);
    let Some([x, y]) = nominal.map(|at| placed.point(at)) else {
        return;
    };
    if !is_within(placed.area, [x, y]) {
        return;
    }
    for (ink, width, arm) in [(Ink::Paper, 5.0, ARM + 1.5), (Ink::Black, 2.0, ARM)] {
        scene.line(&[[x - arm, y], [x + arm, y]], ink, width);
        scene.line(&[[x, y - arm], [x, y + arm]], ink, width);
    }
    occupied.add_box(around([x, y], ARM));
}
