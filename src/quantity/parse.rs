//! From text to the parts of a quantity as they stand in it, before their meaning is weighed.
//!
//! ```text
//! quantity = [bound] (number [concise] [unit] | word) [spread] [sense]
//! spread   = ("±" | "+-" | "+/-") amount | sign amount ["/"] sign amount
//! amount   = number [unit]
//! concise  = "(" digits ")" ["e" exponent]
//! ```

use std::ops::Range;

use super::decimal::Written;
use super::error::QuantityError;
use super::refuse::unknown_unit;
use super::scan::{Number, Scanner};
use super::unit::Unit;
use super::{Kind, Sense};

/// A number with its unit, if it has one of its own.
#[derive(Clone, Debug)]
pub(super) struct Amount {
    pub(super) written: Written,
    pub(super) unit: Option<Unit>,
    pub(super) span: Range<usize>,
}

/// A spread as written.
#[derive(Clone, Debug)]
pub(super) enum RawSpread {
    Either(Amount),
    Sides { above: Amount, below: Amount },
}

/// What a quantity begins with.
#[derive(Clone, Debug)]
pub(super) enum Nominal {
    Number {
        amount: Amount,
        is_signed: bool,
        /// Standard uncertainty in the same unit.
        concise: Option<Written>,
    },
    Flat,
    Brewster,
}

/// The parts of a written quantity.
#[derive(Clone, Debug)]
pub(super) struct Raw {
    /// For `>` and `≥` true, for `<` and `≤` false.
    pub(super) is_lower_bound: Option<bool>,
    pub(super) nominal: Nominal,
    pub(super) nominal_span: Range<usize>,
    pub(super) spread: Option<RawSpread>,
    pub(super) spread_span: Range<usize>,
    /// Unit of a spread's last amount.
    pub(super) last_unit: Option<Unit>,
    pub(super) sense: Option<(Sense, Range<usize>)>,
    pub(super) span: Range<usize>,
}

/// Reads a text as the parts of a quantity; the kind serves the messages.
///
/// # Errors
/// Whatever does not follow the grammar above.
pub(super) fn read(text: &str, kind: Kind) -> Result<Raw, QuantityError> {
    let mut reader = Reader {
        scan: Scanner::new(text)?,
        kind,
    };
    reader.quantity()
}

/// Reads a text as a spread alone, its sign of spread left out or not.
///
/// # Errors
/// Whatever does not follow the grammar above.
pub(super) fn read_spread(
    text: &str,
    kind: Kind,
) -> Result<(RawSpread, Option<Unit>, Range<usize>), QuantityError> {
    let mut reader = Reader {
        scan: Scanner::new(text)?,
        kind,
    };
    let (spread, last_unit) = match reader.spread()? {
        Some(spread) => spread,
        None => {
            let amount = reader.amount()?;
            let unit = amount.unit;
            (RawSpread::Either(amount), unit)
        }
    };
    reader.end(None)?;
    Ok((spread, last_unit, reader.scan.whole()))
}

struct Reader<'a> {
    scan: Scanner<'a>,
    kind: Kind,
}

