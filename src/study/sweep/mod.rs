//! Any measure against one or two quantities.
//!
//! The grid is evaluated eight points at a time. Against one quantity, what lies between the points
//! is solved: every edge of stability, the extremes of every measure, and the places where a spot
//! is stationary, so that the mode there does not move with the quantity (dynamically stable
//! operation).

mod even;
mod grid;
mod result;
mod special;

use std::fmt;

pub use even::Even;
pub use result::{
    Column, Extreme, Extremes, Named, NearEdges, Place, StableRange, Stationary, Sweep, Varied,
    Where,
};

use crate::analysis::measures::why_none;
use crate::analysis::ranges::{Range, stable_within};
use crate::cavity::{Cavity, Measure, Origin, Slot};
use crate::optics::Plane;

/// Points of a sweep of one quantity, where none are asked for.
pub const POINTS: usize = 201;
/// Points along either quantity of two, where none are asked for.
pub const POINTS_OF_TWO: usize = 101;
/// Most points in all.
pub const MOST_POINTS: usize = 1_000_000;
/// Most values in all: points times measures.
pub const MOST_VALUES: usize = 10_000_000;

/// Points that lead a curve towards an edge.
const TOWARDS_EDGE: usize = 16;
/// More ranges than these cannot be told apart in a picture.
const RANGES_DRAWN: usize = 60;

/// A quantity and how far it is swept.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Vary {
    /// The quantity.
    pub slot: Slot,
    /// Where it begins, in SI units (1/R for a radius, 1/f for a focal length).
    pub from: f64,
    /// Where it ends; may be the smaller of the two.
    pub to: f64,
    /// The value as designed, likewise; none where nothing is written.
    pub nominal: Option<f64>,
}

/// What is swept, how finely, and what is looked at.
#[derive(Clone, Debug)]
pub struct Options {
    /// One or two quantities. All others keep their nominal values, tied ones move along.
    pub vary: Vec<Vary>,
    /// Points along each quantity, two at least; none for the usual count.
    pub points: Option<usize>,
    /// Measures with their names.
    pub measures: Vec<(String, Measure)>,
}

/// Why there is no sweep.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum SweepError {
    /// Neither one nor two quantities are varied.
    Quantities,
    /// Both quantities, counted from zero, are the same.
    Twice,
    /// A quantity, counted from zero, follows another.
    Tied(usize),
    /// A quantity, counted from zero, begins where it ends.
    NoWay(usize),
    /// A quantity, counted from zero, moves neither the beam nor a measure.
    MovesNothing(usize),
    /// Too few or too many points in all.
    Points(usize),
    /// Too many values in all.
    Values(usize),
}

impl fmt::Display for SweepError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            SweepError::Quantities => f.write_str("one or two quantities are varied"),
            SweepError::Twice => f.write_str("this quantity is varied twice"),
            SweepError::Tied(_) => f.write_str("this quantity is tied and follows another"),
            SweepError::NoWay(_) => f.write_str("this range begins where it ends"),
            SweepError::MovesNothing(_) => {
                f.write_str("this quantity moves neither the beam nor any measure asked for")
            }
            SweepError::Points(points) => write!(
                f,
                "{points} points are asked for; a sweep has between 2 along each quantity and \
                 {MOST_POINTS} in all"
            ),
            SweepError::Values(values) => write!(
                f,
                "{values} values are asked for; points times measures are {MOST_VALUES} at most"
            ),
        }
    }
}

impl std::error::Error for SweepError {}

/// Sweeps one or two quantities.
///
/// The values of `vary` must be such as the file reader allows for their quantities.
///
/// # Errors
/// What is wrong with the options.
pub fn sweep(cavity: &Cavity, options: &Options) -> Result<Sweep, SweepError> {
    let vary = &options.vary;
    if vary.is_empty() || vary.len() > 2 {
        return Err(SweepError::Quantities);
    }
    if vary.len() == 2 && vary[0].slot == vary[1].slot {
        return Err(SweepError::Twice);
    }
    let usual = if vary.len() == 1 {
        POINTS
    } else {
        POINTS_OF_TWO
    };
    let along = options.points.unwrap_or(usual);
    let points = along.saturating_pow(vary.len() as u32);
    if along < 2 || points > MOST_POINTS {
        return Err(SweepError::Points(points));
    }
    let values = points.saturating_mul(options.measures.len());
    if values > MOST_VALUES {
        return Err(SweepError::Values(values));
    }
    for (index, one) in vary.iter().enumerate() {
        if cavity.book().entry(one.slot).origin == Origin::Tied {
            return Err(SweepError::Tied(index));
        }
        if one.from == one.to {
            return Err(SweepError::NoWay(index));
        }
        if !moves_anything(cavity, one, &options.measures) {
            return Err(SweepError::MovesNothing(index));
        }
    }
    Ok(swept(cavity, options, along))
}

