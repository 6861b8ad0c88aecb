//! Modes that lie too near, and what the sidebands meet.

use super::{NONE, column, name, offset, wanted};
use crate::analysis::modes::{Coincidence, Modes};
use crate::report::describe::measured::frequency;
use crate::report::document::{Block, Document, Table};
use crate::report::number::significant;

/// Modes of one order whose offsets differ by less, in free spectral ranges, stand in one row.
const TOGETHER: f64 = 1e-6;
/// Most rows of a table, and most names in a row.
const MOST_ROWS: usize = 16;
const MOST_NAMES: usize = 3;

/// Modes nearer to the fundamental than what is wanted, with what makes them so.
pub(super) fn coincidences(document: &mut Document, modes: &Modes) {
    if modes.coincidences.is_empty() {
        return;
    }
    document.heading(format!("Modes within {}", wanted(modes)));
    let mut rows: Vec<Vec<&Coincidence>> = Vec::new();
    for found in &modes.coincidences {
        let is_alike = |row: &Vec<&Coincidence>| {
            row.first().is_some_and(|first| {
                first.m + first.n == found.m + found.n
                    && (first.offset_hz - found.offset_hz).abs() < TOGETHER * modes.fsr_hz
            })
        };
        match rows.iter_mut().find(|row| is_alike(row)) {
            Some(row) => row.push(found),
            None => rows.push(vec![found]),
        }
    }
    let scale = column(
        modes,
        modes.coincidences.iter().map(|found| found.offset_hz),
    );
    let offsets = format!("offset\n{}", scale.symbol);
    let mut titles = vec!["<modes", offsets.as_str()];
    let lines = modes.finesse.is_some();
    if lines {
        titles.push("line-\nwidths");
    }
    titles.push("<as orders lie\napart by nearly");
    let mut table = Table::new(&titles);
    for row in rows.iter().take(MOST_ROWS) {
        let first = row[0];
        let names: Vec<String> = row
            .iter()
            .take(MOST_NAMES)
            .map(|found| name(found.m, found.n))
            .collect();
        let more = row.len().saturating_sub(MOST_NAMES);
        let names = if more > 0 {
            format!("{} and {more} more", names.join(" "))
        } else {
            names.join(" ")
        };
        let mut cells = vec![names, offset(first.offset_hz, scale, modes)];
        if lines {
            let is_none = first.offset_hz.abs() < NONE * modes.fsr_hz;
            cells.push(match first.offset_linewidths {
                Some(_) if is_none => "0".into(),
                Some(count) => significant(count.abs(), 3),
                None => "–".into(),
            });
        }
        // The cause of a row is that of its modes together: the planes that any of them needs.
        let with_both = row.iter().find(|found| found.m > 0 && found.n > 0);
        cells.push(cause(with_both.unwrap_or(&first)));
        table.rows.push(cells);
    }
    document.push(Block::Table(table));
    if rows.len() > MOST_ROWS {
        let more: usize = rows[MOST_ROWS..].iter().map(Vec::len).sum();
        document.aside(format!("and {more} more modes, in the JSON"));
    }
}

/// "1/4 FSR", or one fraction a plane; nothing where no low fraction is why.
fn cause(found: &Coincidence) -> String {
    let Some(fractions) = &found.fractions else {
        return "–".into();
    };
    let text = |fraction: crate::analysis::modes::Fraction| {
        if fraction.p == 0 {
            "0 or 1 FSR".to_string()
        } else {
            format!("{}/{} FSR", fraction.p, fraction.q)
        }
    };
    match (fractions.tangential, fractions.sagittal) {
        (Some(t), Some(s)) if t == s => text(t),
        (Some(t), Some(s)) => format!("{} t, {} s", text(t), text(s)),
        (Some(t), None) => format!("{} t", text(t)),
        (None, Some(s)) => format!("{} s", text(s)),
        (None, None) => "–".into(),
    }
}

/// The modes that modulated light meets.
pub(super) fn sidebands(document: &mut Document, modes: &Modes) {
    if modes.sidebands.is_empty() {
        return;
    }
    document.heading("Sidebands of a resonant carrier, and the mode nearest to each");
    let scale = column(
        modes,
        modes.sidebands.iter().map(|sideband| sideband.offset_hz),
    );
    let offsets = format!("mode − sideband\n{}", scale.symbol);
    let mut titles = vec!["sideband", "<nearest", offsets.as_str()];
    let lines = modes.finesse.is_some();
    if lines {
        titles.push("linewidths");
    }
    let mut table = Table::new(&titles);
    for sideband in &modes.sidebands {
        let sign = if sideband.sideband_hz > 0.0 {
            "+"
        } else {
            "−"
        };
        let mut cells = vec![
            format!("{sign}{}", frequency(sideband.sideband_hz.abs())),
            name(sideband.m, sideband.n),
            offset(sideband.offset_hz, scale, modes),
        ];
        if lines {
            let count = sideband.offset_linewidths.map(f64::abs);
            cells.push(count.map_or("–".into(), |count| significant(count, 3)));
        }
        table.rows.push(cells);
    }
    document.push(Block::Table(table));
}
