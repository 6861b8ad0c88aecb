//! A panel's frame, the numbers and titles of its axes, and where values lie in it.

use super::tags::Tags;
use super::{areas, bars, map};
use crate::report::chart::{Layer, Panel};
use crate::report::figure::Axis;
use crate::report::render::plot::page::{CAPTION, NUMBER};
use crate::report::render::plot::scene::{Anchor, Ink, Rect, Scene};
use crate::report::render::plot::text;
use crate::report::render::plot::ticks::{self, Tick};

/// How far from the frame a value may be placed: far enough that what is cut off there keeps its
/// direction, near enough to be counted in pixels.
const FAR: f64 = 1e4;
/// Space between a frame and its numbers.
const AWAY: f64 = 7.0;
const HEADING_GAP: f64 = 5.0;
/// What is kept free at the right, where numbers stand over the end of an axis.
const RIGHT: f64 = 22.0;

/// A panel at its place on the page.
pub(super) struct Placed<'a> {
    pub panel: &'a Panel,
    pub area: Rect,
    /// Height of the frame.
    pub height: f64,
    /// Where the panel begins, the numbers at its left included.
    pub start: f64,
    /// What the row has over its frames.
    pub head_room: f64,
    /// Whether the numbers of the horizontal axis stand at the panel below.
    pub is_read_below: bool,
    pub tags: Tags,
}

/// Where a value lies on an axis, from 0 to 1 within it.
pub(super) fn along(axis: &Axis, value: f64) -> f64 {
    if axis.to <= axis.from {
        return 0.5;
    }
    let share = ticks::share(axis, value);
    if share.is_nan() {
        // Below every decade.
        -FAR
    } else {
        share.clamp(-FAR, FAR)
    }
}

impl Placed<'_> {
    pub(super) fn x(&self, value: f64) -> f64 {
        x_in(self.area, &self.panel.x, value)
    }

    pub(super) fn y(&self, value: f64) -> f64 {
        let up = self.panel.y.as_ref().map_or(0.0, |axis| along(axis, value));
        self.area.bottom - (self.area.bottom - self.area.top) * up
    }

    pub(super) fn point(&self, [x, y]: [f64; 2]) -> [f64; 2] {
        [self.x(x), self.y(y)]
    }

    /// Height over the frame.
    pub(super) fn head(&self) -> f64 {
        let heading = if self.panel.heading.is_empty() {
            6.0
        } else {
            text::height(CAPTION) + HEADING_GAP
        };
        heading + self.tags.height
    }

    /// Height under the frame.
    pub(super) fn foot(&self) -> f64 {
        if self.is_read_below {
            6.0
        } else {
            AWAY + text::height(NUMBER) + 4.0 + text::height(CAPTION)
        }
    }

    /// Whether a label needs a ground of its own.
    pub(super) fn has_map(&self) -> bool {
        map::of(self.panel).is_some()
    }

    pub(super) fn is_empty(&self) -> bool {
        self.panel.layers.iter().all(|layer| match layer {
            Layer::Range(_) | Layer::Reference(_) => true,
            Layer::Curve(curve) => curve.pieces.iter().all(Vec::is_empty),
            Layer::Band(band) => band.pieces.iter().all(Vec::is_empty),
            Layer::Points(points) => points.points.is_empty(),
            Layer::Mark(mark) => mark.places.is_empty(),
            Layer::Histogram(histogram) => areas::bins(histogram).next().is_none(),
            Layer::Bars(bars) => bars.is_empty(),
            Layer::Sticks(sticks) => sticks.is_empty(),
            Layer::Map(map) => map.columns == 0 || map.values.len() < map.columns,
        })
    }
}

pub(super) fn x_in(area: Rect, axis: &Axis, value: f64) -> f64 {
    area.left + (area.right - area.left) * along(axis, value)
}

fn y_ticks(panel: &Panel, height: f64) -> Vec<Tick> {
    panel.y.as_ref().map_or(Vec::new(), |axis| {
        ticks::ticks(axis, (height / 45.0).clamp(2.0, 9.0))
    })
}

/// The title of a vertical axis in lines as long as the frame is high.
fn upright_title(axis: &Axis, height: f64) -> Vec<String> {
    const MOST: usize = 2;
    let mut lines = text::wrapped(&axis.title, CAPTION, height);
    if lines.len() > MOST {
        let rest = lines.split_off(MOST - 1).join(" ");
        lines.push(text::shortened(&rest, CAPTION, height));
    }
    lines
}

/// Space at the left and at the right of a frame.
pub(super) fn margins(panel: &Panel, width: f64, height: f64) -> [f64; 2] {
    let left = match &panel.y {
        None => bars::names_width(panel, width) + AWAY,
        Some(axis) => {
            let numbers = y_ticks(panel, height)
                .iter()
                .map(|(_, label)| text::length(label, NUMBER))
                .fold(0.0, f64::max);
            let lines = upright_title(axis, height).len() as f64;
            numbers + AWAY + 6.0 + lines * text::height(CAPTION)
        }
    };
    [left, map::margin(panel, height).max(RIGHT)]
}

