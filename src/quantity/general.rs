//! Tolerances for whatever is written without a spread of its own.

use super::decimal::Written;
use super::distance::Nominally;
use super::parse::{RawSpread, read_spread};
use super::refuse::{out_of_range, refuse_relative_temperature};
use super::settle::settle;
use super::unit::Dimension;
use super::{Kind, QuantityError, Spread, Value};

/// A general tolerance, as on a drawing: for whatever is written without a spread of its own.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum General {
    /// A share of the nominal value, to either side.
    Relative(f64),
    /// Distances in the SI unit of the quantity.
    Limits {
        /// Distance to the lower limit, not negative.
        below: f64,
        /// Distance to the upper limit, not negative.
        above: f64,
    },
}

impl General {
    /// The spread it gives to a value of some kind.
    ///
    /// A flat and Brewster's angle stay exact, and so does zero under a relative tolerance, or what
    /// counts per length or per area under limits. Limits of a radius count on the radius without
    /// sense.
    ///
    /// # Errors
    /// Limits that the kind excludes, such as a length below zero. The span is empty.
    pub fn about(self, value: Value, kind: Kind) -> Result<Spread, QuantityError> {
        let Some(number) = value.number() else {
            return Ok(Spread::Exact);
        };
        let is_plain = matches!(value, Value::Scalar(_) | Value::Face { .. });
        let spread = match self {
            General::Relative(_) if number == 0.0 => return Ok(Spread::Exact),
            General::Relative(share) => {
                let distance = Written::from_f64(number.abs())
                    .product(Written::from_f64(share))
                    .to_f64();
                Spread::Limits {
                    below: distance,
                    above: distance,
                }
            }
            General::Limits { .. } if !is_plain => return Ok(Spread::Exact),
            General::Limits { below, above } => Spread::Limits { below, above },
        };
        let spread = if kind == Kind::Radius && number < 0.0 {
            spread.mirrored()
        } else {
            spread
        };
        settle(value, spread, kind).map_err(|objection| objection.at(0..0))
    }
}

/// Reads a general tolerance, such as "0.2 mm", "1 %" or "+0.1/-0.2 mm", for quantities of a
/// kind that are written without a spread. The sign ± may stand before it.
///
/// # Errors
/// A text that is no such tolerance; the error says where, why, and what to write instead.
pub fn parse_general(text: &str, kind: Kind) -> Result<General, QuantityError> {
    let (raw, last_unit, span) = read_spread(text, kind)?;
    let is_share = last_unit.is_some_and(|unit| unit.dimension() == Dimension::Ratio);
    if is_share && !matches!(kind, Kind::Ratio | Kind::Loss) {
        refuse_relative_temperature(kind, &span)?;
        let RawSpread::Either(amount) = &raw else {
            return Err(QuantityError::new(
                span,
                "a relative tolerance is the same to either side",
            )
            .help("write it like \"1 %\""));
        };
        return amount
            .unit
            .and_then(|unit| unit.to_si(amount.written).in_range())
            .map(General::Relative)
            .ok_or_else(|| out_of_range(kind, span));
    }
    let is_ambiguous = match kind {
        Kind::Loss => last_unit.is_some_and(|unit| unit.dimension() != Dimension::Ratio),
        Kind::Damage => true,
        _ => false,
    };
    if is_ambiguous {
        return Err(QuantityError::new(
            span,
            format!(
                "a tolerance in this unit does not hold for every kind of value that {} can have",
                kind.phrase()
            ),
        )
        .help("write the spread at the quantity itself"));
    }
    // Limits need no nominal value, only its unit.
    let about = Nominally {
        si: Written::whole(0),
        unit: last_unit.filter(|unit| kind.accepts(*unit)),
        kind,
        text,
    };
    match about.spread(&raw)? {
        Spread::Limits { below, above } => Ok(General::Limits { below, above }),
        _ => Err(QuantityError::new(span, "a tolerance is wanted here")),
    }
}
