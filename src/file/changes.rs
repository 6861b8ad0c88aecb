//! What is to be read differently from what a file says, with where that was said.

use std::cell::Cell;
use std::ops::Range;

use super::context::Override;
use crate::diagnostic::{Diagnostic, Place, Severity, Source};

/// What replaces or adds to what a file says.
#[derive(Clone, Debug, Default)]
pub struct Changes {
    /// The arguments, as they are shown beside a mistake.
    sources: Vec<Source>,
    overrides: Vec<Override>,
    /// Indices of the sources that are ties.
    ties: Vec<usize>,
    faults: Vec<Diagnostic>,
}

impl Changes {
    /// None yet.
    pub fn new() -> Changes {
        Changes::default()
    }

    /// Replaces a value and its spread, as in `M3.roc=75 mm`.
    pub fn set(mut self, text: &str) -> Changes {
        let source = self.said("--set", text);
        let Some((address, value)) = text.split_once('=') else {
            self.faults.push(Diagnostic {
                severity: Severity::Error,
                message: "a setting needs an address, = and a value".into(),
                place: Some(Place {
                    source,
                    span: 0..text.len(),
                }),
                label: String::new(),
                help: Some("write it like --set 'M3.roc=75 mm'".into()),
            });
            return self;
        };
        let trimmed = value.trim();
        let start = address.len() + 1 + (value.len() - value.trim_start().len());
        self.overrides.push(Override {
            address: address.trim().into(),
            text: trimmed.trim_matches('"').into(),
            place: Place {
                source,
                span: start..start + trimmed.len(),
            },
            offset: Some(0),
            address_at: 0..address.len(),
            used: Cell::new(false),
        });
        self
    }

    /// Adds a tie, as in `d4.length = d3.length`.
    pub fn tie(mut self, text: &str) -> Changes {
        let source = self.said("--tie", text);
        self.ties.push(source);
        self
    }

    /// Replaces the value at an address by one that is said in some place of an argument.
    pub fn set_within(mut self, argument: &str, text: &str, setting: &Setting) -> Changes {
        let source = self.said(argument, text);
        let whole = text.get(setting.value_at.clone()) == Some(setting.value.as_str());
        self.overrides.push(Override {
            address: setting.address.clone(),
            text: setting.value.clone(),
            place: Place {
                source,
                span: setting.value_at.clone(),
            },
            offset: whole.then_some(0),
            address_at: setting.address_at.clone(),
            used: Cell::new(false),
        });
        self
    }

    fn said(&mut self, argument: &str, text: &str) -> usize {
        self.sources.push(Source {
            name: argument.into(),
            text: text.into(),
        });
        // The file itself is the first source.
        self.sources.len()
    }

    pub(super) fn sources(&self) -> &[Source] {
        &self.sources
    }

    pub(super) fn ties(&self) -> &[usize] {
        &self.ties
    }

    /// The values replaced, or what is wrong with the way they are written.
    pub(super) fn overrides(&self) -> Result<Vec<Override>, Vec<Diagnostic>> {
        if self.faults.is_empty() {
            Ok(self.overrides.clone())
        } else {
            Err(self.faults.clone())
        }
    }
}

/// A value that is said within a longer argument.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Setting {
    /// The address.
    pub address: String,
    /// Where it stands in the argument.
    pub address_at: Range<usize>,
    /// The value, with a unit that may stand elsewhere in the argument.
    pub value: String,
    /// Where the value stands.
    pub value_at: Range<usize>,
}
