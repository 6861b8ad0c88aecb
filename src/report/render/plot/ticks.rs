//! Which numbers stand at an axis.

use crate::report::figure::{Axis, Ticks};
use crate::report::number::{Scale, fixed, plain};

/// A number at an axis: where, and what is written.
pub(super) type Tick = (f64, String);

/// Decades up to which the numbers between them are written too.
const FEW_DECADES: f64 = 3.0;

/// Decades up to which hardly one of those numbers might lie on the axis.
const ONE_DECADE: f64 = 1.0;

/// How much closer than asked for the numbers may stand for the sake of a round step.
const CLOSER: f64 = 0.7;

/// The numbers at an axis, about as many as asked for.
pub(super) fn ticks(axis: &Axis, about: f64) -> Vec<Tick> {
    match axis.ticks {
        Ticks::Even(unit) => even(axis, unit, about),
        Ticks::Decades(units) => decades(axis, |value| with_unit(value, units), about),
        Ticks::Powers(unit) => {
            let is_plain = [axis.from, axis.to]
                .map(|end| (end / unit.size).log10())
                .iter()
                .all(|exponent| (-4.0..=5.0).contains(exponent));
            decades(axis, |value| power(value / unit.size, is_plain), about)
        }
    }
}

/// Where a value lies on an axis, from 0 to 1.
pub(super) fn share(axis: &Axis, value: f64) -> f64 {
    match axis.ticks {
        Ticks::Even(_) => (value - axis.from) / (axis.to - axis.from),
        Ticks::Decades(_) | Ticks::Powers(_) => {
            (value / axis.from).ln() / (axis.to / axis.from).ln()
        }
    }
}

fn even(axis: &Axis, unit: Scale, about: f64) -> Vec<Tick> {
    let (from, to) = (
        (axis.from - axis.origin) / unit.size,
        (axis.to - axis.origin) / unit.size,
    );
    let rough = (to - from) / about.max(1.0);
    if !(rough > 0.0 && rough.is_finite()) {
        return Vec::new();
    }
    let decade = 10_f64.powf(rough.log10().floor());
    let step = [1.0, 2.0, 5.0, 10.0]
        .into_iter()
        .map(|digit| digit * decade)
        .find(|step| *step >= CLOSER * rough)
        .unwrap_or(10.0 * decade);
    let decimals = (-step.log10().floor()).clamp(0.0, 12.0) as usize;
    let slack = 1e-6 * step;
    let first = ((from - slack) / step).ceil() as i64;
    let last = ((to + slack) / step).floor() as i64;
    (first..=last)
        .map(|count| {
            let value = count as f64 * step;
            (axis.origin + value * unit.size, fixed(value, decimals))
        })
        .collect()
}

fn decades(axis: &Axis, text: impl Fn(f64) -> String, about: f64) -> Vec<Tick> {
    let span = (axis.to / axis.from).log10();
    let between: &[f64] = if span <= ONE_DECADE {
        &[1.0, 1.5, 2.0, 3.0, 4.0, 5.0, 6.0, 7.0, 8.0, 9.0]
    } else if span <= FEW_DECADES {
        &[1.0, 2.0, 5.0]
    } else {
        &[1.0]
    };
    // Of very many decades every second, third, ... is written.
    let every = (span / (2.0 * about.max(1.0))).ceil().max(1.0) as i32;
    let first = axis.from.log10().floor() as i32;
    let last = axis.to.log10().ceil() as i32;
    (first..=last)
        .filter(|power| power % every == 0)
        .flat_map(|power| between.iter().map(move |digit| digit * 10_f64.powi(power)))
        .filter(|value| (axis.from..=axis.to).contains(value))
        .map(|value| (value, text(value)))
        .collect()
}

fn with_unit(value: f64, units: &[Scale]) -> String {
    let unit = units
        .iter()
        .rev()
        .find(|unit| value >= unit.size * (1.0 - 1e-9))
        .or(units.first());
    unit.map_or_else(String::new, |unit| {
        format!("{} {}", plain(value / unit.size, 2), unit.symbol)
    })
}

/// A round number, as a power of ten where it or others beside it would have many zeros.
fn power(value: f64, is_plain: bool) -> String {
    let exponent = (value.log10() + 1e-9).floor();
    if is_plain || (-1.0..=2.0).contains(&exponent) {
        return plain(value, 2);
    }
    let digit = plain(value / 10_f64.powf(exponent), 2);
    let raised: String = format!("{exponent}").chars().map(superscript).collect();
    if digit == "1" {
        format!("10{raised}")
    } else {
        format!("{digit}·10{raised}")
    }
}

fn superscript(digit: char) -> char {
    const RAISED: [char; 10] = ['⁰', '¹', '²', '³', '⁴', '⁵', '⁶', '⁷', '⁸', '⁹'];
    digit
        .to_digit(10)
        .map_or('⁻', |digit| RAISED[digit as usize])
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::report::number::LENGTHS;

    fn texts(from: f64, to: f64, ticks: Ticks) -> Vec<String> {
        let axis = Axis {
            title: String::new(),
            from,
            to,
            origin: 0.0,
            ticks,
        };
        super::ticks(&axis, 5.0).into_iter().map(|t| t.1).collect()
    }

    #[test]
    fn round_numbers_in_the_unit_of_the_axis() {
        let millimetres = LENGTHS[2];
        let found = texts(0.0, 0.28768, Ticks::Even(millimetres));
        assert_eq!(found, ["0", "50", "100", "150", "200", "250"]);
        let found = texts(0.0, 1.1e-3, Ticks::Even(millimetres));
        assert_eq!(found, ["0.0", "0.2", "0.4", "0.6", "0.8", "1.0"]);
    }

    #[test]
    fn powers_of_ten_where_there_would_be_many_zeros() {
        use crate::report::number::PLAIN;
        let found = texts(5e-3, 200.0, Ticks::Powers(PLAIN));
        assert_eq!(found, ["0.01", "0.1", "1", "10", "100"]);
        let found = texts(5e-7, 20.0, Ticks::Powers(PLAIN));
        assert_eq!(
            found,
            ["10⁻⁶", "10⁻⁵", "10⁻⁴", "10⁻³", "10⁻²", "0.1", "1", "10"]
        );
    }

    #[test]
    fn decades_carry_their_units() {
        let found = texts(5e-6, 0.04, Ticks::Decades(&LENGTHS));
        assert_eq!(found, ["10 µm", "100 µm", "1 mm", "10 mm"]);
        let found = texts(3e-5, 3e-3, Ticks::Decades(&LENGTHS));
        assert_eq!(
            found,
            ["50 µm", "100 µm", "200 µm", "500 µm", "1 mm", "2 mm"]
        );
    }
}
