//! What is written within a frame: at ranges, lines, marks, points and curves, each where it
//! hides nothing; what finds no room is said beneath the picture.

use super::areas::stretch;
use super::frame::Placed;
use super::lines::{is_within, label_ink, shape, visible};
use super::{afar, sticks};
use crate::report::chart::{Across, Band, Contour, Layer, Meaning, Reference};
use crate::report::figure::Stroke;
use crate::report::render::plot::curves::DOT;
use crate::report::render::plot::names::{Ground, name_curve, name_mark};
use crate::report::render::plot::page::SMALL;
use crate::report::render::plot::place::{Candidate, Occupied};
use crate::report::render::plot::scene::{Anchor, Ink, Rect, Scene};
use crate::report::render::plot::text;

/// Samples of a curve stand this close where its name is placed.
const CLOSE: f64 = 3.0;

/// What could not be written where it belongs.
#[derive(Default)]
pub(super) struct Unnamed {
    /// Whether it goes without saying where.
    is_of_one_panel: bool,
    marks: usize,
    sticks: usize,
    lines: Vec<String>,
    notes: Vec<String>,
}

impl Unnamed {
    /// Nothing yet, of so many panels.
    pub(super) fn of(panels: usize) -> Unnamed {
        Unnamed {
            is_of_one_panel: panels < 2,
            ..Unnamed::default()
        }
    }

    /// A line, curve or the like lies beyond the axes.
    pub(super) fn outside(&mut self, label: &str, placed: &Placed<'_>) {
        let heading = placed.panel.heading.as_str();
        self.note(if self.is_of_one_panel || heading.is_empty() {
            format!("outside the picture: {label}")
        } else {
            format!("outside the picture of {heading}: {label}")
        });
    }

    /// Says something beneath the picture, once.
    pub(super) fn note(&mut self, note: String) {
        if !self.notes.contains(&note) {
            self.notes.push(note);
        }
    }

    /// A straight line has no label.
    pub(super) fn line(&mut self, label: &str, placed: &Placed<'_>) {
        let heading = placed.panel.heading.as_str();
        let line = if self.is_of_one_panel || heading.is_empty() {
            label.into()
        } else {
            format!("{label} ({heading})")
        };
        if !self.lines.contains(&line) {
            self.lines.push(line);
        }
    }

    /// Lines beneath the picture.
    pub(super) fn notes(self) -> Vec<String> {
        const FEW: usize = 5;
        let mut notes = self.notes;
        if !self.lines.is_empty() {
            let few = &self.lines[..self.lines.len().min(FEW)];
            let more = match self.lines.len() - few.len() {
                0 => String::new(),
                more => format!(" and {more} more"),
            };
            let few = few.join(", ");
            notes.push(format!(
                "drawn without a label, for want of room: {few}{more}"
            ));
        }
        let counts = [
            (self.marks, "mark has", "marks have"),
            (
                self.sticks,
                "line of the spectrum has",
                "lines of the spectrum have",
            ),
        ];
        for (count, one, many) in counts {
            match count {
                0 => {}
                1 => notes.push(format!("one {one} no label, for want of room")),
                n => notes.push(format!("{n} {many} no label, for want of room")),
            }
        }
        notes
    }
}

/// Writes what finds room, the most important first.
pub(super) fn write(
    scene: &mut Scene,
    occupied: &mut Occupied,
    placed: &Placed<'_>,
    contours: &[(&Contour, Vec<Vec<[f64; 2]>>)],
    unnamed: &mut Unnamed,
) {
    for (contour, lines) in contours {
        name_contour(scene, occupied, placed, contour, lines, unnamed);
    }
    for layer in &placed.panel.layers {
        match layer {
            Layer::Reference(line) if line.across == Across::Y => {
                level(scene, occupied, placed, line, unnamed);
            }
            _ => {}
        }
    }
    bands(placed, unnamed);
    range_labels(scene, occupied, placed, unnamed);
    marks(scene, occupied, placed, unnamed);
    curves(scene, occupied, placed, unnamed);
    unnamed.sticks += sticks::name(scene, occupied, placed);
    points(scene, occupied, placed, unnamed);
}

fn boxed([x, y]: [f64; 2], content: &str) -> Rect {
    text::place([x, y], Anchor::Middle, false, SMALL, content)
}

fn candidate(area: Rect) -> Candidate {
    Candidate { area, leader: None }
}

/// Paper behind labels of a panel.
fn ground(placed: &Placed<'_>) -> Ground {
    if placed.has_map() {
        Ground::Always
    } else {
        Ground::OverCurves
    }
}

/// Writes a text in the middle of a place that was taken.
fn put(scene: &mut Scene, area: Rect, ink: Ink, content: &str) {
    let at = [
        0.5 * (area.left + area.right),
        0.5 * (area.top + area.bottom),
    ];
    scene.text(at, Anchor::Middle, SMALL, ink, content);
}

