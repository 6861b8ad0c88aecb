//! Whether a value and its spread are possible for their kind.

use std::ops::Range;

use super::human::human;
use super::{Kind, QuantityError, Spread, Value};

/// What speaks against a value, before it is known where that value stands in a text.
#[derive(Clone, Debug)]
pub(super) struct Objection {
    message: String,
    help: Option<String>,
}

impl Objection {
    fn new(message: String, help: Option<String>) -> Self {
        Self { message, help }
    }

    pub(super) fn at(self, span: Range<usize>) -> QuantityError {
        QuantityError {
            span,
            message: self.message,
            help: self.help,
            bare: None,
        }
    }
}

/// Room for the rounding of a sum of two numbers near 1, such as 0.9995 + 0.0005.
const ROUNDING: f64 = 4.0 * f64::EPSILON;

/// The spread as it counts, if value and spread are possible.
pub(super) fn settle(value: Value, spread: Spread, kind: Kind) -> Result<Spread, Objection> {
    let Some(number) = value.number() else {
        return Ok(spread);
    };
    let is_ratio = kind == Kind::Ratio || (kind == Kind::Loss && matches!(value, Value::Scalar(_)));
    nominal(number, kind, is_ratio)?;
    let Spread::Limits { below, above } = spread else {
        return Ok(spread);
    };
    if kind.is_never_negative() && number - below < 0.0 {
        return Err(Objection::new(
            format!(
                "the lower limit lies {} below zero, where {} cannot be",
                text(below - number, kind),
                kind.phrase()
            ),
            Some("write unequal limits, with \"-0\" or little below".to_owned()),
        ));
    }
    if kind.is_never_zero() {
        let towards_zero = if number < 0.0 { above } else { below };
        if number.abs() <= towards_zero {
            return Err(Objection::new(
                format!("its limits reach zero, where {} cannot be", kind.phrase()),
                None,
            ));
        }
    }
    if is_ratio && number + above > 1.0 {
        if number + above > 1.0 + ROUNDING {
            return Err(Objection::new(
                format!(
                    "the upper limit is {}, above 100 %",
                    text(number + above, kind)
                ),
                Some(format!(
                    "write unequal limits, or \"> {}\"",
                    text((number - below).max(0.0), kind)
                )),
            ));
        }
        return Ok(Spread::Limits {
            below,
            above: 1.0 - number,
        });
    }
    Ok(spread)
}

fn nominal(number: f64, kind: Kind, is_ratio: bool) -> Result<(), Objection> {
    const LEAST_RADIUS: f64 = 1e-9;
    if kind.is_never_negative() && number < 0.0 {
        let message = match kind {
            Kind::Temperature => "this temperature lies below absolute zero".to_owned(),
            _ => format!("{} is never negative", kind.phrase()),
        };
        return Err(Objection::new(
            message,
            Some("check its sign and its unit".to_owned()),
        ));
    }
    if kind.is_never_zero() && number.abs() < LEAST_RADIUS {
        let help = kind
            .is_surface()
            .then(|| "a surface without curvature is \"flat\"".to_owned());
        let message = if number == 0.0 {
            format!("{} is never zero", kind.phrase())
        } else {
            format!("{} below 1 nm is not meant here", kind.phrase())
        };
        return Err(Objection::new(message, help));
    }
    if is_ratio && number > 1.0 {
        let is_percent = (2.0..=100.0).contains(&number);
        return Err(Objection::new(
            format!("{} lies between 0 and 1 (100 %)", kind.phrase()),
            Some(if is_percent {
                format!("write \"{number} %\" if that is meant")
            } else {
                format!("write it like \"{}\"", kind.example())
            }),
        ));
    }
    Ok(())
}

/// Few digits, without the zeros that would only tell how many.
fn text(number: f64, kind: Kind) -> String {
    let written = human(number, kind, 6);
    match written.split_once(' ') {
        Some((number, unit)) if number.contains('.') && !number.contains('e') => {
            let number = number.trim_end_matches('0').trim_end_matches('.');
            format!("{number} {unit}")
        }
        _ => written,
    }
}
