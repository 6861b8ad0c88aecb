//! Printing a quantity so that it reads back as the very same numbers.
//!
//! A shift of the decimal point changes no digit, so a length prints in the unit a reader expects.
//! Degrees and Celsius are tried, and given up for the SI unit where they do not return exactly.

use super::decimal::Written;
use super::human::unit_for;
use super::unit::Unit;
use super::{Kind, Quantity, Sense, Spread, Value};

/// A text that [`parse`](super::parse()) reads as exactly the same value and spread.
///
/// That holds for every quantity that can be read at all.
pub fn show(quantity: &Quantity, kind: Kind) -> String {
    let spread = quantity.spread;
    match quantity.value {
        Value::Flat => {
            let limits = limits(spread, |x| in_unit_or(Unit::PER_M, Unit::PER_M, x, true));
            format!("flat{limits}")
        }
        Value::Brewster => "brewster".to_owned(),
        Value::Face { radius, sense } => {
            format!("{} {}", plain(radius, spread, Unit::M, kind), sense.name())
        }
        Value::Scalar(radius) if kind == Kind::Radius && radius < 0.0 => {
            let radius = plain(-radius, spread.mirrored(), Unit::M, kind);
            format!("{radius} {}", Sense::Convex.name())
        }
        Value::Scalar(number) => plain(number, spread, base_unit(kind), kind),
        Value::PerLength(number) => with_unit(number, spread, Unit::PERCENT_PER_CM, Unit::PER_M),
        Value::Intensity(number) => with_unit(number, spread, Unit::W_PER_CM2, Unit::W_PER_CM2),
        Value::Fluence(number) => with_unit(number, spread, Unit::J_PER_CM2, Unit::J_PER_CM2),
    }
}

/// A unit in which every number of a kind prints exactly.
fn base_unit(kind: Kind) -> Unit {
    match kind {
        Kind::Angle | Kind::SlabAngle => Unit::RAD,
        Kind::Temperature => Unit::K,
        _ => unit_for(kind, 0.0),
    }
}

fn plain(number: f64, spread: Spread, base: Unit, kind: Kind) -> String {
    let widest = match spread {
        Spread::Limits { below, above } if number == 0.0 => below.max(above),
        Spread::Standard { uncertainty } if number == 0.0 => uncertainty,
        _ => number.abs(),
    };
    with_unit(number, spread, unit_for(kind, widest), base)
}

fn with_unit(number: f64, spread: Spread, unit: Unit, base: Unit) -> String {
    if let Spread::Standard { uncertainty } = spread {
        return concise(number, uncertainty, unit, base);
    }
    let of_differences = if base == Unit::K { Unit::K } else { unit };
    let limits = limits(spread, |x| in_unit_or(of_differences, base, x, true));
    format!("{}{limits}", in_unit_or(unit, base, number, false))
}

fn limits(spread: Spread, text: impl Fn(f64) -> String) -> String {
    match spread {
        Spread::Limits { below, above } if below == above => format!(" ± {}", text(above)),
        Spread::Limits { below, above } => format!(" +{}/-{}", text(above), text(below)),
        Spread::Exact | Spread::Standard { .. } => String::new(),
    }
}

fn in_unit_or(unit: Unit, base: Unit, number: f64, is_difference: bool) -> String {
    match exactly_in(unit, number, is_difference) {
        Some(written) => unit.behind(&written.text()),
        None => {
            let written = exactly_in(base, number, is_difference);
            base.behind(&written.unwrap_or(Written::from_f64(number)).text())
        }
    }
}

/// The decimal that reads back as this SI number, where the unit has one.
fn exactly_in(unit: Unit, number: f64, is_difference: bool) -> Option<Written> {
    let si = Written::from_f64(number);
    let comes_back = |written: &Written| {
        let read = if is_difference {
            unit.difference_to_si(*written)
        } else {
            unit.to_si(*written)
        };
        read.to_f64() == number
    };
    if let Some(shifted) = unit.shifted_from_si(si) {
        return Some(shifted);
    }
    let converted = if is_difference {
        unit.difference_of_si(number)
    } else {
        unit.of_si(number)
    };
    // Fifteen digits drop the noise of the conversion; all of them are tried next.
    let tidy = format!("{converted:.14e}").parse().unwrap_or(converted);
    [tidy, converted]
        .into_iter()
        .map(Written::from_f64)
        .find(comes_back)
}

/// Value and standard uncertainty in the concise form of JCGM 100:2008, 7.2.2.
fn concise(number: f64, uncertainty: f64, unit: Unit, base: Unit) -> String {
    let both_in = |unit: Unit| {
        let value = exactly_in(unit, number, false)?;
        let uncertainty = exactly_in(unit, uncertainty, true)?;
        Some((unit, value, uncertainty))
    };
    let (unit, value, uncertainty) = both_in(unit).or_else(|| both_in(base)).unwrap_or((
        base,
        Written::from_f64(number),
        Written::from_f64(uncertainty),
    ));
    let text = in_last_places(value, uncertainty).unwrap_or_else(|| {
        let mut inner = uncertainty.text();
        // A point tells that the number is not one of last places.
        if !inner.contains(['.', 'e']) {
            inner.push_str(".0");
        }
        format!("{}({inner})", value.text())
    });
    unit.behind(&text)
}

/// "100.02(5)" from 100.02 and 0.05, where that takes no more digits than a reader can count.
fn in_last_places(value: Written, uncertainty: Written) -> Option<String> {
    const MOST_DIGITS: usize = 18;
    let place = [value, uncertainty]
        .into_iter()
        .filter(|number| !number.is_zero())
        .map(|number| number.parts().1)
        .fold(0, i32::min);
    let aligned = |number: Written| {
        let (mantissa, exponent) = number.parts();
        let digits = if number.is_zero() {
            0
        } else {
            let factor = 10_i128.checked_pow((exponent - place).unsigned_abs())?;
            mantissa.checked_mul(factor)?
        };
        let text = digits.unsigned_abs().to_string();
        (text.len() <= MOST_DIGITS).then_some(text)
    };
    let decimals = place.unsigned_abs() as usize;
    if decimals > MOST_DIGITS {
        return None;
    }
    let digits = format!("{:0>width$}", aligned(value)?, width = decimals + 1);
    let (whole, fraction) = digits.split_at(digits.len() - decimals);
    let point = if fraction.is_empty() { "" } else { "." };
    let sign = if value.is_negative() { "-" } else { "" };
    Some(format!(
        "{sign}{whole}{point}{fraction}({})",
        aligned(uncertainty)?
    ))
}
