//! A sweep as a picture: curves over one quantity, maps over two.

use super::measured::scales_of;
use super::sweep::{name_along, number, scales_along, told, verdict};
use crate::cavity::{Bounds, Limit, Measure, Presence};
use crate::quantity::Kind;
use crate::report::chart::{
    Across, Chart, Contour, Curve, Layer, Map, Meaning, Panel, Range, Reference,
};
use crate::report::figure::{Axis, Mark, Stroke, Ticks};
use crate::report::number::{Scale, plain};
use crate::study::sweep::{Column, Sweep, Varied, Where};

/// A radius that grows without bound at an edge leaves the frame at this multiple of the value
/// that most points stay below.
const BEYOND_MOST: f64 = 1.8;
/// The share of points that are most.
const MOST: f64 = 0.9;
/// An axis reaches for a limit as far as this multiple of what the curves need.
const REACH_FOR_LIMIT: f64 = 1.6;
/// Room above two curves, as a share of their height.
const ROOM_FOR_TWO: f64 = 0.3;
/// More marks than this in a panel have no labels.
const LABELLED: usize = 8;

/// The picture of a sweep.
pub fn describe(sweep: &Sweep) -> Chart {
    let names: Vec<String> = sweep.vary.iter().map(|v| v.quantity.clone()).collect();
    let (word, rest) = verdict(sweep);
    let title = match &sweep.title {
        Some(title) => format!("{title}: sweep of {}", names.join(" and ")),
        None => format!("Sweep of {}", names.join(" and ")),
    };
    let now: Vec<String> = sweep
        .vary
        .iter()
        .filter_map(|varied| {
            let kept = varied.nominal_kept?;
            Some(format!(
                "{} now {}",
                varied.quantity,
                told(kept, varied.kind)
            ))
        })
        .collect();
    let mut particulars = vec![
        format!("{} cavity", sweep.form),
        format!("{} nm", plain(sweep.wavelength_m * 1e9, 6)),
    ];
    particulars.extend(now);
    let groups = groups(sweep);
    let (panels, columns) = match &sweep.vary[..] {
        [varied] => {
            let panel = |group: &Group<'_>| curves(sweep, varied, group);
            (groups.iter().map(panel).collect(), 1)
        }
        [x, y, ..] => {
            let panels: Vec<Panel> = (sweep.measures.0.iter())
                .map(|(name, column)| map(sweep, [x, y], name, column))
                .collect();
            let columns = if panels.len() > 1 { 2 } else { 1 };
            (panels, columns)
        }
        [] => (Vec::new(), 1),
    };
    let mut notes: Vec<String> = Vec::new();
    if sweep.measures.0.iter().any(|(_, c)| is_radius(c)) {
        notes.push("beam radii at 1/e² of the intensity".into());
    }
    Chart {
        title,
        verdict: format!("{} {rest}", word.to_lowercase()),
        particulars: particulars.join("; "),
        columns,
        panels,
        missing: missing(sweep),
        notes,
    }
}

fn is_radius(column: &Column) -> bool {
    matches!(
        column.measure,
        Measure::Spot(..) | Measure::Least(..) | Measure::Waist(..)
    )
}

/// Whether a measure turns so seldom that its marks lie on the drawn curve.
fn is_smooth(column: &Column) -> bool {
    !matches!(column.measure, Measure::ModeClearance { .. })
}

/// Measures that have no value anywhere.
fn missing(sweep: &Sweep) -> Vec<String> {
    (sweep.measures.0.iter())
        .filter(|(_, column)| column.values.iter().all(Option::is_none))
        .map(|(name, _)| match sweep.why.get(name) {
            Some(why) => format!("no {name}: {why}"),
            None => format!("no {name}"),
        })
        .collect()
}

/// Measures that are drawn over each other: one of both planes, or one alone.
struct Group<'s> {
    heading: String,
    columns: Vec<(&'s str, &'s str, &'s Column)>,
}

fn groups(sweep: &Sweep) -> Vec<Group<'_>> {
    let mut groups: Vec<Group<'_>> = Vec::new();
    for (name, column) in &sweep.measures.0 {
        let (base, plane) = match name.rsplit_once('.') {
            Some((base, plane @ ("tangential" | "sagittal"))) => (base, plane),
            _ => (name.as_str(), ""),
        };
        let found = groups
            .iter_mut()
            .find(|group| group.heading == base && group.columns.len() < Stroke::ALL.len());
        match found {
            Some(group) => group.columns.push((name, plane, column)),
            None => groups.push(Group {
                heading: base.into(),
                columns: vec![(name, plane, column)],
            }),
        }
    }
    groups
}

/// The axis of a quantity; temperatures are read in degrees.
fn along(varied: &Varied) -> Axis {
    let ends = [varied.kept.first(), varied.kept.last()]
        .map(|kept| kept.map_or(0.0, |kept| varied.shown(*kept)));
    let name = name_along(varied);
    if varied.kind == Kind::Temperature {
        return Axis {
            title: format!("{name}, °C"),
            from: ends[0],
            to: ends[1],
            origin: 273.15,
            ticks: Ticks::Even(Scale {
                symbol: "°C",
                size: 1.0,
            }),
        };
    }
    Axis::between(&name, ends[0], ends[1], scales_along(varied))
}

