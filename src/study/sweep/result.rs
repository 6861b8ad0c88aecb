//! The result of a sweep: plain, documented, serialisable; SI units.

use serde::{Serialize, Serializer};

use super::{Even, Vary};
use crate::analysis::ranges::{End, Range};
use crate::cavity::{Cavity, Limit, Measure, Slot};
use crate::quantity::Kind;

/// Things under their names, in order.
#[derive(Clone, Debug, PartialEq)]
pub struct Named<T>(pub Vec<(String, T)>);

impl<T: Serialize> Serialize for Named<T> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.collect_map(self.0.iter().map(|(name, value)| (name, value)))
    }
}

impl<T> Named<T> {
    /// The thing with a name.
    pub fn get(&self, name: &str) -> Option<&T> {
        let found = self.0.iter().find(|(known, _)| known == name)?;
        Some(&found.1)
    }
}

/// Everything that a sweep found.
#[derive(Clone, Debug, Serialize)]
pub struct Sweep {
    /// The cavity's title; left out where it has none.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub title: Option<String>,
    /// `standing` or `ring`.
    pub form: &'static str,
    /// Wavelength in vacuum.
    pub wavelength_m: f64,
    /// The quantities and their values.
    pub vary: Vec<Varied>,
    /// Share of the points at which both planes hold a mode.
    pub stable_share: f64,
    /// Whether any value makes the cavity stable, at a point or between two.
    pub has_stable: bool,
    /// All ranges of stability of one quantity, edges solved; left out for two.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub stable_ranges: Option<Vec<StableRange>>,
    /// Least and greatest value of each measure where the cavity is stable; a measure that exists
    /// nowhere there is left out.
    pub extremes: Named<Extremes>,
    /// Where the beam radii asked for do not move with the quantity; left out for two.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub stationary: Option<Vec<Stationary>>,
    /// Values of each measure.
    pub measures: Named<Column>,
    /// Why values are missing, for each measure that lacks any.
    pub why: Named<String>,
    /// Doubts that the reader should know.
    pub cautions: Vec<String>,
    /// The file's limits, for pictures.
    #[serde(skip)]
    pub limits: Vec<Limit>,
    /// Whether both planes hold a mode, at each point.
    #[serde(skip)]
    pub stable: Vec<bool>,
    /// More points towards the edges of stability, for pictures.
    #[serde(skip)]
    pub near_edges: NearEdges,
}

/// Points of a sweep of one quantity that are not on its grid.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct NearEdges {
    /// The quantity's values as kept, in no order.
    pub kept: Vec<f64>,
    /// The values there of each measure.
    pub values: Vec<Vec<Option<f64>>>,
}

/// A quantity and its values.
#[derive(Clone, Debug, Serialize)]
pub struct Varied {
    /// Its address.
    pub quantity: String,
    /// Its values in SI units as written, evenly spaced and rising; of radii and focal lengths in
    /// metres, none where flat, and evenly spaced only where the range does not pass flat.
    pub values: Vec<Option<f64>>,
    /// 1/R or 1/f; left out for other quantities.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub values_per_m: Option<Vec<f64>>,
    /// The value as designed, in SI units as written; none for flat, and where nothing is written.
    pub nominal: Option<f64>,
    /// Its reciprocal; left out for other quantities, and where nothing is written.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub nominal_per_m: Option<f64>,
    /// Its slot.
    #[serde(skip)]
    pub slot: Slot,
    /// How it is written.
    #[serde(skip)]
    pub kind: Kind,
    /// In what it is swept evenly.
    #[serde(skip)]
    pub even: Even,
    /// Its values as kept: the reciprocal of radii and focal lengths.
    #[serde(skip)]
    pub kept: Vec<f64>,
    /// The value as designed, likewise.
    #[serde(skip)]
    pub nominal_kept: Option<f64>,
}

impl Varied {
    pub(super) fn new(cavity: &Cavity, vary: &Vary, points: usize) -> Varied {
        let entry = cavity.book().entry(vary.slot);
        let even = Even::between(entry.kind, vary.from, vary.to);
        let kept = even.values(vary.from, vary.to, points);
        let reciprocal = entry.is_reciprocal();
        Varied {
            quantity: entry.address.clone(),
            values: kept.iter().map(|x| written(*x, reciprocal)).collect(),
            values_per_m: reciprocal.then(|| kept.clone()),
            nominal: vary.nominal.and_then(|x| written(x, reciprocal)),
            nominal_per_m: vary.nominal.filter(|_| reciprocal),
            slot: vary.slot,
            kind: entry.kind,
            even,
            kept,
            nominal_kept: vary.nominal,
        }
    }

    /// Whether the reciprocal of the quantity is kept.
    pub fn is_reciprocal(&self) -> bool {
        self.kind.is_reciprocal()
    }

    /// A value in SI units as written; none for flat.
    pub fn as_written(&self, index: usize) -> Option<f64> {
        self.values.get(index).copied().flatten()
    }

    /// The place on the axis of a value as kept.
    pub fn shown(&self, kept: f64) -> f64 {
        self.even.shown(kept)
    }

    /// The value as designed on the axis, where it lies in the range.
    pub fn nominal_within(&self) -> Option<f64> {
        let nominal = self.nominal_kept?;
        let ends = [*self.kept.first()?, *self.kept.last()?];
        let within = ends[0].min(ends[1]) <= nominal && nominal <= ends[0].max(ends[1]);
        within.then(|| self.shown(nominal))
    }

