//! Axes from the numbers that they are to show: a range with room, and a unit that fits.

use super::figure::{Axis, Ticks};
use super::number::{NUMBERS, PLAIN, Scale, plain};

/// Room beyond the outermost values, as a share of the range.
const ROOM: f64 = 0.06;
/// The same beyond the ends of bars, where something is written.
const BEYOND_BARS: f64 = 0.36;
/// A number without a unit is read well down to this size; smaller ones get a power of ten.
const PLAIN_DOWN_TO: f64 = 2e-3;
/// A range this small beside its values is counted from a round number within it.
const TINY: f64 = 1e-4;
/// A range smaller than this beside its values is rounding, not a range.
const ROUNDING: f64 = 1e-12;

/// The largest unit in which a value of this size is at least one.
fn unit(size: f64, scales: &[Scale]) -> Scale {
    scales
        .iter()
        .rev()
        .find(|scale| {
            let least = if **scale == PLAIN {
                PLAIN_DOWN_TO
            } else {
                scale.size * (1.0 - 1e-9)
            };
            size >= least
        })
        .or(scales.first())
        .copied()
        .unwrap_or(PLAIN)
}

/// The unit for an axis of nothing but zeros: the one nearest the SI unit.
fn usual(scales: &[Scale]) -> Scale {
    scales
        .iter()
        .min_by(|a, b| a.size.ln().abs().total_cmp(&b.size.ln().abs()))
        .copied()
        .unwrap_or(PLAIN)
}

/// Least and greatest of the finite values.
fn extremes(values: impl IntoIterator<Item = f64>) -> Option<[f64; 2]> {
    values
        .into_iter()
        .filter(|value| value.is_finite())
        .fold(None, |ends, value| match ends {
            None => Some([value, value]),
            Some([least, most]) => Some([value.min(least), value.max(most)]),
        })
}

fn titled(title: &str, unit: Scale) -> String {
    if unit.symbol.is_empty() {
        title.into()
    } else {
        format!("{title}, {}", unit.symbol)
    }
}

impl Axis {
    /// An even axis over all the finite values, with room at both ends, in one of the units.
    ///
    /// Values that never go below zero but come near it get an axis from zero. Values that differ
    /// by little beside their size are counted from a round number, which the title names.
    pub fn of(title: &str, values: impl IntoIterator<Item = f64>, scales: &[Scale]) -> Axis {
        let Some([least, most]) = extremes(values) else {
            return Axis::between(title, 0.0, usual(scales).size, scales);
        };
        let size = least.abs().max(most.abs());
        let span = most - least;
        if span <= ROUNDING * size {
            // One value stands in the middle.
            let half = if size > 0.0 {
                0.05 * size
            } else {
                usual(scales).size
            };
            return Axis::between(title, least - half, most + half, scales);
        }
        let touches_zero = least >= 0.0 && least < 0.25 * span;
        let from = if touches_zero {
            0.0
        } else {
            least - ROOM * span
        };
        let to = if most <= 0.0 && -most < 0.25 * span {
            0.0
        } else {
            most + ROOM * span
        };
        Axis::between(title, from, to, scales)
    }

    /// An even axis from zero to beyond the largest finite value, for counts and radii.
    pub fn from_zero(title: &str, values: impl IntoIterator<Item = f64>, scales: &[Scale]) -> Axis {
        let most = extremes(values).map_or(0.0, |[_, most]| most);
        let to = if most > 0.0 {
            most * (1.0 + 2.0 * ROOM)
        } else {
            usual(scales).size
        };
        Axis::between(title, 0.0, to, scales)
    }

    /// An even axis over zero and all the finite values, with room beyond them for what is written
    /// at the ends of bars.
    pub fn for_bars(title: &str, values: impl IntoIterator<Item = f64>, scales: &[Scale]) -> Axis {
        let [least, most] = extremes(values).unwrap_or([0.0; 2]);
        let [least, most] = [least.min(0.0), most.max(0.0)];
        if least == most {
            return Axis::between(title, 0.0, usual(scales).size, scales);
        }
        let room = BEYOND_BARS * (most - least);
        let beyond = |end: f64| if end == 0.0 { 0.0 } else { room };
        Axis::between(title, least - beyond(least), most + beyond(most), scales)
    }

