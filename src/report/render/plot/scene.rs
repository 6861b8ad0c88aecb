//! What is to be painted, at its place. The unit is the pixel of a screen at its plain size; y
//! points down.

use super::text;

/// A rectangle.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Rect {
    /// Left end.
    pub left: f64,
    /// Upper end.
    pub top: f64,
    /// Right end.
    pub right: f64,
    /// Lower end.
    pub bottom: f64,
}

impl Rect {
    /// Whether two rectangles share more than an edge.
    pub fn overlaps(self, other: Rect) -> bool {
        self.left < other.right
            && other.left < self.right
            && self.top < other.bottom
            && other.top < self.bottom
    }

    /// Whether another rectangle lies within this one.
    pub fn contains(self, other: Rect) -> bool {
        self.left <= other.left
            && other.right <= self.right
            && self.top <= other.top
            && other.bottom <= self.bottom
    }

    /// The rectangle with a margin around it.
    pub fn grown(self, by: f64) -> Rect {
        Rect {
            left: self.left - by,
            top: self.top - by,
            right: self.right + by,
            bottom: self.bottom + by,
        }
    }

    /// Whether a straight line passes through.
    pub fn meets(self, [x1, y1]: [f64; 2], [x2, y2]: [f64; 2]) -> bool {
        // The share of the line within each pair of edges, cut down in turn.
        let (mut from, mut to) = (0.0_f64, 1.0_f64);
        for (start, step, low, high) in [
            (x1, x2 - x1, self.left, self.right),
            (y1, y2 - y1, self.top, self.bottom),
        ] {
            if step == 0.0 {
                if start < low || start > high {
                    return false;
                }
                continue;
            }
            let (a, b) = ((low - start) / step, (high - start) / step);
            from = from.max(a.min(b));
            to = to.min(a.max(b));
        }
        from <= to
    }
}

/// What a line or text is for; the painter knows its colour.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ink {
    /// Text and optics.
    Black,
    /// What is read second.
    Grey,
    /// Grid and guides.
    Faint,
    /// Bodies that light passes through.
    Tint,
    /// The ground.
    Paper,
    /// The solid curve.
    Solid,
    /// The dashed curve.
    Dashed,
    /// The dotted curve.
    Dotted,
    /// The dash-dotted curve.
    DashDotted,
    /// Areas that measure something, such as bars.
    Bar,
    /// What is wrong.
    Alarm,
}

/// Which end of a text stands at its place.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Anchor {
    /// The first letter.
    Start,
    /// The middle.
    Middle,
    /// The last letter.
    End,
}

/// How many colours the ramp of a map has.
pub const LEVELS: u8 = 64;

/// Something painted.
#[derive(Clone, Debug, PartialEq)]
pub enum Item {
    /// Straight lines from point to point.
    Line {
        /// The points.
        points: Vec<[f64; 2]>,
        /// Its ink.
        ink: Ink,
        /// Its width.
        width: f64,
        /// Length of a dash and of the space after it.
        dashes: Option<(f64, f64)>,
    },
    /// A filled polygon.
    Area {
        /// Its corners.
        points: Vec<[f64; 2]>,
        /// Its ink.
        ink: Ink,
    },
    /// A filled polygon through which the ground is seen.
    Wash {
        /// Its corners.
        points: Vec<[f64; 2]>,
        /// Its ink.
        ink: Ink,
    },
    /// A grid of cells, each with a level of the colour ramp.
    Cells {
        /// Where the middles of the outermost cells stand; their outer halves are cut off.
        area: Rect,
        /// How many stand side by side.
        columns: usize,
        /// Levels row by row from the lowest row up, each less than [`LEVELS`]; cells without
        /// one are hatched.
        levels: Vec<Option<u8>>,
    },
    /// A round mark.
    Dot {
        /// Its centre.
        at: [f64; 2],
        /// Its radius.
        radius: f64,
        /// Its ink.
        ink: Ink,
        /// Whether it is filled.
        filled: bool,
    },
    /// A text.
    Text {
        /// Where it stands.
        at: [f64; 2],
        /// Which end of it stands there; half its height lies above.
        anchor: Anchor,
        /// Whether it reads upwards.
        upright: bool,
        /// Size of the letters.
        size: f64,
        /// Its ink.
        ink: Ink,
        /// What it says.
        content: String,
    },
}

/// A page.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Scene {
    /// Its width.
    pub width: f64,
    /// Its height.
    pub height: f64,
    /// Everything on it, what is painted over other things last.
    pub items: Vec<Item>,
    /// The panels' frames, in which all curves lie.
    pub frames: Vec<Rect>,
}

impl Scene {
    pub(super) fn line(&mut self, points: &[[f64; 2]], ink: Ink, width: f64) {
        self.items.push(Item::Line {
            points: points.to_vec(),
            ink,
            width,
            dashes: None,
        });
    }

    pub(super) fn area(&mut self, points: &[[f64; 2]], ink: Ink) {
        self.items.push(Item::Area {
            points: points.to_vec(),
            ink,
        });
    }

    pub(super) fn text(
        &mut self,
        at: [f64; 2],
        anchor: Anchor,
        size: f64,
        ink: Ink,
        content: &str,
    ) {
        self.items.push(Item::Text {
            at,
            anchor,
            upright: false,
            size,
            ink,
            content: content.into(),
        });
    }

    pub(super) fn upright_text(
        &mut self,
        at: [f64; 2],
        anchor: Anchor,
        size: f64,
        ink: Ink,
        content: &str,
    ) {
        self.items.push(Item::Text {
            at,
            anchor,
            upright: true,
            size,
            ink,
            content: content.into(),
        });
    }

    /// Every text with the place that it takes.
    pub fn texts(&self) -> Vec<(&str, Rect)> {
        self.items
            .iter()
            .filter_map(|item| match item {
                Item::Text {
                    at,
                    anchor,
                    upright,
                    size,
                    content,
                    ..
                } => Some((
                    content.as_str(),
                    text::place(*at, *anchor, *upright, *size, content),
                )),
                _ => None,
            })
            .collect()
    }
}
