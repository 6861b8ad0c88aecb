//! From the parts of a written quantity to its value and spread in SI units.

use std::ops::Range;

use super::bound::bounded;
use super::decimal::Written;
use super::distance::{Nominally, limits};
use super::parse::{Amount, Nominal, Raw, read};
use super::refuse::{decimal, like, no_other_limit, out_of_range, slice, unitless, wrong_unit};
use super::settle::settle;
use super::unit::{Dimension, Unit};
use super::{Kind, Quantity, QuantityError, Sense, Spread, Value};

/// Reads a quantity of a kind from text.
///
/// # Errors
/// A text that is no such quantity; the error says where, why, and what to write instead.
pub fn parse(text: &str, kind: Kind) -> Result<Quantity, QuantityError> {
    let raw = read(text, kind)?;
    let (value, spread) = match raw.nominal.clone() {
        Nominal::Flat => flat(&raw, kind)?,
        Nominal::Brewster => brewster(&raw)?,
        Nominal::Number {
            amount,
            is_signed,
            concise,
        } => number(text, &raw, amount, is_signed, concise, kind)?,
    };
    let is_nominal_at_fault = settle(value, Spread::Exact, kind).is_err();
    let spread = settle(value, spread, kind).map_err(|objection| {
        objection.at(if is_nominal_at_fault {
            raw.nominal_span.clone()
        } else if raw.spread.is_some() {
            raw.spread_span.clone()
        } else {
            raw.span.clone()
        })
    })?;
    Ok(Quantity {
        value,
        spread,
        text: text.to_owned(),
    })
}

/// Reads a number that stands without quotes and unit: right for a plain number, a ratio and a
/// loss only.
///
/// # Errors
/// Any other kind, numbers that are not finite, and ratios outside 0…1. The span is empty, there
/// being no text.
pub fn from_number(number: f64, kind: Kind) -> Result<Quantity, QuantityError> {
    if !number.is_finite() {
        let help = if kind.is_surface() && number.is_infinite() {
            "write \"flat\"".to_owned()
        } else {
            like(kind)
        };
        return Err(
            QuantityError::new(0..0, format!("{} is a finite number", kind.phrase())).help(help),
        );
    }
    let written = Written::from_f64(number);
    if !kind.takes_bare_numbers() {
        return Err(unitless(&written.text(), kind, 0..0));
    }
    let number = written.in_range().ok_or_else(|| out_of_range(kind, 0..0))?;
    let value = Value::Scalar(number);
    let spread = settle(value, Spread::Exact, kind).map_err(|objection| objection.at(0..0))?;
    Ok(Quantity {
        value,
        spread,
        text: written.text(),
    })
}

fn flat(raw: &Raw, kind: Kind) -> Result<(Value, Spread), QuantityError> {
    refuse_bound(raw, kind)?;
    if let Some((sense, span)) = &raw.sense {
        return Err(
            QuantityError::new(span.clone(), format!("a flat is not {}", sense.name()))
                .help("write \"flat\" alone, or a radius"),
        );
    }
    let Some(spread) = &raw.spread else {
        return Ok((Value::Flat, Spread::Exact));
    };
    let distance = |amount: &Amount| match amount.unit {
        Some(unit) if unit.dimension() == Dimension::PerLength => unit
            .difference_to_si(amount.written)
            .in_range()
            .ok_or_else(|| out_of_range(kind, amount.span.clone())),
        _ => Err(QuantityError::new(
            amount.span.clone(),
            "the limits of a flat are a curvature, the reciprocal of the radius it may have",
        )
        .help("write them like \"flat ± 0.003 1/m\"")),
    };
    Ok((Value::Flat, limits(spread, distance)?))
}

fn brewster(raw: &Raw) -> Result<(Value, Spread), QuantityError> {
    let refuse = |span: &Range<usize>| {
        Err(QuantityError::new(
            span.clone(),
            "Brewster's angle follows from the indices and stands alone",
        )
        .help("write \"brewster\", or an angle with its spread such as \"56 ± 0.1 deg\""))
    };
    if raw.is_lower_bound.is_some() {
        return refuse(&raw.span);
    }
    match (&raw.sense, &raw.spread) {
        (Some((_, span)), _) => refuse(span),
        (None, Some(_)) => refuse(&raw.spread_span),
        (None, None) => Ok((Value::Brewster, Spread::Exact)),
    }
}

