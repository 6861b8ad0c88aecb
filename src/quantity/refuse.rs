//! Refusals that several readers share, with the way out.

use std::ops::Range;

use super::decimal::Written;
use super::error::quoted;
use super::human::human;
use super::parse::{Amount, Raw};
use super::unit::{Dimension, UNITS, Unit, nearest};
use super::{Kind, QuantityError};

pub(super) fn refuse_relative_temperature(
    kind: Kind,
    span: &Range<usize>,
) -> Result<(), QuantityError> {
    if kind != Kind::Temperature {
        return Ok(());
    }
    Err(QuantityError::new(
        span.clone(),
        "a share of a temperature depends on where the scale begins",
    )
    .help("write a difference such as \"± 1 K\""))
}

/// A name that no unit has; `written` is that name as it may stand in a message.
pub(super) fn unknown_unit(
    name: &str,
    written: &str,
    span: Range<usize>,
    kind: Kind,
) -> QuantityError {
    let is_group = |name: &str| name.starts_with(|c: char| c.is_ascii_digit());
    if name.strip_prefix(['\'', '’', '_']).is_some_and(is_group) {
        return QuantityError::new(span, "digits are not grouped here")
            .help("write the digits of a number together");
    }
    if name.contains(['\'', '"', '′', '″', '’', '”']) {
        return QuantityError::new(
            span,
            format!("{written} may mean a part of a degree or an inch"),
        )
        .help("write arcmin, arcsec or in");
    }
    if name.starts_with(['×', '·', '*', '^']) {
        return QuantityError::new(span, format!("{written} is not read as a power of ten"))
            .help("write it like \"1.064e-6 m\"");
    }
    if name.starts_with(['–', '—', '…', '.', '~']) {
        return QuantityError::new(span, format!("{written} is not read as a sign or a range"))
            .help("write - for minus, and ± before a spread");
    }
    let error = QuantityError::new(span, format!("{written} is not a unit known here"));
    let wanted = kind.dimensions();
    if let Some(meant) = nearest(name, wanted) {
        return error.help(format!("write {meant}"));
    }
    let known: Vec<&str> = UNITS
        .iter()
        .filter(|unit| wanted.contains(&unit.dimension()))
        .map(|unit| unit.symbol())
        .collect();
    match known.split_last() {
        None => error.help(like(kind)),
        Some((last, [])) => error.help(format!("{} is written in {last}", kind.phrase())),
        Some((last, others)) => error.help(format!(
            "{} is written in {} or {last}",
            kind.phrase(),
            others.join(", ")
        )),
    }
}

pub(super) fn wrong_unit(amount: &Amount, unit: Unit, kind: Kind) -> QuantityError {
    let span = amount.span.clone();
    let is_reciprocal = matches!(
        (unit.dimension(), kind),
        (Dimension::Length, Kind::Curvature) | (Dimension::PerLength, Kind::Radius | Kind::Focal)
    );
    let si = unit.to_si(amount.written);
    let reciprocal = (1.0 / si.to_f64(), is_reciprocal && !si.is_zero());
    if let (reciprocal, true) = reciprocal
        && Written::from_f64(reciprocal).in_range().is_some()
        && si.in_range().is_some()
    {
        let written = unit.behind(&decimal(amount.written));
        let other = human(reciprocal, kind, 3);
        let message = match kind {
            Kind::Curvature => {
                format!("this is a dioptric power; a {written} lens is \"{other}\"")
            }
            Kind::Focal => format!("this is a focal length; a lens of {written} is \"{other}\""),
            _ => format!("this is a radius of curvature; {written} is a radius of \"{other}\""),
        };
        return QuantityError::new(span, message).help(format!("write \"{other}\""));
    }
    if kind.is_surface() && unit.dimension() == Dimension::PerLength && si.is_zero() {
        return QuantityError::new(span, "a surface of no curvature is written as a word")
            .help("write \"flat\", or \"flat ± 0.003 1/m\"");
    }
    let found = unit.dimension().phrase();
    let symbol = unit.symbol();
    QuantityError::new(
        span,
        format!(
            "{} is wanted here, and \"{symbol}\" is {found}",
            kind.phrase()
        ),
    )
    .help(like(kind))
}

pub(super) fn unitless(number: &str, kind: Kind, span: Range<usize>) -> QuantityError {
    let unit = kind.usual_unit();
    let sense = match kind {
        Kind::Face => " convex",
        _ => "",
    };
    let error = QuantityError::new(
        span,
        format!(
            "{} is wanted here, and {} has no unit",
            kind.phrase(),
            quoted(number)
        ),
    )
    .help(format!("write \"{number} {unit}{sense}\", with its unit"));
    QuantityError {
        bare: Some(number.to_owned()),
        ..error
    }
}

pub(super) fn out_of_range(kind: Kind, span: Range<usize>) -> QuantityError {
    QuantityError::new(
        span,
        "this number is beyond 1e30 or closer to zero than 1e-30 in SI units",
    )
    .help(like(kind))
}

pub(super) fn like(kind: Kind) -> String {
    format!("write it like \"{}\"", kind.example())
}

/// A number as written, on one line.
pub(super) fn slice(text: &str, span: &Range<usize>) -> String {
    let piece = text.get(span.clone()).unwrap_or_default();
    piece.split_whitespace().collect::<Vec<_>>().join(" ")
}

/// A number that may be a fraction, as a decimal.
pub(super) fn decimal(number: Written) -> String {
    Written::from_f64(number.to_f64()).text()
}

pub(super) fn no_other_limit(raw: &Raw, kind: Kind) -> QuantityError {
    QuantityError::new(
        raw.span.clone(),
        format!(
            "{} has no limit to the other side of this one",
            kind.phrase()
        ),
    )
    .help("write the nominal value and its limits, with ±")
}
