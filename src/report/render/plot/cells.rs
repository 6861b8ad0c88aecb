//! Cells of a map as SVG: those of one colour as one path, so that a map is small and every
//! viewer can show it.

use std::collections::BTreeMap;
use std::fmt::Write;

use super::ramp;
use super::scene::{LEVELS, Rect};

/// Distance and width of the lines where there is no value, in pixels.
const HATCH: (f64, f64) = (6.0, 1.1);

/// A rectangle of cells: columns and rows, ends not included.
type Block = [usize; 4];

/// The cells; `enlarged` is how much larger the page is painted.
pub(super) fn svg(area: Rect, columns: usize, levels: &[Option<u8>], enlarged: f64) -> String {
    let rows = levels.len() / columns.max(1);
    if rows == 0 {
        return String::new();
    }
    // Cells stand on the ends of the area, where half of them is cut off.
    let across = edges([area.left, area.right], columns, enlarged);
    let up = edges([area.bottom, area.top], rows, enlarged);
    // Without smoothing, or paper would shine through between neighbours.
    let mut text = String::from("<g shape-rendering=\"crispEdges\">\n");
    for (level, blocks) in blocks(columns, levels) {
        let mut path = String::new();
        let mut at = [0, 0];
        for [left, right, low, high] in blocks {
            let (x, y) = (across[left], up[high]);
            let (width, height) = (across[right] - x, up[low] - y);
            // From the last corner: short numbers.
            let (dx, dy) = (x - at[0], y - at[1]);
            let _ = write!(path, "m{dx} {dy}h{width}v{height}h{}z", -width);
            at = [x, y];
        }
        match level {
            Some(level) => {
                let [r, g, b] = ramp::colour(f64::from(level) / f64::from(LEVELS - 1));
                let _ = writeln!(text, "<path fill=\"#{r:02x}{g:02x}{b:02x}\" d=\"{path}\"/>");
            }
            None => text += &hatched(&path, [across[0], up[rows]], enlarged),
        }
    }
    text + "</g>\n"
}

/// Hatching, under a name of its own for each place on the page.
fn hatched(path: &str, [x, y]: [i64; 2], enlarged: f64) -> String {
    let (distance, width) = (HATCH.0 * enlarged, HATCH.1 * enlarged);
    format!(
        "<defs><pattern id=\"absent-{x}-{y}\" patternUnits=\"userSpaceOnUse\" width=\"{distance}\" \
         height=\"{distance}\" patternTransform=\"rotate(45)\">\
         <rect width=\"{width}\" height=\"{distance}\" fill=\"#a0a0a0\" \
         shape-rendering=\"auto\"/></pattern></defs>\n\
         <path fill=\"#ffffff\" d=\"{path}\"/>\n\
         <path fill=\"url(#absent-{x}-{y})\" d=\"{path}\"/>\n"
    )
}

/// Where cells begin and the last one ends.
fn edges([from, to]: [f64; 2], count: usize, enlarged: f64) -> Vec<i64> {
    let intervals = count.saturating_sub(1).max(1) as f64;
    (0..=count)
        .map(|index| {
            let share = ((index as f64 - 0.5) / intervals).clamp(0.0, 1.0);
            let share = if count == 1 { index as f64 } else { share };
            ((from + share * (to - from)) * enlarged).round() as i64
        })
        .collect()
}

/// Neighbours of one level in few rectangles.
fn blocks(columns: usize, levels: &[Option<u8>]) -> BTreeMap<Option<u8>, Vec<Block>> {
    let mut found: BTreeMap<Option<u8>, Vec<Block>> = BTreeMap::new();
    for (row, cells) in levels.chunks_exact(columns).enumerate() {
        let mut left = 0;
        for run in cells.chunk_by(|a, b| a == b) {
            let right = left + run.len();
            let same = found.entry(run[0]).or_default();
            // A run as long as one right below grows out of it.
            let below = same
                .iter_mut()
                .rev()
                .take(columns)
                .find(|[l, r, _, high]| *l == left && *r == right && *high == row);
            match below {
                Some(block) => block[3] = row + 1,
                None => same.push([left, right, row, row + 1]),
            }
            left = right;
        }
    }
    found
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn equal_neighbours_are_one_rectangle() {
        let levels = [Some(1), Some(1), None, Some(1), Some(1), Some(2)];
        let found = blocks(3, &levels);
        assert_eq!(found[&Some(1)], [[0, 2, 0, 2]]);
        assert_eq!(found[&None], [[2, 3, 0, 1]]);
        assert_eq!(found[&Some(2)], [[2, 3, 1, 2]]);
    }
}
