//! `sweep` for people: from where to where it is stable, what stands out, and a few rows of the
//! curves.

use super::check::value;
use super::measured::{measured, scales_of};
use crate::cavity::Presence;
use crate::quantity::{Kind, human};
use crate::report::document::{Block, Document, Table, Tone};
use crate::report::number::{
    FREQUENCIES, LENGTHS, NUMBERS, POWERS, RATIOS, Scale, common, plain, significant,
};
use crate::study::sweep::{Column, Even, Place, StableRange, Sweep, Varied, Where};

/// Rows of the curves that are printed.
const ROWS: usize = 15;
/// The least width of a column of numbers, and the space about it.
const NUMBER: usize = 10;
const SPACE: usize = 2;
/// Columns of the terminal.
const WIDTH: usize = 80;
/// Ranges that a verdict names one by one.
const NAMED: usize = 3;
/// Rows of a table at the most; a picture shows more.
const MOST_ROWS: usize = 40;

/// Angles as builders set them.
const DEGREES: [Scale; 1] = [Scale {
    symbol: "°",
    size: std::f64::consts::PI / 180.0,
}];
const PER_METRE: [Scale; 1] = [Scale {
    symbol: "1/m",
    size: 1.0,
}];
const KELVIN: [Scale; 1] = [Scale {
    symbol: "K",
    size: 1.0,
}];

/// Units of a quantity on its axis, smallest first.
pub(super) fn scales_along(varied: &Varied) -> &'static [Scale] {
    match varied.kind {
        Kind::Radius | Kind::Face | Kind::Focal if varied.even == Even::Kept => &PER_METRE,
        Kind::Length | Kind::Position | Kind::Radius | Kind::Face | Kind::Focal => &LENGTHS,
        Kind::Angle | Kind::SlabAngle => &DEGREES,
        Kind::Curvature | Kind::Strength => &PER_METRE,
        Kind::Ratio | Kind::Loss => &RATIOS,
        Kind::Frequency => &FREQUENCIES,
        Kind::Power => &POWERS,
        Kind::Temperature => &KELVIN,
        _ => &NUMBERS,
    }
}

/// What an axis or column of a quantity is called.
pub(super) fn name_along(varied: &Varied) -> String {
    let name = &varied.quantity;
    match (varied.is_reciprocal(), varied.even) {
        (true, Even::Kept) => format!("curvature of {name}"),
        (true, Even::AsWritten { sign: -1.0 }) => format!("{name}, concave"),
        _ => name.clone(),
    }
}

/// A value as kept, with its unit.
pub(super) fn told(kept: f64, kind: Kind) -> String {
    // Wavelengths are called by their nanometres.
    const WAVELENGTHS: f64 = 2e-6;
    match kind {
        Kind::Length if kept > 0.0 && kept < WAVELENGTHS => human(kept, kind, 5),
        Kind::Radius if kept < -1e-9 => format!("{} convex", value(-kept, kind)),
        Kind::Length
        | Kind::Radius
        | Kind::Face
        | Kind::Focal
        | Kind::Power
        | Kind::Curvature
        | Kind::Strength => value(kept, kind),
        Kind::Position => value(kept, Kind::Length),
        Kind::Angle | Kind::SlabAngle => format!("{}°", plain(kept.to_degrees(), 5)),
        _ => human(kept, kind, 5).replace('-', "−"),
    }
}

/// The result of a sweep as a document.
pub fn describe(sweep: &Sweep) -> Document {
    let mut document = Document::default();
    if let Some(title) = &sweep.title {
        document.push(Block::Title(title.clone()));
    }
    let (word, rest) = verdict(sweep);
    document.push(Block::Verdict {
        word: word.into(),
        rest,
        tone: if sweep.has_stable {
            Tone::Good
        } else {
            Tone::Bad
        },
    });
    for varied in &sweep.vary {
        document.text(span(varied));
    }
    match (&sweep.stable_ranges, &sweep.vary[..]) {
        (Some(ranges), [varied]) => {
            range_table(&mut document, ranges, varied);
            extremes(&mut document, sweep);
            stationary(&mut document, sweep, varied);
            curves(&mut document, sweep, varied);
        }
        _ => extremes(&mut document, sweep),
    }
    let wanting: Vec<String> = (sweep.why.0.iter())
        .map(|(name, why)| format!("– of {name}: {why}"))
        .collect();
    if sweep.vary.len() == 1 {
        for line in wanting {
            document.aside(line);
        }
    }
    if !sweep.cautions.is_empty() {
        document.heading("Cautions");
        for caution in &sweep.cautions {
            document.push(Block::Item {
                mark: "  !".into(),
                text: caution.clone(),
                tone: Tone::Doubt,
            });
        }
    }
    document
}