/// What bands mean: said once where all mean the same.
fn bands(placed: &Placed<'_>, unnamed: &mut Unnamed) {
    let bands = placed.panel.layers.iter().filter_map(|layer| match layer {
        Layer::Band(band) if !band.label.is_empty() => Some(band),
        _ => None,
    });
    let bands: Vec<&Band> = bands.collect();
    let is_same = bands.windows(2).all(|pair| pair[0].label == pair[1].label);
    for band in bands {
        unnamed.note(if is_same {
            format!("shaded: {}", band.label)
        } else {
            let line = band.stroke.name();
            format!("shaded around the {line} line: {}", band.label)
        });
    }
}

/// The label of a level line: at its right end, on the side that is allowed.
fn level(
    scene: &mut Scene,
    occupied: &mut Occupied,
    placed: &Placed<'_>,
    line: &Reference,
    unnamed: &mut Unnamed,
) {
    let area = placed.area;
    let y = placed.y(line.at);
    if line.label.is_empty() || !is_within(area, [area.left, y]) {
        return;
    }
    let label = text::shortened(&line.label, SMALL, 0.6 * (area.right - area.left));
    let half = 0.5 * text::length(&label, SMALL);
    let sides = match line.meaning {
        Meaning::AtMost => [10.0, -16.0],
        Meaning::AtLeast => [-10.0, 16.0],
        Meaning::Nominal | Meaning::Guide => [-10.0, 10.0],
    };
    let width = area.right - area.left - 12.0 - 2.0 * half;
    let candidates = sides.into_iter().flat_map(|side| {
        (0..=12)
            .map(move |step| area.right - 6.0 - half - width * f64::from(step) / 12.0)
            .map(move |x| [x, y + side])
    });
    let candidates = candidates.map(|at| candidate(boxed(at, &label)));
    match occupied.take(area.grown(-1.0), candidates.collect::<Vec<_>>()) {
        Some(chosen) => {
            ground(placed).lay(scene, occupied, chosen.area);
            put(scene, chosen.area, label_ink(line.meaning), &label);
        }
        None => unnamed.line(&line.label, placed),
    }
}

fn range_labels(
    scene: &mut Scene,
    occupied: &mut Occupied,
    placed: &Placed<'_>,
    unnamed: &mut Unnamed,
) {
    let mut named: Vec<&str> = Vec::new();
    let mut without: Vec<&str> = Vec::new();
    for layer in &placed.panel.layers {
        let Layer::Range(range) = layer else { continue };
        let Some(area) = stretch(placed, range.from, range.to) else {
            continue;
        };
        if range.label.is_empty() {
            continue;
        }
        let middle = 0.5 * (area.left + area.right);
        let half = 0.5 * text::length(&range.label, SMALL);
        let room = (0.5 * (area.right - area.left) - half - 4.0).max(0.0);
        let heights = [area.top + 10.0, area.bottom - 10.0, area.top + 26.0];
        let candidates: Vec<Candidate> = heights
            .into_iter()
            .flat_map(|y| [0.0, 1.0, -1.0, 0.5, -0.5].map(|aside| [middle + aside * room, y]))
            .map(|at| candidate(boxed(at, &range.label)))
            .collect();
        match occupied.take_clear(area.grown(-2.0), candidates) {
            Some(chosen) => {
                ground(placed).lay(scene, occupied, chosen.area);
                put(scene, chosen.area, Ink::Grey, &range.label);
                named.push(&range.label);
            }
            None => without.push(&range.label),
        }
    }
    for label in without {
        if !named.contains(&label) {
            unnamed.note(format!("tinted: {label}"));
        }
    }
}

fn marks(scene: &mut Scene, occupied: &mut Occupied, placed: &Placed<'_>, unnamed: &mut Unnamed) {
    for layer in &placed.panel.layers {
        let Layer::Mark(mark) = layer else { continue };
        let points = mark.places.iter().map(|(_, at)| placed.point(*at));
        let lowest = points
            .filter(|at| is_within(placed.area, *at))
            .reduce(|a, b| [0.5 * (a[0] + b[0]), a[1].max(b[1])]);
        let (Some(at), false) = (lowest, mark.label.is_empty()) else {
            continue;
        };
        let ground = ground(placed);
        if !name_mark(scene, occupied, placed.area, at, &mark.label, ground) {
            unnamed.marks += 1;
        }
    }
}

/// The same line with points so close that any place of it is near one.
fn dense(points: &[[f64; 2]]) -> Vec<[f64; 2]> {
    let mut all: Vec<[f64; 2]> = points.first().copied().into_iter().collect();
    for pair in points.windows(2) {
        let [a, b] = [pair[0], pair[1]];
        let pieces = ((b[0] - a[0]).hypot(b[1] - a[1]) / CLOSE).ceil().max(1.0) as usize;
        all.extend((1..=pieces).map(|piece| {
            let share = piece as f64 / pieces as f64;
            [a[0] + share * (b[0] - a[0]), a[1] + share * (b[1] - a[1])]
        }));
    }
    all
}

