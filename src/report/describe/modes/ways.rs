//! How to move out, and where everything keeps its distance.

use super::{is_clear, linewidths, short_frequency, wanted};
use crate::analysis::modes::{Modes, Window};
use crate::quantity::Kind;
use crate::report::describe::check::{change, value};
use crate::report::document::{Block, Document, Table};
use crate::report::number::significant;

/// Most rows of each table, and most windows of one quantity.
const MOST_ROWS: usize = 24;
const MOST_WINDOWS: usize = 4;

/// Single changes that bring the modes as far away as wanted.
pub(super) fn ways_out(document: &mut Document, modes: &Modes) {
    if is_clear(modes) {
        return;
    }
    document.heading(format!(
        "Ways out: by changing one quantity alone, to a clearance of {}",
        wanted(modes)
    ));
    if modes.ways_out.is_empty() {
        document.text(
            "None is found. A quantity is moved if it has a tolerance or is named by --free, over \
             its limits and a tenth of its value.",
        );
        return;
    }
    let mut table = Table::new(&[
        "<quantity",
        "change",
        "then",
        "until",
        "<within\nlimits",
        "margin",
    ]);
    for way in modes.ways_out.iter().take(MOST_ROWS) {
        let [from, to, until] = way.kept;
        table.rows.push(vec![
            way.quantity.clone(),
            change(from, to, way.kind),
            reading(to, from, way.kind),
            reading(until, from, way.kind),
            match way.within_limits {
                Some(true) => "yes".into(),
                Some(false) => "no".into(),
                None => "–".into(),
            },
            significant(way.margin, 3),
        ]);
    }
    document.push(Block::Table(table));
    cut(document, modes.ways_out.len());
    if let Some(way) = modes.ways_out.first() {
        let clearance = match way.mode_clearance_linewidths {
            Some(count) => linewidths(count),
            None => short_frequency(way.mode_clearance_hz),
        };
        document.aside(format!(
            "Each is the least change: the clearance is just {clearance} there and at least that up \
             to the value under \"until\"."
        ));
    }
}

/// Where within its limits each quantity keeps the clearance.
pub(super) fn windows(document: &mut Document, modes: &Modes) {
    if modes.windows.is_empty() {
        return;
    }
    document.heading(format!(
        "Where each alone, within its limits, keeps {}",
        wanted(modes)
    ));
    let whole: Vec<&str> = modes
        .windows
        .iter()
        .filter(|window| window.whole)
        .map(|window| window.quantity.as_str())
        .collect();
    if !whole.is_empty() {
        document.text(format!("Throughout: {}.", shortened(&whole)));
    }
    let narrow: Vec<&Window> = modes
        .windows
        .iter()
        .filter(|window| !window.whole)
        .collect();
    if narrow.is_empty() {
        return;
    }
    let mut table = Table::new(&["<quantity", "from", "to", "<holds it now"]);
    let mut quantities: Vec<&str> = Vec::new();
    let mut hidden = 0;
    for (index, window) in narrow.iter().enumerate() {
        let before = narrow[..index]
            .iter()
            .filter(|other| other.quantity == window.quantity)
            .count();
        if before >= MOST_WINDOWS || table.rows.len() >= MOST_ROWS {
            hidden += 1;
            continue;
        }
        let repeated = quantities.contains(&window.quantity.as_str());
        quantities.push(&window.quantity);
        let [low, high] = ends(window);
        table.rows.push(vec![
            if repeated {
                String::new()
            } else {
                window.quantity.clone()
            },
            low,
            high,
            if window.holds_nominal { "yes" } else { "no" }.into(),
        ]);
    }
    document.push(Block::Table(table));
    if hidden > 0 {
        document.aside(format!("and {hidden} more windows, in the JSON"));
    }
}

/// A value of a quantity; of a radius on the other side of flat than now, the sense is said in
/// words.
fn reading(x: f64, now: f64, kind: Kind) -> String {
    if kind != Kind::Radius || x == 0.0 || x * now > 0.0 {
        return value(x, kind);
    }
    let sense = if x > 0.0 { "concave" } else { "convex" };
    format!("{} {sense}", value(1.0 / x.abs(), Kind::Length))
}

/// The ends in the order of the values as written: of a radius the greater curvature is first, and
/// to either side of flat the sense is said in words.
fn ends(window: &Window) -> [String; 2] {
    let [low, high] = window.kept;
    if window.kind.is_reciprocal() && low * high > 0.0 {
        return [high, low].map(|x| value(x, window.kind));
    }
    [low, high].map(|x| reading(x, 0.0, window.kind))
}

/// Names in a sentence, the first few of them.
fn shortened(names: &[&str]) -> String {
    const SHOWN: usize = 12;
    let more = names.len().saturating_sub(SHOWN);
    let shown = names[..names.len() - more].join(", ");
    if more > 0 {
        format!("{shown} and {more} more")
    } else {
        shown
    }
}

fn cut(document: &mut Document, count: usize) {
    if count > MOST_ROWS {
        document.aside(format!("and {} more, in the JSON", count - MOST_ROWS));
    }
}
