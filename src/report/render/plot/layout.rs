//! From a figure to a page: title, names, the row of optics, the panels, the axes, the notes.

use super::glyph;
use super::labels::{self, Band};
use super::page::{self, CAPTION, Heading, NUMBER, TITLE, WIDTH};
use super::place::Occupied;
use super::scene::{Anchor, Ink, Rect, Scene};
use super::ticks::{share, ticks};
use super::{curves, names, text};
use crate::report::figure::{Axis, Figure, Panel, Symbol};

/// Margins: the vertical axis has its numbers on the left.
const LEFT: f64 = 78.0;
const RIGHT: f64 = 22.0;
/// Height of the panels.
const PANEL: f64 = 360.0;
const EMPTY_PANEL: f64 = 110.0;
/// Space between panels, and within one on either side.
const BETWEEN: f64 = 14.0;
const INSET: f64 = 16.0;

/// A panel at its place on the page.
pub(super) struct Placed<'a> {
    pub panel: &'a Panel,
    pub y: Option<&'a Axis>,
    pub area: Rect,
}

impl Placed<'_> {
    pub(super) fn x(&self, value: f64) -> f64 {
        let room = self.area.right - self.area.left - 2.0 * INSET;
        self.area.left + INSET + room * share(&self.panel.x, value)
    }

    pub(super) fn y(&self, value: f64) -> f64 {
        let up = self.y.map_or(0.0, |axis| share(axis, value));
        self.area.bottom - (self.area.bottom - self.area.top) * up
    }

    pub(super) fn point(&self, [x, y]: [f64; 2]) -> [f64; 2] {
        [self.x(x), self.y(y)]
    }
}

/// The page of a figure.
pub(super) fn scene(figure: &Figure) -> Scene {
    let count: usize = figure.panels.iter().map(|panel| panel.symbols.len()).sum();
    let width = WIDTH.max(LEFT + RIGHT + labels::least_width(count));
    let mut scene = Scene {
        width,
        ..Scene::default()
    };
    let heading = Heading {
        title: &figure.title,
        verdict: &figure.verdict,
        particulars: &figure.particulars,
        missing: &figure.missing,
        in_two_lines: false,
    };
    let mut top = heading.draw(&mut scene);
    let mut panels = placed(figure, width);
    let symbols: Vec<(&Symbol, f64)> = panels
        .iter()
        .flat_map(|placed| placed.panel.symbols.iter().map(move |s| (s, placed)))
        .map(|(symbol, placed)| (symbol, placed.x(0.5 * (symbol.from + symbol.to))))
        .collect();
    let band = Band::of(&symbols, 4.0, width - 4.0);
    top += band.height;
    let row = top + glyph::REACH;
    let area_top = row + glyph::REACH + 6.0;
    let panel_height = if figure.y.is_some() {
        PANEL
    } else {
        EMPTY_PANEL
    };
    for placed in &mut panels {
        placed.area.top = area_top;
        placed.area.bottom = area_top + panel_height;
    }
    scene.frames = panels.iter().map(|placed| placed.area).collect();

    let mut occupied = Occupied::default();
    for placed in &panels {
        ground(&mut scene, placed);
    }
    for placed in &panels {
        optics(&mut scene, placed, row);
    }
    band.draw(&mut scene, top);
    curves::draw(&mut scene, &mut occupied, &panels);
    let more = names::write(&mut scene, &mut occupied, &panels);
    frames(&mut scene, &panels);
    let bottom = axes(&mut scene, figure, &panels);
    if figure.y.is_none() {
        nothing_to_draw(&mut scene, figure, area_top);
    }
    let notes = [figure.notes.clone(), more].concat();
    let ends = [LEFT, scene.width - RIGHT];
    page::footing(&mut scene, bottom, ends, &notes);
    scene
}

/// Panels side by side, their heights still unknown.
fn placed(figure: &Figure, width: f64) -> Vec<Placed<'_>> {
    let gaps = BETWEEN * (figure.panels.len().saturating_sub(1)) as f64;
    let room = width - LEFT - RIGHT - gaps;
    let mut left = LEFT;
    figure
        .panels
        .iter()
        .map(|panel| {
            let area = Rect {
                left,
                right: left + room * panel.share,
                top: 0.0,
                bottom: 0.0,
            };
            left = area.right + BETWEEN;
            Placed {
                panel,
                y: figure.y.as_ref(),
                area,
            }
        })
        .collect()
}

/// What lies beneath the curves: bodies, guides, the grid.
fn ground(scene: &mut Scene, placed: &Placed<'_>) {
    let area = placed.area;
    for symbol in &placed.panel.symbols {
        let (from, to) = (placed.x(symbol.from), placed.x(symbol.to));
        if symbol.glyph.is_body() && to - from > 0.5 {
            let corners = [
                [from, area.top],
                [to, area.top],
                [to, area.bottom],
                [from, area.bottom],
            ];
            scene.area(&corners, Ink::Tint);
        } else {
            let guide = [[from, area.top], [from, area.bottom]];
            scene.line(&guide, Ink::Faint, 1.0);
        }
    }
    for (value, _) in placed.y.map_or(Vec::new(), |axis| ticks(axis, 6.0)) {
        let y = placed.y(value);
        scene.line(&[[area.left, y], [area.right, y]], Ink::Faint, 0.7);
    }
}