fn curves(scene: &mut Scene, occupied: &mut Occupied, placed: &Placed<'_>, unnamed: &mut Unnamed) {
    let mut named: Vec<(&str, Stroke)> = Vec::new();
    for layer in &placed.panel.layers {
        let Layer::Curve(curve) = layer else { continue };
        let name = (curve.label.as_str(), curve.stroke);
        if curve.label.is_empty() || named.contains(&name) {
            continue;
        }
        let mut pieces = visible(placed, curve);
        if pieces.is_empty() {
            if curve.pieces.iter().any(|piece| !piece.is_empty()) {
                unnamed.outside(&curve.label, placed);
            }
            continue;
        }
        // The widest piece first.
        let width = |piece: &Vec<[f64; 2]>| (piece[piece.len() - 1][0] - piece[0][0]).abs();
        pieces.sort_by(|a, b| width(b).total_cmp(&width(a)));
        let others: Vec<Vec<[f64; 2]>> = placed
            .panel
            .layers
            .iter()
            .filter_map(|layer| match layer {
                Layer::Curve(other) if !std::ptr::eq(other, curve) => Some(other),
                _ => None,
            })
            .flat_map(|other| visible(placed, other))
            .collect();
        let ground = ground(placed);
        let found = pieces.iter().any(|piece| {
            let points = dense(piece);
            let lines = (points.as_slice(), others.as_slice());
            name_curve(scene, occupied, placed.area, lines, name, ground)
        }) || afar::name_curve(scene, occupied, placed.area, &pieces, &others, name);
        if found {
            named.push(name);
        } else {
            unnamed.note(format!("{} line: {}", curve.stroke.name(), curve.label));
        }
    }
}

fn points(scene: &mut Scene, occupied: &mut Occupied, placed: &Placed<'_>, unnamed: &mut Unnamed) {
    /// Room for one of the points before what they are called.
    const SHAPE: f64 = 14.0;
    for layer in &placed.panel.layers {
        let Layer::Points(points) = layer else {
            continue;
        };
        if points.label.is_empty() {
            continue;
        }
        let half = 0.5 * (SHAPE + text::length(&points.label, SMALL));
        let aside = DOT + 14.0 + half;
        let around = [
            [aside, 0.0],
            [-aside, 0.0],
            [0.0, -16.0],
            [0.0, 16.0],
            [aside, -14.0],
            [-aside, -14.0],
            [aside, 14.0],
            [-aside, 14.0],
        ];
        let height = 0.5 * text::height(SMALL);
        let places: Vec<[f64; 2]> = points
            .points
            .iter()
            .map(|point| placed.point([point.x, point.y]))
            .filter(|at| is_within(placed.area, *at))
            .collect();
        let candidates = around.iter().flat_map(|[right, down]| {
            places.iter().map(move |[x, y]| {
                candidate(Rect {
                    left: x + right - half,
                    right: x + right + half,
                    top: y + down - height,
                    bottom: y + down + height,
                })
            })
        });
        match occupied.take_clear(placed.area.grown(-2.0), candidates) {
            Some(Candidate { area, .. }) => {
                ground(placed).lay(scene, occupied, area);
                let y = 0.5 * (area.top + area.bottom);
                shape(scene, [area.left + DOT + 1.0, y], points.stroke);
                let at = [area.left + SHAPE, y];
                scene.text(at, Anchor::Start, SMALL, Ink::Black, &points.label);
            }
            None => {
                let shape = match points.stroke {
                    Stroke::Solid => "discs",
                    Stroke::Dashed => "rings",
                    Stroke::Dotted => "filled diamonds",
                    Stroke::DashDotted => "open diamonds",
                };
                unnamed.note(format!("{shape}: {}", points.label));
            }
        }
    }
}

/// The label of a line of one value lies on the line itself.
fn name_contour(
    scene: &mut Scene,
    occupied: &mut Occupied,
    placed: &Placed<'_>,
    contour: &Contour,
    lines: &[Vec<[f64; 2]>],
    unnamed: &mut Unnamed,
) {
    const PLACES: usize = 16;
    if contour.label.is_empty() {
        return;
    }
    let Some(longest) = lines.iter().max_by_key(|line| line.len()) else {
        unnamed.note(format!("nowhere in the picture: {}", contour.label));
        return;
    };
    let points = dense(longest);
    // From the middle outwards.
    let mut places: Vec<usize> = (1..PLACES).collect();
    places.sort_by_key(|place| place.abs_diff(PLACES / 2));
    let candidates: Vec<Candidate> = places
        .into_iter()
        .map(|place| points[place * (points.len() - 1) / PLACES])
        .map(|at| candidate(boxed(at, &contour.label)))
        .collect();
    match occupied.take(placed.area.grown(-2.0), candidates) {
        Some(chosen) => {
            Ground::Always.lay(scene, occupied, chosen.area);
            put(
                scene,
                chosen.area,
                label_ink(contour.meaning),
                &contour.label,
            );
        }
        None => unnamed.line(&contour.label, placed),
    }
}
