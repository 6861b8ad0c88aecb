//! Lines along which a value over a grid is the same.

use std::collections::{BTreeMap, BTreeSet};

/// A side of a cell: whether it stands upright, and the column and row where it begins.
type Side = (bool, usize, usize);

/// Lines at a level, in columns and rows from the first of each; larger values lie to the left of
/// their way where rows run upwards. Where there is no value lines end.
pub(super) fn lines(columns: usize, values: &[Option<f64>], level: f64) -> Vec<Vec<[f64; 2]>> {
    let rows = values.len() / columns.max(1);
    let at = |column: usize, row: usize| values[row * columns + column];
    let mut next: BTreeMap<Side, Side> = BTreeMap::new();
    for row in 0..rows.saturating_sub(1) {
        for column in 0..columns.saturating_sub(1) {
            // Against the clock from the lower left.
            let corners = [(0, 0), (1, 0), (1, 1), (0, 1)].map(|(c, r)| at(column + c, row + r));
            let [Some(a), Some(b), Some(c), Some(d)] = corners else {
                continue;
            };
            let sides = [
                (false, column, row),
                (true, column + 1, row),
                (false, column, row + 1),
                (true, column, row),
            ];
            next.extend(segments([a, b, c, d], level).map(|(from, to)| (sides[from], sides[to])));
        }
    }
    let crossing = |(upright, column, row): Side| {
        let (c, r) = if upright { (0, 1) } else { (1, 0) };
        let ends = [at(column, row), at(column + c, row + r)];
        let share = match ends {
            [Some(from), Some(to)] if from != to => ((level - from) / (to - from)).clamp(0.0, 1.0),
            _ => 0.5,
        };
        [
            column as f64 + share * c as f64,
            row as f64 + share * r as f64,
        ]
    };
    // Open lines begin where no other ends; what is left are loops.
    let ends: BTreeSet<Side> = next.values().copied().collect();
    let mut starts: Vec<Side> = next
        .keys()
        .copied()
        .filter(|side| !ends.contains(side))
        .collect();
    starts.extend(next.keys());
    let mut found = Vec::new();
    for start in starts {
        let mut line = vec![crossing(start)];
        let mut side = start;
        while let Some(to) = next.remove(&side) {
            line.push(crossing(to));
            side = to;
        }
        if line.len() > 1 {
            found.push(line);
        }
    }
    found
}

/// From which side to which a line crosses a cell with these corners, sides counted like corners.
fn segments(corners: [f64; 4], level: f64) -> impl Iterator<Item = (usize, usize)> {
    let is_high = corners.map(|value| value >= level);
    let falls = move |side: usize| is_high[side] && !is_high[(side + 1) % 4];
    let rises = move |side: usize| !is_high[side] && is_high[(side + 1) % 4];
    // In a saddle the middle decides which corners hang together.
    let middle_is_high = corners.iter().sum::<f64>() >= 4.0 * level;
    (0..4)
        .filter(move |side| falls(*side))
        .filter_map(move |from| {
            let to = (1..4)
            .map(|step| if middle_is_high { from + step } else { from + 4 - step } % 4)
            .find(|side| rises(*side))?;
            Some((from, to))
        })
}

#[cfg(test)]
mod tests {
    use super::*;

    /// A hill in the middle of a grid.
    fn hill(count: usize) -> Vec<Option<f64>> {
        let middle = 0.5 * (count - 1) as f64;
        (0..count * count)
            .map(|index| {
                let (x, y) = ((index % count) as f64, (index / count) as f64);
                Some(-(x - middle).hypot(y - middle))
            })
            .collect()
    }

    #[test]
    fn a_hill_has_a_ring_with_the_top_on_its_left() {
        let found = lines(41, &hill(41), -12.0);
        assert_eq!(found.len(), 1);
        let ring = &found[0];
        assert_eq!(ring.first(), ring.last());
        let mut area = 0.0;
        for pair in ring.windows(2) {
            assert!(((pair[0][0] - 20.0).hypot(pair[0][1] - 20.0) - 12.0).abs() < 0.05);
            area += 0.5 * (pair[0][0] * pair[1][1] - pair[1][0] * pair[0][1]);
        }
        // Against the clock: a positive area.
        let disc = std::f64::consts::PI * 144.0;
        assert!((area / disc - 1.0).abs() < 0.01, "{area}");
    }

    #[test]
    fn a_line_ends_where_there_is_no_value_and_saddles_do_not_tangle() {
        let mut values = hill(41);
        values[20 * 41 + 8] = None;
        assert_eq!(lines(41, &values, -12.0).len(), 1);
        let saddle = [Some(1.0), Some(0.0), Some(0.0), Some(1.0)];
        assert_eq!(lines(2, &saddle, 0.4).len(), 2);
        assert_eq!(lines(2, &saddle, 0.6).len(), 2);
    }
}
