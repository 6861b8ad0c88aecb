//! What the reading of one file carries along: the text, what was found wrong so far, the numbers
//! entered so far, and what the command line sets differently.

use std::cell::{Cell, RefCell};
use std::collections::HashMap;
use std::ops::Range;

use toml::Spanned;
use toml::de::{DeTable, DeValue};

use crate::cavity::Book;
use crate::diagnostic::{Diagnostic, Place, Severity, Source};
use crate::quantity::{self, General, Kind, Quantity, Spread, Value};

/// A value given on the command line for an address, in place of the file's.
#[derive(Clone, Debug)]
pub(super) struct Override {
    pub address: String,
    pub text: String,
    /// Index of its own source, and where the value lies in it.
    pub place: Place,
    pub used: Cell<bool>,
}

/// A value as found, with its place.
#[derive(Clone, Debug)]
pub(super) struct Found<'t> {
    pub raw: Raw<'t>,
    pub place: Place,
}

/// A value before it is known what it should be.
#[derive(Clone, Debug)]
pub(super) enum Raw<'t> {
    /// A text, with the offset of its first byte within the place; none where escapes hide it.
    Text(String, Option<usize>),
    /// A bare number.
    Number(f64),
    /// Anything else.
    Other(&'t DeValue<'t>),
}

/// The state of a reading.
pub(super) struct Context<'t> {
    pub sources: &'t [Source],
    pub diagnostics: RefCell<Vec<Diagnostic>>,
    pub overrides: Vec<Override>,
    pub book: RefCell<Book>,
    /// Where each address was written.
    pub places: RefCell<HashMap<String, Place>>,
    /// Addresses that follow others.
    pub tied: Vec<String>,
    /// General tolerances by key.
    pub general: RefCell<HashMap<String, General>>,
}

impl<'t> Context<'t> {
    pub fn report(&self, place: Option<Place>, message: impl Into<String>, help: &str) {
        self.diagnostics.borrow_mut().push(Diagnostic {
            severity: Severity::Error,
            message: message.into(),
            place,
            label: String::new(),
            help: (!help.is_empty()).then(|| help.to_string()),
        });
    }

    pub fn place(&self, span: Range<usize>) -> Place {
        Place { source: 0, span }
    }

    /// Whether a tie gives the number at this address.
    pub fn is_tied(&self, address: &str) -> bool {
        self.tied.iter().any(|tied| tied == address)
    }

    /// What the command line says of an address.
    pub fn overridden(&self, address: &str) -> Option<&Override> {
        let found = self.overrides.iter().rev().find(|o| o.address == address)?;
        for same in self.overrides.iter().filter(|o| o.address == address) {
            same.used.set(true);
        }
        Some(found)
    }

    /// The value of a key in the file.
    pub fn found(&self, value: &'t Spanned<DeValue<'t>>) -> Found<'t> {
        let span = value.span();
        let raw = match value.get_ref() {
            DeValue::String(text) => {
                let source = &self.sources[0].text[span.clone()];
                // Only a plain one-line string shows its characters where they stand.
                let offset = (source.len() == text.len() + 2 && source[1..].starts_with(&**text))
                    .then_some(1);
                Raw::Text(text.to_string(), offset)
            }
            DeValue::Integer(n) => {
                // Integers beyond i64 do not occur in optics; as text they would still be numbers.
                i64::from_str_radix(&n.as_str().replace('_', ""), n.radix())
                    .map_or(Raw::Other(value.get_ref()), |n| Raw::Number(n as f64))
            }
            DeValue::Float(x) => x
                .as_str()
                .replace('_', "")
                .parse()
                .map_or(Raw::Other(value.get_ref()), Raw::Number),
            other => Raw::Other(other),
        };
        Found {
            raw,
            place: self.place(span),
        }
    }

    /// Reads a quantity of the given kind.
    pub fn quantity(&self, key: &str, found: &Found<'_>, kind: Kind) -> Option<Quantity> {
        let (result, offset) = match &found.raw {
            Raw::Text(text, offset) => (quantity::parse(text, kind), *offset),
            Raw::Number(x) => (quantity::from_number(*x, kind), None),
            Raw::Other(value) => {
                self.report(
                    Some(found.place.clone()),
                    format!("`{key}` must be a quantity, and this is {}", kind_of(value)),
                    &format!("write it like {key} = \"{}\"", kind.example()),
                );
                return None;
            }
        };
        match result {
            Ok(quantity) => Some(quantity),
            Err(error) => {
                let place = match offset {
                    Some(offset) if !error.span.is_empty() => {
                        let start = found.place.span.start + offset;
                        Place {
                            source: found.place.source,
                            span: start + error.span.start..start + error.span.end,
                        }
                    }
                    _ => found.place.clone(),
                };
                self.report(
                    Some(place),
                    format!("`{key}`: {}", error.message),
                    error.help.as_deref().unwrap_or(""),
                );
                None
            }
        }
    }

    /// The spread of a quantity: its own or, where it has none, the general tolerance of its key.
    pub fn spread(
        &self,
        key: &str,
        kind: Kind,
        value: Value,
        own: Spread,
        place: &Place,
    ) -> Spread {
        if own != Spread::Exact {
            return own;
        }
        let base = key
            .trim_end_matches("_tangential")
            .trim_end_matches("_sagittal");
        let general = self.general.borrow();
        let Some(rule) = general.get(key).or_else(|| general.get(base)) else {
            return Spread::Exact;
        };
        rule.about(value, kind).unwrap_or_else(|error| {
            self.report(
                Some(place.clone()),
                format!(
                    "the general tolerance does not fit `{key}`: {}",
                    error.message
                ),
                error
                    .help
                    .as_deref()
                    .unwrap_or("give it a tolerance of its own"),
            );
            Spread::Exact
        })
    }
}

/// What a TOML value is, in words.
pub(super) fn kind_of(value: &DeValue<'_>) -> &'static str {
    match value {
        DeValue::String(_) => "a text",
        DeValue::Integer(_) | DeValue::Float(_) => "a number",
        DeValue::Boolean(_) => "true or false",
        DeValue::Datetime(_) => "a date",
        DeValue::Array(_) => "a list",
        DeValue::Table(_) => "a table",
    }
}

/// The nearest known word to one that is not known.
pub(crate) fn nearest<'k>(word: &str, known: impl IntoIterator<Item = &'k str>) -> Option<&'k str> {
    known
        .into_iter()
        .map(|candidate| (strsim::jaro_winkler(word, candidate), candidate))
        .filter(|(likeness, _)| *likeness > 0.75)
        .max_by(|a, b| a.0.total_cmp(&b.0))
        .map(|(_, candidate)| candidate)
}

/// Entries of a table in the order in which they are written.
pub(super) fn in_order<'t>(
    table: &'t DeTable<'t>,
) -> Vec<(&'t str, Range<usize>, &'t Spanned<DeValue<'t>>)> {
    let mut entries: Vec<_> = table
        .iter()
        .map(|(key, value)| (&**key.get_ref(), key.span(), value))
        .collect();
    entries.sort_by_key(|(_, span, _)| span.start);
    entries
}
