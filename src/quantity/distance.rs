//! The limits about a nominal value, as distances in SI units.

use super::decimal::Written;
use super::parse::{Amount, RawSpread};
use super::refuse::{out_of_range, refuse_relative_temperature, slice, wrong_unit};
use super::unit::{Dimension, Unit};
use super::{Kind, QuantityError, Spread};

/// A nominal value, as what its spread is about.
pub(super) struct Nominally<'a> {
    pub(super) si: Written,
    pub(super) unit: Option<Unit>,
    pub(super) kind: Kind,
    pub(super) text: &'a str,
}

impl Nominally<'_> {
    pub(super) fn spread(&self, raw: &RawSpread) -> Result<Spread, QuantityError> {
        limits(raw, |amount| self.distance(amount))
    }

    fn distance(&self, amount: &Amount) -> Result<f64, QuantityError> {
        let own = self.unit.map(Unit::dimension);
        let is_ratio = matches!(self.kind, Kind::Ratio | Kind::Loss)
            && matches!(own, None | Some(Dimension::Ratio));
        let si = match amount.unit {
            Some(unit) if unit.dimension() == Dimension::Ratio && !is_ratio => {
                refuse_relative_temperature(self.kind, &amount.span)?;
                if self.si.is_zero() {
                    return Err(QuantityError::new(
                        amount.span.clone(),
                        "a share of zero is nothing",
                    )
                    .help("write the spread with a unit of its own"));
                }
                self.si.magnitude().product(unit.to_si(amount.written))
            }
            Some(unit)
                if own == Some(unit.dimension())
                    || (own.is_none() && is_ratio && self.kind.accepts(unit)) =>
            {
                unit.difference_to_si(amount.written)
            }
            Some(unit) => return Err(self.wrong_spread(amount, unit)),
            None if own.is_none() && self.kind.takes_bare_numbers() => amount.written,
            None => {
                let bare = slice(self.text, &amount.span);
                let unit = self
                    .unit
                    .map_or(self.kind.usual_unit(), Unit::keyboard_name);
                return Err(QuantityError::new(
                    amount.span.clone(),
                    format!("the spread \"{bare}\" has no unit"),
                )
                .help(format!("write \"{bare} {unit}\"")));
            }
        };
        si.in_range()
            .ok_or_else(|| out_of_range(self.kind, amount.span.clone()))
    }

    fn wrong_spread(&self, amount: &Amount, unit: Unit) -> QuantityError {
        let mut error = wrong_unit(amount, unit, self.kind);
        if self.kind.accepts(unit) {
            error.message = format!(
                "the spread of {} is not {}",
                self.unit.map_or(Dimension::None, Unit::dimension).phrase(),
                unit.dimension().phrase()
            );
            error.help = Some("write both in the same unit".to_owned());
        } else {
            error.help = Some(match self.kind {
                Kind::Number => "write it like \"1.605 ± 0.002\"".to_owned(),
                kind => {
                    let unit = self.unit.map_or(kind.usual_unit(), Unit::keyboard_name);
                    format!("write the spread in {unit} too")
                }
            });
        }
        error
    }
}

pub(super) fn limits(
    raw: &RawSpread,
    distance: impl Fn(&Amount) -> Result<f64, QuantityError>,
) -> Result<Spread, QuantityError> {
    let (below, above) = match raw {
        RawSpread::Either(amount) => {
            let either = distance(amount)?;
            (either, either)
        }
        RawSpread::Sides { above, below } => (distance(below)?, distance(above)?),
    };
    Ok(Spread::Limits { below, above })
}
