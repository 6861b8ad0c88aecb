//! A neutral chart: panels with axes of their own and layers of what is drawn over them, without
//! a pixel, a colour or a font.
//!
//! Panels are read like text, in one column or two. Values are kept in SI units, and an axis says
//! in which unit it is read. What does not exist is left out, never drawn at zero.

use super::figure::{Axis, Mark, Stroke};

/// A picture of charts.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Chart {
    /// What it shows.
    pub title: String,
    /// The answer, which is never shortened.
    pub verdict: String,
    /// A line of particulars.
    pub particulars: String,
    /// How many panels stand side by side: one or two.
    pub columns: usize,
    /// Its panels, row by row.
    pub panels: Vec<Panel>,
    /// What a reader must know who looks for what is not there.
    pub missing: Vec<String>,
    /// Lines beneath the picture.
    pub notes: Vec<String>,
}

/// One pair of axes and what is drawn over them.
#[derive(Clone, Debug, PartialEq)]
pub struct Panel {
    /// What this panel shows; may be empty.
    pub heading: String,
    /// Its horizontal axis. One that equals that of the panel above is read there too.
    pub x: Axis,
    /// Its vertical axis; none where the names of bars stand in its place.
    pub y: Option<Axis>,
    /// What is drawn, in any order: areas lie beneath lines, and lines beneath marks.
    pub layers: Vec<Layer>,
}

/// Something drawn over a pair of axes. What lies outside the axes is cut off at the frame.
#[derive(Clone, Debug, PartialEq)]
pub enum Layer {
    /// A tinted stretch of the horizontal axis.
    Range(Range),
    /// A straight line from edge to edge.
    Reference(Reference),
    /// A curve.
    Curve(Curve),
    /// What lies between two curves.
    Band(Band),
    /// Single points, such as measured ones.
    Points(Points),
    /// A marked place.
    Mark(Mark),
    /// Counts or shares over intervals.
    Histogram(Histogram),
    /// Bars that begin at zero, from top to bottom, each with its name at the left.
    Bars(Vec<Bar>),
    /// Upright sticks that begin at zero, or at the foot of an axis that has no zero.
    Sticks(Vec<Stick>),
    /// A value over both axes.
    Map(Map),
}

/// A tinted stretch of the horizontal axis.
#[derive(Clone, Debug, PartialEq)]
pub struct Range {
    /// Where it begins.
    pub from: f64,
    /// Where it ends.
    pub to: f64,
    /// What is written in it; may be empty.
    pub label: String,
}

/// Which axis a reference line stands on.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Across {
    /// At one place of the horizontal axis, from bottom to top.
    X,
    /// At one place of the vertical axis, from left to right.
    Y,
}

/// What a reference line means.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Meaning {
    /// The value as designed.
    Nominal,
    /// A help to read by, such as a quantile.
    Guide,
    /// Larger values are forbidden.
    AtMost,
    /// Smaller values are forbidden.
    AtLeast,
}

/// A straight line at one value of an axis.
#[derive(Clone, Debug, PartialEq)]
pub struct Reference {
    /// Which axis it stands on.
    pub across: Across,
    /// The value.
    pub at: f64,
    /// What it means.
    pub meaning: Meaning,
    /// What is written at it; may be empty.
    pub label: String,
}

/// A curve, in pieces where its value does not exist everywhere.
#[derive(Clone, Debug, PartialEq)]
pub struct Curve {
    /// What is written at it; may be empty.
    pub label: String,
    /// How it is drawn.
    pub stroke: Stroke,
    /// Its pieces; nothing is drawn from one to the next.
    pub pieces: Vec<Vec<[f64; 2]>>,
}

impl Curve {
    /// A curve through points, interrupted where there is no value or where it is not a finite
    /// number. A pole is such a place: the caller leaves a gap there.
    pub fn through(
        label: impl Into<String>,
        stroke: Stroke,
        points: impl IntoIterator<Item = (f64, Option<f64>)>,
    ) -> Curve {
        let mut pieces = vec![Vec::new()];
        for (x, y) in points {
            match y.filter(|y| x.is_finite() && y.is_finite()) {
                Some(y) => {
                    if let Some(piece) = pieces.last_mut() {
                        piece.push([x, y]);
                    }
                }
                None => pieces.push(Vec::new()),
            }
        }
        pieces.retain(|piece| !piece.is_empty());
        Curve {
            label: label.into(),
            stroke,
            pieces,
        }
    }
}

/// What lies between two curves, such as a band of confidence.
#[derive(Clone, Debug, PartialEq)]
pub struct Band {
    /// What it means, for a line beneath the picture; may be empty.
    pub label: String,
    /// Whose band it is.
    pub stroke: Stroke,
    /// Its edges: place, lower and upper value. A new piece begins where it does not exist.
    pub pieces: Vec<Vec<[f64; 3]>>,
}

/// A measured point.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Point {
    /// Its place on the horizontal axis.
    pub x: f64,
    /// Its place on the vertical axis.
    pub y: f64,
    /// From where to where it may lie on the horizontal axis.
    pub x_range: Option<[f64; 2]>,
    /// From where to where it may lie on the vertical axis.
    pub y_range: Option<[f64; 2]>,
}

/// Points of one kind.
#[derive(Clone, Debug, PartialEq)]
pub struct Points {
    /// What they are, written at one of them; may be empty.
    pub label: String,
    /// Whose points they are: each stroke has a shape of its own.
    pub stroke: Stroke,
    /// The points.
    pub points: Vec<Point>,
}

/// Counts or shares over intervals that touch.
#[derive(Clone, Debug, PartialEq)]
pub struct Histogram {
    /// Ends of the intervals, rising: one more than there are heights.
    pub edges: Vec<f64>,
    /// What is counted in each.
    pub heights: Vec<f64>,
}

/// A bar with a name.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Bar {
    /// What is written at its left.
    pub name: String,
    /// How far the filled bar reaches from zero.
    pub value: f64,
    /// How far an outlined bar around it reaches.
    pub total: Option<f64>,
    /// From where to where a whisker reaches.
    pub whisker: Option<[f64; 2]>,
    /// What is written at its end; may be empty.
    pub label: String,
}

/// A stick of a spectrum.
#[derive(Clone, Debug, PartialEq)]
pub struct Stick {
    /// Where it stands.
    pub at: f64,
    /// How far up it reaches.
    pub height: f64,
    /// How it is drawn.
    pub stroke: Stroke,
    /// What is written over it; may be empty.
    pub label: String,
}

/// A value over a regular grid that fills both axes.
#[derive(Clone, Debug, PartialEq)]
pub struct Map {
    /// Columns: the first stands at the lower end of the horizontal axis, the last at its upper
    /// end, the others evenly between as the axis counts.
    pub columns: usize,
    /// Values row by row from the lower end of the vertical axis to its upper end; none where the
    /// value does not exist. A row that is not whole is not drawn.
    pub values: Vec<Option<f64>>,
    /// The axis of the values, beside their colours. What lies outside has the colour of its end.
    pub scale: Axis,
    /// What it means that there is no value, such as "unstable".
    pub absent: String,
    /// Lines along which the value is the same.
    pub contours: Vec<Contour>,
    /// The place as designed, marked with a cross.
    pub nominal: Option<[f64; 2]>,
}

/// A line along which a value is the same.
#[derive(Clone, Debug, PartialEq)]
pub struct Contour {
    /// The value.
    pub level: f64,
    /// What it means: limits have little lines to the forbidden side.
    pub meaning: Meaning,
    /// What is written at it; may be empty.
    pub label: String,
}
