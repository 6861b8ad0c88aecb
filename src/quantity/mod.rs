//! Quantities as a builder writes them.