impl Reader<'_> {
    fn quantity(&mut self) -> Result<Raw, QuantityError> {
        let is_lower_bound = self.bound();
        let start = self.scan.position();
        let nominal = self.nominal()?;
        let nominal_span = self.scan.since(start);
        let start = self.scan.position();
        let spread = self.spread()?;
        let spread_span = self.scan.since(start);
        let sense = self.sense();
        self.end(sense.as_ref())?;
        let (spread, last_unit) = spread.map_or((None, None), |(s, unit)| (Some(s), unit));
        Ok(Raw {
            is_lower_bound,
            nominal,
            nominal_span,
            spread,
            spread_span,
            last_unit,
            sense,
            span: self.scan.whole(),
        })
    }

    fn bound(&mut self) -> Option<bool> {
        let bound = [(">", true), ("≥", true), ("<", false), ("≤", false)]
            .into_iter()
            .find(|(sign, _)| self.scan.take(sign))
            .map(|(_, is_lower)| is_lower)?;
        self.scan.take("=");
        self.scan.skip_spaces();
        Some(bound)
    }

    fn nominal(&mut self) -> Result<Nominal, QuantityError> {
        let start = self.scan.position();
        let is_negative = self.scan.peek() == Some('-');
        let is_spread = ["+-", "+/-", "±"].iter().any(|sign| self.scan.take(sign));
        if is_spread {
            return Err(QuantityError::new(
                self.scan.since(start),
                "the nominal value is missing before its spread",
            )
            .help(self.like()));
        }
        let is_signed = self.scan.take("-") || self.scan.take("+");
        self.scan.skip_spaces();
        let Some(number) = self.scan.number()? else {
            self.scan.rewind(start);
            return self.word();
        };
        let written = if is_negative {
            number.written.negated()
        } else {
            number.written
        };
        let (written, concise) = self.concise(written, &number)?;
        self.scan.skip_spaces();
        let unit = self.unit()?;
        let span = self.scan.since(start);
        Ok(Nominal::Number {
            amount: Amount {
                written,
                unit,
                span,
            },
            is_signed,
            concise,
        })
    }

    /// The uncertainty in parentheses behind a number, and the number with the power of ten that
    /// may follow both.
    fn concise(
        &mut self,
        written: Written,
        number: &Number,
    ) -> Result<(Written, Option<Written>), QuantityError> {
        let start = self.scan.position();
        self.scan.skip_spaces();
        if !self.scan.take("(") {
            self.scan.rewind(start);
            return Ok((written, None));
        }
        self.scan.skip_spaces();
        let inner = self.scan.number()?;
        self.scan.skip_spaces();
        let is_closed = self.scan.take(")");
        let (Some(inner), true) = (inner, is_closed) else {
            return Err(QuantityError::new(
                self.scan.since(start),
                "the parentheses behind a number hold its standard uncertainty",
            )
            .help("write it like \"100.02(5) mm\""));
        };
        if number.is_fraction || inner.is_fraction {
            return Err(QuantityError::new(
                self.scan.since(start),
                "a fraction has no last digit that an uncertainty could count in",
            )
            .help("write a decimal, such as \"12.70(5) mm\""));
        }
        // JCGM 100:2008, 7.2.2: plain digits count in the last places, a number with a point is
        // in the unit itself.
        let uncertainty = if inner.is_plain {
            inner.written.shifted(number.last_place)
        } else {
            inner.written
        };
        let exponent = self.scan.exponent().unwrap_or(0);
        Ok((
            written.shifted(exponent),
            Some(uncertainty.shifted(exponent)),
        ))
    }

    fn word(&mut self) -> Result<Nominal, QuantityError> {
        let start = self.scan.position();
        let is_signed = self.scan.take("-") || self.scan.take("+");
        let Some((name, span)) = self.scan.name() else {
            let message = if self.scan.is_at_end() {
                format!("nothing is written where {} is wanted", self.kind.phrase())
            } else {
                format!("a number is missing before {}", self.rest())
            };
            self.scan.rewind(start);
            return Err(QuantityError::new(self.scan.rest(), message).help(self.like()));
        };
        let refuse = |message: String| Err(QuantityError::new(span.clone(), message));
        let written = self.scan.quote(&span);
        let is_surface = self.kind.is_surface();
        match name.to_lowercase().as_str() {
            "flat" if is_surface && !is_signed => {
                self.scan.skip_spaces();
                Ok(Nominal::Flat)
            }
            "brewster" if self.kind == Kind::SlabAngle && !is_signed => {
                self.scan.skip_spaces();
                Ok(Nominal::Brewster)
            }
            "brewster" if self.kind == Kind::Angle => {
                refuse("only a slab can stand at Brewster's angle".to_owned())
                    .map_err(|error| error.help(self.like()))
            }
            "plano" | "plane" | "inf" | "infinity" | "∞" if is_surface => refuse(format!(
                "{written} is not a number; a surface without curvature is flat"
            ))
            .map_err(|error| error.help("write \"flat\"")),
            "inf" | "infinity" | "∞" | "nan" => refuse(format!(
                "{written} is no value that {} can have",
                self.kind.phrase()
            ))
            .map_err(|error| error.help(self.like())),
            _ => refuse(format!(
                "{} is wanted here, and {written} does not begin with a number",
                self.kind.phrase()
            ))
            .map_err(|error| error.help(self.like())),
        }
    }

    fn spread(&mut self) -> Result<Option<(RawSpread, Option<Unit>)>, QuantityError> {
        let start = self.scan.position();
        for sign in ["±", "+-", "+/-"] {
            if self.scan.take(sign) {
                self.scan.skip_spaces();
                let amount = self.amount()?;
                let unit = amount.unit;
                return Ok(Some((RawSpread::Either(amount), unit)));
            }
        }
        let first_is_above = match self.scan.peek() {
            Some('+') => true,
            Some('-') => false,
            _ => return Ok(None),
        };
        self.scan.take(if first_is_above { "+" } else { "-" });
        self.scan.skip_spaces();
        let mut first = self.amount()?;
        if self.scan.take("/") {
            self.scan.skip_spaces();
        }
        if !self.scan.take(if first_is_above { "-" } else { "+" }) {
            let message = match self.scan.peek() {
                Some('+' | '-') => "both limits lie on the same side",
                _ => "the limit to the other side is missing",
            };
            return Err(QuantityError::new(self.scan.since(start), message)
                .help("write both, such as \"100 mm +0.2/-0.5 mm\", or \"+0.2/-0 mm\""));
        }
        self.scan.skip_spaces();
        let second = self.amount()?;
        let unit = second.unit;
        first.unit = first.unit.or(unit);
        let (above, below) = if first_is_above {
            (first, second)
        } else {
            (second, first)
        };
        Ok(Some((RawSpread::Sides { above, below }, unit)))
    }

    /// One number of a spread.
    fn amount(&mut self) -> Result<Amount, QuantityError> {
        let start = self.scan.position();
        let Some(number) = self.scan.number()? else {
            let is_signed = matches!(self.scan.peek(), Some('+' | '-'));
            let message = if is_signed {
                "a spread is a distance and has no sign of its own".to_owned()
            } else if self.scan.is_at_end() {
                "a number is missing after the sign of the spread".to_owned()
            } else {
                format!("a number is wanted here, not {}", self.rest())
            };
            return Err(QuantityError::new(self.scan.rest(), message)
                .help("write it like \"± 0.5 mm\" or \"+0.2/-0.5 mm\""));
        };
        if self.scan.peek() == Some('(') {
            return Err(QuantityError::new(
                self.scan.rest(),
                "a spread has no uncertainty of its own",
            ));
        }
        self.scan.skip_spaces();
        let unit = self.unit()?;
        Ok(Amount {
            written: number.written,
            unit,
            span: self.scan.since(start),
        })
    }

    /// A unit if one stands here, and the spaces behind it.
    fn unit(&mut self) -> Result<Option<Unit>, QuantityError> {
        let start = self.scan.position();
        if self.scan.is_at_another_number() {
            return Err(QuantityError::new(
                self.scan.rest(),
                "two numbers stand side by side here",
            )
            .help("write the digits of a number together, and ± before a spread"));
        }
        let Some((name, span)) = self.scan.name() else {
            return Ok(None);
        };
        if sense_named(&name).is_some() {
            self.scan.rewind(start);
            return Ok(None);
        }
        match Unit::named(&name) {
            Some(unit) => {
                self.scan.skip_spaces();
                Ok(Some(unit))
            }
            None => {
                let written = self.scan.quote(&span);
                Err(unknown_unit(&name, &written, span, self.kind))
            }
        }
    }

    fn sense(&mut self) -> Option<(Sense, Range<usize>)> {
        let start = self.scan.position();
        let (name, span) = self.scan.name()?;
        match sense_named(&name) {
            Some(sense) => {
                self.scan.skip_spaces();
                Some((sense, span))
            }
            None => {
                self.scan.rewind(start);
                None
            }
        }
    }

    /// Makes sure that nothing is left over.
    fn end(&self, sense: Option<&(Sense, Range<usize>)>) -> Result<(), QuantityError> {
        if self.scan.is_at_end() {
            return Ok(());
        }
        let error = |message: String| QuantityError::new(self.scan.rest(), message);
        Err(match sense {
            Some((sense, _)) => error(format!("{} is left over", self.rest())).help(format!(
                "\"{name}\" stands last, as in \"100 mm ± 1 % {name}\"",
                name = sense.name()
            )),
            None => error(format!("{} is left over at the end", self.rest())).help(self.like()),
        })
    }

    fn rest(&self) -> String {
        self.scan.quote(&self.scan.rest())
    }

    fn like(&self) -> String {
        format!("write it like \"{}\"", self.kind.example())
    }
}

fn sense_named(word: &str) -> Option<Sense> {
    [Sense::Convex, Sense::Concave]
        .into_iter()
        .find(|sense| word.eq_ignore_ascii_case(sense.name()))
}