/// "d3.length from 18 mm to 31 mm, 201 points; now 23 mm".
fn span(varied: &Varied) -> String {
    let end = |kept: Option<&f64>| kept.map_or("–".into(), |kept| told(*kept, varied.kind));
    let now = varied.nominal_kept.map_or(String::new(), |kept| {
        format!("; now {}", told(kept, varied.kind))
    });
    format!(
        "{} from {} to {}, {} points{now}",
        varied.quantity,
        end(varied.kept.first()),
        end(varied.kept.last()),
        varied.kept.len(),
    )
}

/// The answer: its word and the rest of the line.
pub(super) fn verdict(sweep: &Sweep) -> (&'static str, String) {
    let ([varied], Some(ranges)) = (&sweep.vary[..], &sweep.stable_ranges) else {
        let share = significant(100.0 * sweep.stable_share, 3);
        return match sweep.has_stable {
            true => ("STABLE", format!("at {share} % of the points")),
            false => ("UNSTABLE", "at every point".into()),
        };
    };
    if ranges.is_empty() {
        let text = "at every value of this range";
        return ("UNSTABLE", text.into());
    }
    let ranges = in_order(ranges, varied);
    let spans: Vec<String> = ranges
        .iter()
        .map(|range| {
            let [a, b] = ordered(range.ends, varied);
            format!("{} to {}", told(a, varied.kind), told(b, varied.kind))
        })
        .collect();
    let rest = match &spans[..] {
        [one] => format!("from {one}"),
        [others @ .., last] if spans.len() <= NAMED => {
            format!("from {} and from {last}", others.join(", from "))
        }
        _ => {
            let share = significant(100.0 * sweep.stable_share, 3);
            format!("in {} ranges; at {share} % of the points", spans.len())
        }
    };
    ("STABLE", rest)
}

/// Two values as kept, in the order in which their axis runs.
fn ordered(ends: [f64; 2], varied: &Varied) -> [f64; 2] {
    let [a, b] = ends;
    if varied.shown(a) <= varied.shown(b) {
        [a, b]
    } else {
        [b, a]
    }
}

fn in_order<'r>(ranges: &'r [StableRange], varied: &Varied) -> Vec<&'r StableRange> {
    let mut ranges: Vec<&StableRange> = ranges.iter().collect();
    ranges.sort_by(|a, b| {
        let start = |range: &StableRange| varied.shown(ordered(range.ends, varied)[0]);
        start(a).total_cmp(&start(b))
    });
    ranges
}

fn range_table(document: &mut Document, ranges: &[StableRange], varied: &Varied) {
    if ranges.is_empty() {
        return;
    }
    document.heading("Ranges of stability, edges solved");
    let mut table = Table::new(&["from", "<ended by", "to", "<ended by", "width"]);
    for range in in_order(ranges, varied).into_iter().take(MOST_ROWS) {
        let by = |plane: Option<&str>, touch: bool| match (plane, touch) {
            (Some(plane), true) => format!("{plane}, a touch"),
            (Some(plane), false) => plane.to_string(),
            (None, _) => "end of sweep".into(),
        };
        let mut ends = [
            (range.ends[0], by(range.from_plane, range.from_is_touch)),
            (range.ends[1], by(range.to_plane, range.to_is_touch)),
        ];
        if ordered(range.ends, varied) != range.ends {
            ends.reverse();
        }
        let [(a, by_a), (b, by_b)] = ends;
        let scales = scales_along(varied);
        let width = varied.shown(b) - varied.shown(a);
        let unit = common([width], scales, 1.0);
        table.rows.push(vec![
            told(a, varied.kind),
            by_a,
            told(b, varied.kind),
            by_b,
            format!("{} {}", significant(width / unit.size, 3), unit.symbol)
                .trim_end()
                .into(),
        ]);
    }
    document.push(Block::Table(table));
    if ranges.len() > MOST_ROWS {
        document.aside(format!("and {} more", ranges.len() - MOST_ROWS));
    }
}

fn at(place: Place, sweep: &Sweep) -> String {
    match (place, &sweep.vary[..]) {
        (Place::Two(both), _) => both
            .iter()
            .zip(&sweep.vary)
            .map(|(written, varied)| match written {
                Some(written) if varied.is_reciprocal() => told(1.0 / written, varied.kind),
                Some(written) => told(*written, varied.kind),
                None => "flat".into(),
            })
            .collect::<Vec<_>>()
            .join(", "),
        (place, [varied, ..]) => place
            .kept()
            .map_or("–".into(), |kept| told(kept, varied.kind)),
        _ => "–".into(),
    }
}

/// A number of a measure; rounding is zero.
pub(super) fn number(x: f64, presence: Presence) -> String {
    const ROUNDING: f64 = 1e-12;
    if presence == Presence::Number && x.abs() < ROUNDING {
        return "0".into();
    }
    measured(x, presence, significant)
}

