//! What is wrong with an input, where it stands, and the way out: data only, no colours.
//!
//! Rooms that read text return these; rendering them beside the source line is the terminal's work.

use std::ops::Range;

/// How much a diagnostic weighs.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Severity {
    /// The input cannot be used.
    Error,
    /// The input is used, with a doubt that the reader should know.
    Caution,
}

/// A text that diagnostics point into: a file, or one argument of the command line.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Source {
    /// Name shown to the reader, such as a path or `--set`.
    pub name: String,
    /// The whole text.
    pub text: String,
}

/// A stretch of one of the sources.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Place {
    /// Index of the source in the list handed along with the diagnostics.
    pub source: usize,
    /// Bytes of the stretch within that source's text.
    pub span: Range<usize>,
}

/// One finding about an input.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Diagnostic {
    /// How much it weighs.
    pub severity: Severity,
    /// What is wrong, in one sentence without a full stop.
    pub message: String,
    /// Where it stands, if it stands anywhere.
    pub place: Option<Place>,
    /// A word at the marked stretch itself; empty for none.
    pub label: String,
    /// What to write instead.
    pub help: Option<String>,
}
