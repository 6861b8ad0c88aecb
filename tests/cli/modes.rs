//! `modes`.