fn extremes(document: &mut Document, sweep: &Sweep) {
    if sweep.extremes.0.is_empty() {
        return;
    }
    document.heading(if sweep.vary.len() == 1 {
        "Extremes where it is stable"
    } else {
        "Extremes among the stable points"
    });
    let mut table = Table::new(&["<measure", "<", "value", "<at"]);
    let mut approached = false;
    for (name, both) in &sweep.extremes.0 {
        let Some(column) = sweep.measures.get(name) else {
            continue;
        };
        let presence = column.measure.presence();
        let same = both.least.value.is_some() && both.least.value == both.greatest.value;
        let rows = [
            (name.as_str(), "least", &both.least),
            ("", "greatest", &both.greatest),
        ];
        for (name, which, extreme) in rows.into_iter().take(if same { 1 } else { 2 }) {
            let value = match extreme.value {
                Some(value) => number(value, presence),
                None => {
                    approached = true;
                    "→".into()
                }
            };
            let edge = match extreme.location {
                Where::Edge => " (edge)",
                Where::End => " (end)",
                Where::Inside | Where::Point => "",
            };
            let (which, place) = if same {
                ("the same", "everywhere".into())
            } else {
                (which, format!("{}{edge}", at(extreme.place, sweep)))
            };
            table
                .rows
                .push(vec![name.into(), which.into(), value, place]);
        }
    }
    document.push(Block::Table(table));
    if approached {
        document.aside("→ at an edge of stability that is approached and not reached");
    }
}

fn stationary(document: &mut Document, sweep: &Sweep, varied: &Varied) {
    let points = sweep.stationary.as_deref().unwrap_or_default();
    if points.is_empty() {
        return;
    }
    document.heading(format!(
        "Where a spot does not move with {}: dynamically stable",
        varied.quantity
    ));
    let mut table = Table::new(&["<measure", "<at its", "radius", "at"]);
    for point in points.iter().take(MOST_ROWS) {
        table.rows.push(vec![
            point.measure.clone(),
            point.kind.into(),
            number(point.value, Presence::Length),
            at(point.place, sweep),
        ]);
    }
    document.push(Block::Table(table));
    if points.len() > MOST_ROWS {
        document.aside(format!("and {} more", points.len() - MOST_ROWS));
    }
}

/// A measure's name with its plane on a second line.
fn in_lines(name: &str) -> String {
    name.replace(".tangential", "\ntangential")
        .replace(".sagittal", "\nsagittal")
}

/// The measures that fit beside each other, the first one in any case.
fn fitting<'s>(sweep: &'s Sweep, varied: &Varied) -> Vec<&'s (String, Column)> {
    let mut width = name_along(varied).chars().count().max(NUMBER) + SPACE + 1;
    let mut columns = Vec::new();
    for column in &sweep.measures.0 {
        // A unit may stand behind the plane.
        let unit = ", GHz".len();
        let lines = in_lines(&column.0);
        let widths = lines.lines().enumerate().map(|(index, line)| {
            let behind = if index > 0 { unit } else { 0 };
            line.chars().count() + behind
        });
        let title = widths.max().unwrap_or(0);
        width += title.max(NUMBER) + SPACE;
        if width > WIDTH && !columns.is_empty() {
            break;
        }
        columns.push(column);
    }
    columns
}

fn curves(document: &mut Document, sweep: &Sweep, varied: &Varied) {
    document.heading("Along the way");
    let shown: Vec<f64> = varied.kept.iter().map(|kept| varied.shown(*kept)).collect();
    let unit = common(shown.iter().copied(), scales_along(varied), 1.0);
    let columns = fitting(sweep, varied);
    let scales: Vec<Scale> = columns
        .iter()
        .map(|(_, column)| match column.measure.presence() {
            Presence::Number => crate::report::number::PLAIN,
            presence => {
                let values = column.values.iter().flatten().copied();
                common(values, scales_of(presence), 1.0)
            }
        })
        .collect();
    let mut titles = vec![format!("{}\n{}", name_along(varied), unit.symbol)];
    titles.extend(columns.iter().zip(&scales).map(|((name, _), scale)| {
        let name = in_lines(name);
        match (name.contains('\n'), scale.symbol) {
            (_, "") => name,
            (true, unit) => format!("{name}, {unit}"),
            (false, unit) => format!("{name}\n{unit}"),
        }
    }));
    let titles: Vec<&str> = titles.iter().map(String::as_str).collect();
    let mut table = Table::new(&titles);
    let last = shown.len() - 1;
    let rows = ROWS.min(shown.len());
    for row in 0..rows {
        let index = (row * last + (rows - 1) / 2) / (rows - 1);
        let mut cells = vec![plain(shown[index] / unit.size, 5)];
        cells.extend(columns.iter().zip(&scales).map(|((_, column), scale)| {
            column.values[index].map_or("–".into(), |x| significant(x / scale.size, 4))
        }));
        table.rows.push(cells);
    }
    document.push(Block::Table(table));
    if sweep.measures.0.len() > columns.len() {
        let names: Vec<&str> = (sweep.measures.0.iter().skip(columns.len()))
            .map(|(name, _)| name.as_str())
            .collect();
        document.aside(format!("not shown here: {}", names.join(", ")));
    }
}
