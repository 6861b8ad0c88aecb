//! One file per result: which of its figures a reader needs, in which order and units.

mod check;
pub mod materials;

pub use check::describe as check;
