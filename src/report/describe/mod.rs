//! One file per result: which of its figures a reader needs, in which order and units.

mod check;
mod envelope;
pub mod materials;
mod modes;
mod sections;
mod verdict;
mod waists;

pub use check::describe as check;
pub use envelope::describe as envelope;
pub use modes::{chart as modes_chart, describe as modes};