/// From where to where the values of some columns are worth showing, limits near by included.
fn ends(columns: &[&Column], stable: Option<&[bool]>, limits: &[&Limit]) -> Option<[f64; 2]> {
    let is_shown = |index: usize| stable.is_none_or(|stable| stable[index]);
    let mut values: Vec<f64> = columns
        .iter()
        .flat_map(|column| column.values.iter().enumerate())
        .filter(|(index, _)| is_shown(*index))
        .filter_map(|(_, value)| *value)
        .collect();
    values.sort_by(f64::total_cmp);
    let wanted = limits.iter().flat_map(|limit| bounds(limit));
    let (least, greatest) = (*values.first()?, *values.last()?);
    let of_most = values[((values.len() - 1) as f64 * MOST) as usize];
    let (low, high) = match columns[0].measure.presence() {
        // Deep in instability nobody counts how deep.
        Presence::Number if greatest > 0.0 => (least.max(-greatest.max(1.0)), greatest),
        Presence::Length if of_most > 0.0 => (least, greatest.min(BEYOND_MOST * of_most)),
        _ => (least, greatest),
    };
    let (mut from, mut to) = (low.min(high), high);
    let room = REACH_FOR_LIMIT * (high - low);
    for bound in wanted {
        if bound.0 <= low + room && bound.0 >= high - room {
            from = from.min(bound.0);
            to = to.max(bound.0);
        }
    }
    Some([from, to])
}

/// The values of a limit with what they mean.
fn bounds(limit: &Limit) -> Vec<(f64, Meaning)> {
    match limit.bounds {
        Bounds::Above(low) => vec![(low, Meaning::AtLeast)],
        Bounds::Below(high) => vec![(high, Meaning::AtMost)],
        Bounds::Between(low, high) => vec![(low, Meaning::AtLeast), (high, Meaning::AtMost)],
    }
}

fn limits_on<'s>(sweep: &'s Sweep, column: &Column) -> Vec<&'s Limit> {
    (sweep.limits.iter())
        .filter(|limit| limit.measure == column.measure)
        .collect()
}

fn label(at: f64, meaning: Meaning, presence: Presence) -> String {
    let word = match meaning {
        Meaning::AtLeast => "at least",
        _ => "at most",
    };
    let value = super::measured::measured(at, presence, plain);
    format!("limit: {word} {value}")
}

/// One measure over one quantity, in one plane or both.
fn curves(sweep: &Sweep, varied: &Varied, group: &Group<'_>) -> Panel {
    let columns: Vec<&Column> = group.columns.iter().map(|(_, _, column)| *column).collect();
    let presence = columns[0].measure.presence();
    let limits: Vec<&Limit> = columns
        .iter()
        .flat_map(|column| limits_on(sweep, column))
        .collect();
    let mut ends = ends(&columns, None, &limits);
    // A peak between two points is in the frame too.
    for (name, ..) in group.columns.iter().filter(|(_, _, c)| is_smooth(c)) {
        let both = sweep
            .extremes
            .get(name)
            .map(|both| [&both.least, &both.greatest]);
        let inside = (both.into_iter().flatten())
            .filter(|extreme| extreme.location == Where::Inside)
            .filter_map(|extreme| extreme.value);
        for value in inside {
            ends = ends.map(|[from, to]| [from.min(value), to.max(value)]);
        }
    }
    if group.columns.len() > 1 {
        // Two curves leave little room for what is written at their marks.
        ends = ends.map(|[from, to]| [from, to + ROOM_FOR_TWO * (to - from)]);
    }
    let title = match presence {
        Presence::Length if is_radius(columns[0]) => "beam radius",
        _ => group.heading.as_str(),
    };
    let y = Axis::of(title, ends.into_iter().flatten(), scales_of(presence));
    let mut layers: Vec<Layer> = Vec::new();
    for range in sweep.stable_ranges.iter().flatten() {
        let [a, b] = range.ends.map(|end| varied.shown(end));
        layers.push(Layer::Range(Range {
            from: a.min(b),
            to: a.max(b),
            label: "stable".into(),
        }));
    }
    if let Some(at) = varied.nominal_within() {
        layers.push(Layer::Reference(Reference {
            across: Across::X,
            at,
            meaning: Meaning::Nominal,
            label: "as designed".into(),
        }));
    }
    // Where nothing is drawn, nothing is beside it either.
    for limit in limits.iter().filter(|_| ends.is_some()) {
        for (at, meaning) in bounds(limit) {
            layers.push(Layer::Reference(Reference {
                across: Across::Y,
                at,
                meaning,
                label: label(at, meaning, presence),
            }));
        }
    }
    for ((name, plane, column), stroke) in group.columns.iter().zip(Stroke::ALL) {
        let points = points(sweep, varied, name, column);
        let text = if group.columns.len() > 1 { plane } else { "" };
        layers.push(Layer::Curve(Curve::through(text, stroke, points)));
        if is_smooth(column) {
            layers.extend(marks(sweep, varied, name, column, stroke, &y));
        }
    }
    Panel {
        heading: heading(group),
        x: along(varied),
        y: Some(y),
        layers,
    }
}

