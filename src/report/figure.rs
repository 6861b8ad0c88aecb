//! A neutral picture: axes, curves, marks and what stands along the path, without a pixel, a
//! colour or a font.
//!
//! A figure is a row of panels over one vertical axis; most have one panel. Lengths are kept in
//! SI units, and an axis says in which unit it is read.

use super::number::Scale;

/// Range and reading of an axis.
#[derive(Clone, Debug, PartialEq)]
pub struct Axis {
    /// What it shows, with the unit where its ticks have none.
    pub title: String,
    /// Its lower end.
    pub from: f64,
    /// Its upper end.
    pub to: f64,
    /// Where its numbers count from.
    pub origin: f64,
    /// How its numbers are spaced and read.
    pub ticks: Ticks,
}

/// How the numbers of an axis are spaced and read.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Ticks {
    /// Evenly, in one unit that the title names.
    Even(Scale),
    /// By decades, each number with its own unit of these.
    Decades(&'static [Scale]),
    /// By decades, in one unit that the title names.
    Powers(Scale),
}

/// How a curve is drawn, so that two differ in print too.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Stroke {
    /// In one line.
    Solid,
    /// In dashes.
    Dashed,
    /// In dots.
    Dotted,
    /// In dashes with a dot between.
    DashDotted,
}

impl Stroke {
    /// All of them, the plainest first.
    pub const ALL: [Stroke; 4] = [
        Stroke::Solid,
        Stroke::Dashed,
        Stroke::Dotted,
        Stroke::DashDotted,
    ];

    /// How it is named in words.
    pub fn name(self) -> &'static str {
        match self {
            Stroke::Solid => "solid",
            Stroke::Dashed => "dashed",
            Stroke::Dotted => "dotted",
            Stroke::DashDotted => "dash-dotted",
        }
    }
}

/// A curve, or a piece of one.
#[derive(Clone, Debug, PartialEq)]
pub struct Curve {
    /// What is written at it; pieces of one curve share it.
    pub label: String,
    /// How it is drawn.
    pub stroke: Stroke,
    /// Its points.
    pub points: Vec<[f64; 2]>,
}

/// A marked place on a curve.
#[derive(Clone, Debug, PartialEq)]
pub struct Mark {
    /// Where it is; two places that share a label stand close together.
    pub places: Vec<(Stroke, [f64; 2])>,
    /// What is written at it.
    pub label: String,
}

/// Which way a surface or lens bends a beam.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Curvature {
    /// It focuses.
    Focusing,
    /// It does neither.
    Flat,
    /// It defocuses.
    Defocusing,
}

/// What an optic looks like.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Glyph {
    /// A mirror at the start of the path.
    FirstMirror(Curvature),
    /// A mirror at the end of the path.
    LastMirror(Curvature),
    /// A mirror on the way.
    FoldMirror(Curvature),
    /// A thin lens.
    Lens(Curvature),
    /// A body with two faces, tilted or not.
    Slab {
        /// Whether the beam meets it at an angle.
        tilted: bool,
    },
    /// A body that guides the beam or drives it apart.
    Duct,
    /// An opening, and half its width on the vertical axis.
    Aperture(f64),
    /// A body of which only the matrix is known.
    Unseen,
}

impl Glyph {
    /// Whether it fills its place from one end to the other.
    pub fn is_body(self) -> bool {
        matches!(self, Glyph::Slab { .. } | Glyph::Duct | Glyph::Unseen)
    }
}

/// An optic at its place.
#[derive(Clone, Debug, PartialEq)]
pub struct Symbol {
    /// Its name.
    pub name: String,
    /// What is written beside the name.
    pub value: String,
    /// What it looks like.
    pub glyph: Glyph,
    /// Where it begins.
    pub from: f64,
    /// Where it ends; thin optics end where they begin.
    pub to: f64,
}

/// One stretch of the horizontal axis and what is drawn over it.
#[derive(Clone, Debug, PartialEq)]
pub struct Panel {
    /// Its horizontal axis.
    pub x: Axis,
    /// Its share of the figure's width, the shares of all panels summing to 1.
    pub share: f64,
    /// Its curves.
    pub curves: Vec<Curve>,
    /// Its marks.
    pub marks: Vec<Mark>,
    /// Its optics, in order.
    pub symbols: Vec<Symbol>,
}

/// A picture.
#[derive(Clone, Debug, PartialEq)]
pub struct Figure {
    /// What it shows.
    pub title: String,
    /// The answer, which is never shortened.
    pub verdict: String,
    /// A line of particulars.
    pub particulars: String,
    /// The vertical axis; none where there is nothing to measure.
    pub y: Option<Axis>,
    /// Its panels, from left to right.
    pub panels: Vec<Panel>,
    /// What a reader must know who looks for what is not there.
    pub missing: Vec<String>,
    /// Lines beneath the picture.
    pub notes: Vec<String>,
}