fn number(
    text: &str,
    raw: &Raw,
    amount: Amount,
    is_signed: bool,
    concise: Option<Written>,
    kind: Kind,
) -> Result<(Value, Spread), QuantityError> {
    let unit = unit_of(text, raw, &amount, kind)?;
    let exact = unit.map_or(amount.written, |unit| unit.to_si(amount.written));
    let si = |written: Written| {
        written
            .in_range()
            .ok_or_else(|| out_of_range(kind, amount.span.clone()))
    };
    let signed = si(exact)?;
    if raw.is_lower_bound.is_some() {
        return bounded(raw, exact, unit, kind);
    }
    let about = Nominally {
        si: exact,
        unit,
        kind,
        text,
    };
    let spread = match (&raw.spread, concise) {
        (Some(_), Some(_)) => {
            return Err(QuantityError::new(
                raw.spread_span.clone(),
                "two spreads are written for one quantity",
            )
            .help("write either limits or a standard uncertainty in parentheses"));
        }
        (Some(spread), None) => about.spread(spread)?,
        (None, Some(uncertainty)) => Spread::Standard {
            uncertainty: si(unit.map_or(uncertainty, |unit| unit.difference_to_si(uncertainty)))?,
        },
        (None, None) => Spread::Exact,
    };
    let dimension = unit.map(Unit::dimension);
    let value = match dimension {
        Some(Dimension::PerLength | Dimension::RatioPerLength) if kind == Kind::Loss => {
            Value::PerLength(signed)
        }
        Some(Dimension::Intensity) => Value::Intensity(signed),
        Some(Dimension::Fluence) => Value::Fluence(signed),
        _ => Value::Scalar(signed),
    };
    with_sense(raw, value, spread, is_signed, kind)
}

/// Lets the word of sense count, and asks for it where it is needed.
fn with_sense(
    raw: &Raw,
    value: Value,
    spread: Spread,
    is_signed: bool,
    kind: Kind,
) -> Result<(Value, Spread), QuantityError> {
    let radius = value.number().unwrap_or_default();
    match (&raw.sense, kind) {
        (Some((sense, span)), Kind::Radius) => {
            if is_signed {
                return Err(QuantityError::new(
                    span.clone(),
                    format!("a sign and \"{}\" both tell the sense", sense.name()),
                )
                .help("write one of them: a concave mirror's radius is positive"));
            }
            Ok(match sense {
                Sense::Concave => (value, spread),
                Sense::Convex => (Value::Scalar(-radius), spread.mirrored()),
            })
        }
        (_, Kind::Face) if is_signed => Err(QuantityError::new(
            raw.nominal_span.clone(),
            "the radius of a face has no sign",
        )
        .help("write \"100 mm convex\" or \"100 mm concave\", as seen from outside")),
        (Some((sense, _)), Kind::Face) => Ok((
            Value::Face {
                radius,
                sense: *sense,
            },
            spread,
        )),
        (None, Kind::Face) => Err(QuantityError::new(
            raw.span.clone(),
            "the sense of this face is missing",
        )
        .help("add \"convex\" or \"concave\", as seen from outside")),
        (Some((sense, span)), _) => Err(QuantityError::new(
            span.clone(),
            format!("\"{}\" says nothing about {}", sense.name(), kind.phrase()),
        )),
        (None, _) => Ok((value, spread)),
    }
}

/// The unit of the nominal value: its own, or the one that stands last.
fn unit_of(
    text: &str,
    raw: &Raw,
    amount: &Amount,
    kind: Kind,
) -> Result<Option<Unit>, QuantityError> {
    if let Some(unit) = amount.unit {
        return if kind.accepts(unit) {
            Ok(Some(unit))
        } else {
            Err(wrong_unit(amount, unit, kind))
        };
    }
    let is_share = |unit: &Unit| unit.dimension() == Dimension::Ratio;
    let bare = slice(text, &amount.span);
    match raw.last_unit {
        Some(unit) if kind == Kind::Number && is_share(&unit) => Ok(None),
        Some(unit) if kind.accepts(unit) => {
            let magnitude = amount.written.magnitude().to_f64();
            let is_ambiguous = is_share(&unit) && magnitude <= 1.0 && magnitude > 0.0;
            if is_ambiguous {
                let symbol = unit.symbol();
                let percent = Unit::PERCENT.behind(&decimal(amount.written.shifted(2)));
                return Err(QuantityError::new(
                    amount.span.clone(),
                    format!("it is not clear whether \"{bare}\" is in {symbol} too"),
                )
                .help(format!("write \"{bare} {symbol}\" or \"{percent}\"")));
            }
            Ok(Some(unit))
        }
        Some(unit) if !is_share(&unit) => Err(wrong_unit(
            &Amount {
                span: raw.spread_span.clone(),
                ..amount.clone()
            },
            unit,
            kind,
        )),
        _ if kind.takes_bare_numbers() => Ok(None),
        _ => Err(unitless(&bare, kind, amount.span.clone())),
    }
}

fn refuse_bound(raw: &Raw, kind: Kind) -> Result<(), QuantityError> {
    match raw.is_lower_bound {
        Some(_) => Err(no_other_limit(raw, kind)),
        None => Ok(()),
    }
}