/// Lines to read numbers by, and their little marks.
pub(super) fn grid(scene: &mut Scene, placed: &Placed<'_>) {
    if placed.has_map() {
        return;
    }
    let area = placed.area;
    for (value, _) in y_ticks(placed.panel, placed.height) {
        let y = placed.y(value);
        scene.line(&[[area.left, y], [area.right, y]], Ink::Faint, 0.7);
    }
    for (value, _) in x_ticks(placed) {
        let x = placed.x(value);
        scene.line(&[[x, area.top], [x, area.bottom]], Ink::Faint, 0.7);
    }
}

/// Where a signed value changes its sign.
pub(super) fn zero(scene: &mut Scene, placed: &Placed<'_>) {
    let area = placed.area;
    let is_within = |axis: &Axis| axis.from < 0.0 && 0.0 < axis.to;
    if placed.has_map() {
        return;
    }
    if placed.panel.y.as_ref().is_some_and(is_within) {
        let y = placed.y(0.0);
        scene.line(&[[area.left, y], [area.right, y]], Ink::Grey, 0.8);
    }
    if placed.panel.y.is_none() && is_within(&placed.panel.x) {
        let x = placed.x(0.0);
        scene.line(&[[x, area.top], [x, area.bottom]], Ink::Black, 1.0);
    }
}

/// As many numbers as stand side by side.
fn x_ticks(placed: &Placed<'_>) -> Vec<Tick> {
    const APART: f64 = 10.0;
    let axis = &placed.panel.x;
    let width = placed.area.right - placed.area.left;
    let mut about = (width / 60.0).clamp(2.0, 10.0).floor();
    loop {
        let found = ticks::ticks(axis, about);
        let fit = found.windows(2).all(|pair| {
            let half = |tick: &Tick| 0.5 * text::length(&tick.1, NUMBER);
            placed.x(pair[1].0) - placed.x(pair[0].0) > half(&pair[0]) + half(&pair[1]) + APART
        });
        if fit || about < 2.0 {
            return found;
        }
        about -= 1.0;
    }
}

/// Frame, heading, numbers and titles.
pub(super) fn draw(scene: &mut Scene, placed: &Placed<'_>) {
    let area = placed.area;
    let outline = [
        [area.left, area.top],
        [area.right, area.top],
        [area.right, area.bottom],
        [area.left, area.bottom],
        [area.left, area.top],
    ];
    scene.line(&outline, Ink::Grey, 1.0);
    if !placed.panel.heading.is_empty() {
        // Headings of one row stand at one height.
        let y = area.top - placed.head_room + 0.5 * text::height(CAPTION);
        let room = area.right - area.left;
        let heading = text::shortened(&placed.panel.heading, CAPTION, room);
        scene.text([area.left, y], Anchor::Start, CAPTION, Ink::Black, &heading);
    }
    vertical(scene, placed);
    horizontal(scene, placed);
}

fn vertical(scene: &mut Scene, placed: &Placed<'_>) {
    let area = placed.area;
    let Some(axis) = &placed.panel.y else {
        return;
    };
    let mut last_top = f64::INFINITY;
    for (value, label) in y_ticks(placed.panel, placed.height) {
        let y = placed.y(value);
        scene.line(&[[area.left - 4.0, y], [area.left, y]], Ink::Grey, 1.0);
        if y + 0.5 * text::height(NUMBER) < last_top {
            let at = [area.left - AWAY, y];
            scene.text(at, Anchor::End, NUMBER, Ink::Black, &label);
            last_top = y - 0.5 * text::height(NUMBER);
        }
    }
    let middle = 0.5 * (area.top + area.bottom);
    let mut x = placed.start + 0.5 * text::height(CAPTION);
    for line in upright_title(axis, placed.height) {
        scene.upright_text([x, middle], Anchor::Middle, CAPTION, Ink::Black, &line);
        x += text::height(CAPTION);
    }
}

fn horizontal(scene: &mut Scene, placed: &Placed<'_>) {
    let area = placed.area;
    let numbers = area.bottom + AWAY + 0.5 * text::height(NUMBER);
    let mut last_right = f64::NEG_INFINITY;
    for (value, label) in x_ticks(placed) {
        let x = placed.x(value);
        scene.line(&[[x, area.bottom], [x, area.bottom + 4.0]], Ink::Grey, 1.0);
        let taken = text::place([x, numbers], Anchor::Middle, false, NUMBER, &label);
        let is_over = taken.right > area.right + RIGHT || taken.left < placed.start;
        if !placed.is_read_below && taken.left > last_right + 4.0 && !is_over {
            scene.text([x, numbers], Anchor::Middle, NUMBER, Ink::Black, &label);
            last_right = taken.right;
        }
    }
    if placed.is_read_below {
        return;
    }
    let y = area.bottom + AWAY + text::height(NUMBER) + 4.0 + 0.5 * text::height(CAPTION);
    let room = area.right - area.left;
    let title = text::shortened(&placed.panel.x.title, CAPTION, room);
    let middle = 0.5 * (area.left + area.right);
    scene.text([middle, y], Anchor::Middle, CAPTION, Ink::Black, &title);
}

/// Instead of an empty frame that could be taken for a value that is always outside.
pub(super) fn nothing_to_draw(scene: &mut Scene, placed: &Placed<'_>) {
    let area = placed.area;
    let middle = [
        0.5 * (area.left + area.right),
        0.5 * (area.top + area.bottom),
    ];
    let content = "nothing to draw";
    scene.text(middle, Anchor::Middle, CAPTION, Ink::Alarm, content);
}