    /// An even axis from exactly here to there, for what was varied on purpose.
    pub fn between(title: &str, from: f64, to: f64, scales: &[Scale]) -> Axis {
        let (from, to) = (from.min(to), from.max(to));
        let size = from.abs().max(to.abs());
        let span = to - from;
        if span > ROUNDING * size && span < TINY * size {
            return counted_from(title, from, to, scales);
        }
        let unit = unit(size, scales);
        Axis {
            title: titled(title, unit),
            from,
            to,
            origin: 0.0,
            ticks: Ticks::Even(unit),
        }
    }

    /// An axis by decades over all the values above zero, with room at both ends, each number
    /// with its own unit; numbers without a unit are powers of ten.
    pub fn decades(
        title: &str,
        values: impl IntoIterator<Item = f64>,
        scales: &'static [Scale],
    ) -> Axis {
        let above = values.into_iter().filter(|value| *value > 0.0);
        let [least, most] = extremes(above).unwrap_or([usual(scales).size; 2]);
        let room = (most / least).powf(ROOM).max(1.25);
        let ticks = match scales {
            _ if scales == NUMBERS => Ticks::Powers(PLAIN),
            [one] => Ticks::Powers(*one),
            _ => Ticks::Decades(scales),
        };
        Axis {
            title: match ticks {
                Ticks::Powers(unit) => titled(title, unit),
                _ => title.into(),
            },
            from: least / room,
            to: most * room,
            origin: 0.0,
            ticks,
        }
    }
}

/// An axis of small differences from a round number.
fn counted_from(title: &str, from: f64, to: f64, scales: &[Scale]) -> Axis {
    let whole = unit(from.abs().max(to.abs()), scales);
    let span = to - from;
    // The roundest number of the unit that lies within the range.
    let step = 10_f64.powf((span / whole.size).log10().floor());
    let origin = (0.5 * (from + to) / whole.size / step).round() * step * whole.size;
    let small = unit(span, scales);
    let digits = ((origin / whole.size / step).abs().log10().floor() + 1.0).clamp(1.0, 16.0);
    let sign = if origin < 0.0 { '+' } else { '−' };
    let number = plain(origin.abs() / whole.size, digits as usize);
    let number = if whole.symbol.is_empty() {
        number
    } else {
        format!("{number} {}", whole.symbol)
    };
    Axis {
        title: titled(&format!("{title} {sign} {number}"), small),
        from,
        to,
        origin,
        ticks: Ticks::Even(small),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::report::number::{FREQUENCIES, LENGTHS, RATIOS};

    #[test]
    fn the_unit_fits_the_largest_value() {
        let axis = Axis::of("waist", [21e-6, 48e-6], &LENGTHS);
        assert_eq!(axis.title, "waist, µm");
        assert!(axis.from < 21e-6 && axis.to > 48e-6);
        assert_eq!(Axis::of("margin", [0.02, 0.4], &NUMBERS).title, "margin");
        assert_eq!(Axis::of("share", [0.02, 0.4], &RATIOS).title, "share, %");
        assert_eq!(Axis::of("n", [2e9, 9e9], &NUMBERS).title, "n, 10⁹");
        assert_eq!(Axis::of("n", [0.0, 2e4], &NUMBERS).title, "n");
    }

    #[test]
    fn an_axis_begins_at_zero_where_the_values_nearly_do() {
        assert_eq!(Axis::of("w", [1e-4, 9e-4], &LENGTHS).from, 0.0);
        assert!(Axis::of("w", [8e-4, 9e-4], &LENGTHS).from > 0.0);
        assert!(Axis::of("w", [-1e-4, 9e-4], &LENGTHS).from < -1e-4);
        assert_eq!(Axis::from_zero("count", [3.0, 10.0], &NUMBERS).from, 0.0);
    }

    #[test]
    fn small_differences_are_counted_from_a_round_number() {
        let axis = Axis::between("d", 0.1 - 2e-6, 0.1 + 2e-6, &LENGTHS);
        assert_eq!(axis.title, "d − 100 mm, µm");
        assert_eq!(axis.origin, 0.1);
    }

    #[test]
    fn no_value_and_a_single_value_still_have_an_axis() {
        for values in [vec![], vec![0.0], vec![0.1], vec![f64::NAN], vec![3e14; 2]] {
            for axis in [
                Axis::of("x", values.clone(), &FREQUENCIES),
                Axis::from_zero("x", values.clone(), &FREQUENCIES),
                Axis::decades("x", values.clone(), &FREQUENCIES),
            ] {
                assert!(axis.from < axis.to && axis.to.is_finite(), "{values:?}");
            }
        }
    }
}