/// The optics in their row, on the line of the beam.
fn optics(scene: &mut Scene, placed: &Placed<'_>, row: f64) {
    const ROOM: f64 = 9.0;
    let symbols = &placed.panel.symbols;
    let (left, right) = (placed.x(placed.panel.x.from), placed.x(placed.panel.x.to));
    scene.line(&[[left, row], [right, row]], Ink::Black, 1.0);
    let middles: Vec<f64> = symbols
        .iter()
        .map(|symbol| placed.x(0.5 * (symbol.from + symbol.to)))
        .collect();
    // Bodies first: a mirror on a crystal's face is seen over it.
    let mut in_order: Vec<(&Symbol, &f64)> = symbols.iter().zip(&middles).collect();
    in_order.sort_by_key(|(symbol, _)| !symbol.glyph.is_body());
    for (symbol, middle) in in_order {
        let nearest = middles
            .iter()
            .map(|other| (other - middle).abs())
            .filter(|distance| *distance > 1.0)
            .fold(f64::INFINITY, f64::min);
        let half = (0.45 * nearest).clamp(2.5, ROOM);
        let ends = [placed.x(symbol.from), placed.x(symbol.to)];
        glyph::draw(scene, symbol.glyph, ends, row, half);
    }
}

fn frames(scene: &mut Scene, panels: &[Placed<'_>]) {
    for placed in panels {
        let area = placed.area;
        let outline = [
            [area.left, area.top],
            [area.right, area.top],
            [area.right, area.bottom],
            [area.left, area.bottom],
            [area.left, area.top],
        ];
        scene.line(&outline, Ink::Grey, 1.0);
    }
    // A change of scale is not to be taken for a gap in the beam.
    for pair in panels.windows(2) {
        let middle = 0.5 * (pair[0].area.right + pair[1].area.left);
        for offset in [-2.5, 2.5] {
            let x = middle + offset;
            let y = pair[0].area.bottom;
            scene.line(&[[x - 2.5, y + 6.0], [x + 2.5, y - 6.0]], Ink::Black, 1.0);
        }
    }
}

/// Numbers and titles of the axes; gives back where they end.
fn axes(scene: &mut Scene, figure: &Figure, panels: &[Placed<'_>]) -> f64 {
    let Some(first) = panels.first() else {
        return 0.0;
    };
    let area = first.area;
    if let Some(axis) = &figure.y {
        for (value, label) in ticks(axis, 6.0) {
            let y = first.y(value);
            scene.line(&[[area.left - 4.0, y], [area.left, y]], Ink::Grey, 1.0);
            let at = [area.left - 7.0, y];
            scene.text(at, Anchor::End, NUMBER, Ink::Black, &label);
        }
        let middle = 0.5 * (area.top + area.bottom);
        scene.upright_text(
            [16.0, middle],
            Anchor::Middle,
            CAPTION,
            Ink::Black,
            &axis.title,
        );
    }
    let numbers = area.bottom + 6.0 + 0.5 * text::height(NUMBER);
    let titles = numbers + text::height(NUMBER) + 6.0;
    let mut last_right = f64::NEG_INFINITY;
    for placed in panels {
        let area = placed.area;
        for (value, label) in ticks(&placed.panel.x, number_of_ticks(area)) {
            let x = placed.x(value);
            scene.line(&[[x, area.bottom], [x, area.bottom + 4.0]], Ink::Grey, 1.0);
            let taken = text::place([x, numbers], Anchor::Middle, false, NUMBER, &label);
            if taken.left > last_right + 4.0 && taken.right < scene.width {
                scene.text([x, numbers], Anchor::Middle, NUMBER, Ink::Black, &label);
                last_right = taken.right;
            }
        }
        let middle = 0.5 * (area.left + area.right);
        let room = area.right - area.left + BETWEEN - 4.0;
        let title = text::shortened(&placed.panel.x.title, CAPTION, room);
        scene.text(
            [middle, titles],
            Anchor::Middle,
            CAPTION,
            Ink::Black,
            &title,
        );
    }
    titles + text::height(CAPTION)
}

fn number_of_ticks(area: Rect) -> f64 {
    let width = area.right - area.left;
    (width / 65.0).min(10_f64.max(width / 130.0))
}

/// Instead of an empty plot that could be taken for a beam of no size.
fn nothing_to_draw(scene: &mut Scene, figure: &Figure, area_top: f64) {
    let middle = 0.5 * scene.width;
    let mut y = area_top + 0.35 * EMPTY_PANEL;
    let mut line = |content: &str, size: f64| {
        scene.text([middle, y], Anchor::Middle, size, Ink::Alarm, content);
        y += 1.5 * text::height(size);
    };
    line("no beam to draw", TITLE);
    line(&figure.verdict, CAPTION);
}
