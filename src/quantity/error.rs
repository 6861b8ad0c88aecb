//! What is wrong with a written quantity.

use std::fmt;
use std::ops::Range;

use super::Kind;

/// Why a text is not the quantity wanted, and what to write instead.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct QuantityError {
    /// Bytes within the text that was read; empty at 0 where there was no text.
    pub span: Range<usize>,
    /// What is wrong, in one sentence without a full stop.
    pub message: String,
    /// What to write instead.
    pub help: Option<String>,
    /// The number as written, where all that it lacks is its unit.
    pub bare: Option<String>,
}

impl QuantityError {
    /// An error without help.
    pub(super) fn new(span: Range<usize>, message: impl Into<String>) -> Self {
        Self {
            span,
            message: message.into(),
            help: None,
            bare: None,
        }
    }

    /// The message about a quantity that the reader knows by a name, such as "`thermal`".
    ///
    /// Messages speak of "this" or of the kind where no name is known.
    pub fn about(&self, name: &str, kind: Kind) -> String {
        let phrase = kind.phrase();
        if let Some(number) = &self.bare {
            return format!("{name} needs a unit, and {} has none", quoted(number));
        }
        if phrase.ends_with(name.trim_matches('`')) {
            return self.message.clone();
        }
        if let Some(rest) = self.message.strip_prefix("this is ") {
            return format!("{name} is {rest}");
        }
        let Some(rest) = self.message.strip_prefix(phrase) else {
            return self.message.clone();
        };
        match rest.strip_prefix(" is wanted here") {
            Some(rest) => format!("{name} is {phrase}{rest}"),
            None => format!("{name}{rest}"),
        }
    }

    /// The same with the way out.
    pub(super) fn help(mut self, help: impl Into<String>) -> Self {
        self.help = Some(help.into());
        self
    }
}

impl fmt::Display for QuantityError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.message)?;
        match &self.help {
            Some(help) => write!(f, " ({help})"),
            None => Ok(()),
        }
    }
}

impl std::error::Error for QuantityError {}

/// A piece of someone's text as it may stand in a message: in quotes, short, on one line, without
/// control or direction characters that would disturb a terminal.
pub(super) fn quoted(piece: &str) -> String {
    const MOST: usize = 40;
    let mut shown: String = piece
        .chars()
        .take(MOST)
        .map(|c| {
            let steers = matches!(c, '\u{200b}'..='\u{200f}' | '\u{2028}'..='\u{202e}' | '\u{2060}'..='\u{206f}' | '\u{feff}');
            if c.is_control() || steers { '\u{fffd}' } else { c }
        })
        .collect();
    if piece.chars().nth(MOST).is_some() {
        shown.push('…');
    }
    format!("\"{shown}\"")
}
