//! What the reading of one file carries along: the text, what was found wrong so far, the numbers
//! entered so far, and what the command line sets differently.

use std::cell::{Cell, RefCell};
use std::collections::{HashMap, HashSet};
use std::ops::Range;

use toml::Spanned;
use toml::de::{DeTable, DeValue};

use super::parts::knows;
use super::reach::beyond;
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
    /// Offset of the text within that place; none where they differ.
    pub offset: Option<usize>,
    /// Where the address stands in that source.
    pub address_at: Range<usize>,
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
    pub tied: HashSet<String>,
    /// Kinds of the parts read so far, by their names.
    pub kinds: RefCell<HashMap<String, &'static str>>,
    /// General tolerances by key.
    pub general: RefCell<HashMap<String, General>>,
    /// Keys whose general tolerance was refused: their lack of a spread is told already.
    pub general_refused: RefCell<HashSet<String>>,
}

impl<'t> Context<'t> {
    pub fn report(&self, place: Option<Place>, message: impl Into<String>, help: &str) {
        let message = message.into();
        self.diagnostics.borrow_mut().push(Diagnostic {
            severity: Severity::Error,
            message,
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
        self.tied.contains(address)
    }

    /// Whether an address may be missing only because its part was refused.
    pub fn may_exist(&self, address: &str) -> bool {
        let Some((part, key)) = address.split_once('.') else {
            return false;
        };
        let kinds = self.kinds.borrow();
        let known = kinds.get(part).is_some_and(|kind| knows(kind, key));
        known && !self.diagnostics.borrow().is_empty()
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
                    format!(
                        "`{key}` is {}, and this is {}",
                        kind.phrase(),
                        kind_of(value)
                    ),
                    &format!("write it like {key} = {}", example(key, kind)),
                );
                return None;
            }
        };
        match result {
            Ok(quantity) => {
                if let Some(range) = beyond(quantity.value, kind) {
                    self.report(
                        Some(found.place.clone()),
                        format!("{} here lies {range}", kind.phrase()),
                        "check its digits and its unit",
                    );
                    return None;
                }
                Some(quantity)
            }
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
                let usual = format!("write it like \"{}\"", kind.example());
                let help = match &error.bare {
                    Some(number) => Some(with_unit(number, key, kind)),
                    None if error.help.as_deref() == Some(&usual) => {
                        Some(format!("write it like {}", example(key, kind)))
                    }
                    None => error.help.clone(),
                };
                self.report(
                    Some(place),
                    error.about(&format!("`{key}`"), kind),
                    help.as_deref().unwrap_or(""),
                );
                None
            }
        }
    }

    /// Notes that the general tolerance of a key cannot be used.
    pub fn refuse_general(&self, key: &str) {
        let base = of_both_planes(key).to_string();
        self.general_refused.borrow_mut().insert(base);
    }

    /// Whether a number with this key has no spread because of a mistake told already.
    pub fn lost_general(&self, key: &str) -> bool {
        self.general_refused.borrow().contains(of_both_planes(key))
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
        let base = of_both_planes(key);
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
                "give it a tolerance of its own",
            );
            self.refuse_general(key);
            Spread::Exact
        })
    }
}

/// The key for both planes that a key for one of them stands beside.
fn of_both_planes(key: &str) -> &str {
    key.trim_end_matches("_tangential")
        .trim_end_matches("_sagittal")
}

/// A well-written value of a key, as it stands in a file.
pub(super) fn example(key: &str, kind: Kind) -> String {
    let text = match (key, kind) {
        ("wavelength", _) => "1064 nm",
        ("above" | "below" | "between" | "to" | "waist" | "spot", Kind::Length) => "150 um",
        ("clear", _) => "90 %",
        ("thickness", _) => "5 mm",
        ("wavefront", _) => "0.5 1/m",
        ("travel", Kind::Length) => "1 mm",
        ("travel", Kind::Angle) => "0.1 deg",
        ("diameter" | "width" | "height", _) => "12.7 mm",
        ("radius" | "half_width", _) => "1 mm",
        (_, Kind::Number) => return kind.example().into(),
        _ => kind.example(),
    };
    format!("\"{text}\"")
}

/// What to write where a number has no unit.
fn with_unit(number: &str, key: &str, kind: Kind) -> String {
    let unit = match (key, kind) {
        ("wavelength", _) => "nm",
        ("above" | "below" | "between" | "to", Kind::Length) => "um",
        (key, Kind::Length) if key.starts_with("waist") => "um",
        ("spot" | "mode_field", _) => "um",
        (_, Kind::Frequency) => "Hz",
        (_, Kind::Face) => "mm convex",
        _ => kind.example().split_once(' ').map_or("", |(_, unit)| unit),
    };
    let unit = if kind == Kind::Radius { "mm" } else { unit };
    format!("write its unit too, as in \"{} {unit}\"", shown(number))
}

/// Someone's word as it may stand in a message: short, on one line, and harmless to a terminal.
pub(super) fn shown(word: &str) -> String {
    const MOST: usize = 40;
    let mut text: String = word
        .chars()
        .take(MOST)
        .map(|c| if c.is_control() { '\u{fffd}' } else { c })
        .collect();
    if word.chars().nth(MOST).is_some() {
        text.push('…');
    }
    text
}

/// A kind of part with its article.
pub(super) fn with_article(kind: &str) -> String {
    let article = if kind.starts_with(['a', 'e', 'i', 'o', 'u']) {
        "an"
    } else {
        "a"
    };
    format!("{article} {kind}")
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