/// Whether rays or any of the measures differ between a few places of the range.
fn moves_anything(cavity: &Cavity, vary: &Vary, measures: &[(String, Measure)]) -> bool {
    let places = [0.0, 0.19, 0.5, 0.73, 1.0];
    let kept = places.map(|share| vary.from + (vary.to - vary.from) * share);
    let measures: Vec<Measure> = measures.iter().map(|(_, measure)| *measure).collect();
    let seen = grid::evaluate(cavity, &measures, &[(vary.slot, &kept)]);
    let differ = |values: &Vec<Option<f64>>| values.iter().any(|value| *value != values[0]);
    if seen.values.iter().any(differ) {
        return true;
    }
    let mut values = cavity.book().nominal();
    let mut ways = kept.iter().map(|kept| {
        values[vary.slot.index()] = *kept;
        cavity.book().follow_ties(&mut values);
        let way = cavity.one_way(&values);
        Plane::BOTH.map(|plane| {
            let m = way[plane];
            [m.a, m.b, m.c, m.d].map(f64::to_bits)
        })
    });
    let first = ways.next();
    ways.any(|way| Some(way) != first)
}

fn swept(cavity: &Cavity, options: &Options, along: usize) -> Sweep {
    let varied: Vec<Varied> = options
        .vary
        .iter()
        .map(|vary| Varied::new(cavity, vary, along))
        .collect();
    let measures: Vec<Measure> = options.measures.iter().map(|(_, m)| *m).collect();
    let axes: Vec<(Slot, &[f64])> = varied.iter().map(|one| (one.slot, &one.kept[..])).collect();
    let found = grid::evaluate(cavity, &measures, &axes);
    let mut cautions: Vec<String> = cavity.cautions().to_vec();
    cautions.extend(varied.iter().filter_map(Varied::caution));
    let inner = (varied.len() == 2).then_some(along);
    let columns: Vec<(String, Column)> = options
        .measures
        .iter()
        .zip(found.values)
        .map(|((name, measure), values)| {
            let column = Column {
                measure: *measure,
                values,
                inner,
            };
            (name.clone(), column)
        })
        .collect();
    let why = columns
        .iter()
        .filter(|(_, column)| column.values.iter().any(Option::is_none))
        .map(|(name, column)| (name.clone(), why_none(column.measure).to_string()))
        .collect();
    let stable_points = found.stable.iter().filter(|stable| **stable).count();
    let mut sweep = Sweep {
        title: cavity.title.clone(),
        form: cavity.form().name(),
        wavelength_m: Cavity::WAVELENGTH.of(&cavity.book().nominal()),
        vary: varied,
        stable_share: stable_points as f64 / found.stable.len() as f64,
        has_stable: stable_points > 0,
        measures: Named(columns),
        why: Named(why),
        stable_ranges: None,
        extremes: Named(Vec::new()),
        stationary: None,
        cautions,
        limits: cavity.limits.clone(),
        stable: found.stable,
        near_edges: NearEdges::default(),
    };
    match options.vary[..] {
        [one] => along_one(cavity, one, &mut sweep),
        _ => over_two(&mut sweep),
    }
    sweep
}

