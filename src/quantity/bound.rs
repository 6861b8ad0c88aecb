//! Ratios as coaters write them, of which one limit is named and the other is 0 or 1.

use super::decimal::Written;
use super::parse::{Nominal, Raw};
use super::refuse::{no_other_limit, out_of_range};
use super::settle::settle;
use super::unit::{Dimension, Unit};
use super::{Kind, QuantityError, Spread, Value};

/// A ratio of which one limit is written; the other is 0 or 1.
pub(super) fn bounded(
    raw: &Raw,
    bound: Written,
    unit: Option<Unit>,
    kind: Kind,
) -> Result<(Value, Spread), QuantityError> {
    let is_lower = raw.is_lower_bound == Some(true);
    let is_ratio = unit.is_none_or(|unit| unit.dimension() == Dimension::Ratio);
    if !matches!(kind, Kind::Ratio | Kind::Loss) || (is_lower && !is_ratio) {
        return Err(no_other_limit(raw, kind));
    }
    let has_concise = matches!(
        raw.nominal,
        Nominal::Number {
            concise: Some(_),
            ..
        }
    );
    if raw.spread.is_some() || has_concise {
        return Err(QuantityError::new(
            raw.span.clone(),
            "a limit with < or > has no spread of its own",
        ));
    }
    if let Some((sense, span)) = &raw.sense {
        return Err(QuantityError::new(
            span.clone(),
            format!("\"{}\" says nothing about {}", sense.name(), kind.phrase()),
        ));
    }
    let half = Written::new(5, -1);
    let other = if is_lower {
        Written::ONE
    } else {
        Written::whole(0)
    };
    let middle = bound.plus(other).product(half);
    let half_width = bound.plus(other.negated()).magnitude().product(half);
    // The middle would hide a bound that is no ratio itself.
    let as_value = |number: f64| {
        if is_ratio {
            Value::Scalar(number)
        } else {
            Value::PerLength(number)
        }
    };
    let at_fault = || out_of_range(kind, raw.nominal_span.clone());
    settle(
        as_value(bound.in_range().ok_or_else(at_fault)?),
        Spread::Exact,
        kind,
    )
    .map_err(|objection| objection.at(raw.nominal_span.clone()))?;
    let value = middle.in_range().ok_or_else(at_fault)?;
    let distance = half_width.in_range().ok_or_else(at_fault)?;
    Ok((
        as_value(value),
        Spread::Limits {
            below: distance,
            above: distance,
        },
    ))
}
