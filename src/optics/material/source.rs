//! Where a value was published.

use std::fmt;

/// A publication.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Source {
    /// Authors, as one cites them.
    pub authors: &'static str,
    /// Journal or book, volume and first page.
    pub journal: &'static str,
    /// Year of publication.
    pub year: u16,
    /// How the value was taken from it, where that is not plain; may be empty.
    pub note: &'static str,
}

impl fmt::Display for Source {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}, {} ({})", self.authors, self.journal, self.year)
    }
}