/// The points of a curve in order, those towards the edges among them.
fn points(sweep: &Sweep, varied: &Varied, name: &str, column: &Column) -> Vec<(f64, Option<f64>)> {
    let near = &sweep.near_edges;
    let index = sweep.measures.0.iter().position(|(known, _)| known == name);
    let more = index
        .filter(|_| is_smooth(column))
        .and_then(|index| near.values.get(index));
    let mut points: Vec<(f64, Option<f64>)> = (varied.kept.iter().zip(&column.values))
        .chain(near.kept.iter().zip(more.into_iter().flatten()))
        .map(|(kept, value)| (varied.shown(*kept), *value))
        .collect();
    points.sort_by(|a, b| a.0.total_cmp(&b.0));
    points
}

fn heading(group: &Group<'_>) -> String {
    match &group.columns[..] {
        [(name, ..)] => (*name).to_string(),
        _ => group.heading.clone(),
    }
}

/// Stationary spots, and the extremes that lie inside.
fn marks(
    sweep: &Sweep,
    varied: &Varied,
    name: &str,
    column: &Column,
    stroke: Stroke,
    y: &Axis,
) -> Vec<Layer> {
    let presence = column.measure.presence();
    let mut marks: Vec<([f64; 2], String)> = (sweep.stationary.iter().flatten())
        .filter(|point| point.measure == name)
        .filter_map(|point| {
            let kept = point.place.kept()?;
            let at = told(kept, varied.kind);
            let text = format!("{} at {at}", number(point.value, presence));
            Some(([varied.shown(kept), point.value], text))
        })
        .collect();
    let extremes = sweep.extremes.get(name);
    let both = extremes.map(|both| [&both.least, &both.greatest]);
    for extreme in both.into_iter().flatten() {
        let (Some(value), Some(kept)) = (extreme.value, extreme.place.kept()) else {
            continue;
        };
        let is_marked = marks.iter().any(|([x, _], _)| *x == varied.shown(kept));
        if extreme.location == Where::Inside && !is_marked && is_worth_a_mark(sweep, name) {
            let at = told(kept, varied.kind);
            let text = format!("{} at {at}", number(value, presence));
            marks.push(([varied.shown(kept), value], text));
        }
    }
    marks.retain(|([_, value], _)| (y.from..=y.to).contains(value));
    let labelled = marks.len() <= LABELLED;
    marks
        .into_iter()
        .map(|(place, text)| {
            Layer::Mark(Mark {
                places: vec![(stroke, place)],
                label: if labelled { text } else { String::new() },
            })
        })
        .collect()
}

/// A measure that is the same everywhere has no extremes.
fn is_worth_a_mark(sweep: &Sweep, name: &str) -> bool {
    sweep
        .extremes
        .get(name)
        .is_some_and(|both| both.least.value != both.greatest.value)
}

/// One measure over two quantities.
fn map(sweep: &Sweep, [x, y]: [&Varied; 2], name: &str, column: &Column) -> Panel {
    let presence = column.measure.presence();
    let limits = limits_on(sweep, column);
    let ends = ends(&[column], Some(&sweep.stable), &limits);
    let title = match presence {
        Presence::Length if is_radius(column) => "beam radius",
        _ => name,
    };
    let along_y = y.kept.len();
    let at = |row: usize, col: usize| {
        let index = col * along_y + row;
        column.values[index].filter(|_| sweep.stable[index])
    };
    let columns = x.kept.len();
    let values = (0..along_y)
        .flat_map(|row| (0..columns).map(move |col| (row, col)))
        .map(|(row, col)| at(row, col))
        .collect();
    let contours = limits
        .iter()
        .flat_map(|limit| bounds(limit))
        .map(|(level, meaning)| Contour {
            level,
            meaning,
            label: label(level, meaning, presence),
        })
        .collect();
    Panel {
        heading: name.to_string(),
        x: along(x),
        y: Some(along(y)),
        layers: vec![Layer::Map(Map {
            columns,
            values,
            scale: match ends {
                // Every colour is worth having.
                Some([from, to]) if from < to => {
                    Axis::between(title, from, to, scales_of(presence))
                }
                _ => Axis::of(title, ends.into_iter().flatten(), scales_of(presence)),
            },
            absent: if sweep.stable.iter().all(|stable| *stable) {
                "no value"
            } else {
                "unstable"
            }
            .into(),
            contours,
            nominal: x
                .nominal_within()
                .zip(y.nominal_within())
                .map(|(x, y)| [x, y]),
        })],
    }
}