    pub(super) fn caution(&self) -> Option<String> {
        let passes_flat = self.is_reciprocal() && self.even == Even::Kept;
        passes_flat.then(|| {
            format!(
                "the range of {} holds flat: it is swept in even steps of 1/m",
                self.quantity
            )
        })
    }
}

fn written(kept: f64, reciprocal: bool) -> Option<f64> {
    if !reciprocal {
        return Some(kept);
    }
    Some(kept.recip()).filter(|radius| radius.is_finite())
}

/// The values of one measure.
#[derive(Clone, Debug, PartialEq)]
pub struct Column {
    /// The measure.
    pub measure: Measure,
    /// Its values in SI units, the second quantity running first; none where there is none.
    pub values: Vec<Option<f64>>,
    /// How many values the second quantity has, if there is one.
    pub inner: Option<usize>,
}

impl Serialize for Column {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        match self.inner {
            None => self.values.serialize(serializer),
            Some(inner) => serializer.collect_seq(self.values.chunks(inner)),
        }
    }
}

/// A range of one quantity over which the cavity is stable.
#[derive(Clone, Debug, Serialize)]
pub struct StableRange {
    /// Its lower end; left out for radii and focal lengths.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub from: Option<f64>,
    /// Its upper end; left out for radii and focal lengths.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub to: Option<f64>,
    /// Lower end of 1/R or 1/f.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub from_per_m: Option<f64>,
    /// Upper end of 1/R or 1/f.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub to_per_m: Option<f64>,
    /// Whether an edge of stability ends it below; else the sweep begins there.
    pub from_is_edge: bool,
    /// Whether that edge is a touch: stable again beyond.
    pub from_is_touch: bool,
    /// The plane that becomes unstable there.
    pub from_plane: Option<&'static str>,
    /// Whether an edge of stability ends it above; else the sweep ends there.
    pub to_is_edge: bool,
    /// Whether that edge is a touch: stable again beyond.
    pub to_is_touch: bool,
    /// The plane that becomes unstable there.
    pub to_plane: Option<&'static str>,
    /// Both ends as kept.
    #[serde(skip)]
    pub ends: [f64; 2],
}

impl StableRange {
    pub(super) fn new(range: Range, searched: (f64, f64), reciprocal: bool) -> StableRange {
        let ends = [
            range.from.value().unwrap_or(searched.0),
            range.to.value().unwrap_or(searched.1),
        ];
        let is_touch = |end| matches!(end, End::Edge { touch: true, .. });
        let plane = |end| match end {
            End::Edge { plane, .. } => Some(plane.name()),
            _ => None,
        };
        let per_m = |x: f64| reciprocal.then_some(x);
        let plain = |x: f64| (!reciprocal).then_some(x);
        StableRange {
            from: plain(ends[0]),
            to: plain(ends[1]),
            from_per_m: per_m(ends[0]),
            to_per_m: per_m(ends[1]),
            from_is_edge: plane(range.from).is_some(),
            from_is_touch: is_touch(range.from),
            from_plane: plane(range.from),
            to_is_edge: plane(range.to).is_some(),
            to_is_touch: is_touch(range.to),
            to_plane: plane(range.to),
            ends,
        }
    }
}

/// Where something was found.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
#[serde(untagged)]
pub enum Place {
    /// At a value of the one quantity.
    One {
        /// The value in SI units.
        at: f64,
    },
    /// At a value of the one radius or focal length.
    OnePerMetre {
        /// 1/R or 1/f.
        at_per_m: f64,
    },
    /// At a point of a map.
    #[serde(serialize_with = "as_pair")]
    Two([Option<f64>; 2]),
}

fn as_pair<S: Serializer>(pair: &[Option<f64>; 2], serializer: S) -> Result<S::Ok, S::Error> {
    serializer.collect_map([("at", pair)])
}

impl Place {
    pub(super) fn of(varied: &Varied, kept: f64) -> Place {
        if varied.is_reciprocal() {
            Place::OnePerMetre { at_per_m: kept }
        } else {
            Place::One { at: kept }
        }
    }

    /// The value as kept of the one quantity.
    pub fn kept(self) -> Option<f64> {
        match self {
            Place::One { at } => Some(at),
            Place::OnePerMetre { at_per_m } => Some(at_per_m),
            Place::Two(_) => None,
        }
    }
}

/// What kind of place an extreme is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Where {
    /// Inside a stable range, solved.
    Inside,
    /// An edge of stability.
    Edge,
    /// The end of the sweep.
    End,
    /// The best of the points of a map, not refined.
    Point,
}

/// The least or greatest value of a measure where the cavity is stable.
#[derive(Clone, Debug, Serialize)]
pub struct Extreme {
    /// The value; none where an edge is approached, at which there is none.
    pub value: Option<f64>,
    /// Where it is.
    #[serde(flatten)]
    pub place: Place,
    /// What kind of place that is.
    #[serde(rename = "where")]
    pub location: Where,
    /// Why the value is missing.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub why: Option<String>,
}

/// Both extremes of a measure.
#[derive(Clone, Debug, Serialize)]
pub struct Extremes {
    /// The least value.
    pub least: Extreme,
    /// The greatest value.
    pub greatest: Extreme,
}

/// A place where a beam radius does not move with the quantity.
#[derive(Clone, Debug, Serialize)]
pub struct Stationary {
    /// The measure.
    pub measure: String,
    /// Its value there, in metres.
    pub value: f64,
    /// `minimum` or `maximum`.
    pub kind: &'static str,
    /// Where it is.
    #[serde(flatten)]
    pub place: Place,
}