/// What lies between the points of a sweep of one quantity.
fn along_one(cavity: &Cavity, vary: Vary, sweep: &mut Sweep) {
    let (from, to) = (vary.from.min(vary.to), vary.from.max(vary.to));
    let within = stable_within(cavity, vary.slot, from, to);
    if within.searched_to < to {
        sweep.cautions.push(
            "the round trip varies too fast with this quantity to follow it to its end: edges \
             are missing from the list of ranges"
                .into(),
        );
    }
    let is_restless = |m: &Measure| matches!(m, Measure::ModeClearance { .. });
    if sweep
        .measures
        .0
        .iter()
        .any(|(_, column)| is_restless(&column.measure))
    {
        sweep.cautions.push(
            "the mode clearance turns at every coincidence of modes: its extremes are those of \
             the places looked at, not of all"
                .into(),
        );
    }
    let varied = &sweep.vary[0];
    let place = |kept: f64| Place::of(varied, kept);
    let searched = (from, within.searched_to);
    let mut stationary = Vec::new();
    for (name, column) in &sweep.measures.0 {
        let found = special::find(cavity, vary.slot, column.measure, &within.ranges, searched);
        stationary.extend(found.stationary.into_iter().map(|point| Stationary {
            measure: name.clone(),
            value: point.value,
            kind: if point.is_minimum {
                "minimum"
            } else {
                "maximum"
            },
            place: place(point.at),
        }));
        if let Some(extremes) = found.extremes {
            let [least, greatest] = extremes.map(|(value, at, location)| Extreme {
                value,
                place: place(at),
                location,
                why: value
                    .is_none()
                    .then(|| "the edge of stability is approached and not reached".to_string()),
            });
            sweep
                .extremes
                .0
                .push((name.clone(), Extremes { least, greatest }));
        }
    }
    sweep.has_stable |= !within.ranges.is_empty();
    sweep.stable_ranges = Some(
        within
            .ranges
            .iter()
            .map(|range| StableRange::new(*range, searched, varied.is_reciprocal()))
            .collect(),
    );
    sweep.stationary = Some(stationary);
    sweep.near_edges = near_edges(cavity, &sweep.measures, varied, &within.ranges);
}

/// Points towards every edge of stability, closer than those of the grid: there a beam grows or
/// shrinks without bound, and the grid ends short of it.
fn near_edges(
    cavity: &Cavity,
    measures: &Named<Column>,
    varied: &Varied,
    ranges: &[Range],
) -> NearEdges {
    let steps = varied.kept.windows(2).map(|pair| (pair[1] - pair[0]).abs());
    let step = steps.fold(0.0, f64::max);
    let mut kept = Vec::new();
    for range in ranges.iter().take(RANGES_DRAWN) {
        let [a, b] = [range.from.value(), range.to.value()];
        let half = match (a, b) {
            (Some(a), Some(b)) => 0.5 * (b - a),
            _ => step,
        };
        for (edge, inwards) in [(a, 1.0), (b, -1.0)] {
            let Some(edge) = edge else { continue };
            kept.extend((0..=TOWARDS_EDGE).map(|k| {
                let share = k as f64 / TOWARDS_EDGE as f64;
                edge + inwards * half.min(step) * share.powi(3)
            }));
        }
    }
    if kept.is_empty() {
        return NearEdges::default();
    }
    let measures: Vec<Measure> = measures
        .0
        .iter()
        .map(|(_, column)| column.measure)
        .collect();
    let values = grid::evaluate(cavity, &measures, &[(varied.slot, &kept)]).values;
    NearEdges { kept, values }
}

/// The extremes among the stable points of a map.
fn over_two(sweep: &mut Sweep) {
    let along = sweep.vary[1].kept.len();
    for (name, column) in &sweep.measures.0 {
        let mut ends: Option<[(f64, usize); 2]> = None;
        let stable = column.values.iter().zip(&sweep.stable).enumerate();
        for (index, (value, _)) in stable.filter(|(_, (_, stable))| **stable) {
            let Some(value) = *value else { continue };
            let [least, greatest] = ends.get_or_insert([(value, index); 2]);
            if value < least.0 {
                *least = (value, index);
            }
            if value > greatest.0 {
                *greatest = (value, index);
            }
        }
        let Some(ends) = ends else { continue };
        let [least, greatest] = ends.map(|(value, index)| Extreme {
            value: Some(value),
            place: Place::Two([
                sweep.vary[0].as_written(index / along),
                sweep.vary[1].as_written(index % along),
            ]),
            location: Where::Point,
            why: None,
        });
        sweep
            .extremes
            .0
            .push((name.clone(), Extremes { least, greatest }));
    }
}
